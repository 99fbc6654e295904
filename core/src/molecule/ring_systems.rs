//! Ring systems: rings that share at least one atom, whether fused, bridged or spiro.

use heapless::Vec;

use super::molecule::Molecule;

/// The ring systems of a molecule of at most `A` atoms, numbered from 0 by their lowest atom.
///
/// Spiro rings share an atom and belong to one system; rings joined by a bond (biphenyl) are two.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct RingSystems<const A: usize> {
    systems: Vec<Option<u16>, A>,
    count: usize,
}

impl<const A: usize, const B: usize> Molecule<A, B> {
    /// The ring systems.
    ///
    /// ```
    /// # use tautring_core::molecule::*;
    /// // Spiropentane: two three-membered rings, one system.
    /// let mut builder = MoleculeBuilder::<8, 8>::new();
    /// for hydrogens in [0, 2, 2, 2, 2] {
    ///     builder.add_atom(Atom { element: Element::C, charge: 0, hydrogens, isotope: 0 })?;
    /// }
    /// for (a, b) in [(0, 1), (1, 2), (2, 0), (0, 3), (3, 4), (4, 0)] {
    ///     builder.add_bond(a, b, BondOrder::Single)?;
    /// }
    /// let molecule = builder.finish()?;
    /// assert_eq!(molecule.rings().len(), 2);
    /// assert_eq!(molecule.ring_systems().len(), 1);
    /// # Ok::<(), MoleculeError>(())
    /// ```
    pub fn ring_systems(&self) -> RingSystems<A> {
        // First each ring atom points to a lower atom of its system, or to itself if it is the lowest.
        let mut systems: Vec<Option<u16>, A> = self.atoms().iter().map(|_| None).collect();
        for ring in self.rings().iter() {
            for &atom in ring {
                let seen = systems.get(usize::from(atom)).copied().flatten();
                set(&mut systems, atom, seen.unwrap_or(atom));
            }
            let roots = ring.iter().map(|&atom| lowest(&systems, atom));
            let Some(root) = roots.min() else { continue };
            for &atom in ring {
                let old_root = lowest(&systems, atom);
                set(&mut systems, old_root, root);
            }
        }
        // Then, upwards, the pointer is replaced by the number, which the lower atoms have already.
        let mut count = 0;
        for atom in 0..systems.len() {
            let Some(lower) = systems.get(atom).copied().flatten() else {
                continue;
            };
            let number = if usize::from(lower) == atom {
                count += 1;
                Some(count as u16 - 1)
            } else {
                systems.get(usize::from(lower)).copied().flatten()
            };
            if let Some(slot) = systems.get_mut(atom) {
                *slot = number;
            }
        }
        RingSystems { systems, count }
    }
}

impl<const A: usize> RingSystems<A> {
    /// How many ring systems.
    pub const fn len(&self) -> usize {
        self.count
    }

    /// Whether there is none.
    pub const fn is_empty(&self) -> bool {
        self.count == 0
    }

    /// The number of the system that an atom is in; `None` outside rings.
    ///
    /// A bond in a ring is in the system of its atoms; a bond between two rings of one system need not be in a ring.
    pub fn of_atom(&self, atom: usize) -> Option<usize> {
        self.systems.get(atom).copied().flatten().map(usize::from)
    }

    /// The atoms of a system in ascending order.
    pub fn atoms(&self, system: usize) -> impl Iterator<Item = usize> {
        (0..self.systems.len()).filter(move |&atom| self.of_atom(atom) == Some(system))
    }
}

/// The lowest atom that `atom` leads to.
fn lowest(pointers: &[Option<u16>], atom: u16) -> u16 {
    let mut at = atom;
    while let Some(&Some(lower)) = pointers.get(usize::from(at)) {
        if lower >= at {
            break;
        }
        at = lower;
    }
    at
}

fn set(pointers: &mut [Option<u16>], atom: u16, to: u16) {
    if let Some(pointer) = pointers.get_mut(usize::from(atom)) {
        *pointer = Some(to);
    }
}

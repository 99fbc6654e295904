//! Keys that name the features of a molecular graph.

use super::{Level, Part};

/// How many classes of features each level has: without heteroatoms, with one, with several.
pub const CLASSES: usize = 3;

/// Names one feature: part, level and class in the highest bits, below them what the feature counts.
///
/// | bits | what |
/// | --- | --- |
/// | 62 to 63 | part |
/// | 56 to 61 | level |
/// | 54 to 55 | class: how many heteroatoms the feature names, two and more being one class |
/// | 0 to 53 | the tokens, mixed; in smooth levels the lowest 8 are the ring size |
///
/// The fit checks that no two features of the data share a key.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Key(u64);

impl Key {
    /// The key of a level's feature that names `heteroatoms` heteroatoms and that the `tokens` describe; their order matters.
    pub fn new(level: Level, heteroatoms: usize, tokens: &[u64]) -> Self {
        let class = heteroatoms.min(CLASSES - 1) as u64;
        Self(((level as u64) << 56) | class << 54 | (mix(tokens) >> 10))
    }

    /// The key of a smooth level's feature: a ring size (at most 63).
    pub fn smooth(level: Level, size: usize) -> Self {
        Self(((level as u64) << 56) | size.min(63) as u64)
    }

    /// The same feature of another part.
    #[must_use]
    pub const fn in_part(self, part: Part) -> Self {
        Self(self.0 & !(0b11 << 62) | (part as u64) << 62)
    }

    /// The 64 bits of the key.
    pub const fn bits(self) -> u64 {
        self.0
    }

    /// The key with these bits, as a table holds it.
    pub const fn from_bits(bits: u64) -> Self {
        Self(bits)
    }

    /// The part.
    pub fn part(self) -> Part {
        match self.0 >> 62 {
            0 => Part::Gas,
            1 => Part::Vaporisation,
            _ => Part::Fusion,
        }
    }

    /// The level.
    pub fn level(self) -> Option<Level> {
        Level::ALL.get((self.0 >> 56 & 0x3f) as usize).copied()
    }

    /// The class: 0 without heteroatoms, 1 with one, 2 with several.
    pub const fn class(self) -> usize {
        (self.0 >> 54 & 0b11) as usize
    }

    /// For a smooth level: the ring size.
    pub const fn ring_size(self) -> usize {
        (self.0 & 0xff) as usize
    }

    /// For a smooth level: whether both keys are of one part and level.
    pub const fn same_family(self, other: Self) -> bool {
        self.0 >> 8 == other.0 >> 8
    }
}

/// Mixes tokens into 64 bits, each by the finaliser of a 64-bit linear congruential generator.
pub(super) fn mix(tokens: &[u64]) -> u64 {
    tokens.iter().fold(
        0x9e37_79b9_7f4a_7c15 ^ tokens.len() as u64,
        |hash, &token| {
            let mut z = (hash ^ token).wrapping_mul(0xbf58_476d_1ce4_e5b9);
            z = (z ^ (z >> 30)).wrapping_mul(0x94d0_49bb_1331_11eb);
            z ^ (z >> 31)
        },
    )
}

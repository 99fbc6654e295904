//! Keys that name the features of a molecular graph.

use super::Level;

/// Names one feature: the level in the highest byte, below it what the feature counts.
///
/// What it counts is mixed into 56 bits, in smooth levels into 48 bits above the ring size. The fit checks that no two
/// features of the data share a key.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Key(u64);

impl Key {
    /// The key of a level's feature that the `tokens` describe; their order matters.
    pub fn new(level: Level, tokens: &[u64]) -> Self {
        Self(((level as u64) << 56) | (mix(tokens) >> 8))
    }

    /// The key of a smooth level's feature: a family of rings and a ring size (at most 63).
    pub fn smooth(level: Level, family: &[u64], size: usize) -> Self {
        Self(((level as u64) << 56) | ((mix(family) >> 16) << 8) | size.min(63) as u64)
    }

    /// The 64 bits of the key.
    pub const fn bits(self) -> u64 {
        self.0
    }

    /// The key with these bits, as a table holds it.
    pub const fn from_bits(bits: u64) -> Self {
        Self(bits)
    }

    /// The level.
    pub fn level(self) -> Option<Level> {
        Level::ALL.get((self.0 >> 56) as usize).copied()
    }

    /// For a smooth level: the ring size.
    pub const fn ring_size(self) -> usize {
        (self.0 & 0xff) as usize
    }

    /// For a smooth level: whether both keys belong to one family of rings.
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

//! Random numbers of a fixed seed: what fails once fails again.

/// Marsaglia's xorshift with 64 bits of state (J. Stat. Software 8 (2003) 14), from memory.
pub struct XorShift(u64);

impl XorShift {
    /// A generator; the seed must not be 0.
    pub const fn new(seed: u64) -> Self {
        Self(seed)
    }

    /// The next 64 bits.
    pub fn bits(&mut self) -> u64 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        self.0
    }

    /// Whether a coin falls on one side.
    pub fn coin(&mut self) -> bool {
        self.bits().is_multiple_of(2)
    }

    /// Puts items into a random order.
    pub fn shuffle<T>(&mut self, items: &mut [T]) {
        for last in (1..items.len()).rev() {
            let other = (self.bits() % (last as u64 + 1)) as usize;
            items.swap(last, other);
        }
    }
}

//! The classes of reactions, by how much of the bonding they keep.

/// A class of reactions that opens a ring system.
///
/// # Source
/// `wheeler-2009`, where the classes form a hierarchy: each keeps what the one before keeps, and more.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub enum ReactionClass {
    /// Bond separation: every ring bond becomes the molecule of its two atoms, with the bond's order.
    ///
    /// # Source
    /// `hehre-1970`.
    Isodesmic,
    /// Equal numbers of each kind of bond by hybridisation, and of each kind of atom by hybridisation and hydrogens.
    ///
    /// # Source
    /// `george-1975`.
    Homodesmotic,
    /// Equal numbers of each kind of bond by its two atoms with all their neighbours.
    ///
    /// # Source
    /// `wheeler-2009`.
    Hyperhomodesmotic,
}

impl ReactionClass {
    /// Every class, from the one that keeps least.
    pub const ALL: [Self; 3] = [Self::Isodesmic, Self::Homodesmotic, Self::Hyperhomodesmotic];

    /// Name of the class, as reports print it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Isodesmic => "isodesmic (bond separation)",
            Self::Homodesmotic => "homodesmotic",
            Self::Hyperhomodesmotic => "hyperhomodesmotic",
        }
    }
}

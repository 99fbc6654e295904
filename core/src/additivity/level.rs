//! The levels of the additivity, coarse to fine.

/// A family of countable features of a molecular graph that share one prior variance.
///
/// The ring levels together are the conventional strain of a molecule.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
#[repr(u8)]
pub enum Level {
    /// Atoms by element.
    Element,
    /// Atoms by type and number of hydrogens.
    Atom,
    /// Bonds by their two elements and their order.
    BondOrder,
    /// Bonds by the classes of their two atoms (element, saturated or not) and their order.
    BondElements,
    /// Bonds by the types of their two atoms and their order.
    Bond,
    /// Groups with the neighbours by class only.
    GroupElements,
    /// Groups after Benson: a central atom with its neighbours.
    Group,
    /// Pairs of atoms two bonds apart, by class.
    GeminalElements,
    /// Pairs of atoms two bonds apart, with the atom between.
    Geminal,
    /// Pairs of atoms one, two and three bonds apart, by element, neighbours and hydrogens.
    NearPair,
    /// Pairs of atoms three bonds apart across a bond that is in no aromatic ring, by class.
    VicinalElements,
    /// Pairs of atoms three bonds apart across a bond that is in no aromatic ring.
    Vicinal,
    /// Pairs of branched atoms that bring substituents five atoms apart face to face.
    OneFive,
    /// Substituents on one side of a double bond.
    Cis,
    /// Substituents in ortho, meta and para position of an aromatic ring.
    AromaticPair,
    /// Aromatic rings by size, and atoms that fuse them.
    AromaticRing,
    /// Logarithm of the number of Kekulé structures.
    Resonance,
    /// Rings by size, smooth in size.
    RingSize,
    /// Ring atoms by type and ring size, once for each ring.
    RingAtom,
    /// Ring bonds by types, order and ring size, once for each ring.
    RingBond,
    /// Atoms and bonds that two rings share, by the sizes of the two, once for each pair of rings.
    RingJunction,
    /// Atoms and bonds that several rings share, by the sizes of all.
    RingEnvironment,
    /// Pairs of atoms three bonds apart across a ring bond, by class.
    RingVicinal,
    /// Trans double bonds in rings.
    RingConfiguration,
    /// Pairs of ring substituents by the sides of the ring on which they stand.
    RingSides,
}

impl Level {
    /// Every level, in the order of the keys.
    pub const ALL: [Self; 25] = [
        Self::Element,
        Self::Atom,
        Self::BondOrder,
        Self::BondElements,
        Self::Bond,
        Self::GroupElements,
        Self::Group,
        Self::GeminalElements,
        Self::Geminal,
        Self::NearPair,
        Self::VicinalElements,
        Self::Vicinal,
        Self::OneFive,
        Self::Cis,
        Self::AromaticPair,
        Self::AromaticRing,
        Self::Resonance,
        Self::RingSize,
        Self::RingAtom,
        Self::RingBond,
        Self::RingJunction,
        Self::RingEnvironment,
        Self::RingVicinal,
        Self::RingConfiguration,
        Self::RingSides,
    ];

    /// Name of the level, as reports print it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Element => "element",
            Self::Atom => "atom",
            Self::BondOrder => "bond order",
            Self::BondElements => "bond elements",
            Self::Bond => "bond",
            Self::GroupElements => "group elements",
            Self::Group => "group",
            Self::GeminalElements => "geminal elements",
            Self::Geminal => "geminal pair",
            Self::NearPair => "near pair",
            Self::VicinalElements => "vicinal elements",
            Self::Vicinal => "vicinal pair",
            Self::OneFive => "1,5 contact",
            Self::Cis => "cis",
            Self::AromaticPair => "aromatic pair",
            Self::AromaticRing => "aromatic ring",
            Self::Resonance => "resonance",
            Self::RingSize => "ring size",
            Self::RingAtom => "ring atom",
            Self::RingBond => "ring bond",
            Self::RingJunction => "ring junction",
            Self::RingEnvironment => "ring environment",
            Self::RingVicinal => "ring vicinal pair",
            Self::RingConfiguration => "ring configuration",
            Self::RingSides => "ring sides",
        }
    }

    /// Whether the level counts as ring strain.
    pub const fn is_strain(self) -> bool {
        self as u8 >= Self::RingSize as u8
    }

    /// Whether the level's features are correlated between neighbouring ring sizes.
    pub const fn is_smooth(self) -> bool {
        matches!(self, Self::RingSize)
    }
}

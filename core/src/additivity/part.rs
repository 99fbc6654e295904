//! The parts that enthalpies of formation in three phases are made of.

use super::Level;

/// A part of an enthalpy of formation, with prior variances of its own.
///
/// The gas part is the enthalpy of formation of the ideal gas. A liquid lies lower by the vaporisation part, a crystal by the fusion part
/// more; both are at 298.15 K, whatever the melting point. So scarce measurements of condensed phases borrow from those of gases.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
#[repr(u8)]
pub enum Part {
    /// Enthalpy of formation of the ideal gas.
    Gas,
    /// From the liquid to the ideal gas.
    Vaporisation,
    /// From the crystal to the liquid.
    Fusion,
}

impl Part {
    /// Every part, in the order of the keys.
    pub const ALL: [Self; 3] = [Self::Gas, Self::Vaporisation, Self::Fusion];

    /// Name of the part, as reports print it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Gas => "gas",
            Self::Vaporisation => "vaporisation",
            Self::Fusion => "fusion",
        }
    }

    /// Whether a level adds to the part. What holds molecules together is coarser than what holds atoms together.
    pub const fn has(self, level: Level) -> bool {
        match self {
            Self::Gas => true,
            Self::Vaporisation => matches!(
                level,
                Level::Element
                    | Level::Atom
                    | Level::BondElements
                    | Level::Bond
                    | Level::GroupElements
                    | Level::Group
                    | Level::GeminalElements
                    | Level::NearPair
                    | Level::VicinalElements
                    | Level::AromaticPair
                    | Level::RingSize
                    | Level::RingAtom
            ),
            Self::Fusion => matches!(
                level,
                Level::Element
                    | Level::Atom
                    | Level::BondElements
                    | Level::GroupElements
                    | Level::AromaticPair
                    | Level::RingSize
            ),
        }
    }
}

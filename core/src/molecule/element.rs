//! The chemical elements that the graph knows.

/// A chemical element of organic chemistry.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
#[non_exhaustive]
pub enum Element {
    /// Hydrogen.
    H,
    /// Boron.
    B,
    /// Carbon.
    C,
    /// Nitrogen.
    N,
    /// Oxygen.
    O,
    /// Fluorine.
    F,
    /// Silicon.
    Si,
    /// Phosphorus.
    P,
    /// Sulfur.
    S,
    /// Chlorine.
    Cl,
    /// Bromine.
    Br,
    /// Iodine.
    I,
}

impl Element {
    /// Every element, by atomic number.
    pub const ALL: [Self; 12] = [
        Self::H,
        Self::B,
        Self::C,
        Self::N,
        Self::O,
        Self::F,
        Self::Si,
        Self::P,
        Self::S,
        Self::Cl,
        Self::Br,
        Self::I,
    ];

    /// Chemical symbol.
    pub const fn symbol(self) -> &'static str {
        match self {
            Self::H => "H",
            Self::B => "B",
            Self::C => "C",
            Self::N => "N",
            Self::O => "O",
            Self::F => "F",
            Self::Si => "Si",
            Self::P => "P",
            Self::S => "S",
            Self::Cl => "Cl",
            Self::Br => "Br",
            Self::I => "I",
        }
    }

    /// The element with this symbol (case matters), if the graph knows it.
    ///
    /// ```
    /// use tautring_core::molecule::Element;
    /// assert_eq!(Element::from_symbol("Cl"), Some(Element::Cl));
    /// assert_eq!(Element::from_symbol("Xx"), None);
    /// ```
    pub fn from_symbol(symbol: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|e| e.symbol() == symbol)
    }

    /// Atomic number.
    pub const fn atomic_number(self) -> u8 {
        match self {
            Self::H => 1,
            Self::B => 5,
            Self::C => 6,
            Self::N => 7,
            Self::O => 8,
            Self::F => 9,
            Self::Si => 14,
            Self::P => 15,
            Self::S => 16,
            Self::Cl => 17,
            Self::Br => 35,
            Self::I => 53,
        }
    }

    /// Abridged standard atomic weight, g/mol.
    ///
    /// # Source
    /// `ciaaw-2021`.
    pub const fn atomic_weight_g_per_mol(self) -> f64 {
        match self {
            Self::H => 1.008,
            Self::B => 10.81,
            Self::C => 12.011,
            Self::N => 14.007,
            Self::O => 15.999,
            Self::F => 18.998,
            Self::Si => 28.085,
            Self::P => 30.974,
            Self::S => 32.06,
            Self::Cl => 35.45,
            Self::Br => 79.904,
            Self::I => 126.90,
        }
    }
}

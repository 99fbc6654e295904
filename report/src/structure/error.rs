//! What can be wrong with a structure, said so that a chemist can mend it.

use std::fmt;
use std::ops::Range;

use tautring_core::molecule::MoleculeError;

use super::capacity::MAX_ATOMS;

/// Why a structure cannot be used.
///
/// Spans are byte ranges of the string as it was given, so that a caller can underline the place.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub enum StructureError {
    /// Nothing but white space.
    Empty,
    /// Longer than any structure of [`MAX_ATOMS`] atoms needs to be.
    TooLong {
        /// Length in bytes.
        length: usize,
        /// The limit in bytes.
        limit: usize,
    },
    /// More atoms than [`MAX_ATOMS`].
    TooManyAtoms {
        /// The first atom too many, in a SMILES.
        span: Option<Range<usize>>,
    },
    /// Branches nested deeper than any real structure.
    TooDeep {
        /// The parenthesis that goes too deep.
        span: Range<usize>,
        /// The limit.
        limit: usize,
    },
    /// A reaction arrow.
    Reaction {
        /// The arrow.
        span: Range<usize>,
    },
    /// Several fragments: a salt, a hydrate, a mixture.
    Fragments {
        /// The dot of a SMILES.
        span: Option<Range<usize>>,
    },
    /// A placeholder where an element is needed.
    Placeholder {
        /// How it is written.
        symbol: String,
        /// Where, in a SMILES.
        span: Option<Range<usize>>,
        /// Atom number from 1, in a Molfile.
        atom: Option<usize>,
    },
    /// An element that the crate has no data for, or a symbol that is none.
    UnknownElement {
        /// The symbol.
        symbol: String,
        /// Where, in a SMILES.
        span: Option<Range<usize>>,
        /// Atom number from 1, in a Molfile.
        atom: Option<usize>,
    },
    /// A string that is no SMILES.
    Syntax {
        /// What is wrong and how to mend it.
        message: String,
        /// Where.
        span: Range<usize>,
    },
    /// A graph that is no molecule.
    Molecule {
        /// What is wrong.
        error: MoleculeError,
        /// The atom, in a SMILES.
        span: Option<Range<usize>>,
    },
    /// A text that is no Molfile or SDF.
    Molfile {
        /// What is wrong and how to mend it.
        message: String,
        /// Line number from 1, where the reader says it.
        line: Option<usize>,
    },
    /// A coordinate that is no finite number of ångström.
    Coordinate {
        /// Atom number from 1.
        atom: usize,
    },
    /// An atom marked as a radical.
    Radical {
        /// Atom number from 1.
        atom: usize,
    },
    /// A bond of a search query (single or double, any ...) or a coordination or hydrogen bond.
    UnsupportedBond {
        /// Bond number from 1.
        bond: usize,
        /// The Molfile's number for the bond type.
        kind: u8,
    },
    /// A bond of order four.
    QuadrupleBond {
        /// Where.
        span: Range<usize>,
    },
    /// A file that cannot be read, or one without a structure in it.
    File {
        /// The path.
        path: String,
        /// What is wrong.
        message: String,
    },
}

impl StructureError {
    /// The place in the string, where it is known.
    pub fn span(&self) -> Option<Range<usize>> {
        match self {
            Self::TooManyAtoms { span }
            | Self::Fragments { span }
            | Self::Placeholder { span, .. }
            | Self::UnknownElement { span, .. }
            | Self::Molecule { span, .. } => span.clone(),
            Self::TooDeep { span, .. }
            | Self::Reaction { span }
            | Self::Syntax { span, .. }
            | Self::QuadrupleBond { span } => Some(span.clone()),
            _ => None,
        }
    }

    /// The same error for a string that begins `offset` bytes later.
    pub(super) fn shifted(mut self, offset: usize) -> Self {
        match &mut self {
            Self::TooManyAtoms { span: Some(span) }
            | Self::Fragments { span: Some(span) }
            | Self::Placeholder {
                span: Some(span), ..
            }
            | Self::UnknownElement {
                span: Some(span), ..
            }
            | Self::Molecule {
                span: Some(span), ..
            }
            | Self::TooDeep { span, .. }
            | Self::Reaction { span }
            | Self::Syntax { span, .. }
            | Self::QuadrupleBond { span } => {
                *span = span.start + offset..span.end + offset;
            }
            _ => {}
        }
        self
    }
}

impl fmt::Display for StructureError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let at = |atom: &Option<usize>| atom.map_or(String::new(), |n| format!("atom {n}: "));
        match self {
            Self::Empty => write!(f, "the structure is empty: give a SMILES such as C1CC1"),
            Self::TooLong { length, limit } => write!(
                f,
                "the structure is {length} characters long, the limit is {limit}: give a single molecule of at most {MAX_ATOMS} atoms"
            ),
            Self::TooManyAtoms { .. } => write!(
                f,
                "more than {MAX_ATOMS} atoms (written hydrogens count): leave hydrogens implicit or give a smaller model compound"
            ),
            Self::TooDeep { limit, .. } => write!(
                f,
                "branches are nested more than {limit} deep: write the longest chain outside the parentheses"
            ),
            Self::Reaction { .. } => write!(
                f,
                "this is a reaction, not a molecule: give each substance by itself"
            ),
            Self::Fragments { .. } => write!(
                f,
                "several separate fragments (a salt, hydrate or mixture): give each neutral molecule as a substance of its own"
            ),
            Self::Placeholder { symbol, atom, .. } => write!(
                f,
                "{}'{symbol}' stands for any atom: write the element that is really there",
                at(atom)
            ),
            Self::UnknownElement { symbol, atom, .. } => write!(
                f,
                "{}'{symbol}' is none of the supported elements (H B C N O F Si P S Cl Br I)",
                at(atom)
            ),
            Self::Syntax { message, .. } => f.write_str(message),
            Self::Molecule { error, .. } => write!(f, "{error}"),
            Self::Molfile { message, line } => match line {
                Some(line) => write!(f, "line {line} of the Molfile: {message}"),
                None => write!(f, "Molfile: {message}"),
            },
            Self::Coordinate { atom } => write!(
                f,
                "atom {atom}: a coordinate is not a finite number below 10000 Å: export the structure again"
            ),
            Self::Radical { atom } => write!(
                f,
                "atom {atom} is marked as a radical or carbene, which is not supported: give the closed-shell molecule"
            ),
            Self::UnsupportedBond { bond, kind } => write!(
                f,
                "bond {bond} has type {kind} (a query, coordination or hydrogen bond): draw it as single, double, triple or aromatic"
            ),
            Self::QuadrupleBond { .. } => write!(
                f,
                "a quadruple bond '$' does not occur between the supported elements: write -, = or #"
            ),
            Self::File { path, message } => write!(f, "{path}: {message}"),
        }
    }
}

impl std::error::Error for StructureError {}

//! A structure as given: the molecule, where it was drawn, what its input leaves open.

use super::capacity::HostMolecule;
use super::error::StructureError;
use super::smiles;

/// A structure that was read and found to be one molecule.
#[derive(Clone, Debug)]
pub struct Structure {
    /// The molecular graph, hydrogens suppressed.
    pub molecule: HostMolecule,
    /// The text it was read from.
    pub input: String,
}

impl Structure {
    /// Reads a SMILES.
    ///
    /// White space around it is passed over. Aromatic or Kekulé form, written or implied hydrogens: the same molecule.
    ///
    /// # Errors
    /// [`StructureError`] with the byte span of the offending part of `text`.
    ///
    /// ```
    /// use tautring_report::structure::Structure;
    /// let oxirane = Structure::from_smiles("C1CO1")?;
    /// assert_eq!(oxirane.molecule.atoms().len(), 3);
    ///
    /// let error = Structure::from_smiles("C1CQ1").unwrap_err();
    /// assert_eq!(error.span(), Some(3..4));
    /// # Ok::<(), tautring_report::structure::StructureError>(())
    /// ```
    pub fn from_smiles(text: &str) -> Result<Self, StructureError> {
        let trimmed = text.trim();
        let offset = text.len() - text.trim_start().len();
        let (builder, outline) = smiles::read(trimmed).map_err(|error| error.shifted(offset))?;
        let molecule = builder
            .finish()
            .map_err(|error| smiles::located(error, &outline).shifted(offset))?;
        Ok(Self {
            molecule,
            input: text.to_owned(),
        })
    }
}

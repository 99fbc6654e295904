//! A structure as given: the molecule, where it was drawn, what its input leaves open.

use std::path::Path;

use tautring_core::molecule::MoleculeError;

use super::capacity::{HostBuilder, HostMolecule};
use super::coordinates::Coordinates;
use super::error::StructureError;
use super::flag::{StereoFlag, open_configurations};
use super::{molfile, smiles};

/// A structure that was read and found to be one molecule.
#[derive(Clone, Debug)]
pub struct Structure {
    /// The molecular graph, hydrogens as counts on their neighbours.
    pub molecule: HostMolecule,
    /// Where a Molfile puts the atoms.
    pub coordinates: Option<Coordinates>,
    /// Configurations that the input leaves open and that an enthalpy depends on.
    pub flag: Option<StereoFlag>,
    /// The name that a Molfile gives, empty without one.
    pub name: String,
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
        let molecule = finish(builder, |error| {
            smiles::located(error, &outline).shifted(offset)
        })?;
        Ok(Self {
            flag: open_configurations(&molecule),
            molecule,
            coordinates: None,
            name: String::new(),
            input: text.to_owned(),
        })
    }

    /// Reads a line of a list: a SMILES, then white space and a name or nothing.
    ///
    /// # Errors
    /// As for [`Structure::from_smiles`].
    pub fn from_line(line: &str) -> Result<Self, StructureError> {
        let line = line.trim();
        let (smiles, name) = line.split_once(char::is_whitespace).unwrap_or((line, ""));
        let mut structure = Self::from_smiles(smiles)?;
        name.trim().clone_into(&mut structure.name);
        Ok(structure)
    }

    /// Reads a Molfile, or the first record of an SDF.
    ///
    /// # Errors
    /// [`StructureError`], where possible with the number of the atom or bond.
    pub fn from_molfile(text: &str) -> Result<Self, StructureError> {
        let first = molfile::read(text).into_iter().next();
        first
            .unwrap_or(Err(StructureError::Empty))
            .and_then(|record| Self::from_record(record, text))
    }

    fn from_record(record: molfile::Record, text: &str) -> Result<Self, StructureError> {
        let molecule = finish(record.builder, |error| StructureError::Molecule {
            error,
            span: None,
        })?;
        Ok(Self {
            flag: open_configurations(&molecule),
            molecule,
            coordinates: record.coordinates,
            name: record.name,
            input: text.to_owned(),
        })
    }
}

/// Reads every structure of a file: a Molfile, an SDF, or SMILES, one to a line, with a name after white space.
///
/// In a file of SMILES, empty lines and lines that begin with `#` are passed over. A structure that cannot be read gives its error in its
/// place.
///
/// # Errors
/// [`StructureError::File`] when the file cannot be read or holds no structure.
pub fn read_structures(
    path: &Path,
) -> Result<Vec<Result<Structure, StructureError>>, StructureError> {
    let failed = |message: String| StructureError::File {
        path: path.display().to_string(),
        message,
    };
    let text = std::fs::read_to_string(path).map_err(|error| failed(error.to_string()))?;
    let structures: Vec<_> = if text.contains("V2000") || text.contains("V3000") {
        let records = molfile::read(&text).into_iter().zip(record_texts(&text));
        records
            .map(|(record, text)| record.and_then(|record| Structure::from_record(record, text)))
            .collect()
    } else {
        let lines = text.lines().map(str::trim);
        lines
            .filter(|line| !line.is_empty() && !line.starts_with('#'))
            .map(Structure::from_line)
            .collect()
    };
    if structures.is_empty() {
        return Err(failed(
            "holds no structure: give SMILES, one to a line, or an SDF".into(),
        ));
    }
    Ok(structures)
}

/// The text of each record of an SDF.
fn record_texts(text: &str) -> impl Iterator<Item = &str> {
    text.split("\n$$$$").map(|record| {
        // What follows the dollars on their line is a line end.
        record
            .strip_prefix("\r\n")
            .or(record.strip_prefix('\n'))
            .unwrap_or(record)
    })
}

/// Validates a graph with its hydrogens as counts.
fn finish(
    mut builder: HostBuilder,
    located: impl Fn(MoleculeError) -> StructureError,
) -> Result<HostMolecule, StructureError> {
    let written = builder.clone();
    builder.suppress_hydrogens();
    let molecule = builder.finish().map_err(|error| {
        // The error shall name the atom by its number in the input, where hydrogens may stand before it.
        located(written.finish().err().unwrap_or(error))
    })?;
    if molecule.fragments() > 1 {
        return Err(StructureError::Fragments { span: None });
    }
    Ok(molecule)
}

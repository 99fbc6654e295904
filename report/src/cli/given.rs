//! The structures that a command line names.

use std::io::{self, BufRead as _};
use std::path::Path;

use tautring_report::structure::{Structure, StructureError, read_structures};

/// Endings of names that mean a file even where there is none, so that a misspelt name is not read as a SMILES.
const ENDINGS: [&str; 3] = [".mol", ".sdf", ".smi"];

/// One structure of a command line.
pub(super) struct Given {
    /// The SMILES, or the path of the Molfile or SDF.
    pub(super) input: String,
    /// Number of the structure in its file, from 1.
    pub(super) record: Option<usize>,
    /// The structure, or why it cannot be read.
    pub(super) structure: Result<Structure, StructureError>,
}

impl Given {
    fn line(line: &str) -> Self {
        let smiles = line.split_whitespace().next().unwrap_or_default();
        Self {
            input: smiles.to_owned(),
            record: None,
            structure: Structure::from_line(line),
        }
    }

    /// What people are told of where it came from.
    pub(super) fn place(&self) -> String {
        match self.record {
            Some(record) => format!("{}, structure {record}", self.input),
            None => self.input.clone(),
        }
    }
}

/// The structures of one argument: a SMILES, the path of a file, or `-` for SMILES lines on stdin, read as they come.
pub(super) fn given(argument: &str) -> Box<dyn Iterator<Item = Given>> {
    let path = Path::new(argument);
    let lower = argument.to_ascii_lowercase();
    if argument == "-" {
        Box::new(from_stdin())
    } else if path.is_file() || ENDINGS.iter().any(|ending| lower.ends_with(ending)) {
        from_file(argument)
    } else {
        Box::new(std::iter::once(Given {
            input: argument.to_owned(),
            record: None,
            structure: Structure::from_smiles(argument),
        }))
    }
}

fn from_stdin() -> impl Iterator<Item = Given> {
    let mut input = io::stdin().lock();
    std::iter::from_fn(move || {
        loop {
            let mut bytes = Vec::new();
            // Bytes that are no text make a bad SMILES, which is answered like any other.
            let read = input.read_until(b'\n', &mut bytes).ok()?;
            let text = String::from_utf8_lossy(&bytes);
            let line = text.trim();
            if read == 0 {
                return None;
            }
            if !line.is_empty() && !line.starts_with('#') {
                return Some(Given::line(line));
            }
        }
    })
}

fn from_file(argument: &str) -> Box<dyn Iterator<Item = Given>> {
    let path = argument.to_owned();
    match read_structures(Path::new(argument)) {
        Err(error) => Box::new(std::iter::once(Given {
            input: path,
            record: None,
            structure: Err(error),
        })),
        Ok(structures) => {
            Box::new(
                structures
                    .into_iter()
                    .enumerate()
                    .map(move |(index, structure)| {
                        // A Molfile is named, not copied; a SMILES stands for itself.
                        let smiles = structure
                            .as_ref()
                            .ok()
                            .filter(|structure| structure.coordinates.is_none())
                            .map(|structure| structure.input.clone());
                        Given {
                            input: smiles.unwrap_or_else(|| path.clone()),
                            record: Some(index + 1),
                            structure,
                        }
                    }),
            )
        }
    }
}

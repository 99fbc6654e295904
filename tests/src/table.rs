//! Tables in CSV: the data of the project and the reference files.

use std::path::Path;

use serde::de::DeserializeOwned;

/// The rows of a table.
///
/// # Panics
/// When the file is not there or a row does not fit, which names both.
pub fn rows<Row: DeserializeOwned>(path: &Path) -> Vec<Row> {
    let mut reader =
        csv::Reader::from_path(path).unwrap_or_else(|e| panic!("{}: {e}", path.display()));
    reader
        .deserialize()
        .map(|row| row.unwrap_or_else(|e| panic!("{}: {e}", path.display())))
        .collect()
}

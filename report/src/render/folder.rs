//! The files of a report, whole or not at all.

use std::fs;
use std::io::{self, Write};
use std::path::{Path, PathBuf};

use tempfile::{NamedTempFile, TempPath};

use super::error::RenderError;
use super::{figures, html, json, markdown};
use crate::document::{Document, Inputs};

/// Writes `report.md` with `figures/*.svg` beside it, `report.html` and `report.json` into `folder`, which is made if it is not there.
///
/// Every file is first written whole beside its place; only when all of them are there are they renamed, the figures first. Returns the
/// files in the order of writing.
///
/// # Errors
/// [`RenderError`]; when a file cannot be written, the folder holds what it held before.
pub fn write_all(
    document: &Document,
    inputs: &Inputs<'_>,
    folder: &Path,
) -> Result<Vec<PathBuf>, RenderError> {
    let figure_folder = folder.join(markdown::FIGURES);
    let mut files = Vec::new();
    for figure in document.figures() {
        let path = figure_folder.join(format!("{}.svg", figure.id));
        files.push((path, figures::svg_file(figure)));
    }
    let text = markdown(document);
    files.push((folder.join("report.html"), html(document, &text)?));
    files.push((folder.join("report.json"), json(inputs)?));
    files.push((folder.join("report.md"), text));

    let deepest = if document.figures().next().is_some() {
        &figure_folder
    } else {
        folder
    };
    fs::create_dir_all(deepest).map_err(|source| RenderError::Folder {
        path: deepest.to_owned(),
        source,
    })?;
    let mut ready = Vec::new();
    for (path, content) in files {
        let temporary = beside(&path, &content).map_err(|source| RenderError::File {
            path: path.clone(),
            placed: Vec::new(),
            source,
        })?;
        ready.push((temporary, path));
    }
    let mut placed = Vec::new();
    for (temporary, path) in ready {
        if let Err(error) = temporary.persist(&path) {
            let source = error.error;
            return Err(RenderError::File {
                path,
                placed,
                source,
            });
        }
        placed.push(path);
    }
    Ok(placed)
}

/// A whole file with this content in the folder of `path`, readable as any new file there would be.
fn beside(path: &Path, content: &str) -> io::Result<TempPath> {
    let folder = path.parent().unwrap_or(Path::new("."));
    let mut builder = tempfile::Builder::new();
    builder.prefix(".tautring-");
    // Temporary files are private by default; a report is to be read by whoever may read the folder.
    #[cfg(unix)]
    builder.permissions(std::os::unix::fs::PermissionsExt::from_mode(0o666));
    let mut file: NamedTempFile = builder.tempfile_in(folder)?;
    file.write_all(content.as_bytes())?;
    file.as_file().sync_all()?;
    Ok(file.into_temp_path())
}

//! Why a report could not be written.

use std::fmt;
use std::io;
use std::path::PathBuf;

/// Why a report could not be written.
#[derive(Debug)]
#[non_exhaustive]
pub enum RenderError {
    /// The folder could not be made.
    Folder {
        /// The folder.
        path: PathBuf,
        /// What the system says.
        source: io::Error,
    },
    /// A file could not be written; none of the report was put in place unless `placed` says so.
    File {
        /// The file.
        path: PathBuf,
        /// Files already replaced by then.
        placed: Vec<PathBuf>,
        /// What the system says.
        source: io::Error,
    },
    /// The page template failed.
    Template {
        /// What the template engine says.
        source: minijinja::Error,
    },
    /// The results could not be put into JSON.
    Json {
        /// What the serialiser says.
        source: serde_json::Error,
    },
}

impl fmt::Display for RenderError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Folder { path, .. } => write!(
                f,
                "the folder {} cannot be made: give a folder that you may write to",
                path.display()
            ),
            Self::File { path, placed, .. } if placed.is_empty() => write!(
                f,
                "{} cannot be written, nothing was changed: check that you may write to its folder and that the disk has room",
                path.display()
            ),
            Self::File { path, placed, .. } => write!(
                f,
                "{} cannot be replaced after {} other files of the report were: close programs that hold it open and run again",
                path.display(),
                placed.len()
            ),
            Self::Template { .. } => write!(f, "the page of the report cannot be made"),
            Self::Json { .. } => write!(f, "the results cannot be written as JSON"),
        }
    }
}

impl std::error::Error for RenderError {
    fn source(&self) -> Option<&(dyn std::error::Error + 'static)> {
        match self {
            Self::Folder { source, .. } | Self::File { source, .. } => Some(source),
            Self::Template { source } => Some(source),
            Self::Json { source } => Some(source),
        }
    }
}

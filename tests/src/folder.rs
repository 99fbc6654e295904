//! Where the files are.

use std::fs;
use std::path::{Path, PathBuf};

/// Top folder of the project.
///
/// # Panics
/// Never: the package lies in it.
pub fn top() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR"))
        .parent()
        .expect("the test package lies in the project's folder")
        .to_owned()
}

/// A reference file of the checks.
pub fn reference(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("reference")
        .join(name)
}

/// Every file below a folder of the project whose name ends so, in alphabetical order, with its path from the top.
///
/// # Panics
/// When the folder cannot be read.
pub fn files(folder: &str, ending: &str) -> Vec<(String, String)> {
    let mut found = Vec::new();
    collect(&top().join(folder), ending, &mut found);
    found.sort();
    found
}

fn collect(folder: &Path, ending: &str, found: &mut Vec<(String, String)>) {
    let entries = fs::read_dir(folder).unwrap_or_else(|e| panic!("{}: {e}", folder.display()));
    for entry in entries {
        let path = entry.expect("an entry of the folder").path();
        if path.is_dir() {
            collect(&path, ending, found);
        } else if path.to_string_lossy().ends_with(ending) {
            let text =
                fs::read_to_string(&path).unwrap_or_else(|e| panic!("{}: {e}", path.display()));
            let name = path.strip_prefix(top()).expect("it lies below the top");
            found.push((name.display().to_string(), text));
        }
    }
}

//! Folders that a test may fill, gone when it ends.

use std::fs;
use std::path::{Path, PathBuf};
use std::sync::atomic::{AtomicU32, Ordering};

/// A folder of its own among the system's temporary files.
pub struct Scratch(PathBuf);

impl Scratch {
    /// Makes an empty folder.
    ///
    /// # Panics
    /// When there is no place for temporary files.
    pub fn new() -> Self {
        static NEXT: AtomicU32 = AtomicU32::new(0);
        let number = NEXT.fetch_add(1, Ordering::Relaxed);
        let name = format!("tautring-{}-{number}", std::process::id());
        let path = std::env::temp_dir().join(name);
        fs::create_dir_all(&path).expect("a temporary folder");
        Self(path)
    }

    /// A path in the folder.
    pub fn join(&self, name: &str) -> PathBuf {
        self.0.join(name)
    }

    /// Writes a file into the folder and gives its path.
    ///
    /// # Panics
    /// When it cannot be written.
    pub fn write(&self, name: &str, content: &str) -> PathBuf {
        let path = self.join(name);
        fs::write(&path, content).expect("a temporary file");
        path
    }

    /// Names of everything in the folder and below, in alphabetical order.
    ///
    /// # Panics
    /// When the folder cannot be read.
    pub fn names(&self) -> Vec<String> {
        let mut names = Vec::new();
        list(&self.0, &self.0, &mut names);
        names.sort();
        names
    }
}

impl Default for Scratch {
    fn default() -> Self {
        Self::new()
    }
}

impl Drop for Scratch {
    fn drop(&mut self) {
        // What cannot be removed stays among the temporary files and harms nobody.
        let _ = fs::remove_dir_all(&self.0);
    }
}

fn list(top: &Path, folder: &Path, names: &mut Vec<String>) {
    for entry in fs::read_dir(folder).expect("the folder can be read") {
        let path = entry.expect("an entry").path();
        if path.is_dir() {
            list(top, &path, names);
        } else {
            let name = path.strip_prefix(top).expect("it lies below the folder");
            names.push(name.display().to_string());
        }
    }
}

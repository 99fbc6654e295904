//! The program `tautring`, run as a user runs it.

use std::ffi::OsStr;
use std::path::{Path, PathBuf};
use std::process::Command;
use std::sync::OnceLock;

use crate::folder::top;

/// What a run leaves.
#[derive(Debug)]
pub struct Run {
    /// The exit code.
    pub code: i32,
    /// Data.
    pub stdout: String,
    /// Talk.
    pub stderr: String,
}

impl Run {
    /// Whether the program fell over instead of answering.
    pub fn panicked(&self) -> bool {
        let traces = ["panicked at", "RUST_BACKTRACE", "stack overflow"];
        self.code == 101 || traces.iter().any(|t| self.stderr.contains(t))
    }
}

/// Runs the program in the top folder.
///
/// # Panics
/// When it cannot be built or started, or is ended by a signal.
pub fn tautring<S: AsRef<OsStr>>(arguments: impl IntoIterator<Item = S>) -> Run {
    let output = Command::new(path())
        .args(arguments)
        .current_dir(top())
        .output()
        .expect("the program starts");
    let text = |bytes| String::from_utf8(bytes).expect("the program writes UTF-8");
    let code = output.status.code();
    Run {
        code: code.unwrap_or_else(|| panic!("ended by a signal: {}", output.status)),
        stdout: text(output.stdout),
        stderr: text(output.stderr),
    }
}

/// Cargo makes programs of a package for the tests of that package alone, so this asks for it; mostly it is there already.
fn path() -> &'static Path {
    static PATH: OnceLock<PathBuf> = OnceLock::new();
    PATH.get_or_init(|| {
        let test = std::env::current_exe().expect("a test knows its path");
        let profile = test
            .ancestors()
            .nth(2)
            .expect("a test lies in target/PROFILE/deps");
        let target = profile.parent().expect("a profile lies in target");
        let mut cargo = Command::new(env!("CARGO"));
        cargo
            .args(["build", "--quiet", "--locked", "--workspace", "--bins"])
            .arg("--target-dir")
            .arg(target)
            .current_dir(top());
        if profile.ends_with("release") {
            cargo.arg("--release");
        }
        let status = cargo.status().expect("cargo starts");
        assert!(status.success(), "the program does not build");
        profile.join(format!("tautring{}", std::env::consts::EXE_SUFFIX))
    })
}

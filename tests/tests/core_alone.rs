//! The core stands alone: no `std`, no `alloc`, no `unsafe`, and no crate but those that DEVELOPERS.md names.
//!
//! `.ci/no-std` builds it for a target that has no `std`; this says the same in a second, wherever cargo is.

use std::collections::BTreeSet;
use std::process::Command;

use tautring_tests::folder::{files, top};

/// What the core depends on: `libm` for transcendental functions, `heapless` for storage, and what `heapless` brings.
const CRATES: [&str; 6] = [
    "byteorder",
    "hash32",
    "heapless",
    "libm",
    "stable_deref_trait",
    "tautring-core",
];

/// Words that the core's code has no use for.
const FORBIDDEN: [&str; 5] = ["std::", "alloc::", "extern crate", "unsafe ", "mul_add"];

#[test]
fn the_core_depends_on_few_crates() {
    let output = Command::new(env!("CARGO"))
        .args(["tree", "--locked", "-p", "tautring-core", "-e", "normal"])
        .args(["--prefix", "none", "--format", "{p}"])
        .current_dir(top())
        .output()
        .expect("cargo starts");
    assert!(output.status.success(), "{output:?}");
    let text = String::from_utf8(output.stdout).expect("cargo writes UTF-8");
    let crates: BTreeSet<&str> = text
        .lines()
        .filter_map(|line| line.split(' ').next())
        .collect();
    assert_eq!(crates, BTreeSet::from(CRATES));
}

#[test]
fn the_core_names_no_std_no_alloc_and_nothing_unsafe() {
    let sources = files("core/src", ".rs");
    assert!(sources.len() > 40, "only {} files", sources.len());
    for (path, text) in sources {
        // Unit tests run on the host and may use std.
        let code = text.split("#[cfg(test)]").next().unwrap_or("");
        for (number, line) in code.lines().enumerate() {
            let line = line.split("//").next().unwrap_or("");
            for word in FORBIDDEN {
                assert!(!line.contains(word), "{path}:{}: {line}", number + 1);
            }
        }
    }
}

#[test]
fn only_one_file_calls_libm() {
    for (path, text) in files("core/src", ".rs") {
        let own = path == "core/src/float.rs";
        assert!(
            own || !text.contains("libm::"),
            "{path} calls libm: use float.rs"
        );
    }
}

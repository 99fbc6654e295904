//! Case files with mistakes, and how each is answered.
//!
//! Every `tests/reference/bad_cases/NAME.toml` has its answer in `NAME.txt`. The answers are remade by
//! `REMAKE_REFERENCE=1 cargo test -p tautring-tests --test case_bad`, and are to be read before they are committed.

use std::fs;
use std::path::{Path, PathBuf};

use tautring_report::case;

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("reference/bad_cases")
}

fn cases() -> Vec<PathBuf> {
    let mut files: Vec<PathBuf> = fs::read_dir(folder())
        .expect("the folder is there")
        .map(|entry| entry.expect("the entry can be read").path())
        .filter(|path| {
            path.extension()
                .is_some_and(|extension| extension == "toml")
        })
        .collect();
    files.sort();
    files
}

#[test]
fn every_mistake_is_answered_as_agreed() {
    let files = cases();
    assert!(files.len() >= 25, "only {} bad cases", files.len());
    let mut differing = Vec::new();
    for path in files {
        let text = fs::read_to_string(&path).expect("a bad case is UTF-8");
        let name = path.file_name().expect("it has a name").to_string_lossy();
        let answer = match case::parse(&text, &name, &folder()) {
            Ok(_) => format!("{name} was taken for a good case\n"),
            Err(errors) => errors.render(false),
        };
        let reference = path.with_extension("txt");
        if std::env::var_os("REMAKE_REFERENCE").is_some() {
            fs::write(&reference, &answer).expect("the answer can be written");
        }
        if fs::read_to_string(&reference).unwrap_or_default() != answer {
            differing.push(format!("{}\n{answer}", reference.display()));
        }
    }
    assert!(differing.is_empty(), "{}", differing.join("\n"));
}

/// The first line of a bad case says how many mistakes it has: counted by who wrote it, not by the program.
#[test]
fn no_mistake_is_missed_or_invented() {
    for path in cases() {
        let text = fs::read_to_string(&path).expect("a bad case is UTF-8");
        let stated: usize = text
            .trim_start_matches('\u{feff}')
            .strip_prefix("# mistakes: ")
            .and_then(|rest| rest.lines().next())
            .and_then(|number| number.trim().parse().ok())
            .unwrap_or_else(|| panic!("{} does not begin with `# mistakes: N`", path.display()));
        let found = case::parse(&text, "case.toml", &folder())
            .map_or_else(|errors| errors.mistakes().len(), |_| 0);
        assert_eq!(found, stated, "{}", path.display());
    }
}

#[test]
fn unreadable_files_are_answered_too() {
    let absent = case::read(Path::new("no/such/case.toml"))
        .expect_err("there is none")
        .render(false);
    assert!(
        absent.contains("no/such/case.toml") && absent.contains("no such case file"),
        "{absent}"
    );
    let directory = case::read(&folder())
        .expect_err("a folder is no case")
        .render(false);
    assert!(directory.contains("cannot be read"), "{directory}");
    let path = std::env::temp_dir().join(format!("tautring-latin1-{}.toml", std::process::id()));
    fs::write(&path, b"[case]\ntitle = \"\xe9\"\n").expect("a temporary file can be written");
    let latin = case::read(&path)
        .expect_err("it is not UTF-8")
        .render(false);
    fs::remove_file(&path).expect("and removed");
    assert!(
        latin.contains("UTF-8") && latin.contains("line 2"),
        "{latin}"
    );
}

/// A device that never ends must not fill the memory.
#[cfg(unix)]
#[test]
fn endless_files_are_refused() {
    let endless = case::read(Path::new("/dev/zero"))
        .expect_err("it is no case")
        .render(false);
    assert!(endless.contains("more than"), "{endless}");
}

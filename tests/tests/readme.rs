//! README.md and DEVELOPERS.md tell what is so: their commands are run by `.ci/run`, their paths exist, their figures are current.

use std::fs;
use std::path::Path;

use tautring_tests::folder::top;
use tautring_tests::program::tautring;

/// Options of cargo that change nothing of what is built, run or tested.
const NO_MATTER: [&str; 3] = ["--locked", "--quiet", "--no-fail-fast"];

/// Folders whose files the pages name.
const FOLDERS: [&str; 6] = ["core/", "report/", "tests/", "data/", "examples/", ".ci/"];

/// Which figures of a line in `data/left_out.txt` README.md shows: measurements, median, mean, coverage.
const COLUMNS: [usize; 4] = [0, 1, 2, 4];

fn read(name: &str) -> String {
    let path = top().join(name);
    fs::read_to_string(&path).unwrap_or_else(|e| panic!("{}: {e}", path.display()))
}

/// What stands between a fence that opens so and the next one.
fn fenced<'a>(page: &'a str, opening: &str) -> &'a str {
    page.split_once(opening)
        .and_then(|(_, after)| after.split_once("\n```"))
        .unwrap_or_else(|| panic!("README.md has no block that opens with {opening}"))
        .0
}

/// A page without its fenced blocks.
fn prose(page: &str) -> String {
    page.split("```").step_by(2).collect()
}

/// The words of a cargo command that matter; what the shell does next is cut off.
fn words(command: &str) -> Vec<&str> {
    let command = command.split("||").next().unwrap_or(command);
    let words = command.split_whitespace();
    words.filter(|word| !NO_MATTER.contains(word)).collect()
}

/// Whether a command of the checks is that of the page; its variables stand for a case in `examples/` and for a folder.
fn is_same(run: &[&str], told: &[&str]) -> bool {
    run.len() == told.len()
        && run.iter().zip(told).all(|(run, told)| match *run {
            "\"$case\"" => {
                told.starts_with("examples/")
                    && Path::new(told).extension() == Some("toml".as_ref())
                    && exists(told)
            }
            "\"$folder\"" => true,
            word => word == *told,
        })
}

fn exists(path: &str) -> bool {
    top().join(path).exists()
}

#[test]
fn the_two_commands_are_run_by_the_checks() {
    let readme = read("README.md");
    let told: Vec<&str> = fenced(&readme, "```sh\n").lines().collect();
    assert_eq!(told.len(), 2, "README.md has two commands: {told:?}");
    let checks = read(".ci/run");
    for command in told {
        let found = checks
            .lines()
            .filter_map(|line| line.find("cargo ").map(|at| words(&line[at..])))
            .any(|run| is_same(&run, &words(command)));
        assert!(found, ".ci/run does not run `{command}`");
    }
}

#[test]
fn every_path_exists() {
    for page in ["README.md", "DEVELOPERS.md", "CHANGELOG.md"] {
        let text = prose(&read(page));
        let links = text
            .split("](")
            .skip(1)
            .filter_map(|after| after.split(')').next())
            .filter(|target| !target.starts_with("http"));
        let quoted = text.split('`').skip(1).step_by(2).filter(|word| {
            let placeholder = word.contains([' ', '*']) || word.contains("NAME");
            !placeholder && FOLDERS.iter().any(|folder| word.starts_with(folder))
        });
        let missing: Vec<&str> = links.chain(quoted).filter(|path| !exists(path)).collect();
        assert!(missing.is_empty(), "{page} names {missing:?}");
    }
}

#[test]
fn the_worked_example_is_what_the_program_prints() {
    let readme = read("README.md");
    let told = fenced(&readme, "$ tautring estimate C1CO1\n");
    let run = tautring(["estimate", "C1CO1"]);
    assert_eq!(run.code, 0, "{}", run.stderr);
    assert_eq!(told.trim_end(), run.stdout.trim_end());
}

#[test]
fn the_table_of_errors_is_that_of_the_fit() {
    let readme = read("README.md");
    let fit = read("data/left_out.txt");
    let rows: Vec<Vec<&str>> = readme
        .lines()
        .skip_while(|line| !line.starts_with("| Family |"))
        .skip(2)
        .take_while(|line| line.starts_with('|'))
        .map(|line| line.trim_matches('|').split('|').map(str::trim).collect())
        .collect();
    assert!(rows.len() > 5, "{rows:?}");
    for row in rows {
        // Names hold blanks, so a row is known by its name and at least two blanks after it.
        let figures = fit
            .lines()
            .find_map(|line| line.strip_prefix(row[0])?.strip_prefix("  "))
            .unwrap_or_else(|| panic!("data/left_out.txt has no `{}`", row[0]));
        let figures: Vec<String> = figures
            .split_whitespace()
            .map(|figure| figure.replace('%', " %"))
            .collect();
        let expected: Vec<&str> = COLUMNS.iter().map(|&c| figures[c].as_str()).collect();
        assert_eq!(row[1..], expected, "{}", row[0]);
    }
}

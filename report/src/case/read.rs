//! From a file to a case, or to all its mistakes at once.

use std::fs::File;
use std::io::{ErrorKind, Read};
use std::path::Path;

use toml::de::DeTable;

use super::dossier::Case;
use super::entries;
use super::mistake::{CaseErrors, Mistake, MistakeKind};
use super::section::{Findings, Section};
use super::structures::Fault;
use super::substance::{Record, StructureSource, Substance};
use super::syntax::Syntax;
use crate::structure::Structure;

/// Largest case file, in bytes: some ten thousand substances.
const TEXT_LIMIT: usize = 4 * 1024 * 1024;

/// Reads a case file with the structure files it names.
///
/// # Errors
///
/// [`CaseErrors`] with every mistake that was found, each with its place and the way to mend it.
///
/// ```no_run
/// use std::path::Path;
///
/// match tautring_report::case::read(Path::new("case.toml")) {
///     Ok(case) => println!("{}: {} substances", case.title, case.substances.len()),
///     Err(errors) => eprint!("{}", errors.render(false)),
/// }
/// ```
pub fn read(path: &Path) -> Result<Case, CaseErrors> {
    let name = path.display().to_string();
    let unreadable = |message: &str, mend: &str| {
        let mistake = Mistake::new(MistakeKind::Unreadable, message, mend);
        CaseErrors::new(&name, "", vec![mistake])
    };
    // One byte more than is allowed is enough to know: what is named may be a device that never ends.
    let mut bytes = Vec::new();
    File::open(path)
        .and_then(|file| file.take(TEXT_LIMIT as u64 + 1).read_to_end(&mut bytes))
        .map_err(|error| match error.kind() {
            ErrorKind::NotFound => unreadable(
                "there is no such case file",
                "check the path; it counts from the folder in which the command is run",
            ),
            _ => unreadable(
                &format!("the case file cannot be read: {error}"),
                "name a TOML file that you have the right to read",
            ),
        })?;
    let text = String::from_utf8(bytes).map_err(|error| {
        let place = error.utf8_error().valid_up_to();
        let line = 1 + error.as_bytes().iter().take(place).filter(|&&byte| byte == b'\n').count();
        unreadable(
            &format!("the case file is not a text in UTF-8: the first byte that does not fit is in line {line}"),
            "save it from the editor with the encoding UTF-8",
        )
    })?;
    parse(&text, &name, path.parent().unwrap_or(Path::new("")))
}

/// Reads a case from its text; `name` is what errors call it, `folder` where its structure files are.
///
/// # Errors
///
/// [`CaseErrors`] with every mistake that was found.
///
/// ```
/// use std::path::Path;
///
/// let text = r#"
/// [case]
/// title = "One ring"
/// reference = "RH-1"
/// date = "2026-02-30"
/// author = "reactive-hazards desk"
/// revision = "A"
///
/// [[substance]]
/// id = "oxirane"
/// name = "oxirane"
/// smiles = "C1CO1"
/// state = "fluid"
/// role = "reagent"
/// "#;
/// let errors = tautring_report::case::parse(text, "case.toml", Path::new("")).unwrap_err();
/// assert_eq!(errors.mistakes().len(), 2);
/// assert!(errors.render(false).contains("case.toml:5:8"));
/// ```
pub fn parse(text: &str, name: &str, folder: &Path) -> Result<Case, CaseErrors> {
    if text.len() > TEXT_LIMIT {
        let mistake = Mistake::new(
            MistakeKind::Unreadable,
            format!("the case file has more than {TEXT_LIMIT} bytes"),
            "split the case: one report is for one route",
        );
        return Err(CaseErrors::new(name, "", vec![mistake]));
    }
    let (table, errors) = DeTable::parse_recoverable(text);
    let syntax = Syntax::new(text, table.get_ref(), &errors);
    let findings = Findings::default();
    let case = content(text, table.get_ref(), folder, &findings);
    let mut mistakes = findings.into_mistakes();
    mistakes.retain(|mistake| !syntax.explains(text, mistake));
    mistakes.extend(syntax.mistakes);
    match case {
        Some(case) if mistakes.is_empty() => Ok(case),
        _ => Err(CaseErrors::new(name, text, mistakes)),
    }
}

fn content(text: &str, table: &DeTable<'_>, folder: &Path, findings: &Findings) -> Option<Case> {
    let mut root = Section::root(text, table, findings);
    let head = entries::head(&mut root);
    let entries = entries::substances(&mut root);
    root.close();
    let substances: Vec<Option<Substance>> = entries
        .into_iter()
        .map(|(entry, claim)| {
            let structure =
                claim.and_then(|claim| claim.resolve(text, folder, findings, structure));
            let (entry, (source, structure)) = entry.zip(structure)?;
            Some(Substance {
                id: entry.id,
                name: entry.name,
                source,
                structure,
                state: entry.state,
                role: entry.role,
                amount: entry.amount,
                measured: entry.measured,
                notes: entry.notes,
            })
        })
        .collect();
    let head = head?;
    Some(Case {
        title: head.title,
        reference: head.reference,
        date: head.date,
        author: head.author,
        revision: head.revision,
        notes: head.notes,
        substances: substances.into_iter().collect::<Option<_>>()?,
        text: text.to_owned(),
    })
}

fn structure(source: &StructureSource) -> Result<Structure, Fault> {
    let (structure, mend) = match source {
        StructureSource::Smiles(smiles) => (
            Structure::from_smiles(smiles),
            "correct the SMILES, or give the structure as a Molfile with `file` in place of `smiles`",
        ),
        StructureSource::File { record, text, .. } => {
            let text = record.of(text).ok_or_else(|| Fault {
                message: match record {
                    Record::Number(number) => format!("the file has no structure number {number}"),
                    Record::Name(name) => format!("the file has no structure called `{name}`"),
                },
                span: None,
                mend: "structures are counted from 1; the name of one is its first line in the file",
            })?;
            (
                Structure::from_molfile(text),
                "correct the drawing, and export it again as a Molfile of one molecule",
            )
        }
    };
    structure.map_err(|error| Fault {
        message: error.to_string(),
        span: error.span(),
        mend,
    })
}

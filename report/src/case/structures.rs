//! The pass over the structures of a case: a fault is underlined inside the text that has it.

use core::ops::Range;
use std::fs;
use std::path::{Path, PathBuf};

use toml::Spanned;
use toml::de::DeValue;

use super::mistake::{Mistake, MistakeKind};
use super::section::{Findings, Section};
use super::substance::{Record, StructureSource};

/// Largest structure file that is read, in bytes; a record of one molecule has a few thousand.
const FILE_LIMIT: u64 = 16 * 1024 * 1024;

/// What a substance says of its structure, with the places in the case file.
pub(super) struct Claim<'s> {
    owner: String,
    given: Given<'s>,
}

enum Given<'s> {
    Smiles(Spanned<&'s str>),
    File {
        path: Spanned<&'s str>,
        record: Record,
    },
}

/// Why a structure cannot be used.
pub(super) struct Fault {
    /// What is wrong.
    pub(super) message: String,
    /// The offending bytes of a SMILES.
    pub(super) span: Option<Range<usize>>,
    /// How to mend it.
    pub(super) mend: &'static str,
}

impl<'s> Claim<'s> {
    /// Reads the keys `smiles`, `file` and `record`: one structure, no more and no less.
    pub(super) fn read(section: &mut Section<'s>) -> Option<Self> {
        let smiles = section.line("smiles");
        let file = section.line("file");
        let record = record(section);
        let owner = section.name().to_owned();
        match (section.key_span("smiles"), section.key_span("file")) {
            (None, None) => {
                section.missing(
                    "smiles",
                    "smiles = \"C1CC12CC2\"` or `file = \"structure.mol\"",
                );
                None
            }
            (Some(first), Some(second)) => {
                section.note(
                    Mistake::new(
                        MistakeKind::Conflict,
                        format!("{owner} has two structures"),
                        "keep either `smiles` or `file`",
                    )
                    .at(second, "a structure file")
                    .with(first, "and a SMILES"),
                );
                None
            }
            (Some(_), None) => {
                if let Some(span) = section.key_span("record") {
                    section.note(
                        Mistake::new(
                            MistakeKind::Conflict,
                            "`record` goes with `file`, not with `smiles`",
                            "leave `record` out",
                        )
                        .at(span, "a SMILES has no records"),
                    );
                }
                Some(Self {
                    owner,
                    given: Given::Smiles(smiles?),
                })
            }
            (None, Some(_)) => Some(Self {
                owner,
                given: Given::File {
                    path: file?,
                    record: record?,
                },
            }),
        }
    }

    /// Reads the structure with `read`; `None` if a mistake was noted.
    ///
    /// `text` is the case file's, `folder` the one it lies in.
    pub(super) fn resolve<S>(
        self,
        text: &str,
        folder: &Path,
        findings: &Findings,
        read: impl FnOnce(&StructureSource) -> Result<S, Fault>,
    ) -> Option<(StructureSource, S)> {
        let (source, span) = match &self.given {
            Given::Smiles(smiles) => (
                StructureSource::Smiles((*smiles.get_ref()).to_owned()),
                smiles.span(),
            ),
            Given::File { path, record } => {
                let file = load(folder, path.get_ref())
                    .map_err(|(label, mend)| {
                        let message =
                            format!("the structure file of {} cannot be read", self.owner);
                        findings.note(
                            Mistake::new(MistakeKind::Unreadable, message, mend)
                                .at(path.span(), label),
                        );
                    })
                    .ok()?;
                let source = StructureSource::File {
                    path: PathBuf::from(path.get_ref()),
                    record: record.clone(),
                    text: file,
                };
                (source, path.span())
            }
        };
        match read(&source) {
            Ok(structure) => Some((source, structure)),
            Err(fault) => {
                let place = match (&self.given, fault.span) {
                    (Given::Smiles(smiles), Some(part)) => {
                        within(text, span, smiles.get_ref(), part)
                    }
                    _ => span,
                };
                let message = format!("the structure of {} cannot be used", self.owner);
                findings.note(
                    Mistake::new(MistakeKind::Structure, message, fault.mend)
                        .at(place, fault.message),
                );
                None
            }
        }
    }
}

fn record(section: &mut Section<'_>) -> Option<Record> {
    let value = section.value("record");
    let Some(value) = value else {
        return Some(Record::Number(1));
    };
    if matches!(value.get_ref(), DeValue::String(_)) {
        let name = section.line("record")?;
        return Some(Record::Name((*name.get_ref()).to_owned()));
    }
    let number = section.number("record")?;
    // Beyond a million records it is no longer a file of structures for one case.
    if number.value.fract() == 0.0 && (1.0..=1e6).contains(&number.value) {
        return Some(Record::Number(number.value as usize));
    }
    section.note(
        Mistake::new(
            MistakeKind::Value,
            "`record` is not the number of a record",
            "count the structures of the SDF from 1, `record = 1`, or give the name of one, `record = \"azetidine\"`",
        )
        .at(number.span, "expected a whole number from 1"),
    );
    None
}

/// The text of a structure file, or what is wrong and how to mend it.
fn load(folder: &Path, path: &str) -> Result<String, (String, String)> {
    let relative = Path::new(path);
    if relative.is_absolute() {
        return Err((
            "begins at the root of this machine".to_owned(),
            "write the path from the folder of the case file, so that the case can be moved"
                .to_owned(),
        ));
    }
    let place = folder.join(relative);
    let unreadable = |error: std::io::Error| {
        let label = match error.kind() {
            std::io::ErrorKind::NotFound => "there is no such file".to_owned(),
            std::io::ErrorKind::InvalidData => "is not a text in UTF-8".to_owned(),
            _ => error.to_string(),
        };
        let mend = "the path counts from the folder of the case file; check its spelling and that the file is there";
        (label, mend.to_owned())
    };
    let metadata = fs::metadata(&place).map_err(unreadable)?;
    if !metadata.is_file() {
        return Err((
            "is not a file".to_owned(),
            "name a Molfile or SDF".to_owned(),
        ));
    }
    if metadata.len() > FILE_LIMIT {
        return Err((
            format!("has {} bytes, the limit is {FILE_LIMIT}", metadata.len()),
            "cut out the record that is meant".to_owned(),
        ));
    }
    fs::read_to_string(&place).map_err(unreadable)
}

/// The bytes of the case file that hold `part` of a string whose value, trimmed, is `content`.
///
/// The whole string if they cannot be told, as with TOML's line continuations.
fn within(text: &str, string: Range<usize>, content: &str, part: Range<usize>) -> Range<usize> {
    located(text, &string, content, part).unwrap_or(string)
}

fn located(
    text: &str,
    string: &Range<usize>,
    content: &str,
    part: Range<usize>,
) -> Option<Range<usize>> {
    let raw = text.get(string.clone())?;
    let quote = raw
        .chars()
        .next()
        .filter(|character| matches!(character, '"' | '\''))?;
    let quotes = if raw.len() >= 6 && raw.starts_with(&quote.to_string().repeat(3)) {
        3
    } else {
        1
    };
    let inner = raw.get(quotes..raw.len().checked_sub(quotes)?)?;
    // Where each byte of the value begins in the raw text, and where the last one ends.
    let mut starts = Vec::with_capacity(inner.len() + 1);
    let mut value = String::new();
    let mut rest = inner;
    while let Some(first) = rest.chars().next() {
        let at = string.start + quotes + (inner.len() - rest.len());
        let (character, length) = if first == '\\' && quote == '"' {
            escape(rest)?
        } else {
            (first, first.len_utf8())
        };
        value.push(character);
        starts.extend(std::iter::repeat_n(at, character.len_utf8()));
        rest = rest.get(length..)?;
    }
    starts.push(string.start + quotes + inner.len());
    let skipped = value.len() - value.trim_start().len();
    if value.trim() != content {
        return None;
    }
    let start = *starts.get(part.start + skipped)?;
    let end = *starts.get(part.end + skipped)?;
    (start <= end).then_some(start..end)
}

/// The character of an escape sequence of a basic string, and the length of the sequence.
fn escape(rest: &str) -> Option<(char, usize)> {
    let code = |length: usize| {
        let digits = rest.get(2..2 + length)?;
        Some((
            char::from_u32(u32::from_str_radix(digits, 16).ok()?)?,
            2 + length,
        ))
    };
    match rest.chars().nth(1)? {
        'x' => code(2),
        'u' => code(4),
        'U' => code(8),
        'b' => Some(('\u{8}', 2)),
        'e' => Some(('\u{1b}', 2)),
        'f' => Some(('\u{c}', 2)),
        'n' => Some(('\n', 2)),
        'r' => Some(('\r', 2)),
        't' => Some(('\t', 2)),
        same @ ('"' | '\\') => Some((same, 2)),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn underlined<'t>(text: &'t str, content: &str, part: Range<usize>) -> &'t str {
        &text[within(text, 4..text.len(), content, part)]
    }

    #[test]
    fn underlines_inside_every_kind_of_string() {
        assert_eq!(underlined("s = \"C1CQ1\"", "C1CQ1", 3..4), "Q");
        assert_eq!(underlined("s = 'C/C=C\\Q'", "C/C=C\\Q", 5..7), "\\Q");
        assert_eq!(underlined("s = \"C/C=C\\\\Q\"", "C/C=C\\Q", 6..7), "Q");
        assert_eq!(
            underlined("s = \"C/C=C\\u005CQ\"", "C/C=C\\Q", 5..6),
            "\\u005C"
        );
        assert_eq!(underlined("s = \"  C1CQ1 \"", "C1CQ1", 3..4), "Q");
        assert_eq!(underlined("s = '''C1CQ1'''", "C1CQ1", 3..4), "Q");
        assert_eq!(underlined("s = \"CäQ\"", "CäQ", 1..3), "ä");
    }

    #[test]
    fn underlines_the_whole_string_when_in_doubt() {
        assert_eq!(underlined("s = \"C1CQ1\"", "C1CQ1", 3..40), "\"C1CQ1\"");
        assert_eq!(
            underlined("s = \"\"\"C\\\n  Q\"\"\"", "CQ", 1..2),
            "\"\"\"C\\\n  Q\"\"\""
        );
    }
}

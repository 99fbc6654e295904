//! Mistakes of TOML itself, in words that help someone who writes TOML once a year.

use core::ops::Range;

use toml::Spanned;
use toml::de::{DeTable, DeValue, Error};

use super::mistake::{Mistake, MistakeKind};

/// What the syntax of a file allows to be said about its content.
pub(super) struct Syntax {
    /// The mistakes of syntax, one for each line.
    pub(super) mistakes: Vec<Mistake>,
    /// Whether all of them lie inside single values, so that the rest was read as it was meant.
    local: bool,
    lines: Vec<usize>,
}

impl Syntax {
    /// Sorts the parser's errors.
    pub(super) fn new(text: &str, table: &DeTable<'_>, errors: &[Error]) -> Self {
        let mut leaves = Vec::new();
        for value in table.values() {
            collect_leaves(value, &mut leaves);
        }
        let mut syntax = Self {
            mistakes: Vec::new(),
            local: true,
            lines: Vec::new(),
        };
        for error in errors {
            let span = error.span().unwrap_or_default();
            let line = line_of(text, span.start);
            let leaf = leaves
                .iter()
                .find(|leaf| leaf.start <= span.start && span.end <= leaf.end)
                .filter(|leaf| line_of(text, leaf.start) == line_of(text, leaf.end));
            // A key that cannot be read, too, spoils no more than its line.
            syntax.local &= leaf.is_some() || error.message().contains("unquoted key");
            // What the parser finds later in a line mostly follows from what it found first.
            if !syntax.lines.contains(&line) {
                let comma = text
                    .get(span.start..)
                    .is_some_and(|rest| rest.starts_with(','));
                let (message, label, mend) = explain(error.message(), comma);
                syntax
                    .mistakes
                    .push(Mistake::new(MistakeKind::Syntax, message, mend).at(span, label));
                syntax.lines.push(line);
            }
        }
        syntax
    }

    /// Whether a mistake of content is one that a mistake of syntax may have caused.
    pub(super) fn explains(&self, text: &str, mistake: &Mistake) -> bool {
        match mistake.span() {
            Some(span) => !self.local || self.lines.contains(&line_of(text, span.start)),
            None => !self.local,
        }
    }
}

fn collect_leaves(value: &Spanned<DeValue<'_>>, leaves: &mut Vec<Range<usize>>) {
    match value.get_ref() {
        DeValue::Table(table) => table
            .values()
            .for_each(|inner| collect_leaves(inner, leaves)),
        DeValue::Array(items) => items.iter().for_each(|inner| collect_leaves(inner, leaves)),
        _ => leaves.push(value.span()),
    }
}

fn line_of(text: &str, position: usize) -> usize {
    text.bytes()
        .take(position)
        .filter(|&byte| byte == b'\n')
        .count()
}

/// What is wrong, the remark under it, and how to mend it; `comma` says that the parser stopped at one.
fn explain(message: &str, comma: bool) -> (&'static str, &str, &'static str) {
    if message.contains("escape") {
        (
            "a backslash inside double quotes has a meaning of its own",
            "follows a backslash",
            "put a SMILES that contains a backslash between single quotes: `smiles = 'C/C=C\\C'`",
        )
    } else if message.contains("duplicate key") {
        (
            "a key stands here a second time",
            "was there before",
            "keep one of the two",
        )
    } else if message.contains("unquoted key") {
        (
            "this is not a key",
            "does not belong in a key",
            "keys are the words of the schema, in small letters from a to z and `_`",
        )
    } else if message.contains("must be quoted") {
        (
            "a text without quotes",
            "needs quotes",
            "put it between double quotes: `title = \"...\"`",
        )
    } else if message.contains("date") {
        (
            "this date does not exist",
            message,
            "write year, month and day: `date = \"2026-03-14\"`",
        )
    } else if message.contains("string") {
        (
            "a text is not closed, or has a character that does not belong in it",
            message,
            "put a quote of the same kind at its end, on the same line",
        )
    } else if comma {
        (
            "a comma where none belongs",
            "not a decimal sign here",
            "write decimals with a point: `value = 212.5`",
        )
    } else if ["float", "integer", "fraction", "number"]
        .iter()
        .any(|word| message.contains(word))
    {
        (
            "this is not a number",
            message,
            "write it with a decimal point and without a unit: `value = 212.5`",
        )
    } else if message.contains("table") {
        (
            "a header or table is not complete",
            message,
            "headers are `[case]`, `[[substance]]` and `[[substance.measured]]`, each on a line of its own",
        )
    } else {
        (
            "this is not TOML",
            message,
            "a line is `key = value`, with texts between double quotes",
        )
    }
}

//! One table of the case file, read key by key; a mistake is noted and reading goes on.

use core::cell::RefCell;
use core::ops::Range;

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use super::mistake::{Mistake, MistakeKind};
use super::vocabulary::{Vocabulary, list, nearest};

/// The mistakes found so far, shared by all sections of a file.
#[derive(Debug, Default)]
pub(super) struct Findings(RefCell<Vec<Mistake>>);

/// A number with the text it was written as.
#[derive(Clone, Debug)]
pub(super) struct Number<'s> {
    pub(super) value: f64,
    pub(super) written: &'s str,
    pub(super) span: Range<usize>,
}

/// A table of the file, the keys it was asked for, and where to note mistakes.
pub(super) struct Section<'s> {
    source: &'s str,
    table: &'s DeTable<'s>,
    span: Range<usize>,
    name: String,
    asked: Vec<&'static str>,
    absent: Vec<(&'static str, String)>,
    findings: &'s Findings,
}

impl Findings {
    pub(super) fn note(&self, mistake: Mistake) {
        self.0.borrow_mut().push(mistake);
    }

    pub(super) fn into_mistakes(self) -> Vec<Mistake> {
        self.0.into_inner()
    }
}

impl<'s> Section<'s> {
    /// The whole file as a section.
    pub(super) fn root(source: &'s str, table: &'s DeTable<'s>, findings: &'s Findings) -> Self {
        Self {
            source,
            table,
            span: 0..0,
            name: "the case file".to_owned(),
            asked: Vec::new(),
            absent: Vec::new(),
            findings,
        }
    }

    /// Changes how mistakes call this section.
    pub(super) fn rename(&mut self, name: String) {
        self.name = name;
    }

    /// How mistakes call this section.
    pub(super) fn name(&self) -> &str {
        &self.name
    }

    /// The bytes of the header, or of the whole inline table.
    pub(super) fn span(&self) -> Range<usize> {
        self.span.clone()
    }

    /// Notes a mistake.
    pub(super) fn note(&self, mistake: Mistake) {
        self.findings.note(mistake);
    }

    /// The bytes of a key, if the section has it.
    pub(super) fn key_span(&self, key: &str) -> Option<Range<usize>> {
        self.table
            .get_key_value(key)
            .map(|(written, _)| written.span())
    }

    /// Notes at the end that `key` is not there, with what would mend it.
    pub(super) fn missing(&mut self, key: &'static str, example: &str) {
        self.absent.push((key, example.to_owned()));
    }

    /// A key that has to be there: notes its absence, with the line that would mend it.
    pub(super) fn required<T>(
        &mut self,
        key: &'static str,
        example: &str,
        read: impl FnOnce(&mut Self, &'static str) -> Option<T>,
    ) -> Option<T> {
        let value = read(self, key);
        if !self.table.contains_key(key) {
            self.missing(key, example);
        }
        value
    }

    /// The value of a key, whatever it is.
    pub(super) fn value(&mut self, key: &'static str) -> Option<&'s Spanned<DeValue<'s>>> {
        self.asked.push(key);
        self.table.get(key)
    }

    /// A text on one line, without white space around it.
    pub(super) fn line(&mut self, key: &'static str) -> Option<Spanned<&'s str>> {
        let text = self.text(key)?;
        if let Some(hidden) = text
            .get_ref()
            .chars()
            .find(|&character| is_hidden(character))
        {
            self.note(
                Mistake::new(
                    MistakeKind::Value,
                    format!("`{key}` contains a line break or a character that does not print"),
                    "write it as one line of plain text; longer remarks belong in `notes`",
                )
                .at(text.span(), format!("contains {}", hidden.escape_unicode())),
            );
            return None;
        }
        Some(Spanned::new(text.span(), text.get_ref().trim()))
    }

    /// A text of any number of lines.
    pub(super) fn text(&mut self, key: &'static str) -> Option<Spanned<&'s str>> {
        let value = self.value(key)?;
        let DeValue::String(text) = value.get_ref() else {
            let example = match value.get_ref() {
                DeValue::Table(_) | DeValue::Array(_) => "...",
                _ => self.source.get(value.span()).unwrap_or("..."),
            };
            self.wrong_type(
                key,
                value,
                "a text",
                &format!("{key} = \"{}\"", shortened(example)),
            );
            return None;
        };
        if text.trim().is_empty() {
            self.note(
                Mistake::new(
                    MistakeKind::Value,
                    format!("`{key}` is empty"),
                    "write the text, or leave the key out if it is optional",
                )
                .at(value.span(), "nothing is written here"),
            );
            return None;
        }
        Some(Spanned::new(value.span(), text.as_ref()))
    }

    /// A finite number, whole or with a decimal point.
    pub(super) fn number(&mut self, key: &'static str) -> Option<Number<'s>> {
        let value = self.value(key)?;
        let span = value.span();
        let parsed = match value.get_ref() {
            DeValue::Float(float) => float.as_str().parse::<f64>().ok(),
            DeValue::Integer(integer) if integer.radix() == 10 => integer.as_str().parse().ok(),
            _ => None,
        };
        let Some(number) = parsed else {
            let example = match value.get_ref() {
                DeValue::String(text) if text.trim().parse::<f64>().is_ok_and(f64::is_finite) => {
                    format!("{key} = {}", text.trim())
                }
                _ => format!("{key} = 12.5"),
            };
            self.wrong_type(key, value, "a decimal number without quotes", &example);
            return None;
        };
        if !number.is_finite() {
            self.note(
                Mistake::new(
                    MistakeKind::Value,
                    format!("`{key}` is not a finite number"),
                    "write the number itself; leave the entry out if it is not known",
                )
                .at(span, "cannot be calculated with"),
            );
            return None;
        }
        Some(Number {
            value: number,
            written: self.source.get(span.clone()).unwrap_or_default().trim(),
            span,
        })
    }

    /// A word of a closed list.
    pub(super) fn word<V: Vocabulary>(&mut self, key: &'static str) -> Option<V> {
        let value = self.value(key)?;
        let words = || V::WORDS.iter().map(|&(word, _)| word);
        let DeValue::String(written) = value.get_ref() else {
            let example = format!("{key} = \"{}\"", words().next().unwrap_or_default());
            self.wrong_type(key, value, &format!("a {} in quotes", V::NOUN), &example);
            return None;
        };
        let meaning = V::from_word(written);
        if meaning.is_none() {
            let label = match nearest(written, words()) {
                Some(word) => format!("did you mean `{word}`?"),
                None => format!("not a {} that is understood", V::NOUN),
            };
            self.note(
                Mistake::new(
                    MistakeKind::UnknownWord,
                    format!("`{}` is not a {}", shortened(written), V::NOUN),
                    format!("write {}", list(words(), "or")),
                )
                .at(value.span(), label),
            );
        }
        meaning
    }

    /// A number with its unit, `{ value = 2.5, unit = "kg" }`.
    pub(super) fn quantity<U: Vocabulary>(
        &mut self,
        key: &'static str,
        example: &str,
    ) -> Option<(Number<'s>, U)> {
        let mut quantity = self.section(key, &format!("{{ {example} }}"))?;
        let number = quantity.required("value", example, Section::number);
        let unit = quantity.required("unit", example, Section::word);
        quantity.close();
        number.zip(unit)
    }

    /// A table inside this one.
    pub(super) fn section(&mut self, key: &'static str, example: &str) -> Option<Self> {
        let value = self.value(key)?;
        let DeValue::Table(table) = value.get_ref() else {
            self.wrong_type(key, value, "a table", &format!("{key} = {example}"));
            return None;
        };
        let span = value.span();
        Some(self.inner(table, span, format!("`{key}`")))
    }

    /// The tables of a list, `[[key]]` in the file.
    pub(super) fn sections(&mut self, key: &'static str, header: &str) -> Vec<Self> {
        let Some(value) = self.value(key) else {
            return Vec::new();
        };
        let DeValue::Array(items) = value.get_ref() else {
            self.note(
                Mistake::new(
                    MistakeKind::WrongType,
                    format!("`{key}` is a list, even of one"),
                    format!("write `{header}` with two pairs of brackets before each entry"),
                )
                .at(value.span(), format!("expected `{header}`")),
            );
            return Vec::new();
        };
        let mut sections = Vec::new();
        for item in items {
            match item.get_ref() {
                DeValue::Table(table) => {
                    let name = format!("{key} {}", sections.len() + 1);
                    sections.push(self.inner(table, item.span(), name));
                }
                _ => self.wrong_type(key, item, "a table", header),
            }
        }
        sections
    }

    /// Ends the reading: a key nobody asked for is a mistake, and so is one that is not there and has to be.
    ///
    /// A misspelt key is one mistake, not an unknown and a missing one.
    pub(super) fn close(self) {
        let mut meant = Vec::new();
        for key in self.table.keys() {
            let written: &str = key.get_ref();
            if self.asked.contains(&written) {
                continue;
            }
            let label = match nearest(written, self.asked.iter().copied()) {
                Some(word) => {
                    meant.push(word);
                    format!("did you mean `{word}`?")
                }
                None => "nobody would read this".to_owned(),
            };
            self.note(
                Mistake::new(
                    MistakeKind::UnknownKey,
                    format!("{} has no key `{}`", self.name, shortened(written)),
                    format!("the keys are {}", list(self.asked.iter().copied(), "and")),
                )
                .at(key.span(), label),
            );
        }
        for (key, example) in &self.absent {
            if !meant.contains(key) {
                self.note(
                    Mistake::new(
                        MistakeKind::Missing,
                        format!("{} has no `{key}`", self.name),
                        format!("add it, for example `{example}`"),
                    )
                    .at(self.span(), format!("`{key}` is missing here")),
                );
            }
        }
    }

    fn inner(&self, table: &'s DeTable<'s>, span: Range<usize>, name: String) -> Self {
        Self {
            source: self.source,
            table,
            span,
            name,
            asked: Vec::new(),
            absent: Vec::new(),
            findings: self.findings,
        }
    }

    fn wrong_type(&self, key: &str, value: &Spanned<DeValue<'_>>, wanted: &str, example: &str) {
        self.note(
            Mistake::new(
                MistakeKind::WrongType,
                format!("`{key}` has to be {wanted}"),
                format!("write `{example}`"),
            )
            .at(
                value.span(),
                format!("this is {}", kind_of(value.get_ref())),
            ),
        );
    }
}

/// A text short enough for one line of an error.
pub(super) fn shortened(text: &str) -> String {
    if text.chars().count() <= 40 {
        text.to_owned()
    } else {
        text.chars().take(39).chain(['…']).collect()
    }
}

/// Characters that would make a printed line say something else than the file: controls and reordering marks.
fn is_hidden(character: char) -> bool {
    character.is_control()
        || matches!(character, '\u{200e}' | '\u{200f}' | '\u{2028}'..='\u{202e}' | '\u{2066}'..='\u{2069}')
}

fn kind_of(value: &DeValue<'_>) -> &'static str {
    match value {
        DeValue::String(_) => "a text",
        DeValue::Integer(integer) if integer.radix() != 10 => "a whole number that is not decimal",
        DeValue::Integer(_) => "a whole number",
        DeValue::Float(_) => "a number",
        DeValue::Boolean(_) => "true or false",
        DeValue::Datetime(_) => "a date or time",
        DeValue::Array(_) => "a list",
        DeValue::Table(_) => "a table",
    }
}

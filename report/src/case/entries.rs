//! Reads the head of the case and its substances; structures are left to their own pass.

use core::ops::Range;
use std::collections::HashMap;

use toml::Spanned;
use toml::de::DeValue;

use super::date::Date;
use super::measured;
use super::measurement::{Kept, Measurement, Phase, Quantity, Subject};
use super::mistake::{Mistake, MistakeKind};
use super::section::{Section, shortened};
use super::structures::Claim;
use super::substance::{Amount, Role, State};
use super::unit::{AmountUnit, Portion};

/// Largest amount that can be meant, in g or mol: a thousand tonnes is a ship's load.
const AMOUNT_LIMIT: f64 = 1e9;
/// Longest id, so that it fits a table column.
const ID_LENGTH: usize = 40;

/// The `[case]` table.
pub(super) struct Head {
    pub(super) title: String,
    pub(super) reference: String,
    pub(super) date: Date,
    pub(super) author: String,
    pub(super) revision: String,
    pub(super) notes: Option<String>,
}

/// A `[[substance]]` entry without its structure.
pub(super) struct Entry {
    pub(super) id: String,
    pub(super) name: String,
    pub(super) state: State,
    pub(super) role: Role,
    pub(super) amount: Option<Amount>,
    pub(super) measured: Vec<Measurement>,
    pub(super) notes: Option<String>,
}

/// Reads `[case]`; `None` if a mistake was noted.
pub(super) fn head(root: &mut Section<'_>) -> Option<Head> {
    if root.key_span("case").is_none() {
        root.missing("[case]", "[case]");
    }
    let mut case = root.section("case", "{ ... }")?;
    case.rename("[case]".to_owned());
    let title = case.required(
        "title",
        "title = \"Strained rings of route 2\"",
        Section::line,
    );
    let reference = case.required("reference", "reference = \"RH-0042\"", Section::line);
    let date = case.required("date", "date = \"2026-03-14\"", date);
    let author = case.required("author", "author = \"who wrote this case\"", Section::line);
    let revision = case.required("revision", "revision = \"A\"", Section::line);
    let notes = case.text("notes");
    case.close();
    Some(Head {
        title: (*title?.get_ref()).to_owned(),
        reference: (*reference?.get_ref()).to_owned(),
        date: date?,
        author: (*author?.get_ref()).to_owned(),
        revision: (*revision?.get_ref()).to_owned(),
        notes: notes.map(|notes| (*notes.get_ref()).to_owned()),
    })
}

/// Reads all `[[substance]]` entries, each with what it says of its structure.
pub(super) fn substances<'s>(root: &mut Section<'s>) -> Vec<(Option<Entry>, Option<Claim<'s>>)> {
    let key = "substance";
    if root.key_span(key).is_none() {
        root.missing("[[substance]]", "[[substance]]");
    }
    let mut ids = HashMap::new();
    root.sections(key, "[[substance]]")
        .into_iter()
        .map(|section| substance(section, &mut ids))
        .collect()
}

fn substance<'s>(
    mut section: Section<'s>,
    ids: &mut HashMap<&'s str, Range<usize>>,
) -> (Option<Entry>, Option<Claim<'s>>) {
    let id = section.required("id", "id = \"spiropentane\"", id);
    if let Some(id) = &id {
        section.rename(format!("substance `{}`", id.get_ref()));
        if let Some(first) = ids.insert(id.get_ref(), id.span()) {
            section.note(
                Mistake::new(
                    MistakeKind::Conflict,
                    format!("two substances have the id `{}`", id.get_ref()),
                    "give each substance an id of its own",
                )
                .at(id.span(), "used again")
                .with(first, "first used here"),
            );
        }
    }
    let name = section.required("name", "name = \"spiro[2.2]pentane\"", Section::line);
    let claim = Claim::read(&mut section);
    let state = section.required("state", "state = \"liquid\"", Section::word);
    let role = section.required("role", "role = \"intermediate\"", Section::word);
    let amount = amount(&mut section);
    let notes = section.text("notes");
    let measured = measurements(&mut section);
    section.close();
    let entry = || {
        Some(Entry {
            id: (*id?.get_ref()).to_owned(),
            name: (*name?.get_ref()).to_owned(),
            state: state?,
            role: role?,
            amount,
            measured,
            notes: notes.map(|notes| (*notes.get_ref()).to_owned()),
        })
    };
    (entry(), claim)
}

fn id<'s>(section: &mut Section<'s>, key: &'static str) -> Option<Spanned<&'s str>> {
    let id = section.line(key)?;
    let fits = |byte: u8| byte.is_ascii_alphanumeric() || byte == b'-' || byte == b'_';
    if id.get_ref().len() <= ID_LENGTH && id.get_ref().bytes().all(fits) {
        return Some(id);
    }
    section.note(
        Mistake::new(
            MistakeKind::Value,
            format!("`{}` is not an id", shortened(id.get_ref())),
            "write a short id such as `spiro-ester`; the full name belongs in `name`",
        )
        .at(
            id.span(),
            format!("letters a to z, digits, `-` and `_`, at most {ID_LENGTH}"),
        ),
    );
    None
}

/// A date in quotes, as editors expect it, or one of TOML's own.
fn date(section: &mut Section<'_>, key: &'static str) -> Option<Date> {
    let value = section.value(key)?;
    let written = match value.get_ref() {
        DeValue::String(text) => text.to_string(),
        DeValue::Datetime(date) => date.to_string(),
        _ => String::new(),
    };
    Date::parse(&written)
        .map_err(|error| {
            section.note(
                Mistake::new(
                    MistakeKind::Value,
                    "`date` is not a date",
                    "write year, month and day of the review: `date = \"2026-03-14\"`",
                )
                .at(value.span(), error.to_string()),
            );
        })
        .ok()
}

fn amount(section: &mut Section<'_>) -> Option<Amount> {
    let (number, unit) = section.quantity::<AmountUnit>("amount", "value = 2.5, unit = \"kg\"")?;
    let portion = unit.of(number.value);
    let (Portion::Grams(value) | Portion::Moles(value)) = portion;
    if value > 0.0 && value <= AMOUNT_LIMIT {
        return Some(Amount {
            portion,
            written: format!("{} {unit}", number.written),
        });
    }
    let label = if value > 0.0 {
        "more than a ship carries"
    } else {
        "an amount is greater than zero"
    };
    section.note(
        Mistake::new(
            MistakeKind::Value,
            format!(
                "{} {unit} cannot be the amount of a substance",
                number.written
            ),
            "write the amount in the process, or leave `amount` out if it is not known",
        )
        .at(number.span, label),
    );
    None
}

fn measurements(section: &mut Section<'_>) -> Vec<Measurement> {
    let owner = section.name().to_owned();
    let mut read: Vec<(Measurement, Range<usize>)> = Vec::new();
    for (index, mut entry) in section
        .sections("measured", "[[substance.measured]]")
        .into_iter()
        .enumerate()
    {
        entry.rename(format!("measured value {} of {owner}", index + 1));
        let (measurement, span) = (measured::measurement(&mut entry), entry.span());
        if let Some(measurement) = measurement {
            for (earlier, first) in &read {
                if let Some((message, mend)) = contradiction(earlier, &measurement) {
                    entry.note(
                        Mistake::new(MistakeKind::Conflict, message, mend)
                            .at(span.clone(), "this one")
                            .with(first.clone(), "and this one"),
                    );
                }
            }
            read.push((measurement, span));
        }
        entry.close();
    }
    read.into_iter()
        .map(|(measurement, _)| measurement)
        .collect()
}

/// Why two measured values of one substance cannot stand beside each other, and how to mend it.
fn contradiction(
    earlier: &Measurement,
    later: &Measurement,
) -> Option<(&'static str, &'static str)> {
    if aspect(earlier) != aspect(later) {
        return None;
    }
    let kept = |measurement: &Measurement| {
        measurement
            .settled
            .as_ref()
            .is_some_and(|by| by.keep == Kept::Measured)
    };
    if earlier.source == later.source && earlier.subject == later.subject {
        Some((
            "one source is given twice for the same quantity",
            "keep one of them: a value copied from one table to another is not a second measurement",
        ))
    } else if kept(earlier) && kept(later) {
        Some((
            "two values of the same quantity are both settled as the one to keep",
            "keep one of them; set the other aside with `keep = \"estimated\"`, or leave it unsettled",
        ))
    } else {
        None
    }
}

fn aspect(measurement: &Measurement) -> (Quantity, Option<Phase>) {
    match measurement.subject {
        Subject::EnthalpyOfFormation { phase } => (Quantity::EnthalpyOfFormation, Some(phase)),
        Subject::Decomposition { .. } => (Quantity::Decomposition, None),
    }
}

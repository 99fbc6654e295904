//! Reads a `[[substance.measured]]` entry.

use super::measurement::{
    Crucible, Kept, Measurement, Onset, Phase, Quantity, Settlement, Subject, Written,
};
use super::mistake::{Mistake, MistakeKind};
use super::section::{Number, Section};
use super::unit::{Enthalpy, EnthalpyUnit, TemperatureUnit};
use super::vocabulary::{Vocabulary, list};

/// Largest enthalpy per mole that can be meant, kJ/mol: no molecule of the supported size comes near it, and a number
/// in J/mol taken for kJ/mol goes over it.
const MOLAR_LIMIT: f64 = 20_000.0;
/// Largest enthalpy per gram that can be meant, J/g: carbon tetrafluoride has -10,600 and water -15,900.
const SPECIFIC_LIMIT: f64 = 25_000.0;
/// Coverage factors that can be meant: from one standard uncertainty to 95 % with one degree of freedom (12.7).
const COVERAGE: core::ops::RangeInclusive<f64> = 1.0..=13.0;
/// Highest onset temperature that can be meant, K: organic substances do not last to it.
const ONSET_LIMIT: f64 = 2000.0;

/// Reads one entry; `None` if it lacks something. A case in which any mistake was noted is not handed out.
pub(super) fn measurement(section: &mut Section<'_>) -> Option<Measurement> {
    let quantity = section.required(
        "quantity",
        "quantity = \"enthalpy_of_formation\"",
        Section::word::<Quantity>,
    );
    let value = section.required("value", "value = 212.5", Section::number);
    let unit = section.required("unit", "unit = \"kJ/mol\"", Section::word::<EnthalpyUnit>);
    let uncertainty = uncertainty(section, unit);
    let subject = subject(section, quantity);
    let source = section.required(
        "source",
        "source = \"who measured it, and where it is published\"",
        Section::line,
    );
    let note = section.text("note");
    let settled = settlement(section);
    let (value, unit) = value.zip(unit)?;
    plausible(section, &value, unit);
    if quantity == Some(Quantity::Decomposition) {
        released(section, &value);
    }
    let (standard_uncertainty, uncertainty, coverage_k) = match uncertainty {
        None => (None, None, None),
        Some((expanded, coverage)) => (
            Some(unit.of(expanded.value / coverage.value)),
            Some(expanded.written.to_owned()),
            Some(coverage.written.to_owned()),
        ),
    };
    Some(Measurement {
        subject: subject?,
        value: unit.of(value.value),
        standard_uncertainty,
        written: Written {
            value: value.written.to_owned(),
            uncertainty,
            coverage_k,
            unit: unit.word().to_owned(),
        },
        source: (*source?.get_ref()).to_owned(),
        note: note.map(|note| (*note.get_ref()).to_owned()),
        settled,
    })
}

/// Expanded uncertainty and coverage factor: both or neither.
fn uncertainty<'s>(
    section: &mut Section<'s>,
    unit: Option<EnthalpyUnit>,
) -> Option<(Number<'s>, Number<'s>)> {
    let uncertainty = section.number("uncertainty");
    let coverage = section.number("coverage_k");
    match (section.key_span("uncertainty"), section.key_span("coverage_k")) {
        (Some(span), None) => section.note(
            Mistake::new(
                MistakeKind::Missing,
                "the uncertainty does not say what it covers",
                "add `coverage_k = 2` for a 95 % interval (most tables), `coverage_k = 1` for a standard uncertainty",
            )
            .at(span, "needs `coverage_k` beside it"),
        ),
        (None, Some(span)) => section.note(
            Mistake::new(
                MistakeKind::Missing,
                "a coverage factor without an uncertainty",
                "add `uncertainty = ...` in the unit of the value, or leave `coverage_k` out",
            )
            .at(span, "there is no `uncertainty` it could belong to"),
        ),
        _ => {}
    }
    let (uncertainty, coverage) = uncertainty.zip(coverage)?;
    if uncertainty.value <= 0.0 {
        section.note(
            Mistake::new(
                MistakeKind::Value,
                "an uncertainty is greater than zero",
                "write the uncertainty of the source, or leave `uncertainty` and `coverage_k` out if it states none",
            )
            .at(uncertainty.span.clone(), "no measurement is as good as that"),
        );
    } else if let Some(unit) = unit {
        plausible(section, &uncertainty, unit);
    }
    if !COVERAGE.contains(&coverage.value) {
        section.note(
            Mistake::new(
                MistakeKind::Value,
                "the coverage factor is not one that occurs",
                "write the factor k, not the percentage: 1 for a standard uncertainty, 2 for about 95 %, 3 for about 99.7 %",
            )
            .at(coverage.span.clone(), "expected 1 to 13"),
        );
    }
    Some((uncertainty, coverage))
}

/// What was measured; keys that belong to the other quantity are mistakes.
fn subject(section: &mut Section<'_>, quantity: Option<Quantity>) -> Option<Subject> {
    match quantity {
        None => {
            // All are asked for, so that none of them is called unknown.
            section.word::<Phase>("phase");
            section.line("method");
            section.word::<Crucible>("crucible");
            onset(section);
            None
        }
        Some(quantity @ Quantity::EnthalpyOfFormation) => {
            let phase = section.required("phase", "phase = \"gas\"", Section::word);
            exclude(section, quantity, &["method", "crucible", "onset"]);
            Some(Subject::EnthalpyOfFormation { phase: phase? })
        }
        Some(quantity @ Quantity::Decomposition) => {
            let method = section.required("method", "method = \"DSC, 4 K/min\"", Section::line);
            let crucible = section.required("crucible", "crucible = \"sealed\"", Section::word);
            let onset = onset(section);
            exclude(section, quantity, &["phase"]);
            Some(Subject::Decomposition {
                method: (*method?.get_ref()).to_owned(),
                crucible: crucible?,
                onset,
            })
        }
    }
}

fn onset(section: &mut Section<'_>) -> Option<Onset> {
    let (number, unit) =
        section.quantity::<TemperatureUnit>("onset", "value = 110, unit = \"°C\"")?;
    let kelvin = unit.kelvin(number.value);
    if kelvin > 0.0 && kelvin <= ONSET_LIMIT {
        return Some(Onset {
            kelvin,
            written: format!("{} {unit}", number.written),
        });
    }
    section.note(
        Mistake::new(
            MistakeKind::Value,
            format!("no decomposition begins at {} {unit}", number.written),
            "check the number and its unit (`K` or `°C`)",
        )
        .at(
            number.span,
            format!("expected more than 0 K and at most {ONSET_LIMIT} K"),
        ),
    );
    None
}

fn exclude(section: &mut Section<'_>, quantity: Quantity, keys: &[&'static str]) {
    for &key in keys {
        section.value(key);
        if let Some(span) = section.key_span(key) {
            section.note(
                Mistake::new(
                    MistakeKind::Conflict,
                    format!("`{key}` does not go with the quantity `{quantity}`"),
                    format!(
                        "leave it out, or correct `quantity`: {}",
                        list(Quantity::WORDS.iter().map(|&(word, _)| word), "or")
                    ),
                )
                .at(span, "has no meaning here"),
            );
        }
    }
}

/// Who settled a disagreement, and how.
fn settlement(section: &mut Section<'_>) -> Option<Settlement> {
    let example = "{ keep = \"measured\", by = \"name\", reason = \"why\" }";
    let mut settled = section.section("settled", example)?;
    let keep = settled.required("keep", "keep = \"measured\"", Section::word::<Kept>);
    let by = settled.required("by", "by = \"name of who settled it\"", Section::line);
    let reason = settled.required(
        "reason",
        "reason = \"why this number stands\"",
        Section::line,
    );
    settled.close();
    Some(Settlement {
        keep: keep?,
        by: (*by?.get_ref()).to_owned(),
        reason: (*reason?.get_ref()).to_owned(),
    })
}

fn plausible(section: &Section<'_>, number: &Number<'_>, unit: EnthalpyUnit) {
    let (value, limit, unit_of_limit) = match unit.of(number.value) {
        Enthalpy::Molar(energy) => (energy.kj_per_mol(), MOLAR_LIMIT, "kJ/mol"),
        Enthalpy::Specific(energy) => (energy.j_per_g(), SPECIFIC_LIMIT, "J/g"),
    };
    if value.abs() <= limit {
        return;
    }
    section.note(
        Mistake::new(
            MistakeKind::Value,
            format!("{} {unit} is more than any molecule holds", number.written),
            "check the unit and the decimal point: a value in J/mol is a thousand times its value in kJ/mol",
        )
        .at(number.span.clone(), format!("the limit is {limit} {unit_of_limit}")),
    );
}

fn released(section: &Section<'_>, number: &Number<'_>) {
    if number.value > 0.0 {
        return;
    }
    section.note(
        Mistake::new(
            MistakeKind::Value,
            "the heat of a decomposition is not positive",
            "state the heat released as a positive number; a decomposition that takes up heat belongs in `notes`",
        )
        .at(number.span.clone(), "heat released counts as positive"),
    );
}

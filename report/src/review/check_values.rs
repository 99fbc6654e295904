//! Published values, recomputed at this moment.

use std::fmt;

use serde::Deserialize;
use tautring_core::mechanics::{Bend, BendForceConstant};
use tautring_core::quantities::KJ_PER_KCAL;

use super::findings::{CheckOutcome, CheckValue};
use super::reviewer::{ReviewError, Reviewer};
use crate::structure::Structure;

const CHECK_VALUES: &str = include_str!("../../../data/check_values.csv");

/// A row of the table that cannot be recomputed.
#[derive(Debug)]
pub struct CheckValueError {
    id: String,
    reason: String,
}

impl fmt::Display for CheckValueError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "data/check_values.csv, {}: {}", self.id, self.reason)
    }
}

impl std::error::Error for CheckValueError {}

#[derive(Deserialize)]
struct Published {
    id: String,
    kind: String,
    quantity: String,
    molecule_or_reaction: String,
    #[serde(rename = "published")]
    value: f64,
    unit: String,
    tolerance: f64,
    tolerance_reason: String,
    source: String,
    source_seen: String,
}

/// A recomputed value and, for a reaction, its expanded uncertainty, both in kJ/mol or as a pure number.
struct Computed {
    value: f64,
    expanded: f64,
}

impl Computed {
    const fn exact(value: f64) -> Self {
        Self {
            value,
            expanded: 0.0,
        }
    }
}

/// Recomputes every value of `data/check_values.csv`.
///
/// # Errors
/// A row that cannot be read or recomputed.
pub fn check_values(reviewer: &Reviewer) -> Result<Vec<CheckValue>, CheckValueError> {
    csv::Reader::from_reader(CHECK_VALUES.as_bytes())
        .deserialize::<Published>()
        .map(|record| {
            let published = record.map_err(|e| CheckValueError {
                id: "a row".to_owned(),
                reason: e.to_string(),
            })?;
            recompute(reviewer, &published).map_err(|reason| CheckValueError {
                id: published.id.clone(),
                reason,
            })
        })
        .collect()
}

fn recompute(reviewer: &Reviewer, published: &Published) -> Result<CheckValue, String> {
    let subject = published.molecule_or_reaction.as_str();
    let computed = match published.kind.as_str() {
        "strain" => Computed::exact(strain(reviewer, subject)?),
        "reaction" => reaction(reviewer, subject)?,
        "maximum-size" => Computed::exact(maximum(reviewer, subject)?.0 as f64),
        "maximum" => Computed::exact(maximum(reviewer, subject)?.1),
        "below-maximum" => {
            let (ring, range) = subject
                .split_once(" in ")
                .ok_or("`size in range` expected")?;
            let size = ring
                .parse()
                .map_err(|_| format!("`{ring}` is no ring size"))?;
            Computed::exact(cycloalkane(reviewer, size)? - maximum(reviewer, range)?.1)
        }
        "bend" => Computed::exact(bend(subject)?),
        kind => return Err(format!("there is no kind `{kind}`")),
    };
    let factor = match published.unit.as_str() {
        "kcal/mol" => KJ_PER_KCAL,
        "kJ/mol" | "ring size" => 1.0,
        unit => return Err(format!("there is no unit `{unit}`")),
    };
    let value = computed.value / factor;
    let tolerance = published.tolerance.hypot(computed.expanded / factor);
    let agrees = (value - published.value).abs() <= tolerance;
    Ok(CheckValue {
        id: published.id.clone(),
        quantity: published.quantity.clone(),
        subject: subject.to_owned(),
        published: published.value,
        unit: published.unit.clone(),
        computed: value,
        tolerance,
        tolerance_reason: published.tolerance_reason.clone(),
        source: published.source.clone(),
        source_seen: published.source_seen.clone(),
        outcome: if agrees {
            CheckOutcome::Agrees
        } else {
            CheckOutcome::Off
        },
    })
}

fn read(smiles: &str) -> Result<Structure, String> {
    Structure::from_smiles(smiles).map_err(|e| e.to_string())
}

fn said(error: &ReviewError) -> String {
    error.to_string()
}

fn strain(reviewer: &Reviewer, smiles: &str) -> Result<f64, String> {
    let review = reviewer
        .review(smiles, &read(smiles)?, &[], false)
        .map_err(|e| said(&e))?;
    Ok(review.strain.quantity.value_kj_per_mol)
}

fn cycloalkane(reviewer: &Reviewer, size: usize) -> Result<f64, String> {
    strain(reviewer, &format!("C1{}1", "C".repeat(size - 1)))
}

/// Size and strain of the most strained cycloalkane in a range of sizes such as `7..14`, both ends included.
fn maximum(reviewer: &Reviewer, range: &str) -> Result<(usize, f64), String> {
    let ends = range
        .split_once("..")
        .and_then(|(low, high)| Some((low.parse().ok()?, high.parse().ok()?)));
    let (low, high): (usize, usize) = ends.ok_or(format!("`{range}` is no range of ring sizes"))?;
    let mut best = (low, f64::NEG_INFINITY);
    for size in low..=high {
        let strain = cycloalkane(reviewer, size)?;
        if strain > best.1 {
            best = (size, strain);
        }
    }
    Ok(best)
}

/// The enthalpy of a reaction such as `C1CC1 + 3 CC -> 3 CCC`.
fn reaction(reviewer: &Reviewer, text: &str) -> Result<Computed, String> {
    let (reactants, products) = text.split_once(" -> ").ok_or("a reaction has an arrow")?;
    let mut species = Vec::new();
    for (side, sign) in [(reactants, -1.0), (products, 1.0)] {
        for term in side.split(" + ") {
            let (number, smiles) = match term.split_once(' ') {
                Some((number, smiles)) => (
                    number
                        .parse()
                        .map_err(|_| format!("`{number}` is no number"))?,
                    smiles,
                ),
                None => (1.0, term),
            };
            species.push((sign * number, read(smiles)?));
        }
    }
    let estimate = reviewer.reaction(&species).map_err(|e| said(&e))?;
    Ok(Computed {
        value: estimate.value_kj_per_mol,
        expanded: estimate.expanded_kj_per_mol(),
    })
}

/// A lone harmonic bend: force constant in mdyn Å/rad², rest angle and angle in degrees, such as `1 112 119`.
fn bend(text: &str) -> Result<f64, String> {
    let numbers: Vec<f64> = text.split(' ').filter_map(|n| n.parse().ok()).collect();
    let [constant, rest, angle] = numbers[..] else {
        return Err("three numbers expected".to_owned());
    };
    let constant =
        BendForceConstant::from_mdyn_angstrom_per_rad2(constant).map_err(|e| e.to_string())?;
    let bend = Bend::harmonic(constant, rest.to_radians()).map_err(|e| e.to_string())?;
    let energy = bend.energy(angle.to_radians()).map_err(|e| e.to_string())?;
    Ok(energy.energy_kj_per_mol)
}

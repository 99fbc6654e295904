//! Measured values beside the estimate made without them, and which of the two the review uses.

use tautring_core::additivity::{Estimate, Property};

use super::findings::{Agreement, Basis, Comparison, MeasuredEnthalpy, Quantity};
use super::reviewer::quantity_of;
use crate::dataset::Dataset;

/// Coverage factor of a measured value whose distribution is not stated: 95 % of a normal distribution.
const COVERAGE_FACTOR: f64 = 1.96;

/// Standard uncertainty that a measured value of a case file gets when it states none, kJ/mol: that of the handbook.
pub const UNSTATED_KJ_PER_MOL: f64 = 2.0;

/// An enthalpy of formation that a case file states.
#[derive(Clone, Debug)]
pub struct CaseMeasurement {
    /// Of which phase.
    pub property: Property,
    /// The value, kJ/mol.
    pub value_kj_per_mol: f64,
    /// Standard uncertainty, kJ/mol, if stated.
    pub u_kj_per_mol: Option<f64>,
    /// Where it comes from.
    pub source: String,
    /// Who settled a disagreement with the estimate and why, and whether the measured value stays.
    pub settled: Option<Settled>,
}

/// How a case file settles a disagreement.
#[derive(Clone, Debug)]
pub struct Settled {
    /// Whether the measured value stays; else the estimate does.
    pub keep_measured: bool,
    /// By whom and why.
    pub reason: String,
}

/// Values closer than this are one measurement that two places quote, kJ/mol: half of the last digit that handbooks print, and a conversion.
const SAME_KJ_PER_MOL: f64 = 0.15;

/// Compares the measured values, those of the case file first, with the estimate made without them.
///
/// A published value that the case file quotes is not told twice.
pub(super) fn compare(
    data: &Dataset,
    published: &[usize],
    case: &[&CaseMeasurement],
    without: &Estimate,
) -> Vec<Comparison> {
    let stated = case.iter().map(|m| {
        let measured = MeasuredEnthalpy {
            quantity: measured(
                m.value_kj_per_mol,
                m.u_kj_per_mol.unwrap_or(UNSTATED_KJ_PER_MOL),
            ),
            source: m.source.clone(),
            from_case: true,
        };
        comparison(measured, m.settled.as_ref(), without)
    });
    let quoted = |value: f64| {
        case.iter()
            .any(|m| (m.value_kj_per_mol - value).abs() <= SAME_KJ_PER_MOL)
    };
    let rows = published.iter().map(|&index| &data.rows[index]);
    let known = rows
        .filter(|row| !quoted(row.measurement.value_kj_per_mol))
        .map(|row| {
            let measured = MeasuredEnthalpy {
                quantity: measured(
                    row.measurement.value_kj_per_mol,
                    row.measurement.u_kj_per_mol,
                ),
                source: row.measurement.source.clone(),
                from_case: false,
            };
            comparison(measured, None, without)
        });
    stated.chain(known).collect()
}

fn comparison(
    measured: MeasuredEnthalpy,
    settled: Option<&Settled>,
    without: &Estimate,
) -> Comparison {
    let difference = measured.quantity.value_kj_per_mol - without.value_kj_per_mol;
    let expanded = without
        .of_measurement(measured.quantity.u_kj_per_mol)
        .expanded_kj_per_mol();
    let agreement = if difference.abs() <= expanded {
        Agreement::Agrees
    } else if settled.is_some() {
        Agreement::Settled
    } else {
        Agreement::Disagrees
    };
    Comparison {
        measured,
        blind: quantity_of(without),
        difference_kj_per_mol: difference,
        expanded_difference_kj_per_mol: expanded,
        agreement,
        settled_by: settled.map(|s| s.reason.clone()),
        keeps_estimate: settled.is_some_and(|s| !s.keep_measured),
    }
}

/// A measured value, taken as normally distributed, since its source says no more.
pub(super) fn measured(value_kj_per_mol: f64, u_kj_per_mol: f64) -> Quantity {
    Quantity {
        value_kj_per_mol,
        u_kj_per_mol,
        expanded_kj_per_mol: COVERAGE_FACTOR * u_kj_per_mol,
    }
}

/// The value that the review uses for a molecule with measured values; `None` without any.
///
/// A value that somebody settled stands. Else, as long as every measured value agrees with the estimate made without them, the one of smallest uncertainty
/// (the case file's before published ones when equal). Else the highest enthalpy of formation among the measured values, which is
/// the hazardous side; the estimate made without them is among the candidates when none of them agrees with it.
pub(super) fn choose(comparisons: &[Comparison], without: &Estimate) -> Option<(Quantity, Basis)> {
    let estimated = (quantity_of(without), Basis::Estimated);
    let measured = |c: &Comparison| (c.measured.quantity, Basis::Measured);
    if let Some(settled) = comparisons.iter().find(|c| c.settled_by.is_some()) {
        return Some(if settled.keeps_estimate {
            estimated
        } else {
            measured(settled)
        });
    }
    let u = |c: &Comparison| c.measured.quantity.u_kj_per_mol;
    let surest = comparisons.iter().min_by(|a, b| u(a).total_cmp(&u(b)))?;
    let agrees = |c: &Comparison| c.agreement == Agreement::Agrees;
    if comparisons.iter().all(agrees) {
        return Some(measured(surest));
    }
    let value = |c: &Comparison| c.measured.quantity.value_kj_per_mol;
    let highest = comparisons
        .iter()
        .max_by(|a, b| value(a).total_cmp(&value(b)))?;
    if !comparisons.iter().any(agrees) && without.value_kj_per_mol > value(highest) {
        Some(estimated)
    } else {
        Some(measured(highest))
    }
}

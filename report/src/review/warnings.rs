//! Plain-language warnings: what the input leaves open, where the estimate is weak and what speaks against the data behind it.

use tautring_core::additivity::grade::{OUTSIDE_KJ_PER_MOL, OUTSIDE_LIKENESS};
use tautring_core::additivity::{Grade, Share, Support};

use super::findings::{Agreement, Evidence, FormationEnthalpy, Sameness, phase_word};
use crate::fit::Misfit;
use crate::structure::Structure;

/// Standard uncertainty above which an estimate is called weak, kJ/mol: half of what a weak hydrogen bond costs is no longer told apart,
/// and the 95 % interval is wider than 40 kJ/mol.
const WEAK_KJ_PER_MOL: f64 = 20.0;

/// Ring size from which the strain is a mean over conformers that the model does not know.
const LARGE_RING: usize = 13;

/// Absolute weight from which on an estimate leans on a measurement so far that doubts about it are told: of an error of 20 kJ/mol in the
/// measured value 1 kJ/mol is then in the estimate.
pub const LEANING_WEIGHT: f64 = 0.05;

/// What the warnings of one substance are made from.
pub(super) struct Warned<'a> {
    pub(super) structure: &'a Structure,
    pub(super) gas: &'a FormationEnthalpy,
    /// The misfits among the molecule's own measurements.
    pub(super) misfits: Vec<&'a Misfit>,
    /// What the collection of the data has noted against the molecule's own values.
    pub(super) doubts: Vec<String>,
    pub(super) other_configuration_measured: bool,
}

/// The warnings of one substance, most important first.
pub(super) fn of(warned: &Warned<'_>) -> Vec<String> {
    let gas = warned.gas;
    let mut warnings = Vec::new();
    for comparison in &gas.comparisons {
        let difference = comparison.difference_kj_per_mol;
        let verdict = match comparison.agreement {
            Agreement::Agrees => continue,
            Agreement::Disagrees => "not settled; the higher enthalpy of formation is used",
            Agreement::Settled => "settled in the case file",
        };
        warnings.push(format!(
            "measured value disagrees: {:.1} kJ/mol ({}) is {:.1} kJ/mol {} the estimate made without it; {verdict}",
            comparison.measured.quantity.value_kj_per_mol,
            comparison.measured.source,
            difference.abs(),
            if difference > 0.0 { "above" } else { "below" },
        ));
    }
    warnings.extend(warned.misfits.iter().map(|misfit| {
        format!(
            "misfit: measured {:.1} kJ/mol ({}, {}), while the data of all other molecules give {:.1}, {:.1} standard deviations off; the value is wrong, or the molecule is unlike all others",
            misfit.measured_kj_per_mol,
            misfit.source,
            phase_word(&misfit.phase),
            misfit.predicted_kj_per_mol,
            misfit.standard_deviations.abs(),
        )
    }));
    warnings.extend(
        warned
            .doubts
            .iter()
            .map(|doubt| format!("doubtful data of the molecule itself: {doubt}")),
    );
    warnings.extend(beyond(gas));
    let u = gas.estimate.u_kj_per_mol;
    if u > WEAK_KJ_PER_MOL {
        warnings.push(format!(
            "weak estimate: standard uncertainty {u:.0} kJ/mol; measure the enthalpy or the heat of decomposition"
        ));
    }
    warnings.extend(doubtful_evidence(&gas.evidence));
    let structure = warned.structure;
    let molecule = &structure.molecule;
    if molecule.rings().iter().any(|ring| ring.len() >= LARGE_RING) {
        warnings.push(
            "large ring: its strain is a mean over many shapes, and few such rings were measured"
                .to_owned(),
        );
    }
    warnings.extend(structure.flag.iter().map(ToString::to_string));
    if warned.other_configuration_measured {
        warnings.push(
            "a measured value is known for a stated configuration of this molecule; state the configuration to use it"
                .to_owned(),
        );
    }
    warnings
}

/// What makes a grade low, and what to do then; nothing for a value that was measured or is well supported.
fn beyond(gas: &FormationEnthalpy) -> Option<String> {
    let reasons = unmeasured(&gas.support);
    let (what, then) = match gas.grade {
        Grade::Outside => (
            "outside the data",
            format!(
                "do not rely on the value; for a hazard take the upper end of its interval, {:.0} kJ/mol, and measure",
                gas.quantity.value_kj_per_mol + gas.quantity.expanded_kj_per_mol
            ),
        ),
        Grade::Extrapolated if !reasons.is_empty() => (
            "extrapolated",
            "the uncertainty is wide for that reason".to_owned(),
        ),
        _ => return None,
    };
    let mut reasons: Vec<String> = reasons;
    if gas.grade == Grade::Outside {
        if gas.support.closest < OUTSIDE_LIKENESS {
            reasons.push("nothing much like it was measured".to_owned());
        }
        if gas.support.expanded_kj_per_mol > OUTSIDE_KJ_PER_MOL {
            reasons.push(format!(
                "U is {:.0} kJ/mol",
                gas.support.expanded_kj_per_mol
            ));
        }
    }
    Some(format!("{what}: {}; {then}", reasons.join(", ")))
}

/// What of a molecule was never measured, in words.
fn unmeasured(support: &Support) -> Vec<String> {
    [
        (support.composition, "kinds of atoms and bonds"),
        (support.groups, "groups"),
        (support.ring_sizes, "ring sizes"),
        (support.ring_atoms, "ring atoms and bonds"),
        (support.ring_environment, "ring junctions"),
    ]
    .into_iter()
    .filter(|(share, _)| !share.is_all())
    .map(|(Share { shared, of }, words)| {
        format!(
            "{:.0} of {of:.0} {words} in no measured molecule",
            of - shared
        )
    })
    .collect()
}

/// The doubts about measurements that the estimate leans on.
fn doubtful_evidence(evidence: &[Evidence]) -> Vec<String> {
    let leaning = evidence.iter().filter(|row| {
        row.weight.abs() >= LEANING_WEIGHT && row.resemblance.sameness != Sameness::Itself
    });
    let mut warnings = Vec::new();
    for row in leaning {
        let name = format!(
            "{} ({}, {}, weight {:.2})",
            row.molecule,
            phase_word(&row.phase),
            row.source,
            row.weight
        );
        if let Some(misfit) = &row.misfit {
            let off = misfit.measured_kj_per_mol - misfit.predicted_kj_per_mol;
            warnings.push(format!(
                "leans on a misfit: {name}, measured {:.1} kJ/mol, by its family {:.1}; if the family is right the estimate is too {} by up to {:.1} kJ/mol",
                misfit.measured_kj_per_mol,
                misfit.predicted_kj_per_mol,
                if off * row.weight > 0.0 { "high" } else { "low" },
                (off * row.weight).abs(),
            ));
        }
        if !row.doubts.is_empty() {
            warnings.push(format!(
                "leans on doubtful data: {name}: {}",
                in_short(&row.doubts)
            ));
        }
    }
    warnings
}

/// The doubts without the reasons why they are open, which the evidence itself has in full.
fn in_short(doubts: &[String]) -> String {
    let first = |doubt: &String| doubt.split(';').next().unwrap_or(doubt).to_owned();
    let short: Vec<String> = doubts.iter().map(first).collect();
    short.join("; ")
}

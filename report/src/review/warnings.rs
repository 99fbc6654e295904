//! Plain-language warnings: what the input leaves open and where the estimate is weak.

use tautring_core::additivity::{Estimate, Level, Model};

use super::findings::{Agreement, Comparison};
use crate::dataset::HostFeatures;
use crate::structure::Structure;

/// Standard uncertainty above which an estimate is called weak, kJ/mol: half of what a weak hydrogen bond costs is no longer told apart,
/// and the 95 % interval is wider than 40 kJ/mol.
const WEAK_KJ_PER_MOL: f64 = 20.0;

/// Ring size from which the strain is a mean over conformers that the model does not know.
const LARGE_RING: usize = 13;

/// The warnings of one substance, most important first.
pub(super) fn of(
    model: &Model<'_>,
    structure: &Structure,
    features: &HostFeatures,
    estimate: &Estimate,
    comparisons: &[Comparison],
    other_configuration_measured: bool,
) -> Vec<String> {
    let mut warnings = Vec::new();
    for comparison in comparisons {
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
    let unknown = unknown(model, features);
    if !unknown.is_empty() {
        warnings.push(format!(
            "outside the data: {} never measured in any compound of the data; the uncertainty is wide for that reason",
            unknown.join(", ")
        ));
    }
    let u = estimate.u_kj_per_mol();
    if u > WEAK_KJ_PER_MOL {
        warnings.push(format!(
            "weak estimate: standard uncertainty {u:.0} kJ/mol; measure the enthalpy or the heat of decomposition"
        ));
    }
    let molecule = &structure.molecule;
    if molecule.rings().iter().any(|ring| ring.len() >= LARGE_RING) {
        warnings.push(
            "large ring: its strain is a mean over many shapes, and few such rings were measured"
                .to_owned(),
        );
    }
    warnings.extend(structure.flag.iter().map(ToString::to_string));
    if other_configuration_measured {
        warnings.push(
            "a measured value is known for a stated configuration of this molecule; state the configuration to use it"
                .to_owned(),
        );
    }
    warnings
}

/// What of a molecule was never measured, in words: bonds and groups, rings.
fn unknown(model: &Model<'_>, features: &HostFeatures) -> Vec<String> {
    [
        (Level::Element, "element"),
        (Level::BondOrder, "kind of bond"),
        (Level::GroupElements, "group"),
        (Level::RingAtom, "ring atom environment"),
    ]
    .into_iter()
    .filter_map(|(level, word)| {
        let missing = features
            .terms()
            .iter()
            .filter(|t| t.key.level() == Some(level))
            .filter(|t| model.keys.binary_search(&t.key.bits()).is_err())
            .count();
        match missing {
            0 => None,
            1 => Some(format!("one {word}")),
            n => Some(format!("{n} {word}s")),
        }
    })
    .collect()
}

//! The results of one structure as lines for people.

use tautring_core::additivity::Grade;
use tautring_core::quantities::KJ_PER_KCAL;
use tautring_report::document::rounding::{fixed, rounded};
use tautring_report::document::subscripted;
use tautring_report::review::{
    Agreement, Basis, Comparison, Evidence, FormationEnthalpy, Quantity, SubstanceReview,
    TELLING_KJ_PER_MOL, ThermalValue, phase_word,
};

/// What the signs mean; stands once under all cards.
pub(super) const LEGEND: &str = "\
±: expanded uncertainty U (95 %) for the true value, k·u with the k beside it. Gas phase unless stated, 298.15 K; a crystal that melts below and\na liquid that boils below are hypothetical. Atoms count from 1.
An estimate is no substitute for calorimetry, and a low strain is no proof of safety.";

/// Measurements that are listed; the rest is counted.
const EVIDENCE_SHOWN: usize = 6;

/// Width of the first column.
const WIDTH: usize = 24;

/// The card of one structure; `place` is what its head says of where it came from.
pub(super) fn card(place: &str, review: &SubstanceReview) -> String {
    let mut lines = vec![if review.name == review.input {
        place.to_owned()
    } else {
        format!("{}  {place}", review.name)
    }];
    let mut line = |name: &str, text: String| lines.push(format!("  {name:<WIDTH$}{text}"));
    line(
        "formula",
        format!(
            "{}, {} g/mol",
            subscripted(&review.formula),
            fixed(review.molar_mass_g_per_mol, 2)
        ),
    );
    for (phase, enthalpy) in [
        ("enthalpy of formation", &review.gas),
        ("  liquid", &review.liquid),
        ("  crystal", &review.solid),
    ] {
        formation(phase, enthalpy, &mut line);
    }
    thermal(review, &mut line);
    strain(review, &mut line);
    conventions(review, &mut line);
    line(
        "oxygen balance",
        format!("{} %", fixed(review.oxygen_balance_percent, 1)),
    );
    evidence(review, &mut line);
    for (index, flag) in review.flags.iter().enumerate() {
        line(if index == 0 { "flags" } else { "" }, format!("! {flag}"));
    }
    lines.push(String::new());
    lines.join("\n")
}

fn formation(phase: &str, enthalpy: &FormationEnthalpy, line: &mut impl FnMut(&str, String)) {
    let basis = match (enthalpy.basis, enthalpy.carried_from) {
        (Basis::Measured, _) => "measured".to_owned(),
        (Basis::Estimated, None) => "estimated".to_owned(),
        (Basis::Estimated, Some(from)) => format!("estimated from its measured {from}"),
    };
    let grade = match enthalpy.grade {
        Grade::Measured => String::new(),
        grade => format!(": {}", grade.name()),
    };
    line(
        phase,
        format!("{}, {basis}{grade}", with_factor(enthalpy.quantity)),
    );
    for comparison in &enthalpy.comparisons {
        line("    measured", compared(comparison));
    }
    if enthalpy.basis == Basis::Measured {
        line("    estimate", with_factor(enthalpy.estimate));
    }
}

/// Entropy, and the heat capacity from the lowest to the highest temperature.
fn thermal(review: &SubstanceReview, line: &mut impl FnMut(&str, String)) {
    let Some(thermal) = &review.gas_thermal else {
        return;
    };
    let printed = |value: &ThermalValue| {
        let interval = rounded(value.value_j_per_mol_k, value.expanded_j_per_mol_k).interval();
        format!("{interval} J/(mol K) at {} K", value.temperature_k)
    };
    line("entropy", printed(&thermal.entropy));
    let ends = [thermal.heat_capacity.first(), thermal.heat_capacity.last()];
    let ends: Vec<_> = ends.into_iter().flatten().map(printed).collect();
    line("heat capacity", ends.join(", "));
}

fn strain(review: &SubstanceReview, line: &mut impl FnMut(&str, String)) {
    let strain = &review.strain;
    if strain.ring_systems.is_empty() {
        line("strain", "none: no ring that is not aromatic".to_owned());
        return;
    }
    let expanded = strain.quantity.expanded_kj_per_mol;
    line(
        "strain",
        format!(
            "{}; {} kcal/mol; {} J/g",
            with_factor(strain.quantity),
            rounded(strain.value_kcal_per_mol, expanded / KJ_PER_KCAL).interval(),
            rounded(strain.j_per_g, strain.expanded_j_per_g).interval()
        ),
    );
    line("", format!("by {}", strain.convention));
    if review.gas.basis == Basis::Measured {
        line(
            "",
            format!(
                "{}: by the ring levels alone",
                with_factor(strain.ring_levels)
            ),
        );
    }
    if strain.ring_systems.len() > 1 {
        line("ring systems", strain.ring_systems.len().to_string());
    }
    for system in &strain.ring_systems {
        let sizes: Vec<_> = system.sizes.iter().map(ToString::to_string).collect();
        line(
            "  ring system",
            format!(
                "{}: atoms {}; ring sizes {}",
                with_factor(system.quantity),
                numbers(&system.atoms),
                sizes.join(" ")
            ),
        );
    }
}

/// `1 2 3` for the atoms 0, 1, 2.
fn numbers(atoms: &[usize]) -> String {
    let numbers: Vec<_> = atoms.iter().map(|atom| (atom + 1).to_string()).collect();
    numbers.join(" ")
}

/// The strain by reactions and by the CH2 increment, where these are defined; the group increments stand above.
fn conventions(review: &SubstanceReview, line: &mut impl FnMut(&str, String)) {
    let several = review.strain.ring_systems.len() > 1;
    let rows = review.strain_conventions.iter();
    let shown = rows.filter_map(|row| Some((row, row.quantity?, row.reaction.as_ref()?)));
    for (index, (row, quantity, reaction)) in shown.enumerate() {
        let value = rounded(quantity.value_kj_per_mol, quantity.expanded_kj_per_mol);
        line(
            if index == 0 {
                "by other conventions"
            } else {
                ""
            },
            format!(
                "{} kJ/mol {}{}: {reaction}",
                value.interval(),
                row.convention,
                if several {
                    format!(", atoms {}", numbers(&row.atoms))
                } else {
                    String::new()
                }
            ),
        );
    }
}

fn evidence(review: &SubstanceReview, line: &mut impl FnMut(&str, String)) {
    let evidence = &review.gas.evidence;
    for (index, row) in evidence.iter().take(EVIDENCE_SHOWN).enumerate() {
        line(
            if index == 0 { "leans on (weight)" } else { "" },
            format!(
                "{:>6}  {}, {}  {}  [{}]  {}{}",
                fixed(row.weight, 3),
                row.molecule,
                phase_word(&row.phase),
                row.smiles,
                row.source,
                row.resemblance.words,
                against(row)
            ),
        );
    }
    if evidence.len() > EVIDENCE_SHOWN {
        line(
            "",
            format!(
                "and {} more; together {} % of the absolute weight",
                evidence.len() - EVIDENCE_SHOWN,
                fixed(100.0 * review.gas.evidence_share, 0)
            ),
        );
    }
}

/// A mark for a measurement that something speaks against; the flags say what.
fn against(row: &Evidence) -> &'static str {
    if row.misfit.is_some() {
        "; MISFIT"
    } else if row.doubts.is_empty() {
        ""
    } else {
        "; DOUBTFUL"
    }
}

/// `115.6 ± 3.1 kJ/mol (k = 2.04)`.
fn with_factor(quantity: Quantity) -> String {
    let value = rounded(quantity.value_kj_per_mol, quantity.expanded_kj_per_mol);
    let factor = quantity.expanded_kj_per_mol / quantity.u_kj_per_mol;
    format!("{} kJ/mol (k = {})", value.interval(), fixed(factor, 2))
}

fn compared(comparison: &Comparison) -> String {
    let measured = &comparison.measured;
    let blind = comparison.blind;
    let verdict = match comparison.agreement {
        Agreement::Agrees if comparison.expanded_difference_kj_per_mol > TELLING_KJ_PER_MOL => {
            "not told apart, the estimate alone is too uncertain"
        }
        Agreement::Agrees => "they agree",
        Agreement::Disagrees => "they DISAGREE",
        Agreement::Settled => "settled",
    };
    format!(
        "{} [{}]; estimate without it {} kJ/mol: {verdict}",
        with_factor(measured.quantity),
        measured.source,
        rounded(blind.value_kj_per_mol, blind.expanded_kj_per_mol).interval()
    )
}

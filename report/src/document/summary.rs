//! The summary: every substance in one table, the plot, the flags.

use tautring_core::additivity::Grade;
use tautring_core::quantities::KJ_PER_KCAL;

use super::block::{Block, Column, Figure, Note, NoteKind, Table};
use super::drawing::{Drawing, PlottedStrain, StrainPlot};
use super::inline::{Inline, subscripted};
use super::inputs::Inputs;
use super::report::heading;
use super::rounding::{Rounded, rounded};
use super::substance::in_use;
use crate::review::Basis;

pub(super) fn blocks(inputs: &Inputs) -> Vec<Block> {
    let mut blocks = vec![heading(2, "Summary"), table(inputs)];
    blocks.extend(not_reviewed(inputs));
    blocks.extend(flags(inputs));
    blocks.extend(plot(inputs));
    blocks
}

fn table(inputs: &Inputs) -> Block {
    let rows = inputs
        .entries
        .iter()
        .map(|entry| {
            let Ok(review) = &entry.finding else {
                let mut row = vec![Inline::from(entry.particulars.substance.as_str())];
                row.extend((0..6).map(|_| Inline::from("—")));
                row.push("not reviewed".into());
                return row;
            };
            let strain = &review.strain;
            let expanded = strain.quantity.expanded_kj_per_mol;
            let gas = &review.gas;
            let of_rings = |interval: Rounded| -> Inline {
                if strain.ring_systems.is_empty() {
                    "no ring".into()
                } else {
                    interval.interval().into()
                }
            };
            vec![
                Inline::from(review.name.as_str()),
                subscripted(&review.formula).into(),
                of_rings(rounded(strain.quantity.value_kj_per_mol, expanded)),
                of_rings(rounded(strain.value_kcal_per_mol, expanded / KJ_PER_KCAL)),
                of_rings(rounded(strain.j_per_g, strain.expanded_j_per_g)),
                rounded(
                    gas.quantity.value_kj_per_mol,
                    gas.quantity.expanded_kj_per_mol,
                )
                .interval()
                .into(),
                grade_word(gas.grade),
                review.flags.len().to_string().into(),
            ]
        })
        .collect();
    Block::Table(Table {
        caption: "Strain (the enthalpy of formation beside it, measured or estimated, minus the strain-free sum) and gas-phase enthalpy of formation at 298.15 K, each with its expanded uncertainty U (95 %, for the true value). The grades are explained above. \"No ring\" means none that counts as strained: aromatic rings do not.".into(),
        columns: vec![
            Column::words("Substance"),
            Column::words("Formula"),
            Column::numbers("Strain ± U, kJ/mol"),
            Column::numbers("Strain ± U, kcal/mol"),
            Column::numbers("Strain ± U, J/g"),
            Column::numbers("Enthalpy of formation ± U, kJ/mol"),
            Column::words("Grade of the enthalpy"),
            Column::numbers("Flags (below)"),
        ],
        rows,
    })
}

pub(super) const fn basis_word(basis: Basis) -> &'static str {
    match basis {
        Basis::Measured => "measured",
        Basis::Estimated => "estimated",
    }
}

/// The grade, of weight where nobody should rely on the value.
fn grade_word(grade: Grade) -> Inline {
    match grade {
        Grade::Outside => Inline::new().strong(grade.name()),
        _ => grade.name().into(),
    }
}

fn not_reviewed(inputs: &Inputs) -> Option<Block> {
    let paragraphs: Vec<_> = inputs
        .entries
        .iter()
        .filter_map(|entry| {
            let reason = entry.finding.as_ref().err()?;
            let name = format!("{} could not be reviewed: ", entry.particulars.substance);
            Some(Inline::new().strong(name).text(reason.as_str()))
        })
        .collect();
    (!paragraphs.is_empty()).then_some(Block::Note(Note {
        kind: NoteKind::Warning,
        paragraphs,
    }))
}

fn flags(inputs: &Inputs) -> Option<Block> {
    let paragraphs: Vec<_> = inputs
        .reviews()
        .flat_map(|review| {
            review.flags.iter().map(|flag| {
                Inline::new()
                    .strong(format!("{}: ", review.name))
                    .text(flag.as_str())
            })
        })
        .collect();
    (!paragraphs.is_empty()).then_some(Block::Note(Note {
        kind: NoteKind::Caution,
        paragraphs,
    }))
}

/// The plot: the ring systems of the case among the measured cycloalkanes.
///
/// Points carry numbers, which stay apart where names would lie on each other; the caption says what they stand for.
fn plot(inputs: &Inputs) -> Option<Block> {
    let mut case = Vec::new();
    let mut told = Vec::new();
    for review in inputs.reviews() {
        for (system, strain) in in_use(review) {
            let size = *system.sizes.first()?;
            let number = case.len() + 1;
            let interval = rounded(strain.value_kj_per_mol, strain.expanded_kj_per_mol).interval();
            let rings = match system.sizes.len() {
                1 => String::new(),
                n => format!(", {n} rings"),
            };
            told.push(format!(
                "{number} {}{rings}: {interval} kJ/mol",
                review.name
            ));
            case.push(PlottedStrain {
                size,
                strain_kj_per_mol: strain.value_kj_per_mol,
                expanded_kj_per_mol: strain.expanded_kj_per_mol,
                label: number.to_string(),
            });
        }
    }
    if case.is_empty() {
        return None;
    }
    let background = inputs
        .monocycles
        .iter()
        .map(|ring| PlottedStrain {
            size: ring.size,
            strain_kj_per_mol: ring.strain_kj_per_mol,
            expanded_kj_per_mol: ring.expanded_kj_per_mol,
            label: String::new(),
        })
        .collect();
    let told = told.join("; ");
    Some(Block::Figure(Figure {
        id: "strain-by-ring-size".to_owned(),
        caption: format!("Strain against ring size. Filled: ring systems of the case; a fused, bridged or spiro system stands at its smallest ring and holds the strain of all its rings. Open: measured unsubstituted cycloalkanes whose measured value agrees with the estimate made without it. Bars are the expanded uncertainty U (95 %) of the true value. Numbers: {told}.").into(),
        alternative: format!("Strain against ring size. {told}."),
        drawing: Drawing::StrainPlot(StrainPlot { background, case }),
    }))
}

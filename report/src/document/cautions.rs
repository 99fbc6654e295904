//! What a report is and what it is not.

use super::block::{Block, Note, NoteKind};
use super::inline::Inline;
use super::report::heading;

pub(super) fn blocks() -> Vec<Block> {
    vec![
        heading(2, "What this report is, and what it is not"),
        "For each substance this report gives the enthalpy of formation in the gas phase at 298.15 K, the strain energy of its rings, how sure each number is, and which measurements it rests on. Strain is energy that a ring opening can set free; it is one part of a hazard assessment.".into(),
        Block::Note(Note {
            kind: NoteKind::Warning,
            paragraphs: vec![
                Inline::new()
                    .strong("An estimate is no substitute for calorimetry. ")
                    .text("Measure before scaling up."),
                Inline::new()
                    .strong("A low number is no proof of safety. ")
                    .text("Functional groups outside the rings can decompose with far more heat than any strain."),
            ],
        }),
        "Not in these numbers:".into(),
        Block::List {
            ordered: false,
            items: [
                ("Kinetics. ", "Nothing here says at which temperature or how fast the energy comes out."),
                ("Catalysis and autocatalysis. ", "Acids, bases, metals, rust and the products themselves may open a ring far below its thermal limit."),
                ("Confinement. ", "Pressure, gas release and heat loss depend on the vessel, not on the molecule."),
                ("Impurities, solvents and mixtures. ", "Every number is for one pure molecule in the gas phase."),
            ]
            .map(|(what, why)| Inline::new().strong(what).text(why))
            .to_vec(),
        },
        "Local codes and the judgement of a licensed practitioner decide; this report informs them.".into(),
        Block::Note(Note {
            kind: NoteKind::Information,
            paragraphs: vec![
                "u is a standard uncertainty. U is an expanded uncertainty: the true value is expected within ± U of the stated one in 95 of 100 such cases. It is not an interval for a new measurement, which has an error of its own.".into(),
                "Numbers are rounded to their uncertainty: that to two significant digits, the value to the same digit. The calorie is the thermochemical one, 4.184 J. Atoms are numbered from 1 in the order of the structure as given.".into(),
            ],
        }),
    ]
}

//! What a report is and what it is not.

use super::block::{Block, Note, NoteKind};
use super::evidence;
use super::inline::Inline;
use super::report::heading;

pub(super) fn blocks() -> Vec<Block> {
    vec![
        heading(2, "What this report is, and what it is not"),
        "For each substance this report gives the enthalpies of formation of gas, liquid and crystal at 298.15 K, the strain energy of its rings, how sure each number is, and which measurements it rests on. Strain is energy that a ring opening can set free; it is one part of a hazard assessment.".into(),
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
                ("Functional groups. ", "Diazo, azide, nitro, peroxide and other groups known to decompose are not looked for; a molecule without strain can be an explosive."),
                ("Configuration. ", "An estimate tells cis from trans isomers only in part; a measured value belongs to the configuration that is stated."),
                ("Impurities, solvents and mixtures. ", "Every number is for one pure substance, and the strain for its gas."),
            ]
            .map(|(what, why)| Inline::new().strong(what).text(why))
            .to_vec(),
        },
        "Local codes and the judgement of a licensed practitioner decide; this report informs them.".into(),
        Block::Note(Note {
            kind: NoteKind::Information,
            paragraphs: vec![
                format!(
                    "u is a standard uncertainty, half the width of the 68 % interval. U is an expanded uncertainty (95 %) of the true value, not of a new measurement, which has an error of its own. How far to trust it: when each molecule of the data is left out and predicted from the others, {} of the measured values lie inside the 95 % interval for a measurement, {} of those with a ring that is not aromatic, {} of those with a ring of three or four.",
                    inside("all"),
                    inside("non-aromatic ring"),
                    inside("three- and four-membered rings"),
                )
                .into(),
                "U = k·u. The coverage factor k differs from value to value, between 1.96 and 3.26: the part of u that comes from the measurements is normal, the part that comes from how far single molecules stray from additivity follows Student's distribution with two degrees of freedom, since some stray far; the 95 % quantiles of both are added in squares.".into(),
                evidence::grades_explained(),
                "Numbers are rounded to their uncertainty: that to two significant digits, the value to the same digit. The calorie is the thermochemical one, 4.184 J. Atoms are numbered from 1 in the order of the structure as given.".into(),
            ],
        }),
    ]
}

/// The share of left-out measurements inside their interval, as the fit wrote it down for a family.
fn inside(family: &str) -> String {
    const LEFT_OUT: &str = include_str!("../../../data/left_out.txt");
    LEFT_OUT
        .lines()
        .filter(|line| line.starts_with(family) && !line.contains(','))
        .find_map(|line| line.split_whitespace().find(|word| word.ends_with('%')))
        .map_or_else(
            || "an unknown share".to_owned(),
            |share| share.replace('%', " %"),
        )
}

#[cfg(test)]
mod tests {
    use super::inside;

    #[test]
    fn every_family_named_has_its_share() {
        for family in ["all", "non-aromatic ring", "three- and four-membered rings"] {
            assert!(inside(family).ends_with(" %"), "{family}");
        }
    }
}

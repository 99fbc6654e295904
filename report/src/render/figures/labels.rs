//! Labels of atoms: symbol, hydrogens, charge, mass number.

use tautring_core::molecule::Element;

use super::canvas::{Anchor, Canvas, Ink, Point, Rectangle, words_width};
use crate::structure::HostMolecule;

/// Font size of atom labels, px.
const SIZE: f64 = 16.0;

/// The label of one atom: the symbol stands on the atom, the rest beside it.
#[derive(Clone, Debug)]
pub(super) struct AtomLabel {
    at: Point,
    before: String,
    symbol: String,
    after: String,
}

impl AtomLabel {
    /// The label of an atom; none for a carbon that its bonds tell.
    pub(super) fn of(molecule: &HostMolecule, atom: usize, points: &[Point]) -> Option<Self> {
        let here = molecule.atoms().get(atom)?;
        let neighbours = molecule.neighbours(atom);
        if here.element == Element::C
            && here.charge == 0
            && here.isotope == 0
            && !neighbours.is_empty()
        {
            return None;
        }
        let hydrogens = match here.hydrogens {
            0 => String::new(),
            1 => "H".to_owned(),
            count => format!("H{}", subscript(count.into())),
        };
        let isotope = if here.isotope == 0 {
            String::new()
        } else {
            superscript(here.isotope)
        };
        let charge = charge(here.charge);
        let at = points[atom];
        let lean: f64 = neighbours
            .iter()
            .map(|n| points[usize::from(n.atom)][0] - at[0])
            .sum();
        // Hydrogens go where the bonds do not; to the right where both sides are alike.
        let to_the_left = lean > 8.0;
        let (before, after) = if to_the_left {
            (hydrogens, charge)
        } else {
            (String::new(), hydrogens + &charge)
        };
        Some(Self {
            at,
            before: if to_the_left { before } else { String::new() },
            symbol: isotope + here.element.symbol(),
            after,
        })
    }

    /// What the label covers.
    pub(super) fn boxes(&self) -> Vec<Rectangle> {
        self.parts()
            .into_iter()
            .filter(|(text, ..)| !text.is_empty())
            .map(|(text, at, anchor)| Rectangle::of_words(text, at, SIZE, anchor))
            .collect()
    }

    pub(super) fn draw(&self, canvas: &mut Canvas) {
        for (text, at, anchor) in self.parts() {
            if !text.is_empty() {
                canvas.words(text, at, SIZE, anchor, Ink::Plain);
            }
        }
    }

    fn parts(&self) -> [(&str, Point, Anchor); 3] {
        let half = words_width(&self.symbol, SIZE) / 2.0;
        let [x, y] = self.at;
        [
            (&self.before, [x - half, y], Anchor::End),
            (&self.symbol, self.at, Anchor::Middle),
            (&self.after, [x + half, y], Anchor::Start),
        ]
    }
}

fn charge(charge: i8) -> String {
    let sign = match charge {
        0 => return String::new(),
        1.. => '⁺',
        _ => '⁻',
    };
    match charge.unsigned_abs() {
        1 => sign.to_string(),
        size => format!("{}{sign}", superscript(size.into())),
    }
}

fn subscript(number: u16) -> String {
    crate::document::subscripted(&number.to_string())
}

fn superscript(number: u16) -> String {
    const SUPERSCRIPTS: [char; 10] = ['⁰', '¹', '²', '³', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹'];
    number
        .to_string()
        .chars()
        .filter_map(|digit| SUPERSCRIPTS.get(digit.to_digit(10)? as usize))
        .collect()
}

//! Structural formulas with strained rings marked.

use super::bonds::{BondPlan, HATCHING};
use super::canvas::{Anchor, Canvas, Ink, Point, Rectangle};
use super::clearance::{Clearance, widest_gap};
use super::labels::AtomLabel;
use super::layout::Layout;
use crate::document::{StrainedSystem, StructureDrawing};
use crate::structure::HostMolecule;

/// Length of a bond, px.
const BOND: f64 = 46.0;

/// Font size of atom numbers, px.
const NUMBER_SIZE: f64 = 9.5;

/// Font size of strain labels, px.
const STRAIN_SIZE: f64 = 13.0;

/// Draws a structure.
pub(super) fn draw(drawing: &StructureDrawing) -> Canvas {
    let molecule = &drawing.structure.molecule;
    let layout = Layout::of(molecule);
    let points: Vec<Point> = layout.points.iter().map(|p| p.map(|x| BOND * x)).collect();
    let labels: Vec<Option<AtomLabel>> = (0..points.len())
        .map(|atom| AtomLabel::of(molecule, atom, &points))
        .collect();
    let boxes: Vec<Vec<Rectangle>> = labels
        .iter()
        .map(|label| label.as_ref().map(AtomLabel::boxes).unwrap_or_default())
        .collect();
    let strained = strained_bonds(molecule, &drawing.strained);

    let mut canvas = Canvas::default();
    let mut clearance = Clearance::default();
    let plan = BondPlan {
        molecule,
        points: &points,
        depths: &layout.depths,
        labels: &boxes,
        strained: &strained,
    };
    for (bond, &marked) in strained.iter().enumerate() {
        plan.draw(bond, &mut canvas);
        let [from, to] = plan.ends(bond);
        clearance.block_stroke(from, to, if marked { HATCHING + 2.0 } else { 5.0 });
    }
    for label in labels.iter().flatten() {
        label.draw(&mut canvas);
    }
    for part in boxes.iter().flatten() {
        // A number close by would read as part of the formula.
        clearance.block(part.grown(4.0));
    }
    numbers(molecule, &points, &mut clearance, &mut canvas);
    for system in &drawing.strained {
        strain_label(system, &points, &mut clearance, &mut canvas);
    }
    canvas
}

/// Ring bonds inside the marked ring systems.
fn strained_bonds(molecule: &HostMolecule, systems: &[StrainedSystem]) -> Vec<bool> {
    let bonds = molecule.bonds().iter().enumerate();
    bonds
        .map(|(index, bond)| {
            let inside = |system: &StrainedSystem| {
                bond.atoms
                    .iter()
                    .all(|&atom| system.atoms.contains(&usize::from(atom)))
            };
            !molecule.bond_ring_sizes(index).is_empty() && systems.iter().any(inside)
        })
        .collect()
}

fn numbers(
    molecule: &HostMolecule,
    points: &[Point],
    clearance: &mut Clearance,
    canvas: &mut Canvas,
) {
    for (atom, &at) in points.iter().enumerate() {
        let directions = molecule.neighbours(atom).iter().map(|n| {
            let there = points[usize::from(n.atom)];
            (there[1] - at[1]).atan2(there[0] - at[0])
        });
        let text = (atom + 1).to_string();
        let place = clearance.place(
            &text,
            NUMBER_SIZE,
            at,
            &[8.0, 10.0, 12.0, 15.0, 18.0, 21.0, 24.0, 28.0],
            widest_gap(directions),
        );
        canvas.words(&text, place, NUMBER_SIZE, Anchor::Middle, Ink::Faint);
    }
}

/// Puts the strain of a ring system beside it: inside if there is room, else on the side that is farthest from the rest.
fn strain_label(
    system: &StrainedSystem,
    points: &[Point],
    clearance: &mut Clearance,
    canvas: &mut Canvas,
) {
    let centre = middle(system.atoms.iter().filter_map(|&atom| points.get(atom)));
    let rest = middle(points.iter());
    let away = [centre[0] - rest[0], centre[1] - rest[1]];
    let towards = if away[0].hypot(away[1]) < 1.0 {
        std::f64::consts::FRAC_PI_2
    } else {
        away[1].atan2(away[0])
    };
    let radii: Vec<f64> = (0..60).map(|step| 6.0 * f64::from(step)).collect();
    let place = clearance.place(&system.label, STRAIN_SIZE, centre, &radii, towards);
    canvas.words(
        &system.label,
        place,
        STRAIN_SIZE,
        Anchor::Middle,
        Ink::Strain,
    );
}

fn middle<'a>(points: impl Iterator<Item = &'a Point>) -> Point {
    let mut count = 0.0_f64;
    let mut sum = [0.0; 2];
    for p in points {
        count += 1.0;
        sum = [sum[0] + p[0], sum[1] + p[1]];
    }
    sum.map(|x| x / count.max(1.0))
}

#[cfg(test)]
mod tests;

//! Bonds as strokes: single, double, triple; cut at labels, and where a nearer bond passes in front.

use tautring_core::molecule::BondOrder;

use super::canvas::{Canvas, Ink, Point, Rectangle};
use super::overlap::{crossing, distance};
use crate::structure::HostMolecule;

/// Distance between the strokes of a multiple bond, px.
const SPACING: f64 = 5.5;

/// Half the gap in a bond behind another, px.
const GAP: f64 = 7.0;

/// Width of the hatching of a strained bond, px.
pub(super) const HATCHING: f64 = 9.0;

/// All that the bonds of a picture share.
pub(super) struct BondPlan<'a> {
    pub(super) molecule: &'a HostMolecule,
    /// Atoms, px.
    pub(super) points: &'a [Point],
    pub(super) depths: &'a [f64],
    /// What the label of each atom covers.
    pub(super) labels: &'a [Vec<Rectangle>],
    /// Whether each bond is marked as strained.
    pub(super) strained: &'a [bool],
}

impl BondPlan<'_> {
    pub(super) fn draw(&self, bond: usize, canvas: &mut Canvas) {
        let Some(order) = self.molecule.bonds().get(bond).map(|b| b.order) else {
            return;
        };
        let strained = self.strained[bond];
        let [from, to] = self.ends(bond);
        let length = distance(from, to).max(1e-6);
        let normal = [-(to[1] - from[1]) / length, (to[0] - from[0]) / length];
        let pieces = self.pieces(bond);
        let (width, ink) = if strained {
            (3.0, Ink::Strain)
        } else {
            (1.7, Ink::Plain)
        };
        if strained {
            for &(start, end) in &pieces {
                let [a, b] = [start, end].map(|t| along(from, to, t));
                canvas.line(a, b, HATCHING, Ink::Strain, Some("1.6 3.4"));
            }
        }
        for (shift, shortened) in self.strokes(bond, order, normal) {
            for &(start, end) in &pieces {
                // An inner stroke keeps clear of the bonds that it would run into.
                let start = if shortened { start.max(0.14) } else { start };
                let end = if shortened { end.min(0.86) } else { end };
                if start >= end {
                    continue;
                }
                let [a, b] = [start, end].map(|t| {
                    let p = along(from, to, t);
                    [p[0] + shift * normal[0], p[1] + shift * normal[1]]
                });
                canvas.line(a, b, width, ink, None);
            }
        }
    }

    /// The parts of a bond that are seen, as parameters along it.
    fn pieces(&self, bond: usize) -> Vec<(f64, f64)> {
        let [from, to] = self.ends(bond);
        let length = distance(from, to).max(1e-6);
        let (mut start, mut end) = (0.0_f64, 1.0_f64);
        let [a, b] = self.molecule.bonds()[bond].atoms.map(usize::from);
        for part in &self.labels[a] {
            if let Some((_, leave)) = part.grown(2.5).clip(from, to) {
                start = start.max(leave);
            }
        }
        for part in &self.labels[b] {
            if let Some((enter, _)) = part.grown(2.5).clip(from, to) {
                end = end.min(enter);
            }
        }
        let mut pieces = vec![(start, end)];
        for middle in self.hidden(bond) {
            let half = GAP / length;
            pieces = pieces
                .into_iter()
                .flat_map(|(start, end)| {
                    [
                        (start, end.min(middle - half)),
                        (start.max(middle + half), end),
                    ]
                })
                .filter(|(start, end)| start < end)
                .collect();
        }
        pieces
    }

    /// Where nearer bonds pass in front of a bond.
    fn hidden(&self, bond: usize) -> Vec<f64> {
        let bonds = self.molecule.bonds();
        let [a, b] = bonds[bond].atoms.map(usize::from);
        let depth =
            |[a, b]: [usize; 2], t: f64| self.depths[a] + t * (self.depths[b] - self.depths[a]);
        (0..bonds.len())
            .filter_map(|other| {
                let [c, d] = bonds[other].atoms.map(usize::from);
                if [c, d].contains(&a) || [c, d].contains(&b) {
                    return None;
                }
                let (t, u) = crossing(self.ends(bond), self.ends(other))?;
                let behind = depth([a, b], t) - depth([c, d], u);
                (behind > 1e-9 || behind.abs() <= 1e-9 && bond < other).then_some(t)
            })
            .collect()
    }

    /// The strokes of a bond: how far each is shifted along the normal, and whether it is shortened.
    fn strokes(&self, bond: usize, order: BondOrder, normal: Point) -> Vec<(f64, bool)> {
        match order {
            BondOrder::Single | BondOrder::Aromatic => vec![(0.0, false)],
            BondOrder::Triple => vec![(0.0, false), (SPACING, false), (-SPACING, false)],
            BondOrder::Double => match self.inner_side(bond, normal) {
                Some(side) => vec![(0.0, false), (side * SPACING, true)],
                None => vec![(SPACING / 2.0, false), (-SPACING / 2.0, false)],
            },
        }
    }

    /// On which side the second stroke of a double bond goes: into the smallest ring, or to where the substituents are; none for a bond
    /// that is drawn evenly about its axis.
    fn inner_side(&self, bond: usize, normal: Point) -> Option<f64> {
        let [a, b] = self.molecule.bonds()[bond].atoms.map(usize::from);
        let [from, to] = self.ends(bond);
        let middle = along(from, to, 0.5);
        let side = |p: Point| (p[0] - middle[0]) * normal[0] + (p[1] - middle[1]) * normal[1];
        let ring = self.molecule.rings().iter().find(|ring| {
            let here = |atom: usize| ring.iter().position(|&r| usize::from(r) == atom);
            match (here(a), here(b)) {
                (Some(i), Some(j)) => i.abs_diff(j) == 1 || i.abs_diff(j) == ring.len() - 1,
                _ => false,
            }
        });
        if let Some(ring) = ring {
            let sum: f64 = ring
                .iter()
                .map(|&atom| side(self.points[usize::from(atom)]))
                .sum();
            return Some(if sum < 0.0 { -1.0 } else { 1.0 });
        }
        let degree = |atom: usize| self.molecule.neighbours(atom).len();
        if degree(a) == 1 || degree(b) == 1 {
            return None;
        }
        let others = [(a, b), (b, a)].into_iter().flat_map(|(atom, other)| {
            let neighbours = self
                .molecule
                .neighbours(atom)
                .iter()
                .map(|n| usize::from(n.atom));
            neighbours.filter(move |&n| n != other)
        });
        let sum: f64 = others.map(|atom| side(self.points[atom]).signum()).sum();
        // As many on one side as on the other, as in a trans alkene: either will do.
        Some(if sum < 0.0 { -1.0 } else { 1.0 })
    }

    pub(super) fn ends(&self, bond: usize) -> [Point; 2] {
        self.molecule.bonds()[bond]
            .atoms
            .map(|atom| self.points[usize::from(atom)])
    }
}

fn along(from: Point, to: Point, t: f64) -> Point {
    [
        from[0] + t * (to[0] - from[0]),
        from[1] + t * (to[1] - from[1]),
    ]
}

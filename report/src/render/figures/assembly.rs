//! Cages and what hangs on them, put together in one plane.
//!
//! The molecule falls into rigid blocks: every cage, and every connected rest as it is laid out flat. The largest cage stays; the others
//! are hung on it, bond by bond, each turned to where there is most room.

use std::f64::consts::TAU;

use super::cage;
use super::canvas::Point;
use super::layout::{Layout, bonds, inner_bonds};
use super::overlap::{crossing, distance, to_segment};
use crate::structure::HostMolecule;

/// Directions that are tried for a block.
const DIRECTIONS: usize = 36;

/// Lengths that are tried for the bond to it.
const LENGTHS: [f64; 3] = [1.0, 1.3, 1.7];

struct Block {
    atoms: Vec<usize>,
    points: Vec<Point>,
    depths: Vec<f64>,
}

/// Puts a molecule together from its flat layout and its cages.
pub(super) fn assemble(molecule: &HostMolecule, flat: &[Point], cages: &[Vec<usize>]) -> Layout {
    let bonds = bonds(molecule);
    let mut blocks: Vec<Block> = cages
        .iter()
        .map(|atoms| {
            let projection = cage::layout(atoms.len(), &inner_bonds(molecule, atoms));
            Block {
                atoms: atoms.clone(),
                points: projection.points,
                depths: projection.depths,
            }
        })
        .collect();
    // Largest first; equal ones keep their order.
    blocks.sort_by_key(|block| std::cmp::Reverse(block.atoms.len()));
    blocks.extend(rests(&bonds, flat, cages));

    let mut assembly = Assembly {
        bonds: &bonds,
        flat,
        placed: vec![None; flat.len()],
        depths: vec![0.0; flat.len()],
    };
    if !blocks.is_empty() {
        let root = blocks.remove(0);
        for (i, &atom) in root.atoms.iter().enumerate() {
            assembly.placed[atom] = Some(root.points[i]);
            assembly.depths[atom] = root.depths[i];
        }
    }
    while let Some((index, bond)) = assembly.next(&blocks) {
        let block = blocks.remove(index);
        assembly.hang(&block, bond);
    }
    Layout {
        points: assembly
            .placed
            .into_iter()
            .map(Option::unwrap_or_default)
            .collect(),
        depths: assembly.depths,
    }
}

/// Connected parts outside all cages, as they lie in the flat layout.
fn rests(bonds: &[[usize; 2]], flat: &[Point], cages: &[Vec<usize>]) -> Vec<Block> {
    let mut seen: Vec<bool> = (0..flat.len())
        .map(|atom| cages.iter().any(|cage| cage.contains(&atom)))
        .collect();
    let mut blocks = Vec::new();
    for start in 0..flat.len() {
        if seen[start] {
            continue;
        }
        seen[start] = true;
        let mut atoms = vec![start];
        let mut next = 0;
        while let Some(&atom) = atoms.get(next) {
            next += 1;
            for &[a, b] in bonds {
                let other = if a == atom { b } else { a };
                if (a == atom || b == atom) && !seen[other] {
                    seen[other] = true;
                    atoms.push(other);
                }
            }
        }
        blocks.push(Block {
            points: atoms.iter().map(|&atom| flat[atom]).collect(),
            depths: vec![0.0; atoms.len()],
            atoms,
        });
    }
    blocks
}

struct Assembly<'a> {
    bonds: &'a [[usize; 2]],
    flat: &'a [Point],
    placed: Vec<Option<Point>>,
    depths: Vec<f64>,
}

impl Assembly<'_> {
    /// The next block with a bond to what is placed, and that bond, placed end first.
    fn next(&self, blocks: &[Block]) -> Option<(usize, [usize; 2])> {
        self.bonds.iter().find_map(|&[a, b]| {
            let [inner, outer] = match (self.placed[a], self.placed[b]) {
                (Some(_), None) => [a, b],
                (None, Some(_)) => [b, a],
                _ => return None,
            };
            let index = blocks
                .iter()
                .position(|block| block.atoms.contains(&outer))?;
            Some((index, [inner, outer]))
        })
    }

    fn hang(&mut self, block: &Block, [inner, outer]: [usize; 2]) {
        let Some(anchor) = self.placed[inner] else {
            return;
        };
        let Some(foot) = block.atoms.iter().position(|&atom| atom == outer) else {
            return;
        };
        let back = self.way_back(block, foot, inner);
        let mut best: Option<(f64, Vec<Point>)> = None;
        for bond_length in LENGTHS {
            for mirror in [1.0, -1.0] {
                for step in 0..DIRECTIONS {
                    let out = TAU * step as f64 / DIRECTIONS as f64;
                    // After mirroring and turning, the way back to the anchor points against `out`.
                    let turn = out + TAU / 2.0 - mirror * back;
                    let (sin, cos) = turn.sin_cos();
                    let foot_at = [
                        anchor[0] + bond_length * out.cos(),
                        anchor[1] + bond_length * out.sin(),
                    ];
                    let points: Vec<Point> = block
                        .points
                        .iter()
                        .map(|p| {
                            let x = p[0] - block.points[foot][0];
                            let y = mirror * (p[1] - block.points[foot][1]);
                            [
                                foot_at[0] + cos * x - sin * y,
                                foot_at[1] + sin * x + cos * y,
                            ]
                        })
                        .collect();
                    let score = self.room(block, &points, inner, foot) - 0.5 * (bond_length - 1.0);
                    if best
                        .as_ref()
                        .is_none_or(|(highest, _)| score > *highest + 1e-9)
                    {
                        best = Some((score, points));
                    }
                }
            }
        }
        if let Some((_, points)) = best {
            for (i, &atom) in block.atoms.iter().enumerate() {
                self.placed[atom] = Some(points[i]);
                // What hangs on a cage is as far away as the atom that holds it.
                self.depths[atom] = block.depths[i] + self.depths[inner];
            }
        }
    }

    /// The direction from the foot of a block to the atom that it hangs on: as in the flat layout, or, for a cage, away from its middle.
    fn way_back(&self, block: &Block, foot: usize, inner: usize) -> f64 {
        let from = block.points[foot];
        let is_flat = distance(from, self.flat[block.atoms[foot]]) < 1e-9;
        let to = if is_flat {
            self.flat[inner]
        } else {
            let n = block.points.len() as f64;
            let sum = block
                .points
                .iter()
                .fold([0.0; 2], |s, p| [s[0] + p[0], s[1] + p[1]]);
            [2.0 * from[0] - sum[0] / n, 2.0 * from[1] - sum[1] / n]
        };
        (to[1] - from[1]).atan2(to[0] - from[0])
    }

    /// How much room a block has: distance to atoms and bonds, less for every bond crossed, a little for leaving the middle.
    fn room(&self, block: &Block, points: &[Point], inner: usize, foot: usize) -> f64 {
        let anchor = self.placed[inner].unwrap_or_default();
        let mut room = 1.2_f64;
        let mut crossed = 0;
        let mut middle = [0.0; 2];
        let mut count = 0.0;
        for (atom, &place) in self.placed.iter().enumerate() {
            let Some(place) = place else { continue };
            middle = [middle[0] + place[0], middle[1] + place[1]];
            count += 1.0;
            for &p in points {
                if atom != inner {
                    room = room.min(distance(p, place));
                }
            }
            if atom != inner {
                room = room.min(1.6 * to_segment(place, anchor, points[foot]));
            }
        }
        for &[a, b] in self.bonds {
            let (Some(p), Some(q)) = (self.placed[a], self.placed[b]) else {
                continue;
            };
            for &point in points {
                room = room.min(1.6 * to_segment(point, p, q));
            }
            if a != inner && b != inner && crossing([p, q], [anchor, points[foot]]).is_some() {
                crossed += 1;
            }
            crossed += self.crossed_inside(block, points, [p, q]);
        }
        let outward = distance(points[foot], [middle[0] / count, middle[1] / count]);
        room - 0.4 * f64::from(crossed) + 0.1 * outward
    }

    fn crossed_inside(&self, block: &Block, points: &[Point], segment: [Point; 2]) -> u32 {
        let place = |atom: usize| {
            block
                .atoms
                .iter()
                .position(|&a| a == atom)
                .map(|i| points[i])
        };
        let inner = self
            .bonds
            .iter()
            .filter_map(|&[a, b]| Some([place(a)?, place(b)?]));
        inner
            .filter(|&bond| crossing(segment, bond).is_some())
            .count() as u32
    }
}

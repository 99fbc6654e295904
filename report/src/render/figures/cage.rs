//! Layouts of cages: stress majorisation of graph distances in space, then the view in which least overlaps.
//!
//! Everything starts from fixed points and runs a fixed number of steps, so the same molecule gives the same picture.

use std::collections::VecDeque;
use std::f64::consts::{PI, TAU};

use super::canvas::Point;
use super::overlap::{Legibility, distance};

/// A cage in the plane.
#[derive(Clone, Debug)]
pub(super) struct Projection {
    /// The atoms; the mean bond is about 1 long.
    pub(super) points: Vec<Point>,
    /// Distance from the eye, larger is farther.
    pub(super) depths: Vec<f64>,
}

const STARTS: usize = 6;
const STEPS: usize = 250;
const VIEWS: usize = 1200;

/// Draws a connected set of atoms, numbered from 0, that is bonded so.
pub(super) fn layout(atoms: usize, bonds: &[[usize; 2]]) -> Projection {
    let targets = targets(atoms, bonds);
    let best = (0..STARTS)
        .map(|start| majorised(spiral(atoms, start), &targets))
        .min_by(|a, b| a.1.total_cmp(&b.1));
    let space = best.map_or_else(Vec::new, |(space, _)| space);
    upright(best_view(&space, bonds), bonds)
}

/// Wanted distances in bond lengths.
///
/// Bonded atoms 1; atoms with a common neighbour as in a square or a tetrahedral angle; farther ones less than their path, since cages curl.
fn targets(atoms: usize, bonds: &[[usize; 2]]) -> Vec<Vec<f64>> {
    let mut neighbours = vec![Vec::new(); atoms];
    for &[a, b] in bonds {
        neighbours[a].push(b);
        neighbours[b].push(a);
    }
    let common = |a: usize, b: usize| {
        neighbours[a]
            .iter()
            .filter(|&n| neighbours[b].contains(n))
            .count()
    };
    (0..atoms)
        .map(|from| {
            let steps = steps_from(from, &neighbours);
            (0..atoms)
                .map(|to| match steps[to] {
                    0 => 0.0,
                    1 => 1.0,
                    2 if common(from, to) > 1 => std::f64::consts::SQRT_2,
                    2 => 1.62,
                    path => f64::from(path).powf(0.75),
                })
                .collect()
        })
        .collect()
}

fn steps_from(from: usize, neighbours: &[Vec<usize>]) -> Vec<u32> {
    let mut steps = vec![u32::MAX; neighbours.len()];
    steps[from] = 0;
    let mut queue = VecDeque::from([from]);
    while let Some(atom) = queue.pop_front() {
        for &next in &neighbours[atom] {
            if steps[next] == u32::MAX {
                steps[next] = steps[atom] + 1;
                queue.push_back(next);
            }
        }
    }
    steps
}

/// Points spread over a sphere; each start deals the atoms out in another order.
fn spiral(atoms: usize, start: usize) -> Vec<[f64; 3]> {
    let golden = PI * (3.0 - 5.0_f64.sqrt());
    (0..atoms)
        .map(|index| {
            let place = (index * (2 * start + 1) + start) % atoms;
            let z = 1.0 - 2.0 * (place as f64 + 0.5) / atoms as f64;
            let radius = (1.0 - z * z).sqrt();
            // The index tells apart atoms that were dealt the same place.
            let angle = golden * place as f64 + 0.1 * index as f64;
            [radius * angle.cos(), radius * angle.sin(), z]
        })
        .collect()
}

/// Local stress majorisation: each atom in turn goes to the weighted mean of where the others want it. Returns the stress that remains.
fn majorised(mut points: Vec<[f64; 3]>, targets: &[Vec<f64>]) -> (Vec<[f64; 3]>, f64) {
    let weight = |target: f64| target.powi(-4);
    for _ in 0..STEPS {
        for i in 0..points.len() {
            let mut sum = [0.0; 3];
            let mut weights = 0.0;
            for (j, &there) in points.iter().enumerate().filter(|&(j, _)| j != i) {
                let apart = length(minus(points[i], there)).max(1e-6);
                let target = targets[i][j];
                let w = weight(target);
                for axis in 0..3 {
                    sum[axis] +=
                        w * (there[axis] + target * (points[i][axis] - there[axis]) / apart);
                }
                weights += w;
            }
            if weights > 0.0 {
                points[i] = sum.map(|x| x / weights);
            }
        }
    }
    let mut stress = 0.0;
    for (i, &p) in points.iter().enumerate() {
        for (j, &q) in points.iter().enumerate().take(i) {
            let off = length(minus(p, q)) - targets[i][j];
            stress += weight(targets[i][j]) * off * off;
        }
    }
    (points, stress)
}

/// The parallel projection, of many, that can be read best.
fn best_view(space: &[[f64; 3]], bonds: &[[usize; 2]]) -> Projection {
    let golden = PI * (3.0 - 5.0_f64.sqrt());
    let views = (0..VIEWS).map(|view| {
        let z = (view as f64 + 0.5) / VIEWS as f64;
        let radius = (1.0 - z * z).sqrt();
        let angle = golden * view as f64;
        [radius * angle.cos(), radius * angle.sin(), z]
    });
    let mut best: Option<(f64, Projection)> = None;
    for eye in views {
        let projection = projected(space, eye, bonds);
        let score = score(&projection.points, bonds);
        if best.as_ref().is_none_or(|(highest, _)| score > *highest) {
            best = Some((score, projection));
        }
    }
    best.map_or_else(
        || projected(space, [0.0, 0.0, 1.0], bonds),
        |(_, projection)| projection,
    )
}

fn projected(space: &[[f64; 3]], eye: [f64; 3], bonds: &[[usize; 2]]) -> Projection {
    let helper = if eye[2].abs() < 0.9 {
        [0.0, 0.0, 1.0]
    } else {
        [1.0, 0.0, 0.0]
    };
    let right = unit(cross(helper, eye));
    let up = cross(eye, right);
    let mut points: Vec<Point> = space
        .iter()
        .map(|&p| [dot(p, right), -dot(p, up)])
        .collect();
    let lengths = || bonds.iter().map(|&[a, b]| distance(points[a], points[b]));
    let mean = lengths().sum::<f64>() / bonds.len().max(1) as f64;
    // The mean bond gets length 1, or more where that leaves the most foreshortened one too short.
    let shortest = lengths().fold(mean, f64::min).max(0.45 * mean);
    let scale = if mean > 0.0 {
        (0.7 / shortest).max(1.0 / mean)
    } else {
        1.0
    };
    for x in points.as_flattened_mut() {
        *x *= scale;
    }
    Projection {
        points,
        depths: space.iter().map(|&p| -dot(p, eye)).collect(),
    }
}

/// Room between atoms and bonds counts most, then bonds that are neither foreshortened away nor in line with each other (an atom that
/// seems to lie on a straight line is not seen), then few crossings and bonds alike in length.
fn score(points: &[Point], bonds: &[[usize; 2]]) -> f64 {
    let found = Legibility::of(points, bonds);
    let (sharpest, straightest) = angles(points, bonds);
    3.0 * found.atoms.min(0.7)
        + 5.0 * found.atom_to_bond.min(0.4)
        + 2.0 * found.shortest.min(0.85)
        + 1.5 * sharpest.min(0.7)
        + 2.0 * (PI - straightest).min(0.5)
        - 0.12 * found.crossings as f64
        - 0.3 * (found.longest / found.shortest.max(1e-6) - 1.0).min(3.0)
}

/// The smallest angle between two bonds of one atom, and the largest at an atom of two bonds, rad.
fn angles(points: &[Point], bonds: &[[usize; 2]]) -> (f64, f64) {
    let (mut sharpest, mut straightest) = (PI, 0.0_f64);
    for (atom, &at) in points.iter().enumerate() {
        let others: Vec<usize> = bonds
            .iter()
            .filter_map(|&[a, b]| match atom {
                _ if a == atom => Some(b),
                _ if b == atom => Some(a),
                _ => None,
            })
            .collect();
        for (i, &first) in others.iter().enumerate() {
            for &second in &others[..i] {
                let [p, q] = [first, second].map(|n| [points[n][0] - at[0], points[n][1] - at[1]]);
                let angle = (p[0] * q[1] - p[1] * q[0])
                    .abs()
                    .atan2(p[0] * q[0] + p[1] * q[1]);
                sharpest = sharpest.min(angle);
                if others.len() == 2 {
                    straightest = straightest.max(angle);
                }
            }
        }
    }
    (sharpest, straightest)
}

/// Turns the picture so that its bonds run level and upright as far as they can.
fn upright(projection: Projection, bonds: &[[usize; 2]]) -> Projection {
    let level = |turn: f64| -> f64 {
        bonds
            .iter()
            .map(|&[a, b]| {
                let (p, q) = (projection.points[a], projection.points[b]);
                let (dx, dy) = (q[0] - p[0], q[1] - p[1]);
                dx.hypot(dy) * (4.0 * (dy.atan2(dx) + turn)).cos()
            })
            .sum()
    };
    let turn = (0..90)
        .map(|step| TAU / 4.0 * f64::from(step) / 90.0)
        .max_by(|a, b| level(*a).total_cmp(&level(*b)))
        .unwrap_or(0.0);
    let (sin, cos) = turn.sin_cos();
    Projection {
        points: projection
            .points
            .iter()
            .map(|&[x, y]| [cos * x - sin * y, sin * x + cos * y])
            .collect(),
        depths: projection.depths,
    }
}

fn minus(a: [f64; 3], b: [f64; 3]) -> [f64; 3] {
    [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
}

fn dot(a: [f64; 3], b: [f64; 3]) -> f64 {
    a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

fn cross(a: [f64; 3], b: [f64; 3]) -> [f64; 3] {
    [
        a[1] * b[2] - a[2] * b[1],
        a[2] * b[0] - a[0] * b[2],
        a[0] * b[1] - a[1] * b[0],
    ]
}

fn length(a: [f64; 3]) -> f64 {
    dot(a, a).sqrt()
}

fn unit(a: [f64; 3]) -> [f64; 3] {
    let length = length(a).max(1e-12);
    a.map(|x| x / length)
}

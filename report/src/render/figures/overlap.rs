//! How well a layout can be read: atoms on atoms, atoms on bonds, bonds across bonds.

use super::canvas::Point;

/// What spoils a layout, lengths in bond lengths.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Legibility {
    /// Least distance between two atoms.
    pub(super) atoms: f64,
    /// Least distance of an atom to a bond that it is no end of.
    pub(super) atom_to_bond: f64,
    /// Shortest bond.
    pub(super) shortest: f64,
    /// Longest bond.
    pub(super) longest: f64,
    /// Pairs of bonds that cross.
    pub(super) crossings: usize,
}

impl Legibility {
    pub(super) fn of(points: &[Point], bonds: &[[usize; 2]]) -> Self {
        let mut found = Self {
            atoms: f64::INFINITY,
            atom_to_bond: f64::INFINITY,
            shortest: f64::INFINITY,
            longest: 0.0,
            crossings: 0,
        };
        for (i, &p) in points.iter().enumerate() {
            for &q in &points[..i] {
                found.atoms = found.atoms.min(distance(p, q));
            }
        }
        for (index, &[a, b]) in bonds.iter().enumerate() {
            let length = distance(points[a], points[b]);
            found.shortest = found.shortest.min(length);
            found.longest = found.longest.max(length);
            for (i, &p) in points.iter().enumerate() {
                if i != a && i != b {
                    found.atom_to_bond =
                        found.atom_to_bond.min(to_segment(p, points[a], points[b]));
                }
            }
            for &[c, d] in &bonds[..index] {
                if ![c, d].contains(&a)
                    && ![c, d].contains(&b)
                    && crossing([points[a], points[b]], [points[c], points[d]]).is_some()
                {
                    found.crossings += 1;
                }
            }
        }
        found
    }

    /// Whether nothing lies on anything else and bonds are about as long as each other.
    pub(super) fn is_clean(&self) -> bool {
        self.crossings == 0
            && self.atoms > 0.5
            && self.atom_to_bond > 0.3
            && self.shortest > 0.6
            && self.longest < 1.7
    }
}

pub(super) fn distance(p: Point, q: Point) -> f64 {
    (p[0] - q[0]).hypot(p[1] - q[1])
}

/// Distance of a point to a segment.
pub(super) fn to_segment(p: Point, a: Point, b: Point) -> f64 {
    let along = [b[0] - a[0], b[1] - a[1]];
    let square = along[0] * along[0] + along[1] * along[1];
    if square < 1e-12 {
        return distance(p, a);
    }
    let t = ((p[0] - a[0]) * along[0] + (p[1] - a[1]) * along[1]) / square;
    let t = t.clamp(0.0, 1.0);
    distance(p, [a[0] + t * along[0], a[1] + t * along[1]])
}

/// Where two segments cross, as the parameter along each.
pub(super) fn crossing([a, b]: [Point; 2], [c, d]: [Point; 2]) -> Option<(f64, f64)> {
    let r = [b[0] - a[0], b[1] - a[1]];
    let s = [d[0] - c[0], d[1] - c[1]];
    let determinant = r[0] * s[1] - r[1] * s[0];
    if determinant.abs() < 1e-9 {
        return None;
    }
    let w = [c[0] - a[0], c[1] - a[1]];
    let t = (w[0] * s[1] - w[1] * s[0]) / determinant;
    let u = (w[0] * r[1] - w[1] * r[0]) / determinant;
    ((0.0..=1.0).contains(&t) && (0.0..=1.0).contains(&u)).then_some((t, u))
}

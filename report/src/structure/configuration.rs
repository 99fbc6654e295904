//! Configurations told from coordinates: wedges of a drawing, or a three-dimensional geometry.

use tautring_core::molecule::{
    Atom, BondOrder, DoubleBondStereo, Element, Ligand, TetrahedralStereo,
};

/// A position, Å; also a direction.
pub(super) type Point = [f64; 3];

/// Volume spanned by unit vectors below which four ligands count as lying in a plane; a regular tetrahedron spans 3.1, an sp2 atom that
/// a crystal structure bent by ten degrees 0.5.
const FLAT: f64 = 0.5;

/// Sine of the angle below which three atoms count as lying on a line (about three degrees).
const STRAIGHT: f64 = 0.05;

/// A bond as it stands in the record.
#[derive(Clone, Copy)]
pub(super) struct DrawnBond {
    pub(super) atoms: [usize; 2],
    pub(super) order: BondOrder,
    /// Towards the viewer (1), away (-1) or in the plane (0), seen from the first atom; two dimensions only.
    pub(super) wedge: i8,
    /// Drawn wavy or crossed: the configuration is left open on purpose.
    pub(super) either: bool,
}

/// A record's atoms, bonds and positions.
pub(super) struct Drawing<'a> {
    pub(super) atoms: &'a [Atom],
    pub(super) bonds: &'a [DrawnBond],
    pub(super) positions: &'a [Point],
    pub(super) three_dimensional: bool,
}

impl Drawing<'_> {
    /// The configuration of a tetrahedral atom; none where it is not drawn, flat, or no tetrahedral atom.
    pub(super) fn tetrahedral(&self, centre: usize) -> Option<TetrahedralStereo> {
        let atom = *self.atoms.get(centre)?;
        let around: Vec<&DrawnBond> = self.around(centre).collect();
        let wavy = around
            .iter()
            .any(|b| b.either && b.order == BondOrder::Single && b.atoms[0] == centre);
        if wavy || atom.hydrogens > 1 || !is_tetrahedral(atom, &around) {
            return None;
        }
        let marked = around.iter().any(|b| b.wedge != 0 && b.atoms[0] == centre);
        if !self.three_dimensional && !marked {
            return None;
        }
        let mut directions: Vec<Point> = Vec::with_capacity(4);
        let mut ligands: Vec<Ligand> = Vec::with_capacity(4);
        for bond in &around {
            let other = other(bond, centre);
            let mut direction = self.direction(centre, other)?;
            if !self.three_dimensional && bond.atoms[0] == centre {
                // A wedge rises out of the paper as steeply as a bond of a tetrahedron seen along its axis.
                direction[2] = f64::from(bond.wedge);
            }
            directions.push(unit(direction)?);
            ligands.push(Ligand::Atom(other as u16));
        }
        if ligands.len() == 3 {
            let sum = directions.iter().fold([0.0; 3], |sum, d| add(sum, *d));
            // Three ligands in a plane through the centre leave no side for the fourth, unless a wedge shows it.
            directions.push(unit(sum.map(|x| -x)).unwrap_or([0.0; 3]));
            ligands.push(Ligand::Implicit);
        }
        let [a, b, c, d]: [Point; 4] = directions.try_into().ok()?;
        let volume = dot(sub(a, d), cross(sub(b, d), sub(c, d)));
        let flat = if self.three_dimensional { FLAT } else { 1e-3 };
        if volume.abs() < flat {
            return None;
        }
        Some(TetrahedralStereo {
            centre: centre as u16,
            ligands: ligands.try_into().ok()?,
            // Seen from a, the others run clockwise when (b - d, c - d) turns against a.
            clockwise: volume < 0.0,
        })
    }

    /// The configuration of a double bond; none where an end is straight or has no neighbour, or the bond is crossed.
    pub(super) fn double_bond(&self, bond: &DrawnBond) -> Option<DoubleBondStereo> {
        let [a, b] = bond.atoms;
        if bond.order != BondOrder::Double || bond.either {
            return None;
        }
        let end = |at: usize, partner: usize| {
            let around: Vec<&DrawnBond> = self.around(at).collect();
            let wavy = around
                .iter()
                .any(|b| b.either && b.order == BondOrder::Single);
            let cumulated = around
                .iter()
                .filter(|b| b.order != BondOrder::Single)
                .count()
                > 1;
            if wavy || cumulated {
                return None;
            }
            let mut others = around
                .iter()
                .map(|b| other(b, at))
                .filter(|&o| o != partner);
            others.next()
        };
        let (first, second) = (end(a, b)?, end(b, a)?);
        let axis = unit(self.direction(a, b)?)?;
        let across = |from: usize, to: usize| {
            let direction = unit(self.direction(from, to)?)?;
            let along = dot(direction, axis);
            let perpendicular = sub(direction, axis.map(|x| x * along));
            (dot(perpendicular, perpendicular) > STRAIGHT * STRAIGHT).then_some(perpendicular)
        };
        let side = dot(across(a, first)?, across(b, second)?);
        Some(DoubleBondStereo {
            first_reference: first as u16,
            second_reference: second as u16,
            same_side: side > 0.0,
        })
    }

    fn around(&self, atom: usize) -> impl Iterator<Item = &DrawnBond> {
        self.bonds.iter().filter(move |b| b.atoms.contains(&atom))
    }

    fn direction(&self, from: usize, to: usize) -> Option<Point> {
        let mut direction = sub(*self.positions.get(to)?, *self.positions.get(from)?);
        if !self.three_dimensional {
            direction[2] = 0.0;
            direction = unit(direction)?;
        }
        Some(direction)
    }
}

/// Four ligands in a tetrahedron, one of which may be a hydrogen or, on sulfur and phosphorus, the lone pair.
fn is_tetrahedral(atom: Atom, around: &[&DrawnBond]) -> bool {
    let saturated = around.iter().all(|b| b.order == BondOrder::Single);
    let ligands = around.len() + usize::from(atom.hydrogens);
    match atom.element {
        Element::S | Element::P => matches!(ligands, 3 | 4) && around.len() >= 3,
        _ => saturated && ligands == 4 && around.len() >= 3,
    }
}

fn other(bond: &DrawnBond, atom: usize) -> usize {
    if bond.atoms[0] == atom {
        bond.atoms[1]
    } else {
        bond.atoms[0]
    }
}

fn add(a: Point, b: Point) -> Point {
    [a[0] + b[0], a[1] + b[1], a[2] + b[2]]
}

fn sub(a: Point, b: Point) -> Point {
    [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
}

fn dot(a: Point, b: Point) -> f64 {
    a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

fn cross(a: Point, b: Point) -> Point {
    [
        a[1] * b[2] - a[2] * b[1],
        a[2] * b[0] - a[0] * b[2],
        a[0] * b[1] - a[1] * b[0],
    ]
}

/// The vector at length one; none for a vector of no length.
fn unit(a: Point) -> Option<Point> {
    let length = dot(a, a).sqrt();
    (length > 1e-6).then(|| a.map(|x| x / length))
}

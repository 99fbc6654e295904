//! Geometry, bend and torsion against numerical derivatives and against what no rotation may change.
//!
//! Chains of four atoms are drawn at random: bonds of 1.0 to 1.8 Å, angles of 100 to 125 degrees (where every bend
//! form has its range), any dihedral angle. The seed is fixed and printed.

use std::f64::consts::{PI, TAU};

use tautring_core::geometry::{Vector, angle, angle_cosine, dihedral, distance};
use tautring_core::mechanics::{Bend, BendForceConstant, EnergyAndGradient, Torsion};

const SEED: u64 = 20_260_901;
const CHAINS: usize = 500;

/// Step of the central differences, Å or rad.
///
/// Fourth-order differences leave h⁴/30 times the fifth derivative (at most some 1e6 here: 3e-10) and rounding of
/// the energies, some 1e-14 divided by h (5e-11): both far below the tolerance.
const STEP: f64 = 3e-4;

/// Largest difference of analytic and numerical derivative, relative to the larger of 1 and the derivative.
///
/// Ten times and more what the step leaves; a wrong sign, factor or term shows as 1e-3 or more.
const DERIVATIVE_TOLERANCE: f64 = 1e-8;

/// Largest residue where exact arithmetic gives zero, relative to the larger of 1 and the numbers that cancel.
///
/// Some hundred roundings of 1e-16 each, on quotients of up to 100.
const ROUNDING_TOLERANCE: f64 = 1e-11;

/// `SplitMix64`: small, and the same everywhere.
struct Random(u64);

impl Random {
    fn unit(&mut self) -> f64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        ((z ^ (z >> 31)) >> 11) as f64 / (1_u64 << 53) as f64
    }

    fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * self.unit()
    }

    /// Rotation matrix, by rows, of a random unit quaternion.
    fn rotation(&mut self) -> [Vector; 3] {
        let q: [f64; 4] = core::array::from_fn(|_| self.between(-1.0, 1.0));
        let norm = q.iter().map(|c| c * c).sum::<f64>().sqrt();
        let [w, x, y, z] = q.map(|c| c / norm);
        [
            Vector::new(
                1.0 - 2.0 * (y * y + z * z),
                2.0 * (x * y - w * z),
                2.0 * (x * z + w * y),
            ),
            Vector::new(
                2.0 * (x * y + w * z),
                1.0 - 2.0 * (x * x + z * z),
                2.0 * (y * z - w * x),
            ),
            Vector::new(
                2.0 * (x * z - w * y),
                2.0 * (y * z + w * x),
                1.0 - 2.0 * (x * x + y * y),
            ),
        ]
    }

    /// A chain of four atoms with the given dihedral angle, somewhere in space.
    fn chain(&mut self, omega: f64) -> [Vector; 4] {
        let [r1, r2, r3] = core::array::from_fn(|_| self.between(1.0, 1.8));
        let [t1, t2] = core::array::from_fn(|_| self.between(100.0, 125.0).to_radians());
        // Looking down the z axis from above, with the front atom up (+y): clockwise is towards +x.
        let upright = [
            Vector::new(0.0, r1 * t1.sin(), r2 - r1 * t1.cos()),
            Vector::new(0.0, 0.0, r2),
            Vector::ZERO,
            Vector::new(
                r3 * t2.sin() * omega.sin(),
                r3 * t2.sin() * omega.cos(),
                r3 * t2.cos(),
            ),
        ];
        let rotation = self.rotation();
        let shift = Vector::new(self.between(-5.0, 5.0), self.between(-5.0, 5.0), 1.0);
        upright.map(|p| rotated(rotation, p) + shift)
    }
}

fn rotated([x, y, z]: [Vector; 3], p: Vector) -> Vector {
    Vector::new(x.dot(p), y.dot(p), z.dot(p))
}

fn moved<const N: usize>(mut p: [Vector; N], atom: usize, axis: usize, by: f64) -> [Vector; N] {
    let mut coordinates: [f64; 3] = p[atom].into();
    coordinates[axis] += by;
    p[atom] = coordinates.into();
    p
}

/// Fourth-order central difference of a function of one variable at 0.
fn slope(f: impl Fn(f64) -> f64) -> f64 {
    (8.0 * (f(STEP) - f(-STEP)) - (f(2.0 * STEP) - f(-2.0 * STEP))) / (12.0 * STEP)
}

fn assert_close(analytic: f64, numerical: f64, tolerance: f64, what: &str) {
    let scale = analytic.abs().max(1.0);
    assert!(
        (analytic - numerical).abs() <= tolerance * scale,
        "{what}: analytic {analytic}, numerical {numerical} (seed {SEED})"
    );
}

/// Analytic against numerical gradient; `f` gives the value near the positions.
fn check_gradient<const N: usize>(
    positions: [Vector; N],
    gradient: [Vector; N],
    f: impl Fn([Vector; N]) -> f64,
    what: &str,
) {
    for (atom, g) in gradient.into_iter().enumerate() {
        for (axis, analytic) in <[f64; 3]>::from(g).into_iter().enumerate() {
            let numerical = slope(|h| f(moved(positions, atom, axis, h)));
            assert_close(analytic, numerical, DERIVATIVE_TOLERANCE, what);
        }
    }
}

fn largest<const N: usize>(gradient: [Vector; N]) -> f64 {
    gradient.map(Vector::norm).into_iter().fold(1.0, f64::max)
}

/// No net force and no net torque.
fn check_balance<const N: usize>(positions: [Vector; N], gradient: [Vector; N], what: &str) {
    let limit = ROUNDING_TOLERANCE * largest(gradient);
    let force = gradient.into_iter().fold(Vector::ZERO, |sum, g| sum + g);
    let torque = positions
        .into_iter()
        .zip(gradient)
        .fold(Vector::ZERO, |sum, (p, g)| sum + p.cross(g));
    assert!(force.norm() <= limit, "{what}: force {force:?} ({SEED})");
    assert!(torque.norm() <= limit, "{what}: torque {torque:?} ({SEED})");
}

/// Turning and shifting the atoms turns the gradient and leaves the energy.
fn check_rotation<const N: usize>(
    random: &mut Random,
    positions: [Vector; N],
    f: impl Fn([Vector; N]) -> EnergyAndGradient<N>,
) {
    let rotation = random.rotation();
    let shift = Vector::new(3.0, -2.0, 1.0);
    let here = f(positions);
    let there = f(positions.map(|p| rotated(rotation, p) + shift));
    let (e, f) = (here.energy_kj_per_mol, there.energy_kj_per_mol);
    assert_close(e, f, ROUNDING_TOLERANCE, "energy after a rotation");
    let limit = ROUNDING_TOLERANCE * largest(here.gradient_kj_per_mol_angstrom);
    let before = here.gradient_kj_per_mol_angstrom.into_iter();
    for (a, b) in before.zip(there.gradient_kj_per_mol_angstrom) {
        let residue = (rotated(rotation, a) - b).norm();
        assert!(residue <= limit, "turned gradient: {residue} ({SEED})");
    }
}

/// Dihedral angle counted from `origin`, so that the jump at pi does not enter a difference.
fn dihedral_from(origin: f64, positions: [Vector; 4]) -> f64 {
    let difference = dihedral(positions).unwrap().dihedral_rad - origin;
    difference - TAU * (difference / TAU).round()
}

/// Every bend form about a reference angle.
fn bends(reference_rad: f64) -> [(&'static str, Bend); 5] {
    let k = BendForceConstant::from_mdyn_angstrom_per_rad2(1.0).unwrap();
    [
        ("harmonic", Bend::harmonic(k, reference_rad).unwrap()),
        ("cubic", Bend::cubic(0.85, reference_rad).unwrap()),
        (
            "quartic",
            Bend::quartic([170.0, -40.0, 25.0], reference_rad).unwrap(),
        ),
        ("sextic", Bend::sextic(0.45, reference_rad).unwrap()),
        (
            "sextic series",
            Bend::sextic_series(0.67, reference_rad).unwrap(),
        ),
    ]
}

#[test]
fn geometry_against_central_differences() {
    let mut random = Random(SEED);
    for _ in 0..CHAINS {
        let omega = random.between(-180.0, 180.0).to_radians();
        let chain = random.chain(omega);
        let [a, b, c, _] = chain;

        let r = distance([a, b]).unwrap();
        let value = |p| distance(p).unwrap().distance_angstrom;
        check_gradient([a, b], r.gradient, value, "distance");
        check_balance([a, b], r.gradient, "distance");

        let gradient = angle([a, b, c]).unwrap().gradient_rad_per_angstrom;
        let value = |p| angle(p).unwrap().angle_rad;
        check_gradient([a, b, c], gradient, value, "angle");
        check_balance([a, b, c], gradient, "angle");

        let gradient = angle_cosine([a, b, c])
            .unwrap()
            .cosine_gradient_per_angstrom;
        let value = |p| angle_cosine(p).unwrap().angle_rad.cos();
        check_gradient([a, b, c], gradient, value, "cosine");
        check_balance([a, b, c], gradient, "cosine");

        let found = dihedral(chain).unwrap();
        let gradient = found.gradient_rad_per_angstrom;
        assert_close(omega, found.dihedral_rad, ROUNDING_TOLERANCE, "dihedral");
        let value = |p| dihedral_from(found.dihedral_rad, p);
        check_gradient(chain, gradient, value, "dihedral");
        check_balance(chain, gradient, "dihedral");
    }
}

#[test]
fn dihedral_derivatives_hold_at_planar_arrangements() {
    let mut random = Random(SEED);
    for omega in [0.0, PI] {
        for _ in 0..50 {
            let chain = random.chain(omega);
            let found = dihedral(chain).unwrap();
            let value = |p| dihedral_from(found.dihedral_rad, p);
            check_gradient(chain, found.gradient_rad_per_angstrom, value, "planar");
        }
    }
}

#[test]
fn bends_on_atoms() {
    let mut random = Random(SEED);
    for _ in 0..CHAINS {
        let [a, b, c, _] = random.chain(1.0);
        let positions = [a, b, c];
        let departure = random.between(-14.0, 14.0).to_radians();
        let reference = angle(positions).unwrap().angle_rad - departure;
        for (name, bend) in bends(reference) {
            let energy = |p| bend.energy_and_gradient(p).unwrap();
            let gradient = energy(positions).gradient_kj_per_mol_angstrom;
            check_gradient(positions, gradient, |p| energy(p).energy_kj_per_mol, name);
            check_balance(positions, gradient, name);
            check_rotation(&mut random, positions, energy);
            assert_eq!(
                energy([c, b, a]).energy_kj_per_mol.to_bits(),
                energy(positions).energy_kj_per_mol.to_bits(),
                "{name} read backwards"
            );
        }
    }
}

#[test]
fn linear_bend_on_atoms_up_to_straight() {
    let mut random = Random(SEED);
    let bend = Bend::linear(0.4).unwrap();
    let energy = |p| bend.energy_and_gradient(p).unwrap();
    for degrees in [152.0_f64, 165.0, 179.0, 179.999, 180.0] {
        for _ in 0..20 {
            let theta = degrees.to_radians();
            let rotation = random.rotation();
            let positions = [
                Vector::new(1.2, 0.0, 0.0),
                Vector::ZERO,
                Vector::new(1.46 * theta.cos(), 1.46 * theta.sin(), 0.0),
            ]
            .map(|p| rotated(rotation, p));
            let gradient = energy(positions).gradient_kj_per_mol_angstrom;
            let value = |p| energy(p).energy_kj_per_mol;
            check_gradient(positions, gradient, value, "linear");
            check_balance(positions, gradient, "linear");
            check_rotation(&mut random, positions, energy);
        }
    }
}

#[test]
fn torsions_on_atoms() {
    let mut random = Random(SEED);
    for _ in 0..CHAINS {
        let omega = random.between(-180.0, 180.0).to_radians();
        let positions = random.chain(omega);
        let barriers = core::array::from_fn(|_| random.between(-20.0, 20.0));
        let torsion = Torsion::new(barriers).unwrap();
        let energy = |p| torsion.energy_and_gradient(p).unwrap();
        let gradient = energy(positions).gradient_kj_per_mol_angstrom;
        let value = |p| energy(p).energy_kj_per_mol;
        check_gradient(positions, gradient, value, "torsion");
        check_balance(positions, gradient, "torsion");
        check_rotation(&mut random, positions, energy);
        let [a, b, c, d] = positions;
        assert_eq!(
            energy([d, c, b, a]).energy_kj_per_mol.to_bits(),
            energy(positions).energy_kj_per_mol.to_bits(),
            "torsion read backwards"
        );
    }
}

#[test]
fn slope_and_curvature_along_the_angle() {
    let linear = ("linear", Bend::linear(0.4).unwrap());
    for (name, bend) in bends(110.0_f64.to_radians()).into_iter().chain([linear]) {
        // The differences stay inside the range.
        let low = bend.range().lowest_rad() + 3.0 * STEP;
        let high = bend.range().highest_rad() - 3.0 * STEP;
        for part in 0..=200 {
            let theta = low + (high - low) * f64::from(part) / 200.0;
            let at = |h: f64| bend.energy(theta + h).unwrap();
            let here = at(0.0);
            let numerical = slope(|h| at(h).energy_kj_per_mol);
            let analytic = here.slope_kj_per_mol_rad;
            assert_close(analytic, numerical, DERIVATIVE_TOLERANCE, name);
            let numerical = slope(|h| at(h).slope_kj_per_mol_rad);
            let analytic = here.curvature_kj_per_mol_rad2;
            assert_close(analytic, numerical, DERIVATIVE_TOLERANCE, name);
            assert!(analytic > 0.0, "{name} is concave at {theta} rad");
            let energy = here.energy_kj_per_mol;
            assert!(energy >= 0.0, "{name} is negative at {theta} rad");
        }
    }
    let torsion = Torsion::new([5.9, -1.1, 13.2]).unwrap();
    for degrees in -360..=360 {
        let omega = f64::from(degrees).to_radians();
        let at = |h: f64| torsion.energy(omega + h).unwrap();
        let numerical = slope(|h| at(h).energy_kj_per_mol);
        let analytic = at(0.0).slope_kj_per_mol_rad;
        assert_close(analytic, numerical, DERIVATIVE_TOLERANCE, "torsion");
        let numerical = slope(|h| at(h).slope_kj_per_mol_rad);
        let analytic = at(0.0).curvature_kj_per_mol_rad2;
        assert_close(analytic, numerical, DERIVATIVE_TOLERANCE, "torsion");
    }
}

//! Where bend, torsion and geometry must refuse to answer, and that nothing else than a number or an error comes.

use tautring_core::geometry::{GeometryError, Vector, angle, angle_cosine, dihedral, distance};
use tautring_core::mechanics::{Bend, BendForceConstant, MechanicsError, Torsion};

fn bends(reference_deg: f64) -> [(&'static str, Bend); 5] {
    let reference_rad = reference_deg.to_radians();
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

/// C-C-C of cyclopropane is 60 degrees, of cyclobutane 88 to 90, C-O-C of oxetane 92: no open-chain reference (from
/// the water-like 103 to the trigonal 125 degrees) may be asked there. The linear form neither.
#[test]
fn small_rings_are_outside_every_open_chain_term() {
    let linear = ("linear", Bend::linear(0.4).unwrap());
    for reference in 103..=125 {
        for (name, bend) in bends(f64::from(reference)).into_iter().chain([linear]) {
            for degrees in [60.0_f64, 88.0, 90.0, 92.0] {
                let found = bend.energy(degrees.to_radians());
                assert!(
                    matches!(found, Err(MechanicsError::AngleOutsideRange { angle_rad, range })
                        if angle_rad.to_bits() == degrees.to_radians().to_bits() && range == bend.range()),
                    "{name} about {reference} at {degrees} degrees gave {found:?}"
                );
            }
        }
    }
}

#[test]
fn atoms_outside_the_range_get_the_same_error() {
    let right_angle = [
        Vector::new(1.5, 0.0, 0.0),
        Vector::ZERO,
        Vector::new(0.0, 1.5, 0.0),
    ];
    for (name, bend) in bends(109.47) {
        let found = bend.energy_and_gradient(right_angle);
        assert!(
            matches!(found, Err(MechanicsError::AngleOutsideRange { .. })),
            "{name} gave {found:?}"
        );
    }
}

/// The published harmonic-against-series figures of the harmonic form's range.
#[test]
fn harmonic_stays_within_a_quarter_of_the_series_in_its_range() {
    let reference_rad = 112.0_f64.to_radians();
    let series = Bend::sextic_series(1.0, reference_rad).unwrap();
    let k = series
        .energy(reference_rad)
        .unwrap()
        .curvature_kj_per_mol_rad2;
    let k = BendForceConstant::from_kj_per_mol_rad2(k).unwrap();
    let harmonic = Bend::harmonic(k, reference_rad).unwrap();
    for part in 0..=300 {
        let degrees = 97.001 + 29.998 * f64::from(part) / 300.0;
        let theta = degrees.to_radians();
        let theirs = series.energy(theta).unwrap().energy_kj_per_mol;
        let ours = harmonic.energy(theta).unwrap().energy_kj_per_mol;
        assert!(
            (ours - theirs).abs() <= 0.25 * theirs,
            "at {degrees} degrees"
        );
    }
}

#[test]
fn numbers_that_are_none_are_refused() {
    for bad in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
        for (name, bend) in bends(110.0) {
            assert!(bend.energy(bad).is_err(), "{name} at {bad}");
        }
        assert!(Bend::linear(0.4).unwrap().energy(bad).is_err());
        assert!(Bend::linear(bad).is_err());
        assert!(Bend::cubic(bad, 2.0).is_err());
        assert!(Bend::cubic(0.8, bad).is_err());
        assert!(Bend::sextic(bad, 2.0).is_err());
        assert!(Bend::sextic_series(0.8, bad).is_err());
        assert!(Torsion::new([0.0, bad, 0.0]).is_err());
        let torsion = Torsion::new([1.0, 2.0, 3.0]).unwrap();
        assert!(torsion.energy(bad).is_err());
    }
    assert!(matches!(
        Torsion::new([0.0, 0.0, -4e3]),
        Err(MechanicsError::TorsionBarrier { fold: 3, .. })
    ));
    // Degrees where radians are asked for.
    assert!(matches!(
        Bend::cubic(0.8, 109.5),
        Err(MechanicsError::ReferenceAngle { .. })
    ));
}

/// Every triple of awkward coordinates: either an error, or nothing but finite numbers.
#[test]
fn awkward_positions_give_finite_numbers_or_an_error() {
    let awkward = [
        Vector::ZERO,
        Vector::new(-0.0, 0.0, -0.0),
        Vector::new(1e-7, 0.0, 0.0),
        Vector::new(1e-6, 1e-6, 0.0),
        Vector::new(0.0, 1.0, 0.0),
        Vector::new(0.0, 2.0, 0.0),
        Vector::new(0.0, 1.0, 1e-5),
        Vector::new(1e6, -1e6, 1e6),
        Vector::new(-1e6, 1e6, -1e6),
        Vector::new(1e6, 0.0, 1e-300),
        Vector::new(f64::MIN_POSITIVE, 1.0, -1.0),
        Vector::new(f64::NAN, 0.0, 0.0),
        Vector::new(0.0, f64::INFINITY, 0.0),
        Vector::new(0.0, 0.0, f64::MAX),
    ];
    let finite = |vectors: &[Vector]| vectors.iter().all(|v| v.norm().is_finite());
    let (mut answers, mut errors) = (0, 0);
    let mut count = |fine: Result<bool, GeometryError>| match fine {
        Ok(true) => answers += 1,
        Ok(false) => panic!("a result that is not finite"),
        Err(_) => errors += 1,
    };
    for a in awkward {
        for b in awkward {
            count(distance([a, b]).map(|d| d.distance_angstrom > 0.0 && finite(&d.gradient)));
            for c in awkward {
                count(angle([a, b, c]).map(|t| {
                    (0.0..=4.0).contains(&t.angle_rad) && finite(&t.gradient_rad_per_angstrom)
                }));
                count(angle_cosine([a, b, c]).map(|t| {
                    (0.0..=4.0).contains(&t.angle_rad) && finite(&t.cosine_gradient_per_angstrom)
                }));
                for d in awkward {
                    count(dihedral([a, b, c, d]).map(|w| {
                        let pi = std::f64::consts::PI;
                        w.dihedral_rad > -pi
                            && w.dihedral_rad <= pi
                            && finite(&w.gradient_rad_per_angstrom)
                    }));
                }
            }
        }
    }
    assert!(answers > 1000 && errors > 1000, "{answers}, {errors}");
}

//! Bend and torsion against figures from outside the project.

use tautring_core::geometry::{Vector, angle};
use tautring_core::mechanics::{Bend, BendForceConstant, Torsion};

const KJ_PER_KCAL: f64 = 4.184;

/// Molar gas constant, kJ/(mol·K), exact: 1.380649e-23 J/K times 6.02214076e23 /mol.
const GAS_CONSTANT: f64 = 8.314_462_618_153_24e-3;

/// Common practice, no source: C-C-C of propane near 112 degrees; a lone harmonic bend of 1 mdyn Å/rad² costs
/// 1.07 kcal/mol when opened by 7 degrees and 3.16 when closed to 100. Tolerance: half of the last digit given.
#[test]
fn propane_bend_of_common_practice() {
    let k = BendForceConstant::from_mdyn_angstrom_per_rad2(1.0).unwrap();
    let ccc = Bend::harmonic(k, 112.0_f64.to_radians()).unwrap();
    for (degrees, kcal_per_mol) in [(119.0_f64, 1.07), (100.0, 3.16)] {
        let energy = ccc.energy(degrees.to_radians()).unwrap().energy_kj_per_mol;
        let found = energy / KJ_PER_KCAL;
        assert!((found - kcal_per_mol).abs() < 0.005, "{degrees}: {found}");
    }
}

/// Angle term of MMFF94 (`halgren-1996`) as `RDKit` 2026.9 evaluates it on H2O, H2S, HCN and CO2, in
/// `tests/reference/bend_mmff94.csv`, made by `tests/rdkit_bend.py`.
///
/// Tolerance: 2e-9 of the energy and of the largest gradient component; the reference holds the cubic constant
/// to seven digits (-0.006981317 per degree), which is 1e-9 of it. Largest deviation seen: 3e-10.
#[test]
fn cubic_and_linear_bends_as_rdkit_has_them() {
    let mut rows = 0;
    for line in include_str!("../reference/bend_mmff94.csv").lines().skip(1) {
        let (smiles, numbers) = line.split_once(',').unwrap();
        let numbers: Vec<f64> = numbers.split(',').map(|n| n.parse().unwrap()).collect();
        let (constant, reference_deg, energy_kcal) = (numbers[0], numbers[1], numbers[2]);
        let vectors: Vec<Vector> = numbers[3..]
            .chunks_exact(3)
            .map(|c| Vector::new(c[0], c[1], c[2]))
            .collect();
        let positions = [vectors[0], vectors[1], vectors[2]];

        let linear = smiles == "C#N" || smiles == "O=C=O";
        let bend = if linear {
            Bend::linear(constant).unwrap()
        } else {
            Bend::cubic(constant, reference_deg.to_radians()).unwrap()
        };
        let found = bend.energy_and_gradient(positions).unwrap();

        let degrees = angle(positions).unwrap().angle_rad.to_degrees();
        let energy = found.energy_kj_per_mol / KJ_PER_KCAL;
        assert!(
            (energy - energy_kcal).abs() <= 2e-9 * energy_kcal,
            "{smiles} at {degrees}: {energy}, RDKit {energy_kcal} kcal/mol"
        );
        let scale = vectors[3..].iter().map(|g| g.norm()).fold(0.0, f64::max);
        for (ours, theirs) in found.gradient_kj_per_mol_angstrom.iter().zip(&vectors[3..]) {
            let residue = (*ours * (1.0 / KJ_PER_KCAL) - *theirs).norm();
            assert!(
                residue <= 2e-9 * scale,
                "{smiles} at {degrees}: gradient off by {residue} of {scale} kcal/(mol Å)"
            );
        }
        rows += 1;
    }
    assert_eq!(rows, 17, "rows of the reference");
}

/// Published three-term potential of butane, united atoms: c1, c2, c3 = 355.03, -68.19, 791.32 K in
/// c1 (1 + cos) + c2 (1 - cos 2) + c3 (1 + cos 3), zero degrees cis (Jorgensen, Madura and Swenson, J. Am. Chem.
/// Soc. 106, 6638 (1984), as taken over by Martin and Siepmann, J. Phys. Chem. B 102, 2569 (1998); constants seen
/// in a program's input, papers not opened). No nonbonded term acts within butane there, so the torsion alone has
/// to give the rotamers:
///
/// - gauche dihedral 63 ± 8 degrees, electron diffraction, Bonham and Bartell, J. Am. Chem. Soc. 81, 3491 (1959);
/// - gauche above anti by 2.8 ± 0.4 (Herrebout et al., J. Phys. Chem. 99, 578 (1995), from memory) to 4.04 kJ/mol (gas,
///   966 cal/mol, abstract of "Raman spectra of liquid n-alkanes III"): a band, since the sources disagree.
///
/// A phase or sign the other way round turns the cis maximum into the minimum and fails both.
#[test]
fn butane_rotamers_from_a_published_torsion() {
    let barriers = [355.03, -68.19, 791.32].map(|kelvin| 2.0 * kelvin * GAS_CONSTANT);
    let torsion = Torsion::new(barriers).unwrap();

    let mut gauche_rad = 60.0_f64.to_radians();
    for _ in 0..20 {
        let here = torsion.energy(gauche_rad).unwrap();
        gauche_rad -= here.slope_kj_per_mol_rad / here.curvature_kj_per_mol_rad2;
    }
    let gauche = torsion.energy(gauche_rad).unwrap();
    let anti = torsion.energy(std::f64::consts::PI).unwrap();
    let cis = torsion.energy(0.0).unwrap();

    assert!(gauche.curvature_kj_per_mol_rad2 > 0.0 && anti.curvature_kj_per_mol_rad2 > 0.0);
    let degrees = gauche_rad.to_degrees();
    assert!((degrees - 63.0).abs() <= 8.0, "gauche at {degrees} degrees");
    let difference = gauche.energy_kj_per_mol - anti.energy_kj_per_mol;
    assert!(
        (2.4..=4.04).contains(&difference),
        "gauche {difference} kJ/mol above anti"
    );
    assert!(cis.curvature_kj_per_mol_rad2 < 0.0 && cis.energy_kj_per_mol > difference);
}

/// Methyl barriers: V3 in wavenumbers and in kJ/mol as published, from the barrier between eclipsed and staggered.
///
/// Propane 1108 ± 10 and propene 687.87 ± 0.07 per cm (NIST Hydrocarbon Spectral Database), methylamine 691.1 per cm;
/// kJ/mol to half of the last digit. This shows the ½, the fold and the zero, not the barrier itself.
#[test]
fn methyl_barriers() {
    // h c N_A, kJ/mol per 1/cm, exact constants.
    let per_wavenumber = 6.626_070_15e-34 * 299_792_458.0 * 100.0 * 6.022_140_76e23 / 1e3;
    for (molecule, wavenumbers, kj_per_mol) in [
        ("propane", 1108.0, 13.25),
        ("propene", 687.87, 8.23),
        ("methylamine", 691.1, 8.27),
    ] {
        let torsion = Torsion::new([0.0, 0.0, wavenumbers * per_wavenumber]).unwrap();
        let at = |degrees: f64| torsion.energy(degrees.to_radians()).unwrap();
        for eclipsed in [0.0, 120.0, -120.0] {
            let height = at(eclipsed).energy_kj_per_mol - at(eclipsed + 60.0).energy_kj_per_mol;
            assert!(
                (height - kj_per_mol).abs() <= 0.005,
                "{molecule}: {height} kJ/mol"
            );
        }
    }
}

/// The two forms that are published in degrees and kcal/mol (`allinger-1977`, `allinger-yuh-lii-1989`), written out
/// a second time in those units; the higher constants are also those that common parameter files carry, except
/// the last one of the series (see its documentation).
///
/// Tolerance: 1e-13 of the energy for the rounding of the conversion to radians.
#[test]
fn sextic_forms_in_the_units_they_were_published_in() {
    for reference in [100.0_f64, 109.5, 122.0] {
        for departure in [-6.5_f64, -1.0, 0.5, 3.0, 10.0, 17.5] {
            let theta = (reference + departure).to_radians();
            // What is left of the departure after the rounding of both angles.
            let d = (theta - reference.to_radians()).to_degrees();
            let quadratic = 0.021_914 * 0.5 * d * d;
            let form_1977 = quadratic * (1.0 + 7e-8 * d.powi(4));
            let form_1989 = quadratic
                * (1.0 - 0.014 * d + 5.6e-5 * d.powi(2) - 7e-7 * d.powi(3) + 9e-10 * d.powi(4));
            for (bend, kcal_per_mol) in [
                (Bend::sextic(0.5, reference.to_radians()), form_1977),
                (Bend::sextic_series(0.5, reference.to_radians()), form_1989),
            ] {
                let energy = bend.unwrap().energy(theta).unwrap().energy_kj_per_mol;
                let found = energy / KJ_PER_KCAL;
                assert!(
                    (found - kcal_per_mol).abs() <= 1e-13 * kcal_per_mol,
                    "{reference} and {departure} degrees: {found}, published form {kcal_per_mol}"
                );
            }
        }
    }
}

//! Entropies, heat capacities and ceiling temperatures against the outside.

use serde::Deserialize;
use tautring_core::additivity::fitted::{FITTED, WORKSPACE as ENTHALPY_WORKSPACE};
use tautring_core::additivity::thermal::{
    ENTROPY, HEAT_CAPACITY, ThermalEstimate, ThermalFeatures, WORKSPACE,
};
use tautring_core::additivity::{Features, count};
use tautring_core::thermal::{
    Equilibrium, Interpolant, Interval, ReactionGas, StandardState, equilibrium_temperature,
};
use tautring_report::structure::{HostMolecule, Structure};
use tautring_tests::folder::{reference, top};
use tautring_tests::table::rows;

fn molecule(smiles: &str) -> HostMolecule {
    let read = Structure::from_smiles(smiles);
    read.unwrap_or_else(|e| panic!("{smiles}: {e}")).molecule
}

type Counted = ThermalFeatures<4096>;

/// The counts of a reaction: stoichiometric numbers with structures.
fn counted(species: &[(f64, &str)]) -> Box<Counted> {
    let mut total = Box::<Counted>::default();
    for (number, smiles) in species {
        let features: Box<Counted> = Box::new(ThermalFeatures::of(&molecule(smiles)).unwrap());
        total.add_scaled(&features, *number).unwrap();
    }
    total
}

fn entropy(features: &Counted) -> ThermalEstimate<1> {
    ENTROPY.estimate(features, &mut [0.0; WORKSPACE]).unwrap()
}

fn heat_capacity(features: &Counted) -> ThermalEstimate<5> {
    HEAT_CAPACITY
        .estimate(features, &mut [0.0; WORKSPACE])
        .unwrap()
}

/// The reaction in the gas, all three parts estimated.
fn reaction(species: &[(f64, &str)]) -> ReactionGas {
    let mut enthalpies = Box::new(Features::<4096>::new());
    for (number, smiles) in species {
        let features: Features<4096> = count(&molecule(smiles)).unwrap();
        enthalpies.add_scaled(&features, *number).unwrap();
    }
    let mut workspace = vec![0.0; ENTHALPY_WORKSPACE];
    let features = counted(species);
    ReactionGas {
        enthalpy: FITTED.estimate(&enthalpies, &mut workspace).unwrap(),
        entropy: entropy(&features),
        heat_capacity: heat_capacity(&features),
    }
}

#[derive(Deserialize)]
struct Nasa {
    name: String,
    smiles: String,
    s_298: f64,
    cp_298: f64,
    cp_400: f64,
    cp_500: f64,
    cp_600: f64,
    cp_800: f64,
    h_600_less_h_298: f64,
    s_600_less_s_298: f64,
}

fn nasa() -> Vec<Nasa> {
    let rows: Vec<Nasa> = rows(&reference("gas_thermal.csv"));
    assert!(rows.len() >= 50);
    rows
}

/// `mcbride-1993` is no source of the fit, though most of these molecules are in the fit by another table: it says that tables, counts and units
/// are right, not how good a prediction is. That stands in `data/thermal_left_out.txt`.
///
/// Tables differ among themselves: by up to 2 J/(mol K) of entropy and 2 % of heat capacity for molecules of this size with inner rotations, which
/// is what is allowed beside U.
#[test]
fn entropies_and_heat_capacities_agree_with_nasa() {
    let mut wrong = Vec::new();
    let mut differences: Vec<(f64, f64)> = Vec::new();
    for row in nasa() {
        let features = counted(&[(1.0, &row.smiles)]);
        let s = entropy(&features);
        let difference = s.values_j_per_mol_k[0] - row.s_298;
        if difference.abs() > s.expanded_j_per_mol_k(&[1.0]) + 2.0 {
            wrong.push(format!("{} S: {difference:.1}", row.name));
        }
        let cp = heat_capacity(&features);
        let published = [row.cp_298, row.cp_400, row.cp_500, row.cp_600, row.cp_800];
        for (i, published) in published.into_iter().enumerate() {
            let mut weights = [0.0; 5];
            weights[i] = 1.0;
            let difference = cp.values_j_per_mol_k[i] - published;
            if difference.abs() > cp.expanded_j_per_mol_k(&weights) + 0.02 * published {
                wrong.push(format!("{} Cp {i}: {difference:.1}", row.name));
            }
        }
        differences.push((
            difference.abs(),
            (cp.values_j_per_mol_k[1] - row.cp_400).abs(),
        ));
    }
    let n = differences.len() as f64;
    let mean_s = differences.iter().map(|d| d.0).sum::<f64>() / n;
    let mean_cp = differences.iter().map(|d| d.1).sum::<f64>() / n;
    println!("mean difference: S {mean_s:.2}, Cp(400 K) {mean_cp:.2} J/(mol K)");
    // Of 360 values one in twenty may lie outside a 95 % interval.
    assert!(wrong.len() <= 18, "{}", wrong.join("\n"));
}

/// With the published heat capacities in place of estimates, only the interpolant is under test: 0.1 % of the integral from 298.15 to 600 K.
#[test]
fn integrals_of_the_interpolant_agree_with_nasa() {
    let at = Interpolant::at(600.0).unwrap();
    for row in nasa() {
        let cp = [row.cp_298, row.cp_400, row.cp_500, row.cp_600, row.cp_800];
        let sum = |weights: [f64; 5]| -> f64 { weights.iter().zip(cp).map(|(w, c)| w * c).sum() };
        let h = sum(at.enthalpy_k) / 1000.0;
        let s = sum(at.entropy);
        let (h0, s0) = (row.h_600_less_h_298, row.s_600_less_s_298);
        // Half a printed digit more.
        assert!((h - h0).abs() < 0.001 * h0 + 0.01, "{}: {h} {h0}", row.name);
        assert!((s - s0).abs() < 0.001 * s0 + 0.02, "{}: {s} {s0}", row.name);
    }
}

#[derive(Deserialize)]
struct HeatCapacityRow {
    name: String,
    smiles: String,
    cp_298_j_per_mol_k: Option<f64>,
    cp_800_j_per_mol_k: Option<f64>,
    u_j_per_mol_k: f64,
    #[serde(rename = "use")]
    usage: String,
}

/// Molecules that no fitted row knows: rows of the handbook and the textbook at 298.15 K alone, which the fit leaves aside.
#[test]
fn heat_capacities_of_unseen_molecules_are_covered() {
    let table: Vec<HeatCapacityRow> = rows(&top().join("data/gas_heat_capacities.csv"));
    let key = |smiles: &str| {
        let order = molecule(smiles);
        let without_stereo: String = smiles.replace(['/', '\\', '@'], "");
        (order.formula().to_string(), without_stereo)
    };
    let fitted: std::collections::BTreeSet<_> = table
        .iter()
        .filter(|r| {
            r.usage == "fit" && r.cp_298_j_per_mol_k.is_some() && r.cp_800_j_per_mol_k.is_some()
        })
        .map(|r| key(&r.smiles))
        .collect();
    let (mut inside, mut all, mut total) = (0, 0, 0.0);
    for row in table
        .iter()
        .filter(|r| r.usage == "fit" && r.cp_800_j_per_mol_k.is_none())
    {
        let Some(published) = row.cp_298_j_per_mol_k else {
            continue;
        };
        if fitted.contains(&key(&row.smiles)) {
            continue;
        }
        let cp = heat_capacity(&counted(&[(1.0, &row.smiles)])).of_measurement(row.u_j_per_mol_k);
        let difference = (cp.values_j_per_mol_k[0] - published).abs();
        let expanded = cp.expanded_j_per_mol_k(&[1.0, 0.0, 0.0, 0.0, 0.0]);
        all += 1;
        inside += usize::from(difference <= expanded);
        total += difference;
        if difference > expanded {
            println!("{}: off by {difference:.1}, U {expanded:.1}", row.name);
        }
    }
    println!(
        "{inside} of {all} inside; mean {:.2} J/(mol K)",
        total / all as f64
    );
    assert!(all >= 50, "{all}");
    // 95 % of 80 to 100, and three standard deviations of chance. Eight of the nine outside are esters, for which handbook and evaluated tables of
    // their relatives do not agree.
    assert!(inside * 100 >= 87 * all, "{inside} of {all}");
}

/// Reactions between species of `mcbride-1993`, entropies of reaction at 298.15 and 600 K.
#[test]
fn entropies_of_reaction_agree_with_nasa() {
    let table = nasa();
    let find = |smiles: &str| table.iter().find(|r| r.smiles == smiles).unwrap();
    for species in [
        &[(-1.0, "C1CC1"), (1.0, "CC=C")][..],
        &[(-1.0, "C1CCC1"), (2.0, "C=C")],
        &[(-1.0, "C1=CCC1"), (1.0, "C=CC=C")],
        &[(-1.0, "C1CO1"), (1.0, "CC=O")],
        &[(-1.0, "C1CCCC=C1"), (1.0, "C=CC=C"), (1.0, "C=C")],
        &[(-1.0, "C1CCCCC1"), (1.0, "CCCCC=C")],
    ] {
        let estimate = reaction(species);
        for temperature in [298.15, 600.0] {
            let published: f64 = species
                .iter()
                .map(|(number, smiles)| {
                    let row = find(smiles);
                    let warmed = if temperature > 300.0 {
                        row.s_600_less_s_298
                    } else {
                        0.0
                    };
                    number * (row.s_298 + warmed)
                })
                .sum();
            let found = estimate.at(temperature).unwrap().entropy_j_per_mol_k;
            let difference = (found.value - published).abs();
            println!(
                "{species:?} {temperature}: {:.1} {published:.1} U {:.1}",
                found.value, found.expanded
            );
            assert!(
                difference <= found.expanded + 2.0,
                "{species:?}: {found:?} {published}"
            );
        }
    }
}

#[test]
fn at_the_reference_temperature_nothing_is_added_and_the_gibbs_energy_closes() {
    let estimate = reaction(&[(-1.0, "C1CCC1"), (2.0, "C=C")]);
    let at = estimate.at(298.15).unwrap();
    assert!((at.enthalpy_kj_per_mol.value - estimate.enthalpy.value_kj_per_mol).abs() < 1e-9);
    for temperature in [298.15, 450.0, 700.0] {
        let at = estimate.at(temperature).unwrap();
        let closed =
            at.enthalpy_kj_per_mol.value - temperature * at.entropy_j_per_mol_k.value / 1000.0;
        assert!((at.gibbs_energy_kj_per_mol.value - closed).abs() < 1e-6);
        // What the heat capacity brings to both nearly cancels.
        let apart = at
            .enthalpy_kj_per_mol
            .u
            .hypot(temperature * at.entropy_j_per_mol_k.u / 1000.0);
        assert!(at.gibbs_energy_kj_per_mol.u <= apart);
    }
}

/// Enthalpy and entropy of polymerisation, pure liquid monomer to condensed polymer, with the published ceiling temperature of the pure
/// monomer; `odian-2004`, from memory. The entropies are rounded to 1 J/(mol K), the enthalpies to 1 kJ/mol, and both are from other laboratories
/// than the ceiling: 8 % of the temperature.
#[test]
fn ceiling_temperatures_follow_from_published_enthalpies_and_entropies() {
    for (name, enthalpy, entropy, ceiling) in [
        ("α-methylstyrene", -35.0, -110.0, 334.0),
        ("methyl methacrylate", -56.0, -117.0, 493.0),
    ] {
        let [enthalpy, entropy] = [(enthalpy, 1.0), (entropy, 3.0)].map(|(value, u)| Interval {
            value,
            u,
            expanded: 2.0 * u,
        });
        let Ok(Equilibrium::Ceiling(found)) =
            equilibrium_temperature(enthalpy, entropy, StandardState::Pure)
        else {
            panic!("{name} has a ceiling");
        };
        let off = (found.value_k - ceiling).abs();
        println!("{name}: {found:?}, {ceiling}");
        assert!(off < 0.08 * ceiling, "{name}: {found:?}");
        assert!(found.u_k > 0.0 && found.u_k < 0.08 * ceiling);
    }
}

#[test]
fn rings_without_ceiling_and_with_a_floor_are_told_apart() {
    let exact = |value| Interval {
        value,
        u: 0.0,
        expanded: 0.0,
    };
    let of = |h, s| equilibrium_temperature(exact(h), exact(s), StandardState::Pure).unwrap();
    assert!(matches!(of(3.0, 30.0), Equilibrium::Floor(t) if (t.value_k - 100.0).abs() < 1e-9));
    assert_eq!(of(-3.0, 30.0), Equilibrium::Always);
    assert_eq!(of(3.0, -30.0), Equilibrium::Never);
    // Dilution lowers a ceiling.
    let dilute = StandardState::Solution {
        concentration_mol_per_l: 0.1,
    };
    let Ok(Equilibrium::Ceiling(thin)) =
        equilibrium_temperature(exact(-30.0), exact(-100.0), dilute)
    else {
        panic!("a ceiling");
    };
    assert!((thin.value_k - 30_000.0 / (100.0 + 8.314_462_618 * 10.0_f64.ln())).abs() < 1e-6);
}

/// The polymerisation of a cycloalkane in the gas, per ring: CH2 groups of a long chain less the ring. Entropies of the rings and of the CH2
/// group of a chain by `benson-1976`, from memory: 39.4 J/(mol K) for each CH2.
#[test]
fn entropies_of_ring_opening_in_the_gas() {
    let table = nasa();
    for (ring, size) in [
        ("C1CC1", 3_usize),
        ("C1CCC1", 4),
        ("C1CCCC1", 5),
        ("C1CCCCC1", 6),
    ] {
        let chain = |n: usize| "C".repeat(n);
        let (long, short) = (chain(10 + size), chain(10));
        let mut features = counted(&[(1.0, &long), (-1.0, &short)]).increments_only();
        features.add_scaled(&counted(&[(1.0, ring)]), -1.0).unwrap();
        let found = entropy(&features);
        let published = table.iter().find(|r| r.smiles == ring).unwrap().s_298;
        let expected = 39.4 * size as f64 - published;
        let difference = found.values_j_per_mol_k[0] - expected;
        println!("{ring}: {:.1} {expected:.1}", found.values_j_per_mol_k[0]);
        assert!(
            difference.abs() <= found.expanded_j_per_mol_k(&[1.0]) + 2.0,
            "{ring}: {found:?} {expected}"
        );
    }
}

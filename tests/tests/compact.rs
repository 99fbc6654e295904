//! The compact covariance: the same values, uncertainties that are never smaller than with all measurements, and how much wider they are.

use std::collections::BTreeSet;

use serde::Deserialize;
use tautring_core::additivity::fitted::{COMPACT_WORKSPACE, FITTED, WORKSPACE};
use tautring_core::additivity::{Features, Property, count};
use tautring_report::structure::Structure;
use tautring_tests::folder::top;
use tautring_tests::table::rows;

#[derive(Deserialize)]
struct Measurement {
    smiles: String,
    #[serde(rename = "use")]
    usage: String,
}

/// Rounding errors of sums over thousands of measurements, kJ²/mol²: prior variances of large molecules are some ten million.
const ROUNDING: f64 = 1e-5;

#[test]
fn uncertainties_are_never_smaller() {
    let table: Vec<Measurement> = rows(&top().join("data/measurements.csv"));
    let fitted = table.into_iter().filter(|m| m.usage == "fit");
    let structures: BTreeSet<String> = fitted.map(|m| m.smiles).collect();
    let mut all = vec![0.0; WORKSPACE];
    let mut part = vec![0.0; COMPACT_WORKSPACE];
    let mut ratios = Vec::new();
    // Every fifth molecule: each takes a triangular system of thousands of equations for each of two properties.
    for smiles in structures.iter().step_by(5) {
        let structure = Structure::from_smiles(smiles).expect(smiles);
        let features: Features<4096> = count(&structure.molecule).expect(smiles);
        for property in [Property::Gas, Property::Liquid] {
            let features = features.of(property).expect(smiles);
            let full = FITTED.estimate(&features, &mut all).expect(smiles);
            let compact = FITTED.estimate_compact(&features, &mut part).expect(smiles);
            assert_eq!(
                full.value_kj_per_mol.to_bits(),
                compact.value_kj_per_mol.to_bits(),
                "{smiles}"
            );
            let widened = compact.model_variance - full.model_variance;
            assert!(widened > -ROUNDING, "{smiles}: {widened}");
            ratios.push(compact.u_kj_per_mol() / full.u_kj_per_mol());
        }
    }
    ratios.sort_by(f64::total_cmp);
    let quantile = |q: f64| ratios[(q * (ratios.len() - 1) as f64) as usize];
    println!(
        "u compact over u of all measurements, {} estimates: median {:.2}, nine in ten below {:.2}, largest {:.2}",
        ratios.len(),
        quantile(0.5),
        quantile(0.9),
        quantile(1.0)
    );
    // A compact covariance that says nothing would be never smaller, too.
    assert!(quantile(0.5) < 3.0);
}

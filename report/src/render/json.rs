//! The JSON writer: the results for other programs.

use serde_json::{Value, json};

use super::error::RenderError;
use crate::document::Inputs;
use crate::review::SubstanceReview;

/// The results of one substance under the keys that other programs rely on.
///
/// Indices of atoms start at 0 and follow the order of the input. Null stands for what is not computed. Every number has all its digits;
/// rounding is for readers.
pub fn contract(review: &SubstanceReview) -> Value {
    let gas = &review.gas;
    let strain = &review.strain;
    let not_computed = json!({ "value_kj_per_mol": null, "u_kj_per_mol": null, "basis": null });
    let rings: Vec<_> = review
        .rings
        .iter()
        .map(|atoms| json!({ "atoms": atoms, "size": atoms.len() }))
        .collect();
    let evidence: Vec<_> = gas
        .evidence
        .iter()
        .map(|evidence| {
            json!({ "molecule": evidence.molecule, "weight": evidence.weight, "source": evidence.source })
        })
        .collect();
    json!({
        "input": review.input,
        "formula": review.formula,
        "molar_mass_g_per_mol": review.molar_mass_g_per_mol,
        "enthalpy_of_formation": {
            "gas": {
                "value_kj_per_mol": gas.quantity.value_kj_per_mol,
                "u_kj_per_mol": gas.quantity.u_kj_per_mol,
                "basis": gas.basis,
            },
            "liquid": not_computed,
            "solid": not_computed,
        },
        "strain": {
            "value_kj_per_mol": strain.quantity.value_kj_per_mol,
            "u_kj_per_mol": strain.quantity.u_kj_per_mol,
            "j_per_g": strain.j_per_g,
            "convention": strain.convention,
        },
        "rings": rings,
        "account": {
            "bend_kj_per_mol": null,
            "torsion_kj_per_mol": null,
            "stretch_kj_per_mol": null,
            "nonbonded_kj_per_mol": null,
            "unassigned_kj_per_mol": null,
        },
        "openings": [],
        "decomposition": {
            "enthalpy_kj_per_mol": null,
            "released_j_per_g": null,
            "u_j_per_g": null,
            "products": null,
        },
        "oxygen_balance_percent": review.oxygen_balance_percent,
        "evidence": evidence,
        "flags": review.flags,
    })
}

/// `report.json`: inputs, digests, versions and every result, in a fixed order of keys.
///
/// Each substance holds the keys of [`contract`], and under `details` everything else that was found.
///
/// # Errors
/// [`RenderError::Json`].
pub fn json(inputs: &Inputs<'_>) -> Result<String, RenderError> {
    let fail = |source| RenderError::Json { source };
    let mut substances = Vec::new();
    for review in inputs.reviews {
        let mut keys = contract(review);
        keys["name"] = json!(review.name);
        keys["details"] = json!({
            "gas": serde_json::to_value(&review.gas).map_err(fail)?,
            "strain": serde_json::to_value(&review.strain).map_err(fail)?,
        });
        substances.push(keys);
    }
    let versions: Value = inputs
        .versions
        .iter()
        .map(|(name, version)| (name.clone(), Value::from(version.as_str())))
        .collect::<serde_json::Map<_, _>>()
        .into();
    let report = json!({
        "format": "tautring-report",
        "format_version": 1,
        "conventions": {
            "atom_indices": "from 0, in the order of the input",
            "u": "standard uncertainty",
            "expanded": "expanded uncertainty, 95 %, for the true value",
            "coverage_factor_of_estimates": inputs.coverage_factor,
            "temperature_k": 298.15,
        },
        "versions": versions,
        "digests": serde_json::to_value(inputs.digests).map_err(fail)?,
        "case": serde_json::to_value(inputs.header).map_err(fail)?,
        "particulars": serde_json::to_value(inputs.particulars).map_err(fail)?,
        "substances": substances,
        "checks": serde_json::to_value(inputs.checks).map_err(fail)?,
        "monocycles": serde_json::to_value(inputs.monocycles).map_err(fail)?,
    });
    let mut text = serde_json::to_string_pretty(&report).map_err(fail)?;
    text.push('\n');
    Ok(text)
}

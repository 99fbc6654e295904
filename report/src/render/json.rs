//! The JSON writer: the results for other programs.

use serde_json::{Value, json};

use super::error::RenderError;
use crate::document::Inputs;
use crate::review::{ConventionStrain, FormationEnthalpy, SubstanceReview};

/// The results of one substance under the keys that other programs rely on, and more beside them.
///
/// Indices of atoms start at 0 and follow the order of the input. Null stands for what is not computed. Every number has all its digits;
/// rounding is for readers.
pub fn contract(review: &SubstanceReview) -> Value {
    let gas = &review.gas;
    let strain = &review.strain;
    let rings: Vec<_> = review
        .rings
        .iter()
        .map(|atoms| json!({ "atoms": atoms, "size": atoms.len() }))
        .collect();
    let conventions: Vec<_> = review.strain_conventions.iter().map(convention).collect();
    json!({
        "input": review.input,
        "formula": review.formula,
        "molar_mass_g_per_mol": review.molar_mass_g_per_mol,
        "enthalpy_of_formation": {
            "gas": formation(gas),
            "liquid": formation(&review.liquid),
            "solid": formation(&review.solid),
        },
        "gas_entropy_j_per_mol_k": review.gas_thermal.as_ref().map(|t| t.entropy),
        "gas_heat_capacity_j_per_mol_k": review.gas_thermal.as_ref().map(|t| &t.heat_capacity),
        "symmetry_number": review.gas_thermal.as_ref().map(|t| t.symmetry_number),
        "strain": strain,
        "strain_conventions": conventions,
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
        "evidence": gas.evidence,
        "evidence_share": gas.evidence_share,
        "flags": review.flags,
    })
}

/// The enthalpy of formation in one phase.
fn formation(enthalpy: &FormationEnthalpy) -> Value {
    json!({
        "value_kj_per_mol": enthalpy.quantity.value_kj_per_mol,
        "u_kj_per_mol": enthalpy.quantity.u_kj_per_mol,
        "expanded_kj_per_mol": enthalpy.quantity.expanded_kj_per_mol,
        "basis": enthalpy.basis,
        "carried_from": enthalpy.carried_from,
        "grade": enthalpy.grade,
        "support": enthalpy.support,
        "estimate": enthalpy.estimate,
        "comparisons": enthalpy.comparisons,
    })
}

/// The strain of a ring system by one convention; null where it is not defined.
fn convention(row: &ConventionStrain) -> Value {
    json!({
        "convention": row.convention,
        "atoms": row.atoms,
        "reaction": row.reaction,
        "value_kj_per_mol": row.quantity.map(|q| q.value_kj_per_mol),
        "u_kj_per_mol": row.quantity.map(|q| q.u_kj_per_mol),
        "expanded_kj_per_mol": row.quantity.map(|q| q.expanded_kj_per_mol),
        "basis": row.basis,
        "estimate": row.estimate,
        "participants": row.participants,
        "note": row.note,
    })
}

/// `report.json`: inputs, digests, versions and every result, in a fixed order of keys.
///
/// Each substance holds what the case file states and the keys of [`contract`], or `error` where it could not be reviewed.
///
/// # Errors
/// [`RenderError::Json`].
pub fn json(inputs: &Inputs) -> Result<String, RenderError> {
    let fail = |source| RenderError::Json { source };
    let mut substances = Vec::new();
    for entry in &inputs.entries {
        let particulars = &entry.particulars;
        let mut keys = json!({ "id": particulars.id, "name": particulars.substance });
        let found = match &entry.finding {
            Ok(review) => contract(review),
            Err(reason) => json!({ "input": particulars.structure, "error": reason }),
        };
        if let (Some(keys), Value::Object(found)) = (keys.as_object_mut(), found) {
            keys.extend(found);
        }
        keys["stated"] = serde_json::to_value(particulars).map_err(fail)?;
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
            "u": "standard uncertainty: half the width of the 68.27 % interval",
            "expanded": "expanded uncertainty, 95 %, for the true value",
            "coverage_factor": "expanded / u, of each value its own, from 1.96 (normal) to 3.26 (Student, two degrees of freedom)",
            "temperature_k": 298.15,
        },
        "versions": versions,
        "digests": serde_json::to_value(&inputs.digests).map_err(fail)?,
        "case": serde_json::to_value(&inputs.header).map_err(fail)?,
        "substances": substances,
        "checks": serde_json::to_value(&inputs.checks).map_err(fail)?,
        "monocycles": serde_json::to_value(&inputs.monocycles).map_err(fail)?,
    });
    let mut text = serde_json::to_string_pretty(&report).map_err(fail)?;
    text.push('\n');
    Ok(text)
}

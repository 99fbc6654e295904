//! The case file's schema, from which editors complete keys and explain them.
//!
//! The doc comments of this file are what the editor shows: they address the chemist who writes a case.

use schemars::generate::SchemaSettings;
use schemars::transform::RecursiveTransform;
use schemars::{JsonSchema, Schema};
use serde_json::{Value, json};

use super::measurement::{Crucible, Kept, Phase, Quantity};
use super::substance::{Role, State};
use super::unit::{AmountUnit, EnthalpyUnit, TemperatureUnit};

/// The JSON Schema of case files, as the text that is kept in `report/schema/case.schema.json`.
///
/// ```
/// let schema = tautring_report::case::schema_text();
/// assert!(schema.contains("enthalpy_of_formation"));
/// ```
pub fn schema_text() -> String {
    format!("{:#}\n", schema().to_value())
}

fn schema() -> Schema {
    SchemaSettings::draft07()
        .with_transform(RecursiveTransform(without_null))
        .into_generator()
        .into_root_schema_for::<CaseFile>()
}

/// An optional key is left out, TOML has no null: an editor must not offer it.
fn without_null(schema: &mut Schema) {
    let is_null = |value: &Value| *value == json!("null") || *value == json!({ "type": "null" });
    if let Some(Value::Array(kinds)) = schema.get_mut("type") {
        kinds.retain(|kind| !is_null(kind));
        if let [kind] = kinds.as_slice() {
            let kind = kind.clone();
            schema.insert("type".to_owned(), kind);
        }
    }
    if let Some(Value::Array(mut schemas)) = schema.remove("anyOf") {
        schemas.retain(|schema| !is_null(schema));
        let keyword = if schemas.len() == 1 { "allOf" } else { "anyOf" };
        schema.insert(keyword.to_owned(), Value::Array(schemas));
    }
}

/// A case for a strain report: what the process handles, and what is known of it by measurement.
#[derive(JsonSchema)]
#[schemars(deny_unknown_fields, title = "tautring case file")]
#[expect(
    dead_code,
    reason = "only its schema is used; the reader notes mistakes one by one"
)]
struct CaseFile {
    /// What the report says about itself.
    case: CaseTable,
    /// The substances, each under a header `[[substance]]`.
    #[schemars(length(min = 1))]
    substance: Vec<SubstanceTable>,
}

/// What the report says about itself.
#[derive(JsonSchema)]
#[schemars(deny_unknown_fields)]
#[expect(dead_code, reason = "only its schema is used")]
struct CaseTable {
    /// Title of the report.
    #[schemars(length(min = 1))]
    title: String,
    /// Reference under which the report is filed.
    #[schemars(length(min = 1))]
    reference: String,
    /// Date of the review, year-month-day. It is printed as stated and never taken from the clock, so that the same case gives the same report.
    #[schemars(regex(pattern = r"^\d{4}-\d{2}-\d{2}$"), extend("format" = "date", "examples" = ["2026-03-14"]))]
    date: String,
    /// Who wrote this case.
    #[schemars(length(min = 1))]
    author: String,
    /// Revision of this case, such as "A" or "2".
    #[schemars(length(min = 1))]
    revision: String,
    /// Free remarks, in Markdown.
    notes: Option<String>,
}

/// A substance of the process. Its structure is stated either by `smiles` or by `file`.
#[derive(JsonSchema)]
#[schemars(deny_unknown_fields, extend("oneOf" = [{ "required": ["smiles"] }, { "required": ["file"] }]))]
#[expect(dead_code, reason = "only its schema is used")]
struct SubstanceTable {
    /// Short name, unique in the case: letters, digits, `-` and `_`.
    #[schemars(regex(pattern = r"^[A-Za-z0-9_-]{1,40}$"))]
    id: String,
    /// Name as the report prints it.
    #[schemars(length(min = 1))]
    name: String,
    /// Structure as a SMILES. Use single quotes if it contains a backslash.
    #[schemars(length(min = 1), extend("examples" = ["C1CC12CC2"]))]
    smiles: Option<String>,
    /// Structure as a Molfile or SDF; the path counts from the folder of the case file.
    #[schemars(length(min = 1), extend("examples" = ["structures/azetidine.mol"]))]
    file: Option<String>,
    /// Which structure of an SDF is meant: its number, counted from 1, or its name. The first if left out.
    record: Option<RecordEntry>,
    /// State of the substance in the process.
    state: State,
    /// What the substance does in the process.
    role: Role,
    /// Amount in the process, such as `{ value = 2.5, unit = "kg" }`.
    amount: Option<AmountTable>,
    /// Free remarks, in Markdown.
    notes: Option<String>,
    /// Measured values, each under a header `[[substance.measured]]`. They are shown first and compared with the estimate.
    measured: Option<Vec<MeasuredTable>>,
}

/// Number or name of a structure in an SDF.
#[derive(JsonSchema)]
#[schemars(untagged)]
#[expect(dead_code, reason = "only its schema is used")]
enum RecordEntry {
    /// Number, counted from 1.
    Number(#[schemars(range(min = 1, max = 1_000_000))] u32),
    /// Name: the first line of the structure.
    Name(#[schemars(length(min = 1))] String),
}

/// An amount with its unit.
#[derive(JsonSchema)]
#[schemars(deny_unknown_fields)]
#[expect(dead_code, reason = "only its schema is used")]
struct AmountTable {
    /// The number, greater than zero.
    #[schemars(extend("exclusiveMinimum" = 0))]
    value: f64,
    /// Unit of mass or of amount of substance.
    unit: AmountUnit,
}

/// A measured value with its source.
#[derive(JsonSchema)]
#[schemars(
    deny_unknown_fields,
    extend("dependencies" = { "uncertainty": ["coverage_k"], "coverage_k": ["uncertainty"] }),
    extend(
        "if" = { "properties": { "quantity": { "const": "decomposition" } } },
        "then" = { "required": ["method", "crucible"], "properties": { "phase": false, "value": { "exclusiveMinimum": 0 } } },
        "else" = { "required": ["phase"], "properties": { "method": false, "crucible": false, "onset": false } }
    )
)]
#[expect(dead_code, reason = "only its schema is used")]
struct MeasuredTable {
    /// What was measured.
    quantity: Quantity,
    /// Enthalpy of formation only: the phase it holds for.
    phase: Option<Phase>,
    /// Decomposition only: how it was measured, such as "DSC, 4 K/min".
    method: Option<String>,
    /// Decomposition only: the sample holder.
    crucible: Option<Crucible>,
    /// Decomposition only: temperature at which it was first seen, such as `{ value = 110, unit = "°C" }`.
    onset: Option<TemperatureTable>,
    /// The number, in the unit below. A heat of decomposition is positive if heat is released.
    value: f64,
    /// Unit of the value and of its uncertainty.
    unit: EnthalpyUnit,
    /// Uncertainty as the source states it, in the unit of the value.
    #[schemars(extend("exclusiveMinimum" = 0))]
    uncertainty: Option<f64>,
    /// Coverage factor of the uncertainty: 1 for a standard uncertainty, 2 for about 95 % (most tables).
    #[schemars(range(min = 1, max = 13))]
    coverage_k: Option<f64>,
    /// Who measured it, and where it is published or filed.
    #[schemars(length(min = 1))]
    source: String,
    /// A remark on this value.
    note: Option<String>,
    /// Settles a disagreement between this value and the estimate, by name and with a reason.
    settled: Option<SettledTable>,
}

/// A temperature with its unit.
#[derive(JsonSchema)]
#[schemars(deny_unknown_fields)]
#[expect(dead_code, reason = "only its schema is used")]
struct TemperatureTable {
    /// The number.
    value: f64,
    /// Unit of the temperature.
    unit: TemperatureUnit,
}

/// A disagreement settled by a named person.
#[derive(JsonSchema)]
#[schemars(deny_unknown_fields)]
#[expect(dead_code, reason = "only its schema is used")]
struct SettledTable {
    /// The number that stands.
    keep: Kept,
    /// Who settled it.
    #[schemars(length(min = 1))]
    by: String,
    /// Why.
    #[schemars(length(min = 1))]
    reason: String,
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeSet;
    use std::path::Path;

    use super::*;
    use crate::case::{MistakeKind, parse};

    /// One of each table, with nothing in it but a key that does not exist.
    const BARE: &str = "zzzzzzzz = 1\n[case]\nzzzzzzzz = 1\n[[substance]]\nzzzzzzzz = 1\namount = { zzzzzzzz = 1 }\n\
        [[substance.measured]]\nzzzzzzzz = 1\nonset = { zzzzzzzz = 1 }\nsettled = { zzzzzzzz = 1 }\n";

    /// Tables in the order in which `BARE` names them.
    const TABLES: [&str; 7] = [
        "",
        "CaseTable",
        "SubstanceTable",
        "AmountTable",
        "MeasuredTable",
        "TemperatureTable",
        "SettledTable",
    ];

    fn table(name: &str) -> Value {
        let schema = schema().to_value();
        if name.is_empty() {
            schema
        } else {
            schema["definitions"][name].clone()
        }
    }

    #[test]
    fn reader_and_schema_know_the_same_keys() {
        let errors = parse(BARE, "bare", Path::new("")).expect_err("nothing is in it");
        let known: Vec<BTreeSet<String>> = errors
            .mistakes()
            .iter()
            .filter(|mistake| mistake.kind() == MistakeKind::UnknownKey)
            .map(|mistake| {
                mistake
                    .mend()
                    .split('`')
                    .skip(1)
                    .step_by(2)
                    .map(str::to_owned)
                    .collect()
            })
            .collect();
        let described: Vec<BTreeSet<String>> = TABLES
            .iter()
            .map(|name| {
                table(name)["properties"]
                    .as_object()
                    .expect("a table")
                    .keys()
                    .cloned()
                    .collect()
            })
            .collect();
        assert_eq!(known, described);
    }

    #[test]
    fn reader_and_schema_require_the_same_keys() {
        let errors = parse(BARE, "bare", Path::new("")).expect_err("nothing is in it");
        let missing: BTreeSet<(usize, &str)> = errors
            .mistakes()
            .iter()
            .filter(|mistake| mistake.kind() == MistakeKind::Missing)
            .map(|mistake| {
                let place = mistake.span().expect("it has a place").start;
                (
                    place,
                    mistake
                        .message()
                        .rsplit('`')
                        .nth(1)
                        .expect("it names the key"),
                )
            })
            .collect();
        let places = [
            "[case]",
            "[[substance]]",
            "{ z",
            "[[substance.m",
            "{ z",
            "{ z",
        ];
        let mut from = 0;
        let mut required = BTreeSet::new();
        let tables: Vec<Value> = TABLES.iter().skip(1).map(|name| table(name)).collect();
        for (place, table) in places.iter().zip(&tables) {
            from += BARE[from..].find(place).expect("it is there");
            for key in table["required"].as_array().expect("some are") {
                required.insert((from, key.as_str().expect("a key")));
            }
            from += 1;
        }
        // `smiles` or `file`, which the schema says by `oneOf`.
        required.insert((BARE.find("[[substance]]").expect("it is there"), "smiles"));
        assert_eq!(missing, required);
    }
}

//! Case files: the schema, reading with errors that point at the line, the JSON Schema for editors.
//!
//! [`read`] turns a TOML file into a [`Case`], checked and in internal units, with standard uncertainties, or into [`CaseErrors`] with every mistake in it. Reading goes on after a mistake: syntax, keys, values
//! and structures are judged in one go.

mod date;
mod dossier;
mod entries;
mod measured;
mod measurement;
mod mistake;
mod read;
mod schema;
mod section;
mod structures;
mod substance;
mod syntax;
mod unit;
mod vocabulary;

pub use date::{Date, DateError};
pub use dossier::Case;
pub use measurement::{
    Crucible, Kept, Measurement, Onset, Phase, Quantity, Settlement, Subject, Written,
};
pub use mistake::{CaseErrors, Mistake, MistakeKind};
pub use read::{parse, read};
pub use schema::schema_text;
pub use substance::{Amount, Record, Role, State, StructureSource, Substance};
pub use unit::{AmountUnit, Enthalpy, EnthalpyUnit, Portion, TemperatureUnit};
pub use vocabulary::Vocabulary;

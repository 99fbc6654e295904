//! A substance of the case: what it is, in which state and amount, and what was measured of it.

use std::path::PathBuf;

use super::measurement::Measurement;
use super::unit::Portion;
use super::vocabulary::vocabulary;
use crate::structure::Structure;

vocabulary! {
    /// State of a substance in the process.
    State, "state" {
        /// Gas.
        Gas = "gas",
        /// Liquid.
        Liquid = "liquid",
        /// Solid.
        Solid = "solid",
        /// Dissolved in another substance.
        Solution = "solution",
    }
}

vocabulary! {
    /// What a substance does in the process.
    Role, "role" {
        /// Goes in at the beginning.
        StartingMaterial = "starting_material",
        /// Goes in to react with the starting material.
        Reagent = "reagent",
        /// Is made and used up again.
        Intermediate = "intermediate",
        /// Is what the process is for.
        Product = "product",
        /// Is made beside the product.
        ByProduct = "by_product",
        /// Dissolves the others.
        Solvent = "solvent",
        /// Is not in the process, and stands here for comparison.
        Reference = "reference",
    }
}

/// A substance, checked.
#[derive(Clone, Debug)]
#[non_exhaustive]
pub struct Substance {
    /// Short name, unique in the case: letters, digits, `-` and `_`.
    pub id: String,
    /// Name as the report prints it.
    pub name: String,
    /// Where the structure comes from.
    pub source: StructureSource,
    /// The structure that was read from there.
    pub structure: Structure,
    /// State in the process.
    pub state: State,
    /// What it does in the process.
    pub role: Role,
    /// Amount in the process, if stated.
    pub amount: Option<Amount>,
    /// Measured values, in the order of the file.
    pub measured: Vec<Measurement>,
    /// Free remarks, Markdown.
    pub notes: Option<String>,
}

/// Where the structure of a substance comes from.
#[derive(Clone, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum StructureSource {
    /// A SMILES in the case file.
    Smiles(String),
    /// A Molfile or SDF beside the case file.
    File {
        /// The path as the case file has it.
        path: PathBuf,
        /// Which of its structures is meant.
        record: Record,
        /// The whole text of the file, so that its digest is that of what was read.
        text: String,
    },
}

/// Which structure of an SDF is meant.
#[derive(Clone, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum Record {
    /// The number, counted from 1.
    Number(usize),
    /// The name: the first line of the structure, without white space around it.
    Name(String),
}

impl Record {
    /// The text of this record in the text of an SDF or Molfile.
    pub fn of<'t>(&self, text: &'t str) -> Option<&'t str> {
        let mut records = records(text);
        match self {
            Self::Number(number) => records.nth(number.checked_sub(1)?),
            Self::Name(name) => {
                records.find(|record| record.lines().next().map(str::trim) == Some(name))
            }
        }
    }
}

/// The records of an SDF: each ends with a line of four dollars, which the last may lack.
fn records(text: &str) -> impl Iterator<Item = &str> {
    let mut lines = text.split_inclusive('\n');
    let mut start = 0;
    core::iter::from_fn(move || {
        let mut end = start;
        for line in lines.by_ref() {
            end += line.len();
            if line.trim_end() == "$$$$" {
                break;
            }
        }
        let record = text.get(start..end)?;
        start = end;
        (!record.trim().is_empty()).then_some(record)
    })
}

/// An amount in the process.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub struct Amount {
    /// The amount, greater than zero.
    pub portion: Portion,
    /// Number and unit as the case file has them.
    pub written: String,
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn finds_records_by_number_and_name() {
        for end in ["\n", "\r\n"] {
            let text = ["first", "one", "$$$$", " second ", "two", "$$$$", ""].join(end);
            let named = |name: &str| Record::Name(name.to_owned()).of(&text);
            assert_eq!(Record::Number(1).of(&text), text.split(" second").next());
            assert!(named("second").is_some_and(|record| record.contains("two")));
            assert_eq!(named("second"), Record::Number(2).of(&text));
            assert_eq!(
                (
                    named("third"),
                    Record::Number(3).of(&text),
                    Record::Number(0).of(&text)
                ),
                (None, None, None)
            );
        }
        assert_eq!(
            Record::Number(1).of("a Molfile\nM  END"),
            Some("a Molfile\nM  END")
        );
    }
}

//! In how many measured molecules each feature occurs.

use std::collections::{BTreeMap, BTreeSet};

use tautring_core::additivity::Key;

use crate::dataset::Dataset;

/// Features of the measured molecules, each with the constitutions that it occurs in.
pub(super) struct Known {
    constitutions: BTreeMap<Key, Vec<usize>>,
}

impl Known {
    /// Counts the enthalpies of formation; a step between phases says nothing of a group's own contribution.
    pub(super) fn of(data: &Dataset) -> Self {
        let mut constitutions: BTreeMap<Key, Vec<usize>> = BTreeMap::new();
        for (constitution, rows) in data.constitutions.iter().enumerate() {
            let keys: BTreeSet<Key> = rows
                .iter()
                .map(|&row| &data.rows[row])
                .filter(|row| matches!(row.measurement.phase.as_str(), "g" | "l" | "s"))
                .flat_map(|row| data.molecule_of(row).features.terms())
                .map(|term| term.key)
                .collect();
            for key in keys {
                constitutions.entry(key).or_default().push(constitution);
            }
        }
        Self { constitutions }
    }

    /// The number of measured molecules with a feature, configurations of one constitution counted once, without those of some measurements.
    pub(super) fn without(&self, data: &Dataset, left_out: &[usize]) -> impl Fn(Key) -> usize {
        let left_out: Vec<usize> = left_out
            .iter()
            .map(|&row| data.rows[row].constitution)
            .collect();
        move |key| {
            let found = self.constitutions.get(&key).map_or(&[][..], Vec::as_slice);
            found.iter().filter(|c| !left_out.contains(c)).count()
        }
    }
}

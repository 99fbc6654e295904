//! One molecule, one answer: every order of the atoms and every spelling of every measured molecule gives the same bits.
//!
//! `tests/rdkit_spellings.py` makes the reference files.

use std::collections::{BTreeMap, BTreeSet};
use std::fs;

use serde::Deserialize;
use tautring_report::structure::{HostMolecule, Structure, identity};
use tautring_tests::features::fingerprint;
use tautring_tests::folder::{reference, top};
use tautring_tests::random::XorShift;
use tautring_tests::renumber::renumber;
use tautring_tests::table::rows;

const SEED: u64 = 0x0001_b1f5_ca1e_5eed;

/// How often each molecule is renumbered.
const ORDERS: usize = 3;

/// The ammonium halides, reaction partners in two fragments; and hydrogen cyanide and so on without carbon are read all the same.
const FRAGMENTS: usize = 4;

#[derive(Deserialize)]
struct Measurement {
    smiles: String,
}

#[derive(Deserialize)]
struct Spelling {
    smiles: String,
    kind: String,
    spelling: String,
}

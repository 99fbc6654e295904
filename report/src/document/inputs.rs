//! What a report is made from.

use std::fmt::Write as _;

use serde::Serialize;
use sha2::{Digest as _, Sha256};

use super::entry::Entry;
use crate::review::{CheckValue, SubstanceReview};

/// Everything that a report is made from.
#[derive(Clone, Debug, Default)]
pub struct Inputs {
    /// The head of the case file.
    pub header: Header,
    /// The substances in the order of the case file.
    pub entries: Vec<Entry>,
    /// The published values, recomputed.
    pub checks: Vec<CheckValue>,
    /// Measured monocycles, the background of the plot.
    pub monocycles: Vec<RingReference>,
    /// Digests of the case file and of the tables.
    pub digests: Vec<Digest>,
    /// Names and versions of the programs.
    pub versions: Vec<(String, String)>,
}

impl Inputs {
    /// What was found for the substances that could be reviewed.
    pub fn reviews(&self) -> impl Iterator<Item = &SubstanceReview> {
        self.entries
            .iter()
            .filter_map(|entry| entry.finding.as_ref().ok())
    }
}

/// The head of a case file.
#[derive(Clone, Debug, Default, Serialize)]
pub struct Header {
    /// Title of the report.
    pub title: String,
    /// Reference of the case.
    pub reference: String,
    /// Date as stated, never the clock's.
    pub date: String,
    /// Who wrote the case file.
    pub author: String,
    /// Revision of the case.
    pub revision: String,
    /// Free notes, Markdown.
    pub notes: Option<String>,
}

/// The strain of a measured monocycle, measured minus strain-free.
#[derive(Clone, Debug, Serialize)]
pub struct RingReference {
    /// Atoms in the ring.
    pub size: usize,
    /// Strain, kJ/mol.
    pub strain_kj_per_mol: f64,
    /// Expanded uncertainty (95 %), kJ/mol.
    pub expanded_kj_per_mol: f64,
    /// Bibliography key of the enthalpy of formation.
    pub source: String,
}

/// The SHA-256 digest of something that was read.
#[derive(Clone, Debug, Serialize)]
pub struct Digest {
    /// What was read.
    pub of: String,
    /// The digest, 64 hexadecimal digits.
    pub sha256: String,
}

impl Digest {
    /// The digest of `bytes`.
    ///
    /// ```
    /// use tautring_report::document::Digest;
    /// // FIPS 180-2, appendix B.1.
    /// let digest = Digest::new("an example", b"abc");
    /// assert!(digest.sha256.starts_with("ba7816bf8f01cfea"));
    /// ```
    pub fn new(of: &str, bytes: &[u8]) -> Self {
        let mut hexadecimal = String::new();
        for byte in Sha256::digest(bytes) {
            // Writing to a string cannot fail.
            let _ = write!(hexadecimal, "{byte:02x}");
        }
        Self {
            of: of.to_owned(),
            sha256: hexadecimal,
        }
    }
}

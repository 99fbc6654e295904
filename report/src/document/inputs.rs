//! What a report is made from.

use std::fmt::Write as _;

use serde::Serialize;
use sha2::{Digest as _, Sha256};

use crate::review::{CheckValue, SubstanceReview};

/// Everything that a report is made from.
#[derive(Clone, Copy, Debug)]
pub struct Inputs<'a> {
    /// The head of the case file.
    pub header: &'a Header,
    /// What the case file says of the substances besides their structure.
    pub particulars: &'a [Particulars],
    /// What was found for each substance.
    pub reviews: &'a [SubstanceReview],
    /// The published values, recomputed.
    pub checks: &'a [CheckValue],
    /// Measured monocycles, the background of the plot.
    pub monocycles: &'a [RingReference],
    /// Factor from standard to expanded uncertainty (95 %) of an estimate, from the fitted distribution.
    pub coverage_factor: f64,
    /// Digests of the case file and of the tables.
    pub digests: &'a [Digest],
    /// Names and versions of the programs.
    pub versions: &'a [(String, String)],
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

/// What the case file says of a substance besides its structure.
#[derive(Clone, Debug, Default, Serialize)]
pub struct Particulars {
    /// Name of the substance as in its review.
    pub substance: String,
    /// Named facts with their units: state, amount.
    pub facts: Vec<(String, String)>,
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
    /// Standard uncertainty, kJ/mol.
    pub u_kj_per_mol: f64,
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

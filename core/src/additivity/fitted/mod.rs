//! The fitted model at 298.15 K: tables generated from `data/`.
//!
//! The factor of all measurements is a file of little-endian numbers beside the Rust tables: as Rust text it would be a hundred megabytes that
//! the compiler reads at every build. It is read in place, and left out by the linker where only the compact one is used.

#[expect(
    clippy::unreadable_literal,
    reason = "generated: the shortest decimals that give the same bits"
)]
mod tables;

use super::cholesky::packed_len;
use super::covariance::Covariance;
use super::model::Model;

/// How many measurements the model rests on.
pub const MEASUREMENTS: usize = tables::ROWS.len();

/// How many numbers [`Model::estimate`] works in.
pub const WORKSPACE: usize = MEASUREMENTS + tables::MOLECULE_COUNT;

/// How many numbers [`Model::estimate_compact`] works in.
pub const COMPACT_WORKSPACE: usize = tables::COMPACT_ROWS.len() + tables::COMPACT_MOLECULE_COUNT;

/// The model of enthalpies of formation at 298.15 K.
pub static FITTED: Model<'static> = Model {
    prior: tables::PRIOR,
    keys: &tables::KEYS,
    duals: [
        &tables::GAS_DUALS,
        &tables::VAPORISATION_DUALS,
        &tables::FUSION_DUALS,
    ],
    covariance: Covariance {
        starts: &tables::STARTS,
        molecules: &tables::MOLECULES,
        counts: &tables::COUNTS,
        rows: &tables::ROWS,
        molecule_count: tables::MOLECULE_COUNT,
        factor: words(include_bytes!("factor.bin"), MEASUREMENTS),
    },
    compact: Covariance {
        starts: &tables::COMPACT_STARTS,
        molecules: &tables::COMPACT_MOLECULES,
        counts: &tables::COMPACT_COUNTS,
        rows: &tables::COMPACT_ROWS,
        molecule_count: tables::COMPACT_MOLECULE_COUNT,
        factor: words(
            include_bytes!("compact_factor.bin"),
            tables::COMPACT_ROWS.len(),
        ),
    },
    values: &tables::VALUES,
    deviations: &tables::DEVIATIONS,
};

/// The numbers of a table, each as its bytes; a file of another length does not compile.
const fn words(bytes: &'static [u8], measurements: usize) -> &'static [[u8; 8]] {
    let (words, rest) = bytes.as_chunks();
    assert!(
        words.len() == packed_len(measurements) && rest.is_empty(),
        "a factor does not fit tables.rs: make both anew with tautring-fit"
    );
    words
}

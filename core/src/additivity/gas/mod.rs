//! The gas phase at 298.15 K: tables generated from `data/`.
//!
//! The factor is a file of little-endian numbers beside the Rust tables: as Rust text it would be some 15 megabytes that the compiler reads
//! at every build. It is read in place.

#[expect(
    clippy::unreadable_literal,
    reason = "generated: the shortest decimals that give the same bits"
)]
mod tables;

use super::cholesky::packed_len;
use super::model::Model;

/// How many measurements the gas-phase model rests on.
pub const MEASUREMENTS: usize = tables::VALUES.len();

static FACTOR: &[[u8; 8]] = words(include_bytes!("factor.bin"));

/// The gas-phase model of enthalpies of formation at 298.15 K.
pub static GAS: Model<'static> = Model {
    prior: tables::PRIOR,
    keys: &tables::KEYS,
    duals: &tables::DUALS,
    starts: &tables::STARTS,
    rows: &tables::ROWS,
    counts: &tables::COUNTS,
    values: &tables::VALUES,
    factor: FACTOR,
};

/// The numbers of a table, each as its bytes; a file of another length does not compile.
const fn words(bytes: &'static [u8]) -> &'static [[u8; 8]] {
    let (words, rest) = bytes.as_chunks();
    assert!(
        words.len() == packed_len(MEASUREMENTS) && rest.is_empty(),
        "factor.bin does not fit tables.rs"
    );
    words
}

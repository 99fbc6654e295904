//! The gas phase at 298.15 K: tables generated from `data/`.
//!
//! The factor is a file of little-endian numbers beside the Rust tables: as Rust text it would be some 15 megabytes that the compiler reads
//! at every build.

mod tables;

use super::cholesky::packed_len;
use super::model::Model;

/// How many measurements the gas-phase model rests on.
pub const MEASUREMENTS: usize = tables::VALUES.len();

static FACTOR: [f64; packed_len(MEASUREMENTS)] = decode(include_bytes!("factor.bin"));

/// The gas-phase model of enthalpies of formation at 298.15 K.
pub static GAS: Model<'static> = Model {
    prior: tables::PRIOR,
    keys: &tables::KEYS,
    duals: &tables::DUALS,
    starts: &tables::STARTS,
    rows: &tables::ROWS,
    counts: &tables::COUNTS,
    values: &tables::VALUES,
    factor: &FACTOR,
};

/// Numbers from their little-endian bytes; a file of another length does not compile.
#[expect(clippy::indexing_slicing, reason = "evaluated by the compiler")]
const fn decode<const N: usize>(bytes: &[u8]) -> [f64; N] {
    assert!(bytes.len() == 8 * N, "factor.bin does not fit tables.rs");
    let mut numbers = [0.0; N];
    let mut i = 0;
    while i < N {
        let mut word = [0; 8];
        let mut j = 0;
        while j < 8 {
            word[j] = bytes[8 * i + j];
            j += 1;
        }
        numbers[i] = f64::from_le_bytes(word);
        i += 1;
    }
    numbers
}

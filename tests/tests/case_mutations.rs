//! Whatever is done to a case file, the answer is a case or a list of mistakes, never a panic.

use std::fs;
use std::path::{Path, PathBuf};

use tautring_report::case;

const SEED: u64 = 0x7461_7574_7269_6e67;
const ROUNDS: usize = 1500;

/// Small multiplicative generator (Steele, Lea and Flood, `SplitMix64`, 2014): the seed is fixed, the files are the same.
struct Random(u64);

impl Random {
    fn below(&mut self, bound: usize) -> usize {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut mixed = self.0;
        mixed = (mixed ^ (mixed >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        usize::try_from((mixed ^ (mixed >> 31)) >> 33).expect("31 bits fit") % bound
    }
}

/// Fragments that mean something to TOML, to a number or to a SMILES, and characters that upset a renderer.
const FRAGMENTS: [&str; 24] = [
    "\"",
    "'",
    "\"\"\"",
    "[",
    "]",
    "[[substance]]\n",
    "=",
    "\n",
    "\r",
    "\t",
    "\\",
    "\\u00e9",
    "nan",
    "-inf",
    "1e999",
    "-",
    "0x1f",
    ",",
    "{",
    "}",
    "é",
    "\u{202e}",
    "𝛥",
    "\u{0}",
];

fn folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("../examples")
}

fn mutate(text: &str, random: &mut Random) -> Vec<u8> {
    let mut bytes = text.as_bytes().to_vec();
    for _ in 0..=random.below(4) {
        let at = random.below(bytes.len() + 1);
        match random.below(5) {
            0 => bytes.truncate(at.max(1)),
            1 => drop(bytes.drain(at..(at + random.below(30)).min(bytes.len()))),
            2 => {
                let fragment = FRAGMENTS[random.below(FRAGMENTS.len())];
                bytes.splice(at..at, fragment.bytes());
            }
            3 => {
                let from = random.below(bytes.len());
                let piece = bytes[from..(from + random.below(200)).min(bytes.len())].to_vec();
                bytes.splice(at..at, piece);
            }
            _ => {
                if let Some(byte) = bytes.get_mut(at) {
                    *byte = u8::try_from(random.below(256)).expect("a byte");
                }
            }
        }
    }
    bytes
}

#[test]
fn mutated_examples_do_not_panic() {
    let mut random = Random(SEED);
    println!("seed {SEED:#x}");
    let examples = ["spiro_amide.toml", "heat_store.toml"]
        .map(|name| fs::read_to_string(folder().join(name)).expect(name));
    let mut good = 0;
    for round in 0..ROUNDS {
        let bytes = mutate(&examples[round % examples.len()], &mut random);
        let text = String::from_utf8_lossy(&bytes);
        match case::parse(&text, "case.toml", &folder()) {
            Ok(_) => good += 1,
            Err(errors) => {
                assert!(!errors.mistakes().is_empty());
                let shown = errors.render(round % 2 == 0);
                assert!(shown.contains("case.toml"), "{shown}");
            }
        }
    }
    // Some changes fall into free text and do no harm, most do not; all of one kind would mean that nothing was tested.
    assert!(
        good > ROUNDS / 50 && good < ROUNDS / 2,
        "{good} of {ROUNDS} were good"
    );
}

#[test]
fn deep_and_long_files_do_not_panic() {
    for text in [
        format!("a = {}", "[".repeat(200_000)),
        format!("a = {}", "{a=".repeat(100_000)),
        format!("[{}]", "a.".repeat(100_000)),
        format!("[case]\ntitle = \"{}\"", "x".repeat(1_000_000)),
        "[[substance]]\n".repeat(5000),
        "x = 1\n".repeat(5000),
        " ".repeat(5_000_000),
    ] {
        let errors =
            case::parse(&text, "case.toml", &folder()).expect_err("none of them is a case");
        assert!(errors.render(false).len() < 200_000 + text.len());
    }
}

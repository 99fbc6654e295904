//! Makes the coefficient tables of the core from `data/`, and says how good they are.

use std::error::Error;
use std::path::{Path, PathBuf};
use std::process::ExitCode;

use clap::Parser;
use tautring_core::additivity::{CONTRIBUTIONS, Level, Prior};
use tautring_report::dataset::Dataset;
use tautring_report::fit::{
    Hyperparameters, LevelMatrices, Tables, describe, leave_out, left_out_csv, search,
};

/// Fit the additivity to the measured enthalpies of formation in data/: find the prior by marginal likelihood, print the
/// left-out errors, write the tables of the core.
#[derive(Parser)]
struct Arguments {
    /// Top folder of the project.
    #[arg(long, default_value = ".")]
    root: PathBuf,
    /// Compare with the committed files instead of writing them; exit 1 if they differ.
    #[arg(long)]
    check: bool,
    /// Rounds of the search for the prior.
    #[arg(long, default_value_t = 60)]
    rounds: usize,
    /// Degrees of freedom of deviations and errors.
    #[arg(long, default_value_t = 2.0)]
    degrees_of_freedom: f64,
    /// Leave a level out, by name, to see what it is worth; may be repeated. Nothing is written then.
    #[arg(long, value_name = "LEVEL")]
    without: Vec<String>,
}

fn main() -> ExitCode {
    match run(&Arguments::parse()) {
        Ok(code) => code,
        Err(error) => {
            eprintln!("tautring-fit: {error}");
            ExitCode::from(2)
        }
    }
}

const MEASUREMENTS: &str = "data/measurements.csv";
const HYPERPARAMETERS: &str = "data/hyperparameters.toml";
const LEFT_OUT: &str = "data/left_out.csv";
const SUMMARY: &str = "data/left_out.txt";
const SOURCE: &str = "core/src/additivity/gas/tables.rs";
const FACTOR: &str = "core/src/additivity/gas/factor.bin";

fn run(arguments: &Arguments) -> Result<ExitCode, Box<dyn Error>> {
    let root = &arguments.root;
    let data = Dataset::read(&read(root, MEASUREMENTS)?, "g")?;
    eprintln!(
        "{} gas measurements of {} molecules",
        data.rows.len(),
        data.molecules.len()
    );
    let start = starting_prior(arguments)?;
    let matrices = LevelMatrices::new(&data, start.ring_width);
    let rounds = arguments.rounds;
    let posterior = search(&data, &matrices, start, rounds, |round, posterior| {
        if round % 10 == 0 {
            let likelihood = posterior.log_likelihood;
            eprintln!("round {round} of {rounds}: ln L = {likelihood:.2}");
        }
    })?;
    let errors = leave_out(&data, &posterior)?;
    let summary = describe(&data, &errors);
    print!("{summary}");
    if !arguments.without.is_empty() {
        return Ok(ExitCode::SUCCESS);
    }
    let hyperparameters = toml::to_string(&Hyperparameters::of(&posterior.prior))?;
    let tables = Tables::new(&data, &posterior)?;
    let files = [
        (HYPERPARAMETERS, hyperparameters.into_bytes()),
        (LEFT_OUT, left_out_csv(&data, &errors).into_bytes()),
        (SUMMARY, summary.into_bytes()),
        (SOURCE, tables.rust_source().into_bytes()),
        (FACTOR, tables.factor_bytes().to_vec()),
    ];
    for (path, bytes) in files {
        if !arguments.check {
            std::fs::write(root.join(path), bytes)?;
        } else if std::fs::read(root.join(path))? != bytes {
            eprintln!(
                "{path} differs from what data/ gives; run `cargo run --release --bin tautring-fit`"
            );
            return Ok(ExitCode::from(1));
        }
    }
    Ok(ExitCode::SUCCESS)
}

fn read(root: &Path, path: &str) -> Result<String, Box<dyn Error>> {
    std::fs::read_to_string(root.join(path))
        .map_err(|e| format!("{path}: {e}; give the project's top folder with --root").into())
}

/// Where the search starts.
///
/// Orders of magnitude: what an element, a bond, a group and a ring bring. One level stays where it is as long as no measurement speaks of it:
/// the configuration of ring bonds, whose 50 kJ/mol are the order of what trans double bonds cost in rings of eight.
fn starting_prior(arguments: &Arguments) -> Result<Prior, Box<dyn Error>> {
    let mut tau = Level::ALL.map(|level| match level {
        Level::Element => 80.0,
        Level::BondOrder => 40.0,
        Level::Atom | Level::BondElements | Level::Bond | Level::AromaticRing => 15.0,
        Level::RingSize => 60.0,
        Level::RingConfiguration => 50.0,
        level if level.is_strain() => 6.0,
        _ => 3.0,
    });
    for name in &arguments.without {
        let level = Level::ALL.into_iter().find(|level| level.name() == name);
        let level = level.ok_or_else(|| {
            let known: Vec<&str> = Level::ALL.iter().map(|level| level.name()).collect();
            format!(
                "there is no level `{name}`; there are: {}",
                known.join(", ")
            )
        })?;
        tau[level as usize] = 0.0;
    }
    Ok(Prior {
        tau_kj_per_mol: tau,
        ring_width: 0.25,
        deviation_kj_per_mol: [2.0; CONTRIBUTIONS],
        degrees_of_freedom: arguments.degrees_of_freedom,
    })
}

//! Makes the coefficient tables of the core from `data/`, and says how good they are.

use std::error::Error;
use std::path::{Path, PathBuf};
use std::process::ExitCode;

use clap::Parser;
use tautring_core::additivity::{CLASSES, CONTRIBUTIONS, Level, Part, Prior};
use tautring_report::dataset::Dataset;
use tautring_report::fit::{
    Design, Hyperparameters, LeftOut, LeftOutValue, Tables, describe, leave_out, left_out_csv,
    misfits, misfits_csv, search, worth_of_levels,
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
    #[arg(long, default_value_t = 40)]
    rounds: usize,
    /// Degrees of freedom of deviations and errors.
    #[arg(long, default_value_t = 2.0)]
    degrees_of_freedom: f64,
    /// Leave a level out, by name, to see what it is worth; may be repeated. Nothing is written then.
    #[arg(long, value_name = "LEVEL")]
    without: Vec<String>,
    /// After the fit, say what each level is worth, and write that, too; takes minutes more.
    #[arg(long)]
    levels: bool,
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
const MISFITS: &str = "data/misfits.csv";
const LEVELS: &str = "data/levels.txt";
const SOURCE: &str = "core/src/additivity/fitted/tables.rs";
const FACTOR: &str = "core/src/additivity/fitted/factor.bin";
const COMPACT_FACTOR: &str = "core/src/additivity/fitted/compact_factor.bin";

fn run(arguments: &Arguments) -> Result<ExitCode, Box<dyn Error>> {
    let root = &arguments.root;
    let data = Dataset::read(&read(root, MEASUREMENTS)?)?;
    eprintln!(
        "{} measurements of {} molecules",
        data.rows.len(),
        data.molecules.len()
    );
    let start = starting_prior(arguments)?;
    let design = Design::new(&data, &start);
    let rounds = arguments.rounds;
    let posterior = search(&data, &design, start, rounds, |round, posterior| {
        if round % 5 == 0 {
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
    if arguments.levels {
        let worth = worth_of_levels(&data, &design, &posterior, |level| {
            eprintln!("without {}", level.name());
        })?;
        print!("\n{worth}");
        std::fs::write(root.join(LEVELS), worth)?;
    }
    let hyperparameters = toml::to_string(&Hyperparameters::of(&posterior.prior))?;
    let tables = Tables::new(&data, &posterior)?;
    let files = [
        (HYPERPARAMETERS, hyperparameters.into_bytes()),
        (LEFT_OUT, left_out_csv(&data, &errors).into_bytes()),
        (SUMMARY, summary.into_bytes()),
        (
            MISFITS,
            misfits_csv(&misfits(against_their_family(&data, &errors)))?.into_bytes(),
        ),
        (SOURCE, tables.rust_source().into_bytes()),
        (FACTOR, tables.factor_bytes().to_vec()),
        (COMPACT_FACTOR, tables.compact_factor_bytes().to_vec()),
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

/// The left-out measurements as the list of misfits takes them.
fn against_their_family<'a>(
    data: &'a Dataset,
    errors: &'a [LeftOut],
) -> impl Iterator<Item = LeftOutValue> + 'a {
    errors.iter().map(|e| {
        let measurement = &data.rows[e.row].measurement;
        LeftOutValue {
            name: measurement.name.clone(),
            smiles: measurement.smiles.clone(),
            phase: measurement.phase.clone(),
            source: measurement.source.clone(),
            measured_kj_per_mol: measurement.value_kj_per_mol,
            predicted_kj_per_mol: e.estimate.value_kj_per_mol,
            u_predicted_kj_per_mol: e.estimate.u_kj_per_mol(),
            u_measured_kj_per_mol: measurement.u_kj_per_mol,
        }
    })
}

fn read(root: &Path, path: &str) -> Result<String, Box<dyn Error>> {
    std::fs::read_to_string(root.join(path))
        .map_err(|e| format!("{path}: {e}; give the project's top folder with --root").into())
}

/// Where the search starts: orders of magnitude of what an element, a bond, a group and a ring bring to each part, kJ/mol.
fn magnitude(part: Part, level: Level) -> f64 {
    match (part, level) {
        (Part::Gas, Level::Element) => 80.0,
        (Part::Gas, Level::RingSize) => 60.0,
        // What a trans double bond costs in a ring of eight; no other measurement speaks of it.
        (Part::Gas, Level::RingConfiguration) => 50.0,
        (Part::Gas, Level::BondOrder | Level::AromaticRing) => 40.0,
        (Part::Gas, Level::BondElements) => 15.0,
        (Part::Gas, Level::Atom | Level::Bond) => 10.0,
        (Part::Gas, Level::RingAtom) => 8.0,
        (Part::Gas, Level::RingBond | Level::RingJunction)
        | (Part::Fusion, Level::Element | Level::Atom | Level::RingSize) => 6.0,
        // Counted in sixty-fourths: 50 for each unit of the logarithm.
        (Part::Gas, Level::Resonance) => 0.8,
        (Part::Gas, _) | (Part::Vaporisation, Level::Element | Level::Atom | Level::RingSize) => {
            3.0
        }
        (Part::Vaporisation, _) => 1.0,
        (Part::Fusion, _) => 2.0,
    }
}

fn starting_prior(arguments: &Arguments) -> Result<Prior, Box<dyn Error>> {
    let mut tau = Part::ALL.map(|part| {
        Level::ALL.map(|level| {
            let start = if part.has(level) {
                magnitude(part, level)
            } else {
                0.0
            };
            [start; CLASSES]
        })
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
        for levels in &mut tau {
            levels[level as usize] = [0.0; CLASSES];
        }
    }
    Ok(Prior {
        tau_kj_per_mol: tau,
        ring_width: 0.25,
        deviation_kj_per_mol: [2.0; CONTRIBUTIONS],
        degrees_of_freedom: arguments.degrees_of_freedom,
    })
}

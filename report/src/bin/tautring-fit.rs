//! Makes the coefficient tables of the core from `data/`, and says how good they are.

use std::error::Error;
use std::path::{Path, PathBuf};
use std::process::ExitCode;

use clap::{Parser, Subcommand};
use tautring_core::additivity::{CONTRIBUTIONS, Level, Prior};
use tautring_report::dataset::Dataset;
use tautring_report::fit::{Hyperparameters, LevelMatrices, Posterior, Tables, leave_out, search};

/// Fit the additivity to the measured enthalpies of formation in data/.
#[derive(Parser)]
struct Arguments {
    /// Top folder of the project.
    #[arg(long, default_value = ".")]
    root: PathBuf,
    #[command(subcommand)]
    command: Command,
}

#[derive(Subcommand)]
enum Command {
    /// Search the prior standard deviations by marginal likelihood (minutes); writes data/hyperparameters.toml.
    Search {
        /// Rounds of the fixed-point iteration.
        #[arg(long, default_value_t = 60)]
        rounds: usize,
        /// Degrees of freedom of the heavy-tailed distributions.
        #[arg(long, default_value_t = 3.0)]
        degrees_of_freedom: f64,
        /// Levels to leave out, by name, to see what they are worth.
        #[arg(long)]
        without: Vec<String>,
    },
    /// Make the tables of the core from data/ and print the left-out errors.
    Tables {
        /// Compare with the committed tables instead of writing them; exit 1 if they differ.
        #[arg(long)]
        check: bool,
    },
}

fn main() -> ExitCode {
    let arguments = Arguments::parse();
    match run(&arguments) {
        Ok(code) => code,
        Err(error) => {
            eprintln!("tautring-fit: {error}");
            ExitCode::from(2)
        }
    }
}

const HYPERPARAMETERS: &str = "data/hyperparameters.toml";
const MEASUREMENTS: &str = "data/measurements.csv";
const SOURCE: &str = "core/src/additivity/gas/tables.rs";
const FACTOR: &str = "core/src/additivity/gas/factor.bin";
const LEFT_OUT: &str = "data/left_out.csv";

fn run(arguments: &Arguments) -> Result<ExitCode, Box<dyn Error>> {
    let root = &arguments.root;
    let data = Dataset::read(&read(root, MEASUREMENTS)?, "g")?;
    eprintln!(
        "{} gas measurements of {} molecules",
        data.rows.len(),
        data.molecules.len()
    );
    match &arguments.command {
        Command::Search {
            rounds,
            degrees_of_freedom,
            without,
        } => {
            let start = starting_prior(*degrees_of_freedom, without)?;
            let matrices = LevelMatrices::new(&data, start.ring_width);
            let found = search(&data, &matrices, start, *rounds, |round, posterior| {
                let errors = leave_out(&data, posterior);
                let summary = tautring_report::fit::summarise(&errors);
                eprintln!(
                    "round {round:3}: ln L = {:.2} {summary:?}",
                    posterior.log_likelihood
                );
            })?;
            std::fs::write(root.join(HYPERPARAMETERS), toml::to_string(&found)?)?;
        }
        Command::Tables { check } => {
            let hyperparameters: Hyperparameters = toml::from_str(&read(root, HYPERPARAMETERS)?)?;
            let prior = hyperparameters.prior();
            let matrices = LevelMatrices::new(&data, prior.ring_width);
            let posterior = Posterior::condition(&data, &matrices, prior)?;
            let errors = leave_out(&data, &posterior);
            let report = tautring_report::fit::describe(&data, &errors);
            println!("{report}");
            let left_out = tautring_report::fit::left_out_csv(&data, &errors);
            let tables = Tables::new(&data, posterior)?;
            let files = [
                (SOURCE, tables.rust_source().into_bytes()),
                (FACTOR, tables.factor_bytes().to_vec()),
                (LEFT_OUT, left_out.into_bytes()),
            ];
            for (path, bytes) in files {
                if *check {
                    if std::fs::read(root.join(path))? != bytes {
                        eprintln!(
                            "{path} differs from what data/ gives; run `cargo run --release --bin tautring-fit -- tables`"
                        );
                        return Ok(ExitCode::from(1));
                    }
                } else {
                    std::fs::write(root.join(path), bytes)?;
                }
            }
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
/// Few measurements are needed to move a level from here. One level stays where it is as long as no measurement speaks of it:
/// the configuration of ring bonds, whose 50 kJ/mol are the order of what trans double bonds cost in rings of eight.
fn starting_prior(degrees_of_freedom: f64, without: &[String]) -> Result<Prior, Box<dyn Error>> {
    let mut tau = [3.0; Level::ALL.len()];
    tau[Level::RingConfiguration as usize] = 50.0;
    for name in without {
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
        deviation_kj_per_mol: [1.0; CONTRIBUTIONS],
        degrees_of_freedom,
    })
}

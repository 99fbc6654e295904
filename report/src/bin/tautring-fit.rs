//! Makes the coefficient tables of the core from `data/`, and says how good they are.

use std::error::Error;
use std::path::{Path, PathBuf};
use std::process::ExitCode;

use clap::{Parser, Subcommand};
use tautring_core::additivity::{CONTRIBUTIONS, Level, Prior};
use tautring_report::dataset::Dataset;
use tautring_report::fit::{
    Hyperparameters, LevelMatrices, Posterior, Tables, leave_out, search,
};

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
    match arguments.command {
        Command::Search { rounds } => {
            let start = Prior {
                tau_kj_per_mol: [3.0; Level::ALL.len()],
                ring_width: 0.25,
                deviation_kj_per_mol: [1.0; CONTRIBUTIONS],
                degrees_of_freedom: 4.0,
            };
            let matrices = LevelMatrices::new(&data, start.ring_width);
            let found = search(&data, &matrices, start, rounds, |round, posterior| {
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
                (FACTOR, tables.factor_bytes()),
                (LEFT_OUT, left_out.into_bytes()),
            ];
            for (path, bytes) in files {
                if check {
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

//! Makes the tables of entropies and heat capacities of the core from `data/`, and says how good they are.

use std::error::Error;
use std::fmt::Write as _;
use std::path::PathBuf;
use std::process::ExitCode;

use clap::Parser;
use tautring_core::additivity::thermal::{
    DEVIATIONS, GAS_CONSTANT_J_PER_MOL_K, LEVELS, ThermalPrior, WHOLE,
};
use tautring_core::additivity::{CLASSES, Level};
use tautring_report::fit::thermal::{
    Posterior, Published, Quantity, Telling, describe, generated, leave_out, search, summarise,
};

/// Fit entropies and heat capacities of the ideal gas to the published values in data/: find the prior by marginal likelihood, print the
/// left-out errors with and without the symmetry number, write the tables of the core.
#[derive(Parser)]
struct Arguments {
    /// Top folder of the project.
    #[arg(long, default_value = ".")]
    root: PathBuf,
    /// Compare with the committed files instead of writing them; exit 1 if they differ.
    #[arg(long)]
    check: bool,
    /// Rounds of the search for the prior.
    #[arg(long, default_value_t = 15)]
    rounds: usize,
    /// Degrees of freedom of the deviations.
    #[arg(long, default_value_t = 2.0)]
    degrees_of_freedom: f64,
}

fn main() -> ExitCode {
    match run(&Arguments::parse()) {
        Ok(code) => code,
        Err(error) => {
            eprintln!("tautring-fit-thermal: {error}");
            ExitCode::from(2)
        }
    }
}

const ENTROPIES: &str = "data/gas_entropies.csv";
const HEAT_CAPACITIES: &str = "data/gas_heat_capacities.csv";
const SUMMARY: &str = "data/thermal_left_out.txt";
const SOURCE: &str = "core/src/additivity/thermal/tables.rs";

fn run(arguments: &Arguments) -> Result<ExitCode, Box<dyn Error>> {
    let read = |quantity, path: &str| -> Result<Published, Box<dyn Error>> {
        let text = std::fs::read_to_string(arguments.root.join(path))
            .map_err(|e| format!("{path}: {e}; give the project's top folder with --root"))?;
        Ok(Published::read(quantity, &text).map_err(|e| format!("{path}: {e}"))?)
    };
    let entropies = read(Quantity::Entropy, ENTROPIES)?;
    let heat_capacities = read(Quantity::HeatCapacity, HEAT_CAPACITIES)?;
    let without = fit(arguments, &entropies, 0.0)?;
    let entropy = fit(arguments, &entropies, -GAS_CONSTANT_J_PER_MOL_K)?;
    let heat_capacity = fit(arguments, &heat_capacities, 0.0)?;

    let mut summary = format!(
        "Left-out errors, J/(mol K) (each constitution predicted from all others; coverage of the 95 % interval for a new published value, and the\nrange in which it lies by chance in 99 of 100 cases). {} rows of entropies, {} of heat capacities; {} rows that lack a temperature are not fitted.\n",
        entropies.rows.len(),
        heat_capacities.rows.len(),
        heat_capacities.incomplete,
    );
    for (data, posterior) in [(&entropies, &entropy), (&heat_capacities, &heat_capacity)] {
        summary += &describe(data, &leave_out(data, posterior)?);
    }
    summary += "\nWhat the symmetry number is worth in the entropy: left-out errors and logarithm of the marginal likelihood\n";
    for (name, posterior) in [("with it", &entropy), ("without", &without)] {
        if let Some(s) = summarise(&leave_out(&entropies, posterior)?) {
            writeln!(
                summary,
                "{name:12} median {:.2}, mean {:.2}, ln L {:.1}",
                s.median_j_per_mol_k, s.mean_j_per_mol_k, posterior.log_likelihood
            )?;
        }
    }
    summary += "\nStandard uncertainty at 298.15 K from all measurements and from those that the core keeps, median of the fitted molecules\n";
    let mut fits = Vec::new();
    let chosen = [Telling::of(&entropy)?, Telling::of(&heat_capacity)?];
    let both = [(&entropies, &entropy), (&heat_capacities, &heat_capacity)];
    for ((data, posterior), telling) in both.into_iter().zip(&chosen) {
        let [all, kept] = telling.medians_j_per_mol_k(data, posterior);
        writeln!(
            summary,
            "{:32} {all:.2} from {}, {kept:.2} from {}",
            data.quantity.names()[0],
            data.rows.len(),
            telling.rows.len()
        )?;
        fits.push((data, posterior, telling));
    }
    print!("{summary}");
    let source = generated(&fits)?;
    for (path, text) in [(SUMMARY, summary), (SOURCE, source)] {
        let place = arguments.root.join(path);
        if !arguments.check {
            std::fs::write(place, text)?;
        } else if std::fs::read_to_string(place)? != text {
            eprintln!(
                "{path} differs from what data/ gives; run `cargo run --release --bin tautring-fit-thermal`"
            );
            return Ok(ExitCode::from(1));
        }
    }
    Ok(ExitCode::SUCCESS)
}

fn fit(
    arguments: &Arguments,
    data: &Published,
    symmetry_j_per_mol_k: f64,
) -> Result<Posterior, Box<dyn Error>> {
    let rounds = arguments.rounds;
    let start = start(data.quantity, arguments.degrees_of_freedom);
    let report = |round: usize, posterior: &Posterior| {
        if round.is_multiple_of(5) {
            let likelihood = posterior.log_likelihood;
            eprintln!("round {round} of {rounds}: ln L = {likelihood:.2}");
        }
    };
    let posterior = search(data, &start, symmetry_j_per_mol_k, rounds, report)?;
    eprintln!("{:?}\n{:?}", posterior.prior, posterior.shape);
    Ok(posterior)
}

/// Where the search starts: orders of magnitude of what an atom, a bond, a group and a ring bring, J/(mol K).
fn start(quantity: Quantity, degrees_of_freedom: f64) -> ThermalPrior {
    let level = |level| match level {
        Level::Element | Level::RingSize => 20.0,
        Level::Atom => 10.0,
        Level::BondElements | Level::Bond => 5.0,
        _ => 2.0,
    };
    // The translation brings 3/2 R for each unit of the logarithm of the mass, rotation about as much again.
    let whole: [f64; WHOLE] = match quantity {
        Quantity::Entropy => [100.0, 30.0, 6.0],
        Quantity::HeatCapacity => [30.0, 10.0, 1.0],
    };
    ThermalPrior {
        tau_j_per_mol_k: LEVELS.map(|l| [level(l); CLASSES]),
        whole_j_per_mol_k: whole,
        deviation_j_per_mol_k: [1.0; DEVIATIONS],
        degrees_of_freedom,
    }
}

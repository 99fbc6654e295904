//! What each level is worth: how much worse the fit is without it.

use std::fmt::Write as _;

use tautring_core::additivity::{AdditivityError, CLASSES, Level, Property};

use super::design::Design;
use super::inference::Posterior;
use super::validation::{Summary, leave_out, summarise};
use crate::dataset::Dataset;

/// The table of levels, as text: what a feature contributes, and by how much likelihood and left-out errors change without the level.
///
/// The other levels keep their variances, so the figures are what a level adds to the others as they are; two that say nearly the same
/// both come out small. `progress` hears of each level.
///
/// # Errors
/// [`AdditivityError::NotPositiveDefinite`].
pub fn worth_of_levels(
    data: &Dataset,
    design: &Design,
    posterior: &Posterior,
    mut progress: impl FnMut(Level),
) -> Result<String, AdditivityError> {
    let gas = |posterior: &Posterior| -> Result<Option<Summary>, AdditivityError> {
        let errors = leave_out(data, posterior)?;
        let chosen = errors
            .iter()
            .filter(|e| data.rows[e.row].property == Property::Gas);
        Ok(summarise(chosen))
    };
    let mut text = String::from(
        "What each level adds to the others: change without it (ln L: logarithm of the marginal likelihood of all measurements; left-out errors in the gas)\n\n",
    );
    let _ = writeln!(
        text,
        "{:22}{:>10}{:>12}{:>12}{:>12}",
        "level", "ln L", "score", "median", "mean"
    );
    let Some(with) = gas(posterior)? else {
        return Ok(text);
    };
    let _ = writeln!(
        text,
        "{:22}{:>10.1}{:>12.3}{:>12.2}{:>12.2}",
        "all levels",
        posterior.log_likelihood,
        with.score,
        with.median_kj_per_mol,
        with.mean_kj_per_mol
    );
    for level in Level::ALL {
        progress(level);
        let mut prior = posterior.prior;
        for levels in &mut prior.tau_kj_per_mol {
            levels[level as usize] = [0.0; CLASSES];
        }
        let without = posterior.with_features(data, design, &prior)?;
        if let Some(s) = gas(&without)? {
            let _ = writeln!(
                text,
                "{:22}{:>+10.1}{:>+12.3}{:>+12.2}{:>+12.2}",
                level.name(),
                without.log_likelihood - posterior.log_likelihood,
                s.score - with.score,
                s.median_kj_per_mol - with.median_kj_per_mol,
                s.mean_kj_per_mol - with.mean_kj_per_mol
            );
        }
    }
    Ok(text)
}

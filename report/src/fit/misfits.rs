//! Misfits: measured values that disagree with what all other molecules say.

use serde::{Deserialize, Serialize};

/// From how many combined standard deviations on a measured value is a misfit.
///
/// By choice, not by a test of significance: with tails as heavy as these some sound values of odd molecules lie further off, and some wrong
/// ones nearer.
pub const MISFIT_DEVIATIONS: f64 = 4.0;

/// A measured value beside what the model says without any measurement of the molecule.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct LeftOutValue {
    /// Name of the compound as its source gives it.
    pub name: String,
    /// Its structure, as in `data/measurements.csv`.
    pub smiles: String,
    /// Phase or step: `g`, `l`, `s`, `v` or `b`.
    pub phase: String,
    /// Bibliography key of the measured value.
    pub source: String,
    /// The measured value, kJ/mol.
    pub measured_kj_per_mol: f64,
    /// What its family says: the prediction without any measurement of the molecule, kJ/mol.
    pub predicted_kj_per_mol: f64,
    /// Standard uncertainty of the prediction as a statement on the true value, kJ/mol.
    pub u_predicted_kj_per_mol: f64,
    /// Standard uncertainty of the measured value, kJ/mol.
    pub u_measured_kj_per_mol: f64,
}

impl LeftOutValue {
    /// Measured minus predicted over the combined standard deviation, √(u² of the prediction + u² of the measured value).
    pub fn deviations(&self) -> f64 {
        let deviation = self
            .u_predicted_kj_per_mol
            .hypot(self.u_measured_kj_per_mol);
        (self.measured_kj_per_mol - self.predicted_kj_per_mol) / deviation
    }
}

/// A measured value that is a misfit: a line of `data/misfits.csv`.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Misfit {
    /// Name of the compound as its source gives it.
    pub name: String,
    /// Its structure, as in `data/measurements.csv`.
    pub smiles: String,
    /// Phase or step: `g`, `l`, `s`, `v` or `b`.
    pub phase: String,
    /// Bibliography key of the measured value.
    pub source: String,
    /// The measured value, kJ/mol.
    pub measured_kj_per_mol: f64,
    /// What its family says, kJ/mol.
    pub predicted_kj_per_mol: f64,
    /// Standard uncertainty of what the family says, kJ/mol.
    pub u_predicted_kj_per_mol: f64,
    /// Standard uncertainty of the measured value, kJ/mol.
    pub u_measured_kj_per_mol: f64,
    /// Measured minus predicted in combined standard deviations.
    pub standard_deviations: f64,
}

/// The misfits among measured values, the furthest off first.
///
/// Predictions count to two decimals, as `data/left_out.csv` holds them, so that the list follows from that table.
pub fn misfits(values: impl IntoIterator<Item = LeftOutValue>) -> Vec<Misfit> {
    let mut found: Vec<_> = values
        .into_iter()
        .map(|value| LeftOutValue {
            predicted_kj_per_mol: hundredths(value.predicted_kj_per_mol),
            u_predicted_kj_per_mol: hundredths(value.u_predicted_kj_per_mol),
            ..value
        })
        .map(|value| (value.deviations(), value))
        .filter(|(deviations, _)| deviations.abs() > MISFIT_DEVIATIONS)
        .collect();
    found.sort_by(|(a, v), (b, w)| {
        let far = b.abs().total_cmp(&a.abs());
        far.then_with(|| (&v.smiles, &v.phase, &v.source).cmp(&(&w.smiles, &w.phase, &w.source)))
    });
    found
        .into_iter()
        .map(|(deviations, value)| Misfit {
            name: value.name,
            smiles: value.smiles,
            phase: value.phase,
            source: value.source,
            measured_kj_per_mol: value.measured_kj_per_mol,
            predicted_kj_per_mol: value.predicted_kj_per_mol,
            u_predicted_kj_per_mol: value.u_predicted_kj_per_mol,
            u_measured_kj_per_mol: hundredths(value.u_measured_kj_per_mol),
            standard_deviations: hundredths(deviations),
        })
        .collect()
}

/// The misfits as `data/misfits.csv` holds them.
///
/// # Errors
/// [`csv::Error`] when a line cannot be written.
pub fn misfits_csv(misfits: &[Misfit]) -> Result<String, csv::Error> {
    let mut writer = csv::Writer::from_writer(Vec::new());
    for misfit in misfits {
        writer.serialize(misfit)?;
    }
    let bytes = writer
        .into_inner()
        .map_err(csv::IntoInnerError::into_error)?;
    Ok(String::from_utf8_lossy(&bytes).into_owned())
}

/// A number with two decimals, as a table prints it.
fn hundredths(x: f64) -> f64 {
    format!("{x:.2}").parse().unwrap_or(x)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn value(name: &str, measured: f64, u_measured: f64) -> LeftOutValue {
        LeftOutValue {
            name: name.to_owned(),
            smiles: "C".to_owned(),
            phase: "g".to_owned(),
            source: "somewhere".to_owned(),
            measured_kj_per_mol: measured,
            predicted_kj_per_mol: 0.0,
            u_predicted_kj_per_mol: 3.0,
            u_measured_kj_per_mol: u_measured,
        }
    }

    #[test]
    fn four_combined_deviations_make_a_misfit() {
        // √(3² + 4²) = 5, so the limit is 20.
        let values = [
            value("near", 19.9, 4.0),
            value("below", -20.1, 4.0),
            value("far, above", 61.0, 4.0),
        ];
        let found = misfits(values);
        let names: Vec<_> = found.iter().map(|m| m.name.as_str()).collect();
        assert_eq!(names, ["far, above", "below"]);
        assert!((found[1].standard_deviations + 4.02).abs() < 1e-9);
    }

    #[test]
    fn the_table_reads_back_as_written() {
        let found = misfits([value("1,2-odd \"one\"", 100.0, 4.0)]);
        let text = misfits_csv(&found).expect("it can be written");
        let read: Vec<Misfit> = csv::Reader::from_reader(text.as_bytes())
            .deserialize()
            .collect::<Result<_, _>>()
            .expect("it can be read");
        assert_eq!(read, found);
    }
}

//! An estimated entropy or heat capacity with its uncertainty.

use crate::additivity::Estimate;

/// Values at `N` temperatures, or differences of such values, with what makes up their uncertainty.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ThermalEstimate<const N: usize> {
    /// The values, J/(mol K).
    pub values_j_per_mol_k: [f64; N],
    /// Variance of the additive part at the first temperature, J²/(mol² K²).
    pub model_variance: f64,
    /// Squared scale of the heavy-tailed part at the first temperature, J²/(mol² K²).
    pub tail_variance: f64,
    /// Degrees of freedom of the heavy-tailed part.
    pub tail_degrees_of_freedom: f64,
    /// Covariances of the temperatures with each other, that of the first with itself being 1.
    pub shape: [[f64; N]; N],
}

impl<const N: usize> ThermalEstimate<N> {
    /// A weighted sum over the temperatures, in kJ/mol: the weights are in K.
    pub fn weighted_sum(&self, weights_k: &[f64; N]) -> Estimate {
        let joule = self.in_joule(weights_k);
        Estimate {
            value_kj_per_mol: joule.value_kj_per_mol / 1000.0,
            model_variance: joule.model_variance / 1e6,
            tail_variance: joule.tail_variance / 1e6,
            ..joule
        }
    }

    /// Standard uncertainty of a weighted sum over the temperatures, J/(mol K), the weights being numbers.
    ///
    /// `u² = wᵀ C w (σ² + (t s)²)`, as for [`Estimate::u_kj_per_mol`].
    pub fn u_j_per_mol_k(&self, weights: &[f64; N]) -> f64 {
        self.in_joule(weights).u_kj_per_mol()
    }

    /// Expanded uncertainty (95 %) of a weighted sum over the temperatures, J/(mol K), the weights being numbers.
    pub fn expanded_j_per_mol_k(&self, weights: &[f64; N]) -> f64 {
        self.in_joule(weights).expanded_kj_per_mol()
    }

    /// The value at one of the temperatures with its standard uncertainty, J/(mol K); `None` for an index that is not there.
    pub fn at(&self, index: usize) -> Option<(f64, f64)> {
        let value = self.values_j_per_mol_k.get(index).copied()?;
        let mut weights = [0.0; N];
        *weights.get_mut(index)? = 1.0;
        Some((value, self.u_j_per_mol_k(&weights)))
    }

    /// The same estimate as a prediction of a measurement with a standard uncertainty of its own at the first temperature, J/(mol K).
    #[must_use]
    pub fn of_measurement(mut self, u_j_per_mol_k: f64) -> Self {
        self.tail_variance += u_j_per_mol_k * u_j_per_mol_k;
        self
    }

    /// Adds a molecule `number` times by its published values, J/(mol K), whose uncertainty is taken as nothing beside that of estimates.
    #[must_use]
    pub fn with_published(mut self, number: f64, values_j_per_mol_k: &[f64; N]) -> Self {
        for (own, more) in self.values_j_per_mol_k.iter_mut().zip(values_j_per_mol_k) {
            *own += number * more;
        }
        self
    }

    /// A weighted sum in the unit of the values. Quantiles do not ask for the unit, so those of [`Estimate`] serve.
    fn in_joule(&self, weights: &[f64; N]) -> Estimate {
        let values = weights.iter().zip(self.values_j_per_mol_k);
        let mut square = 0.0;
        for (w, row) in weights.iter().zip(&self.shape) {
            for (v, c) in weights.iter().zip(row) {
                square += w * v * c;
            }
        }
        Estimate {
            value_kj_per_mol: values.fold(0.0, |sum, (w, x)| sum + w * x),
            // C is positive definite but for rounding.
            model_variance: square.max(0.0) * self.model_variance,
            tail_variance: square.max(0.0) * self.tail_variance,
            tail_degrees_of_freedom: self.tail_degrees_of_freedom,
        }
    }
}

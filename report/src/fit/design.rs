//! The design of the fit: which molecules count which features, and covariance matrices from them.

use std::collections::BTreeMap;

use tautring_core::additivity::{CLASSES, Key, Level, Part, Prior, cholesky};

use crate::dataset::Dataset;

/// The features of one part, level and class: one prior variance.
pub struct Component {
    /// The part.
    pub part: Part,
    /// The level.
    pub level: Level,
    /// The class.
    pub class: usize,
    /// For each independent feature the molecules that count it, in ascending order, and how often.
    pub columns: Vec<Vec<(usize, f64)>>,
}

/// The components of all parts.
pub struct Design {
    /// The components that at least one molecule counts.
    pub components: Vec<Component>,
    /// For each measurement its molecule.
    pub molecule: Vec<usize>,
    /// For each measurement how often it holds each part.
    pub coefficients: Vec<[f64; Part::ALL.len()]>,
    /// Number of molecules.
    pub molecules: usize,
}

impl Design {
    /// Collects the features of the measured molecules.
    ///
    /// Ring sizes are correlated; their columns are mixed by a root of the correlation matrix, so that all columns are independent.
    pub fn new(data: &Dataset, start: &Prior) -> Self {
        let mut columns: BTreeMap<Key, Vec<(usize, f64)>> = BTreeMap::new();
        for (molecule, known) in data.molecules.iter().enumerate() {
            for term in known.features.terms() {
                let column = columns.entry(term.key).or_default();
                column.push((molecule, term.count));
            }
        }
        let mut components = Vec::new();
        for part in Part::ALL {
            for level in Level::ALL.into_iter().filter(|&l| part.has(l)) {
                for class in 0..CLASSES {
                    let of_component =
                        |key: &Key| key.level() == Some(level) && key.class() == class;
                    let chosen: Vec<(&Key, &Vec<(usize, f64)>)> = columns
                        .iter()
                        .filter(|(key, _)| of_component(key))
                        .collect();
                    if chosen.is_empty() {
                        continue;
                    }
                    let columns = if level.is_smooth() {
                        mixed(&chosen, start)
                    } else {
                        chosen.into_iter().map(|(_, c)| c.clone()).collect()
                    };
                    components.push(Component {
                        part,
                        level,
                        class,
                        columns,
                    });
                }
            }
        }
        Self {
            components,
            molecule: data.rows.iter().map(|row| row.molecule).collect(),
            coefficients: data
                .rows
                .iter()
                .map(|r| r.property.coefficients())
                .collect(),
            molecules: data.molecules.len(),
        }
    }

    /// Covariance matrix of the measurements under a prior, without deviations and errors, packed.
    pub fn covariance(&self, prior: &Prior) -> Vec<f64> {
        let mut by_part: [Vec<f64>; Part::ALL.len()] =
            std::array::from_fn(|_| vec![0.0; cholesky::packed_len(self.molecules)]);
        for component in &self.components {
            let tau = prior.tau_of(component.part, component.level)[component.class];
            let matrix = &mut by_part[component.part as usize];
            for column in &component.columns {
                for (at, &(i, a)) in column.iter().enumerate() {
                    let row = cholesky::packed_len(i);
                    let scaled = tau * tau * a;
                    for &(j, b) in &column[..=at] {
                        matrix[row + j] += scaled * b;
                    }
                }
            }
        }
        let mut packed = Vec::with_capacity(cholesky::packed_len(self.molecule.len()));
        for (i, (&m, a)) in self.molecule.iter().zip(&self.coefficients).enumerate() {
            for (&k, b) in self.molecule[..=i].iter().zip(&self.coefficients) {
                let at = entry(m, k);
                packed.push(
                    a.iter()
                        .zip(b)
                        .zip(&by_part)
                        .map(|((x, y), matrix)| x * y * matrix[at])
                        .sum(),
                );
            }
        }
        packed
    }

    /// Sums of a symmetric packed matrix over the measurements of each pair of molecules, weighted by how often they hold a part, packed.
    pub fn by_molecules(&self, part: Part, packed: &[f64]) -> Vec<f64> {
        let mut sums = vec![0.0; cholesky::packed_len(self.molecules)];
        let c = |row: usize| self.coefficients[row][part as usize];
        for i in 0..self.molecule.len() {
            let row = &packed[cholesky::packed_len(i)..];
            let (m, a) = (self.molecule[i], c(i));
            if a == 0.0 {
                continue;
            }
            for (j, &x) in row[..i].iter().enumerate() {
                let k = self.molecule[j];
                let twice = if m == k { 2.0 } else { 1.0 };
                sums[entry(m, k)] += twice * a * c(j) * x;
            }
            sums[entry(m, m)] += a * a * row[i];
        }
        sums
    }

    /// Sums of numbers over the measurements of each molecule, weighted by how often they hold a part.
    pub fn of_molecules(&self, part: Part, numbers: &[f64]) -> Vec<f64> {
        let mut sums = vec![0.0; self.molecules];
        for ((&m, c), x) in self.molecule.iter().zip(&self.coefficients).zip(numbers) {
            sums[m] += c[part as usize] * x;
        }
        sums
    }
}

/// The columns of ring sizes, mixed by the Cholesky factor of their correlation matrix.
fn mixed(sizes: &[(&Key, &Vec<(usize, f64)>)], start: &Prior) -> Vec<Vec<(usize, f64)>> {
    let mut root: Vec<f64> = Vec::new();
    for (i, (a, _)) in sizes.iter().enumerate() {
        for (b, _) in &sizes[..=i] {
            root.push(start.size_correlation(a.ring_size(), b.ring_size()));
        }
        // Far beyond the rounding of the factorisation, far below any variance that matters.
        if let Some(diagonal) = root.last_mut() {
            *diagonal += 1e-9;
        }
    }
    let definite = cholesky::factorise(&mut root).is_ok();
    debug_assert!(
        definite,
        "a squared-exponential correlation is positive definite"
    );
    (0..sizes.len())
        .map(|j| {
            let mut column: BTreeMap<usize, f64> = BTreeMap::new();
            for (i, (_, counts)) in sizes.iter().enumerate().skip(j) {
                for &(molecule, count) in *counts {
                    *column.entry(molecule).or_default() += count * root[entry(i, j)];
                }
            }
            column.into_iter().collect()
        })
        .collect()
}

/// Where the entry of row i and column j stands in a packed lower triangle.
pub(super) fn entry(i: usize, j: usize) -> usize {
    let (low, high) = (i.min(j), i.max(j));
    cholesky::packed_len(high) + low
}

//! The measurements that an estimate leans on, each with how it is like the molecule and what speaks against it.

use tautring_core::additivity::{
    AdditivityError, Estimate, Family, Likeness, MeasuredMolecule, Property, Support, Without,
    count,
};

use super::findings::{Evidence, Resemblance, Sameness};
use super::reviewer::{ReviewError, Reviewer};
use crate::dataset::{HostFeatures, KnownMolecule};
use crate::structure::{Structure, diastereomer, skeleton};

/// Share of the absolute weight that the listed evidence carries together.
const EVIDENCE_SHARE: f64 = 0.8;

/// The molecule whose evidence is listed.
pub(super) struct Estimated<'a> {
    /// Its features in the gas phase.
    pub(super) features: &'a HostFeatures,
    /// Canonical text of the molecule; mirror images are one.
    pub(super) identity: &'a str,
    /// Canonical text without configurations and isotopes.
    pub(super) skeleton: &'a str,
}

/// What an estimate leans on.
pub(super) struct Leaning {
    /// The measurements with the largest absolute weights.
    pub(super) evidence: Vec<Evidence>,
    /// The share of all absolute weight that they carry.
    pub(super) share: f64,
    /// How much of the molecule they and the others speak for.
    pub(super) support: Support,
}

impl Reviewer {
    /// How much of a molecule other measured molecules speak for: every measurement of its constitution left out.
    ///
    /// [`Grade::of`](tautring_core::additivity::Grade::of) makes the grade of an estimate from it.
    ///
    /// # Errors
    /// [`ReviewError::Additivity`] when the structure is not one neutral organic molecule.
    pub fn blind_support(&self, structure: &Structure) -> Result<Support, ReviewError> {
        let molecule = &structure.molecule;
        let identity = diastereomer(molecule).map_err(AdditivityError::from)?;
        let skeleton = skeleton(molecule).map_err(AdditivityError::from)?;
        let left_out = self
            .by_skeleton
            .get(&skeleton)
            .map_or(&[][..], Vec::as_slice);
        let mut columns = vec![0.0; left_out.len() * self.model.len()];
        let without = Without::new(self.model, left_out, &mut columns)?;
        let features: HostFeatures = count(molecule)?;
        let estimated = Estimated {
            features: &features,
            identity: &identity,
            skeleton: &skeleton,
        };
        let of_gas = features.of(Property::Gas)?;
        Ok(self.lean(&estimated, &of_gas, None, &without)?.1.support)
    }

    /// The estimate of a property without some measurements, and what it leans on.
    ///
    /// `features` are those of the property, `about` names the molecule where its own measurements may be leaned on.
    pub(super) fn lean(
        &self,
        estimated: &Estimated<'_>,
        features: &HostFeatures,
        about: Option<MeasuredMolecule>,
        without: &Without<'_>,
    ) -> Result<(Estimate, Leaning), AdditivityError> {
        let mut weights = self.workspace();
        let model = self.model;
        let estimate = match about {
            Some(about) => model.estimate_measured(features, about, without, &mut weights)?,
            None => model.weigh_without(features, without, &mut weights)?,
        };
        let (evidence, share) = self.evidence(&weights, estimated);
        let overall = evidence.iter().map(|row| row.resemblance.overall);
        let support = Support::of(
            estimated.features,
            self.known.without(self.data(), without.left_out()),
            estimate.expanded_kj_per_mol(),
            overall.fold(0.0, f64::max),
        );
        let leaning = Leaning {
            evidence,
            share,
            support,
        };
        Ok((estimate, leaning))
    }

    /// The measurements with the largest absolute weights, until they carry the share, and what they carry.
    fn evidence(&self, weights: &[f64], estimated: &Estimated<'_>) -> (Vec<Evidence>, f64) {
        let weights = &weights[..self.data().rows.len()];
        let total: f64 = weights.iter().map(|w| w.abs()).sum();
        let mut order: Vec<usize> = (0..weights.len()).collect();
        order.sort_by(|&a, &b| {
            weights[b]
                .abs()
                .total_cmp(&weights[a].abs())
                .then(a.cmp(&b))
        });
        let mut evidence = Vec::new();
        let mut carried = 0.0;
        for index in order {
            let weight = weights[index];
            if carried >= EVIDENCE_SHARE * total || weight == 0.0 {
                break;
            }
            carried += weight.abs();
            let row = &self.data().rows[index];
            let known = self.data().molecule_of(row);
            let resemblance = resemblance(estimated, known);
            evidence.push(Evidence {
                molecule: row.measurement.name.clone(),
                smiles: row.measurement.smiles.clone(),
                weight,
                share: weight.abs() / total,
                phase: row.measurement.phase.clone(),
                value_kj_per_mol: row.measurement.value_kj_per_mol,
                u_kj_per_mol: row.measurement.u_kj_per_mol,
                source: row.measurement.source.clone(),
                resemblance,
                left_out_error_kj_per_mol: self.doubts.left_out_error(&row.measurement),
                misfit: self.doubts.misfit(&row.measurement).cloned(),
                doubts: self
                    .doubts
                    .curated(&known.identity, &row.measurement.phase)
                    .to_vec(),
            });
        }
        let share = if total > 0.0 { carried / total } else { 0.0 };
        (evidence, share)
    }
}

/// How a measured molecule is like the estimated one.
///
/// Molecules are compared by what they count in the gas phase, whatever phase the measurement is of.
fn resemblance(estimated: &Estimated<'_>, known: &KnownMolecule) -> Resemblance {
    let likeness = Likeness::of(estimated.features, &known.features);
    let share = |family| likeness.share(family);
    let sameness = if known.identity == estimated.identity {
        Sameness::Itself
    } else if known.skeleton == estimated.skeleton {
        Sameness::Constitution
    } else {
        Sameness::Another
    };
    Resemblance {
        sameness,
        words: match sameness {
            Sameness::Itself => "the molecule itself".to_owned(),
            Sameness::Constitution => {
                "the molecule, its configuration another or not stated".to_owned()
            }
            Sameness::Another => likeness.to_string(),
        },
        overall: likeness.overall(),
        groups: share(Family::Groups),
        neighbours: share(Family::Neighbours),
        aromatic_rings: share(Family::AromaticRings),
        ring_sizes: share(Family::RingSizes),
        ring_atoms: share(Family::RingAtoms),
        ring_environment: share(Family::RingEnvironment),
    }
}

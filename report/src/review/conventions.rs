//! The strain of each ring system by several conventions, side by side.

use tautring_core::additivity::{Property, Without};
use tautring_core::reactions::{
    Difference, ReactionClass, ReactionError, carbon_free_enthalpy, methylene_increment,
    methylene_ring_size, species,
};

use super::findings::{
    Basis, ConventionStrain, FormationEnthalpy, Participant, Quantity, RingStrain, Strain,
};
use super::measured::measured;
use super::reviewer::{ReviewError, Reviewer, quantity_of};
use crate::dataset::HostFeatures;
use crate::structure::{HostMolecule, MAX_ATOMS, MAX_BONDS, diastereomer, line_notation};

/// A difference of enthalpies of molecules as large as the host reads.
type HostDifference = Difference<4096>;

/// Group increments, in a word.
const GROUP_INCREMENT: &str = "group increment";

/// The homologous convention, in words.
const HOMOLOGOUS: &str = "homologous CH2 increment";

/// A molecule whose strain is looked at.
pub(super) struct Subject<'a> {
    pub(super) molecule: &'a HostMolecule,
    pub(super) gas: &'a FormationEnthalpy,
    pub(super) strain: &'a Strain,
    /// The measurements that the estimates do without.
    pub(super) without: &'a Without<'a>,
}

impl Subject<'_> {
    /// The measured enthalpy of formation in use, if it is one.
    fn measured(&self) -> Option<Quantity> {
        (self.gas.basis == Basis::Measured).then_some(self.gas.quantity)
    }
}

impl Reviewer {
    /// The strain of each strained ring system by each convention.
    ///
    /// The enthalpy of formation of the molecule is the one in use. Partners count with their measured enthalpy where there is one, which
    /// for the small ones is far surer than any estimate; all that is estimated is estimated together, with its covariance.
    pub(super) fn conventions(
        &self,
        subject: &Subject<'_>,
    ) -> Result<Vec<ConventionStrain>, ReviewError> {
        let systems = subject.molecule.ring_systems();
        let mut found = Vec::new();
        for ring_system in &subject.strain.ring_systems {
            let number = ring_system.atoms.first().and_then(|&a| systems.of_atom(a));
            let Some(number) = number else { continue };
            found.push(group_increment(subject, ring_system));
            found.push(self.homologous(subject, ring_system)?);
            for class in ReactionClass::ALL {
                let row = self.by_reaction(subject, ring_system, number, class)?;
                found.push(row);
            }
        }
        Ok(found)
    }

    fn homologous(
        &self,
        subject: &Subject<'_>,
        ring_system: &RingStrain,
    ) -> Result<ConventionStrain, ReviewError> {
        let Some(size) = methylene_ring_size(subject.molecule) else {
            return Ok(ConventionStrain {
                convention: HOMOLOGOUS,
                atoms: ring_system.atoms.clone(),
                reaction: None,
                quantity: None,
                estimate: None,
                basis: None,
                participants: Vec::new(),
                note: "not defined: the convention is for rings of CH2 alone".to_owned(),
            });
        };
        let taken = -(size as f64);
        let increment = methylene_increment()?;
        let mut estimated = HostDifference::default();
        estimated.add(1.0, subject.molecule)?;
        estimated.add_features(taken, &increment)?;
        let mut used = HostDifference::default();
        match subject.measured() {
            Some(own) => used.add_published(1.0, own.value_kj_per_mol, own.u_kj_per_mol),
            None => used.add(1.0, subject.molecule)?,
        }
        used.add_features(taken, &increment)?;
        Ok(ConventionStrain {
            convention: HOMOLOGOUS,
            atoms: ring_system.atoms.clone(),
            reaction: Some(format!(
                "{} -> {size} CH2 of n-alkanes",
                line_notation(subject.molecule)
            )),
            quantity: Some(self.quantity_of_difference(&used, subject.without)?),
            estimate: Some(self.quantity_of_difference(&estimated, subject.without)?),
            basis: Some(subject.gas.basis),
            participants: Vec::new(),
            note: "CH2: the estimated step from dodecane to tridecane".to_owned(),
        })
    }

    fn by_reaction(
        &self,
        subject: &Subject<'_>,
        ring_system: &RingStrain,
        number: usize,
        class: ReactionClass,
    ) -> Result<ConventionStrain, ReviewError> {
        let mut row = ConventionStrain {
            convention: class.name(),
            atoms: ring_system.atoms.clone(),
            reaction: None,
            quantity: None,
            estimate: None,
            basis: None,
            participants: Vec::new(),
            note: String::new(),
        };
        let mut partners: Vec<(i32, HostMolecule)> = Vec::new();
        let built = species::<MAX_ATOMS, MAX_BONDS, MAX_ATOMS, MAX_BONDS>(
            subject.molecule,
            number,
            class,
            &mut |number, molecule| {
                partners.push((number, molecule.clone()));
                Ok(())
            },
        );
        if let Err(error) = built {
            row.note = format!("not defined: {error}");
            return Ok(row);
        }
        let mut used = HostDifference::default();
        let mut estimated = HostDifference::default();
        let all = self.enter(subject, &partners, [&mut used, &mut estimated]);
        row.participants = all.participants;
        row.reaction = Some(equation(
            &line_notation(subject.molecule),
            &row.participants,
        ));
        if let Some(error) = all.unknown {
            row.note = format!("no enthalpy: {error}");
            return Ok(row);
        }
        let unmeasured = row
            .participants
            .iter()
            .filter(|p| p.basis == Basis::Estimated);
        let unmeasured = unmeasured.count();
        let molecule_measured = subject.measured().is_some();
        row.basis = Some(if unmeasured == 0 && molecule_measured {
            Basis::Measured
        } else {
            Basis::Estimated
        });
        row.note = match (unmeasured, molecule_measured) {
            (0, true) => "all molecules measured".to_owned(),
            (0, false) => "the molecule estimated, its partners measured".to_owned(),
            (n, true) => format!("{n} of {} partners estimated", row.participants.len()),
            (n, false) => format!(
                "the molecule and {n} of {} partners estimated",
                row.participants.len()
            ),
        };
        row.quantity = Some(self.quantity_of_difference(&used, subject.without)?);
        row.estimate = Some(self.quantity_of_difference(&estimated, subject.without)?);
        Ok(row)
    }

    /// Enters the molecule and its partners: into the first difference by what was measured, where it was; into the second as estimated.
    fn enter(
        &self,
        subject: &Subject<'_>,
        partners: &[(i32, HostMolecule)],
        [used, estimated]: [&mut HostDifference; 2],
    ) -> Entered {
        let mut unknown = estimated.add(1.0, subject.molecule).err();
        match subject.measured() {
            Some(own) => used.add_published(1.0, own.value_kj_per_mol, own.u_kj_per_mol),
            None => unknown = unknown.or(used.add(1.0, subject.molecule).err()),
        }
        let mut participants = Vec::new();
        for (number, molecule) in partners {
            let factor = -f64::from(*number);
            unknown = unknown.or(estimated.add(factor, molecule).err());
            let known = self.known(molecule);
            match &known {
                Some((value, ..)) => {
                    used.add_published(factor, value.value_kj_per_mol, value.u_kj_per_mol);
                }
                None => unknown = unknown.or(used.add(factor, molecule).err()),
            }
            let (measured, source, name) = match known {
                Some((value, source, name)) => (Some(value), Some(source), name),
                None => (None, None, None),
            };
            participants.push(Participant {
                number: *number,
                smiles: line_notation(molecule),
                formula: molecule.formula().to_string(),
                name,
                basis: match measured {
                    Some(_) => Basis::Measured,
                    None => Basis::Estimated,
                },
                measured,
                source,
            });
        }
        // Reactants first, large molecules before small ones: the same whatever the order of the atoms.
        participants.sort_by(|a, b| {
            let key = |p: &Participant| (p.number > 0, std::cmp::Reverse(p.smiles.len()));
            key(a).cmp(&key(b)).then(a.smiles.cmp(&b.smiles))
        });
        Entered {
            participants,
            unknown,
        }
    }

    /// The surest measured enthalpy of formation of a molecule with its source and name.
    fn known(&self, molecule: &HostMolecule) -> Option<(Quantity, String, Option<String>)> {
        if let Some(published) = carbon_free_enthalpy(molecule) {
            let quantity = measured(published.value_kj_per_mol, published.u_kj_per_mol);
            return Some((
                quantity,
                published.source.to_owned(),
                Some(published.name.to_owned()),
            ));
        }
        let rows = self.by_identity.get(&diastereomer(molecule).ok()?)?;
        let rows = rows.iter().filter_map(|&row| self.data().rows.get(row));
        let gas = rows.filter(|row| row.property == Property::Gas);
        let rows = gas.map(|row| &row.measurement);
        let row = rows.min_by(|a, b| a.u_kj_per_mol.total_cmp(&b.u_kj_per_mol))?;
        Some((
            measured(row.value_kj_per_mol, row.u_kj_per_mol),
            row.source.clone(),
            Some(row.name.clone()),
        ))
    }

    fn quantity_of_difference(
        &self,
        difference: &HostDifference,
        without: &Without<'_>,
    ) -> Result<Quantity, ReviewError> {
        let features: &HostFeatures = difference.features();
        let estimate = self
            .model
            .estimate_without(features, without, &mut self.workspace())?;
        Ok(quantity_of(&difference.with_published(estimate)))
    }
}

/// What was entered into a difference.
struct Entered {
    participants: Vec<Participant>,
    /// Why a molecule could not be entered.
    unknown: Option<ReactionError>,
}

fn group_increment(subject: &Subject<'_>, ring_system: &RingStrain) -> ConventionStrain {
    let strain = subject.strain;
    let alone = strain.ring_systems.len() == 1;
    let measured = alone && subject.measured().is_some();
    ConventionStrain {
        convention: GROUP_INCREMENT,
        atoms: ring_system.atoms.clone(),
        reaction: None,
        quantity: Some(if alone {
            strain.quantity
        } else {
            ring_system.quantity
        }),
        estimate: Some(ring_system.quantity),
        basis: Some(if measured {
            Basis::Measured
        } else {
            Basis::Estimated
        }),
        participants: Vec::new(),
        note: if measured {
            "measured enthalpy minus the strain-free sum of the additivity"
        } else {
            "ring levels of the additivity"
        }
        .to_owned(),
    }
}

/// `C1CC1 + 3 CC -> 3 CCC`.
fn equation(molecule: &str, participants: &[Participant]) -> String {
    let side = |products: bool| {
        let on_side = participants
            .iter()
            .filter(move |p| (p.number > 0) == products);
        on_side.map(|p| match p.number.abs() {
            1 => p.smiles.clone(),
            n => format!("{n} {}", p.smiles),
        })
    };
    let reactants: Vec<_> = std::iter::once(molecule.to_owned())
        .chain(side(false))
        .collect();
    let products: Vec<_> = side(true).collect();
    format!("{} -> {}", reactants.join(" + "), products.join(" + "))
}

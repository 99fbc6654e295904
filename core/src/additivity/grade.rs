//! How far to trust a value, in plain words that numbers define.

use super::features::Features;
use super::key::Key;
use super::likeness::{Family, Share};

/// How far to trust an enthalpy of formation.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
#[cfg_attr(feature = "serde", serde(rename_all = "lowercase"))]
pub enum Grade {
    /// The molecule itself was measured.
    Measured,
    /// An estimate that leans on much like it, and says that it is sure.
    #[cfg_attr(feature = "serde", serde(rename = "well supported"))]
    WellSupported,
    /// An estimate for a molecule whose parts were measured, seldom or far from it.
    Extrapolated,
    /// An estimate for a molecule with parts that nobody has measured, or one that hardly says anything.
    Outside,
}

/// In how many measured molecules a group occurs so that its contribution does not hang on one or two of them.
pub const OFTEN: usize = 3;

/// Least share of groups that occur in at least [`OFTEN`] measured molecules for an estimate that is well supported.
pub const WELL_SUPPORTED_GROUPS: f64 = 0.8;

/// Least likeness of the most alike molecule in the evidence for an estimate that is well supported.
pub const WELL_SUPPORTED_LIKENESS: f64 = 0.7;

/// Widest expanded uncertainty (95 %) of an estimate that is well supported, kJ/mol: where the left-out errors of nine molecules in ten leap
/// from below 8 to 20 kJ/mol.
pub const WELL_SUPPORTED_KJ_PER_MOL: f64 = 20.0;

/// Share of groups that occur in any measured molecule, below which an estimate is outside.
pub const OUTSIDE_GROUPS: f64 = 0.5;

/// Likeness of the most alike molecule in the evidence, below which an estimate is outside.
pub const OUTSIDE_LIKENESS: f64 = 0.3;

/// Expanded uncertainty (95 %) above which an estimate is outside, kJ/mol: the interval is then as wide as the strain of a three-membered
/// ring, and does not tell a molecule with such a ring from one without.
pub const OUTSIDE_KJ_PER_MOL: f64 = 60.0;

/// How much of a molecule other, measured molecules speak for.
#[derive(Clone, Copy, Debug, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Support {
    /// Atoms and bonds by type that occur in a measured molecule.
    pub composition: Share,
    /// Groups that occur in a measured molecule.
    pub groups: Share,
    /// Groups that occur in at least [`OFTEN`] measured molecules.
    pub groups_often: Share,
    /// Aromatic rings with their patterns of substitution.
    pub aromatic_rings: Share,
    /// Sizes of the other rings.
    pub ring_sizes: Share,
    /// Atoms and bonds of the other rings, each with the ring's size.
    pub ring_atoms: Share,
    /// What several rings share, and configurations in rings.
    pub ring_environment: Share,
    /// The largest likeness among the measurements that carry the estimate, from 0 to 1.
    pub closest: f64,
    /// Expanded uncertainty (95 %) of the estimate for the true value, kJ/mol.
    pub expanded_kj_per_mol: f64,
}

impl Support {
    /// The support of an estimate: `measured_in` says in how many measured molecules a feature occurs, `closest` is the largest
    /// [likeness](super::Likeness::overall) in the evidence.
    pub fn of<const F: usize>(
        features: &Features<F>,
        measured_in: impl Fn(Key) -> usize,
        expanded_kj_per_mol: f64,
        closest: f64,
    ) -> Self {
        let share = |family: Family, least: usize| {
            let mut share = Share::default();
            let terms = features.terms().iter();
            for term in terms.filter(|t| t.key.level().and_then(Family::of) == Some(family)) {
                share.add(term.count, measured_in(term.key) >= least);
            }
            share
        };
        Self {
            composition: share(Family::Composition, 1),
            groups: share(Family::Groups, 1),
            groups_often: share(Family::Groups, OFTEN),
            aromatic_rings: share(Family::AromaticRings, 1),
            ring_sizes: share(Family::RingSizes, 1),
            ring_atoms: share(Family::RingAtoms, 1),
            ring_environment: share(Family::RingEnvironment, 1),
            closest,
            expanded_kj_per_mol,
        }
    }
}

impl Grade {
    /// Every grade, the surest first.
    pub const ALL: [Self; 4] = [
        Self::Measured,
        Self::WellSupported,
        Self::Extrapolated,
        Self::Outside,
    ];

    /// The grade of an estimate.
    ///
    /// Outside, if any holds: a kind of atom, bond or ring size was never measured; fewer than [`OUTSIDE_GROUPS`] of the groups were; the likeness is
    /// below [`OUTSIDE_LIKENESS`]; U is above [`OUTSIDE_KJ_PER_MOL`] or no number. Well supported, if all hold: every group and all of the rings were measured,
    /// at least [`WELL_SUPPORTED_GROUPS`] of the groups often; the likeness is at least [`WELL_SUPPORTED_LIKENESS`]; U is at most
    /// [`WELL_SUPPORTED_KJ_PER_MOL`]. Else extrapolated.
    pub fn of(support: &Support) -> Self {
        let inside = support.composition.is_all()
            && support.ring_sizes.is_all()
            && support.groups.fraction() >= OUTSIDE_GROUPS
            && support.closest >= OUTSIDE_LIKENESS
            && support.expanded_kj_per_mol <= OUTSIDE_KJ_PER_MOL;
        let well_supported = support.groups.is_all()
            && support.groups_often.fraction() >= WELL_SUPPORTED_GROUPS
            && support.ring_atoms.is_all()
            && support.ring_environment.is_all()
            && support.closest >= WELL_SUPPORTED_LIKENESS
            && support.expanded_kj_per_mol <= WELL_SUPPORTED_KJ_PER_MOL;
        match (inside, well_supported) {
            (false, _) => Self::Outside,
            (true, false) => Self::Extrapolated,
            (true, true) => Self::WellSupported,
        }
    }

    /// The grade in words, as reports print it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Measured => "measured",
            Self::WellSupported => "well supported",
            Self::Extrapolated => "extrapolated",
            Self::Outside => "outside",
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::additivity::Level;

    fn all(count: f64) -> Share {
        Share {
            shared: count,
            of: count,
        }
    }

    const NONE: Share = Share {
        shared: 0.0,
        of: 0.0,
    };

    fn sure() -> Support {
        Support {
            composition: all(7.0),
            groups: all(5.0),
            groups_often: all(5.0),
            aromatic_rings: NONE,
            ring_sizes: all(1.0),
            ring_atoms: all(6.0),
            ring_environment: NONE,
            closest: 0.9,
            expanded_kj_per_mol: 10.0,
        }
    }

    fn but(change: impl Fn(&mut Support)) -> Grade {
        let mut support = sure();
        change(&mut support);
        Grade::of(&support)
    }

    #[test]
    fn each_number_alone_lowers_the_grade() {
        assert_eq!(but(|_| ()), Grade::WellSupported);
        let one_less: [fn(&mut Support); 5] = [
            |s| s.groups.shared = 4.0,
            |s| s.groups_often.shared = 3.0,
            |s| s.ring_atoms.shared = 5.0,
            |s| s.closest = 0.69,
            |s| s.expanded_kj_per_mol = 20.1,
        ];
        for change in one_less {
            assert_eq!(but(change), Grade::Extrapolated);
        }
        let far: [fn(&mut Support); 6] = [
            |s| s.composition.shared = 6.0,
            |s| s.groups.shared = 2.0,
            |s| s.ring_sizes.shared = 0.0,
            |s| s.closest = 0.29,
            |s| s.expanded_kj_per_mol = 60.1,
            |s| s.expanded_kj_per_mol = f64::NAN,
        ];
        for change in far {
            assert_eq!(but(change), Grade::Outside);
        }
    }

    #[test]
    fn groups_are_counted_by_the_molecules_they_occur_in() {
        let group = |token| Key::new(Level::Group, 0, &[token]);
        let mut features: Features<4> = Features::new();
        for (token, count) in [(0, 4.0), (1, 2.0), (3, 1.0)] {
            features.add(group(token), count).expect("there is room");
        }
        let measured_in = |key| {
            [0, 1, 3]
                .into_iter()
                .find(|&n| group(n) == key)
                .unwrap_or(0) as usize
        };
        let support = Support::of(&features, measured_in, 1.0, 1.0);
        let share = |shared: f64| Share { shared, of: 7.0 };
        assert_eq!(support.groups, share(3.0));
        assert_eq!(support.groups_often, share(1.0));
        assert!(support.ring_sizes.is_all());
    }
}

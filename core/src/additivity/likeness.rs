//! How alike two molecules are, in the features that the additivity counts.

use core::fmt;

use super::features::Features;
use super::level::Level;

/// Families of levels in which two molecules are compared.
///
/// Levels that repeat a finer one in coarser words belong to none, so that nothing counts twice.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
#[cfg_attr(feature = "serde", serde(rename_all = "snake_case"))]
pub enum Family {
    /// Elements, atoms by type and bonds by type.
    Composition,
    /// Groups after Benson.
    Groups,
    /// Pairs of atoms two and three bonds apart, and contacts further off.
    Neighbours,
    /// Aromatic rings with their patterns of substitution.
    AromaticRings,
    /// Sizes of the other rings.
    RingSizes,
    /// Atoms and bonds of the other rings, each with the ring's size.
    RingAtoms,
    /// What several rings share, and configurations in rings.
    RingEnvironment,
}

impl Family {
    /// Every family, coarse to fine.
    pub const ALL: [Self; 7] = [
        Self::Composition,
        Self::Groups,
        Self::Neighbours,
        Self::AromaticRings,
        Self::RingSizes,
        Self::RingAtoms,
        Self::RingEnvironment,
    ];

    /// The family of a level, if it has one.
    pub const fn of(level: Level) -> Option<Self> {
        Some(match level {
            Level::Element | Level::Atom | Level::Bond => Self::Composition,
            Level::Group => Self::Groups,
            Level::Geminal
            | Level::NearPair
            | Level::Vicinal
            | Level::OneFive
            | Level::Cis
            | Level::RingVicinal => Self::Neighbours,
            Level::AromaticRing | Level::AromaticPair | Level::Resonance => Self::AromaticRings,
            Level::RingSize => Self::RingSizes,
            Level::RingAtom | Level::RingBond => Self::RingAtoms,
            Level::RingJunction
            | Level::RingEnvironment
            | Level::RingConfiguration
            | Level::RingSides => Self::RingEnvironment,
            _ => return None,
        })
    }
}

/// How many of a molecule's features of one family another molecule has, too.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
#[cfg_attr(feature = "serde", derive(serde::Serialize))]
pub struct Share {
    /// Count of the features that both have, as often as the first has them.
    pub shared: f64,
    /// Count of the features that the first has.
    pub of: f64,
}

impl Share {
    /// The part that is shared, from 0 to 1; 1 where there is nothing to share.
    pub fn fraction(self) -> f64 {
        if self.of > 0.0 {
            self.shared / self.of
        } else {
            1.0
        }
    }

    /// Whether all is shared, as it is where there is nothing to share.
    pub fn is_all(self) -> bool {
        self.shared >= self.of
    }

    /// Counts a feature that is shared or not.
    pub(super) fn add(&mut self, count: f64, is_shared: bool) {
        self.of += count;
        if is_shared {
            self.shared += count;
        }
    }
}

/// How alike a measured molecule is to the one that is estimated.
///
/// The comparison is one-sided: what matters is which features of the estimated molecule the measured one can speak for. A feature is
/// shared when the measured molecule has it at all, and counts as often as the estimated molecule has it.
///
/// # Shapes
/// Printed, it is a few words such as `same ring, 4 of 5 groups`.
///
/// ```
/// use tautring_core::additivity::{Family, Features, Key, Level, Likeness};
/// let group = |token| Key::new(Level::Group, 0, &[token]);
/// let mut estimated: Features<8> = Features::new();
/// estimated.add(group(1), 2.0)?;
/// estimated.add(group(2), 1.0)?;
/// let mut measured: Features<8> = Features::new();
/// measured.add(group(1), 7.0)?;
/// let likeness = Likeness::of(&estimated, &measured);
/// assert_eq!(likeness.share(Family::Groups).shared, 2.0);
/// # Ok::<(), tautring_core::additivity::AdditivityError>(())
/// ```
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Likeness {
    shares: [Share; Family::ALL.len()],
    /// Whether the measured molecule has a ring that is not aromatic.
    measured_has_ring: bool,
    /// Whether its rings share something that those of the estimated molecule do not, as fused rings do beside spiro ones.
    joined_otherwise: bool,
}

impl Likeness {
    /// Compares the features of the estimated molecule with those of a measured one.
    pub fn of<const F: usize, const G: usize>(
        estimated: &Features<F>,
        measured: &Features<G>,
    ) -> Self {
        let mut shares = [Share::default(); Family::ALL.len()];
        for term in estimated.terms() {
            let Some(family) = term.key.level().and_then(Family::of) else {
                continue;
            };
            let terms = measured.terms();
            let is_shared = terms.binary_search_by_key(&term.key, |t| t.key).is_ok();
            if let Some(share) = shares.get_mut(family as usize) {
                share.add(term.count, is_shared);
            }
        }
        let of_family = |family| {
            let terms = measured.terms().iter().map(|term| term.key);
            terms.filter(move |key| key.level().and_then(Family::of) == Some(family))
        };
        let is_new = |key| {
            let terms = estimated.terms();
            terms.binary_search_by_key(&key, |t| t.key).is_err()
        };
        Self {
            shares,
            measured_has_ring: of_family(Family::RingSizes).next().is_some(),
            joined_otherwise: of_family(Family::RingEnvironment).any(is_new),
        }
    }

    /// What is shared of one family.
    pub fn share(&self, family: Family) -> Share {
        self.shares
            .get(family as usize)
            .copied()
            .unwrap_or_default()
    }

    /// The likeness as one number from 0 (nothing shared) to 1 (everything): the mean of the fractions of groups, neighbours and, where
    /// the estimated molecule has them, rings of each family.
    pub fn overall(&self) -> f64 {
        let compared = Family::ALL
            .into_iter()
            .filter(|&family| family != Family::Composition)
            .map(|family| self.share(family))
            .filter(|share| share.of > 0.0);
        let (sum, number) = compared.fold((0.0, 0.0), |(sum, number), share| {
            (sum + share.fraction(), number + 1.0)
        });
        if number > 0.0 {
            sum / number
        } else {
            self.share(Family::Composition).fraction()
        }
    }

    /// What is said of the rings; nothing where the estimated molecule has none that is not aromatic.
    fn rings(&self) -> Option<Rings> {
        let sizes = self.share(Family::RingSizes);
        let environment = self.share(Family::RingEnvironment);
        if sizes.of <= 0.0 {
            return None;
        }
        Some(if sizes.shared <= 0.0 {
            Rings::Other
        } else if !sizes.is_all() {
            Rings::SomeSizes
        } else if !self.share(Family::RingAtoms).is_all() {
            Rings::Sizes
        } else if environment.of > 0.0 && environment.is_all() && !self.joined_otherwise {
            Rings::Environment
        } else {
            Rings::Atoms
        })
    }
}

/// How alike the rings are, from nothing shared to everything.
#[derive(Clone, Copy, PartialEq)]
enum Rings {
    /// No ring of any of the sizes.
    Other,
    /// Rings of some of the sizes.
    SomeSizes,
    /// Rings of all sizes, made of other atoms or bonds.
    Sizes,
    /// The same ring atoms and bonds.
    Atoms,
    /// The same ring atoms and bonds, joined in the same way.
    Environment,
}

impl fmt::Display for Likeness {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let groups = self.share(Family::Groups);
        let sizes = self.share(Family::RingSizes);
        let rings = self.rings();
        if groups.shared <= 0.0 && rings.is_none_or(|rings| rings == Rings::Other) {
            return f.write_str(if self.share(Family::Composition).shared > 0.0 {
                "elements and bonds only"
            } else {
                "nothing in common"
            });
        }
        let several = if sizes.of > 1.0 { "s" } else { "" };
        match rings {
            None => {}
            Some(Rings::Other) if self.measured_has_ring => f.write_str("other rings, ")?,
            Some(Rings::Other) => f.write_str("no ring, ")?,
            Some(Rings::SomeSizes) => {
                write!(f, "{:.0} of {:.0} ring sizes, ", sizes.shared, sizes.of)?;
            }
            Some(Rings::Sizes) => write!(f, "same ring size{several}, ")?,
            Some(Rings::Atoms) => write!(f, "same ring{several}, ")?,
            Some(Rings::Environment) => f.write_str("same ring environment, ")?,
        }
        if groups.shared <= 0.0 {
            f.write_str("no group")
        } else if !groups.is_all() {
            write!(f, "{:.0} of {:.0} groups", groups.shared, groups.of)
        } else if groups.of > 1.0 {
            write!(f, "all {:.0} groups", groups.of)
        } else {
            f.write_str("same group")
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::additivity::Key;

    type Some = Features<16>;

    fn features(counts: &[(Level, u64, f64)]) -> Some {
        let mut features = Some::new();
        for &(level, token, count) in counts {
            let key = if level == Level::RingSize {
                Key::smooth(level, token as usize)
            } else {
                Key::new(level, 0, &[token])
            };
            features.add(key, count).expect("there is room");
        }
        features
    }

    fn words(
        estimated: &[(Level, u64, f64)],
        measured: &[(Level, u64, f64)],
    ) -> heapless::String<64> {
        use core::fmt::Write as _;
        let mut text = heapless::String::new();
        let likeness = Likeness::of(&features(estimated), &features(measured));
        write!(text, "{likeness}").expect("there is room");
        text
    }

    const CARBON: (Level, u64, f64) = (Level::Element, 6, 3.0);

    #[test]
    fn a_chain_is_told_by_its_groups() {
        let chain = [CARBON, (Level::Group, 1, 2.0), (Level::Group, 2, 3.0)];
        assert_eq!(words(&chain, &chain), "all 5 groups");
        let shorter = [CARBON, (Level::Group, 2, 1.0)];
        assert_eq!(words(&chain, &shorter), "3 of 5 groups");
        assert_eq!(words(&chain, &[CARBON]), "elements and bonds only");
        assert_eq!(words(&chain, &[]), "nothing in common");
    }

    #[test]
    fn rings_are_told_by_size_then_atoms_then_how_they_are_joined() {
        let fused = [
            (Level::Group, 1, 4.0),
            (Level::RingSize, 3, 1.0),
            (Level::RingSize, 5, 1.0),
            (Level::RingAtom, 7, 6.0),
            (Level::RingJunction, 8, 1.0),
        ];
        assert_eq!(words(&fused, &fused), "same ring environment, all 4 groups");
        assert_eq!(words(&fused, &fused[..4]), "same rings, all 4 groups");
        assert_eq!(words(&fused, &fused[..3]), "same ring sizes, all 4 groups");
        assert_eq!(
            words(&fused, &fused[..2]),
            "1 of 2 ring sizes, all 4 groups"
        );
        assert_eq!(words(&fused, &fused[..1]), "no ring, all 4 groups");
        let [group, three, five, atoms, junction] = fused;
        let bridged = [
            group,
            three,
            five,
            atoms,
            junction,
            (Level::RingJunction, 9, 1.0),
        ];
        assert_eq!(words(&fused, &bridged), "same rings, all 4 groups");
        let other = [fused[0], (Level::RingSize, 6, 1.0)];
        assert_eq!(words(&fused, &other), "other rings, all 4 groups");
        assert_eq!(
            words(&fused, &fused[1..]),
            "same ring environment, no group"
        );
    }

    #[test]
    fn the_number_is_the_mean_over_families_that_the_molecule_has() {
        let estimated = [
            (Level::Group, 1, 3.0),
            (Level::Group, 2, 1.0),
            (Level::RingSize, 4, 1.0),
        ];
        let measured = [(Level::Group, 1, 1.0)];
        let likeness = Likeness::of(&features(&estimated), &features(&measured));
        assert!((likeness.overall() - 0.375).abs() < 1e-15);
    }
}

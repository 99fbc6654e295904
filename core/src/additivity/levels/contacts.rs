//! Crowding that no rotation avoids: gauche contacts and 1,5 contacts.
//!
//! # Source
//! `benson-1976` for the counting of gauche contacts in the best staggered conformation.

use super::composition::sorted;
use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::{Site, Skeleton};

/// Counts gauche and 1,5 contacts.
pub(super) fn count<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    for (bond, _, [a, b]) in skeleton.bonds() {
        if skeleton.is_ring_bond(bond) || !a.kind.is_saturated() || !b.kind.is_saturated() {
            continue;
        }
        let contacts = unavoidable_gauche(a.degree.saturating_sub(1), b.degree.saturating_sub(1));
        if contacts > 0 {
            let [low, high] = sorted(a.kind.token(), b.kind.token());
            features.add(Key::new(Level::Gauche, &[low, high]), f64::from(contacts))?;
        }
    }
    for (_, middle) in skeleton.sites().map(|(i, s)| (s, i)) {
        for (n, first) in skeleton.heavy_neighbours(middle) {
            for (m, second) in skeleton.heavy_neighbours(middle) {
                if n.atom < m.atom && is_branched(first) && is_branched(second) {
                    let [low, high] = sorted(u64::from(first.degree), u64::from(second.degree));
                    let in_ring = u64::from(
                        skeleton.is_ring_bond(usize::from(n.bond))
                            && skeleton.is_ring_bond(usize::from(m.bond)),
                    );
                    let site = skeleton.site(middle).map_or(0, |s| s.kind.token());
                    features.add(Key::new(Level::OneFive, &[low, high, in_ring, site]), 1.0)?;
                }
            }
        }
    }
    Ok(())
}

fn is_branched(site: Site) -> bool {
    site.kind.is_saturated() && site.degree >= 3
}

/// Fewest gauche contacts between `a` substituents on one end and `b` on the other end of a staggered bond.
fn unavoidable_gauche(a: u8, b: u8) -> u8 {
    let pattern = |n: u8| [n > 0, n > 1, n > 2];
    let (front, back) = (pattern(a), pattern(b));
    (0..3)
        .map(|turn| {
            // A front position is anti to one back position and gauche to the other two.
            let mut contacts = 0;
            for (i, &occupied) in front.iter().enumerate() {
                for (j, &other) in back.iter().enumerate() {
                    let anti = (i + turn) % 3 == j;
                    contacts += u8::from(occupied && other && !anti);
                }
            }
            contacts
        })
        .min()
        .unwrap_or(0)
}

#[cfg(test)]
mod tests {
    use super::unavoidable_gauche;

    #[test]
    fn butane_has_none_and_hexamethylethane_six() {
        let counts = [
            (1, 1, 0),
            (1, 2, 1),
            (2, 2, 2),
            (1, 3, 2),
            (2, 3, 4),
            (3, 3, 6),
        ];
        for (a, b, expected) in counts {
            assert_eq!(
                unavoidable_gauche(a, b),
                expected,
                "{a} and {b} substituents"
            );
        }
    }
}

//! On which sides of a ring its substituents stand.
//!
//! In a ring of six the coarse count is the one that carries over: whether two substituents cannot both be equatorial. It is the same for
//! cis-1,2, trans-1,3 and cis-1,4, and for a ring fused on.

use heapless::Vec;

use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::{Skeleton, is_aromatic_ring};
use crate::molecule::{Ligand, TetrahedralStereo};

/// Rings of this size and larger are alike.
const LARGE_RING: usize = 7;

/// A substituent of a ring.
#[derive(Clone, Copy, PartialEq)]
struct Substituent {
    /// Its place along the ring.
    place: usize,
    /// Its atom.
    atom: u16,
    /// Whether its bond is in a ring, too.
    fused: bool,
    /// On which side of the ring it stands.
    side: bool,
}

/// Counts pairs of substituents by their sides, on the rings whose atoms `keep` accepts.
pub(super) fn count<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
    keep: &dyn Fn(usize) -> bool,
) -> Result<(), AdditivityError> {
    let molecule = skeleton.molecule;
    if molecule.tetrahedral().is_empty() {
        return Ok(());
    }
    for ring in molecule.rings().iter() {
        let kept = ring.first().is_some_and(|&atom| keep(usize::from(atom)));
        if !kept || is_aromatic_ring(molecule, ring) {
            continue;
        }
        // A ring atom has at most two ligands outside the ring.
        let mut substituents: Vec<Substituent, A> = Vec::new();
        for mark in molecule.tetrahedral() {
            substituents.extend(on_ring(skeleton, ring, mark));
        }
        for (i, &a) in substituents.iter().enumerate() {
            for &b in substituents.iter().skip(i + 1) {
                if a.place != b.place && a.atom != b.atom {
                    pair(features, ring.len(), a, b)?;
                }
            }
        }
    }
    Ok(())
}

const UNEVEN: u64 = 64;

fn pair<const F: usize>(
    features: &mut Features<F>,
    size: usize,
    a: Substituent,
    b: Substituent,
) -> Result<(), AdditivityError> {
    let along = a.place.abs_diff(b.place);
    let apart = along.min(size - along);
    let same = a.side == b.side;
    let fused = a.fused && b.fused;
    if size == 6 && same != (apart == 2) {
        features.add(Key::new(Level::RingSides, 0, &[UNEVEN]), 1.0)?;
    }
    if size != 6 || fused {
        let apart = if size < 6 { apart as u64 } else { 0 };
        let size = size.min(LARGE_RING) as u64;
        let tokens = [size, apart, u64::from(fused), u64::from(same)];
        features.add(Key::new(Level::RingSides, 0, &tokens), 1.0)?;
    }
    Ok(())
}

/// The substituents at a centre of a ring with the side on which they stand; none when the centre is not in the ring.
///
/// The side of a ligand: whether the ring's way through the centre runs clockwise around it.
fn on_ring<const A: usize, const B: usize>(
    skeleton: &Skeleton<A, B>,
    ring: &[u16],
    mark: &TetrahedralStereo,
) -> impl Iterator<Item = Substituent> {
    let place = ring.iter().position(|&atom| atom == mark.centre);
    place.into_iter().flat_map(move |place| {
        let at = |place: usize| ring.get(place % ring.len().max(1)).copied();
        let before = at(place + ring.len().saturating_sub(1));
        let after = at(place + 1);
        let bonds = skeleton.molecule.neighbours(usize::from(mark.centre));
        bonds.iter().filter_map(move |n| {
            let outside = Some(n.atom) != before && Some(n.atom) != after;
            skeleton.site(usize::from(n.atom)).filter(|_| outside)?;
            let order = |ligand: Ligand| match ligand {
                Ligand::Atom(atom) if atom == n.atom => 0,
                Ligand::Atom(atom) if Some(atom) == before => 1,
                Ligand::Atom(atom) if Some(atom) == after => 2,
                Ligand::Atom(_) | Ligand::Implicit => 3,
            };
            Some(Substituent {
                place,
                atom: n.atom,
                fused: skeleton.is_ring_bond(usize::from(n.bond)),
                side: mark.is_clockwise_by(order),
            })
        })
    })
}

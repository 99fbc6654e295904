//! Where the atoms stand: flat where flat is good, cages as seen from the side that shows most.

use super::assembly;
use super::cage;
use super::canvas::Point;
use super::crowding;
use super::overlap::Legibility;
use super::planar;
use crate::structure::HostMolecule;

/// Rings up to this size make a ring system compact: larger bridged systems (cyclophanes) read better flat.
const COMPACT_RING: usize = 8;

/// A layout of a whole molecule.
#[derive(Clone, Debug)]
pub(super) struct Layout {
    /// The atoms, bonds about 1 long, y downwards.
    pub(super) points: Vec<Point>,
    /// Distance from the eye, larger is farther; 0 where the drawing is flat.
    pub(super) depths: Vec<f64>,
}

impl Layout {
    pub(super) fn of(molecule: &HostMolecule) -> Self {
        let bonds = bonds(molecule);
        let mut flat = planar::layout(molecule);
        if let Some(points) = &mut flat {
            crowding::spread(points, &bonds);
        }
        let cages = cages(molecule, flat.as_deref());
        match flat {
            Some(points) if cages.is_empty() => Self {
                depths: vec![0.0; points.len()],
                points,
            },
            Some(points) => assembly::assemble(molecule, &points, &cages),
            // The last resort draws anything.
            None => {
                let projection = cage::layout(molecule.atoms().len(), &bonds);
                Self {
                    points: projection.points,
                    depths: projection.depths,
                }
            }
        }
    }
}

/// The bonds as pairs of indices.
pub(super) fn bonds(molecule: &HostMolecule) -> Vec<[usize; 2]> {
    molecule
        .bonds()
        .iter()
        .map(|bond| bond.atoms.map(usize::from))
        .collect()
}

/// The ring systems to be drawn as cages: compact bridged ones, and whatever the flat layout draws badly.
fn cages(molecule: &HostMolecule, flat: Option<&[Point]>) -> Vec<Vec<usize>> {
    let mut systems = systems(molecule);
    systems.retain(|system| {
        let rings: Vec<_> = molecule
            .rings()
            .iter()
            .filter(|ring| system.contains(&usize::from(ring[0])))
            .collect();
        let inner = inner_bonds(molecule, system);
        if rings.len() < 2 {
            return false;
        }
        let compact = rings.iter().all(|ring| ring.len() <= COMPACT_RING);
        let clean = flat.is_none_or(|points| {
            let points: Vec<_> = system.iter().map(|&atom| points[atom]).collect();
            Legibility::of(&points, &inner).is_clean()
        });
        compact && is_bridged(&rings, system.len(), inner.len()) || !clean
    });
    systems
}

/// Atoms of each ring system, ascending.
fn systems(molecule: &HostMolecule) -> Vec<Vec<usize>> {
    let mut systems: Vec<Vec<usize>> = Vec::new();
    for ring in molecule.rings().iter() {
        let mut joined: Vec<usize> = ring.iter().copied().map(usize::from).collect();
        systems.retain(|system| {
            let apart = !system.iter().any(|atom| joined.contains(atom));
            if !apart {
                joined.extend(system);
            }
            apart
        });
        joined.sort_unstable();
        joined.dedup();
        systems.push(joined);
    }
    systems
}

/// Bonds inside a set of atoms, numbered as the set is.
pub(super) fn inner_bonds(molecule: &HostMolecule, atoms: &[usize]) -> Vec<[usize; 2]> {
    let place = |atom: usize| atoms.iter().position(|&a| a == atom);
    bonds(molecule)
        .into_iter()
        .filter_map(|[a, b]| Some([place(a)?, place(b)?]))
        .collect()
}

/// Whether a ring system closes on itself in space: two rings share more than one bond, a bond is in three rings, or there are more
/// relevant rings than independent ones (the faces of a polyhedron).
fn is_bridged(rings: &[&[u16]], atoms: usize, bonds: usize) -> bool {
    let edges: Vec<Vec<[u16; 2]>> = rings.iter().map(|ring| edges(ring)).collect();
    let shares = |a: usize, b: usize| {
        edges[a]
            .iter()
            .filter(|edge| edges[b].contains(edge))
            .count()
    };
    let bridged = (0..rings.len()).any(|a| (0..a).any(|b| shares(a, b) > 1));
    let propeller = edges
        .as_slice()
        .concat()
        .iter()
        .any(|edge| edges.iter().filter(|ring| ring.contains(edge)).count() > 2);
    bridged || propeller || rings.len() + atoms > bonds + 1
}

fn edges(ring: &[u16]) -> Vec<[u16; 2]> {
    ring.iter()
        .zip(ring.iter().cycle().skip(1))
        .map(|(&a, &b)| [a.min(b), a.max(b)])
        .collect()
}

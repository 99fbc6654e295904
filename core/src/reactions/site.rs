//! The small molecules of a reaction, each by the place in the ring system that it is made from.

use super::class::ReactionClass;
use super::error::ReactionError;
use super::fragment::{Fragment, Places};
use super::opened_system::OpenedSystem;
use crate::molecule::Molecule;

/// A molecule of a reaction, by the unit (its lowest atom) or the link (its bond) that it is made from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Site {
    /// A bare unit: all its bonds capped.
    Hydride(usize),
    /// A unit with its substituents.
    Substituted(usize),
    /// A unit with its substituents and its neighbours in the ring.
    Shell(usize),
    /// A link with its two bare units.
    Pair(usize),
    /// A link with its two units and what multiple bonds tie to them.
    ClosedPair(usize),
    /// A link with the shells of its two units.
    PairOfShells(usize),
}

impl Site {
    /// Calls `emit` with every molecule of a reaction and its stoichiometric number, negative for those that react with the molecule.
    pub(super) fn each<const A: usize, const B: usize>(
        system: &OpenedSystem<'_, A, B>,
        class: ReactionClass,
        emit: &mut dyn FnMut(i32, Self) -> Result<(), ReactionError>,
    ) -> Result<(), ReactionError> {
        for link in system.links() {
            match class {
                ReactionClass::Isodesmic => emit(1, Self::Pair(link))?,
                ReactionClass::Homodesmotic => emit(-1, Self::ClosedPair(link))?,
                ReactionClass::Hyperhomodesmotic => emit(1, Self::PairOfShells(link))?,
            }
        }
        for unit in system.units() {
            let links = system.links_of(unit).fold(0, |links, _| links + 1);
            match class {
                ReactionClass::Isodesmic => {
                    emit(-links, Self::Hydride(unit))?;
                    emit(1, Self::Substituted(unit))?;
                }
                ReactionClass::Homodesmotic => emit(1, Self::Shell(unit))?,
                ReactionClass::Hyperhomodesmotic => emit(1 - links, Self::Shell(unit))?,
            }
        }
        Ok(())
    }

    /// The molecule.
    pub(super) fn molecule<const A: usize, const B: usize, const S: usize, const T: usize>(
        self,
        system: &OpenedSystem<'_, A, B>,
    ) -> Result<Molecule<S, T>, ReactionError> {
        let mut fragment = Fragment::new();
        match self {
            Self::Hydride(unit) => {
                fragment.add(system, &system.bare(unit), None)?;
            }
            Self::Substituted(unit) => {
                fragment.add(system, &system.with_substituents(unit), None)?;
            }
            Self::Shell(unit) => {
                shell(&mut fragment, system, unit, None)?;
            }
            Self::Pair(link) => joined(&mut fragment, system, link, |fragment, end| {
                fragment.add(system, &system.bare(end), None)
            })?,
            Self::ClosedPair(link) => joined(&mut fragment, system, link, |fragment, end| {
                fragment.add(system, &system.beyond(link, end), Some(link))
            })?,
            Self::PairOfShells(link) => joined(&mut fragment, system, link, |fragment, end| {
                shell(fragment, system, end, Some(link))
            })?,
        }
        fragment.finish()
    }
}

/// Adds what `piece` makes of each end of a link and joins the two.
fn joined<const A: usize, const B: usize, const S: usize, const T: usize>(
    fragment: &mut Fragment<S, T>,
    system: &OpenedSystem<'_, A, B>,
    link: usize,
    piece: impl Fn(&mut Fragment<S, T>, usize) -> Result<Places<A>, ReactionError>,
) -> Result<(), ReactionError> {
    let Some([first, second]) = system.ends(link) else {
        return Ok(());
    };
    let one = piece(fragment, first)?;
    let other = piece(fragment, second)?;
    fragment.join(at(&one, first), at(&other, second), system.order(link))
}

/// Adds the unit of an atom with its substituents and with the neighbours over all its links but `without`.
fn shell<const A: usize, const B: usize, const S: usize, const T: usize>(
    fragment: &mut Fragment<S, T>,
    system: &OpenedSystem<'_, A, B>,
    unit: usize,
    without: Option<usize>,
) -> Result<Places<A>, ReactionError> {
    let centre = fragment.add(system, &system.with_substituents(unit), None)?;
    for (link, near, far) in system.links_of(unit) {
        if without != Some(link) {
            let beyond = fragment.add(system, &system.beyond(link, far), Some(link))?;
            fragment.join(at(&centre, near), at(&beyond, far), system.order(link))?;
        }
    }
    Ok(centre)
}

fn at<const A: usize>(places: &Places<A>, atom: usize) -> Option<u16> {
    places.get(atom).copied().flatten()
}

//! The molecules of a reaction, identical ones taken together.

use heapless::Vec;

use super::class::ReactionClass;
use super::error::ReactionError;
use super::opened_system::OpenedSystem;
use super::site::Site;
use crate::molecule::{Element, Molecule};

/// Most different molecules in one reaction.
pub const MAX_SPECIES: usize = 128;

/// Calls `visit` with each molecule that takes part in the opening of a ring system, beside the molecule itself, and with its
/// stoichiometric number: negative for those that react with it, positive for products.
///
/// Identical molecules are one, and those on both sides are cancelled. Products come last; the order does not depend on that of the atoms. A
/// molecule visited has at most `S` atoms and `T` bonds; those of a molecule whose substituents are large need as much room as that.
///
/// ```
/// use tautring_core::molecule::{Atom, BondOrder, Element, MoleculeBuilder};
/// use tautring_core::reactions::{ReactionClass, species};
/// let mut builder = MoleculeBuilder::<8, 8>::new();
/// for _ in 0..3 {
///     builder.add_atom(Atom { element: Element::C, charge: 0, hydrogens: 2, isotope: 0 })?;
/// }
/// for (first, second) in [(0, 1), (1, 2), (2, 0)] {
///     builder.add_bond(first, second, BondOrder::Single)?;
/// }
/// let cyclopropane = builder.finish()?;
/// // Cyclopropane + 3 ethane -> 3 propane.
/// let mut seen = [(0, 0); 2];
/// let mut slots = seen.iter_mut();
/// species::<8, 8, 8, 8>(&cyclopropane, 0, ReactionClass::Homodesmotic, &mut |number, molecule| {
///     *slots.next().expect("two molecules") = (number, molecule.atoms().len());
///     Ok(())
/// })?;
/// assert_eq!(seen, [(-3, 2), (3, 3)]);
/// # Ok::<(), Box<dyn core::error::Error>>(())
/// ```
///
/// # Errors
/// [`ReactionError::NothingToOpen`], [`ReactionError::TooManySpecies`], [`ReactionError::Fragment`], [`ReactionError::Unbalanced`], and
/// what `visit` gives.
pub fn species<const A: usize, const B: usize, const S: usize, const T: usize>(
    molecule: &Molecule<A, B>,
    system: usize,
    class: ReactionClass,
    visit: &mut dyn FnMut(i32, &Molecule<S, T>) -> Result<(), ReactionError>,
) -> Result<(), ReactionError> {
    let opened = OpenedSystem::new(molecule, system);
    if opened.links().next().is_none() {
        return Err(ReactionError::NothingToOpen { system });
    }
    let mut tallies: Vec<(u64, i32, Site), MAX_SPECIES> = Vec::new();
    let mut elements = Element::ALL.map(|e| -i64::from(molecule.formula().count(e)));
    Site::each(&opened, class, &mut |number, site| {
        if number == 0 {
            return Ok(());
        }
        let fragment: Molecule<S, T> = site.molecule(&opened)?;
        let formula = fragment.formula();
        for (total, element) in elements.iter_mut().zip(Element::ALL) {
            *total += i64::from(number) * i64::from(formula.count(element));
        }
        let signature = signature(&fragment);
        if let Some(tally) = tallies.iter_mut().find(|t| t.0 == signature) {
            tally.1 += number;
            return Ok(());
        }
        let full = ReactionError::TooManySpecies {
            capacity: MAX_SPECIES,
        };
        tallies.push((signature, number, site)).map_err(|_| full)
    })?;
    if elements.iter().any(|&total| total != 0) {
        return Err(ReactionError::Unbalanced);
    }
    // Sums over the molecules then run in one order, whatever the order of the atoms.
    tallies.sort_unstable_by_key(|&(signature, number, _)| (number > 0, signature));
    for (_, number, site) in tallies.into_iter().filter(|tally| tally.1 != 0) {
        visit(number, &site.molecule(&opened)?)?;
    }
    Ok(())
}

/// A digest of the canonical code of a molecule: equal for equal molecules, and for others with a chance of one in 2^64.
fn signature<const S: usize, const T: usize>(molecule: &Molecule<S, T>) -> u64 {
    let order = molecule.canonical_order();
    let mut digest = 0;
    for &atom in &order.atoms {
        let index = usize::from(atom);
        let Some(atom) = molecule.atoms().get(index) else {
            continue;
        };
        let own = (atom.element as u64) << 16
            | u64::from(atom.charge.cast_unsigned()) << 8
            | u64::from(atom.hydrogens);
        digest = stir(digest, own);
        let row = molecule.code_row(&order.ranks, index);
        digest = stir(digest, u64::from(row.centre));
        for code in row.bonds {
            digest = stir(digest, u64::from(code));
        }
    }
    digest
}

/// Stirs a digest with one more number (the finaliser of `SplitMix64`).
const fn stir(digest: u64, number: u64) -> u64 {
    let mut x = (digest ^ number).wrapping_add(0x9e37_79b9_7f4a_7c15);
    x = (x ^ (x >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
    x = (x ^ (x >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
    x ^ (x >> 31)
}

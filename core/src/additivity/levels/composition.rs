//! Elements, atoms and bonds.

use crate::additivity::Level;
use crate::additivity::error::AdditivityError;
use crate::additivity::features::Features;
use crate::additivity::key::Key;
use crate::additivity::skeleton::Skeleton;
use crate::molecule::Element;

/// Counts elements, atoms by type and hydrogens, bonds by types and order.
pub(super) fn count<const A: usize, const B: usize, const F: usize>(
    skeleton: &Skeleton<A, B>,
    features: &mut Features<F>,
) -> Result<(), AdditivityError> {
    for (_, site) in skeleton.sites() {
        let hydrogens = u64::from(site.hydrogens);
        features.add(Key::new(Level::Element, &[site.kind.element_token()]), 1.0)?;
        if hydrogens > 0 {
            let hydrogen = Key::new(Level::Element, &[Element::H as u64]);
            features.add(hydrogen, f64::from(site.hydrogens))?;
        }
        features.add(Key::new(Level::Atom, &[site.kind.token(), hydrogens]), 1.0)?;
        if hydrogens > 0 {
            let bond = Key::new(Level::Bond, &[site.kind.token()]);
            features.add(bond, f64::from(site.hydrogens))?;
        }
    }
    for (bond, _, [a, b]) in skeleton.bonds() {
        let order = skeleton.order_token(bond);
        let [low, high] = sorted(a.kind.token(), b.kind.token());
        features.add(Key::new(Level::Bond, &[low, high, order]), 1.0)?;
        let [low, high] = sorted(a.kind.element_token(), b.kind.element_token());
        features.add(Key::new(Level::BondOrder, &[low, high, order]), 1.0)?;
        let [low, high] = sorted(a.kind.class_token(), b.kind.class_token());
        features.add(Key::new(Level::BondElements, &[low, high, order]), 1.0)?;
    }
    Ok(())
}

/// Two tokens in ascending order.
pub(super) const fn sorted(a: u64, b: u64) -> [u64; 2] {
    if a <= b { [a, b] } else { [b, a] }
}

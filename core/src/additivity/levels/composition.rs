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
    for (atom, site) in skeleton.sites() {
        let hydrogens = u64::from(site.hydrogens);
        let element = site.kind.element_token();
        let alone = skeleton.heteroatoms_among(&[atom]);
        features.add(Key::new(Level::Element, alone, &[element]), 1.0)?;
        let named = skeleton.heteroatoms(&[atom]);
        let tokens = [site.kind.token(), hydrogens];
        features.add(Key::new(Level::Atom, named, &tokens), 1.0)?;
        if hydrogens > 0 {
            let hydrogen = Key::new(Level::Element, 0, &[Element::H as u64]);
            features.add(hydrogen, f64::from(site.hydrogens))?;
            let bond = Key::new(Level::Bond, named, &[site.kind.token()]);
            features.add(bond, f64::from(site.hydrogens))?;
        }
    }
    for (bond, ends, [a, b]) in skeleton.bonds() {
        let order = skeleton.order_token(bond);
        let among = skeleton.heteroatoms_among(&ends);
        let [low, high] = sorted(a.kind.token(), b.kind.token());
        let named = skeleton.heteroatoms(&ends);
        features.add(Key::new(Level::Bond, named, &[low, high, order]), 1.0)?;
        let [low, high] = sorted(a.kind.element_token(), b.kind.element_token());
        features.add(Key::new(Level::BondOrder, among, &[low, high, order]), 1.0)?;
        let [low, high] = sorted(a.kind.class_token(), b.kind.class_token());
        let tokens = [low, high, order];
        features.add(Key::new(Level::BondElements, among, &tokens), 1.0)?;
    }
    Ok(())
}

/// Two tokens in ascending order.
pub(super) const fn sorted(a: u64, b: u64) -> [u64; 2] {
    if a <= b { [a, b] } else { [b, a] }
}

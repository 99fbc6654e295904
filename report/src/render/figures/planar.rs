//! Layouts of what is drawn flat, by the depiction crate.

use omgkit_core::{AtomData, BondData, BondOrder as Order, BondStereo, MolBuilder};
use omgkit_depict::generate;
use omgkit_depict::style::Style;
use tautring_core::molecule::BondOrder;

use super::canvas::Point;
use crate::structure::HostMolecule;

/// Points of the atoms, a bond length apart, y downwards; nothing if the crate cannot take the molecule.
pub(super) fn layout(molecule: &HostMolecule) -> Option<Vec<Point>> {
    let mut builder = MolBuilder::new();
    for atom in molecule.atoms() {
        builder.add_atom_data(AtomData {
            formal_charge: atom.charge,
            num_explicit_hs: atom.hydrogens,
            isotope: atom.isotope,
            ..AtomData::new(atom.element.atomic_number())
        });
    }
    for bond in molecule.bonds() {
        let [begin, end] = bond.atoms.map(u32::from);
        let order = match bond.order {
            BondOrder::Single => Order::Single,
            BondOrder::Double => Order::Double,
            BondOrder::Triple => Order::Triple,
            BondOrder::Aromatic => Order::Aromatic,
        };
        let mut data = BondData::new(begin, end, order);
        if let Some(stereo) = bond.stereo {
            data.stereo = if stereo.same_side {
                BondStereo::Cis
            } else {
                BondStereo::Trans
            };
            data.stereo_atoms = [stereo.first_reference, stereo.second_reference].map(u32::from);
        }
        builder.add_bond_data(data).ok()?;
    }
    omgkit_chem::pipeline::sanitize(&mut builder).ok()?;
    let depiction = generate(&builder, &Style::CHEMDRAW_DEFAULT);
    // The crate may append hydrogens for wedges; ours come first.
    let points: Vec<Point> = depiction
        .coords
        .iter()
        .take(molecule.atoms().len())
        .map(|point| [point.x, -point.y])
        .collect();
    let whole = points.len() == molecule.atoms().len()
        && points.as_flattened().iter().all(|x| x.is_finite());
    whole.then_some(points)
}

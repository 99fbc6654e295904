//! Molfile and SDF in, V2000 and V3000, with the checks that their reader leaves out.
//!
//! # Source
//! The format is described in `ctfile-2020`; it is read by the crate `sdfrust`.

use sdfrust::{Bond as FileBond, BondOrder as FileOrder, BondStereo, SdfError, SdfParser};
use tautring_core::molecule::{Atom, BondOrder, Element, MoleculeError, implicit_hydrogens};

use super::capacity::{HostBuilder, MAX_ATOMS};
use super::configuration::{Drawing, DrawnBond, Point};
use super::coordinates::Coordinates;
use super::error::StructureError;

/// Largest believable coordinate, Å; the format's columns hold no more.
const LARGEST_COORDINATE: f64 = 1e4;

/// Symbols that stand for any atom, any of a list, a group, an R group, a lone pair.
const PLACEHOLDERS: [&str; 10] = ["*", "A", "Q", "L", "R", "R#", "X", "M", "LP", "Du"];

/// One record read as far as the core's builder.
pub(super) struct Record {
    pub(super) name: String,
    pub(super) builder: HostBuilder,
    pub(super) coordinates: Option<Coordinates>,
}

/// Reads every record of an SDF, or the one of a Molfile; an unreadable record does not hide the next one.
pub(super) fn read(text: &str) -> Vec<Result<Record, StructureError>> {
    if text.trim().is_empty() {
        return vec![Err(StructureError::Empty)];
    }
    let mut parser = SdfParser::new(text.as_bytes());
    let mut records = Vec::new();
    loop {
        match parser.parse_molecule() {
            Ok(Some(molecule)) => records.push(record(&molecule)),
            Ok(None) => break,
            Err(error) => {
                records.push(Err(unreadable(&error)));
                if !matches!(parser.skip_to_record_end(), Ok(true)) {
                    break;
                }
            }
        }
    }
    records
}

fn record(file: &sdfrust::Molecule) -> Result<Record, StructureError> {
    if file.atoms.len() > MAX_ATOMS {
        return Err(StructureError::TooManyAtoms { span: None });
    }
    let positions = positions(file)?;
    let bonds: Vec<DrawnBond> = file
        .bonds
        .iter()
        .enumerate()
        .map(|(index, bond)| drawn_bond(index, bond))
        .collect::<Result<_, _>>()?;
    let atoms: Vec<Atom> = file
        .atoms
        .iter()
        .enumerate()
        .map(|(index, atom)| read_atom(index, atom, &bonds))
        .collect::<Result<_, _>>()?;

    let graph = |error: MoleculeError| StructureError::Molecule { error, span: None };
    let mut builder = HostBuilder::new();
    for &atom in &atoms {
        builder.add_atom(atom).map_err(graph)?;
    }
    let three_dimensional = positions.iter().any(|p| p[2].abs() > 1e-4);
    let drawing = Drawing {
        atoms: &atoms,
        bonds: &bonds,
        positions: &positions,
        three_dimensional,
    };
    for bond in &bonds {
        let [first, second] = bond.atoms;
        let index = builder.add_bond(first, second, bond.order).map_err(graph)?;
        if let Some(stereo) = drawing.double_bond(bond) {
            builder
                .set_double_bond_stereo(index, stereo)
                .map_err(graph)?;
        }
    }
    for centre in 0..atoms.len() {
        if let Some(stereo) = drawing.tetrahedral(centre) {
            builder.add_tetrahedral_stereo(stereo).map_err(graph)?;
        }
    }
    Ok(Record {
        name: file.name.clone(),
        coordinates: Coordinates::of_heavy_atoms(&atoms, &bonds, &positions, three_dimensional),
        builder,
    })
}

fn positions(file: &sdfrust::Molecule) -> Result<Vec<Point>, StructureError> {
    let checked = |(index, atom): (usize, &sdfrust::Atom)| {
        let position = [atom.x, atom.y, atom.z];
        // A comparison with NaN is false, so that NaN is refused here, too.
        if position.iter().all(|x| x.abs() < LARGEST_COORDINATE) {
            Ok(position)
        } else {
            Err(StructureError::Coordinate { atom: index + 1 })
        }
    };
    file.atoms.iter().enumerate().map(checked).collect()
}

fn drawn_bond(index: usize, bond: &FileBond) -> Result<DrawnBond, StructureError> {
    let order = match bond.order {
        FileOrder::Single => BondOrder::Single,
        FileOrder::Double => BondOrder::Double,
        FileOrder::Triple => BondOrder::Triple,
        FileOrder::Aromatic => BondOrder::Aromatic,
        other => {
            return Err(StructureError::UnsupportedBond {
                bond: index + 1,
                kind: other.to_sdf(),
            });
        }
    };
    Ok(DrawnBond {
        atoms: [bond.atom1, bond.atom2],
        order,
        wedge: match bond.stereo {
            BondStereo::Up => 1,
            BondStereo::Down => -1,
            BondStereo::None | BondStereo::Either => 0,
        },
        either: bond.stereo == BondStereo::Either,
    })
}

fn read_atom(
    index: usize,
    atom: &sdfrust::Atom,
    bonds: &[DrawnBond],
) -> Result<Atom, StructureError> {
    if atom.radical_electrons() > 0 {
        return Err(StructureError::Radical { atom: index + 1 });
    }
    let (symbol, named_isotope) = match atom.element.as_str() {
        "D" => ("H", 2),
        "T" => ("H", 3),
        other => (other, 0),
    };
    let element = Element::from_symbol(symbol).ok_or_else(|| {
        let (symbol, atom) = (symbol.to_owned(), Some(index + 1));
        if PLACEHOLDERS.contains(&symbol.as_str()) {
            StructureError::Placeholder {
                symbol,
                span: None,
                atom,
            }
        } else {
            StructureError::UnknownElement {
                symbol,
                span: None,
                atom,
            }
        }
    })?;
    let isotope = match (atom.isotope, atom.mass_difference) {
        (Some(mass), _) => mass,
        (None, 0) => named_isotope,
        (None, difference) => {
            let natural = element.atomic_weight_g_per_mol().round() as u16;
            natural.saturating_add_signed(i16::from(difference))
        }
    };
    Ok(Atom {
        element,
        charge: atom.formal_charge,
        hydrogens: hydrogens(atom, element, index, bonds),
        isotope,
    })
}

/// The hydrogens that the record leaves out: to the stated valence, otherwise to the normal one.
fn hydrogens(atom: &sdfrust::Atom, element: Element, index: usize, bonds: &[DrawnBond]) -> u8 {
    let around = || bonds.iter().filter(|b| b.atoms.contains(&index));
    let mut pairs: u8 = around()
        .map(|b| b.order.pairs())
        .fold(0, u8::saturating_add);
    let aromatic = around().any(|b| b.order == BondOrder::Aromatic);
    // An aromatic carbon shares one pair more in the ring; so does a nitrogen with two bonds, while one with three gives its lone pair.
    if aromatic && (element == Element::C || (element == Element::N && pairs == 2)) {
        pairs += 1;
    }
    match atom.valence {
        // The format writes 15 for "no bonds at all".
        Some(15) => 0,
        Some(valence) => valence.saturating_sub(pairs),
        // Too many bonds: the valence check names the atom later.
        None if aromatic && matches!(element, Element::O | Element::S) => 0,
        None => implicit_hydrogens(element, atom.formal_charge, pairs).unwrap_or(0),
    }
}

fn unreadable(error: &SdfError) -> StructureError {
    let (message, line) = match error {
        SdfError::Parse { line, message } => (format!("{message}: export the structure again"), Some(*line)),
        SdfError::InvalidCountsLine(_) => (
            "the fourth line must give the numbers of atoms and bonds: keep the three header lines before it, empty ones included".into(),
            Some(4),
        ),
        SdfError::AtomCountMismatch { expected, found } => (
            format!("{expected} atoms announced, {found} found: the file is cut off or its counts line is wrong"),
            None,
        ),
        SdfError::BondCountMismatch { expected, found } => (
            format!("{expected} bonds announced, {found} found: the file is cut off or its counts line is wrong"),
            None,
        ),
        other => (format!("{other}: export the structure again"), None),
    };
    StructureError::Molfile { message, line }
}

//! SMILES in: atoms, bonds, hydrogens, aromatic marks and stereo marks turned into the core's builder.
//!
//! # Source
//! The language is `OpenSMILES` (`opensmiles-2016`); the grammar is read by the crate `smiles-rs`.

use std::ops::Range;

use smiles_rs::atom::Atom as SmilesAtom;
use smiles_rs::atom::bracketed::chirality::Chirality;
use smiles_rs::bond::Bond as SmilesBond;
use smiles_rs::{DoubleBondStereoConfig, Smiles, SmilesError, SmilesErrorWithSpan};
use tautring_core::molecule::{
    Atom, BondOrder, DoubleBondStereo, Element, Ligand, MoleculeError, TetrahedralStereo,
};

use super::capacity::HostBuilder;
use super::error::StructureError;
use super::outline::Outline;

/// Reads a SMILES as far as the core's builder; gives the outline too, so that later errors can point at an atom.
pub(super) fn read(text: &str) -> Result<(HostBuilder, Outline), StructureError> {
    let outline = Outline::of(text)?;
    let smiles: Smiles = text
        .parse()
        .map_err(|error| syntax_error(text, &outline, &error))?;
    let mut builder = HostBuilder::new();
    for (index, atom) in smiles.nodes().iter().enumerate() {
        let hydrogens = atom.hydrogen_count() + smiles.implicit_hydrogen_count(index);
        let atom = Atom {
            element: element(atom, outline.atom(index))?,
            charge: atom.charge_value(),
            hydrogens,
            isotope: atom.isotope_mass_number().unwrap_or(0),
        };
        builder
            .add_atom(atom)
            .map_err(|error| located(error, &outline))?;
    }
    add_bonds(&mut builder, &smiles, &outline)?;
    for (index, atom) in smiles.nodes().iter().enumerate() {
        if let Some(stereo) = tetrahedral(&smiles, &outline, index, atom) {
            builder
                .add_tetrahedral_stereo(stereo)
                .map_err(|error| located(error, &outline))?;
        }
    }
    Ok((builder, outline))
}

/// A molecule's error with the place of the atom it names.
pub(super) fn located(error: MoleculeError, outline: &Outline) -> StructureError {
    let atom = match error {
        MoleculeError::TooManyNeighbours { atom }
        | MoleculeError::ValenceExceeded { atom, .. }
        | MoleculeError::OpenShell { atom, .. }
        | MoleculeError::NoKekuleStructure { atom } => Some(atom),
        _ => None,
    };
    StructureError::Molecule {
        error,
        span: atom.and_then(|atom| outline.atom(atom)),
    }
}

fn element(atom: &SmilesAtom, span: Option<Range<usize>>) -> Result<Element, StructureError> {
    let symbol = atom.symbol().to_string();
    Element::from_symbol(&symbol).ok_or(StructureError::UnknownElement {
        symbol,
        span,
        atom: None,
    })
}

fn add_bonds(
    builder: &mut HostBuilder,
    smiles: &Smiles,
    outline: &Outline,
) -> Result<(), StructureError> {
    let rings = smiles.ring_membership();
    for first in 0..smiles.nodes().len() {
        for edge in smiles.edges_for_node(first) {
            let Some(second) = edge.other(first).filter(|&second| second > first) else {
                continue;
            };
            let order = match edge.bond() {
                // Two aromatic rings joined by a bond without a symbol (biphenyl): the bond is single.
                SmilesBond::Single if edge.is_aromatic() && rings.contains_edge(first, second) => {
                    BondOrder::Aromatic
                }
                SmilesBond::Single | SmilesBond::Up | SmilesBond::Down => BondOrder::Single,
                SmilesBond::Double => BondOrder::Double,
                SmilesBond::Triple => BondOrder::Triple,
                SmilesBond::Quadruple => {
                    let span = outline.atom(first).unwrap_or_default();
                    return Err(StructureError::QuadrupleBond { span });
                }
            };
            let bond = builder
                .add_bond(first, second, order)
                .map_err(|error| located(error, outline))?;
            if order == BondOrder::Double
                && let Some(stereo) = double_bond(smiles, first, second)
            {
                builder
                    .set_double_bond_stereo(bond, stereo)
                    .map_err(|error| located(error, outline))?;
            }
        }
    }
    Ok(())
}

fn double_bond(smiles: &Smiles, first: usize, second: usize) -> Option<DoubleBondStereo> {
    let config = smiles.double_bond_stereo_config(first, second)?;
    let (a, b) = smiles.double_bond_stereo_atoms(first, second)?;
    Some(DoubleBondStereo {
        first_reference: a as u16,
        second_reference: b as u16,
        same_side: config == DoubleBondStereoConfig::Z,
    })
}

/// The mark of a tetrahedral centre with its ligands in the order in which the SMILES names them.
///
/// A mark on anything but four ligands says nothing and is passed over. The lone pair of sulfur and phosphorus counts as a ligand, that
/// of nitrogen does not: amines invert at room temperature. The language leaves open where the lone pair of an atom at the
/// beginning stands; as in `RDKit` it comes last.
fn tetrahedral(
    smiles: &Smiles,
    outline: &Outline,
    centre: usize,
    atom: &SmilesAtom,
) -> Option<TetrahedralStereo> {
    let clockwise = match atom.chirality()? {
        Chirality::At | Chirality::TH(1) => false,
        Chirality::AtAt | Chirality::TH(2) => true,
        _ => return None,
    };
    let mut ligands = Vec::with_capacity(4);
    let ring: Vec<usize> = outline.ring_partners(centre).collect();
    let mut chain: Vec<usize> = smiles
        .edges_for_node(centre)
        .filter_map(|edge| edge.other(centre))
        .filter(|other| !ring.contains(other))
        .collect();
    chain.sort_unstable();
    let before = chain.iter().filter(|&&other| other < centre).count();
    ligands.extend(chain.drain(..before).map(ligand));
    let first = ligands.is_empty();
    let lone_pair = matches!(atom.symbol().to_string().as_str(), "S" | "P")
        && ligands.len() + ring.len() + chain.len() == 3;
    if atom.hydrogen_count() == 1 || (lone_pair && !first) {
        ligands.push(Ligand::Implicit);
    }
    ligands.extend(ring.into_iter().chain(chain).map(ligand));
    if lone_pair && first {
        ligands.push(Ligand::Implicit);
    }
    Some(TetrahedralStereo {
        centre: centre as u16,
        ligands: ligands.try_into().ok()?,
        clockwise,
    })
}

fn ligand(atom: usize) -> Ligand {
    Ligand::Atom(atom as u16)
}

/// Turns the parser's error into one that says how to mend the string.
fn syntax_error(text: &str, outline: &Outline, error: &SmilesErrorWithSpan) -> StructureError {
    let start = error.start().min(text.len());
    let end = error.end().clamp(start, text.len());
    // An error at the end of the string still needs something to underline.
    let span = if start == end {
        start.saturating_sub(1)..end
    } else {
        start..end
    };
    let written = outline.containing(start).unwrap_or_else(|| span.clone());
    let symbol = || {
        text[written.clone()]
            .trim_start_matches('[')
            .trim_start_matches(|c: char| c.is_ascii_digit())
            .chars()
            .take_while(char::is_ascii_alphabetic)
            .collect::<String>()
    };
    let message = match error.smiles_error() {
        SmilesError::WildcardAtomNotAllowed => {
            return StructureError::Placeholder {
                symbol: text[written.clone()].to_owned(),
                span: Some(written),
                atom: None,
            };
        }
        SmilesError::InvalidElementName(_)
        | SmilesError::ElementsRs(_)
        | SmilesError::MissingElement
        | SmilesError::ElementRequiresBrackets
        | SmilesError::InvalidAromaticElement(_)
            if !symbol().is_empty() =>
        {
            return StructureError::UnknownElement {
                symbol: symbol(),
                span: Some(written),
                atom: None,
            };
        }
        SmilesError::InvalidUnbracketedAtom(symbol) => format!(
            "{symbol} must stand in square brackets together with its hydrogens, such as [{symbol}] or [{symbol}H]"
        ),
        SmilesError::MissingElement | SmilesError::MissingBracketElement => {
            "an element symbol is missing: write it, for example [NH4+]".into()
        }
        SmilesError::InvalidIsotope => {
            "no such isotope: write the mass number before the symbol, as in [2H] or [13C]".into()
        }
        SmilesError::UnclosedBranch => "a '(' is never closed: add the ')'".into(),
        SmilesError::UnexpectedRightParentheses => "a ')' without its '(': remove it or open the branch".into(),
        SmilesError::UnexpectedLeftParentheses => "a branch must follow an atom: begin with the atom".into(),
        SmilesError::EmptyBranch | SmilesError::InvalidBranch => {
            "a branch without an atom: write an atom between the parentheses or remove them".into()
        }
        SmilesError::IncompleteBond(_) | SmilesError::InvalidBond => {
            "a bond symbol must stand between two atoms: add the missing atom or remove the symbol".into()
        }
        SmilesError::InvalidRingNumber | SmilesError::UnclosedRing => {
            "a ring-closure digit must join two different atoms that are not bonded yet: check the digits".into()
        }
        SmilesError::UnclosedBracket => {
            "this does not belong inside square brackets (order: isotope, symbol, @, H, charge): close the bracket or correct it".into()
        }
        SmilesError::UnexpectedRightBracket => "a ']' without its '[': remove it or open the bracket".into(),
        SmilesError::DuplicateEdge(..) => "two atoms are bonded twice: check the ring-closure digits".into(),
        other => format!("not a valid SMILES here ({other}): correct or remove it"),
    };
    StructureError::Syntax { message, span }
}

//! SMILES of a molecule, for showing: configurations and isotopes left out.

use std::fmt::Write;

use tautring_core::molecule::{BondOrder, Element, implicit_hydrogens};

use super::capacity::HostMolecule;

/// A SMILES of a molecule, the same for every order of its atoms; configurations and isotopes are not written.
///
/// ```
/// use tautring_report::structure::{Structure, line_notation};
/// let ethanol = Structure::from_smiles("OCC")?;
/// assert_eq!(line_notation(&ethanol.molecule), "CCO");
/// # Ok::<(), tautring_report::structure::StructureError>(())
/// ```
pub fn line_notation(molecule: &HostMolecule) -> String {
    let order = molecule.canonical_order();
    let ranks: Vec<u16> = order.ranks.iter().copied().collect();
    let mut walk = Walk {
        molecule,
        ranks,
        seen: vec![false; molecule.atoms().len()],
        used: vec![false; molecule.bonds().len()],
        children: vec![Vec::new(); molecule.atoms().len()],
        closures: vec![Vec::new(); molecule.atoms().len()],
        rings: 0,
        written: Vec::new(),
    };
    // An end of the molecule reads best as a beginning, a carbon before others.
    let start = (0..molecule.atoms().len()).min_by_key(|&atom| {
        let ends = molecule.neighbours(atom).len().max(1);
        let element = molecule.atoms()[atom].element.symbol() != "C";
        (ends, element, walk.ranks[atom])
    });
    let mut text = String::new();
    if let Some(start) = start {
        walk.visit(start);
        walk.write(start, &mut text);
    }
    text
}

/// A walk over the graph that sorts its bonds into a tree and ring closures.
struct Walk<'m> {
    molecule: &'m HostMolecule,
    ranks: Vec<u16>,
    seen: Vec<bool>,
    used: Vec<bool>,
    /// Of each atom the atoms that follow it in the tree, with the bonds.
    children: Vec<Vec<(usize, usize)>>,
    /// Of each atom the ring closures, with their bonds; the bond's symbol stands where it opens.
    closures: Vec<Vec<(usize, usize)>>,
    rings: usize,
    /// Number that each ring closure is written with, in the order of writing.
    written: Vec<usize>,
}

impl Walk<'_> {
    /// Walks on from an atom; gives the number of atoms that come after it.
    fn visit(&mut self, atom: usize) -> usize {
        self.seen[atom] = true;
        let mut around = self.molecule.neighbours(atom).to_vec();
        around.sort_by_key(|n| self.ranks[usize::from(n.atom)]);
        let mut branches = Vec::new();
        for n in around {
            let (next, bond) = (usize::from(n.atom), usize::from(n.bond));
            if std::mem::replace(&mut self.used[bond], true) {
                continue;
            }
            if self.seen[next] {
                self.rings += 1;
                self.closures[atom].push((self.rings, bond));
                self.closures[next].push((self.rings, bond));
            } else {
                branches.push((self.visit(next), next, bond));
            }
        }
        // The longest branch comes last and needs no parentheses.
        branches.sort_by_key(|&(size, next, _)| (size, self.ranks[next]));
        let size = branches.iter().map(|(size, ..)| size).sum::<usize>() + 1;
        self.children[atom] = branches.iter().map(|&(_, n, b)| (n, b)).collect();
        size
    }

    fn write(&mut self, atom: usize, text: &mut String) {
        self.write_atom(atom, text);
        for (ring, bond) in std::mem::take(&mut self.closures[atom]) {
            text.push_str(self.symbol(bond));
            let known = self.written.iter().position(|&known| known == ring);
            let number = known.unwrap_or_else(|| {
                self.written.push(ring);
                self.written.len() - 1
            }) + 1;
            if number > 9 {
                text.push('%');
            }
            text.push_str(&number.to_string());
        }
        let children = std::mem::take(&mut self.children[atom]);
        for (index, &(next, bond)) in children.iter().enumerate() {
            let branch = index + 1 < children.len();
            text.push_str(if branch { "(" } else { "" });
            text.push_str(self.symbol(bond));
            self.write(next, text);
            text.push_str(if branch { ")" } else { "" });
        }
    }

    fn write_atom(&self, index: usize, text: &mut String) {
        let atom = self.molecule.atoms()[index];
        let aromatic = self.molecule.is_aromatic_atom(index);
        let symbol = if aromatic {
            atom.element.symbol().to_lowercase()
        } else {
            atom.element.symbol().to_owned()
        };
        if atom.charge == 0 && self.implied(index) == Some(atom.hydrogens) {
            text.push_str(&symbol);
            return;
        }
        // Writing to a String cannot fail.
        let _ = write!(text, "[{symbol}");
        match atom.hydrogens {
            0 => {}
            1 => text.push('H'),
            count => {
                let _ = write!(text, "H{count}");
            }
        }
        match atom.charge {
            0 => {}
            1 => text.push('+'),
            -1 => text.push('-'),
            charge => {
                let _ = write!(text, "{charge:+}");
            }
        }
        text.push(']');
    }

    /// The hydrogens that a reader takes for granted on a neutral atom without brackets; `None` where brackets are needed.
    fn implied(&self, index: usize) -> Option<u8> {
        let element = self.molecule.atoms()[index].element;
        let around = self.molecule.neighbours(index);
        match (element, self.molecule.is_aromatic_atom(index)) {
            (Element::C, true) => Some(3 - around.len().min(3) as u8),
            (Element::N | Element::O | Element::S, true) => Some(0),
            (_, true) | (Element::H | Element::Si, false) => None,
            (_, false) => {
                let bonds = around
                    .iter()
                    .map(|n| self.molecule.bonds()[usize::from(n.bond)]);
                implicit_hydrogens(element, 0, bonds.map(|b| b.order.pairs()).sum())
            }
        }
    }

    fn symbol(&self, bond: usize) -> &'static str {
        if self.molecule.is_aromatic_bond(bond) {
            return "";
        }
        let found = self.molecule.bonds()[bond];
        let aromatic = |end: u16| self.molecule.is_aromatic_atom(usize::from(end));
        match found.order {
            BondOrder::Double => "=",
            BondOrder::Triple => "#",
            // Between aromatic atoms no symbol would mean an aromatic bond.
            _ if found.atoms.into_iter().all(aromatic) => "-",
            _ => "",
        }
    }
}

#[cfg(test)]
mod tests {
    use super::super::{Structure, skeleton};
    use super::line_notation;

    #[test]
    fn what_is_written_reads_as_the_same_molecule() {
        for given in [
            "C12C3C4C1C5C2C3C45",
            "C[N+](=O)[O-]",
            "c1ccc2[nH]ccc2c1",
            "CS(=O)(=O)C1CC1C#N",
            "C[Si](C)(C)N=[N+]=[N-]",
            "OB(O)C1=CCCC1(F)Cl",
            "C1CC12CC2C3(CC3)C(C)(C)P(C)C",
            "[C-]#[N+]C1CO1",
            "c1ccccc1-c1ccccn1",
            "Cn1ccc(=O)[nH]1",
            "C[n+]1ccccc1C(=O)[O-]",
            "C1=Cc2cccc3cccc1c23",
        ] {
            let one = Structure::from_smiles(given).unwrap();
            let text = line_notation(&one.molecule);
            let again = Structure::from_smiles(&text).unwrap_or_else(|e| panic!("{text}: {e}"));
            let same = skeleton(&one.molecule).unwrap() == skeleton(&again.molecule).unwrap();
            assert!(same, "{given} became {text}");
        }
    }
}

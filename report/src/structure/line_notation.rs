//! SMILES of a molecule, for showing: bonds localised, configurations and isotopes left out.

use std::fmt::Write;

use tautring_core::molecule::{BondOrder, implicit_hydrogens};

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

    fn write(&self, atom: usize, text: &mut String) {
        self.write_atom(atom, text);
        for &(ring, bond) in &self.closures[atom] {
            text.push_str(self.symbol(bond));
            if ring > 9 {
                text.push('%');
            }
            text.push_str(&ring.to_string());
        }
        let children = &self.children[atom];
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
        let symbol = atom.element.symbol();
        let around = self.molecule.neighbours(index).iter();
        let pairs = around
            .map(|n| self.molecule.bonds()[usize::from(n.bond)].order.pairs())
            .sum();
        let bare = !matches!(symbol, "H" | "Si")
            && atom.charge == 0
            && implicit_hydrogens(atom.element, 0, pairs) == Some(atom.hydrogens);
        if bare {
            text.push_str(symbol);
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

    fn symbol(&self, bond: usize) -> &'static str {
        match self.molecule.bonds()[bond].order {
            BondOrder::Double => "=",
            BondOrder::Triple => "#",
            BondOrder::Single | BondOrder::Aromatic => "",
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
        ] {
            let one = Structure::from_smiles(given).unwrap();
            let text = line_notation(&one.molecule);
            let again = Structure::from_smiles(&text).unwrap_or_else(|e| panic!("{text}: {e}"));
            let same = skeleton(&one.molecule).unwrap() == skeleton(&again.molecule).unwrap();
            assert!(same, "{given} became {text}");
        }
    }
}

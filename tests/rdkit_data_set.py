"""Makes tests/reference/data_set.csv: formula, rings and aromatic atoms of every measured molecule, as RDKit sees them.

    python -m venv .venv && .venv/bin/pip install -r tests/requirements.txt
    .venv/bin/python tests/rdkit_data_set.py

`rings` is the number of rings in a smallest set, `symmetrised_rings` that of RDKit's symmetrised set. `aromatic_atoms`
has a 1 for an aromatic atom and a 0 for another, in the order of the SMILES.
"""

import csv

from measured_molecules import REFERENCE, measured_molecules
from rdkit import Chem
from rdkit.Chem.rdMolDescriptors import CalcMolFormula


def row(smiles):
    mol = Chem.MolFromSmiles(smiles)
    return {
        "smiles": smiles,
        "formula": CalcMolFormula(mol),
        "rings": len(Chem.GetSSSR(mol)),
        "symmetrised_rings": len(Chem.GetSymmSSSR(mol)),
        "aromatic_atoms": "".join(str(int(atom.GetIsAromatic())) for atom in mol.GetAtoms()),
    }


def main():
    rows = [row(smiles) for smiles in measured_molecules()]
    with (REFERENCE / "data_set.csv").open("w", newline="") as file:
        writer = csv.DictWriter(file, rows[0].keys(), lineterminator="\n")
        writer.writeheader()
        writer.writerows(rows)
    print(f"{len(rows)} molecules, {sum(r['rings'] > 0 for r in rows)} with rings")


if __name__ == "__main__":
    main()

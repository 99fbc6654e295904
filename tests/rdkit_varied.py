"""Makes tests/reference/varied.csv: 500 structures that the program is to answer or to refuse.

    python -m venv .venv && .venv/bin/pip install -r tests/requirements.txt
    .venv/bin/python tests/rdkit_varied.py

They are drawn with a fixed seed from the identifiers that the package `chemicals` ships, so many of each kind; the first
kind that fits is taken. RDKit says what is to come of each: `refused` where there are several fragments, a net charge,
unpaired electrons, an element without data, no carbon, or too many atoms; else `answered`. `formula` is RDKit's.
"""

import csv
import random

from chemicals.identifiers import pubchem_db
from measured_molecules import REFERENCE
from rdkit import Chem, RDLogger
from rdkit.Chem.rdMolDescriptors import CalcMolFormula, CalcNumBridgeheadAtoms, CalcNumSpiroAtoms

SEED = 500
ELEMENTS = {"H", "B", "C", "N", "O", "F", "Si", "P", "S", "Cl", "Br", "I"}
# What the program says that it reads.
MAX_ATOMS = 256


def of_one_neutral_molecule(mol):
    return (
        len(Chem.GetMolFrags(mol)) == 1
        and Chem.GetFormalCharge(mol) == 0
        and all(a.GetSymbol() in ELEMENTS and not a.GetNumRadicalElectrons() for a in mol.GetAtoms())
        and any(a.GetSymbol() == "C" for a in mol.GetAtoms())
    )


def hetero(mol):
    return {a.GetSymbol() for a in mol.GetAtoms()} - {"C", "H"}


def small_ring(mol):
    return any(len(ring) <= 4 for ring in mol.GetRingInfo().AtomRings())


def formal_charges(mol):
    return sum(a.GetFormalCharge() != 0 for a in mol.GetAtoms())


# name, how many, what it is: in this order.
KINDS = [
    ("salt", 30, lambda m: len(Chem.GetMolFrags(m)) > 1),
    ("charged", 30, lambda m: Chem.GetFormalCharge(m) != 0),
    ("other element", 20, lambda m: any(a.GetSymbol() not in ELEMENTS for a in m.GetAtoms())),
    ("radical", 15, lambda m: any(a.GetNumRadicalElectrons() for a in m.GetAtoms())),
    ("no carbon", 10, lambda m: not any(a.GetSymbol() == "C" for a in m.GetAtoms())),
    ("isotope", 10, lambda m: any(a.GetIsotope() for a in m.GetAtoms())),
    ("big", 35, lambda m: m.GetNumAtoms() >= 60),
    ("cage", 90, lambda m: CalcNumBridgeheadAtoms(m) >= 2),
    ("spiro", 30, lambda m: CalcNumSpiroAtoms(m) >= 1),
    ("small ring", 60, small_ring),
    ("formal charges", 30, lambda m: formal_charges(m) >= 2),
    ("boron, silicon, phosphorus", 30, lambda m: hetero(m) & {"B", "Si", "P"}),
    ("sulfur", 30, lambda m: "S" in hetero(m)),
    ("hetero", 50, lambda m: len(hetero(m)) >= 2),
    ("other", 30, lambda m: True),
]


def outcome(mol):
    if not of_one_neutral_molecule(mol) or mol.GetNumAtoms() > MAX_ATOMS:
        return "refused"
    return "answered"


def main():
    RDLogger.DisableLog("rdApp.*")
    pubchem_db.autoload_main_db()
    smiles = sorted({entry.smiles for entry in pubchem_db.CAS_index.values()})
    random.Random(SEED).shuffle(smiles)
    wanted = {name: count for name, count, _ in KINDS}
    rows = []
    for text in smiles:
        mol = Chem.MolFromSmiles(text)
        if mol is None:
            continue
        kind = next(name for name, _, fits in KINDS if fits(mol))
        if wanted[kind]:
            wanted[kind] -= 1
            rows.append((text, kind, outcome(mol), CalcMolFormula(mol)))
        if not any(wanted.values()):
            break
    rows.sort(key=lambda row: [name for name, _, _ in KINDS].index(row[1]))
    with (REFERENCE / "varied.csv").open("w", newline="") as file:
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(("smiles", "kind", "outcome", "formula"))
        writer.writerows(rows)
    print(f"{len(rows)} structures, {sum(row[2] == 'answered' for row in rows)} to be answered")


if __name__ == "__main__":
    main()

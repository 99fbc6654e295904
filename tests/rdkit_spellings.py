"""Makes tests/reference/spellings.csv and spellings.sdf: every measured molecule, spelled in other ways.

    python -m venv .venv && .venv/bin/pip install -r tests/requirements.txt
    .venv/bin/python tests/rdkit_spellings.py

For every SMILES of data/measurements.csv: another order of the atoms; a Kekulé form; all hydrogens written as atoms;
every nitro group as N(=O)=O. The SDF holds every tenth molecule as a flat V2000 drawing with its SMILES as a name.
RDKit reads each spelling back and must find the same molecule, else it is left out and named. The random numbers are
seeded.
"""

import csv
import random

from measured_molecules import REFERENCE, measured_molecules
from rdkit import Chem, RDLogger
from rdkit.Chem import AllChem

SEED = 20
EVERY = 10
CHARGED_NITRO = Chem.MolFromSmarts("[N+;X3](=[O;X1])[O-;X1]")


def shuffled(mol, rng):
    order = list(range(mol.GetNumAtoms()))
    rng.shuffle(order)
    return Chem.RenumberAtoms(mol, order)


def kekule(mol, rng):
    other = shuffled(mol, rng)
    Chem.Kekulize(other, clearAromaticFlags=True)
    return Chem.MolToSmiles(other, canonical=False, kekuleSmiles=True)


def five_valent_nitro(mol):
    """The same molecule with every nitro group as N(=O)=O; None without one. RDKit's sanitising would undo it."""
    matches = mol.GetSubstructMatches(CHARGED_NITRO)
    if not matches:
        return None
    other = Chem.RWMol(mol)
    for nitrogen, _, oxygen in matches:
        # A nitrate or nitro nitrogen is matched once; its second oxygen is the charged one.
        other.GetBondBetweenAtoms(nitrogen, oxygen).SetBondType(Chem.BondType.DOUBLE)
        for atom in (nitrogen, oxygen):
            other.GetAtomWithIdx(atom).SetFormalCharge(0)
    # Without this RDKit would put hydrogens into brackets where a valence looks odd.
    for atom in other.GetAtoms():
        atom.SetNoImplicit(False)
    return Chem.MolToSmiles(other, canonical=False)


def spellings(mol, rng):
    yield "order", Chem.MolToSmiles(shuffled(mol, rng), canonical=False)
    yield "kekule", kekule(mol, rng)
    yield "hydrogens", Chem.MolToSmiles(shuffled(Chem.AddHs(mol), rng), canonical=False, allHsExplicit=True)
    if nitro := five_valent_nitro(shuffled(mol, rng)):
        yield "nitro", nitro


def drawing(smiles, mol):
    flat = Chem.Mol(mol)
    # A drawing shows a configuration on every double bond unless it is marked as open.
    for element in Chem.FindPotentialStereo(flat):
        open_bond = element.type == Chem.StereoType.Bond_Double and element.specified != Chem.StereoSpecified.Specified
        if open_bond:
            flat.GetBondWithIdx(element.centeredOn).SetStereo(Chem.BondStereo.STEREOANY)
    AllChem.Compute2DCoords(flat)
    Chem.WedgeMolBonds(flat, flat.GetConformer())
    flat.SetProp("_Name", smiles)
    return Chem.MolToMolBlock(flat) + "$$$$\n"


def main():
    RDLogger.DisableLog("rdApp.*")
    rng = random.Random(SEED)
    rows, records = [], []
    for index, smiles in enumerate(measured_molecules()):
        mol = Chem.MolFromSmiles(smiles)
        canonical = Chem.MolToSmiles(mol)
        for kind, spelling in spellings(mol, rng):
            if Chem.MolToSmiles(Chem.MolFromSmiles(spelling)) != canonical:
                print(f"left out: {smiles} {kind} {spelling}")
                continue
            rows.append((smiles, kind, spelling))
        if index % EVERY == 0 and mol.GetNumAtoms() > 1:
            block = drawing(smiles, mol)
            if Chem.MolToSmiles(Chem.MolFromMolBlock(block)) != canonical:
                print(f"left out: {smiles} as a drawing")
                continue
            records.append(block)
    with (REFERENCE / "spellings.csv").open("w", newline="") as file:
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(("smiles", "kind", "spelling"))
        writer.writerows(rows)
    (REFERENCE / "spellings.sdf").write_text("".join(records))
    print(f"{len(rows)} spellings, {len(records)} drawings")


if __name__ == "__main__":
    main()

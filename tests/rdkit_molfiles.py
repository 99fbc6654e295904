"""Makes tests/reference/molfiles/, smiles_spellings.tsv and stereo_marks.tsv: what the structure readers are held to.

    python -m venv .venv && .venv/bin/pip install -r tests/requirements.txt
    .venv/bin/python tests/rdkit_molfiles.py

molfiles/*.mol: every molecule drawn flat as V2000 and V3000, and as a geometry with all hydrogens as V2000.
smiles_spellings.tsv: key, then random spellings of the same molecule (other atom orders, Kekule form, written hydrogens).
stereo_marks.tsv: SMILES, kind, atoms, and the mark as RDKit reads it, in RDKit's own order of neighbours.
The random numbers are seeded; the RDKit version stands in the first line of each table.
"""

import random
import sys
from pathlib import Path

from measured_molecules import REFERENCE
from rdkit import Chem, RDLogger, rdBase
from rdkit.Chem import AllChem

MOLECULES = {
    "cyclopropane": "C1CC1",
    "cubane": "C12C3C4C1C5C2C3C45",
    "cuneane": "C12C3C1C4C5C2C5C34",
    "bicyclobutane": "C1C2CC12",
    "quadricyclane": "C1C2C3C2C4C1C34",
    "spiropentane": "C1CC12CC2",
    "benzvalene": "C1=CC2C3C1C23",
    "r_methyloxirane": "C[C@@H]1CO1",
    "s_methyloxirane": "C[C@H]1CO1",
    "cis_2_3_dimethyloxirane": "C[C@@H]1O[C@H]1C",
    "trans_2_3_dimethyloxirane": "C[C@@H]1O[C@@H]1C",
    "cis_1_2_dimethylcyclobutane": "C[C@@H]1CC[C@@H]1C",
    "trans_1_2_dimethylcyclobutane": "C[C@H]1CC[C@@H]1C",
    "one_4_dimethylcyclohexane_a": "C[C@H]1CC[C@@H](C)CC1",
    "one_4_dimethylcyclohexane_b": "C[C@H]1CC[C@H](C)CC1",
    "cis_decalin": "C1CC[C@@H]2CCCC[C@@H]2C1",
    "trans_decalin": "C1CC[C@H]2CCCC[C@@H]2C1",
    "z_but_2_ene": "C/C=C\\C",
    "e_but_2_ene": "C/C=C/C",
    "e_2_chlorobut_2_ene": "C/C(Cl)=C/C",
    "z_cyclooctene": "C1CCC/C=C\\CC1",
    "e_cyclooctene": "C1CCC/C=C/CC1",
    "e_azobenzene": "c1ccccc1/N=N/c1ccccc1",
    "e_acetaldoxime": "C/C=N/O",
    "alanine": "C[C@H](N)C(=O)O",
    "r_methyl_ethyl_sulfoxide": "CC[S@](C)=O",
    "exo_norborneol": "O[C@@H]1C[C@@H]2CC[C@H]1C2",
    "nitrobenzene": "[O-][N+](=O)c1ccccc1",
    "phenyl_azide": "[N-]=[N+]=Nc1ccccc1",
    "pyrrole": "c1cc[nH]c1",
    "indole": "c1ccc2[nH]ccc2c1",
    "thiirane_oxide": "O=S1CC1",
    "silacyclobutane": "C1C[SiH2]C1",
    "xylitol": "OC[C@H](O)[C@@H](O)[C@H](O)CO",
    "e_2_pentenyl_oxirane": "CC/C=C/C[C@@H]1CO1",
}


def spellings(mol, rng):
    """Other SMILES of the same molecule."""
    out = []
    for _ in range(4):
        order = list(range(mol.GetNumAtoms()))
        rng.shuffle(order)
        out.append(Chem.MolToSmiles(Chem.RenumberAtoms(mol, order), canonical=False))
    kekule = Chem.Mol(mol)
    Chem.Kekulize(kekule, clearAromaticFlags=True)
    order = list(range(mol.GetNumAtoms()))
    rng.shuffle(order)
    out.append(Chem.MolToSmiles(Chem.RenumberAtoms(kekule, order), canonical=False, kekuleSmiles=True))
    out.append(Chem.MolToSmiles(Chem.AddHs(mol), canonical=False, allHsExplicit=True))
    return out


def marks(smiles):
    """RDKit's stereo marks, told by its own neighbour orders."""
    mol = Chem.MolFromSmiles(smiles)
    for atom in mol.GetAtoms():
        tag = atom.GetChiralTag()
        if tag in (Chem.ChiralType.CHI_TETRAHEDRAL_CW, Chem.ChiralType.CHI_TETRAHEDRAL_CCW):
            around = [b.GetOtherAtomIdx(atom.GetIdx()) for b in atom.GetBonds()]
            turn = "clockwise" if tag == Chem.ChiralType.CHI_TETRAHEDRAL_CW else "anticlockwise"
            yield "tetrahedral", [atom.GetIdx(), *around], turn
    for bond in mol.GetBonds():
        kind = bond.GetStereo()
        if kind in (Chem.BondStereo.STEREOE, Chem.BondStereo.STEREOZ):
            one, two = bond.GetStereoAtoms()
            side = "same" if kind == Chem.BondStereo.STEREOZ else "opposite"
            yield "double", [bond.GetBeginAtomIdx(), bond.GetEndAtomIdx(), one, two], side


def main():
    RDLogger.DisableLog("rdApp.*")
    root = REFERENCE
    (root / "molfiles").mkdir(parents=True, exist_ok=True)
    rng = random.Random(1)
    header = f"# RDKit {rdBase.rdkitVersion}\n"
    with open(root / "smiles_spellings.tsv", "w") as table, open(root / "stereo_marks.tsv", "w") as stereo:
        table.write(header)
        stereo.write(header)
        for key, smiles in MOLECULES.items():
            mol = Chem.MolFromSmiles(smiles)
            flat = Chem.Mol(mol)
            AllChem.Compute2DCoords(flat)
            flat.SetProp("_Name", key)
            Chem.WedgeMolBonds(flat, flat.GetConformer())
            solid = Chem.AddHs(mol)
            if AllChem.EmbedMolecule(solid, randomSeed=7) != 0:
                sys.exit(f"no geometry for {key}")
            solid.SetProp("_Name", key)
            stem = root / "molfiles" / key
            Path(f"{stem}.flat.v2000.mol").write_text(Chem.MolToMolBlock(flat))
            Path(f"{stem}.flat.v3000.mol").write_text(Chem.MolToV3KMolBlock(flat))
            Path(f"{stem}.solid.mol").write_text(Chem.MolToMolBlock(solid))
            others = spellings(mol, rng)
            table.write("\t".join([key, smiles, *others]) + "\n")
            for spelling in [smiles, *others[:5]]:
                for kind, atoms, mark in marks(spelling):
                    stereo.write(f"{spelling}\t{kind}\t{','.join(map(str, atoms))}\t{mark}\n")


if __name__ == "__main__":
    main()

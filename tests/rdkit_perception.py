"""Makes tests/reference/perception.csv: rings and aromaticity as others see them.

    python -m venv .venv && .venv/bin/pip install -r tests/requirements.txt
    .venv/bin/python tests/rdkit_perception.py

Molecules: SELECTED below, and of the handbook's thermochemical table as the package `chemicals` ships it every one with
a ring and every tenth without.
Aromatic atoms and bonds and the symmetrised smallest set of smallest rings come from RDKit. The sizes of the relevant
rings are counted here by brute force: all cycles up to the longest of a minimum basis (NetworkX), each tested for
being a sum of strictly shorter ones. Atoms and bonds are written out, so that the comparison needs no SMILES reader.
"""

import csv
from pathlib import Path

import networkx as nx
from chemicals import heat_capacity
from chemicals.identifiers import search_chemical
from rdkit import Chem, RDLogger
from rdkit.Chem.rdMolDescriptors import CalcMolFormula

ELEMENTS = {"H", "B", "C", "N", "O", "F", "Si", "P", "S", "Cl", "Br", "I"}

# Strained, caged, bridged, spiro, fused, conjugated, macrocyclic and charged ring systems.
SELECTED = """
C1CC1 C1CCC1 C1CCCC1 C1CCCCC1 C1CCCCCCCCCCCCC1 C1=CC1 C1=CCC1 C1#CCCCCCC1 C1C2C1C2 C1CC2CC12 C1C2CC1C2
C1C23CC12C3 C12CC1(C2)C1CC1 C1CC1C1CC1 C1CC11CC1 C1CC2(C1)CC2 C1CCC2(CC1)OCCO2 C1CC11CC11CC1 C1C2CC3CC1CC(C2)C3
C1CC2CCC1C2 C1CC2CCC1CC2 C1CC2CCCC1C2 C1=CC2C=CC1C2 C12C3C4C1C5C2C3C45 C12C3C1C1C2C31 C12C3C1C23
C12C3C4C5C1C6C2C3C4C56 C1C2C3C4C1C5C2C3C45 C1C2C3C2C4C1C34 C1C2CC3C1CC2C3 C1CC23CCC2(C1)CCC3 C1CC2(CC1)CC2
C1C2C3CC4C2CC1C34 C12C=CC1C=C2 C1=CC2C=CC12 C1=CC2C=CC1C=C2 C1C=CC2C1C2 C1CC2C3CCC(C3)C2C1 C1C2CC3CC1CC(C2)O3
C1OC1 C1CO1 C1CCO1 C1CN1 C1CCN1 C1CS1 C1CCS1 C1OO1 C1NN1 C1N=N1 C1CC1=C C1CC1=O C1CCC1=O O=C1CCO1 O=C1CCN1
C1N2CN3CN1CN(C2)C3 C1CN2CCN1CC2 C1CC2CCC1O2 C1CC2OC2C1 C1C2OC12 C12OC1C1OC21 C1OC11CO1 C1OCOCO1 C1OCCOCCOCCOCCOCCO1
C1CC2CCC3CCC1C3C2 C1CCC2CCCCC2C1 C1CC2CC1C1C2C2CC1C=C2 C1CC1C1(CC1)C1CC1 C1CC2CC2C1 C1CCC2(C1)CCCC2
c1ccccc1 C1=CC=CC=CC=C1 C1=CC=C1 C=C1C=CC=C1 C=C1C=CC=CC=C1 O=C1C=CC=CC=C1 O=C1C=C1 O=C1C=CC=C1 O=C1C=CC(=O)C=C1
c1ccc2ccccc2c1 c1ccc2cccc2cc1 c1ccc2cc3ccccc3cc2c1 c1ccc2c(c1)ccc1ccccc12 c1cc2ccc3cccc4ccc(c1)c2c34 C1=CC2=CC=CC2=C1
c1ccc2c(c1)-c1ccccc12 c1ccc2c(c1)Cc1ccccc12 c1ccc(-c2ccccc2)cc1 c1ccc2c(c1)C=C2 c1ccc2c(c1)CC2 c1ccc2c(c1)C2 C1=Cc2cccc3cccc1c23
c1cc2ccc3ccc4ccc5ccc6ccc1c1c2c3c4c5c61 c1ccc2c(c1)c1cccc3cccc2c13 C1=CC2=CC=CC=CC2=C1 C1=CC=C2C=CC=C2C=C1
C1=CC2=CC=CC3=CC=CC1=C23 C1=CC=CC=CC=CC=CC=CC=CC=CC=C1 C1=CC=CC=CC=CC=C1 C1=CC2=CC=C3C=CC=C3C=C2C=C1
c1cc[nH]c1 c1ccoc1 c1ccsc1 c1ccncc1 c1c[nH]cn1 c1cn[nH]c1 c1cocn1 c1cscn1 c1cnoc1 c1nnn[nH]1 c1nc[nH]n1 c1cnccn1 c1cncnc1 c1ccnnc1
c1ncncn1 c1ccc2[nH]ccc2c1 c1ccc2occc2c1 c1ccc2sccc2c1 c1ccc2ncccc2c1 c1ccc2cnccc2c1 c1ncc2[nH]cnc2n1 c1ccc2[nH]cnc2c1
c1ccc2c(c1)[nH]c1ccccc12 c1ccn2cccc2c1 c1ccc2nccnc2c1 [O-][n+]1ccccc1 O=c1cc[nH]cc1 O=c1cccc[nH]1 O=c1ccocc1 O=c1cccco1
O=c1[nH]cnc2nc[nH]c12 O=c1cc[nH]c(=O)[nH]1 Cn1c(=O)c2c(ncn2C)n(C)c1=O O=C1NC(=O)c2ccccc12 O=C1OC(=O)C=C1 O=C1C=CC(=O)N1
[CH-]1C=CC=C1 [CH+]1C=CC=CC=C1 [CH+]1C=C1 [CH+]1C=CC=C1 [CH-]1C=CC=CC=C1 c1cc[nH+]cc1 C[n+]1ccccc1 c1cc[o+]cc1 [n-]1cccc1
C1=COC=CN1 C1=COC=CO1 C1=CSC=CS1 C1=CNC=CC=C1 C1=COC=CC=C1 S=c1ccss1 C1=CSC(=C2SC=CS2)S1 S=C1C=CC=CN1 N=C1C=CC=CN1 O=S1(=O)C=CC=C1
CB1NBNBN1 OB1OCc2ccccc12 c1cc[pH]c1 C[Si]1(C)C=CC=C1 c1ccpcc1 C1=C[SiH2]C=C1 O=C1c2ccccc2C(=O)c2ccccc12 C1=CC(=C2C=CC=C2)C=C1
C1=CC(=C2C=C2)C=C1 c1ccc2c(c1)C1c3ccccc3C2c2ccccc12 C1Cc2ccc(cc2)CCc2ccc1cc2 C1Cc2cccc(c2)CCc2cccc1c2 C1=C=CCCCC1 c1cc2cc3ccc([nH]3)cc3ccc(cc4ccc(cc1n2)[nH]4)n3
c1ccc2c(c1)c1ccccc1c1ccccc21 c1cc2cccc3c4cccc5cccc(c(c1)c23)c45 C1=CC2=CC3=CC=CC3=CC2=C1 c1nsc2nsnc12 c1cnc2ncncc2n1 O=C1N=CN=C1
O=C1CC1=O O=C1C(=O)C(O)=C1O C12=C3C4=C5C1=C1C6=C7C2=C2C8=C3C3=C9C4=C4C%10=C5C5=C1C1=C6C6=C%11C7=C2C2=C7C8=C3C3=C8C9=C4C4=C9C%10=C5C5=C1C1=C6C6=C%11C2=C2C7=C3C3=C8C4=C4C9=C5C1=C1C6=C2C3=C41
O1C=CC=CC=CC=C1 S1C=CC=CC=CC=C1 N1C=CC=CC=CC=C1 [CH-]1C=CC=CC=CC=C1 O=C1C(=O)C=CC=CC(=O)O1 O=C1OC=CC=CC1=O O=C1OC=COC(=O)C=CC=C1
O1C=CC=C2C=CC=C12 O1C=CC=CC2=C1C=CO2 C1=CC(=O)OC=COC(=O)C=CC=C1 C1=CC2=CC=C1C(=O)OC=COC2=O O=C1OC=CNC(=O)C=CC=C1
C1=CC2=CC3=CC=C(O3)C=C3C=CC(=CC4=CC=C(O4)C=C1O2)O3 C1=CC2=CC3=CC=C(S3)C=C3C=CC(=N3)C=C3C=CC(N3)=CC1=N2 C1=CC=[O+]C=CC=CC=C1
""".split()


def handbook():
    for cas in heat_capacity.CRC_standard_data.index:
        try:
            yield search_chemical(cas).smiles
        except ValueError:
            continue


def suits(mol):
    atoms = mol.GetAtoms()
    return (
        any(a.GetSymbol() == "C" for a in atoms)
        and all(a.GetSymbol() in ELEMENTS and a.GetNumRadicalElectrons() == 0 for a in atoms)
        and len(Chem.GetMolFrags(mol)) == 1
    )


def relevant_ring_sizes(mol):
    """Sizes of the cycles that are no sum of strictly shorter ones."""
    bonds = [(b.GetBeginAtomIdx(), b.GetEndAtomIdx()) for b in mol.GetBonds()]
    graph = nx.Graph(bonds)
    basis = nx.minimum_cycle_basis(graph)
    if not basis:
        return []
    bits = {frozenset(bond): 1 << i for i, bond in enumerate(bonds)}
    cycles = nx.simple_cycles(graph, length_bound=max(map(len, basis)))
    vectors = sorted(
        (len(c), sum(bits[frozenset(bond)] for bond in zip(c, c[1:] + c[:1]))) for c in cycles
    )
    pivots, pending, sizes, size = {}, [], [], 0

    def rest(vector):
        while vector and vector.bit_length() in pivots:
            vector ^= pivots[vector.bit_length()]
        return vector

    for length, vector in vectors:
        if length > size:
            for earlier in pending:
                if left := rest(earlier):
                    pivots[left.bit_length()] = left
            pending, size = [], length
        if rest(vector):
            sizes.append(length)
            pending.append(vector)
    return sizes


def row(smiles, mol):
    kekule = Chem.Mol(mol)
    Chem.Kekulize(kekule, clearAromaticFlags=True)
    return {
        "smiles": smiles,
        "formula": CalcMolFormula(mol),
        "relevant_ring_sizes": " ".join(map(str, relevant_ring_sizes(mol))),
        "rdkit_symmetrised_rings": len(Chem.GetSymmSSSR(mol)),
        "rdkit_aromatic_atoms": "".join(str(int(a.GetIsAromatic())) for a in mol.GetAtoms()),
        "rdkit_aromatic_bonds": sum(b.GetIsAromatic() for b in mol.GetBonds()),
        "atoms": " ".join(
            f"{a.GetSymbol()}:{a.GetFormalCharge()}:{a.GetTotalNumHs()}" for a in kekule.GetAtoms()
        ),
        "bonds": " ".join(
            f"{b.GetBeginAtomIdx()}-{b.GetEndAtomIdx()}:{int(b.GetBondTypeAsDouble())}"
            for b in kekule.GetBonds()
        ),
    }


def main():
    RDLogger.DisableLog("rdApp.*")
    seen, rows, refused, chains = set(), [], 0, 0
    for source in (SELECTED, handbook()):
        for smiles in source:
            mol = Chem.MolFromSmiles(smiles)
            if mol is None or not suits(mol):
                refused += 1
                if source is SELECTED:
                    print("refused:", smiles)
                continue
            flat = Chem.MolToSmiles(mol, isomericSmiles=False)
            if flat in seen:
                continue
            seen.add(flat)
            chains += not mol.GetRingInfo().NumRings()
            if mol.GetRingInfo().NumRings() or chains % 10 == 0:
                rows.append(row(smiles, mol))
    target = Path(__file__).parent / "reference" / "perception.csv"
    target.parent.mkdir(exist_ok=True)
    with target.open("w", newline="") as file:
        writer = csv.DictWriter(file, rows[0].keys(), lineterminator="\n")
        writer.writeheader()
        writer.writerows(rows)
    rings = sum(bool(r["relevant_ring_sizes"]) for r in rows)
    print(f"{len(rows)} molecules, {rings} with rings; {refused} left out")


if __name__ == "__main__":
    main()

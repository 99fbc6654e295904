"""Makes tests/reference/bend_mmff94.csv: angle-bend energies and gradients of three-atom molecules by RDKit's MMFF94.

    python -m venv .venv && .venv/bin/pip install -r tests/requirements.txt
    .venv/bin/python tests/rdkit_bend.py

Only the angle term is switched on, so each molecule has a single term: the cubic form for H2O and H2S, the
cosine form for HCN and CO2. Energy in kcal/mol, gradient in kcal/(mol A), constants as RDKit reports them.
"""

import csv
import math

from measured_molecules import REFERENCE
from rdkit import Chem, RDLogger
from rdkit.Chem import rdDistGeom, rdForceFieldHelpers
from rdkit.Geometry import Point3D

RDLogger.DisableLog("rdApp.*")

# SMILES, atoms of the angle with the centre second, arms in angstrom, angles in degrees.
CASES = [
    ("O", (1, 0, 2), (0.97, 0.95), (94.0, 98.5, 103.0, 110.0, 121.5)),
    ("S", (1, 0, 2), (1.34, 1.36), (78.0, 88.0, 92.0, 101.0, 109.0)),
    ("C#N", (1, 0, 2), (1.16, 1.07), (150.5, 160.0, 171.0, 179.5)),
    ("O=C=O", (0, 1, 2), (1.16, 1.20), (151.0, 165.0, 178.0)),
]
OTHER_TERMS = ("Bond", "StretchBend", "Oop", "Torsion", "VdW", "Ele")

ATOMS = ("first", "centre", "last")
HEADER = [
    *("smiles", "constant_mdyn_angstrom_per_rad2", "reference_deg", "energy_kcal_per_mol"),
    *(f"{atom}_{axis}" for atom in ATOMS for axis in "xyz"),
    *(f"gradient_{atom}_{axis}" for atom in ATOMS for axis in "xyz"),
]


def rows():
    for smiles, (i, j, k), (r1, r2), degrees in CASES:
        molecule = Chem.AddHs(Chem.MolFromSmiles(smiles))
        rdDistGeom.EmbedMolecule(molecule, randomSeed=1)
        properties = rdForceFieldHelpers.MMFFGetMoleculeProperties(molecule)
        for term in OTHER_TERMS:
            getattr(properties, f"SetMMFF{term}Term")(False)
        _, constant, reference = properties.GetMMFFAngleBendParams(molecule, i, j, k)
        for degree in degrees:
            theta = math.radians(degree)
            # A tilted plane, so that no component is zero by symmetry.
            tilt = (0.6, 0.8)
            positions = {
                i: (r1 * tilt[0], r1 * tilt[1], 0.1),
                j: (0.0, 0.0, 0.1),
                k: (
                    r2 * (math.cos(theta) * tilt[0] - math.sin(theta) * tilt[1]),
                    r2 * (math.cos(theta) * tilt[1] + math.sin(theta) * tilt[0]),
                    0.1,
                ),
            }
            for atom, xyz in positions.items():
                molecule.GetConformer().SetAtomPosition(atom, Point3D(*xyz))
            field = rdForceFieldHelpers.MMFFGetMoleculeForceField(molecule, properties)
            gradient = field.CalcGrad()
            numbers = [constant, reference, field.CalcEnergy()]
            numbers += [c for atom in (i, j, k) for c in positions[atom]]
            numbers += [gradient[3 * atom + axis] for atom in (i, j, k) for axis in range(3)]
            yield [smiles, *map(repr, numbers)]


def main():
    with (REFERENCE / "bend_mmff94.csv").open("w", newline="") as file:
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(HEADER)
        writer.writerows(rows())


if __name__ == "__main__":
    main()

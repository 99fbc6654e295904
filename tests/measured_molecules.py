"""The measured molecules, for the scripts that compare with RDKit."""

import csv
from pathlib import Path

ROOT = Path(__file__).parent.parent
REFERENCE = ROOT / "tests" / "reference"


def measured_molecules():
    """Every SMILES of an enthalpy of formation in data/measurements.csv once, in the order of the file."""
    with (ROOT / "data" / "measurements.csv").open(newline="") as file:
        rows = [row for row in csv.DictReader(file) if row["phase"] in ("g", "l", "s")]
    return list(dict.fromkeys(row["smiles"] for row in rows))

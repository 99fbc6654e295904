"""The measured molecules, for the scripts that compare with RDKit."""

import csv
from pathlib import Path

ROOT = Path(__file__).parent.parent
REFERENCE = ROOT / "tests" / "reference"


def measured_molecules():
    """Every SMILES of data/measurements.csv once, in the order of the file."""
    with (ROOT / "data" / "measurements.csv").open(newline="") as file:
        return list(dict.fromkeys(row["smiles"] for row in csv.DictReader(file)))

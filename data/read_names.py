"""Writes structures_from_names.csv: the structure that each name in the tables means by the rules of nomenclature.

It is a second opinion beside the CAS look-up and is made by the OPSIN parser, so this one script needs Java and
`pip install py2opsin==1.2.0`. Its output is committed; nothing else needs either.
"""

import csv
import re
import warnings

from py2opsin import py2opsin

import make_gas_properties as gas
import make_measurements as tables
import structures as st

RACEMATE = re.compile(r",?\s*\((±|\+|-)\)-?$|^\((dl|[dl]|±|\+|-)\)[ -]")
GEOMETRY_APART = re.compile(r"^(\([EZRS\d,]+\)|cis|trans|exo|endo|meso) ")
BESIDE_IN_BRACKETS = re.compile(r" \([^()]*[a-z]{4}[^()]*\)$")
GEOMETRY_INSIDE = re.compile(r"^(\S+?)-(cis|trans)-(\S+)$")
TRIVIAL_IN_BRACKETS = re.compile(r"^(bicyclo\[[\d.]+\]\S+) \(\w+\)$|^\w+ \((tricyclo\S+)\)$")


def as_parsed(name):
    """The name in the form the parser takes: no mark of the racemate, the geometry in front, no trivial name beside."""
    name = GEOMETRY_APART.sub(r"\1-", BESIDE_IN_BRACKETS.sub("", RACEMATE.sub("", name)))
    inside = GEOMETRY_INSIDE.match(name)
    if inside:
        name = f"{inside[2]}-{inside[1]}-{inside[3]}"
    twice = TRIVIAL_IN_BRACKETS.match(name)
    return (twice[1] or twice[2]) if twice else name


def names():
    found = {e["Chemical"] for e in tables.package_table(tables.CRC) if any(e[f"Hf{p}"] for p in "slg")}
    for path in tables.ATCT.values():
        found |= {e["Chemical"] for e in tables.package_table(path)}
    for table in tables.PHASE_CHANGES:
        found |= {tables.tidy(e["Chemical"]) for e in tables.package_table(table.path) if e[table.column]}
    for path in (gas.TRC, gas.POLING, gas.JANAF):
        found |= {tables.tidy(e["Chemical"]) for e in tables.package_table(path)}
    return sorted(found | {e["molecule"] for e in st.read_csv("enthalpies_strained.csv")})


def main():
    asked = names()
    warnings.simplefilter("ignore", RuntimeWarning)  # one line for every name that the parser cannot read
    read = py2opsin([as_parsed(name) for name in asked], output_format="SMILES")
    with open(st.HERE / "structures_from_names.csv", "w", newline="", encoding="utf-8") as handle:
        writer = csv.writer(handle, lineterminator="\n")
        writer.writerow(["name", "smiles"])
        for name, smiles in zip(asked, read, strict=True):
            mol = st.parse(smiles)
            if mol is not None and "C" in st.elements(mol) and st.elements(mol) <= st.ELEMENTS:
                writer.writerow([name, st.molecule_key(smiles)])


if __name__ == "__main__":
    main()

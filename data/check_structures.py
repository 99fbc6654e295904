"""Compares every structure in measurements.csv and the tables of the gas with the formula, the InChIKey and the name of its row.

Run `python data/check_structures.py`. It prints what needs a human look and exits 1 when there is any; a finding that
was looked at and found right stands in structures_reviewed.csv with the reason. `--all` prints those as well.
"""

import argparse
import re
import sys

from chemicals.identifiers import search_chemical
from rdkit import Chem

import structures as st

TABLES = ("measurements.csv", "gas_heat_capacities.csv", "gas_entropies.csv")
GEOMETRY_WORD = re.compile(r"\b(cis|trans|exo|endo|meso)\b|\bDL-|\(\d*[EZRS](,\d*[EZRS])*\)|\d[αβ]|\b[αβ]-D-|\b[αβ]-L-")
LETTER_OF_ENANTIOMER = re.compile(r"^[LDd]-|^S-|^\([RS]\)[- ]")
# Words that fix a diastereomer without a stereo prefix.
GEOMETRY_IN_TRIVIAL_NAME = ("maleic acid", "fumaric", "oleate", "glucopyranoside", "glucose", "lactose", "xylitol", "mannitol",
                            "galactitol", "sorbose", "ascorbic", "threonine", "isoleucine", "cystine", "arabino")
# Words that mean one diastereomer without saying it: a structure may state what such a name leaves out.
GEOMETRY_UNDERSTOOD = ("arabinitol", "menthol", "caryophyllene", "cholesterol", "geranial", "neral", "crotonaldehyde", "fumar", "maleate",
                       "linole", "methyl eruc", "coumaric")


def stereo_elements(smiles):
    """(stated, unstated) numbers of stereocentres and double bonds that make diastereomers; a lone centre makes none."""
    found = list(Chem.FindPotentialStereo(st.parse(smiles)))
    centres = [s for s in found if s.type == Chem.StereoType.Atom_Tetrahedral]
    if len(centres) == 1:
        found.remove(centres[0])
    stated = sum(1 for s in found if s.specified == Chem.StereoSpecified.Specified)
    return stated, len(found) - stated


def geometry_stated_by(name):
    return bool(GEOMETRY_WORD.search(name)) or any(word in name.lower() for word in GEOMETRY_IN_TRIVIAL_NAME)


def formula_findings(row):
    table_formula = row["note"].removeprefix("table formula ") if row["note"].startswith("table formula ") else None
    if table_formula and st.formula_counts(table_formula) != st.counts_of(st.parse(row["smiles"])):
        yield "formula", f"the table has {table_formula}, the structure {st.molecular_formula(st.parse(row['smiles']))}"


def inchikey_findings(row):
    if not row["cas"] or st.override_for(row["cas"], row["name"]):
        return
    try:
        found = search_chemical(row["cas"])
    except ValueError:
        return
    if found.CASs == row["cas"] and Chem.MolToInchiKey(st.parse(row["smiles"]))[:14] != found.InChI_key[:14]:
        yield "inchikey", f"the identifiers have {found.InChI_key} for {found.smiles}"


def name_findings(row):
    name, smiles = row["name"], row["smiles"]
    read = st.FROM_NAMES.get(name)
    if read and st.flat(read) != st.flat(smiles):
        yield "skeleton", f"the name means {read}"
    elif read and read not in (smiles, st.flat(smiles)):
        yield "stereo", f"the name means {read}"
    elif not read and geometry_stated_by(name):
        yield "unread geometry", "the name states a geometry that the parser could not read"


def stereo_findings(row):
    name = row["name"]
    stated, unstated = stereo_elements(row["smiles"])
    word = geometry_stated_by(name) or LETTER_OF_ENANTIOMER.match(name) or any(word in name.lower() for word in GEOMETRY_UNDERSTOOD)
    if geometry_stated_by(name) and not stated and not LETTER_OF_ENANTIOMER.match(name) and not name.startswith("DL-"):
        yield "stereo missing", "the name states a geometry, the structure none"
    if stated and not word:
        yield "stereo added", "the structure states a geometry, the name none"
    if unstated and stated:
        yield "stereo half", f"{stated} stereo elements stated, {unstated} not"


def findings(rows):
    seen = set()
    for row in rows:
        if row["use"].startswith(("reference", "superseded")) or row["note"].startswith("the name means"):
            continue
        for check in (formula_findings, inchikey_findings, name_findings, stereo_findings):
            for kind, text in check(row):
                if (row["name"], kind, row["smiles"]) not in seen:
                    seen.add((row["name"], kind, row["smiles"]))
                    yield row, kind, text


def main():
    parser = argparse.ArgumentParser(description=__doc__.split("\n\n", maxsplit=1)[0])
    parser.add_argument("--all", action="store_true", help="print the findings that were reviewed as well")
    everything = parser.parse_args().all
    reviewed = {(r["name"], r["finding"]): r["verdict"] for r in st.read_csv("structures_reviewed.csv")}
    rows = [row for table in TABLES for row in st.read_csv(table)]
    found = list(findings(rows))
    new = [f for f in found if (f[0]["name"], f[1]) not in reviewed]
    for row, kind, text in found if everything else new:
        verdict = reviewed.get((row["name"], kind), "LOOK")
        print(f"{kind} | {row['cas']} | {row['name']} | {row['smiles']} | {text} | {verdict}")
    stale = set(reviewed) - {(row["name"], kind) for row, kind, _ in found}
    for name, kind in sorted(stale):
        print(f"structures_reviewed.csv: {name} ({kind}) is not a finding any more; delete the line")
    names = {r["name"] for r in rows}
    ambiguous = {r["smiles"] for r in rows if r["use"] == "fit" and stereo_elements(r["smiles"])[1]}
    print(f"{len(rows)} rows, {len(names)} names, {len(names & set(st.FROM_NAMES))} of them read; {len(found)} findings, "
          f"{len(found) - len(new)} reviewed; {len(ambiguous)} fitted molecules without a stated diastereomer", file=sys.stderr)
    return 1 if new or stale else 0


if __name__ == "__main__":
    sys.exit(main())

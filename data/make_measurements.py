"""Writes measurements.csv, the measured enthalpies of formation, vaporisation and sublimation at 298.15 K.

Run `python data/make_measurements.py` with the packages of requirements.txt. The output depends on the committed
tables beside this file and on the two packages alone, so it comes out the same to the byte.
"""

import collections
import csv
import math
import os
import sys
import typing

import chemicals
from chemicals.phase_change import Tb

import structures as st

CRC = "Heat Capacity/CRC Standard Thermodynamic Properties of Chemical Substances.tsv"
ATCT = {"g": "Reactions/ATcT 1.112 (g).tsv", "l": "Reactions/ATcT 1.112 (l).tsv"}



class PhaseChange(typing.NamedTuple):
    """A table of enthalpies of vaporisation (phase v) or sublimation (phase b) at 298.15 K in the package, in J/mol."""

    path: str
    phase: str
    column: str
    source: str
    kind: str


PHASE_CHANGES = (
    PhaseChange("Phase Change/CRC Handbook Heat of Vaporization.tsv", "v", "Hvap298", "crc2014", "handbook_vaporisation"),
    PhaseChange("Phase Change/Ghazerati Appendix Vaporization Enthalpy.tsv", "v", "Hvap298", "gharagheizi-2013-vaporisation", "compilation_vaporisation"),
    PhaseChange("Phase Change/Ghazerati Appendix Sublimation Enthalpy.tsv", "b", "Hsub", "gharagheizi-2013-sublimation", "compilation_sublimation"),
)
PACKAGE = f"PyPI package chemicals {chemicals.__version__}"
COLUMNS = (
    "name smiles phase value_kj_per_mol uncertainty_kj_per_mol coverage_k u_kj_per_mol u_basis "
    "source where_seen cas kind use note"
).split()
NOT_FITTED_KINDS = ("webbook_avg", "calc", "estimate", "memory")

# Half a unit of the last printed digit on both sides, 0.05 + 0.05 kJ/mol, and 0.05 more for a calorie conversion.
SAME_VALUE_KJ = 0.15
# A value printed to 0.1 kcal/mol is known to 0.21 kJ/mol, and its partner to 0.05 kJ/mol.
SAME_VALUE_KCAL = 0.26
COVERAGE_STATED = 2
# What is printed for these says how well one laboratory repeats itself: its factor, while the default adds what
# laboratories differ by. The reason for both stands in default_uncertainties.csv.
COVERAGE_OF_REPEATABILITY = {"compilation_sublimation": 1}
# A vaporisation enthalpy of a longer chain at 298.15 K is extrapolated from shorter ones, not measured.
HEAVY_ATOMS_MOST = 40
# Below this boiling point the vapour over the liquid at 298.15 K is at more than 2.5 bar, and its enthalpy falls short
# of the ideal gas's by more than the default uncertainty; see data/README.md.
BOILS_ABOVE_K = 273.15
KCAL_NOTE = "printed in kcal/mol"

SOURCE_KEYS = {row["published_source"]: row["source"] for row in st.read_csv("source_keys.csv")}
DEFAULTS = {row["kind"]: row for row in st.read_csv("default_uncertainties.csv")}
REFERENCE = {row["cas"]: row["smiles"] for row in st.read_csv("reference_molecules.csv")}
REFERENCE_KEYS = {st.molecule_key(smiles) for smiles in REFERENCE.values()}


def package_table(path):
    with open(os.path.join(os.path.dirname(chemicals.__file__), path), encoding="utf-8") as handle:
        return list(csv.DictReader(handle, delimiter="\t"))


def kj(joules):
    """A figure in J/mol as kJ/mol with the digits that it was given in, never an exponent."""
    text = f"{float(joules) / 1000:.3f}".rstrip("0")
    return text + "0" if text.endswith(".") else text


def default_u(kind, mol):
    carbons = st.counts_of(mol).get("C", 0)
    default = DEFAULTS[kind]
    return math.hypot(float(default["u_kj_per_mol"]), carbons * float(default["u_per_carbon_kj_per_mol"]))


def row(name, smiles, phase, value, stated_u, source, where, cas, kind, note):
    mol = st.parse(smiles)
    coverage = COVERAGE_OF_REPEATABILITY.get(kind, COVERAGE_STATED)
    filled = {
        "name": name, "smiles": st.molecule_key(smiles), "phase": phase, "value_kj_per_mol": value,
        "uncertainty_kj_per_mol": stated_u, "coverage_k": str(coverage) if stated_u else "",
        "source": source, "where_seen": where, "cas": cas, "kind": kind, "use": "fit", "note": note,
    }
    if not stated_u:
        u, basis = default_u(kind, mol), f"default:{kind}"
    elif kind in COVERAGE_OF_REPEATABILITY:
        u, basis = math.hypot(float(stated_u) / coverage, default_u(kind, mol)), f"stated and default:{kind}"
    else:
        u, basis = float(stated_u) / coverage, "stated"
    filled["u_kj_per_mol"] = f"{u:.4g}"
    filled["u_basis"] = basis
    excluded = st.exclusion_for(cas, name, phase, source)
    if filled["smiles"] in REFERENCE_KEYS:
        filled["use"] = "reference"
    elif excluded:
        filled["use"] = excluded
    elif kind in NOT_FITTED_KINDS:
        filled["use"] = kind
    elif "C" not in st.elements(mol):
        filled["use"] = "not organic"
    return filled


def structure_of(cas, name):
    """(SMILES, None) of a molecule that belongs in the table, or (None, why not)."""
    if cas in REFERENCE:
        return REFERENCE[cas], None
    return belongs(st.identify(cas, name), cas, name)


def belongs(smiles, cas, name):
    """The SMILES, None when it is that of a molecule that belongs in the table; else None, why not."""
    mol = st.parse(smiles)
    if mol is None:
        return None, "no structure known"
    if not st.is_molecule(mol):
        return None, "not a neutral closed-shell molecule of the elements covered"
    if "C" not in st.elements(mol):
        return None, "no carbon"
    if st.exclusion_for(cas, name, "") == "not written":
        return None, "listed in exclusions.csv as another substance than the identifiers give"
    return smiles, None


def crc_rows(skipped):
    for entry in package_table(CRC):
        phases = {p: entry[f"Hf{p}"] for p in "slg" if entry[f"Hf{p}"]}
        if not phases:
            continue
        smiles, why_not = structure_of(entry["CAS"], entry["Chemical"])
        if why_not:
            skipped[f"crc2014: {why_not}"] += 1
            continue
        for phase, value in phases.items():
            yield row(entry["Chemical"], smiles, phase, kj(value), "", "crc2014", f"{PACKAGE}: {CRC}",
                      entry["CAS"], "handbook", "")


def atct_rows(skipped):
    for phase, path in ATCT.items():
        for entry in package_table(path):
            formula, value = entry["Formula"], entry[f"Hf{phase}"]
            smiles, why_not = structure_of(entry["CAS"], entry["Chemical"])
            counts = st.formula_counts(formula)
            if not why_not and (counts is None or counts != st.counts_of(st.parse(smiles))):
                why_not = "an ion or open shell: the table's formula is not that of a closed-shell structure"
            if why_not:
                skipped[f"atct-1.112 ({phase}): {why_not}"] += 1
                continue
            stated = kj(entry["uncertainty"]) if float(entry["uncertainty"]) else ""
            made = row(entry["Chemical"], smiles, phase, kj(value), stated, "atct-1.112", f"{PACKAGE}: {path}",
                       entry["CAS"], "evaluated", f"table formula {formula}")
            if not stated:  # the elements in their reference state are zero by definition
                made.update(uncertainty_kj_per_mol="0.0", coverage_k=str(COVERAGE_STATED), u_kj_per_mol="0", u_basis="stated")
            yield made


def tidy(name):
    """A name without the blanks that the tables leave at its end and inside."""
    return " ".join(name.split())


def phase_change_rows(skipped):
    for table in PHASE_CHANGES:
        for entry in package_table(table.path):
            if not entry[table.column]:
                continue
            cas, name = entry["CAS"], tidy(entry["Chemical"])
            smiles, finding = st.identify_by_both(cas, name)
            smiles, why_not = belongs(smiles, cas, name)
            if smiles and st.isotopes(st.parse(smiles)):
                why_not = "an isotope"
            elif smiles and st.parse(smiles).GetNumHeavyAtoms() > HEAVY_ATOMS_MOST:
                why_not = f"more than {HEAVY_ATOMS_MOST} atoms besides hydrogen: extrapolated, not measured"
            if why_not:
                skipped[f"{table.source} ({table.phase}): {why_not}"] += 1
                continue
            stated = kj(entry["error"]) if entry.get("error") else ""
            made = row(name, smiles, table.phase, kj(entry[table.column]), stated, table.source,
                       f"{PACKAGE}: {table.path}", cas, table.kind, finding)
            boils = Tb(cas, method="CRC_ORG") if table.phase == "v" else None
            if finding and made["use"] == "fit":
                made["use"] = "structure unsettled"
            elif boils and boils < BOILS_ABOVE_K and made["use"] == "fit":
                made["use"] = "vapour not ideal"
            yield made


def strained_rows(already, skipped):
    """Rows of enthalpies_strained.csv; a row that the tables above have given already is not written twice."""
    printed = {(r["source"], r["cas"], r["phase"], r["value_kj_per_mol"]) for r in already}
    for entry in st.read_csv("enthalpies_strained.csv"):
        source = SOURCE_KEYS[entry["published_source"]]
        where = entry["where_seen"]
        cas = where.split("(CAS ")[1].rstrip(")") if "(CAS " in where else ""
        if (source, cas, entry["phase"], kj(1000 * float(entry["value"]))) in printed:
            skipped["enthalpies_strained.csv: the same printed row as in the handbook or ATcT table"] += 1
            continue
        smiles = st.override_for(cas, entry["molecule"]) or entry["smiles"]
        if st.parse(smiles) is None:
            skipped["enthalpies_strained.csv: no structure"] += 1
            continue
        printed_in = KCAL_NOTE if "kcal/mol)" in entry["published_source"] + where else ""
        note = "; ".join(text for text in (printed_in, entry["flag"].strip(" |"), entry["note"]) if text)
        yield row(entry["molecule"], smiles, entry["phase"], kj(1000 * float(entry["value"])), entry["uncertainty"],
                  source, where, cas, entry["kind"], note)


def same_value(one, other):
    kcal = any(r["note"].startswith(KCAL_NOTE) for r in (one, other))
    limit = SAME_VALUE_KCAL if kcal else SAME_VALUE_KJ
    return abs(float(one["value_kj_per_mol"]) - float(other["value_kj_per_mol"])) <= limit + 1e-9


def mark_duplicates(rows):
    """Equal values share a primary source: the one with the best stated uncertainty stays, the others say whose they are."""
    groups = collections.defaultdict(list)
    for r in rows:
        if r["use"] in ("fit", "reference"):
            groups[r["smiles"], r["phase"]].append(r)
    for group in groups.values():
        group.sort(key=lambda r: (r["u_basis"] != "stated", float(r["u_kj_per_mol"]), r["source"], r["name"], r["value_kj_per_mol"]))
        kept = []
        for r in group:
            twin = next((k for k in kept if same_value(k, r)), None)
            if twin:
                r["use"] = f"duplicate of {twin['source']}"
            elif kept and r["use"] == "reference":
                r["use"] = f"superseded by {kept[0]['source']}"
            else:
                kept.append(r)


def measurements():
    skipped = collections.Counter()
    rows = list(crc_rows(skipped)) + list(atct_rows(skipped))
    rows += list(strained_rows(rows, skipped)) + list(phase_change_rows(skipped))
    mark_duplicates(rows)
    rows.sort(key=lambda r: tuple(r[c] for c in ("smiles", "phase", "source", "name", "cas", "value_kj_per_mol")))
    return rows, skipped


def handbook_against_evaluated(rows):
    """Sorted absolute gas-phase differences handbook less ATcT, kJ/mol: what the default for the handbook rests on."""
    evaluated = {r["smiles"]: float(r["value_kj_per_mol"]) for r in rows
                 if (r["source"], r["phase"], r["use"]) == ("atct-1.112", "g", "fit")}
    return sorted(abs(float(r["value_kj_per_mol"]) - evaluated[r["smiles"]]) for r in rows
                  if (r["source"], r["phase"]) == ("crc2014", "g") and r["smiles"] in evaluated)


def summary(rows, skipped):
    for title, column in (("source and phase", ("source", "phase")), ("kind and phase", ("kind", "phase")), ("phase and use", ("phase", "use"))):
        print(f"rows by {title}", file=sys.stderr)
        for key, count in sorted(collections.Counter(tuple(r[c] for c in column) for r in rows).items()):
            print(f"  {count:5d}  {' | '.join(key)}", file=sys.stderr)
    for why, count in sorted(skipped.items()):
        print(f"not written {count:5d}  {why}", file=sys.stderr)
    apart = handbook_against_evaluated(rows)
    unequal = [d for d in apart if d > SAME_VALUE_KJ]
    for title, d in (("all", apart), ("unequal", unequal)):
        print(f"handbook against ATcT, gas, {title}: {len(d)} molecules, 68 % below {d[int(0.68 * (len(d) - 1))]:.2f} kJ/mol, "
              f"{sum(x > 7 for x in d)} above 7", file=sys.stderr)
    fitted = {r["smiles"] for r in rows if r["phase"] == "g" and r["use"] == "fit"}
    print(f"{len(rows)} rows; {len(fitted)} molecules with a fitted gas row", file=sys.stderr)


def main():
    rows, skipped = measurements()
    with open(st.HERE / "measurements.csv", "w", newline="", encoding="utf-8") as handle:
        writer = csv.DictWriter(handle, COLUMNS, lineterminator="\n")
        writer.writeheader()
        writer.writerows(rows)
    summary(rows, skipped)


if __name__ == "__main__":
    main()

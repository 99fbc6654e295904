"""Writes gas_heat_capacities.csv and gas_entropies.csv: ideal-gas heat capacities and standard entropies from the published tables.

Run `python data/make_gas_properties.py` with the packages of requirements.txt. The output depends on the committed
tables beside this file and on the two packages alone, so it comes out the same to the byte.
"""

import collections
import csv
import itertools
import math
import sys

import make_measurements as tables
import structures as st
from chemicals.heat_capacity import Cp_dict_JANAF_gas, Poling, TRCCp, TRCCp_integral_over_T

TEMPERATURES_K = (298.15, 400, 500, 600, 800)
CP_COLUMNS = tuple(f"cp_{t:.0f}_j_per_mol_k" for t in TEMPERATURES_K)
S_COLUMN = "s_298_j_per_mol_k"
POLING = "Heat Capacity/PolingDatabank.tsv"
TRC = "Heat Capacity/TRC Thermodynamics of Organic Compounds in the Gas State.tsv"
JANAF = "Reactions/JANAF_1998.tsv"
JANAF_CP = "Heat Capacity/JANAF_1998_gas_Cp.json"
# Half a unit of the last printed digit of two tables, 0.05 + 0.05 J/(mol K), and 0.05 more for a calorie conversion.
SAME_VALUE = 0.15
# Where a polynomial misses its own book's value at 298.15 K by more, J/(mol K), one of them is of another molecule.
OWN_CONSTANT = 2
GAS_CONSTANT = 8.314462618  # J/(mol K)
DEFAULTS = {(row["property"], row["kind"]): row for row in st.read_csv("default_gas_uncertainties.csv")}


def structure_of(entry, source, skipped):
    """(SMILES, name, finding) of a molecule that belongs in the tables, or None, counted in `skipped`."""
    cas, name = entry["CAS"], tables.tidy(entry["Chemical"])
    smiles, finding = st.identify_by_both(cas, name)
    smiles, why_not = tables.belongs(smiles, cas, name)
    counts = st.formula_counts(entry["formula"]) if "formula" in entry else None
    if smiles and st.isotopes(st.parse(smiles)):
        why_not = "an isotope"
    elif smiles and "(Dimer)" in name:
        why_not = "a dimer under the name of its half"
    elif smiles and counts and counts != st.counts_of(st.parse(smiles)):
        why_not = "the table's formula is not that of a closed-shell structure"
    if why_not:
        skipped[f"{source}: {why_not}"] += 1
        return None
    return smiles, name, finding


def row(entry, found, values, source, where, kind, what):
    """One line of a table; `what` is cp or s298, the word for it in the tables of defaults and exclusions."""
    smiles, name, finding = found
    atoms = st.parse(smiles).GetNumHeavyAtoms()
    default = DEFAULTS[what, kind]
    u = math.hypot(float(default["u_j_per_mol_k"]), atoms * float(default["u_per_heavy_atom_j_per_mol_k"]))
    excluded = st.exclusion_for(entry["CAS"], name, what, source)
    return {
        "name": name, "smiles": st.molecule_key(smiles), **values, "u_j_per_mol_k": f"{u:.3g}", "source": source,
        "where_seen": f"{tables.PACKAGE}: {where}", "cas": entry["CAS"], "kind": kind,
        "use": excluded or ("structure unsettled" if finding else "fit"), "note": finding,
    }


def cells(heat_capacity, least_k, most_k):
    """The heat capacity at each temperature inside the range, the others blank; J/(mol K)."""
    return {c: f"{heat_capacity(t):.2f}" if least_k <= t <= most_k else "" for c, t in zip(CP_COLUMNS, TEMPERATURES_K)}


def only_at_298(text):
    return dict.fromkeys(CP_COLUMNS, "") | {CP_COLUMNS[0]: text}


def sources(skipped):
    """(heat capacity row or None, entropy row or None) of every entry."""
    for entry in tables.package_table(tables.CRC):
        entry = entry | {c: "" for c in ("Cpg", "S0g") if entry[c] == "0"}  # a blank of the handbook read as a figure
        if (entry["Cpg"] or entry["S0g"]) and (found := structure_of(entry, "crc2014", skipped)):
            common = "crc2014", tables.CRC, "handbook"
            yield (row(entry, found, only_at_298(entry["Cpg"]), *common, "cp") if entry["Cpg"] else None,
                   row(entry, found, {S_COLUMN: entry["S0g"]}, *common, "s298") if entry["S0g"] else None)
    for entry in tables.package_table(TRC):
        if found := structure_of(entry, "trc-gas-1994", skipped):
            a = [float(entry[f"a{i}"]) for i in range(8)]
            cp = cells(lambda t, a=a: TRCCp(t, *a), float(entry["Tmin"]), float(entry["Tmax"]))
            common = "trc-gas-1994", TRC, "evaluated"
            s = f"{TRCCp_integral_over_T(298.15, *a, J=float(entry['J'])):.2f}"
            yield row(entry, found, cp, *common, "cp"), row(entry, found, {S_COLUMN: s}, *common, "s298")
    for entry in tables.package_table(POLING):
        if (entry["a0"] or entry["Cpg"]) and (found := structure_of(entry, "poling-2000", skipped)):
            cp, differs = only_at_298(entry["Cpg"]), False
            if entry["a0"]:
                a = [float(entry[f"a{i}"]) for i in range(5)]
                cp = cells(lambda t, a=a: Poling(t, *a), float(entry["Tmin"]), float(entry["Tmax"]))
                differs = bool(entry["Cpg"] and cp[CP_COLUMNS[0]]) and abs(float(entry["Cpg"]) - float(cp[CP_COLUMNS[0]])) > OWN_CONSTANT
            made = row(entry, found, cp, "poling-2000", POLING, "textbook", "cp")
            if differs:
                made.update(use="contradicted", note=f"the book's own constant at 298.15 K is {entry['Cpg']}")
            yield made, None
    for entry in tables.package_table(JANAF):
        if entry["S0g"] and (found := structure_of(entry, "janaf-1998", skipped)):
            table = dict(zip(*Cp_dict_JANAF_gas[entry["CAS"]]))
            cp = cells(table.get, min(table), max(table))
            yield (row(entry, found, cp, "janaf-1998", JANAF_CP, "evaluated", "cp"),
                   row(entry, found, {S_COLUMN: f"{float(entry['S0g']):.2f}"}, "janaf-1998", JANAF, "evaluated", "s298"))


def impossible(made):
    """Whether a heat capacity falls with temperature or leaves 7/2 R to (3 N - 3/2) R, N atoms: translation and rotation
    alone, and every vibration at its classical limit as well (a linear molecule; another has R/2 less)."""
    values = [float(made[c]) for c in CP_COLUMNS if made[c]]
    most = (3 * sum(st.counts_of(st.parse(made["smiles"])).values()) - 1.5) * GAS_CONSTANT
    falls = any(later < earlier - SAME_VALUE for earlier, later in itertools.pairwise(values))
    return falls or min(values) < 3.5 * GAS_CONSTANT - SAME_VALUE or max(values) > most + SAME_VALUE


def exclude_impossible(pairs):
    """An impossible heat capacity is not fitted, nor is the entropy that its source has from the same coefficients."""
    for cp, s in pairs:
        if cp and cp["use"] == "fit" and impossible(cp):
            for made in filter(None, (cp, s)):
                made["use"] = "impossible"


def differences(one, other, columns):
    return [float(one[c]) - float(other[c]) for c in columns if one[c] and other[c]]


def mark_duplicates(rows, columns):
    """Of equal values one row stays: the one at most temperatures, then with the smaller u, then by source and name."""
    groups = collections.defaultdict(list)
    for r in rows:
        if r["use"] == "fit":
            groups[r["smiles"]].append(r)
    for group in groups.values():
        group.sort(key=lambda r: (-sum(bool(r[c]) for c in columns), float(r["u_j_per_mol_k"]), r["source"], r["name"]))
        kept = []
        for r in group:
            shared = ((k, differences(k, r, columns)) for k in kept)
            twin = next((k for k, d in shared if d and max(map(abs, d)) <= SAME_VALUE + 1e-9), None)
            if twin:
                r["use"] = f"duplicate of {twin['source']}"
            else:
                kept.append(r)


def scatter(rows, columns):
    """Differences between sources that both know a molecule: what the defaults rest on."""
    by_molecule = collections.defaultdict(list)
    for r in rows:
        if r["use"] == "fit" or r["use"].startswith("duplicate"):
            by_molecule[r["smiles"]].append(r)
    for column in columns:
        apart = collections.defaultdict(list)
        for group in by_molecule.values():
            for one, other in itertools.combinations(sorted(group, key=lambda r: r["source"]), 2):
                if one["source"] != other["source"]:
                    apart[one["source"], other["source"]] += map(abs, differences(one, other, [column]))
        for pair, d in sorted(apart.items()):
            if d:
                d.sort()
                unequal = [x for x in d if x > SAME_VALUE] or [0]
                print(f"{column}, {' against '.join(pair)}: {len(d)} molecules, half within {d[len(d) // 2]:.2f}, 68 % within "
                      f"{d[int(0.68 * (len(d) - 1))]:.2f}, of the {len(unequal)} unequal {unequal[int(0.68 * (len(unequal) - 1))]:.2f}, "
                      f"largest {d[-1]:.1f} J/(mol K)", file=sys.stderr)


def write(name, rows, columns):
    mark_duplicates(rows, columns)
    rows.sort(key=lambda r: (r["smiles"], r["source"], r["name"], r["cas"]))
    with open(st.HERE / name, "w", newline="", encoding="utf-8") as handle:
        writer = csv.DictWriter(handle, list(rows[0]), lineterminator="\n")
        writer.writeheader()
        writer.writerows(rows)
    scatter(rows, columns)
    for key, count in sorted(collections.Counter((r["source"], r["use"]) for r in rows).items()):
        print(f"{name}: {count:5d}  {' | '.join(key)}", file=sys.stderr)
    print(f"{name}: {len(rows)} rows, {len({r['smiles'] for r in rows if r['use'] == 'fit'})} molecules fitted", file=sys.stderr)


def main():
    skipped = collections.Counter()
    pairs = list(sources(skipped))
    exclude_impossible(pairs)
    heat_capacities, entropies = zip(*pairs)
    write("gas_heat_capacities.csv", [r for r in heat_capacities if r], CP_COLUMNS)
    write("gas_entropies.csv", [r for r in entropies if r], (S_COLUMN,))
    for why, count in sorted(skipped.items()):
        print(f"not written {count:5d}  {why}", file=sys.stderr)


if __name__ == "__main__":
    main()

"""Compares the phases of one molecule in measurements.csv: formation in two phases against the step between them.

Run `python data/check_phases.py`. It prints the contradictions and exits 1 when one is neither excluded in exclusions.csv
nor listed in contradictions.csv; `--all` prints those as well. A contradiction is between measured values alone, no
estimate takes part in it.
"""

import argparse
import collections
import itertools
import math
import statistics
import sys

import structures as st

STEPS = {"v": ("l", "g", "vaporisation"), "b": ("s", "g", "sublimation"), "f": ("s", "l", "fusion")}
# A difference counts from here on, kJ/mol, and only when it is that many combined standard uncertainties, too.
APART_KJ = 10
APART_U = 4
# Less than any step at 298.15 K that is known with certainty, kJ/mol: the lightest liquids need 20 to evaporate, the
# roundest crystals 38, and no crystal melts with a gain of energy.
LEAST_KJ = {"v": 15, "b": 30, "f": 0}
EXCLUDED = "contradicted"


def value(row):
    return float(row["value_kj_per_mol"])


def uncertainty(row):
    return float(row["u_kj_per_mol"])


def by_phase(rows):
    """Rows that are measurements, whether fitted or equal to one that is, by molecule and phase."""
    found = collections.defaultdict(lambda: collections.defaultdict(list))
    for row in rows:
        if row["use"] == "fit" or row["use"].startswith(("duplicate", EXCLUDED)):
            found[row["smiles"]][row["phase"]].append(row)
    return found


def pairs(phases, lower, upper):
    """Rows in two phases, of one source or of two."""
    return itertools.product(phases[lower], phases[upper])


def contradictions(found):
    """(molecule, step, the rows concerned, what is wrong) of every pair of phases that a measurement or nature forbids."""
    for smiles, phases in found.items():
        for step, (lower, upper, name) in STEPS.items():
            measured = phases[step]
            for low, high in pairs(phases, lower, upper):
                gap = value(high) - value(low)
                between = f"{upper} {value(high):g} ({high['source']}) minus {lower} {value(low):g} ({low['source']}) is {gap:.1f}"
                nearest = min(measured, key=lambda r: abs(value(r) - gap), default=None)
                if nearest:
                    u = math.hypot(uncertainty(low), uncertainty(high), uncertainty(nearest))
                    if abs(gap - value(nearest)) > max(APART_KJ, APART_U * u):
                        yield smiles, step, (low, high), f"{between}, measured {name} {value(nearest):g} ({nearest['source']})"
                elif gap < LEAST_KJ[step] - APART_U * math.hypot(uncertainty(low), uncertainty(high)):
                    yield smiles, step, (low, high), f"{between}, too little for {name}"
        if phases["v"] and phases["b"]:
            least, most = min(phases["v"], key=value), max(phases["b"], key=value)
            if value(most) < value(least) - APART_U * math.hypot(uncertainty(least), uncertainty(most)):
                yield smiles, "f", (least, most), (f"sublimation {value(most):g} ({most['source']}) below vaporisation "
                                                   f"{value(least):g} ({least['source']})")


def others(phases, concerned):
    """What other sources have in the same phases: the only ground on which one of two rows can be called wrong."""
    for row in concerned:
        for other in phases[row["phase"]]:
            if other["source"] != row["source"]:
                yield f"{other['phase']} {value(other):g} ({other['source']})"


def agreement(found):
    """How well gas minus condensed phase of each source meets the step as measured: for the defaults."""
    for step, (lower, upper, name) in list(STEPS.items())[:2]:
        apart = collections.defaultdict(list)
        for phases in found.values():
            if phases[step]:
                middle = statistics.median(value(r) for r in phases[step])
                for low, high in pairs(phases, lower, upper):
                    if low["source"] == high["source"]:
                        apart[low["source"]].append(abs(value(high) - value(low) - middle))
        for source, d in sorted(apart.items()):
            d.sort()
            print(f"{name}, {source}: {len(d)} pairs, half within {statistics.median(d):.2f}, 68 % within "
                  f"{d[int(0.68 * (len(d) - 1))]:.2f} kJ/mol, {sum(x > APART_KJ for x in d)} above {APART_KJ}", file=sys.stderr)


def main():
    parser = argparse.ArgumentParser(description=__doc__.split("\n\n", maxsplit=1)[0])
    parser.add_argument("--all", action="store_true", help="print the contradictions that are settled or listed as well")
    everything = parser.parse_args().all
    found = by_phase(st.read_csv("measurements.csv"))
    listed = {(r["smiles"], r["step"]) for r in st.read_csv("contradictions.csv")}
    seen, new = set(), 0
    for smiles, step, rows, what in contradictions(found):
        seen.add((smiles, step))
        settled = any(r["use"].startswith(EXCLUDED) for r in rows)
        new += not settled and (smiles, step) not in listed
        verdict = "settled" if settled else "listed" if (smiles, step) in listed else "LOOK"
        if everything or verdict == "LOOK":
            print(f"{verdict} | {step} | {rows[0]['name']} | {smiles} | {what} | {'; '.join(others(found[smiles], rows))}")
    stale = listed - seen
    for smiles, step in sorted(stale):
        print(f"contradictions.csv: {smiles} ({step}) is not a contradiction any more; delete the line")
    print(f"{len(seen)} contradictions, {new} to look at", file=sys.stderr)
    agreement(found)
    return 1 if new or stale else 0


if __name__ == "__main__":
    sys.exit(main())

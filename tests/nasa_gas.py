"""Writes reference/gas_thermal.csv: entropies, heat capacities and their integrals from NASA's polynomials.

The polynomials (McBride, Gordon and Reno, NASA TM-4513, 1993) come with the PyPI package cantera. The report is no source of the fit; many of its
values rest on the same spectra.
"""

import csv
from importlib.metadata import version
from pathlib import Path

import cantera

SMILES = {
    "CH3OH": "CO", "CH3CN": "CC#N", "C2H2,acetylene": "C#C", "CH2CO,ketene": "C=C=O", "C2H4": "C=C",
    "C2H4O,ethylen": "C1CO1", "CH3CHO,ethanal": "CC=O", "CH3COOH": "CC(=O)O", "C2H6": "CC", "CH3N2CH3": "CN=NC",
    "CH3OCH3": "COC", "C2H5OH": "CCO", "C3H4,allene": "C=C=C", "C3H4,propyne": "CC#C", "C3H4,cyclo-": "C1=CC1",
    "C3H6,propylene": "CC=C", "C3H6,cyclo-": "C1CC1", "C3H6O": "CC1CO1", "C3H8": "CCC", "C3H8O,1propanol": "CCCO",
    "C3H8O,2propanol": "CC(C)O", "C4H4,1,3-cyclo-": "C1=CC=C1", "C4H6,butadiene": "C=CC=C", "C4H6,2-butyne": "CC#CC",
    "C4H6,cyclo-": "C1=CCC1", "C4H8,1-butene": "CCC=C", "C4H8,cis2-buten": "C/C=C\\C", "C4H8,tr2-butene": "C/C=C/C",
    "C4H8,isobutene": "CC(C)=C", "C4H8,cyclo-": "C1CCC1", "C4H10,isobutane": "CC(C)C", "C4H10,n-butane": "CCCC",
    "C5H6,1,3cyclo-": "C1C=CC=C1", "C5H8,cyclo-": "C1CCC=C1", "C5H10,1-pentene": "CCCC=C", "C5H10,cyclo-": "C1CCCC1",
    "C5H12,n-pentane": "CCCCC", "C5H12,i-pentane": "CCC(C)C", "CH3C(CH3)2CH3": "CC(C)(C)C", "C6H6": "c1ccccc1",
    "C6H5OH,phenol": "Oc1ccccc1", "C6H10,cyclo-": "C1CCCC=C1", "C6H12,1-hexene": "CCCCC=C", "C6H12,cyclo-": "C1CCCCC1",
    "C7H8": "Cc1ccccc1", "C7H16,n-heptane": "CCCCCCC", "C8H8,styrene": "C=Cc1ccccc1", "C8H10,ethylbenz": "CCc1ccccc1",
    "C8H18,isooctane": "CC(C)CC(C)(C)C", "C8H18,n-octane": "CCCCCCCC", "C10H8,naphthale": "c1ccc2ccccc2c1",
    "C12H10,bipheny": "c1ccc(cc1)c1ccccc1", "CH4": "C", "CHCL3": "C(Cl)(Cl)Cl", "CH2CL2": "C(Cl)Cl", "CH3CL": "CCl",
    "CHF3": "C(F)(F)F", "C2F4": "FC(F)=C(F)F", "C2CL4": "ClC(Cl)=C(Cl)Cl", "C2CL6": "ClC(Cl)(Cl)C(Cl)(Cl)Cl",
}
TEMPERATURES = (298.15, 400.0, 500.0, 600.0, 800.0)
KMOL = 1000.0

OUT = Path(__file__).parent / "reference" / "gas_thermal.csv"


def main():
    species = {s.name: s for s in cantera.Species.list_from_file("nasa_gas.yaml")}
    with OUT.open("w", newline="") as file:
        out = csv.writer(file, lineterminator="\n")
        out.writerow(["name", "smiles", "s_298", "cp_298", "cp_400", "cp_500", "cp_600", "cp_800", "h_600_less_h_298", "s_600_less_s_298"])
        for name, smiles in sorted(SMILES.items()):
            thermo = species[name].thermo
            s = [thermo.s(t) / KMOL for t in (298.15, 600.0)]
            h = [thermo.h(t) / KMOL / 1000.0 for t in (298.15, 600.0)]
            cp = [thermo.cp(t) / KMOL for t in TEMPERATURES]
            numbers = [s[0], *cp, h[1] - h[0], s[1] - s[0]]
            out.writerow([name, smiles, *(f"{x:.2f}" for x in numbers)])
    print(f"{len(SMILES)} molecules, cantera {version('cantera')}")


if __name__ == "__main__":
    main()

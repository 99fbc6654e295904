"""Structures of the measured molecules: where a SMILES comes from and when two rows mean one molecule."""

import csv
import re
from pathlib import Path

from chemicals.identifiers import search_chemical
from rdkit import Chem, RDLogger
from rdkit.Chem.rdMolDescriptors import CalcMolFormula

RDLogger.DisableLog("rdApp.*")

HERE = Path(__file__).resolve().parent
TOKEN = re.compile(r"([A-Z][a-z]?|\(|\))(\d*)")
ELEMENTS = frozenset("H B C N O F Si P S Cl Br I".split())


def read_csv(name):
    with open(HERE / name, newline="", encoding="utf-8") as handle:
        return list(csv.DictReader(handle))


def _by_cas_or_name(rows):
    return {row["cas"] or row["name"]: row for row in rows}


OVERRIDES = _by_cas_or_name(read_csv("structure_overrides.csv"))
FROM_NAMES = {row["name"]: row["smiles"] for row in read_csv("structures_from_names.csv")}
EXCLUSIONS = read_csv("exclusions.csv")


def override_for(cas, name):
    """The structure settled by hand, by name first: two names may share one CAS number in the sources."""
    for key in (name, cas):
        if key and key in OVERRIDES:
            return OVERRIDES[key]["smiles"]
    return None


def exclusion_for(cas, name, phase, source=""):
    """The stated reason why a row is not fitted, or None.

    A blank phase or source in the table means every one; a line without a CAS number is for its name alone.
    """
    for row in EXCLUSIONS:
        named = row["cas"] == cas if row["cas"] else row["name"] == name
        if named and row["phase"] in ("", phase) and row["source"] in ("", source):
            return row["use"]
    return None


def identify(cas, name):
    """SMILES for a CAS number: settled by hand, else from `chemicals.identifiers`; None when neither knows it.

    The identifiers answer some numbers with a relative (a racemate's number with the racemate's, but also an ion's
    with the molecule's): such an answer counts only when the name means the same molecule.
    """
    settled = override_for(cas, name)
    if settled:
        return settled
    try:
        found = search_chemical(cas)
    except ValueError:
        return None
    if found.CASs == cas or agrees_with_name(name, found.smiles):
        return found.smiles
    return None


def identify_by_both(cas, name):
    """(SMILES, finding) from number and name together; the name alone serves where the identifiers lack the number.

    The finding says what speaks against the structure: that number and name mean different molecules or isomers. Of
    the two the more explicit stands, so that a geometry that only one of them states is kept.
    """
    settled = override_for(cas, name)
    by_number, by_name = identify(cas, name), FROM_NAMES.get(name)
    if settled or not by_name or parse(by_number) is None:
        return settled or by_number or by_name, ""
    if molecule_key(by_number) == by_name:
        return by_number, ""
    if flat(by_number) != flat(by_name):
        return by_number, f"the name means {by_name}"
    if flat(by_name) == by_name:
        return by_number, ""
    if flat(by_number) == molecule_key(by_number):
        return by_name, ""
    return by_number, f"the name means {by_name}"


def agrees_with_name(name, smiles):
    """Whether the rules of nomenclature read the same molecule out of the name."""
    read = FROM_NAMES.get(name)
    return read is not None and parse(smiles) is not None and molecule_key(smiles) == read


def parse(smiles):
    return Chem.MolFromSmiles(smiles) if smiles else None


def flat(smiles):
    """Canonical SMILES without stereochemistry."""
    return Chem.MolToSmiles(parse(smiles), isomericSmiles=False)


def elements(mol):
    return {atom.GetSymbol() for atom in Chem.AddHs(mol).GetAtoms()}


def isotopes(mol):
    return any(atom.GetIsotope() for atom in mol.GetAtoms())


def has_radical(mol):
    return any(atom.GetNumRadicalElectrons() for atom in mol.GetAtoms())


def is_molecule(mol):
    """Neutral, closed shell, one component, of the elements that the additivity knows."""
    return (
        mol is not None
        and Chem.GetFormalCharge(mol) == 0
        and len(Chem.GetMolFrags(mol)) == 1
        and not has_radical(mol)
        and elements(mol) <= ELEMENTS
    )


def _mirror(mol):
    image = Chem.Mol(mol)
    for atom in image.GetAtoms():
        atom.InvertChirality()
    return Chem.MolToSmiles(Chem.MolFromSmiles(Chem.MolToSmiles(image)))


def molecule_key(smiles):
    """Canonical SMILES that is the same for both enantiomers, since they have the same enthalpy of formation.

    A lone stereocentre has no diastereomer and is dropped; with several, the smaller spelling of the molecule
    and its mirror image stands for both. Double-bond geometry and diastereomers stay apart.
    """
    mol = Chem.MolFromSmiles(smiles)
    centres = Chem.FindMolChiralCenters(mol, includeUnassigned=True, useLegacyImplementation=False)
    if len(centres) == 1:
        mol.GetAtomWithIdx(centres[0][0]).SetChiralTag(Chem.ChiralType.CHI_UNSPECIFIED)
        mol = Chem.MolFromSmiles(Chem.MolToSmiles(mol))
    return min(Chem.MolToSmiles(mol), _mirror(mol))


def molecular_formula(mol):
    return CalcMolFormula(mol)


def formula_counts(text):
    """Element counts of a condensed formula such as `CH3CH(CH3)CH3 (g)` or `(CClH2)2 (g)`."""
    body = re.sub(r"\s*\((g|l|cr|s)\)$", "", text)
    stack = [{}]
    pos = 0
    while pos < len(body):
        match = TOKEN.match(body, pos)
        if not match:
            return None
        token, count = match.group(1), int(match.group(2) or 1)
        if token == "(":
            stack.append({})
        elif token == ")":
            if len(stack) == 1:
                return None
            for element, inner in stack.pop().items():
                stack[-1][element] = stack[-1].get(element, 0) + inner * count
        else:
            stack[-1][token] = stack[-1].get(token, 0) + count
        pos = match.end()
    return stack[0] if len(stack) == 1 else None


def counts_of(mol):
    counts = {}
    for atom in Chem.AddHs(mol).GetAtoms():
        counts[atom.GetSymbol()] = counts.get(atom.GetSymbol(), 0) + 1
    return counts

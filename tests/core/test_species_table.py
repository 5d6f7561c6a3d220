"""The species: every one identified, no name with two meanings, formulas with the molar masses that handbooks print."""
from __future__ import annotations

import re

import pytest

from gasbasis import facts
from gasbasis.facts.check import cas_is_right

SPECIES = {row.id: row for row in facts.species()}
FORMULA = re.compile(r"(?:[A-Z][a-z]?\d*|\([A-Z][A-Za-z0-9]*\)\d*)+")
ATOM = re.compile(r"([A-Z][a-z]?)(\d*)")


def spelt(row) -> set[str]:
    return {row.id, row.name, *row.names}


def meant(text: str) -> str | None:
    """The species a typed text names: cautious names as written, all others in any case."""
    cautious = facts.cautious_names()
    for row in SPECIES.values():
        if text in spelt(row) or any(text.casefold() == name.casefold() for name in spelt(row) - cautious):
            if not (text not in spelt(row) and text in cautious):
                return row.id
    return None


def molar_mass(formula: str) -> float:
    """The molar mass in g/mol, brackets multiplied out by this test's own reader."""
    flat = re.sub(r"\(([^)]*)\)(\d*)", lambda found: found.group(1) * int(found.group(2) or 1), formula)
    return sum(float(facts.atomic_weight(element).text) * int(number or 1) for element, number in ATOM.findall(flat))


@pytest.mark.parametrize("text, id", [    # issue list of the first sheets
    ("Hg", "Hg"), ("SO2", "SO2"), ("NO", "NO"), ("NO2", "NO2"), ("NOx", "NOx"), ("N2O", "N2O"), ("CO", "CO"), ("CO2", "CO2"), ("O2", "O2"),
    ("H2O", "H2O"), ("H2S", "H2S"), ("HCl", "HCl"), ("HF", "HF"), ("NH3", "NH3"), ("CH4", "CH4"), ("C3H8", "C3H8"), ("benzene", "benzene"),
    ("toluene", "toluene"), ("formaldehyde", "formaldehyde"), ("TOC", "TOC"),
    # the trade's other names and abbreviations
    ("mercury vapour", "Hg"), ("sulphur dioxide", "SO2"), ("nox", "NOx"), ("methane", "CH4"), ("Propane", "C3H8"), ("HCHO", "formaldehyde"),
    ("VOC", "TOC"), ("methyl mercaptan", "methanethiol"), ("THT", "tetrahydrothiophene"), ("COS", "COS"), ("OCS", "COS"), ("MEK", "butanone"),
    ("mercuric chloride", "HgCl2"), ("nickel carbonyl", "Ni(CO)4"), ("R134a", "R-134a"), ("R-22", "R-22"), ("butadiene", "1,3-butadiene"),
    ("IPA", "2-propanol"), ("VCM", "vinyl chloride"), ("ethylene oxide", "ethylene oxide"), ("isopropanol", "2-propanol"), ("PM10", "PM10"),
    ("dioxins", "TEQ"), ("odor", "odour"), ("TRS", "total reduced sulphur"), ("total sulfur", "total sulphur"), ("BaP", "benzo[a]pyrene"),
    # the same letters, another meaning
    ("co", "CO"), ("Co", "Co"), ("no", None), ("as", None), ("As", "As"), ("in", None), ("be", None), ("Be", "Be"), ("v", None), ("c", None),
    ("he", None), ("He", "He"), ("si", None), ("te", None),
])
def test_what_people_type_means_one_species(text, id):
    assert meant(text) == id


def test_there_are_enough_species_and_every_family():
    assert len(SPECIES) >= 150
    wanted = {"SO3", "HBr", "HI", "HCN", "Cl2", "Br2", "ClO2", "COCl2", "CS2", "ethanethiol", "tert-butanethiol", "thiophene", "dimethyl sulfide",
              "HgCl2", "Hg2Cl2", "As", "Cd", "Pb", "Se", "Ni(CO)4", "ethylbenzene", "xylene", "styrene", "acetaldehyde", "acrolein", "acetone",
              "methanol", "ethyl acetate", "dichloromethane", "trichloroethene", "tetrachloroethene", "R-12", "R-32", "AsH3", "PH3", "SiH4",
              "GeH4", "B2H6", "H2Se", "SbH3", "C2H6", "n-butane", "isobutane", "n-hexane", "n-dodecane", "C2H4", "propene", "C2H2", "SF6", "NF3",
              "CF4", "methyl isocyanate", "2,4-TDI", "MDI", "HDI", "O3", "He", "Ne", "Ar", "Kr", "Xe", "H2", "N2", "D4", "D5", "naphthalene",
              "methylamine", "triethylamine", "acrylonitrile", "vinyl chloride", "dust", "PM2.5", "TEQ", "odour", "NMHC"}
    assert wanted - set(SPECIES) == set()


@pytest.mark.parametrize("row", [row for row in SPECIES.values() if row.cas], ids=lambda row: row.id)
def test_cas_number_carries_its_check_digit(row):
    assert cas_is_right(row.cas)


@pytest.mark.parametrize("cas, right", [    # 7732-18-5 (water) is the registry's own worked example of the check digit
    ("7732-18-5", True), ("7732-18-4", False), ("7723-18-5", False), ("7732185", False), ("", False), ("1-18-5", False)])
def test_the_check_digit_is_told_right_from_wrong(cas, right):
    assert cas_is_right(cas) is right


def test_no_cas_number_is_given_twice():
    numbers = [row.cas for row in SPECIES.values() if row.cas]
    assert len(numbers) == len(set(numbers))


def test_no_name_belongs_to_two_species():
    owner, cautious = {}, facts.cautious_names()
    clashes = [(name, owner[key], row.id) for row in SPECIES.values() for name in spelt(row)
               for key in [name if name in cautious else name.casefold()] if owner.setdefault(key, row.id) != row.id]
    assert clashes == []


def test_a_formula_given_as_a_name_is_the_formula_of_its_species():
    """A formula typed by its letters must not lead to a species of another composition."""
    wrong = [(row.id, name) for row in SPECIES.values() if row.formula for name in spelt(row)
             if re.fullmatch(r"(?:[A-Z][a-z]?\d*){2,}", name) and re.search(r"\d", name) and not name.startswith(("R", "D", "TC"))
             and {element for element, _ in ATOM.findall(name)} <= set(facts.atomic_weights())
             and abs(molar_mass(name) - molar_mass(row.formula)) > 1e-9]
    assert wrong == []


@pytest.mark.parametrize("row", [row for row in SPECIES.values() if row.formula], ids=lambda row: row.id)
def test_formula_can_be_read_and_weighed(row):
    assert FORMULA.fullmatch(row.formula)
    assert molar_mass(row.formula) > 1


# Molar masses in g/mol as workplace handbooks print them (recalled, NIOSH Pocket Guide style: one decimal).
HANDBOOK = """acetaldehyde 44.1|acetone 58.1|acrolein 56.1|acrylonitrile 53.1|NH3 17.0|aniline 93.1|AsH3 78.0|benzene 78.1|Br2 159.8|1,3-butadiene 54.1
CS2 76.1|carbon tetrachloride 153.8|Cl2 70.9|chloroform 119.4|B2H6 27.7|1,4-dioxane 88.1|epichlorohydrin 92.5|ethylene oxide 44.1|formaldehyde 30.0
N2H4 32.1|HCN 27.0|HDI 168.2|MDI 250.3|methyl isocyanate 57.1|naphthalene 128.2|Ni(CO)4 170.7|COCl2 98.9|PH3 34.0|SF6 146.1|SbH3 124.8|styrene 104.2
2,4-TDI 174.2|tetrahydrofuran 72.1|vinyl chloride 62.5|methyl methacrylate 100.1|NF3 71.0|GeH4 76.6|SiH4 32.1|H2Se 81.0|tetraethyllead 323.5|OsO4 254.2
dichloromethane 84.9|trichloroethene 131.4|tetrachloroethene 165.8|1,1,1-trichloroethane 133.4|R-12 120.9|R-11 137.4|R-113 187.4|n-hexane 86.2|toluene 92.1
xylene 106.2|phenol 94.1|cresol 108.2|methanol 32.1|2-propanol 60.1|butanone 72.1|methyl isobutyl ketone 100.2|cyclohexanone 98.2|methanethiol 48.1
ethanethiol 62.1|1-butanethiol 90.2|pyridine 79.1|triethylamine 101.2|dimethylformamide 73.1|nitrobenzene 123.1|chlorobenzene 112.6|bromomethane 95.0
iodomethane 141.9|HgCl2 271.5|Fe(CO)5 195.9|V2O5 181.9|ClF3 92.5|SO2F2 102.1|O3 48.0|HBr 80.9|HI 127.9|HNO3 63.0|H2SO4 98.1|H3PO4 98.0|maleic anhydride 98.1
phthalic anhydride 148.1|furfural 96.1|acetonitrile 41.1|ketene 42.0|2-butoxyethanol 118.2|TEOS 208.3|n-octane 114.2|cyclohexane 84.2|biphenyl 154.2""".replace("\n", "|")
PRINTED = [tuple(entry.rsplit(" ", 1)) for entry in HANDBOOK.split("|")]


@pytest.mark.parametrize("id, printed", PRINTED, ids=[id for id, _ in PRINTED])
def test_molar_mass_is_the_handbook_s(id, printed):
    """One unit of the printed digit: older prints rest on older atomic weights."""
    assert molar_mass(SPECIES[id].formula) == pytest.approx(float(printed), abs=0.1)


def test_molar_masses_agree_with_the_natural_gas_standard_within_the_spread_of_the_atomic_weights():
    """ISO 6976:2016 rests on other atomic weights than the abridged ones; they must agree within the uncertainties these carry."""
    for row in facts.table("iso6976_2016")["components"]:
        formula = SPECIES[row["species"]].formula
        spread = sum(float(facts.atomic_weight(element).uncertainty) * int(number or 1) for element, number in ATOM.findall(formula))
        assert molar_mass(formula) == pytest.approx(float(row["molar_mass"]), abs=spread), row["species"]


@pytest.mark.parametrize("id, usual", [("NOx", "NO2"), ("SOx", "SO2"), ("TOC", "C"), ("NMHC", "C"), ("total sulphur", "S"),
                                        ("total reduced sulphur", "H2S"), ("oxidised mercury", "Hg"), ("Cr(VI)", "Cr")])
def test_sums_need_to_be_reported_as_something(id, usual):
    row = SPECIES[id]
    assert row.needs_reported_as and row.formula is None
    assert (row.usual_reported_as, row.reported_as[0]) == (usual, usual)


@pytest.mark.parametrize("id", ["dust", "PM10", "PM2.5", "TEQ", "odour", "PAH", "metals", "respirable dust"])
def test_quantities_without_molar_mass_have_no_formula(id):
    row = SPECIES[id]
    assert row.formula is None and row.cas is None and not row.needs_reported_as

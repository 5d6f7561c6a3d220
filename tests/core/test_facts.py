"""The tables of facts: complete, sourced, and equal to what independent sources print."""
from __future__ import annotations

import copy
import dataclasses
import json
import math
from decimal import Decimal
from pathlib import Path

import pytest

from gasbasis import facts
from gasbasis.errors import FactsError
from gasbasis.facts import check

TABLES = Path(__file__).resolve().parents[2] / "pycore" / "gasbasis" / "facts" / "tables"
GAS_CONSTANT = 1.380649e-23 * 6.02214076e23    # k N_A, both exact in the SI (SI Brochure, 9th edition, 2.2)

# --- what is refused, with a row that is whole but for one thing ---

SOURCE = {"id": "a-book", "title": "A book", "edition": "1", "read": "secondary"}
ROWS = {
    "constant": {"id": "c", "kind": "molar_mass", "text": "28.96", "unit": "g/mol", "source": "a-book", "locator": "p. 1", "read": "secondary"},
    "atomic_weight": {"id": "C", "text": "12.011", "unit": "1", "uncertainty": "0.002", "source": "a-book", "locator": "p. 1", "read": "secondary"},
    "species": {"id": "CO2", "name": "carbon dioxide", "formula": "CO2", "cas": "124-38-9", "names": [], "family": "f", "source": "a-book",
                "locator": "p. 1", "read": "secondary"},
    "reference_conditions": {"id": "r", "name": "R", "words": ["normal"], "temperature": ["0", "degC"], "pressure": ["1", "atm"], "region": "x",
                             "source": "a-book", "locator": "p. 1", "read": "memory"},
    "rule_book": {"id": "b", "title": "B", "edition": "1", "clause": "1", "source": "a-book", "read": "memory", "owe": "mg/m3", "words": [],
                  "ambient_oxygen": ["21", "%"], "conventions": {"molar_volume": ["24.45", "L/mol"]},
                  "usual": {"conditions": "r", "ambient_oxygen": "21"}, "note": "n"},
}


def checked(collection=None, changes=None, more=None, tables=None, sources=None):
    """Check the whole rows above with some fields of one collection's row changed (None takes a field away)."""
    rows = copy.deepcopy(ROWS)
    for field, value in (changes or {}).items():
        if value is None:
            del rows[collection][field]
        else:
            rows[collection][field] = value
    collections = {name: [] for name in check.FIELDS}
    collections["source"] = [check.complete("source", row, {}) for row in (sources or [SOURCE])]
    for name, row in rows.items():
        collections[name].append(check.complete(name, row, {}))
    for name, row in more or []:
        collections[name].append(check.complete(name, {**rows[name], **row}, {}))
    check.check(collections, tables or {}, ())


def test_whole_rows_pass():
    checked()


@pytest.mark.parametrize("collection, changes, names", [
    ("constant", {"source": None}, "constant c: 'source'"),
    ("constant", {"locator": None}, "constant c: 'locator'"),
    ("constant", {"locator": ""}, "constant c: 'locator'"),
    ("constant", {"read": None}, "constant c: 'read'"),
    ("species", {"source": None}, "species CO2: 'source'"),
    ("reference_conditions", {"locator": None}, "reference_conditions r: 'locator'"),
    ("rule_book", {"clause": None}, "rule_book b: 'clause'"),
    ("constant", {"source": "no-book"}, "constant c: there is no source 'no-book'"),
    ("constant", {"read": "guessed"}, "'guessed' is no way of reading"),
    ("constant", {"read": "primary"}, "constant c: read as 'primary', but its source was read as 'secondary'"),
    ("constant", {"unit": "kPa"}, "'kPa' is no unit of molar_mass"),
    ("constant", {"kind": "smell"}, "the kind 'smell' is not known"),
    ("constant", {"text": "28,96"}, "'28,96' is not a number"),
    ("constant", {"text": 28.96}, "is not a number as text"),
    ("constant", {"uncertainty": "small"}, "'small' is not a number"),
    ("constant", {"colour": "red"}, "the field 'colour' is not known"),
    ("atomic_weight", {"unit": "g/mol"}, "'g/mol' is no unit of atomic_weight"),
    ("species", {"cas": "124-38-8"}, "check digit of the CAS number 124-38-8"),
    ("species", {"needs_reported_as": True}, "a species with a formula needs no 'reported as'"),
    ("species", {"reported_as": ["C"]}, "only where it needs it"),
    ("reference_conditions", {"temperature": ["0", "kPa"]}, "'kPa' is no unit of temperature"),
    ("reference_conditions", {"pressure": ["1", "degC"]}, "'degC' is no unit of pressure"),
    ("reference_conditions", {"pressure": ["1"]}, "needs text and unit"),
    ("reference_conditions", {"words": ["usual"]}, "the word 'usual' is not known"),
    ("reference_conditions", {"water": "wet"}, "water is 'dry' or not said"),
    ("rule_book", {"ambient_oxygen": ["0.21", "1"]}, "'1' is no unit of percent"),
    ("rule_book", {"conventions": {"molar_volume": ["24.45", "g/mol"]}}, "'g/mol' is no unit of molar_volume"),
    ("rule_book", {"conventions": {"luck": ["1", "1"]}}, "the convention 'luck' is not known"),
    ("rule_book", {"usual": {"conditions": "q", "ambient_oxygen": "21"}}, "no reference conditions 'q'"),
    ("rule_book", {"usual": {"conditions": "r", "ambient_oxygen": "20.9"}}, "is not its own ambient oxygen"),
])
def test_a_row_that_is_not_whole_is_refused_by_name(collection, changes, names):
    with pytest.raises(FactsError) as refused:
        checked(collection, changes)
    assert names in refused.value.message


@pytest.mark.parametrize("more, names", [
    ([("constant", {})], "constant c: the id is given twice"),
    ([("species", {"id": "dry ice", "names": ["Carbon Dioxide"]})], "belongs to two species: CO2 and dry ice"),
    ([("species", {"id": "sum", "name": "sum", "formula": None, "cas": None, "needs_reported_as": True, "usual_reported_as": "Xx",
                   "reported_as": ["Xx"]})], "is reported as 'Xx'"),
    ([("species", {"id": "sum", "name": "sum", "formula": None, "cas": None, "needs_reported_as": True})], "lists what it is reported as"),
])
def test_rows_that_contradict_each_other_are_refused(more, names):
    with pytest.raises(FactsError) as refused:
        checked(more=more)
    assert names in refused.value.message


def test_a_source_that_nobody_cites_is_refused():
    with pytest.raises(FactsError, match="Nobody cites the source 'dusty'"):
        checked(sources=[SOURCE, {**SOURCE, "id": "dusty"}])


@pytest.mark.parametrize("content, names", [
    ({"a": "1"}, "table t: 'source' is missing"),
    ({"source": "a-book", "read": "memory"}, "'locator' is missing"),
    ({"equations": [{"id": "e", "source": "a-book", "locator": "1"}]}, "table t e: 'read' is missing"),
    ({"source": "no-book", "locator": "1", "read": "memory"}, "no source 'no-book'"),
])
def test_a_coefficient_table_without_source_is_refused(content, names):
    with pytest.raises(FactsError) as refused:
        checked(tables={"t": content})
    assert names in refused.value.message


@pytest.mark.native    # the page's library has no TOML reader: the tables are compiled at build time
@pytest.mark.parametrize("files, names", [
    ({"a.toml": "[table.t]\nsource='s'", "b.toml": "[table.t]\nsource='s'"}, "table t: the id is given twice"),
    ({"a.toml": "[[smells]]\nid='a'"}, "'smells' is no table we know"),
])
def test_files_that_contradict_each_other_are_refused(files, names, tmp_path):
    from making.compile_facts import read_tables
    for name, text in files.items():
        (tmp_path / name).write_text(text)
    with pytest.raises(FactsError) as refused:
        read_tables(tmp_path)
    assert names in refused.value.message


@pytest.mark.native
def test_the_compiled_tables_are_those_of_the_sources_and_the_same_every_time():
    from making.compile_facts import PACKAGE, cited_in_code, compiled
    cited = cited_in_code(PACKAGE)
    once = compiled(TABLES, cited)
    assert once == compiled(TABLES, cited)
    stored = json.loads(once)
    assert [row[0] for row in stored["constant"]["rows"]] == list(facts.constants())
    assert [row[0] for row in stored["species"]["rows"]] == [row.id for row in facts.species()]


def test_what_is_not_in_the_tables_is_said():
    for ask in (facts.source, facts.constant, facts.atomic_weight, facts.table):
        with pytest.raises(FactsError, match="no-such-thing"):
            ask("no-such-thing")


def test_records_cannot_be_changed():
    with pytest.raises(dataclasses.FrozenInstanceError):
        facts.constant("molar_gas_constant").text = "8.3"
    with pytest.raises(TypeError):
        facts.atomic_weights()["H"] = None
    with pytest.raises(TypeError):
        facts.table("water_saturation")["equations"][0]["Tc"] = "1"


# --- what the tables print, against independent sources ---

def test_gas_constant_is_the_product_of_the_defining_constants():
    assert facts.constant("molar_gas_constant").number == Decimal("1.380649e-23") * Decimal("6.02214076e23")


@pytest.mark.parametrize("symbol, printed", [    # IUPAC 2021, abridged, as recalled apart from the transcription: checks list B15
    ("H", "1.0080"), ("C", "12.011"), ("N", "14.007"), ("O", "15.999"), ("F", "18.998"), ("P", "30.974"), ("S", "32.06"),
    ("Cl", "35.45"), ("As", "74.922"), ("Se", "78.971"), ("Br", "79.904"), ("Sb", "121.76"), ("Hg", "200.59"), ("Ar", "39.95")])
def test_atomic_weight(symbol, printed):
    assert facts.atomic_weight(symbol).text == printed


def test_every_element_with_a_standard_atomic_weight_is_there():
    """84 elements have one: the 80 with a stable isotope, bismuth, thorium, protactinium and uranium (IUPAC 2021)."""
    assert len(facts.atomic_weights()) == 84
    weights = [float(datum.number) for datum in facts.atomic_weights().values()]
    falls = [(a, b) for a, b in zip(weights, weights[1:]) if a > b]
    assert len(falls) == 4    # argon-potassium, cobalt-nickel, tellurium-iodine, thorium-protactinium: the known inversions


def test_student_t_agrees_with_an_independent_library():
    stats = pytest.importorskip("scipy.stats")
    for freedom, t in facts.student_t().items():
        digits = len(facts.table("student_t")["t"][str(freedom)].partition(".")[2])
        assert round(float(stats.t.ppf(0.5 + 0.9545 / 2, freedom)), digits) == pytest.approx(t, abs=1e-12)


def test_ambient_oxygens():
    assert [datum.text for datum in facts.ambient_oxygens()] == ["20.9", "20.95", "21"]


# T, p of group A of the checks list give these molar volumes in L/mol, worked out there by other code; its last digit may be cut.
MOLAR_VOLUMES = [
    ("A1", "us_stack_si", "24.0487"), ("A1", "us_stack_customary", "24.0561"), ("A2", "us_ambient", "24.4654"), ("A3", "illinois_ambient", "24.4654"),
    ("A4", "us_ghg_68f", "24.0551"), ("A4", "us_ghg_60f", "23.705"), ("A5", "us_engine", "24.061"), ("A6", "us_hazardous_waste_vents", "24.0551"),
    ("A7", "us_workplace", "24.4654"), ("A8", "us_badge_rate", "24.132"), ("A9", "eu_workplace", "24.0611"), ("A10", "eu_ambient", "24.0487"),
    ("A11", "eu_stack", "22.4195"), ("A12", "china_ambient", "24.4654"), ("A12", "china_ambient_old", "22.4017"), ("A13", "china_stack", "22.4140"),
    ("A14", "canada_stack", "24.4714"), ("A15", "nsw_ambient", "22.4140"), ("A16", "india_stack", "24.4654"), ("A17", "iso_natural_gas", "23.6448"),
    ("A18", "us_gas_federal", "23.6357"), ("A19", "us_gas_oklahoma", "23.7647"), ("A20", "us_gas_api", "23.6903"), ("A21", "din_1343", "22.4140"),
    ("A22", "gost_2939", "24.0551"), ("A23", "iupac_stp", "22.7110"), ("A24", "iupac_stp_old", "22.4140"), ("A25", "iso_8778", "24.3739"),
    ("A26", "iso_1217", "24.3739"), ("A27", "semi_e12", "22.4140"), ("A28", "iso_2533", "23.6448"), ("A29", "japan_stack", "22.4140"),
    ("A30", "iso_6978", "22.4140"), ("A31", "iso_6976_0c", "22.4140"), ("A31", "iso_6976_15c", "23.6448"), ("A31", "iso_6976_20c", "24.0551"),
]
KELVIN = {"K": lambda t: t, "degC": lambda t: t + 273.15, "degF": lambda t: (t + 459.67) * 5 / 9, "degR": lambda t: t * 5 / 9}
PASCAL = {"kPa": 1e3, "hPa": 1e2, "atm": 101325, "mmHg": 101325 / 760, "torr": 101325 / 760, "inHg": 25.4 * 101325 / 760, "psi": 6894.757}


@pytest.mark.parametrize("row, id, volume", MOLAR_VOLUMES, ids=[f"{row}-{id}" for row, id, _ in MOLAR_VOLUMES])
def test_reference_conditions(row, id, volume):
    conditions = {entry.id: entry for entry in facts.reference_conditions()}[id]
    temperature = KELVIN[conditions.temperature.unit](float(conditions.temperature.text))
    pressure = float(conditions.pressure.text) * PASCAL[conditions.pressure.unit]
    last_digit = 10 ** -len(volume.partition(".")[2])
    assert GAS_CONSTANT * temperature / pressure * 1e3 == pytest.approx(float(volume), abs=last_digit)


def test_every_row_of_the_list_of_conditions_is_there():
    assert {row for row, _, _ in MOLAR_VOLUMES} == {f"A{number}" for number in range(1, 32)}


def test_wagner_pruss_and_the_ice_equation_have_the_coefficients_of_an_independent_library():
    iapws = pytest.importorskip("iapws")
    water, ice = facts.table("water_saturation")["equations"]
    library = iapws.IAPWS95._Pv
    assert [float(text) for text in water["a"]] == library["ao"]
    theta = 230 / float(ice["Tt"])
    ln = sum(float(a) * theta ** float(b) for a, b in zip(ice["a"], ice["b"])) / theta
    assert math.exp(ln) * float(ice["pt"]) == pytest.approx(8.94735, abs=5e-6)    # IAPWS R14-08(2011), check value at 230 K in Pa


def test_mercury_boils_where_its_vapour_pressure_says():
    """Huber et al. 2006 give the normal boiling point as 629.77 K; half its last digit is 1e-4 of the pressure."""
    _, huber = facts.table("mercury_vapour")["equations"]
    tau = 1 - 629.77 / float(huber["Tc"])
    ln = float(huber["Tc"]) / 629.77 * sum(float(a) * tau ** float(e) for a, e in zip(huber["a"], huber["e"]))
    assert math.exp(ln) * float(huber["pc"]) == pytest.approx(101325, rel=1e-4)


def test_the_older_mercury_equation_is_about_seven_per_cent_lower():
    """Atmos. Meas. Tech. 14, 2317 (2021) found results that rest on it 8 % low; D holds M, R and mmHg in Pa."""
    dumarey, _ = facts.table("mercury_vapour")["equations"]
    assert float(dumarey["D"]) == pytest.approx(200.59 * 133.322 / GAS_CONSTANT * 1000, rel=1e-4)
    gamma = float(dumarey["D"]) / 293.15 * 10 ** -(float(dumarey["A"]) + float(dumarey["B"]) / 293.15)
    assert gamma / 14.1 == pytest.approx(0.93, abs=0.01)    # 14.1 ng/mL at 20 degC by the other equation, as the literature prints it


def test_summation_factors_give_the_worked_example_of_the_standard():
    """ISO 6976:2016, Annex D.2, example 1 at 15 degC, as a transcription prints it."""
    table = facts.table("iso6976_2016")
    rows = {row["species"]: row for row in table["components"]}
    gas = {"CH4": 0.933212, "C2H6": 0.025656, "C3H8": 0.015368, "N2": 0.010350, "CO2": 0.015414}
    assert 1 - sum(x * float(rows[id]["s"]["15"]) for id, x in gas.items()) ** 2 == pytest.approx(0.99776224, abs=5e-9)
    assert sum(x * float(rows[id]["molar_mass"]) for id, x in gas.items()) == pytest.approx(17.3884301, abs=5e-8)


def test_detail_has_its_components_and_terms():
    """AGA Report No. 8 Part 1: 21 components, 58 terms."""
    table = facts.table("aga8_detail")
    known = {row.id for row in facts.species()}
    assert len(table["components"]) == 21 and len(table["terms"]) == 58
    assert [row["species"] for row in table["components"] if row["species"] not in known] == []
    assert [term["n"] for term in table["terms"]] == list(range(1, 59))
    assert all(1 <= i < j <= 21 for rows in table["binary"].values() for i, j, _ in rows)


def test_f_factor_coefficients_follow_from_combustion():
    """Volumes of CO2 and of dry gas per pound of carbon at 68 degF and 1 atm; air with 20.9 % oxygen (printed digits, the last may be cut)."""
    cubic_feet = GAS_CONSTANT * 293.15 / 101325 * 453.59237 / 0.3048 ** 3    # per pound-mole
    table = facts.table("f_factor_coefficients")
    assert float(table["Kcc"]) == pytest.approx(cubic_feet / 12.011 / 100, abs=0.0005)
    assert float(table["Kc"]) == pytest.approx(cubic_feet / 12.011 / 100 / 0.209, abs=0.01)
    assert float(table["Ks"]) == pytest.approx(cubic_feet / 32.06 / 100 / 0.209, abs=0.01)


@pytest.mark.parametrize("id, worked_out", [    # from the gas law, 1 atm and 20 degC; liquid water 0.9982 g/mL at 20 degC (handbook)
    ("method_4_volume_per_millilitre", 0.9982 / 18.015 * GAS_CONSTANT * 293.15 / 101325),
    ("method_4_volume_per_gram", GAS_CONSTANT * 293.15 / 101325 / 18.015),
    ("method_4_volume_per_gram_customary", GAS_CONSTANT * 293.15 / 101325 / 18.015 / 0.3048 ** 3),
    ("method_5_meter", 293 / 760), ("method_5_meter_customary", 528 / 29.92),
    ("method_2_pitot", math.sqrt(2 * 9.80665 * GAS_CONSTANT / (101325 / 760 * 1e-3))),
    ("part_98_molar_volume_68f", GAS_CONSTANT * 293.15 / 101325 * 1e3 / 0.3048 ** 3),
    ("part_98_molar_volume_60f", GAS_CONSTANT * 288.7056 / 101325 * 1e3 / 0.3048 ** 3),    # "14.7 psia" means 1 atm
])
def test_constants_of_the_methods_follow_from_the_gas_law(id, worked_out):
    """Their printed digits, the last of which may be cut or rest on an older molar mass."""
    printed = facts.constant(id).text
    assert float(printed) == pytest.approx(worked_out, abs=1.0 * 10 ** -len(printed.partition(".")[2]))


# --- what rests on memory ---

RESTS_ON_MEMORY = {
    "constant": {"iso_2533_gas_constant", "iso_2533_molar_mass", "iso_2533_acceleration", "iso_2533_gradient", "iso_2533_temperature",
                 "iso_2533_pressure", "method_4_volume_per_millilitre", "method_4_volume_per_millilitre_customary",
                 "method_4_volume_per_gram", "method_4_volume_per_gram_customary", "method_5_meter", "method_5_meter_customary",
                 "method_2_pitot", "method_2_pitot_customary", "part_98_molar_volume_60f", "density_of_water"},
    "ambient_oxygen": {"eu_21"},
    "species": {"C", "S", "SbH3", "xylene", "cresol"},
    "reference_conditions": {"us_stack_si", "us_stack_customary", "china_stack", "india_stack", "eu_ambient", "uk_workplace", "us_gas_api",
                             "din_1343", "gost_2939", "iso_6978", "iso_8778", "iso_1217", "semi_e12", "iso_2533"},
    "rule_book": {"eu_incineration", "eu_incineration_waste_oil", "us_hazardous_waste_7", "us_boiler_3", "us_turbine_15",
                  "us_mercury_utility", "china_thermal_power", "china_incineration", "japan_coal", "japan_gas", "japan_waste",
                  "india_incinerator", "eu_ambient_air", "uk_workplace_air", "gas_iso_mercury", "gas_normal", "gas_us_14696"},
    "table": {"aga8_ranges", "student_t", "f_factor_coefficients", "mercury_vapour dumarey", "f_factors municipal_waste", "liquid_densities water", "liquid_densities mercury"},
}
COEFFICIENT_TABLES = ("aga8_detail", "aga8_ranges", "cautious_names", "confidence_intervals", "f_factor_coefficients", "f_factors", "iso6976_2016", "liquid_densities",
                      "mercury_vapour", "sampling_acceptance", "student_t", "water_saturation")


@dataclasses.dataclass(frozen=True)
class Part:
    """A coefficient table, or a row of it that says for itself how it was read."""

    id: str
    read: str


def parts() -> list[Part]:
    found = []
    for name in COEFFICIENT_TABLES:
        content = facts.table(name)
        found += [Part(name, content["read"])] if "read" in content else []
        found += [Part(f"{name} {row['id']}", row["read"]) for row in (*content.get("equations", ()), *content.get("fuels", ())) if "read" in row]
    return found


@pytest.mark.native
def test_every_coefficient_table_is_looked_at():
    from making.compile_facts import read_tables
    assert sorted(read_tables(TABLES)[1]) == sorted(COEFFICIENT_TABLES)


def test_rows_that_rest_on_memory_are_known():
    """The list may shrink when a row is read in a document; a row is added to it knowingly or not at all."""
    rows = {"constant": facts.constants().values(), "atomic_weight": facts.atomic_weights().values(), "ambient_oxygen": facts.ambient_oxygens(),
            "species": facts.species(), "reference_conditions": facts.reference_conditions(), "rule_book": facts.rule_books(), "table": parts()}
    found = {name: {row.id for row in of_kind if row.read == "memory"} for name, of_kind in rows.items()}
    for name, ids in found.items():
        print(f"{name}: {len(ids)} of {len(rows[name])} rows rest on memory: {', '.join(sorted(ids)) or 'none'}")
    assert {name: ids for name, ids in found.items() if ids} == RESTS_ON_MEMORY

"""The rule-books: whole, readable as statements, with their own constants kept as printed."""
from __future__ import annotations

import pytest

from gasbasis import facts
from gasbasis.language.statement import read_statement

BOOKS = {book.id: book for book in facts.rule_books()}
CONDITIONS = {row.id: row for row in facts.reference_conditions()}
POUND_MOLE = 8.31446261815324 * 293.15 / 101325 / 0.3048 ** 3 * 453.59237    # ft3 a pound-mole takes at 68 degF and 1 atm


@pytest.mark.parametrize("book", BOOKS.values(), ids=lambda book: book.id)
def test_what_is_owed_is_understood_to_the_last_word(book):
    statement, problems = read_statement(book.owe, "owe")
    assert problems == () and statement.ambiguities == ()
    assert statement.unit is not None
    assert (statement.oxygen is not None) == ("O2" in book.owe)
    assert (statement.temperature is None) == (statement.pressure is None)


@pytest.mark.parametrize("book", [book for book in BOOKS.values() if "conditions" in book.usual and " at " in book.owe], ids=lambda book: book.id)
def test_the_conditions_a_rule_book_suggests_are_those_it_owes_at(book):
    statement, _ = read_statement(book.owe, "owe")
    row = CONDITIONS[book.usual["conditions"]]
    theirs, _ = read_statement(f"mg/m3 at {row.temperature.text} {row.temperature.unit}, {row.pressure.text} {row.pressure.unit}", "owe")
    assert statement.temperature.si == pytest.approx(theirs.temperature.si, abs=0.005)
    assert statement.pressure.si == pytest.approx(theirs.pressure.si, abs=0.5)


@pytest.mark.parametrize("book", BOOKS.values(), ids=lambda book: book.id)
def test_every_rule_book_says_to_check_and_where_it_was_read(book):
    assert "check the c" in book.note               # the current text, or the contract
    assert book.source in facts.sources() and book.edition and book.clause


@pytest.mark.parametrize("id, unit, oxygen, ambient", [
    # Directive 2010/75/EU Annex V Part 1 (read), Annex VI (recalled); ES = (21 - OS)/(21 - OM) EM
    ("eu_combustion_solid", "mg/m3", "6", "21"), ("eu_combustion_liquid_gas", "mg/m3", "3", "21"),
    ("eu_combustion_turbine_engine", "mg/m3", "15", "21"), ("eu_incineration", "mg/m3", "11", "21"),
    ("eu_incineration_waste_oil", "mg/m3", "3", "21"), ("de_large_engine", "mg/m3", "5", "21"),
    # 40 CFR 60.33b (read); 40 CFR 60.284 and 30 TAC 111.121 print 21 (read), Method 19 prints 20.9
    ("us_waste_7", "mg/m3", "7", "20.9"), ("us_boiler_3", "ppm", "3", "20.9"), ("us_turbine_15", "ppm", "15", "20.9"),
    ("us_kraft_recovery", "ppm", "8", "21"), ("us_texas_incinerator", "gr/ft3", "7", "21"),
    ("quebec_11", "mg/m3", "11", "20.9"), ("japan_waste", "mg/m3", "12", "21"), ("india_incinerator", "mg/m3", "11", "21"),
])
def test_reference_and_ambient_oxygen(id, unit, oxygen, ambient):
    book = BOOKS[id]
    statement, _ = read_statement(book.owe, "owe")
    assert (statement.unit.text.replace("³", "3"), statement.oxygen.number.text) == (unit, oxygen)
    assert book.ambient_oxygen.text == ambient == book.usual["ambient_oxygen"]


def test_bases_without_oxygen_have_no_ambient_oxygen_either():
    without = [book.id for book in BOOKS.values() if "O2" not in book.owe and book.ambient_oxygen is not None]
    assert without == ["us_part_75_boiler", "us_part_75_turbine"]    # their oxygen enters the heat input, not the concentration


def test_one_sided_rules_and_diluent_caps():
    assert {book.id for book in BOOKS.values() if book.one_sided} == {"eu_incineration_hazardous"}
    caps = {book.id: book.diluent_cap.text for book in BOOKS.values() if book.diluent_cap}
    assert caps == {"us_part_75_boiler": "14.0", "us_part_75_turbine": "19.0", "japan_coal": "20", "japan_gas": "20", "japan_waste": "20"}


@pytest.mark.parametrize("name, molar_mass, departs", [    # percent that the printed factor differs from M / 385.33 ft3 x 1e-6
    ("factor:NOx", 46.006, 0.0),
    ("factor:CO", 28.010, -0.016),     # 385.4 ft3 a pound-mole
    ("factor:SO2", 64.06, -0.16),      # M 63.97, or 385.93 ft3
])
def test_printed_factors_against_exact(name, molar_mass, departs):
    printed = BOOKS["us_part_75_boiler"].conventions[name].text
    exact = molar_mass / POUND_MOLE * 1e-6
    half_a_digit = 0.5e-3 * 10 ** int(printed.partition("e")[2]) / exact * 100
    assert (float(printed) / exact - 1) * 100 == pytest.approx(departs, abs=half_a_digit)


def test_printed_factor_of_mercury_against_exact():
    """6.24e-11 lb m3/(ug ft3): micrograms per cubic metre to pounds per cubic foot."""
    printed = BOOKS["us_mercury_utility"].conventions["factor:Hg"]
    assert float(printed.text) == pytest.approx(1e-6 / 453.59237 * 0.3048 ** 3, abs=0.005e-11)


def test_workplace_molar_volumes_as_the_trade_prints_them():
    """24.45 L/mol is cut off from 24.465; EH40's 24.05526 follows an older gas constant."""
    us = BOOKS["us_workplace_air"].conventions["molar_volume"]
    uk = BOOKS["uk_workplace_air"].conventions["molar_volume"]
    assert (us.text, us.unit) == ("24.45", "L/mol")
    assert float(us.text) / (8.31446261815324 * 298.15 / 101.325) - 1 == pytest.approx(-0.00063, abs=5e-6)
    assert float(uk.text) == pytest.approx(8.31446261815324 * 293.15 / 101.325, abs=0.0005)


def test_a_number_read_elsewhere_than_its_rule_says_so():
    cap = BOOKS["japan_coal"].diluent_cap
    assert (cap.read, BOOKS["japan_coal"].read) == ("primary", "memory")
    assert cap.locator != BOOKS["japan_coal"].clause

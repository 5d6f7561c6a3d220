"""Names and formulas as they are typed."""
from __future__ import annotations

import pytest

from gasbasis.errors import NotUnderstood
from gasbasis.language.formula import atoms
from gasbasis.language.species import find, molar_mass, search


@pytest.mark.parametrize(("typed", "identity"), [
    ("Hg", "Hg"), ("mercury", "Hg"), ("Mercury", "Hg"), ("SO2", "SO2"), ("SO₂", "SO2"), ("sulphur dioxide", "SO2"), ("sulfur dioxide", "SO2"), ("hcn", "HCN"),
    ("benzene", "C6H6"), ("propane", "C3H8"), ("NOx", "NOx"), ("TOC", "TOC")])
def test_typed_name(typed: str, identity: str) -> None:
    assert find(typed).id in (identity, find(identity).id)


@pytest.mark.parametrize(("typed", "identity"), [("tolune", "toluene"), ("formaldehide", "formaldehyde"), ("amonia", "ammonia"), ("merc", "mercury")])
def test_search_bears_typing(typed: str, identity: str) -> None:
    assert any(entry["name"] == identity for entry in search(typed)[:3])


@pytest.mark.parametrize("word", ["no", "as", "in", "co", "i", "at"])
def test_ordinary_words_are_no_species(word: str) -> None:
    with pytest.raises(NotUnderstood):
        find(word)


@pytest.mark.parametrize(("formula", "counts"), [
    ("(CH3)2S", {"C": 2, "H": 6, "S": 1}), ("C6H5Cl", {"C": 6, "H": 5, "Cl": 1}), ("HgCl2", {"Hg": 1, "Cl": 2}), ("Ni(CO)4", {"Ni": 1, "C": 4, "O": 4}),
    ("CuSO4·5H2O", {"Cu": 1, "S": 1, "O": 9, "H": 10}), ("[Fe(CN)6]", {"Fe": 1, "C": 6, "N": 6}), ("C₂H₆", {"C": 2, "H": 6})])
def test_atoms(formula: str, counts: dict) -> None:
    assert atoms(formula) == counts


@pytest.mark.parametrize("text", ["", "2", "xx", "(CH3", "CH3)", "C()", "C-H"])
def test_no_formula(text: str) -> None:
    with pytest.raises(ValueError):
        atoms(text)


@pytest.mark.parametrize(("formula", "grams"), [  # handbook values, from memory, to the digits given
    ("SO2", "64.06"), ("NO2", "46.005"), ("CO2", "44.009"), ("HgCl2", "271.49"), ("C6H5Cl", "112.56"), ("C3H8", "44.10"), ("H2O", "18.015")])
def test_molar_mass(formula: str, grams: str) -> None:
    value, added_up = molar_mass(find(formula))
    assert value * 1e3 == pytest.approx(float(grams), abs=0.5 * 10 ** -len(grams.partition(".")[2]))
    assert "×" in added_up or "+" in added_up


def test_an_unknown_element_is_named() -> None:
    with pytest.raises(NotUnderstood, match="'Xx' is not an element"):
        find("Xx2")

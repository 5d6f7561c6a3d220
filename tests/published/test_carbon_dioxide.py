"""Corrections to a reference carbon dioxide content: c · CO2_ref/CO2, as US incinerator rules write it (c · 12/% CO2)."""
from __future__ import annotations

import json

import pytest

from gasbasis.answer import answer


def restate(**sheet) -> dict:
    return json.loads(answer(json.dumps({"task": "restate", "sheet": sheet})))["answer"]


@pytest.mark.parametrize(("hold", "gas", "owe", "figure"), [  # by hand from the rule's c · 12/CO2
    ("CO 100 ppmv dry", "8 % CO2 dry", "ppm by volume dry, 12 % CO2", 150.0),
    ("dust 0.08 gr/ft3 at 20 °C, 1 atm, dry", "9.6 % CO2 dry", "gr/ft3 at 20 °C, 1 atm, dry, corrected to 12 % CO2", 0.1),
    ("CO 90 ppmv wet", "7.2 % CO2 wet, 10 % H2O", "ppm by volume dry at 12 % CO2", 150.0),           # 100 dry at 8 % dry
    ("CO 150 ppmv dry corrected to 12 % CO2", "", "ppm by volume dry at 6 % CO2", 75.0),             # no measured value is needed
    ("CO 150 ppmv dry corrected to 12 % CO2", "8 % CO2 dry, 10 % O2 dry, ambient O2 21 %", "ppm by volume dry, 11 % O2", 100 * 10 / 11),
    ("CO 100 ppmv dry corrected to 11 % O2", "8 % CO2 dry, 10 % O2 dry, ambient O2 21 %", "ppm by volume dry, 12 % CO2", 110 * 12 / 8)])
def test_a_reference_carbon_dioxide(hold: str, gas: str, owe: str, figure: float) -> None:
    assert restate(hold=hold, gas=gas, owe=owe)["figure"]["value"] == pytest.approx(figure, rel=1e-12)


def test_the_basis_names_one_reference() -> None:
    sheet = dict(hold="CO 100 ppmv dry corrected to 11 % O2", gas="8 % CO2 dry, 10 % O2 dry, ambient O2 21 %", owe="ppm by volume dry, 12 % CO2")
    assert restate(**sheet)["figure"]["basis"] == "dry, at 12 % CO₂"


@pytest.mark.parametrize(("sheet", "field", "said"), [
    (dict(hold="CO 100 ppmv dry", owe="ppm by volume dry, 12 % CO2"), "gas.carbon_dioxide", "measured carbon dioxide is needed"),
    (dict(hold="CO 100 ppmv dry", owe="ppm by volume dry, 12 % CO2, 11 % O2", gas="8 % CO2 dry"), "owe.carbon_dioxide", "by one of them"),
    (dict(hold="CO 100 ppmv dry", owe="ppm by volume dry, 12 % CO2", gas="0 % CO2 dry"), "gas.carbon_dioxide", "must lie above zero")])
def test_what_cannot_be_referred_says_why(sheet: dict, field: str, said: str) -> None:
    result = restate(**sheet)
    assert result["figure"] is None and any(problem["field"] == field and said in problem["message"] for problem in result["problems"]), result["problems"]

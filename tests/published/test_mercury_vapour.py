"""Saturated mercury vapour by both equations, and against what a gas can hold.

Dumarey's coefficients and his values at 0 to 30 °C are from memory. Huber, Laesecke and Friend: a ladder computed from their equation outside
this project; the normal boiling point, 629.77 K at 1 atm, is their abstract's.
"""
from __future__ import annotations

import json
import math

import pytest

from gasbasis import relations
from gasbasis.answer import answer
from gasbasis.language.numbers import half_last_digit


def restate(**sheet) -> dict:
    usual = sheet.pop("usual", True)
    return json.loads(answer(json.dumps({"task": "restate", "usual": usual, "sheet": sheet})))["answer"]


def saturated(celsius: float, equation: str) -> float:
    """ng/mL, as a sheet gives it: 1 mL of vapour in 1 L, so that µg/m3 are ng/mL."""
    result = restate(prepared=f"saturated mercury vapour 1 mL at {celsius} °C in 1 L at 20 °C, 1 atm, {equation}", owe="ug/m3 at 20 °C, 1 atm")
    return result["figure"]["value"]


@pytest.mark.parametrize(("celsius", "printed", "half"), [(0, 2.191, 0.0005), (20, 13.165, 0.0005), (25, 19.837, 0.0005), (30, 29.48, 0.005)])
def test_dumarey_from_memory(celsius, printed, half) -> None:
    assert saturated(celsius, "Dumarey") == pytest.approx(printed, abs=half)


@pytest.mark.parametrize(("celsius", "ng_per_mL"), [(0, "2.384"), (10, "5.988"), (15, "9.258"), (20, "14.095"), (25, "21.146"), (30, "31.288"), (40, "65.876"), (60, "254.05")])
def test_huber(celsius, ng_per_mL) -> None:
    """The ladder counts with 200.592 g/mol, the abridged weight here is 200.59."""
    assert saturated(celsius, "Huber") * 200.592 / 200.59 == pytest.approx(float(ng_per_mL), abs=half_last_digit(ng_per_mL))


@pytest.mark.parametrize(("celsius", "pascal"), [(0, "0.02699"), (10, "0.07028"), (15, "0.11058"), (20, "0.17126"), (25, "0.26133"), (30, "0.39314"), (40, "0.85507"), (60, "3.5082")])
def test_huber_in_pascal(celsius, pascal) -> None:
    result = restate(prepared=f"saturated mercury vapour 1 mL at {celsius} °C in 1 L at 20 °C, 1 atm, Huber", owe="ug/m3 at 20 °C, 1 atm")
    text = next(step["result"]["text"] for step in result["working"] if step["title"] == "Vapour pressure of mercury")
    assert float(text.removesuffix(" Pa")) == pytest.approx(float(pascal), abs=half_last_digit(pascal))


def test_the_boiling_point() -> None:
    a, e = (-4.57618368, -1.40726277, 2.36263541, -31.0889985, 58.0183959, -27.6304546), (1.89, 2.0, 8.0, 8.5, 9.0)
    p = relations.get("vapour_pressure_of_mercury").function(T=629.77, T_c=1764.0, p_c=167e6, **{f"a_{i}": value for i, value in enumerate(a, 1)},
                                                             **{f"e_{i}": value for i, value in enumerate(e, 2)})
    assert p == pytest.approx(101325, rel=2e-5)


def test_the_two_differ_by_seven_percent_and_that_is_a_doubt() -> None:
    """Atmos. Meas. Tech. 14, 2317 (2021): results traceable to Dumarey are some 7 to 8 % low."""
    assert saturated(20, "Dumarey") / saturated(20, "Huber") == pytest.approx(0.9341, abs=0.00005)
    result = restate(prepared="saturated mercury vapour 100 uL at 22 °C in 2.0 L at 20 °C, 1 atm", owe="ug/m3 at 20 °C, 1 atm")
    doubt = next(doubt for doubt in result["doubts"] if doubt["id"] == "prepared.equation")
    assert doubt["state"] == "open" and doubt["usual"] is None and [reading["id"] for reading in doubt["readings"]] == ["dumarey", "huber"]
    assert result["spread"]["high"]["value"] / result["spread"]["low"]["value"] == pytest.approx(1.07, abs=0.005)


def test_an_injection_by_hand() -> None:
    """100 uL of 14.095 ng/mL is 1.4095 ng; in 2.0 L that is 0.70475 ug/m3."""
    result = restate(prepared="saturated mercury vapour 100 uL at 20 °C in 2.0 L at 20 °C, 1 atm, Huber", owe="ug/m3 at 20 °C, 1 atm")
    assert result["figure"]["value"] == pytest.approx(0.70475, rel=5e-5)


@pytest.mark.parametrize(("hold", "gas", "above"), [
    ("Hg 15 ug/L at 20 °C, 1 atm", "20 °C, 1 atm", True), ("Hg 13 ug/L at 20 °C, 1 atm", "20 °C, 1 atm", False),     # it holds 14.095 ng/mL = ug/L
    ("Hg 1.2 ppm by volume", "20 °C, 101.325 kPa", False), ("Hg 1.9 ppm by volume", "20 °C, 101.325 kPa", True),           # 0.17126 Pa of 101325 is 1.690 ppm
    ("Hg 50 ppb by volume", "20 °C, 60 bar absolute", True), ("Hg 25 ppb by volume", "20 °C, 60 bar absolute", False)])    # of 6 MPa 28.5 ppb
def test_mercury_above_saturation_is_pointed_out(hold, gas, above) -> None:
    """Against the Huber ladder: 0.17126 Pa at 20 °C."""
    result = restate(hold=hold, gas=gas, owe="ppb by volume" if "L" in hold else "ug/m3 at 20 °C, 101.325 kPa")
    assert result["figure"] and any("above saturation" in warning for warning in result["warnings"]) is above


def test_a_temperature_outside_the_equations_is_refused() -> None:
    problems = restate(prepared="saturated mercury vapour 1 mL at 250 °C in 1 L at 20 °C, 1 atm, Huber", owe="ug/m3 at 20 °C, 1 atm")["problems"]
    assert problems and problems[0]["field"] == "prepared.vapour_temperature"
    assert math.isfinite(saturated(60, "Huber"))

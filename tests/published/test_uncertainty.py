"""Uncertainty against JCGM 100:2008 and JCGM 101:2008."""
from __future__ import annotations

import json
import math

import pytest

from gasbasis.answer import answer
from gasbasis.calculation.correlations import cholesky, correlation_matrix
from gasbasis.calculation.monte_carlo import numerical_tolerance, shortest_interval
from gasbasis.errors import OutOfRange


def restate(**sheet) -> dict:
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet})))
    assert reply["ok"], reply
    return reply["answer"]


def test_one_input_carries_straight_through() -> None:
    found = restate(hold="SO2 100 ± 4 ppmv (k=2)", owe="ppb by volume")["uncertainty"]
    assert found["standard_uncertainty"] == pytest.approx(2000) and found["expanded_text"] == "4000"


@pytest.mark.parametrize(("said", "u"), [  # JCGM 100:2008, 4.3.3, 4.3.7, 4.3.9: U/k, a/sqrt 3, a/sqrt 6
    ("± 6 ppmv (k=2)", 3.0), ("± 6 ppmv (k=3)", 2.0), ("± 6 ppmv (rectangular)", 6 / math.sqrt(3)), ("± 6 ppmv (triangular)", 6 / math.sqrt(6)),
    ("± 6 ppmv (1 s)", 6.0), ("± 6 ppmv (95 %)", 3.0)])
def test_each_way_of_stating_it(said: str, u: float) -> None:
    assert restate(hold=f"SO2 100 {said}", owe="ppm by volume")["uncertainty"]["standard_uncertainty"] == pytest.approx(u)


def test_percent_of_the_value() -> None:
    assert restate(hold="SO2 50 ppmv ± 6 % (k=2)", owe="ppm by volume")["uncertainty"]["standard_uncertainty"] == pytest.approx(1.5)


def test_an_uncertainty_of_a_temperature_is_a_difference() -> None:
    # ± 1 K = ± 1 degC = ± 1.8 degF
    units = [restate(hold="SO2 100 ppmv", owe="mg/m3 at 20 °C, 1 atm", gas="") for _ in range(1)]
    assert units[0]["uncertainty"] is None
    values = [restate(hold=f"SO2 100 mg/m3 at {said}, 1 atm", owe="ppm by volume")["uncertainty"]["standard_uncertainty"]
              for said in ("293.15 ± 1 K", "20 ± 1 °C", "68 ± 1.8 °F", "20 °C ± 1.8 °F")]
    assert values == pytest.approx([values[0]] * 4, rel=1e-12)
    figure = restate(hold="SO2 100 mg/m3 at 20 °C, 1 atm", owe="ppm by volume")["figure"]["value"]
    assert values[0] == pytest.approx(figure / 293.15 / 2, rel=1e-12)       # x is proportional to T; k = 2 taken


def test_no_uncertainty_prints_the_figure_by_its_own_rule() -> None:
    result = restate(hold="SO2 123 ± 0 ppmv (k=2)", owe="ppm by volume")
    assert result["uncertainty"] is None and result["figure"]["number_text"] == "123.0"


STACK = dict(hold="NOx 142 ± 5 ppmv (k=2) as NO2, wet", gas="9.2 ± 0.3 % O2 dry (k=2), 12 ± 1 % H2O (k=2), ambient O2 21 %",
             owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2")


def test_the_whole_route_against_central_differences() -> None:
    found = restate(**STACK)["uncertainty"]

    def figure(ppm=142.0, oxygen=9.2, water=12.0) -> float:
        return restate(hold=f"NOx {ppm!r} ppmv as NO2, wet", gas=f"{oxygen!r} % O2 dry, {water!r} % H2O, ambient O2 21 %", owe=STACK["owe"])["figure"]["value"]
    step = 1e-4
    slopes = {"held value": (figure(ppm=142 + step) - figure(ppm=142 - step)) / (2 * step),
              "measured oxygen": (figure(oxygen=9.2 + step) - figure(oxygen=9.2 - step)) / (2 * step),
              "water content": (figure(water=12 + step) - figure(water=12 - step)) / (2 * step)}
    u = {"held value": 2.5, "measured oxygen": 0.15, "water content": 0.5}
    contributions = {row["input"]: row["contribution"] for row in found["rows"]}
    for name in slopes:
        assert contributions[name] == pytest.approx(abs(slopes[name]) * u[name], rel=1e-7)
    assert found["standard_uncertainty"] == pytest.approx(math.sqrt(sum((slopes[name] * u[name]) ** 2 for name in slopes)), rel=1e-7)
    assert [row["contribution"] for row in found["rows"]] == sorted((row["contribution"] for row in found["rows"]), reverse=True)
    assert sum(row["share"] for row in found["rows"]) == pytest.approx(1)


def test_an_input_in_several_steps_keeps_its_correlation() -> None:
    # dry = wet/(1-h) and O2 dry = O2 wet/(1-h): h enters twice; c = c_w (A - R)/(A (1-h) - O_w), by hand
    sheet = dict(hold="SO2 100 ppmv wet", gas="20 ± 2 % H2O (k=2), wet O2 8 %, ambient O2 21 %", owe="ppm by volume, dry, 11 % O2")
    found = restate(**sheet)["uncertainty"]
    slope = 100 * (21 - 11) * 21 / (21 * 0.8 - 8) ** 2 * 0.01                # d/dh [1/(A(1-h)-O)] = A/(...)^2, per percent
    assert found["standard_uncertainty"] == pytest.approx(slope * 1.0, rel=1e-9)


@pytest.mark.native
def test_monte_carlo_agrees_with_the_budget_on_a_nearly_linear_route() -> None:
    record = json.loads(answer(json.dumps({"task": "monte_carlo", "sheet": STACK, "seed": 7})))["answer"]
    known = restate(**STACK)["uncertainty"]
    assert record["trials"] >= 200_000 and record["outside"] == 0
    assert record["standard_uncertainty"] == pytest.approx(known["standard_uncertainty"], rel=0.02)
    again = json.loads(answer(json.dumps({"task": "monte_carlo", "sheet": STACK, "seed": 7})))["answer"]
    assert again["mean"] == record["mean"]                                     # seeded
    # the shortest 95 % interval of a Gaussian is +-1.96 u
    assert record["high"] - record["low"] == pytest.approx(2 * 1.96 * known["standard_uncertainty"], rel=0.02)


@pytest.mark.native
def test_a_linear_gaussian_route_is_confirmed_and_a_rectangular_one_is_not() -> None:
    """JCGM 101:2008, clause 8 and 9.2.2: Gaussian inputs added up validate the budget; one rectangular input does not."""
    def drawn(hold: str) -> dict:
        return json.loads(answer(json.dumps({"task": "monte_carlo", "sheet": dict(hold=hold, owe="ppm by volume"), "seed": 5})))["answer"]
    gaussian, rectangular = drawn("SO2 100 ± 2.2 ppmv (1 s)"), drawn("SO2 100 ± 6 ppmv (rectangular)")
    assert gaussian["agrees"] is True and gaussian["budget_high"] == pytest.approx(100 + 1.959964 * 2.2, rel=1e-6)
    assert rectangular["agrees"] is False       # its 95 % interval is 0.95 of the width: 105.7, the Gaussian's 106.8


@pytest.mark.native
def test_a_rectangular_input_is_drawn_as_one() -> None:
    sheet = dict(hold="SO2 100 ± 6 ppmv (rectangular)", owe="ppm by volume")
    record = json.loads(answer(json.dumps({"task": "monte_carlo", "sheet": sheet, "seed": 3})))["answer"]
    assert record["edges"][0] >= 94 and record["edges"][1] <= 106
    assert record["high"] - record["low"] == pytest.approx(0.95 * 12, rel=0.01)  # JCGM 101: 95 % of the width


@pytest.mark.parametrize(("sheet", "message"), [
    (dict(hold="SO2 100 ppmv", owe="ppb by volume"), "No input carries an uncertainty"),
    (dict(hold="SO2 100 ± 4 ppmv wet (k=2)", owe="ppm by volume, dry", gas="1 ± 3 % H2O (k=2)"), "more than 0.1 %")])
def test_what_cannot_be_drawn_says_why(sheet, message) -> None:
    reply = json.loads(answer(json.dumps({"task": "monte_carlo", "sheet": sheet})))
    assert not reply["ok"] and message in reply["error"]["message"]


@pytest.mark.parametrize("trials", [0, 10, 10**9])
def test_a_senseless_number_of_trials_is_refused(trials: int) -> None:
    reply = json.loads(answer(json.dumps({"task": "monte_carlo", "sheet": STACK, "trials": trials})))
    assert not reply["ok"] and "trials" in reply["error"]["message"]


def test_correlations() -> None:
    assert cholesky([[1.0, 0.6], [0.6, 1.0]])[1] == pytest.approx([0.6, 0.8])
    with pytest.raises(OutOfRange):
        correlation_matrix(["a", "b"], {("a", "b"): 1.2})
    with pytest.raises(OutOfRange, match="positive definite"):
        cholesky(correlation_matrix(["a", "b", "c"], {("a", "b"): 0.9, ("b", "c"): 0.9, ("a", "c"): -0.9}))


def test_numerical_tolerance_of_two_digits() -> None:
    # JCGM 101:2008, 7.9.2 example: u = 0.35 -> delta = 0.005 (35 x 10^-2: half of 10^-2)
    assert numerical_tolerance(0.35) == pytest.approx(0.005)


def test_the_shortest_interval() -> None:
    assert shortest_interval([0.0, 1.0, 1.1, 1.2, 1.3, 9.0], 4 / 6) == (1.0, 1.3)


@pytest.mark.parametrize(("hold", "message"), [("SO2 100 ± 4 ppmv (k=0.5)", "k is at least 1"), ("SO2 100 ± -4 ppmv (k=2)", "cannot be negative")])
def test_bad_uncertainties_are_refused(hold: str, message: str) -> None:
    result = restate(hold=hold, owe="mg/m3 at 20 °C, 1 atm")
    assert result["figure"] is None and any(message in problem["message"] and problem["field"] == "hold.value" for problem in result["problems"])

"""Repeated readings (type A), degrees of freedom, correlations and the order of averaging."""
from __future__ import annotations

import json
import math

import pytest
from uncertainties.umath import cos

from gasbasis.answer import answer
from gasbasis.calculation.monte_carlo import simulate
from gasbasis.calculation.path import Leaf, Path, Shown, Step
from gasbasis.calculation.uncertainty import budget
from gasbasis.relations.relation import Relation, Symbol


def restate(settled=(), **sheet) -> dict:
    return json.loads(answer(json.dumps({"task": "restate", "sheet": {**sheet, "settled": dict(settled)}})))["answer"]


# --- JCGM 100:2008, H.2 (from memory): five simultaneous sets of V, I and phi ---

_SETS = {"V": ("V", [5.007, 4.994, 5.005, 4.990, 4.999]), "I": ("mA", [19.663e-3, 19.639e-3, 19.640e-3, 19.685e-3, 19.678e-3]),
         "phi": ("rad", [1.0456, 1.0438, 1.0468, 1.0428, 1.0433])}


def _mean(values): return sum(values) / len(values)


def _pearson(a, b):
    ma, mb = _mean(a), _mean(b)
    return sum((x - ma) * (y - mb) for x, y in zip(a, b)) / math.sqrt(sum((x - ma) ** 2 for x in a) * sum((y - mb) ** 2 for y in b))


def _resistance(V, I, phi):
    return V / I * cos(phi)


def _impedance(V, I):
    return V / I


@pytest.mark.native
@pytest.mark.parametrize(("function", "value", "u", "half_digit"), [(_resistance, 127.732, 0.071, 5e-4), (_impedance, 254.260, 0.236, 5e-4)])
def test_gum_h2(function, value: float, u: float, half_digit: float) -> None:
    """Correlated means carry into R and Z as the guide prints them (its u(X) = .295 is printed from .2956: left out)."""
    names = [name for name in _SETS if name in function.__code__.co_varnames]
    relation = Relation("h2", "H.2", function, Symbol("R", "", "ohm", "result"), {name: Symbol(name, "", _SETS[name][0], name) for name in names}, "jcgm-100-2008", "H.2")
    leaves = {name: Leaf(name, _mean(_SETS[name][1]), "", "", "typed", "", name,
                         standard_uncertainty=math.sqrt(sum((x - _mean(_SETS[name][1])) ** 2 for x in _SETS[name][1]) / 20)) for name in names}
    correlations = {(a, b): _pearson(_SETS[a][1], _SETS[b][1]) for i, a in enumerate(names) for b in names[i + 1:]}
    path = Path(leaves, (Step(relation, {name: name for name in names}, "y", Shown()),), (), "V", 1.0, "y", Shown(), (), correlations=correlations)
    found = budget(path)
    assert found.value == pytest.approx(value, abs=half_digit) and found.standard_uncertainty == pytest.approx(u, abs=half_digit)


# --- the texts ---

def test_the_mean_of_repeated_readings_and_its_scatter() -> None:
    """JCGM 100:2008, 4.2.3: u = s/sqrt(n), n - 1 degrees of freedom; t at 95.45 % for 2 is 4.53 (its table G.2)."""
    for text in ("NOx 141; 143; 142 ppmv", "NOx mean of 141, 143 and 142 ppmv", "NOx: readings 141; 143; 142 ppmv"):
        found = restate(hold=text, owe="ppm by volume")
        assert found["figure"]["value"] == pytest.approx(142) and found["uncertainty"]["standard_uncertainty"] == pytest.approx(1 / math.sqrt(3)), text
        assert found["uncertainty"]["coverage_text"] == "4.53" and found["uncertainty"]["freedom_text"] == "2.00"


def test_scatter_and_a_stated_spread_add_as_variances() -> None:
    found = restate(hold="NOx 141; 143; 142 ppmv ± 2 ppm (k=2)", owe="ppm by volume")["uncertainty"]
    assert found["standard_uncertainty"] == pytest.approx(math.sqrt(1 / 3 + 1))
    assert float(found["freedom_text"]) == pytest.approx((1 / 3 + 1) ** 2 / ((1 / 3) ** 2 / 2), abs=0.05)     # Welch-Satterthwaite, G.2b


@pytest.mark.parametrize(("dof", "k"), [("2", "4.53"), ("9", "2.32"), ("50", "2.05")])                     # JCGM 100:2008, table G.2, 95.45 %
def test_stated_degrees_of_freedom_widen_k(dof: str, k: str) -> None:
    assert restate(hold=f"NOx 142 ppmv ± 5 ppm (1 s, dof {dof})", owe="ppm by volume")["uncertainty"]["coverage_text"] == k


SHEET = dict(hold="CO 100 ± 4 ppmv dry (k=2)", owe="ppm by volume, dry, 11 % O2")


@pytest.mark.parametrize("r", [-1, -0.8, 0.0, 0.6, 1])
def test_a_stated_correlation(r: float) -> None:
    """By hand: y = c (A - R)/(A - O), so u^2 = a^2 + b^2 + 2 r a b with a = y/c u(c), b = y/(A - O) u(O)."""
    found = restate(**SHEET, gas=f"O2 5 ± 0.4 % dry (k=2), ambient O2 21 %, r(value, O2) = {r}")["uncertainty"]
    y = 100 * 10 / 16
    a, b = y / 100 * 2, y / 16 * 0.2
    assert found["standard_uncertainty"] == pytest.approx(math.sqrt(a**2 + b**2 + 2 * r * a * b), rel=1e-9)


def test_two_stated_correlations_and_their_words() -> None:
    gas = "O2 5 ± 0.4 % dry (k=2), ambient O2 21 %, {}"
    texts = ("correlation of NOx and O2 0.5", "corr(O2; value): 0.5", "r(CO, O2) = 0,5")
    values = [restate(**SHEET, gas=gas.format(text))["uncertainty"]["standard_uncertainty"] for text in texts]
    assert values == pytest.approx([values[0]] * 3) and values[0] != restate(**SHEET, gas=gas.format("")[:-2])["uncertainty"]["standard_uncertainty"]


@pytest.mark.native
def test_a_correlation_is_drawn_too() -> None:
    sheet = {**SHEET, "gas": "O2 5 ± 0.4 % dry (k=2), ambient O2 21 %, r(value, O2) = 0.9"}
    drawn = json.loads(answer(json.dumps({"task": "monte_carlo", "sheet": sheet, "seed": 3})))["answer"]
    assert drawn["standard_uncertainty"] == pytest.approx(restate(**sheet)["uncertainty"]["standard_uncertainty"], rel=0.01)


@pytest.mark.parametrize(("gas", "said"), [("r(value, O2) = 1.2", "lies from -1 to 1"), ("r(O2, O2) = 0.2", "two different inputs"), ("r(value, smell) = 0.2", "two different inputs")])
def test_a_senseless_correlation_is_refused(gas: str, said: str) -> None:
    result = restate(**SHEET, gas=f"O2 5 ± 0.4 % dry (k=2), ambient O2 21 %, {gas}")
    assert result["figure"] is None and any(said in problem["message"] for problem in result["problems"]), result["problems"]


def test_correlations_that_contradict_each_other() -> None:
    gas = "O2 5 ± 0.4 % dry (k=2), 12 ± 1 % H2O (k=2), ambient O2 21 %, r(value, O2) = 0.9, r(O2, H2O) = 0.9, r(value, H2O) = -0.9"
    result = restate(hold="CO 100 ± 4 ppmv wet (k=2)", owe=SHEET["owe"], gas=gas)
    assert "contradict each other" in result["problems"][0]["message"] and result["problems"][0]["field"] == "gas.correlations"


def test_a_correlation_without_effect_is_said() -> None:
    assert "has no effect" in restate(**SHEET, gas="O2 5 % dry, ambient O2 21 %, r(value, O2) = 0.8")["warnings"][0]


# --- the order of averaging: 100 at 5 % and 20 at 17 % O2 give 56.25 one way and 60.0 the other (computed by hand; 40 CFR 60.284 and 60.1755 prescribe one each) ---

RUNS = dict(hold="CO 100; 20 ppmv dry", gas="O2 5; 17 % dry, ambient O2 21 %", owe="ppm by volume, dry, 11 % O2")


def test_both_orders_are_shown() -> None:
    result = restate(**RUNS)
    doubt = next(doubt for doubt in result["doubts"] if doubt["id"] == "hold.averaging_order")
    assert result["figure"] is None and {reading["id"]: reading["text"] for reading in doubt["readings"]} == {"each": "56.25", "together": "60.00", "apart": "60.00"}


@pytest.mark.parametrize(("order", "figure"), [("each", 56.25), ("together", 60.0), ("apart", 60.0)])
def test_the_chosen_order_is_the_figure_and_the_other_is_named(order: str, figure: float) -> None:
    result = restate({"hold.averaging_order": order}, **RUNS)
    assert result["figure"]["value"] == pytest.approx(figure)
    other = "60.00" if order == "each" else "56.25"
    assert any(other in warning for warning in result["warnings"]), result["warnings"]
    assert ("mean of 2 corrected readings" in result["figure"]["basis"]) == (order == "each")


def test_each_corrected_has_the_scatter_of_the_corrected_values() -> None:
    result = restate({"hold.averaging_order": "each"}, **RUNS)
    assert result["uncertainty"]["standard_uncertainty"] == pytest.approx(abs(62.5 - 50) / 2)        # s/sqrt(2) of 62.5 and 50
    assert result["verdict"] is None and len([work for work in result["working"] if work["kind"] == "relation"]) == 3


def test_one_after_another_needs_pairs() -> None:
    assert "hold.averaging_order" not in [doubt["id"] for doubt in restate(**{**RUNS, "gas": "O2 5; 17; 11 % dry, ambient O2 21 %"})["doubts"]]


# --- JCGM 101:2008, 9.2 (from memory): the sum of four inputs ---

def _sum_path(leaves: dict[str, Leaf]) -> Path:
    def added(a, b, c, d):
        return a + b + c + d
    relation = Relation("sum", "sum", added, Symbol("Y", "", "1", "sum"), {name: Symbol(name, "", "1", name) for name in "abcd"}, "jcgm-100-2008", "9.2")
    return Path(leaves, (Step(relation, {name: name for name in "abcd"}, "y", Shown()),), (), "a", 1.0, "y", Shown(), ())


def _input(name: str, u: float, distribution: str) -> Leaf:
    return Leaf(name, 0.0, "0", "", "typed", "", name, standard_uncertainty=u, distribution=distribution)


@pytest.mark.native
@pytest.mark.parametrize(("distribution", "last", "u", "high", "within"), [
    ("normal", 1.0, 2.00, 3.92, 0.03),           # 9.2.2
    ("rectangular", 1.0, 2.00, 3.88, 0.03),      # 9.2.3
    ("rectangular", 10.0, 10.1, 17.0, 0.1)])     # 9.2.4
def test_jcgm_101_additive_model(distribution: str, last: float, u: float, high: float, within: float) -> None:
    leaves = {name: _input(name, last if name == "d" else 1.0, distribution) for name in "abcd"}
    found = simulate(_sum_path(leaves), seed=11, most=200_000)
    assert found.standard_uncertainty == pytest.approx(u, abs=0.05 if u > 5 else 0.01)
    assert (found.high - found.low) / 2 == pytest.approx(high, abs=within)

"""Verdicts and probabilities against JCGM 106:2012 and ILAC-G8:09/2019 (values from memory, recomputed)."""
from __future__ import annotations

import json

import pytest

from gasbasis.answer import answer
from gasbasis.calculation.verdict import RULES, Limits, Result, judge, probability_of_conformity, risk_at_guard
from gasbasis.errors import CoreError, Missing, OutOfRange


def test_one_sided_upper_limit_of_the_zener_example() -> None:
    # JCGM 106:2012, 7.3: limit -5.40 V, measured -5.47 V, u = 0.05 V: conformance probability 0.92
    assert probability_of_conformity(Result(-5.47, 0.05), Limits(upper=-5.40)) == pytest.approx(0.92, abs=0.005)


def test_one_sided_lower_limit_of_the_burst_example() -> None:
    # JCGM 106:2012, clause 7: lower limit 490 kPa, estimate 509.7 kPa, u = 8.6 kPa: 0.99
    assert probability_of_conformity(Result(509.7, 8.6), Limits(lower=490.0)) == pytest.approx(0.99, abs=0.005)


def test_the_risk_a_guard_band_stands_for() -> None:
    # ILAC-G8:09/2019: w = U (k = 2): 2.3 % (2.275); w = 1.64 u: 5 %
    assert 100 * risk_at_guard(2.0) == pytest.approx(2.275, abs=0.0005)
    assert 100 * risk_at_guard(1.64) == pytest.approx(5.05, abs=0.005)


@pytest.mark.parametrize(("rule", "value", "typed", "words"), [
    ("simple", 199.0, None, "within"), ("simple", 200.0, None, "within"), ("simple", 201.0, None, "above"),
    ("guarded", 185.0, None, "within"), ("guarded", 195.0, None, "not shown within"), ("guarded", 201.0, None, "above"),
    ("guarded", 195.0, 4.0, "within"), ("guarded_5", 191.7, None, "within"), ("guarded_5", 191.9, None, "not shown within"),
    ("guarded_rejection", 209.0, None, "within"), ("guarded_rejection", 211.0, None, "above"),
    ("three_way", 189.0, None, "within"), ("three_way", 195.0, None, "not decided"), ("three_way", 205.0, None, "not decided"), ("three_way", 211.0, None, "above"),
    ("subtract_percent_of_limit", 239.0, 20.0, "within"), ("subtract_percent_of_limit", 241.0, 20.0, "above"),
    ("subtract_percent_of_value", 249.0, 20.0, "within"), ("subtract_percent_of_value", 251.0, 20.0, "above"),
    ("subtract_capped", 209.0, 20.0, "within"), ("subtract_capped", 211.0, 20.0, "above"), ("subtract_capped", 207.0, 3.0, "above"),
])
def test_each_rule_at_its_edges(rule: str, value: float, typed: float | None, words: str) -> None:
    # limit 200, u = 5, U = 10: the edges are 200 -+ 10, 200 - 1.64 x 5, 200 + 20 % and so on, by hand
    assert judge(rule, Result(value, 5.0), Limits(upper=200.0), typed).words == words


@pytest.mark.parametrize(("rule", "value", "words"), [("simple", 19.0, "below"), ("simple", 21.0, "within"), ("guarded", 25.0, "not shown within"), ("guarded", 31.0, "within"), ("three_way", 9.0, "below")])
def test_a_lower_limit(rule: str, value: float, words: str) -> None:
    assert judge(rule, Result(value, 5.0), Limits(lower=20.0)).words == words


def test_a_two_sided_limit() -> None:
    limits = Limits(lower=5.0, upper=10.0)
    assert [judge("simple", Result(value, 0.1), limits).words for value in (4.0, 7.0, 11.0)] == ["outside", "within", "outside"]
    assert probability_of_conformity(Result(7.5, 1.25), limits) == pytest.approx(0.9545, abs=0.00005)   # ± 2 u


def test_a_subtraction_stops_at_zero_and_leaves_negatives() -> None:
    assert judge("subtract_percent_of_limit", Result(10.0, 1.0), Limits(upper=200.0), 20.0).compared == 0.0
    assert judge("subtract_percent_of_limit", Result(-3.0, 1.0), Limits(upper=200.0), 20.0).compared == -3.0


@pytest.mark.parametrize(("rule", "result", "limits", "typed", "error"), [
    ("nothing", Result(1.0, 0.1), Limits(upper=2.0), None, OutOfRange), ("guarded", Result(1.0), Limits(upper=2.0), None, Missing),
    ("subtract_percent_of_limit", Result(1.0, 0.1), Limits(upper=2.0), None, Missing), ("subtract_capped", Result(1.0, 0.1), Limits(upper=2.0), 120.0, OutOfRange),
    ("subtract_capped", Result(1.0, 0.1), Limits(upper=2.0), -5.0, OutOfRange), ("subtract_percent_of_limit", Result(1.0, 0.1), Limits(lower=2.0), 20.0, OutOfRange),
    ("simple", Result(1.0, 0.1), Limits(lower=3.0, upper=2.0), None, OutOfRange), ("simple", Result(float("nan")), Limits(upper=2.0), None, OutOfRange)])
def test_what_cannot_be_judged_says_why(rule, result, limits, typed, error) -> None:
    with pytest.raises(error) as caught:
        judge(rule, result, limits, typed)
    assert isinstance(caught.value, CoreError) and (caught.value.hint or "number" in caught.value.message)


def test_every_rule_has_a_title_a_sentence_and_a_source() -> None:
    from gasbasis import facts
    assert all(rule.title and rule.help and facts.source(rule.source) for rule in RULES.values())


# --- through the one door ---

STACK = {"hold": "NOx 142 ± 5 ppmv (k=2) as NO2, dry", "gas": "9.2 % O2 dry, ambient O2 21 %", "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2"}


def verdict(limit: str, rule: str = "", **settled: str) -> dict:
    choices = {**({"limit.decision_rule": rule} if rule else {}), **settled}
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": {**STACK, "limit": limit, "settled": choices}})))
    assert reply["ok"], reply
    return reply["answer"]


def test_the_result_goes_onto_the_limits_basis() -> None:
    # 444.5 mg/m3 at 3 % O2 is 444.5 (21 - 11)/(21 - 3) = 246.9 at 11 %: within 250 there, above it at 3 %
    assert verdict("250 mg/m3", "simple")["verdict"]["words"] == "above"
    there = verdict("250 mg/m3 at 11 % O2", "simple")["verdict"]
    assert there["words"] == "within" and there["values_text"] == "246.9"


def test_no_rule_is_taken_by_default() -> None:
    record = verdict("450 mg/m3")["verdict"]
    assert record["rule"] is None and record["sentence"] == "depends on: decision rule"


def test_the_display_at_the_limit_leads_back_to_the_limit() -> None:
    record = verdict("450 mg/m3", "simple")["verdict"]["turned_round"]
    held = record["upper_text"]
    sheet = {**STACK, "hold": f"NOx {held} ppmv as NO2, dry"}
    value = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet})))["answer"]["figure"]["value"]
    assert value == pytest.approx(450, rel=5e-4)               # the display reading is printed to four digits


def test_with_open_doubts_the_verdict_under_each_reading() -> None:
    sheet = {"hold": "CO 50 ppmv at 9 % O2", "gas": "10 % H2O, ambient O2 21 %", "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2"}
    def judged(limit: str) -> str:
        full = {**sheet, "limit": limit, "settled": {"limit.decision_rule": "simple"}}
        return json.loads(answer(json.dumps({"task": "restate", "sheet": full})))["answer"]["verdict"]["sentence"]
    assert judged("200 mg/m3") == "within the limit whatever was meant"
    assert judged("20 mg/m3") == "above the limit whatever was meant"
    assert judged("95 mg/m3").startswith("depends on")


def test_a_result_below_detection_is_never_above() -> None:
    sheet = {"hold": "Hg < 5 ug/m3 at 20 °C, 1 atm", "owe": "ug/m3 at 20 °C, 1 atm"}
    def words(limit: str) -> str:
        full = {**sheet, "limit": limit, "settled": {"limit.decision_rule": "simple"}}
        return json.loads(answer(json.dumps({"task": "restate", "sheet": full})))["answer"]["verdict"]["words"]
    assert words("6 ug/m3") == "within" and words("4 ug/m3") == "not decided"

"""Rounding, results below detection, negatives and limits said twice, each by a named rule; expected verdicts worked out by hand."""
from __future__ import annotations

import json

import pytest

from gasbasis.answer import answer


def verdict(limit: str, hold: str, owe: str = "mg/m3 at 20 °C, 1 atm", rule: str = "simple", **choices: str) -> dict:
    settled = {"limit.decision_rule": rule, **{f"limit.{name}": value for name, value in choices.items()}}
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": {"hold": hold, "owe": owe, "limit": limit, "settled": settled}})))
    return reply["answer"]["verdict"] if reply["ok"] else reply["error"]


def held(value: str) -> str:
    return f"SO2 {value} mg/m3 at 20 °C, 1 atm"


@pytest.mark.parametrize(("limit", "value", "rounding", "compared", "words"), [
    ("200 mg/m3", "200.4", "none", "200.4", "above"),
    ("200 mg/m3", "200.4", "decimals", "200", "within"), ("200 mg/m3", "200.5", "decimals", "201", "above"),
    ("200 mg/m3", "200.5", "even", "200", "within"), ("201 mg/m3", "201.5", "even", "202", "above"),
    ("200 mg/m3", "200.9", "truncated", "200", "within"), ("0.20 mg/m3", "0.209", "truncated", "0.2", "within"),
    ("0.20 mg/m3", "0.2049", "decimals", "0.2", "within"), ("0.20 mg/m3", "0.205", "decimals", "0.21", "above"),
    ("9.5 mg/m3", "9.5491", "digits", "9.5", "within"), ("12 mg/m3", "12.49", "digits", "12", "within"), ("12 mg/m3", "12.51", "digits", "13", "above")])
def test_rounding_by_a_named_rule(limit: str, value: str, rounding: str, compared: str, words: str) -> None:
    record = verdict(limit, held(value), rounding=rounding)
    assert (record["decision"]["compared_text"], record["words"]) == (compared, words)
    assert record["decision"]["raw_text"] == record["decision"]["counted_text"]
    assert next(choice for choice in record["choices"] if choice["id"] == "limit.rounding")["chosen"] == rounding


def test_rounding_comes_after_the_subtraction() -> None:
    # 250.9 less 20 % of the limit of 200 is 210.9; cut to 210
    record = verdict("200 mg/m3", held("250.9"), rule="subtract_percent_of_limit", rounding="truncated", decision_number="20")
    assert record["decision"]["compared_text"] == "210" and record["words"] == "above"


@pytest.mark.parametrize(("rule", "words"), [("bound", "not decided"), ("half", "within"), ("zero", "within")])
def test_a_result_below_detection(rule: str, words: str) -> None:
    record = verdict("4 mg/m3", held("< 5"), below_detection=rule)
    assert record["words"] == words and [choice["id"] for choice in record["choices"]] == ["limit.rounding", "limit.below_detection"]
    assert verdict("2 mg/m3", held("< 5"), below_detection="half")["words"] == "above"


def test_negatives_are_kept_unless_a_rule_sets_them_to_zero() -> None:
    assert verdict("4 mg/m3", held("-5"))["decision"]["compared_text"] == "−5"
    assert verdict("4 mg/m3", held("-5"), negative="zero")["decision"]["compared_text"] == "0"
    assert verdict("at least 0 mg/m3", held("-0.1"))["words"] == "below"


def test_an_unknown_choice_is_refused() -> None:
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": {"hold": held("5"), "owe": "mg/m3 at 20 °C, 1 atm", "limit": "4 mg/m3",
                                                                        "settled": {"limit.rounding": "up"}}})))["answer"]
    assert reply["verdict"] is None and "truncated" in reply["problems"][0]["hint"] and reply["figure"]


# --- 10 ppm said beside mg/m3: at 20 °C and 1 atm 1 ppm of H2S is 1.4168 mg/m3 (34.08/24.055), so 10 ppm are 14.17 mg/m3 ---

@pytest.mark.parametrize(("limit", "hold", "binding", "words"), [
    ("10 ppmv (15 mg/m3)", "H2S 9.9 ppmv", "at most 10 ppm by volume binds", "within"),
    ("10 ppmv (15 mg/m3)", "H2S 10.2 ppmv", "at most 10 ppm by volume binds", "above"),      # 14.45 mg/m3: within the second, above the first
    ("10 ppmv (14 mg/m3)", "H2S 9.95 ppmv", "at most 14 mg/m³ binds", "above"),              # 14.10 mg/m3: within the first, above the second
    ("at least 10 ppmv (14 mg/m3)", "H2S 9.95 ppmv", "at least 10 ppm by volume binds", "below")])
def test_a_limit_said_twice(limit: str, hold: str, binding: str, words: str) -> None:
    record = verdict(limit, hold)
    assert binding in record["second"]["binding"] and "14.17" in record["second"]["binding"] and record["words"] == words


def test_which_binds_may_depend_on_what_was_meant() -> None:
    record = verdict("10 ppm (15 mg/m3)", "H2S 9.9 ppmv")
    assert "depends on the open doubts" in record["second"]["binding"]
    assert verdict("10 ppm (15 mg/m3)", "H2S 9.9 ppmv", parts_by="volume")["second"]["binding"].endswith("at most 10 ppm by volume binds.")


def test_the_doubts_of_the_limit_show_their_verdicts_and_can_be_settled() -> None:
    record = verdict("10 ppm", "H2S 9.9 ppmv")
    doubt, = record["doubts"]
    assert doubt["id"] == "limit.parts_by" and doubt["decides"] and "Limit" in doubt["question"]
    assert {reading["id"]: reading["words"] for reading in doubt["readings"]} == {"volume": ["within"], "mass": ["above"], "mass_by_volume": ["within"]}
    assert record["sentence"] == "depends on: parts by" and verdict("10 ppm", "H2S 9.9 ppmv", parts_by="volume")["words"] == "within"


def test_a_limit_of_the_wrong_kind_says_so() -> None:
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": {"hold": held("5"), "owe": "mg/m3 at 20 °C, 1 atm", "limit": "20 °C"}})))["answer"]
    assert reply["figure"] and any(problem["field"].startswith("limit") for problem in reply["problems"])

"""Doubts, carried silence, missing inputs and errors of the whole restatement, through the one door."""
from __future__ import annotations

import json

import pytest

from gasbasis.answer import answer


def restate(hold: str, owe: str, gas: str = "", usual: bool = False, **settled: str) -> dict:
    choices = {name.replace("__", "."): reading for name, reading in settled.items()}
    request = {"task": "restate", "usual": usual, "sheet": {"hold": hold, "owe": owe, "gas": gas, "settled": choices}}
    reply = json.loads(answer(json.dumps(request)))
    assert reply["ok"], reply
    return reply["answer"]


def open_doubts(result: dict) -> list[str]:
    return [doubt["id"] for doubt in result["doubts"] if doubt["state"] == "open"]


# --- each doubt: raised, and not raised ---

RAISED = [
    ("hold.parts_by", dict(hold="SO2 1 ppm", owe="mg/m3 at 20 °C, 1 atm"), dict(hold="SO2 1 ppmv", owe="mg/m3 at 20 °C, 1 atm")),
    ("owe.parts_by", dict(hold="SO2 1 umol/mol", owe="ppb"), dict(hold="SO2 1 umol/mol", owe="ppb by volume")),
    ("hold.conditions", dict(hold="SO2 35 mg/m3", owe="ppm by volume"), dict(hold="SO2 35 mg/m3 at 20 °C, 1 atm", owe="ppm by volume")),
    ("hold.conditions", dict(hold="SO2 35 mg/Nm3", owe="ppm by volume"), dict(hold="SO2 35 mg/Nm3", owe="ug/Nm3")),
    ("owe.conditions", dict(hold="SO2 1 ppmv", owe="mg/m3"), dict(hold="SO2 1 ppmv", owe="ppb by volume")),
    ("hold.pressure", dict(hold="SO2 35 mg/m3 at 20 °C", owe="mg/m3 at 0 °C, 101.3 kPa"), dict(hold="SO2 35 mg/m3 at 20 °C, 1 atm", owe="mg/m3 at 0 °C, 101.3 kPa")),
    ("hold.temperature", dict(hold="SO2 35 mg/m3 at 1 atm", owe="ppm by volume"), dict(hold="SO2 35 mg/m3 at 1 atm, 20 °C", owe="ppm by volume")),
    ("hold.water", dict(hold="CO 12 ppm", owe="ppm dry", gas="10 % H2O"), dict(hold="CO 12 ppm", owe="ppm")),
    ("owe.water", dict(hold="CO 12 ppm dry", owe="ppm", gas="10 % H2O"), dict(hold="CO 12 ppm dry", owe="ppm dry")),
    ("owe.reported_as", dict(hold="NOx 100 ppmv", owe="mg/m3 at 0 °C, 1 atm"), dict(hold="NOx 100 ppmv", owe="mg/m3 as NO2 at 0 °C, 1 atm")),
    ("hold.reported_as", dict(hold="NOx 100 mg/m3 at 0 °C, 1 atm", owe="ppm by volume"), dict(hold="NOx 100 ppmv", owe="ppb by volume")),
    ("gas.matrix_gas", dict(hold="Hg 1 ppbw", owe="ug/m3 at 20 °C, 1 atm"), dict(hold="Hg 1 ppbw in nitrogen", owe="ug/m3 at 20 °C, 1 atm")),
    ("gas.ambient_oxygen", dict(hold="CO 50 mg/m3 dry, measured at 9 % O2", owe="mg/m3 dry, 11 % O2"),
     dict(hold="CO 50 mg/m3 dry, measured at 9 % O2", owe="mg/m3 dry, 11 % O2", gas="ambient O2 21 %")),
    ("hold.oxygen_meaning", dict(hold="CO 50 mg/m3 dry at 9 % O2", owe="mg/m3 dry, 11 % O2", gas="ambient O2 21 %, 10 % O2 dry"),
     dict(hold="CO 50 mg/m3 dry corrected to 9 % O2", owe="mg/m3 dry, 11 % O2", gas="ambient O2 21 %")),
    ("owe.oxygen", dict(hold="CO 50 mg/m3 dry corrected to 3 % O2", owe="mg/m3 dry", gas="9 % O2 dry, ambient O2 21 %"),
     dict(hold="CO 50 mg/m3 dry corrected to 3 % O2", owe="mg/m3 dry, 3 % O2")),
    ("gas.oxygen_water", dict(hold="CO 50 mg/m3 dry", owe="mg/m3 dry, 11 % O2", gas="9 % O2, 10 % H2O, ambient O2 21 %"),
     dict(hold="CO 50 mg/m3 dry", owe="mg/m3 dry, 11 % O2", gas="9 % O2 dry, ambient O2 21 %")),
    ("hold.unit_count", dict(hold="H2S 3 lb/Mscf", owe="lb/MMscf"), dict(hold="H2S 3 lb/MMscf", owe="gr/100 scf")),
    ("hold.pressure_print", dict(hold="SO2 35 mg/m3 at 273.15 K, 101.3 kPa", owe="mg/m3 at 273.15 K, 101.325 kPa"),
     dict(hold="SO2 35 mg/m3 at 273.15 K, 101.3 kPa", owe="mg/m3 at 273.15 K, 101.3 kPa")),
    ("hold.temperature_print", dict(hold="SO2 35 mg/m3 at 293 K, 101.3 kPa", owe="mg/m3 at 293.15 K, 101.3 kPa"),
     dict(hold="SO2 35 mg/m3 at 293 K, 101.3 kPa", owe="mg/m3 at 273.15 K, 101.3 kPa")),
    ("gas.barometer_meaning", dict(hold="SO2 35 mg/Am3", owe="mg/m3 at 0 °C, 1 atm", gas="20 °C, gauge 1 kPa, barometer 1013 hPa, altitude 420 m"),
     dict(hold="SO2 35 mg/Am3", owe="mg/m3 at 0 °C, 1 atm", gas="20 °C, gauge 1 kPa, barometer 1013 hPa")),
    ("gas.pressure_said", dict(hold="Hg 100 ng/Am3", owe="ng/m3 at 15 °C, 101.325 kPa", gas="15 °C, 62 bar, barometer 1 bar"),
     dict(hold="Hg 100 ng/Am3", owe="ng/m3 at 15 °C, 101.325 kPa", gas="15 °C, 62 bara")),
    ("gas.pressure_column", dict(hold="SO2 35 mg/Am3", owe="mg/m3 at 0 °C, 1 atm", gas="20 °C, gauge 30 inHg, barometer 1013 hPa"),
     dict(hold="SO2 35 mg/Am3", owe="mg/m3 at 0 °C, 1 atm", gas="20 °C, gauge 30 kPa, barometer 1013 hPa")),
    ("hold.ppt", dict(hold="CO2 4 ppt", owe="% by volume"), dict(hold="SF6 4 ppt", owe="ppb")),
    ("hold.number", dict(hold="Hg 1,234 ng/m3", owe="pg/L"), dict(hold="Hg 1,23 ng/m3", owe="pg/L")),
]


@pytest.mark.parametrize(("doubt", "case", "without"), RAISED, ids=[f"{row[0]}: {row[1]['hold']}" for row in RAISED])
def test_a_doubt_is_raised(doubt: str, case: dict, without: dict) -> None:
    result = restate(**case)
    record = next(record for record in result["doubts"] if record["id"] == doubt)
    assert record["state"] == "open" and len(record["readings"]) >= 2
    assert all(reading["source"] for reading in record["readings"])
    assert result["figure"] is None


@pytest.mark.parametrize(("doubt", "case", "without"), RAISED, ids=[f"{row[0]}: {row[2]['hold']}" for row in RAISED])
def test_a_doubt_is_not_raised(doubt: str, case: dict, without: dict) -> None:
    assert doubt not in [record["id"] for record in restate(**without)["doubts"]]


@pytest.mark.parametrize("text", ["O2 9 %", "CO2 12 %", "H2O 14 %"])
def test_oxygen_carbon_dioxide_and_water_in_percent_are_never_asked(text: str) -> None:
    assert restate(text, "mol/mol")["figure"]


def test_spread_settle_and_take_the_usual() -> None:
    case = dict(hold="NOx 142 ppm as NO2, dry", gas="9,2 % O2 dry, ambient O2 21 %", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2")
    result = restate(**case)
    assert result["sentence"] == "depends on: parts by" and result["spread"]["complete"]
    by_volume = 142e-6 * 101300 * 46.005 / (8.314462618 * 273.15) * 1e3 * (21 - 3) / (21 - 9.2)     # by hand
    doubt = next(doubt for doubt in result["doubts"] if doubt["id"] == "hold.parts_by")
    assert next(reading for reading in doubt["readings"] if reading["id"] == "volume")["figure"]["low"] == pytest.approx(by_volume, rel=1e-6)
    assert result["spread"]["low"]["value"] <= by_volume <= result["spread"]["high"]["value"]
    settled = restate(**case, hold__parts_by="volume")
    usual = restate(**case, usual=True)
    assert settled["figure"]["value"] == usual["figure"]["value"] == pytest.approx(by_volume, rel=1e-6)
    assert [doubt["state"] for doubt in usual["doubts"]] == ["settled"]


def test_mercury_has_no_usual_parts() -> None:
    result = restate("Hg 1 ppb", "ug/m3 at 20 °C, 1 atm", usual=True)
    assert result["figure"] is None and "hold.parts_by" in open_doubts(result)


def test_the_most_telling_doubt_comes_first() -> None:
    result = restate("CO 50 ppm", "mg/m3 at 0 °C, 101.3 kPa, dry", gas="10 % H2O")
    assert open_doubts(result) == ["hold.parts_by", "hold.water"]


def test_a_doubt_without_visible_effect_is_listed_quietly() -> None:
    # read as measured or as corrected, a dry value at 9 % goes to 11 % by the same factor
    result = restate("CO 50 mg/m3 dry at 9 % O2", "mg/m3 dry, 11 % O2", gas="ambient O2 21 %")
    assert [(doubt["id"], doubt["state"]) for doubt in result["doubts"]] == [("hold.oxygen_meaning", "calm")]
    assert result["figure"]["value"] == pytest.approx(50 * 10 / 12)


# --- silence is carried over, nothing unused is asked for ---

def test_silence_on_both_sides_is_carried_and_printed() -> None:
    figure = restate("Hg 1 ppb v/v", "ug/m3 at 20 °C, 1 atm")["figure"]
    assert "water: not stated, as held" in figure["basis"] and "ideal gas" in figure["basis"]
    assert "293.15 K, 1 atm" in figure["basis"]


@pytest.mark.parametrize(("hold", "owe", "gas"), [
    ("1 ng/m3", "pg/L", ""), ("dust 4.2 mg/m3 at 20 °C, 1 atm", "mg/m3 at 0 °C, 101.3 kPa", ""), ("1 ppm", "ppb", ""),
    ("CO 50 mg/m3 dry", "mg/m3 dry", ""), ("CO 50 mg/m3 dry corrected to 3 % O2", "mg/m3 dry, 11 % O2", "ambient O2 21 %")])
def test_nothing_is_asked_for_that_is_not_used(hold: str, owe: str, gas: str) -> None:
    result = restate(hold, owe, gas)
    assert result["figure"] and not result["doubts"]


def test_never_a_bare_normal_or_standard_in_our_output() -> None:
    result = restate("SO2 35 mg/Nm3", "mg/m3 at 20 °C, 1 atm", usual=True, hold__conditions="273.15K-101.3kPa")
    assert result["figure"] and "N" not in result["figure"]["unit_text"] and "293.15 K" in result["figure"]["text"]


# --- what is missing or impossible: the field, the need, the cure ---

@pytest.mark.parametrize(("case", "field", "message"), [
    (dict(hold="", owe="mg/m3"), "hold", "needed"),
    (dict(hold="1 ppm", owe=""), "owe", "needed"),
    (dict(hold="CO", owe="ppm"), "hold.value", "value with its unit"),
    (dict(hold="1 ppm", owe="dry"), "owe.unit", "unit is needed"),
    (dict(hold="1 ppmv", owe="mg/m3 at 20 °C, 1 atm"), "hold.species", "species is needed"),
    (dict(hold="CO 1 ppmv wet", owe="ppm by volume, dry"), "gas.water_content", "Water content is needed"),
    (dict(hold="CO 1 ppmv dry", owe="ppm by volume, dry, 3 % O2", gas="ambient O2 21 %"), "gas.oxygen", "measured oxygen is needed"),
    (dict(hold="CO 1 ppmv", owe="mg/m3 at 0 K, 1 atm"), "owe.temperature", "absolute zero"),
    (dict(hold="CO 1 ppmv", owe="mg/m3 at 20 °C, -5 kPa"), "owe.pressure", "above zero"),
    (dict(hold="CO 1 ppmv wet", owe="ppm by volume, dry", gas="100 % H2O"), "gas.water_content", "not including, 100 %"),
    (dict(hold="CO 1 ppmv dry", owe="ppm by volume, dry, 3 % O2", gas="21 % O2 dry, ambient O2 20.9 %"), "gas.oxygen", "below the ambient oxygen"),
    (dict(hold="Hg 1 ppbw", owe="ug/m3 at 20 °C, 1 atm", gas="CH4 60, N2 10"), "gas.matrix_gas", "adds up to 70 %"),
    (dict(hold="Hg 1 ppbw", owe="ug/m3 at 20 °C, 1 atm", gas="in combustion gas, 9 % O2 dry"), "gas.carbon_dioxide", "carbon dioxide"),
    (dict(hold="NO 1 ppmv", owe="SO2 mg/m3 at 20 °C, 1 atm"), "owe.species", "You hold"),
    (dict(hold="CO 1 Pa", owe="ppm by volume"), "hold.total_pressure", "total pressure"),
    (dict(hold="dust 3 mg/m3 at 0 °C, 1 atm", owe="ppm by volume"), "hold.reported_as", "no molar mass"),
    (dict(hold="CH4 1 ppmv as N", owe="ppm by volume as C"), "owe.reported_as", "share"),
])
def test_a_problem_names_field_need_and_cure(case: dict, field: str, message: str) -> None:
    result = restate(**case)
    assert result["figure"] is None
    problem = next((problem for problem in result["problems"] if problem["field"].startswith(field.partition(".")[0]) and message in problem["message"]), None)
    assert problem, result["problems"]
    assert problem["field"] == field and problem["hint"]


def test_a_value_below_detection_stays_below() -> None:
    figure = restate("Hg < 0.5 ng/m3", "pg/L")["figure"]
    assert figure["number_text"] == "< 0.5000"


def test_a_negative_value_is_kept() -> None:
    assert restate("CO -2 ppmv", "mg/m3 at 25 °C, 1 atm")["figure"]["value"] < 0


def test_wet_oxygen_corrections_by_hand() -> None:
    result = restate("CO 100 ppmv wet", "ppm by volume, dry, 11 % O2", gas="20 % H2O, wet O2 8 %, ambient O2 21 %")
    assert result["figure"]["value"] == pytest.approx(100 / 0.8 * (21 - 11) / (21 - 8 / 0.8))


def test_uncorrect_then_correct_by_hand() -> None:
    result = restate("CO 100 mg/m3 dry corrected to 11 % O2", "mg/m3 dry", gas="9 % O2 dry, ambient O2 21 %", owe__oxygen="measured")
    assert result["figure"]["value"] == pytest.approx(100 * (21 - 9) / (21 - 11))


def test_the_working_adds_up_and_names_its_sources() -> None:
    result = restate("NOx 142 ppmv as NO2, dry", "mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2", gas="9,2 % O2 dry, ambient O2 21 %")
    steps = result["working"]
    product = 142.0
    for step in steps:
        assert step["source_text"] and step["formula_text"] and step["substitution_text"]
        assert all(entry["origin_text"] for entry in step["inputs"])
        product *= step["factor"]
    assert product == pytest.approx(result["figure"]["value"])


# --- a chosen rule-book ---

def with_rule(rule: str, usual: bool = True, **texts: str) -> dict:
    reply = json.loads(answer(json.dumps({"task": "restate", "usual": usual, "sheet": {**texts, "rule_book": rule}})))
    assert reply["ok"], reply
    return reply["answer"]


def test_a_rule_book_supplies_usual_readings_with_its_clause() -> None:
    result = with_rule("eu_incineration", hold="CO 50 mg/Nm3, dry, measured at 9 % O2", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 11 % O2")
    assert result["figure"]["value"] == pytest.approx(50 * (21 - 11) / (21 - 9))
    usual = [reading["usual_because"] for doubt in result["doubts"] for reading in doubt["readings"] if reading["id"] == doubt["chosen"]]
    assert len(usual) == 2 and all("2010/75/EU" in because for because in usual)


def test_a_rules_own_molar_volume_is_used_and_its_difference_shown() -> None:
    # 78.114 / 24.45 by hand; exact 24.4654 L/mol
    result = with_rule("us_workplace_air", hold="benzene 1 ppm", owe="mg/m3")
    assert result["figure"]["value"] == pytest.approx(78.114 / 24.45, rel=1e-5)
    assert any("−0.063 %" in step["note"] for step in result["working"])
    elsewhere = with_rule("us_workplace_air", hold="benzene 1 ppm", owe="mg/m3 at 20 °C, 1 atm")
    assert elsewhere["figure"]["value"] == pytest.approx(78.114 / 24.05512, rel=1e-5)


def test_a_one_sided_rule_corrects_only_above_its_reference() -> None:
    text = dict(owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 11 % O2", gas="ambient O2 21 %")
    below = with_rule("eu_incineration_hazardous", hold="CO 50 mg/m3 dry at 273.15 K, 101.3 kPa, measured at 9 % O2", **text)
    above = with_rule("eu_incineration_hazardous", hold="CO 50 mg/m3 dry at 273.15 K, 101.3 kPa, measured at 13 % O2", **text)
    assert below["figure"]["value"] == 50 and any(step["title"] == "No oxygen correction" for step in below["working"])
    assert above["figure"]["value"] == pytest.approx(50 * 10 / 8)


def test_a_diluent_cap_takes_the_place_of_a_higher_oxygen() -> None:
    result = with_rule("us_part_75_boiler", hold="SO2 50 ppmv dry", gas="17 % O2 dry", owe="ppm by volume, dry, 3 % O2")
    assert result["figure"]["value"] == pytest.approx(50 * (20.9 - 3) / (20.9 - 14))


def test_near_ambient_oxygen_is_warned_of() -> None:
    result = restate("CO 50 mg/m3 dry", "mg/m3 dry, 11 % O2", gas="19.5 % O2 dry, ambient O2 21 %")
    assert result["figure"] and "multiplies every error" in result["warnings"][0]


def test_an_unknown_rule_book_is_named() -> None:
    assert "There is no rule-book 'nowhere'" in with_rule("nowhere", hold="CO 1 ppmv", owe="ppb by volume")["problems"][0]["message"]


def test_too_many_combinations_are_tried_one_at_a_time_and_said_so() -> None:
    sheet = {"hold": "CO 50 ppm at 9 % O2", "gas": "12 % H2O", "owe": "mg/m3, 11 % O2"}
    quick = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet, "quick": True})))["answer"]["spread"]
    whole = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet})))["answer"]["spread"]
    assert not quick["complete"] and whole["complete"] and quick["counted"] < whole["counted"] <= 4096
    assert whole["low"]["value"] <= quick["low"]["value"] <= whole["low"]["value"] * 1.2
    assert whole["high"]["value"] >= quick["high"]["value"] >= whole["high"]["value"] / 1.2


# --- challenge a clause: a limit with nothing held ---

def clause(limit: str, owe: str, **settled: str) -> dict:
    choices = {name.replace("__", "."): reading for name, reading in settled.items()}
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": {"limit": limit, "owe": owe, "settled": choices}})))
    assert reply["ok"], reply
    return reply["answer"]


def test_a_clause_shows_all_it_could_mean() -> None:
    # 10 ppb of mercury at 20 degC and 1 atm: 83.4 by volume, 11.6 by mass in nitrogen, 10 000 mass in volume (common practice)
    result = clause("not more than 10 ppb mercury", "ug/m3 at 20 °C, 1 atm")
    assert result["challenge"] and result["sentence"].startswith("depends on: parts by")
    doubt = next(doubt for doubt in result["doubts"] if doubt["id"] == "limit.parts_by")
    assert "Limit" in doubt["question"]
    low = {reading["id"]: reading["figure"]["low"] for reading in doubt["readings"]}
    assert low["volume"] == pytest.approx(83.4, abs=0.05) and low["mass"] == pytest.approx(11.65, abs=0.05)
    assert result["spread"]["high"]["value"] > 9000
    settled = clause("not more than 10 ppb mercury", "ug/m3 at 20 °C, 1 atm", limit__parts_by="volume")
    assert settled["figure"]["value"] == pytest.approx(83.4, abs=0.05)


def test_a_clause_that_cannot_be_read_says_so_at_the_limit() -> None:
    result = clause("not more than some mercury", "ug/m3 at 20 °C, 1 atm")
    assert result["problems"] and all(problem["field"].startswith("limit") for problem in result["problems"])


def test_at_line_pressure_the_volume_may_be_the_actual_one() -> None:
    # 62 bar and 15 degC: an actual cubic metre holds some 61-fold what a reference cubic metre does
    result = restate("Hg 100 ng/m3", "ng/m3 at 15 °C, 101.325 kPa", gas="15 °C, 62 bar abs")
    doubt = next(doubt for doubt in result["doubts"] if doubt["id"] == "hold.conditions")
    ranges = {reading["id"]: reading["figure"]["low"] for reading in doubt["readings"]}
    assert ranges["actual"] == pytest.approx(100 * 101325 / 62e5) and ranges["288.15K-101.325kPa"] == 100

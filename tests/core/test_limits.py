"""Limits and contract clauses as people write them. Expected values are read off the texts by hand."""
from __future__ import annotations

from decimal import Decimal

import pytest

from gasbasis.language.species import find
from gasbasis.language.statement import read_statement

# text -> (direction, value, upper end, unit); species and the rest where the row names them
ONE_SIDED = [
    ("not more than 10 ppb mercury", "upper", "10", "ppb", dict(species="Hg")),
    ("max. 200 mg/Nm3", "upper", "200", "mg/m3", dict(conditions_word="normal")),
    ("max.200 mg/Nm3", "upper", "200", "mg/m3", {}),
    ("Max 200 mg/Nm3 dry", "upper", "200", "mg/m3", dict(water="dry")),
    ("<= 4 ppm H2S", "upper", "4", "ppm", dict(species="H2S")),
    ("<=4 ppm H2S", "upper", "4", "ppm", {}),
    ("< 4 ppm", "upper", "4", "ppm", {}),
    ("≤ 4 ppm", "upper", "4", "ppm", {}),
    ("O2 ≤ 0.2 %", "upper", "0.2", "%", dict(species="O2", parts_by="volume")),
    ("CO2 not more than 2 mol%", "upper", "2", "%", dict(parts_by="volume")),
    ("shall not exceed 0.25 gr/100 scf", "upper", "0.25", "gr/(100 ft3)", dict(conditions_word="standard")),
    ("The H2S content shall not exceed 0.25 grain per 100 scf.", "upper", "0.25", "gr/(100 ft3)", dict(species="H2S")),
    ("The gas shall contain no more than 4 ppmv H2S", "upper", "4", "ppm", dict(species="H2S", parts_by="volume")),
    ("does not contain more than 10 ppb Hg", "upper", "10", "ppb", dict(species="Hg")),
    ("not to exceed 10 ppbv", "upper", "10", "ppb", dict(parts_by="volume")),
    ("10 ppm maximum", "upper", "10", "ppm", {}),
    ("10 ppm or less", "upper", "10", "ppm", {}),
    ("200 mg/Nm3, not to be exceeded", "upper", "200", "mg/m3", {}),
    ("must be below 10 ppm", "upper", "10", "ppm", {}),
    ("under 10 ppm under normal conditions", "upper", "10", "ppm", dict(conditions_word="normal")),
    ("emissions must not exceed 30 mg/Nm3 as a daily average", "upper", "30", "mg/m3", dict(averaging="daily average")),
    ("not more than 50 mg/m3 averaged over 8 h", "upper", "50", "mg/m3", dict(averaging="averaged over 8 h")),
    ("not more than approx. 10 ppm", "upper", "10", "ppm", dict(approximate=True)),
    ("The total mercury concen-\ntration shall not\nexceed 10\nug/Nm3, dry", "upper", "10", "ug/m3", dict(species="Hg", water="dry")),
    ("at least 90 %", "lower", "90", "%", {}),
    ("≥ 90 % CH4", "lower", "90", "%", dict(species="CH4")),
    ("not less than 5 ppm", "lower", "5", "ppm", {}),
    ("min. 20 ppm", "lower", "20", "ppm", {}),
    ("20 ppm or more", "lower", "20", "ppm", {}),
    ("limit value 50 mg/m3 (8-h TWA)", None, "50", "mg/m3", dict(averaging="8-h TWA")),
    ("approx. 10 ppm", None, "10", "ppm", dict(approximate=True)),
    ("35mg/m3", None, "35", "mg/m3", {}),
]


@pytest.mark.parametrize(("text", "direction", "value", "unit", "rest"), ONE_SIDED, ids=[row[0] for row in ONE_SIDED])
def test_a_limit_bounds_on_one_side(text: str, direction: str | None, value: str, unit: str, rest: dict) -> None:
    limit, problems = read_statement(text, "limit")
    assert not problems, [problem.message for problem in problems]
    assert (limit.limit_direction, limit.value.number.decimal, limit.unit.id) == (direction, Decimal(value), unit)
    assert limit.upper_value is None and limit.second_value is None and not limit.value.number.below
    for field, what in rest.items():
        assert getattr(limit, field) == (find(what) if field == "species" else what)


TWO_SIDED = [
    ("5-10 ppm", "5", "10", "ppm"), ("5 – 10 ppm CO", "5", "10", "ppm"), ("5..10 ppm", "5", "10", "ppm"),
    ("between 5 and 10 ppm", "5", "10", "ppm"), ("from 5 to 10 ppm", "5", "10", "ppm"), ("5 ppm to 10 ppm", "5", "10", "ppm"),
    ("0,5-1,5 mg/m3 SO2", "0.5", "1.5", "mg/m3"), ("-5-10 ppm", "-5", "10", "ppm"), ("1e-3-2e-3 ppm", "0.001", "0.002", "ppm"),
    ("900 ppb to 1 ppm", "900", "1000", "ppb"), ("not less than 5 and not more than 10 ppm", "5", "10", "ppm"),
    ("at least 5 ppm, at most 10 ppm", "5", "10", "ppm"), ("maximum 10 ppm, minimum 5 ppm", "5", "10", "ppm"),
    ("10 ppmv - 20 ppmv", "10", "20", "ppm"),
]


@pytest.mark.parametrize(("text", "low", "high", "unit"), TWO_SIDED, ids=[row[0] for row in TWO_SIDED])
def test_a_range_is_a_two_sided_limit(text: str, low: str, high: str, unit: str) -> None:
    limit, problems = read_statement(text, "limit")
    assert not problems, [problem.message for problem in problems]
    assert (limit.value.number.decimal, limit.upper_value.number.decimal) == (Decimal(low), Decimal(high))
    assert limit.value.unit.id == limit.upper_value.unit.id == limit.unit.id == unit and limit.limit_direction is None


@pytest.mark.parametrize("text", ["5-10 ppm", "between 5 and 10 ppm", "900 ppb to 1 ppm", "CO 5 – 10 ppm dry"])
@pytest.mark.parametrize("side", ["hold", "owe"])
def test_elsewhere_a_range_is_refused_in_its_place(text: str, side: str) -> None:
    statement, problems = read_statement(text, side)
    assert statement.value is None and len(problems) == 1
    assert "is a range; give one value" in problems[0].message and problems[0].hint and problems[0].field == side
    assert text[slice(*problems[0].span)] == text.removeprefix("CO ").removesuffix(" dry")


@pytest.mark.parametrize(("text", "second"), [
    ("10 ppm (15 mg/m3)", "15 mg/m3"), ("10 ppm / 15 mg/m3", "15 mg/m3"), ("20 mg/m³ (15 ppm) (8 h)", "15 ppm"),
    ("0.2 mg/m3 (200 ug/m3)", "200 ug/m3"), ("4 ppm = 4000 ppb", "4000 ppb")])
def test_a_limit_said_again_in_another_unit(text: str, second: str) -> None:
    limit, problems = read_statement(text, "limit")
    assert not problems and f"{limit.second_value.number.decimal} {limit.second_value.unit.id}" == second


REFUSED = [
    ("not more than mercury ppb", "no number", "not more than mercury ppb"),
    ("mercury", "no number", "mercury"),
    ("10 ppm 20 ppm", "second value", "20 ppm"),
    ("10 20 ppm", "has no unit", "10"),
    ("10 mg/m3 (15 mg/m3)", "second value", "15 mg/m3"),
    ("TWA 10 ppm; STEL 15 ppm", "second value", "15 ppm"),
    ("35mg", "is a mass", "35mg"),
    ("10-5 ppm", "runs from 10 to 5", "10-5 ppm"),
    ("5 ppm - 10 mg/m3", "do not compare", "5 ppm - 10 mg/m3"),
    ("1,234-2,345 mg/m3", "is 1.234 or 1234", "1,234-2,345 mg/m3"),
    ("10 ppb, unless agreed otherwise", "is not understood", "unless agreed otherwise"),
    ("max 10 ppm at 20-25 °C", "is a range", "20-25 °C"),
    ("max 10 ppm at least", "contradicts", "at least"),
]


@pytest.mark.parametrize(("text", "message", "place"), REFUSED, ids=[row[0] for row in REFUSED])
def test_what_a_limit_cannot_be_is_refused_in_its_place(text: str, message: str, place: str) -> None:
    _, problems = read_statement(text, "limit")
    assert any(message in problem.message and text[slice(*problem.span)] == place for problem in problems), [
        (problem.message, text[slice(*problem.span)]) for problem in problems]
    assert all(problem.hint and problem.field == "limit" for problem in problems)


@pytest.mark.parametrize("text", [row[0] for row in (*ONE_SIDED, *TWO_SIDED)])
def test_pieces_of_a_limit_lie_where_they_were_read(text: str) -> None:
    limit, _ = read_statement(text, "limit")
    assert limit.pieces and all(text[slice(*piece.span)] == piece.text for piece in limit.pieces)

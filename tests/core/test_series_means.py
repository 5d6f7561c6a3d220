"""Means, their rules, gaps, exceedances and mass. The expected values are plain arithmetic on invented readings, written out here."""
from __future__ import annotations

import math
import random
from fractions import Fraction

import pytest

from gasbasis.errors import CoreError, Missing
from gasbasis.series.layout import look
from gasbasis.series.means import Means
from gasbasis.series.rows import Lines, Rows
from gasbasis.series.settings import read_settings
from gasbasis.series.sums import ExactSum
from gasbasis.series.times import Clock
from gasbasis.series.windows import read_window

SAME = {"name": "X", "hold": "CO {x} mg/m3 at 273.15 K, 101.3 kPa, dry", "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry"}
OXYGEN = {"name": "X", "hold": "CO {x} mg/m3 at 273.15 K, 101.3 kPa, dry", "gas": "{o} % O2 dry, ambient O2 21 %", "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry, 11 % O2"}


def taken(lines, settings):
    content = "\n".join(lines).encode()
    given = read_settings({"usual": True, "time": {"stamp": "start", **settings.pop("time", {})}, "species": [settings.pop("species", SAME)], **settings})
    rows, found = Rows(look(content, given.file), given), []
    means = Means(rows, given, found.append)
    for block in rows.blocks(Lines([content], rows.layout.encoding)):
        means.take(block)
    means.finish()
    return rows, means, found


def minutes(values, day="2026-01-05", first=600):
    return ["t,x", *(f"{day} {(first + place) // 60:02d}:{(first + place) % 60:02d}:00,{value}" for place, value in enumerate(values))]


def windows(*names, **more):
    return {"means": {"windows": list(names), "order": "mean_of_corrected", **more}}


def test_a_mean_is_the_arithmetic_mean():
    _, _, found = taken(minutes([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 100, 200]), windows("10 min"))
    assert [mean.value for mean in found] == [5.5, 150.0] and [mean.count for mean in found] == [10, 2]


def test_mean_of_corrected_and_corrected_mean_differ_as_they_should():
    """At 11 % and 20 % oxygen, (21-11)/(21-O2): 50 -> 50, 10 -> 100: mean 75; the mean row 30 at 15.5 % -> 54.5454..."""
    lines = ["t,x,o", "2026-01-05 10:00,50,11", "2026-01-05 10:01,10,20"]
    _, _, found = taken(lines, {"species": OXYGEN, "means": {"windows": ["10 min"], "order": "mean_of_corrected"}})
    assert found[0].value == pytest.approx(75.0, rel=1e-12) and found[0].other == pytest.approx(300 / 5.5, rel=1e-12)
    assert found[0].difference_percent == pytest.approx(100 * (300 / 5.5 / 75 - 1), rel=1e-9)
    _, _, turned = taken(lines, {"species": OXYGEN, "means": {"windows": ["10 min"], "order": "corrected_mean"}})
    assert (turned[0].value, turned[0].other) == (found[0].other, found[0].value)


@pytest.mark.parametrize("rule, expected", [("zero", 4.0), ("half", 5.0), ("full", 6.0), ("leave_out", 8.0), (None, 8.0)])
def test_below_detection_by_rule(rule, expected):
    _, means, found = taken(minutes([8, "<4"]), {**windows("10 min"), **({"below": rule} if rule else {})})
    assert found[0].value == expected and found[0].other == pytest.approx(expected, rel=1e-12)
    assert means.ruled_out == (1 if rule in ("leave_out", None) else 0)


@pytest.mark.parametrize("rule, expected", [("keep", 3.0), ("zero", 4.0), ("leave_out", 8.0)])
def test_negatives_by_rule(rule, expected):
    assert taken(minutes([8, -2]), {**windows("10 min"), "negatives": rule})[2][0].value == expected


def test_a_mean_needs_the_data_capture_that_was_typed():
    values = [1] * 10 + [2] * 7
    _, means, found = taken(minutes(values), windows("10 min", capture_percent=75))
    assert [mean.enough for mean in found] == [True, False] and means.statistics[0][0].lacking == 1
    assert all(mean.enough for mean in taken(minutes(values), windows("10 min"))[2])


def test_gaps_are_found():
    lines = minutes([1] * 5) + minutes([1] * 5, first=630)[1:]
    _, means, _ = taken(lines, windows("60 min"))
    assert means.gap_count == 1 and means.gap_seconds == 25 * 60      # 10:04 to 10:30: stamps 10:05 to 10:29 are missing


def test_a_stamp_at_the_end_of_its_interval_belongs_to_the_window_before():
    _, _, found = taken(minutes([7, 1, 1], first=600), {**windows("60 min"), "time": {"stamp": "end"}})
    assert [(mean.value, mean.count) for mean in found] == [(7.0, 1), (1.0, 2)]


def test_rolling_means():
    _, _, found = taken(minutes([1] * 10 + [2] * 10 + [6] * 10), windows("rolling 20 min every 10 min"))
    assert [mean.value for mean in found] == [1.0, 1.5, 4.0]
    assert [mean.count for mean in found] == [10, 20, 20]


def test_runs_take_their_own_rows():
    _, _, found = taken(minutes(range(60)), windows("run A 2026-01-05 10:10 to 2026-01-05 10:20", "run B 2026-01-05 10:15 to 2026-01-05 10:25"))
    assert [(mean.value, mean.count) for mean in found] == [(14.5, 10), (19.5, 10)]


@pytest.mark.parametrize("rest, expected", [("unexposed", 12.0 * 4 / 8), ("as measured", 12.0 * 8 / 8)])
def test_eight_hour_mean_of_a_shift(rest, expected):
    """4 h at 12 mg/m3 in a shift of 8 h (reference period of 8 h: directive 98/24/EC, article 2)."""
    lines = ["t,x", *(f"2026-01-05 {6 + place // 60:02d}:{place % 60:02d},12" for place in range(240))]
    _, _, found = taken(lines, windows(f"shift 2026-01-05 06:00 to 2026-01-05 14:00, rest {rest}"))
    assert found[0].value == pytest.approx(expected, rel=1e-12)


@pytest.mark.native                     # the tables of time zones come on demand in the page
def test_a_day_with_a_clock_change_has_23_hours():
    lines = ["t,x", *(f"2026-03-29 {hour:02d}:00,1" for hour in range(24) if hour != 2)]
    _, _, found = taken(lines, {**windows("day"), "time": {"zone": "Europe/Vienna"}})
    assert found[0].count == 23 and found[0].expected == 23.0


@pytest.mark.native                     # the tables of time zones come on demand in the page
def test_the_hour_that_comes_twice_gives_two_means():
    hours = [0, 1, 2, 2, 3]
    lines = ["t,x", *(f"2026-10-25 {hour:02d}:{minute:02d},{place}" for place, hour in enumerate(hours) for minute in range(0, 60, 10))]
    rows, _, found = taken(lines, {**windows("60 min"), "time": {"zone": "Europe/Vienna"}})
    assert rows.tally.bad == 0 and [mean.value for mean in found] == [0, 1, 2, 3, 4]


def test_flow_weighting_and_mass():
    """10 mg/m3 at 100 m3/h and 40 at 300: weighted (10*100 + 40*300)/400 = 32.5; mass over two minutes (1000 + 12000) mg/h / 60 min/h."""
    lines = ["t,x,q", "2026-01-05 10:00,10,100", "2026-01-05 10:01,40,300"]
    flow = {"flow": {"column": "q", "unit": "m3/h", "basis": "273.15 K, 101.3 kPa, dry", "weighs": True}}
    _, means, found = taken(lines, {**windows("10 min"), **flow})
    assert found[0].value == pytest.approx(32.5, rel=1e-12)
    assert found[0].mass == pytest.approx(13000 / 60 * 1e-6, rel=1e-12) and means.total_mass[0].total == pytest.approx(found[0].mass, rel=1e-12)


def test_mass_is_taken_on_the_flows_own_basis():
    """A flow at 546.3 K carries half of what the same volume at 273.15 K does."""
    lines = ["t,x,q", "2026-01-05 10:00,10,100", "2026-01-05 10:01,10,100"]
    cold, hot = (taken(lines, {**windows("10 min"), "flow": {"column": "q", "unit": "m3/h", "basis": f"{kelvin} K, 101.3 kPa, dry"}})[1].total_mass[0].total
                 for kelvin in ("273.15", "546.3"))
    assert hot == pytest.approx(cold / 2, rel=1e-12)


def test_exceedances_highest_and_percentile():
    """Twenty minutes 1..20: the 95th percentile by nearest rank is 19; above 18 lie 19 and 20."""
    _, means, _ = taken(minutes(range(1, 21)), {**windows("1 min", percentiles=[95]), "species": {**SAME, "limit": "18 mg/m3"}, "limit": {"rule": "simple"}})
    found = means.statistics[0][0]
    assert found.exceedances == 2 and found.highest.value == 20 and found.percentile(95) == 19 and found.percentile(100) == 20


def test_a_guarded_rule_uses_the_typed_uncertainty():
    """U = 10 %: 17 + 1.7 lies above 18, 16 + 1.6 does not."""
    _, means, _ = taken(minutes([16, 17]), {**windows("1 min"), "species": {**SAME, "limit": "18 mg/m3"}, "limit": {"rule": "guarded", "percent": 10}})
    assert means.statistics[0][0].exceedances == 1


@pytest.mark.parametrize("settings, words", [
    ({"means": {"windows": ["10 min"]}}, "which is owed"),
    ({**windows("7 min")}, "equal parts"),
    ({**windows("whenever")}, "no window"),
    ({**windows("shift 2026-01-05 06:00 to 2026-01-05 14:00")}, "not measured"),
    ({**windows("10 min"), "species": {**SAME, "limit": "18 mg/m3"}}, "decision rule"),
    ({**windows("10 min"), "species": {**SAME, "limit": "18 mg/m3 at 293.15 K, 101.3 kPa"}, "limit": {"rule": "simple"}}, "another basis"),
    ({**windows("10 min"), "below": "a third"}, "below"),
    ({**windows("10 min"), "colour": "red"}, "not known"),
])
def test_what_is_missing_or_wrong_is_said(settings, words):
    with pytest.raises(CoreError, match=words) as raised:
        taken(minutes([1, 2, 3]), settings)
    assert raised.value.hint


def test_stamps_without_a_meaning_are_asked_for():
    with pytest.raises(Missing, match="start or the end"):
        taken(minutes([1, 2]), {**windows("10 min"), "time": {"stamp": None}})


def test_sums_are_exact():
    """Against fractions, which do not round."""
    draw = random.Random(4)
    values = [draw.uniform(-1, 1) * 10 ** draw.randint(-12, 12) for _ in range(2000)]
    total = ExactSum()
    total.add(values)
    assert total.total == float(sum(map(Fraction, values))) == math.fsum(values)


def test_windows_keep_to_the_wall_clock():
    assert read_window("rolling 8 h every 1 h", Clock("year_first")).step == 3600.0

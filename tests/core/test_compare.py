"""Two sheets compared: only what differs in meaning, each difference's own effect, and all together.

Expected factors are worked out here from the formulas themselves (ISO 14912 for the gas law, (A - O_ref)/(A - O) for oxygen) or are
plain ratios; atomic weights 14.007, 15.999 (IUPAC 2021, abridged).
"""
from __future__ import annotations

from dataclasses import replace

import pytest

from gasbasis.records.compare import compared, differences
from gasbasis.records.sheet import Sheet

MINE = Sheet(hold="NOx 142 ppmv as NO2, dry", gas="9,2 % O2 dry, ambient O2 21 %", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2", limit="460 mg/m3")
NO, NO2 = 14.007 + 15.999, 14.007 + 2 * 15.999
OXYGEN_21, OXYGEN_20_9 = (21 - 3) / (21 - 9.2), (20.9 - 3) / (20.9 - 9.2)


@pytest.mark.parametrize(("change", "id", "factor"), [
    ({"owe": "mg/m3 at 25 °C, 101.3 kPa, dry, 3 % O2"}, "owe.temperature", 273.15 / 298.15),
    ({"hold": "NOx 142 ppmv as NO, dry"}, "hold.reported_as", NO / NO2),
    ({"gas": "9.2 % O2 dry, ambient O2 20.9 %"}, "gas.ambient_oxygen", OXYGEN_20_9 / OXYGEN_21),
    ({"hold": "NOx 71 ppmv as NO2, dry"}, "hold.value", 0.5),
    ({"owe": "µg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2"}, "owe.unit", 1.0),
    ({"gas": "9,2 % O2 dry, ambient O2 21 %, 182 °C"}, "gas.temperature", 1.0),
    ({"limit": "200 mg/m3"}, "limit.value", 1.0),
])
def test_one_difference_moves_the_figure_by_its_own_factor(change: dict, id: str, factor: float) -> None:
    found = compared(MINE, replace(MINE, **change))
    assert [row["id"] for row in found["differences"]] == [id]
    assert found["differences"][0]["factor"] == pytest.approx(factor, rel=1e-12)
    assert found["together"]["factor"] == pytest.approx(factor, rel=1e-12)


def test_several_are_ranked_and_multiply() -> None:
    theirs = replace(MINE, hold="NOx 142 ppmv as NO, dry", gas="9.2 % O2 dry, ambient O2 20.9 %", owe="mg/m3 at 25 °C, 101.3 kPa, dry, 3 % O2")
    found = compared(MINE, theirs)
    assert [row["id"] for row in found["differences"]] == ["hold.reported_as", "owe.temperature", "gas.ambient_oxygen"]
    assert found["together"]["factor"] == pytest.approx(NO / NO2 * 273.15 / 298.15 * OXYGEN_20_9 / OXYGEN_21, rel=1e-12)
    assert found["interplay_text"] == "One by one they multiply to the same." and "reported as" in found["sentence"]


def test_differences_that_act_on_each_other_are_said_to() -> None:
    theirs = replace(MINE, gas="15 % O2 dry, ambient O2 20.9 %")
    found = compared(MINE, theirs)
    assert found["together"]["factor"] == pytest.approx((20.9 - 3) / (20.9 - 15) / OXYGEN_21, rel=1e-12)
    assert "acting on each other" in found["interplay_text"]


@pytest.mark.parametrize(("mine", "change", "factor"), [
    (Sheet(hold="NOx 100 mg/m3 at 273.15 K, 101.325 kPa, dry", owe="kg/h", emission="flow 10000 m3/h at 273.15 K, 101.325 kPa, dry"),
     {"emission": "flow 12000 m3/h at 273.15 K, 101.325 kPa, dry"}, 1.2),
    (Sheet(sample="Hg 12.5 ng, volume 10 L at 20 °C, 101.3 kPa", owe="µg/m3 at 0 °C, 101.325 kPa"), {"sample": "Hg 25 ng, volume 10 L at 20 °C, 101.3 kPa"}, 2.0),
], ids=["emission", "sample"])
def test_how_the_number_came_about_is_compared_too(mine: Sheet, change: dict, factor: float) -> None:
    found = compared(mine, replace(mine, **change))
    assert len(found["differences"]) == 1 and found["differences"][0]["factor"] == pytest.approx(factor, rel=1e-12)


@pytest.mark.parametrize("change", [{"gas": "9.2 % O2 dry;  ambient O2 21 %"}, {"hold": "NOx 142 ppm by volume, as NO2, dry"}, {"title": "theirs"}, {"notes": {"hold.parts_by": "x"}}])
def test_another_way_of_writing_is_no_difference(change: dict) -> None:
    assert differences(MINE, replace(MINE, **change)) == ()
    assert compared(MINE, replace(MINE, **change))["sentence"] == "The two sheets say the same."


def test_a_doubt_settled_otherwise_is_named_in_words() -> None:
    mine = replace(MINE, gas="9,2 % O2 dry", settled={"gas.ambient_oxygen": "21"})
    found = compared(mine, replace(mine, settled={"gas.ambient_oxygen": "20.9"}))
    row = found["differences"][0]
    assert row["id"] == "settled.gas.ambient_oxygen" and (row["mine"], row["theirs"]) == ("21 %", "20.9 %")
    assert row["factor"] == pytest.approx(OXYGEN_20_9 / OXYGEN_21, rel=1e-12)


def test_open_doubts_give_ranges_and_no_factor() -> None:
    found = compared(MINE, replace(MINE, hold="NOx 142 ppm as NO2, dry"))
    assert found["together"]["factor"] is None and "to" in found["theirs"]["text"] and "Settle" in found["sentence"]


def test_what_cannot_be_computed_alone_says_why() -> None:
    wet = Sheet(hold="CO 50 ppmv wet", gas="12 % H2O", owe="ppm by volume, dry")
    found = compared(Sheet(hold="CO 50 ppmv dry", owe="ppm by volume, dry"), wet)
    rows = {row["id"]: row for row in found["differences"]}
    assert "water" in rows["hold.water"]["alone"]["problem"].lower() and rows["gas"]["factor"] == 1.0
    assert found["together"]["factor"] == pytest.approx(1 / 0.88, rel=1e-12)


def test_unreadable_or_empty_sheets_are_compared_line_by_line() -> None:
    found = compared(MINE, Sheet())
    assert {row["id"] for row in found["differences"]} == {"hold", "gas", "owe", "limit"} and found["theirs"]["text"] == "no figure"
    assert {row["id"] for row in compared(MINE, replace(MINE, hold="NOx foo bar"))["differences"]} == {"hold"}

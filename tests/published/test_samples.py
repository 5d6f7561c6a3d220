"""Collected samples and prepared gas by hand, and the paired trains of US EPA Method 30B (acceptance read in copies of the method)."""
from __future__ import annotations

import json

import pytest

from gasbasis.answer import answer

METER = "meter 24 °C, barometer 98.2 kPa, dry"


def restate(**sheet) -> dict:
    usual = sheet.pop("usual", True)
    reply = json.loads(answer(json.dumps({"task": "restate", "usual": usual, "sheet": sheet})))
    assert reply["ok"], reply
    return reply["answer"]


def value(**sheet) -> float:
    result = restate(**sheet)
    assert result["figure"], (result["problems"], [doubt["id"] for doubt in result["doubts"] if doubt["state"] == "open"])
    return result["figure"]["value"]


OWE = "ug/m3 at 20 °C, 101.325 kPa, dry"
TO_OWED = 101.325 / 98.2 * 297.15 / 293.15


def test_a_sorbent_trap_by_hand() -> None:
    """(12.4 - 0.3) ng / 0.96 in (1324.8 - 1204.3) L x 1.012, brought from 24 °C and 98.2 kPa to 20 °C and 1 atm."""
    found = value(sample=f"Hg 12.4 ng, field blank 0.3 ng subtracted, recovery 96 % corrected, meter 1204.3 L to 1324.8 L, Y 1.012, {METER}", owe=OWE)
    assert found == pytest.approx((12.4 - 0.3) / 0.96 / (120.5 * 1.012) * TO_OWED, rel=1e-9)


def test_blank_and_recovery_are_off_until_they_are_asked_for_and_named() -> None:
    sheet = {"sample": f"Hg 12.4 ng, field blank 0.3 ng, recovery 96 %, in 120.5 L, {METER}", "owe": OWE}
    assert value(**sheet) == pytest.approx(12.4 / 120.5 * TO_OWED, rel=1e-9)
    titles = [step["title"] for step in restate(**sheet)["working"] if step["kind"] == "choice"]
    assert titles == ["The field blank is not subtracted", "The result is not corrected for recovery"]


def test_the_orifice_head_adds_to_the_barometer() -> None:
    """25 mmH2O is 245.17 Pa."""
    found = value(sample=f"SO2 3.2 mg in 120.5 L, orifice head 25 mmH2O, {METER}", owe="mg/m3 at 20 °C, 101.325 kPa, dry")
    assert found == pytest.approx(3.2 / 0.1205 * 101.325 / (98.2 + 0.24516625) * 297.15 / 293.15, rel=1e-9)


def test_water_left_in_the_metered_gas() -> None:
    """Saturated at 25 °C: 3169.9 Pa (IAPWS) of 100 kPa."""
    found = value(sample="HCl 0.5 mg in 120 L, meter 25 °C, barometer 100 kPa, saturated", owe="mg/m3 at 25 °C, 100 kPa, dry")
    assert found == pytest.approx(0.5 / 0.120 / (1 - 3.1699 / 100), rel=1e-5)


def test_a_negative_net_mass_is_kept() -> None:
    assert value(sample=f"Hg 0.2 ng, blank 0.3 ng subtracted, in 120.5 L, {METER}", owe=OWE) == pytest.approx(-0.1 / 120.5 * TO_OWED, rel=1e-9)


def test_below_detection_travels() -> None:
    result = restate(sample=f"Hg < 0.5 ng, LOD 0.5 ng, in 120.5 L, {METER}", owe=OWE)
    assert result["figure"]["number_text"].startswith("< ")
    assert result["figure"]["value"] == pytest.approx(0.5 / 120.5 * TO_OWED, rel=1e-9)
    assert result["sample"]["about"] == [{"title": "detection limit", "text": "0.5 ng is 0.00434 µg/m³ of the figure"}]      # 0.004340 by hand
    assert any("below the detection limit" in warning for warning in restate(sample=f"Hg 0.3 ng, LOD 0.5 ng, in 120.5 L, {METER}", owe=OWE)["warnings"])


def test_both_sections_count_and_breakthrough_is_shown() -> None:
    result = restate(sample=f"Hg 12.4 ng, back 1.6 ng, in 120.5 L, {METER}", owe=OWE)
    assert result["figure"]["value"] == pytest.approx(14.0 / 120.5 * TO_OWED, rel=1e-9)
    assert any(step["title"] == "Breakthrough 12.9 %" for step in result["working"])         # 1.6/12.4
    assert any("12.9 %" in warning for warning in result["warnings"])


def test_a_leak_above_four_percent_of_the_sampling_rate_is_pointed_out() -> None:
    """120 L in 60 min is 2 L/min; 0.02 L/min is 1 % of it, 0.1 L/min 5 %."""
    calm, leaking = (restate(sample=f"Hg 12.4 ng in 120 L, leak {leak} L/min, 60 min, {METER}", owe=OWE) for leak in ("0.02", "0.1"))
    assert any(step["title"] == "Leak rate 1.0 % of the mean sampling rate" for step in calm["working"]) and not calm["warnings"]
    assert any("5.0 %" in warning for warning in leaking["warnings"])


@pytest.mark.parametrize(("a", "b", "litres", "agrees", "allowed"), [
    # |a - b|/(a + b): above 1 ug/m3 10 %, at or below it 20 % or 0.2 ug/m3 apart
    (300, 250, 100, True, "10 %"), (300, 240, 100, False, "10 %"), (30, 21, 100, True, "20 %"), (30, 19, 100, True, "20 %"), (90, 55, 100, False, "20 %")])
def test_paired_trains(a, b, litres, agrees, allowed) -> None:
    result = restate(sample=f"Hg, {METER}, trap A: {a} ng, {litres} L, trap B: {b} ng, {litres} L", owe=OWE)
    said = next(step for step in result["working"] if step["title"].startswith("The two trains"))
    assert said["title"].endswith("do not agree") is not agrees and f"{100 * abs(a - b) / (a + b):.3g} %" in said["note"] and allowed in said["note"]
    assert bool(result["warnings"]) is not agrees
    assert result["figure"]["value"] == pytest.approx((a + b) / 2 / litres * TO_OWED, rel=1e-9)


def test_each_train_has_its_own_meter() -> None:
    """The second meter at 20 °C, its factor 0.98: brought to the first by hand."""
    found = value(sample=f"Hg, {METER}, trap A: 12.4 ng, 120 L, trap B: 12.9 ng, 118 L, meter 20 °C, Y 0.98", owe=OWE)
    b = 12.9 / (118 * 0.98) * 101.325 / 98.2 * 293.15 / 293.15
    assert found == pytest.approx((12.4 / 120 * TO_OWED + b) / 2, rel=1e-9)


def test_the_budget_carries_the_whole_route() -> None:
    result = restate(sample="Hg 12.4 ± 0.6 ng (k=2), recovery 96 ± 4 % (k=2) corrected, in 120.5 ± 1.2 L (k=2), Y 1.012 ± 0.01 (k=2), meter 24 ± 2 °C (k=2), barometer 98.2 ± 0.2 kPa (k=2), dry", owe=OWE)
    relative = {row["field"]: row["contribution"] / result["figure"]["value"] for row in result["uncertainty"]["rows"]}
    assert relative == pytest.approx({"sample.mass": 0.3 / 12.4, "sample.recovery": 2 / 96, "sample.volume": 0.6 / 120.5, "sample.meter_factor": 0.005 / 1.012,
                                      "sample.temperature": 1 / 297.15, "sample.barometer": 0.1 / 98.2}, rel=1e-6)


# --- prepared gas

def test_a_diluted_cylinder_with_two_references_by_hand() -> None:
    """250 mL/min counted at 0 °C and 4750 mL/min counted at 20 °C, both at 1 atm: amounts go as q/T."""
    n_c, n_d = 250 / 273.15, 4750 / 293.15
    found = value(prepared="cylinder NO 998 ppm by volume, 250 mL/min at 0 °C 101.325 kPa, in 4750 mL/min at 20 °C 1 atm", owe="ppm by volume")
    assert found == pytest.approx(998 * n_c / (n_c + n_d), rel=1e-12)


def test_references_that_are_not_stated_are_doubts_that_cancel_where_alike() -> None:
    result = restate(prepared="cylinder NO 998 ppm by volume, 250 mL/min, in 4750 mL/min", owe="ppm by volume", usual=False)
    doubts = {doubt["id"]: doubt for doubt in result["doubts"]}
    assert {"prepared.cylinder_conditions", "prepared.flow_conditions"} <= set(doubts) and not doubts["prepared.flow_conditions"]["usual"]
    same = next(reading["id"] for reading in doubts["prepared.flow_conditions"]["readings"] if reading["id"].startswith("273.15K-101.325"))
    settled = {"prepared.cylinder_conditions": same, "prepared.flow_conditions": same}
    assert value(prepared="cylinder NO 998 ppm by volume, 250 mL/min, in 4750 mL/min", owe="ppm by volume", settled=settled) == pytest.approx(998 * 0.05, rel=1e-12)


def test_a_permeation_device_by_hand() -> None:
    """120 ng/min into 1.5 L/min counted at 0 °C: 80 ug/m3 there, 80 x 273.15/293.15 at 20 °C."""
    found = value(prepared="permeation Hg 120 ng/min in 1.5 L/min at 0 °C, 101.325 kPa", owe="ug/m3 at 20 °C, 101.325 kPa")
    assert found == pytest.approx(80 * 273.15 / 293.15, rel=1e-12)


def test_the_display_at_a_limit_is_the_certificate_it_would_take() -> None:
    result = restate(prepared="cylinder NO 998 ppm by volume, 250 mL/min at 0 °C, 1 atm, in 4750 mL/min at 0 °C, 1 atm", owe="ppm by volume", limit="100 ppm by volume")
    assert result["verdict"]["turned_round"]["upper_text"] == "2000" and result["verdict"]["turned_round"]["unit_text"] == "ppm"

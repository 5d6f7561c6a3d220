"""Mistakes that people make, as worked by hand once: each trap's right value, and the wrong one that the texts do not lead to."""
from __future__ import annotations

import json

import pytest

from gasbasis.answer import answer


def figure(hold: str, owe: str, gas: str = "") -> float:
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": {"hold": hold, "owe": owe, "gas": gas}})))["answer"]
    assert reply["figure"], (reply["problems"], [doubt["id"] for doubt in reply["doubts"]])
    return reply["figure"]["value"]


@pytest.mark.parametrize(("celsius", "no2"), [("0", "2.0525"), ("20", "1.9125"), ("25", "1.8804")])        # M/V_m: 46.0055/22.4140, 24.0551, 24.4654
def test_the_same_ppm_at_three_temperatures(celsius: str, no2: str) -> None:
    assert figure("NO2 1 ppmv", f"mg/m3 at {celsius} °C, 101.325 kPa") == pytest.approx(float(no2), abs=5e-5)


def test_propane_as_carbon() -> None:
    assert figure("TOC 1 ppmv as propane", "mg/m3 as C at 0 °C, 101.325 kPa") == pytest.approx(1.6076, abs=1e-4)   # 3 x 12.011/22.414


def test_a_normal_cubic_metre_is_more_standard_ones() -> None:
    assert 1 / figure("SO2 1 mg/m3 at 0 °C, 101.325 kPa", "mg/m3 at 15 °C, 101.325 kPa") == pytest.approx(1.05491, abs=5e-6)      # 288.15/273.15


@pytest.mark.parametrize(("ambient", "factor"), [("20.9", 5.2105), ("21", 5.0), ("20.95", 5.1026)])        # (A - 11)/(A - 19)
def test_near_ambient_oxygen_the_constant_matters(ambient: str, factor: float) -> None:
    assert figure("CO 1 ppmv dry", "ppm by volume, dry, 11 % O2", f"O2 19 % dry, ambient O2 {ambient} %") == pytest.approx(factor, abs=5e-5)


def test_wet_oxygen_is_not_dry_oxygen() -> None:
    """10 % read wet at 20 % water is 12.5 % dry: (21 - 11)/(21 - 12.5) is 1.176; taken for dry it would have been 0.909."""
    owe = "ppm by volume, dry, 11 % O2"
    assert figure("CO 100 ppmv dry", owe, "O2 10 % wet, 20 % H2O, ambient O2 21 %") == pytest.approx(117.6, abs=0.05)
    assert figure("CO 100 ppmv dry", owe, "O2 10 % dry, 20 % H2O, ambient O2 21 %") == pytest.approx(90.9, abs=0.05)


def test_a_separator_that_may_group_thousands_is_asked_about() -> None:
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": {"hold": "Hg 1,234 ng/m3", "owe": "pg/L"}})))["answer"]
    assert reply["figure"] is None and reply["doubts"][0]["id"] == "hold.number"


@pytest.mark.parametrize("text", ["Hg 8,3 µg/m³", "Hg 8,3 μg/m³", "Hg 8.3 ug/m3"])                       # both micro signs
def test_both_micro_signs_and_both_separators(text: str) -> None:
    assert figure(text, "ng/L") == pytest.approx(8.3)

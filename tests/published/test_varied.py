"""One input over a range: the curve, where it crosses the limit, and there and back."""
from __future__ import annotations

import json

import pytest

from gasbasis.answer import answer

SHEET = dict(hold="CO 100 ppmv dry", gas="O2 9 % dry, ambient O2 21 %", owe="ppm by volume, dry, 11 % O2", limit="100 ppmv")


def ask(sheet=SHEET, **request) -> dict:
    return json.loads(answer(json.dumps({"task": "vary", "sheet": sheet, **request})))


def test_the_curve_is_the_formula() -> None:
    found = ask(field="gas.oxygen", low="2", high="14")["answer"]
    assert len(found["x"]) == 41 and found["y"] == pytest.approx([100 * (21 - 11) / (21 - x) for x in found["x"]])     # by hand
    assert found["limits"] == [100.0] and [crossing["x"] for crossing in found["crossings"]] == pytest.approx([11.0])


def test_points_without_a_figure_are_left_out_and_counted() -> None:
    found = ask(field="gas.oxygen", low="18", high="24")["answer"]
    assert found["y"][0] is not None and found["y"][-1] is None and found["left_out"].startswith("21 of 41")


def test_it_is_drawn_on_the_limits_basis() -> None:
    found = ask({**SHEET, "limit": "100 mg/m3 at 273.15 K, 101.3 kPa"}, field="hold.value", low="50", high="150")["answer"]
    crossing = found["crossings"][0]["x"]
    again = json.loads(answer(json.dumps({"task": "restate", "sheet": {**SHEET, "hold": f"CO {crossing!r} ppmv dry", "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry, 11 % O2"}})))["answer"]
    assert found["y_unit_text"] == "mg/m³" and again["figure"]["value"] == pytest.approx(100, rel=1e-9)


def test_what_can_be_varied_is_listed() -> None:
    result = json.loads(answer(json.dumps({"task": "restate", "sheet": SHEET})))["answer"]
    assert [(entry["field"], entry["text"]) for entry in result["varies"]] == [("hold.value", "100"), ("gas.ambient_oxygen", "21"), ("gas.oxygen", "9")] or \
        {entry["field"] for entry in result["varies"]} == {"hold.value", "gas.oxygen", "gas.ambient_oxygen"}


@pytest.mark.parametrize(("request_", "said"), [
    (dict(field="gas.smell", low="1", high="2"), "no input"), (dict(field="gas.oxygen", low="9", high="9"), "runs from 9 to 9"),
    (dict(field="gas.oxygen", low="", high="9"), "both its ends"), (dict(field="gas.oxygen", low="a", high="9"), "not a number"), (dict(low="1", high="9"), "no input")])
def test_a_senseless_range_is_refused(request_: dict, said: str) -> None:
    reply = ask(**request_)
    assert not reply["ok"] and said in reply["error"]["message"] and reply["error"]["kind"] != "defect", reply

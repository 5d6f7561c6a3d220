"""The door: JSON in, JSON out, whatever is sent; and the same job from a terminal."""
from __future__ import annotations

import json
import os
import subprocess
import sys
from pathlib import Path

import pytest

from gasbasis.answer import TASKS, answer

DEMOS = Path(__file__).resolve().parents[2] / "demo"


@pytest.mark.parametrize("request_text", [
    "", "{", "[]", "null", "7", '"x"', "{}", '{"task": null}', '{"task": "nothing"}', '{"task": "restate"}', '{"task": "restate", "sheet": 3}',
    '{"task": "restate", "sheet": {"hold": 3}}', '{"task": "restate", "sheet": {"schema": 99}}', '{"task": "restate", "sheet": {"colour": "red"}}',
    '{"task": "restate", "sheet": {"settled": {"a": 1}}}', '{"task": "edit"}', '{"task": "edit", "text": "", "side": "up", "field": "water", "to": "dry"}',
    '{"task": "edit", "text": "CO 1 ppm", "side": "hold", "field": "colour", "to": "red"}', '{"task": "search", "what": "stars", "text": "x"}',
    '{"task": "open", "code": "zzz"}', '{"task": "link", "sheet": {}}', "x" * 300_000, "[" * 100_000, '{"task": "link", "sheet": {"hold": "\\ud800"}, "figure": ""}', '{"task": ["restate"]}', '{"task": "record"}', '{"task": "record", "sheet": {"hold": "1 ppm", "owe": "ppb"}, "about": {"made_at": 3}}', '{"task": "record", "sheet": {}, "about": {"colour": "red"}}',
    '{"task": "open_record", "record": []}', '{"task": "receive"}', '{"task": "receive", "text": "x"}', '{"task": "check_sheets", "sheets": 3}', '{"task": "compare", "mine": {}}',
    '{"task": {"a": 1}}'])
def test_a_bad_request_is_answered_with_what_is_wrong(request_text: str) -> None:
    reply = json.loads(answer(request_text))
    assert reply["ok"] is False
    assert reply["error"]["message"] and reply["error"]["kind"] != "defect", reply["error"].get("detail")


def test_every_task_answers() -> None:
    sheet = {"hold": "Hg 1 ppb v/v", "owe": "ug/m3 at 20 °C, 1 atm"}
    code = json.loads(answer(json.dumps({"task": "link", "sheet": sheet, "figure": "8.339 µg/m³"})))["answer"]["code"]
    requests = {"restate": {"sheet": sheet}, "edit": {"text": "CO 1 ppm", "side": "hold", "field": "water", "to": "dry"},
                "search": {"what": "species", "text": "merc"}, "link": {"sheet": sheet, "figure": ""}, "open": {"code": code},
                "vary": {"sheet": sheet, "field": "hold.value", "low": "1", "high": "3"},
                "monte_carlo": {"sheet": {**sheet, "hold": "Hg 1 ± 0.1 ppb v/v"}}, "record": {"sheet": sheet, "about": {"made_at": "2026-03-31T14:05:00+02:00"}},
                "receive": {"text": code}, "check_sheets": {"sheets": [sheet]}, "compare": {"mine": sheet, "theirs": {**sheet, "hold": "Hg 2 ppb v/v"}}}
    requests["open_record"] = {"record": json.loads(answer(json.dumps({"task": "record", **requests["record"]})))["answer"]["record"]}
    for task in TASKS:
        reply = json.loads(answer(json.dumps({"task": task, **requests.get(task, {})})))
        assert reply["ok"], (task, reply)


def test_the_answer_has_the_parts_the_page_draws() -> None:
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": {"hold": "CO 50 ppm", "owe": "mg/m3 at 0 °C, 101.3 kPa, dry"}})))["answer"]
    assert {"hold", "gas", "owe", "limit", "problems", "figure", "spread", "sentence", "doubts", "working", "steps", "warnings", "uncertainty", "verdict"} <= set(reply)
    for side in ("hold", "gas", "owe"):
        for piece in reply[side]["pieces"]:
            assert {"field", "title", "text", "span", "state", "doubt", "help", "example", "choices"} <= set(piece)


@pytest.mark.parametrize("path", sorted(DEMOS.glob("*.json")), ids=lambda path: path.stem)
def test_every_example_can_be_brought_to_a_figure(path: Path) -> None:
    demo = json.loads(path.read_text("utf-8"))
    assert demo["about"].startswith("Invented")
    result = json.loads(answer(json.dumps({"task": "restate", "sheet": demo["sheet"], "usual": True})))["answer"]
    assert not result["problems"]
    while result["figure"] is None:
        doubt = next(doubt for doubt in result["doubts"] if doubt["state"] == "open")
        demo["sheet"].setdefault("settled", {})[doubt["id"]] = doubt["readings"][0]["id"]
        result = json.loads(answer(json.dumps({"task": "restate", "sheet": demo["sheet"], "usual": True})))["answer"]
    assert result["figure"]["value"] > 0 and result["working"]


@pytest.mark.native
@pytest.mark.parametrize(("arguments", "status", "printed"), [
    (["--hold", "Hg 1 ppb v/v", "--owe", "ug/m3 at 20 °C, 101.325 kPa"], 0, "8.339 µg/m³"),
    (["--hold", "Hg 1 ppb", "--owe", "ug/m3 at 20 °C, 101.325 kPa"], 3, "hold.parts_by=volume"),
    (["--hold", "Hg 1 ppb", "--owe", "ug/m3 at 20 °C, 101.325 kPa", "--settle", "hold.parts_by=volume"], 0, "8.339 µg/m³"),
    (["--hold", "CO 50 ppm", "--owe", "mg/m3 at 0 °C, 101.3 kPa", "--usual"], 0, "usual: gas analysers"),
    (["--hold", "Xx2 1 ppb", "--owe", "ug/m3"], 2, "'Xx' is not an element"),
    (["--hold", "CO 50 ppmv wet", "--owe", "ppm by volume, dry"], 2, "gas.water_content"),
    (["--hold", "CO 50 ppmv wet", "--owe", "ppm by volume, dry", "--gas", "12 % H2O"], 0, "56.82"),
    (["--hold", "CO 50 ppmv", "--owe", "mg/m3 at 25 °C, 1 atm", "--limit", "60 mg/m3", "--rule", "simple"], 0, "within the limit"),
    (["--hold", "CO 50 ppmv", "--owe", "mg/m3", "--settle", "nonsense"], 2, "DOUBT=READING"),
])
def test_terminal(arguments: list[str], status: int, printed: str) -> None:
    run = subprocess.run([sys.executable, "-m", "gasbasis", "restate", *arguments], capture_output=True, text=True, timeout=60,
                         env={**os.environ, "PYTHONIOENCODING": "utf-8"})
    assert run.returncode == status, run.stdout + run.stderr
    assert printed in run.stdout + run.stderr


@pytest.mark.native
def test_terminal_json() -> None:
    run = subprocess.run([sys.executable, "-m", "gasbasis", "restate", "--hold", "1 ng/m3", "--owe", "pg/L", "--json"], capture_output=True, text=True, timeout=60)
    record = json.loads(run.stdout)
    assert record["figure"]["value"] == 1.0 and record["working"] and record["doubts"] == []


@pytest.mark.native
def test_terminal_record_is_read_back(tmp_path: Path) -> None:
    def run(*arguments: str) -> subprocess.CompletedProcess:
        return subprocess.run([sys.executable, "-m", "gasbasis", *arguments], capture_output=True, text=True, encoding="utf-8", timeout=60, env={**os.environ, "PYTHONIOENCODING": "utf-8"})
    sheet = ("--hold", "Hg 1 ppb v/v", "--owe", "ug/m3 at 20 °C, 1 atm", "--by", "A. Tester")
    printed = run("record", *sheet)
    assert printed.returncode == 0 and "8.339 µg/m³" in printed.stdout and "by A. Tester" in printed.stdout and "Checksum sha256:" in printed.stdout
    text = run("record", *sheet, "--json").stdout
    file = tmp_path / "record.json"
    file.write_text(text, "utf-8")
    read = run("check", str(file))
    assert read.returncode == 0 and "Recomputed here: the same" in read.stdout
    file.write_text(text.replace("Hg 1 ppb", "Hg 2 ppb"), "utf-8")
    assert run("check", str(file)).returncode == 3
    file.write_text("{", "utf-8")
    assert run("check", str(file)).returncode == 2
    assert run("check", str(tmp_path / "none.json")).returncode == 2
    assert run("record", "--hold", "Hg", "--owe", "ug/m3").returncode == 2

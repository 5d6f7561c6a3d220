"""The record: complete, sealed, read back; amended, it names the one before."""
from __future__ import annotations

import hashlib
import json
from pathlib import Path

import pytest

from gasbasis.answer import answer
from gasbasis.errors import CoreError, Missing, NotUnderstood
from gasbasis.records.catalogue import CAUTIONS
from gasbasis.records.plain_record import plain_record
from gasbasis.records.record import About, checksum_of, make_record, open_record
from gasbasis.records.sheet import Sheet, read_sheet

DEMOS = Path(__file__).resolve().parents[2] / "demo"
AT = "2026-03-31T14:05:00+02:00"
PLAIN = Sheet(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
LIMITED = Sheet(hold="NOx 142 ± 5 ppm as NO2, dry", gas="9,2 % O2 dry, ambient O2 21 %", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2", limit="460 mg/m3", title="Second run",
                settled={"hold.parts_by": "volume", "limit.decision_rule": "guarded", "hold.value_spread": "k2"}, notes={"hold.parts_by": "the analyser's manual, page 4"})


def made(sheet: Sheet = LIMITED, **about: str) -> dict:
    return make_record(sheet, About(**{"made_at": AT, **about}))


def test_a_record_holds_what_a_checker_needs() -> None:
    """ISO/IEC 17025:2017 7.5.1 and 7.8 (as summarised in secondary reading): who, when, with what, from what, how, how sure, by which rule."""
    record = made(made_by="A. Tester", notes="Probe moved once.")
    assert record["made_at"] == AT and record["made_by"] == "A. Tester" and record["notes"] == "Probe moved once."
    assert record["app"]["version"] and len(record["app"]["data"]) == 64
    assert record["sheet"]["hold"] == LIMITED.hold and record["sheet"]["title"] == "Second run"
    held = next(line for line in record["texts"] if line["side"] == "hold")
    assert held["typed"] == LIMITED.hold and {"title": "reported as", "text": "as NO2", "state": "stated"} in held["understood"]
    settled = next(doubt for doubt in record["settled"] if doubt["title"] == "parts by")
    assert settled["note"] == "the analyser's manual, page 4" and settled["reading"].startswith("by volume")
    assert record["verdict"]["rule"] == "guarded acceptance, w = U" and record["verdict"]["words"] == "not shown within"
    assert record["uncertainty"]["coverage_text"] == "2" and record["uncertainty"]["rows"]
    assert all(step["title"] and (step["source_text"] or step["kind"] == "unit") for step in record["working"])
    assert any(source["text"].startswith("ISO 14912") for source in record["sources"])
    assert record["cautions"] == list(CAUTIONS) and record["link_code"]


EMITTED = Sheet(hold="NOx 100 mg/m3 at 273.15 K, 101.325 kPa, dry", owe="kg/h", emission="flow 10000 m3/h at 273.15 K, 101.325 kPa, dry")
SAMPLED = Sheet(sample="Hg 12.5 ng, volume 10 L at 20 °C, 101.3 kPa", owe="µg/m3 at 0 °C, 101.325 kPa")


@pytest.mark.parametrize(("sheet", "side", "title"), [(EMITTED, "emission", "The emission"), (SAMPLED, "sample", "The sample")], ids=["emission", "sample"])
def test_every_line_of_the_sheet_is_in_its_record(sheet: Sheet, side: str, title: str) -> None:
    record = made(sheet)
    line = next(line for line in record["texts"] if line["side"] == side)
    assert line["typed"] == getattr(sheet, side) and line["title"] == title and line["understood"]
    assert getattr(sheet, side) in " ".join(plain_record(record).split()) and open_record(json.loads(json.dumps(record)))["same"]


def test_only_texts_and_whole_numbers_are_sealed() -> None:
    """Floats print differently from one machine's mathematics to another's; texts do not."""
    def numbers(part: object) -> list[float]:
        inside = part.values() if isinstance(part, dict) else part if isinstance(part, list) else ()
        return [part] if isinstance(part, float) else [number for one in inside for number in numbers(one)]
    assert numbers(made()) == []


def test_the_checksum_is_the_sha_256_of_the_canonical_json() -> None:
    """Worked out here by the rule in the record's own words: keys sorted, no spaces, UTF-8, without the checksum."""
    record = made()
    rest = {name: value for name, value in record.items() if name != "checksum"}
    text = json.dumps(rest, sort_keys=True, separators=(",", ":"), ensure_ascii=False)
    assert record["checksum"] == "sha256:" + hashlib.sha256(text.encode("utf-8")).hexdigest()


@pytest.mark.parametrize("path", sorted(DEMOS.glob("*.json")), ids=lambda path: path.stem)
def test_a_record_read_back_comes_to_the_same(path: Path) -> None:
    sheet = read_sheet(json.loads(path.read_text("utf-8"))["sheet"])
    record = json.loads(json.dumps(make_record(sheet, About(AT), take_usual=True), indent=2, sort_keys=True))
    opened = open_record(record)
    assert opened["checksum_holds"] and opened["same"] and opened["same_version"]
    assert "Recomputed here: the same" in opened["sentence"]


@pytest.mark.parametrize(("path", "to"), [(("figure", "number_text"), "441 ± 16"), (("sheet", "hold"), "NOx 141 ± 5 ppm as NO2, dry"), (("made_at",), "2025-03-31T14:05:00+02:00"),
                                          (("verdict", "sentence"), "within the limit"), (("working", 0, "title"), "x")])
def test_whatever_is_altered_breaks_the_checksum(path: tuple, to: str) -> None:
    record = json.loads(json.dumps(made()))
    at = record
    for step in path[:-1]:
        at = at[step]
    assert at[path[-1]] != to
    at[path[-1]] = to
    opened = open_record(record)
    assert not opened["checksum_holds"] and "does not hold" in opened["sentence"]


def test_a_record_whose_figure_is_not_ours_differs() -> None:
    record = json.loads(json.dumps(made(PLAIN)))
    record["figure"]["text"] = "Hg 8.4 µg/m³"
    record["checksum"] = checksum_of(record)               # sealed again, as a careful forger would
    opened = open_record(record)
    assert opened["checksum_holds"] and not opened["same"] and "8.339" in opened["sentence"] and "8.4" in opened["sentence"]


def test_open_doubts_are_recorded_as_open() -> None:
    record = made(Sheet(hold="Hg 1 ppb", owe="ug/m3 at 20 °C, 1 atm"))
    assert record["figure"] is None and record["spread"]["depends"] == "depends on: parts by"
    assert [doubt["title"] for doubt in record["left_open"]] == ["parts by"]
    assert open_record(record)["same"] and "left open" in plain_record(record)


def test_what_was_not_asked_says_what_it_was_computed_as() -> None:
    """A bare ± is taken as U with k = 2 (JCGM 100:2008, 6.2 leaves k to be stated): that is no silent choice."""
    record = made(Sheet(hold="NOx 142 ± 5 ppmv as NO2, dry", owe="mg/m3 at 273.15 K, 101.3 kPa, dry"))
    unseen = next(doubt for doubt in record["no_visible_effect"] if doubt["title"].startswith("±"))
    assert unseen["computed_as"] == "expanded, k = 2" and "computed as expanded, k = 2" in " ".join(plain_record(record).split())


def test_an_amended_record_names_the_one_before_and_why() -> None:
    first = made()
    second = made(amends=first["checksum"], why="limit mistyped")
    assert second["amends"] == {"checksum": first["checksum"], "why": "limit mistyped"} and second["checksum"] != first["checksum"]
    assert first["checksum"] in plain_record(second) and "limit mistyped" in plain_record(second)


@pytest.mark.parametrize(("about", "kind"), [({"made_at": ""}, NotUnderstood), ({"made_at": "yesterday"}, NotUnderstood), ({"made_at": "2026-03-31T14:05:00"}, NotUnderstood),
                                             ({"amends": "sha256:x"}, Missing), ({"why": "typing"}, Missing), ({"notes": "x" * 5000}, NotUnderstood)])
def test_what_is_missing_or_wrong_is_said(about: dict, kind: type) -> None:
    with pytest.raises(kind) as raised:
        made(PLAIN, **about)
    assert raised.value.message and raised.value.hint


def test_nothing_to_record_is_said() -> None:
    with pytest.raises(Missing, match="no figure to record"):
        made(Sheet(hold="Hg 1 ppb"))


def test_the_plain_text_has_every_line_of_the_working() -> None:
    record = made(notes="Probe moved once.\n\nSecond paragraph.")
    text, joined = plain_record(record), " ".join(plain_record(record).split())
    for step in record["working"]:
        assert f"{step['number']}. {step['title']}" in joined
        assert " ".join(step["substitution_text"].split()) in joined
    assert record["checksum"] in text and record["link_code"] in text and CAUTIONS[2] in joined and "Second paragraph." in text
    assert all(len(line) <= 78 for line in text.splitlines() if record["link_code"] not in line and record["checksum"] not in line)


@pytest.mark.parametrize("record", [{}, {"kind": "gasbasis record"}, {"kind": "gasbasis record", "schema": 2}, {"kind": "gasbasis record", "schema": 1},
                                    {"kind": "gasbasis record", "schema": 1, "sheet": 3}, {"kind": "gasbasis record", "schema": 1, "sheet": {"hold": "\ud800"}}])
def test_what_is_no_record_is_refused(record: dict) -> None:
    with pytest.raises(CoreError) as raised:
        open_record(record)
    assert raised.value.message


def test_a_foreign_record_with_odd_parts_does_not_break_the_door() -> None:
    record = {"kind": "gasbasis record", "schema": 1, "sheet": {"hold": "1 ppm", "owe": "ppb"}, "figure": ["x"], "spread": 7, "verdict": "y", "app": [], "checksum": 3}
    reply = json.loads(answer(json.dumps({"task": "open_record", "record": record})))
    assert reply["ok"] and reply["answer"]["checksum_holds"] is False and reply["answer"]["same"] is False

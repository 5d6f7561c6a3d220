"""The paste box: a link, a bare code, a record, a sheet are told apart; anything else gets a message that helps."""
from __future__ import annotations

import json
import time

import pytest

from gasbasis.errors import NotUnderstood
from gasbasis.records.link import write_code
from gasbasis.records.received import checked, received
from gasbasis.records.record import About, make_record
from gasbasis.records.sheet import Sheet, write_sheet

SHEET = Sheet(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
CODE = write_code(SHEET, "8.339 µg/m³")
RECORD = json.dumps(make_record(SHEET, About("2026-03-31T14:05:00+02:00")), indent=1)


@pytest.mark.parametrize("text", [CODE, f"  {CODE}\n", f"https://example.org/x/#{CODE}", f"Look: https://example.org/x/%23{CODE}.", f"{CODE[:40]}\n{CODE[40:]}",
                                  f"<https://example.org/#{CODE}>", f"https://example.org/%2523{CODE})"])
def test_a_link_or_its_code_is_opened(text: str) -> None:
    assert received(text) == {"form": "link", "sheet": write_sheet(SHEET), "as_sent": "8.339 µg/m³"}


@pytest.mark.parametrize("text", [RECORD, f"\ufeff{RECORD}", f"\n\n{RECORD}\n"])
def test_a_record_is_opened(text: str) -> None:
    opened = received(text)
    assert opened["form"] == "record" and opened["checksum_holds"] and opened["same"] and opened["sheet"] == write_sheet(SHEET)


@pytest.mark.parametrize("data", [write_sheet(SHEET), {"title": "T", "about": "Invented", "sheet": write_sheet(SHEET)}, {"limit": "10 ppm"}])
def test_a_sheet_is_opened(data: dict) -> None:
    assert received(json.dumps(data))["form"] == "sheet"


@pytest.mark.parametrize(("text", "said"), [
    ("", "nothing to open"), ("   \n", "nothing to open"), ("hello there", "no link, code or record"), ("NOx 142 ppm dry", "no link, code or record"), ("2 t of CO2 an hour", "no link, code or record"), ("sample #3 taken at noon", "no link, code or record"), ("https://example.org/", "no link, code or record"),
    (CODE[:-5], "cut off or altered"), (f"https://example.org/#{CODE[:30]}", "cut off or altered"), ("9z" + CODE[2:], "version '9'"), (RECORD[:200], "no JSON"), ("{}", "none that gasbasis wrote"),
    ("[1, 2]", "no link, code or record"), ('{"sheet": {"hold": 3}}', "none that gasbasis wrote"), ('{"hold": "x", "colour": "red"}', "parts this version does not know"), ("{" * 5000, "no JSON"),
    ('{"a":' * 300 + "1" + "}" * 300, "no JSON"), ('{"kind": "gasbasis record", "schema": 7}', "schema 7")])
def test_anything_else_gets_a_clear_message(text: str, said: str) -> None:
    with pytest.raises(NotUnderstood) as raised:
        received(text)
    assert said in raised.value.message and raised.value.hint


def test_a_statement_is_sent_to_its_line() -> None:
    with pytest.raises(NotUnderstood) as raised:
        received("NOx 142 ppm dry")
    assert "You hold" in raised.value.hint


def test_sheets_of_a_file_are_checked_one_by_one() -> None:
    rows = checked([write_sheet(SHEET), {"hold": 3}, None, {"schema": 9, "hold": "1 ppm"}])["checked"]
    assert rows[0] == {"sheet": write_sheet(SHEET), "problem": None}
    assert [row["sheet"] for row in rows[1:]] == [None, None, None] and all(row["problem"]["message"] for row in rows[1:])
    with pytest.raises(NotUnderstood):
        checked("x")


@pytest.mark.parametrize("text", ["1t" + "a" * 190_000 + " !", " " * 190_000 + "x", "%25" * 60_000, "#1z" * 60_000, "1" * 190_000 + "ppm", "[" * 190_000, '{"a":' + '"' * 190_000, "\ud800" * 1_000])
def test_a_huge_or_odd_paste_is_refused_at_once(text: str) -> None:
    begun = time.process_time()
    with pytest.raises(NotUnderstood):
        received(text)
    assert time.process_time() - begun < 0.2

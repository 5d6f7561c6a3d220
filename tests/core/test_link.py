"""The link's code: frozen examples of version 1, its size and alphabet, and what becomes of it on its way."""
from __future__ import annotations

import base64
import random
import re

import pytest

from gasbasis.errors import NotUnderstood
from gasbasis.records import link
from gasbasis.records.link import LONGEST_CODE, VERSION, read_code, write_code
from gasbasis.records.sheet import Sheet, write_sheet

# Codes as version 1 first wrote them. They open for ever: never write them anew, add those of a new version below.
FROZEN = [
    ("1z0iOC4zMzkgwrVnL23Cswg3CAzjGEOQgoAVKFz2KlWgA064rkg1",
     {"schema": 1, "hold": "Hg 1 ppb v/v", "owe": "ug/m3 at 20 °C, 101.325 kPa"}, "8.339 µg/m³"),
    ("1z0mTk94IDQ0NC40IG1nL23CswqwaTljq4oguoH6gSpAHoDWAEGyG5FGwHUBZkKBFuMYY4BeoSHIFXWwsA3k8jsh1",
     {"schema": 1, "hold": "NOx 142 ppm as NO2, dry", "gas": "9,2 % O2 dry, ambient O2 21 %",
      "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2", "settled": {"hold.parts_by": "volume"}}, "NOx 444.4 mg/m³"),
    ("1z00g3CA7lMwNlUAGuiXawyUyQGK5eWXKOTmF6UqlGQk5oGsBzoRKAUyAeTYpEoFqP90lEAhkloan5mXnJmXWpQIijAlqIWY8QpxrLcu2KlAlwJVYonZYJCjawEv8e6cr0",
     {"schema": 1, "hold": "SO2 35 mg/Nm3", "owe": "ppm by volume", "limit": "not more than 20 ppm", "rule_book": "eu_incineration",
      "settled": {"hold.conditions": "273.15K-101.3kPa", "hold.reported_as": "SO2"}}, ""),
    ("1z00q1ZKBpJA5xga6Zkq5KUrHNqoYKqgqqOQmwr0KVDUwARooA8ofg2NjUz0LBR8dBQiFQz1DAyNYIqMTCBOS0osyoeIWFoA4x_mCqBNIGvBPgI7F9MnSrUAaqhhdk1",
     {"schema": 1, "sample": "Hg 12.5 ng ± 5 %, meter 1204.3 L to 1324.8 L, Y 1.012, meter 24 °C, barometer 98.2 kPa, dry", "owe": "µg/m3 at 0 °C, 101.325 kPa"}, ""),
    ("1z00q1ZKBZJpOfnlQL1AoJBrrJ-BxUyIjWBTgTpBBgC9BdKigMsVqDpAFmen62co1QIA2ks7t00",
     {"schema": 1, "hold": "NOx 100 mg/m3 at 273.15 K, 101.325 kPa, dry", "owe": "kg/h", "emission": "flow 10000 m3/h at 273.15 K, 101.325 kPa, dry"}, ""),
    ("1z00gwiBbE-qVIA6WEepACiWXJmTmZeSWgR0k4KlpQXIhToKRqYGCrk--rnAVAG0F9NJOgpAGRNzAqqUagEcvjbkj2",
     {"schema": 1, "prepared": "cylinder NO 998 ppm, 250 mL/min at 0 °C, 101.325 kPa, in 4750 mL/min at 0 °C, 101.325 kPa", "owe": "ppm by volume"}, ""),
    ("1z0eMS4wMDAgcGcvTAg3AMFfJAZgHF8kCqUPxekFqkUJKRCozrvJKixOQSHYXknMTS4lQFE5CpIAML0vV9gFpLgEyfzLxUBSNgjJeWlObmKdUCAAu04aoc1",
     {"schema": 1, "hold": "1 ng/m3", "owe": "pg/L", "title": "Line 2, autumn", "notes": {"hold.water": "per the contract, clause 4"}}, "1.000 pg/L"),
]
CODE = FROZEN[1][0]
PLAIN = [
    Sheet(hold="NOx 142 ppm as NO2, dry", gas="9,2 % O2 dry, ambient O2 21 %", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2"),
    Sheet(hold="Hg 8.3 µg/m³ at 20 °C, 101.325 kPa", owe="ppb by volume"),
    Sheet(hold="SO2 35 mg/Nm3", owe="ppm by volume"),
    Sheet(hold="CO 85 mg/m3 (273.15 K, 101.3 kPa, dry, 11 % O2)", gas="14 % H2O, 9.2 % O2 dry, ambient O2 20.9 %", owe="ppmvd"),
    Sheet(hold="benzene 0.5 ppm", owe="mg/m3 at 25 °C, 1 atm"),
]


@pytest.mark.parametrize(("code", "sheet", "as_sent"), FROZEN, ids=[row[0][:12] for row in FROZEN])
def test_a_frozen_code_opens_field_by_field(code: str, sheet: dict, as_sent: str) -> None:
    opened = read_code(code)
    found = write_sheet(opened.sheet)
    assert set(found) == set(sheet)
    for field, value in sheet.items():
        assert found[field] == value, field
    assert opened.as_sent == as_sent


@pytest.mark.parametrize("sheet", PLAIN, ids=[sheet.hold for sheet in PLAIN])
def test_a_plain_sheet_is_short(sheet: Sheet) -> None:
    code = write_code(sheet, "NOx 444.4 mg/m³")
    assert len(code) <= 120
    assert read_code(code).sheet == sheet


@pytest.mark.parametrize("sheet", [*PLAIN, Sheet(), Sheet(hold="<script>alert(1)</script>"), Sheet(hold="水銀 \U0001f321 \u0001"), Sheet(hold="x" * 900)])
@pytest.mark.parametrize("figure", ["", "8.339 µg/m³", "≈ −2×10⁻⁵ ‰"])
def test_alphabet_and_last_character(sheet: Sheet, figure: str) -> None:
    code = write_code(sheet, figure)
    assert re.fullmatch(r"[A-Za-z0-9_-]+", code) and code[-1].isalnum() and code[0] == VERSION
    assert read_code(code).sheet == sheet and read_code(code).as_sent == figure


@pytest.mark.parametrize("pasted", [
    CODE, f"https://example.org/gas/#{CODE}", f"#{CODE}", f"https://example.org/%23{CODE}", f"https://example.org/%2523{CODE}",
    f"https://example.org/%252523{CODE}", f"https://example.org/#{CODE}.", f"(https://example.org/#{CODE}).", f"<https://example.org/#{CODE}>",
    f"https://example.org/#{CODE}\n", f"https://example.org/#{CODE[:40]}\n{CODE[40:]}", f"https://example.org/#{CODE[:40]}\r\n  {CODE[40:]}!",
    f"  \"https://example.org/#{CODE}\", ", f"https://example.org/x#y#{CODE}"])
def test_a_link_opens_as_it_is_pasted(pasted: str) -> None:
    assert read_code(pasted) == read_code(CODE)


@pytest.mark.parametrize(("pasted", "message"), [
    ("", "no gasbasis code"), ("   ", "no gasbasis code"), ("https://example.org/#", "no gasbasis code"), ("#?!.", "no gasbasis code"),
    (f"2{CODE[1:]}", "of version '2'"), (f"a{CODE[1:]}", "of version 'a'"),
    (CODE[:-1], "cut off or altered"), (CODE[:20], "cut off or altered"), ("1", "cut off or altered"), ("1z", "cut off or altered"),
    (CODE[:30] + ("a" if CODE[30] != "a" else "b") + CODE[31:], "cut off or altered"), (CODE.swapcase(), "cut off or altered"),
    (CODE[:30] + "%20" + CODE[30:], "cut off or altered"), (f"https://example.org/#{CODE} as agreed", "cut off or altered"),
    (CODE[0] + "t" + CODE[2:], "cut off or altered"), (CODE * 200, "cut off or altered"), ("1" * 10_000_000, "cut off or altered"),
])
def test_what_is_no_whole_code_is_refused(pasted: str, message: str) -> None:
    with pytest.raises(NotUnderstood) as caught:
        read_code(pasted)
    assert message in caught.value.message and caught.value.hint and caught.value.field == "link"


def test_a_sheet_too_long_for_a_link_says_so() -> None:
    dice = random.Random(1)
    letters = "".join(chr(dice.randrange(0x21, 0x7E)) for _ in range(2000))
    with pytest.raises(NotUnderstood) as caught:
        write_code(Sheet(hold=letters), "")
    assert f"{LONGEST_CODE} pass everywhere" in caught.value.message and "file" in caught.value.hint


def test_names_and_notes_stay_out_unless_asked_for() -> None:
    sheet = Sheet(hold="1 ng/m3", owe="pg/L", title="Line 2", notes={"hold.water": "clause 4"})
    assert read_code(write_code(sheet, "")).sheet == Sheet(hold="1 ng/m3", owe="pg/L")
    assert read_code(write_code(sheet, "", with_names=True)).sheet == sheet


def test_what_is_not_given_takes_no_room() -> None:
    assert len(write_code(Sheet(hold="1 ppm", owe="ppb"), "")) < 40
    assert write_code(Sheet(hold="1 ppm", settled={}), "") == write_code(Sheet(hold="1 ppm"), "")


def test_the_figure_as_sent_can_be_read_before_the_core_is_there() -> None:
    code, _, as_sent = FROZEN[0]
    length = int(code[2:4], 36)
    figure = code[4:4 + length]
    assert base64.urlsafe_b64decode(figure + "=" * (-length % 4)).decode() == as_sent


def test_a_made_up_link_with_deep_nesting_is_refused_before_it_is_parsed() -> None:
    # in the browser's engine the nesting would exhaust the stack instead of raising
    body = b'{"h":' + b"[" * 2_000 + b"]" * 2_000 + b"}"
    code = "1t00" + link._base64(body) + link._check("", body)
    with pytest.raises(NotUnderstood, match="does not hold a sheet"):
        link.read_code(code)

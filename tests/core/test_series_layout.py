"""What is understood of a logger's file. The files are invented; what they mean is plain to a reader, so no source is needed."""
from __future__ import annotations

import pytest

from gasbasis.errors import CoreError, NotUnderstood
from gasbasis.series.layout import look
from gasbasis.series.times import DAY_FIRST, MONTH_FIRST, YEAR_FIRST, Clock, clock_text


def text(*lines: str, encoding: str = "utf-8") -> bytes:
    return "\n".join(lines).encode(encoding)


PLAIN = ("Time,NOx (ppm),O2 [%],Status", "2026-03-29 00:00:00,12.5,9.1,OK", "2026-03-29 00:01:00,12.7,9.2,OK")
EUROPEAN = ("Zeit;NOx;O2;Status", ";ppm;%;", "29.03.2026 00:00;12,5;9,1;OK", "29.03.2026 00:01;12,7;9,2;Kal")


@pytest.mark.parametrize("content, delimiter, decimal, header, units, first, order", [
    (text(*PLAIN), ",", ".", 1, None, 2, YEAR_FIRST),
    (text(*EUROPEAN), ";", ",", 1, 2, 3, DAY_FIRST),
    (text("Logger 7;;;", "", *EUROPEAN), ";", ",", 3, 4, 5, DAY_FIRST),
    (text(*(line.replace(",", "\t") for line in PLAIN)), "\t", ".", 1, None, 2, YEAR_FIRST),
    (text(*PLAIN[1:]), ",", ".", None, None, 1, YEAR_FIRST),
    (text("Date,Time,NO", "03/14/2026,10:00 AM,5.5", "03/14/2026,10:01 AM,5.6"), ",", ".", 1, None, 2, MONTH_FIRST),
    (text('"Time","NOx, wet (ppm)"', '"2026-03-29T00:00:00+01:00","1,5"', '"2026-03-29T00:01:00+01:00","1,7"'), ",", ",", 1, None, 2, YEAR_FIRST),
])
def test_layout(content, delimiter, decimal, header, units, first, order):
    found = look(content)
    assert (found.delimiter, found.decimal, found.header_line, found.unit_line, found.first_line, found.date_order) == (delimiter, decimal, header, units, first, order)


def test_units_stand_in_the_header_or_below_it():
    assert [column.unit_text for column in look(text(*PLAIN)).columns] == ["", "ppm", "%", ""]
    assert [column.unit_text for column in look(text(*EUROPEAN)).columns] == ["", "ppm", "%", ""]


@pytest.mark.parametrize("content, encoding", [
    (text(*EUROPEAN), "utf-8"), (text(*EUROPEAN, encoding="utf-8-sig"), "utf-8-sig"), (text(*EUROPEAN, encoding="utf-16"), "utf-16"),
    (text("Zeit;T (°C)", "29.03.2026 00:00;12,5", "29.03.2026 00:01;12,5", encoding="cp1252"), "cp1252"),
])
def test_encodings(content, encoding):
    found = look(content)
    assert found.encoding == encoding and found.columns[1].kind == "number"


def test_what_was_understood_is_said():
    assert look(text(*EUROPEAN)).understood()[:2] == ["encoding utf-8, columns parted by a semicolon, decimal comma",
                                                      "header in line 1, units in line 2, data from line 3, 4 columns, time in 'Zeit', day first"]


def test_day_or_month_is_asked_where_the_file_leaves_it_open():
    found = look(text("Time,NO", "03/04/2026 10:00,5.5", "03/04/2026 10:01,5.6"))
    assert found.date_order is None and [question.id for question in found.questions] == ["time.date_order"]
    assert "day 3 of month 4" in found.questions[0].question
    assert look(text("Time,NO", "03/04/2026 10:00,5.5"), {"date_order": DAY_FIRST}).questions == ()


def test_grouped_thousands_are_asked():
    assert [question.id for question in look(text("Time;NO", "2026-01-01 10:00;1,234", "2026-01-01 10:01;2,345")).questions] == ["file.decimal"]


def test_mixed_decimals_are_said():
    found = look(text("Time;NO", "2026-01-01 10:00;1,2", "2026-01-01 10:01;2,3", "2026-01-01 10:02;2.3"))
    assert found.decimal == "," and "mixed" in found.notes[0] and "'2.3'" in found.notes[0]


@pytest.mark.parametrize("content, words", [
    (b"PK\x03\x04rest", "workbook"), (b"\x00\x01\x02\x03" * 99, "no text file"), (b"", "empty"), (text("NOx", "12", "13"), "one column"),
    (text("a,b", "x,y", "u,v"), "holds numbers"), (b"%PDF-1.7", "PDF"),
])
def test_what_is_no_table_says_what_and_what_to_do(content, words):
    with pytest.raises(CoreError, match=words) as raised:
        look(content)
    assert raised.value.hint


def test_stamps():
    clock = Clock(DAY_FIRST)
    assert clock.read("01.01.1970 00:01:30,5") == (90.5, 0.0)
    assert Clock(YEAR_FIRST).read("1970-01-01T02:00:00+02:00") == (0.0, 7200.0)
    assert Clock(MONTH_FIRST).read("1/2/1970 12:05 AM") == (86400 + 300, 0.0)
    assert Clock(MONTH_FIRST).read("1/2/1970 1:05 PM") == (86400 + 13 * 3600 + 300, 0.0)
    assert Clock(YEAR_FIRST).read("1970-01-01 24:00") == (86400.0, 0.0)
    assert clock_text(90.0, 3600.0, True) == "1970-01-01 01:01:30+01:00"


@pytest.mark.parametrize("stamp", ["31.02.2026 10:00", "2026", "10:00", "01.01.2026 10:61", "01.01.2026 27:00", ""])
def test_no_stamp(stamp):
    with pytest.raises(NotUnderstood):
        Clock(DAY_FIRST).read(stamp)


@pytest.mark.native                     # the tables of time zones come on demand in the page
def test_the_clock_is_put_forward():
    """Vienna, 29 March 2026: 01:59 CET (+1) is followed by 03:00 CEST (+2) (EU summer time, directive 2000/84/EC)."""
    clock = Clock(YEAR_FIRST, "Europe/Vienna")
    before, after = clock.read("2026-03-29 01:59:00")[0], clock.read("2026-03-29 03:00:00")[0]
    assert after - before == 60.0
    with pytest.raises(CoreError, match="does not exist"):
        clock.read("2026-03-29 02:30:00")


@pytest.mark.native                     # the tables of time zones come on demand in the page
def test_the_clock_is_put_back():
    """Vienna, 25 October 2026: 02:30 comes twice, an hour apart."""
    clock = Clock(YEAR_FIRST, "Europe/Vienna")
    first = clock.read("2026-10-25 02:30:00")[0]
    clock.last = first
    again = clock.read("2026-10-25 02:30:00")[0]
    assert again - first == 3600.0


def test_an_unknown_zone_is_said():
    with pytest.raises(NotUnderstood, match="no time zone"):
        Clock(YEAR_FIRST, "Europe/Nowhere")

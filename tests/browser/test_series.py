"""The series panel as a person uses it: the invented day, pasted rows, doubts, bad files, stop, what is taken away."""
from __future__ import annotations

import csv
import io
import zipfile

import pytest
from playwright.sync_api import expect

ROWS = "Time,NO (ppm)\n" + "".join(f"2026-01-05 10:{minute:02d}:00,{minute}\n" for minute in range(60))


@pytest.fixture
def series(sheet):
    sheet.page.click('[data-action="more"]')
    sheet.page.click('[data-panel="series"]')
    expect(sheet.page.get_by_role("button", name="Look at an invented day")).to_be_visible()
    return sheet


def paste(series, text):
    series.page.get_by_label("or paste its rows").fill(text)
    series.page.get_by_role("button", name="Read what was pasted").click()


def press(series, name):
    series.page.locator("#series").get_by_role("button", name=name, exact=True).click()


def restated(series):
    expect(series.page.locator("#series .series-results h3")).to_have_text("Restated")


def taken(series, name) -> bytes:
    with series.page.expect_download() as download:
        press(series, name)
    return download.value.path().read_bytes()


def test_the_invented_day(series):
    page = series.page
    press(series, "Look at an invented day")
    expect(page.locator("#series .series-understood")).to_contain_text("decimal comma")
    press(series, "Restate the series")
    restated(series)
    expect(page.locator("#series .series-results")).to_contain_text("1398 rows: 1333 restated, 65 without all their figures")
    expect(page.locator("#series .series-results")).to_contain_text("3 % O₂")
    assert page.locator("#series .series-plot canvas").count() == 2
    assert series.width_needed() <= 390
    lines = [line for line in taken(series, "Rows as CSV").decode("utf-8").splitlines() if not line.startswith("# ")]
    assert len(lines) == 1399 and lines[0] == "Time;NOx (mg/m³);CO (mg/m³);problem"
    assert taken(series, "Means as CSV").decode("utf-8").count("\n60 min;NOx;") == 24
    press(series, "Make a workbook (XLSX)")
    with zipfile.ZipFile(io.BytesIO(taken(series, "The workbook is ready: take it"))) as book:
        assert 'name="Bad rows"' in book.read("xl/workbook.xml").decode()


def test_pasted_rows_and_a_doubt(series):
    """NO 0 to 59 ppm by volume at 0 degC, 101.325 kPa: the last is 59 x 30.006/22.414 mg/m3 (molar volume of an ideal gas, CODATA; N 14.007, O 15.999)."""
    paste(series, ROWS)
    panel = series.page.locator("#series")
    panel.get_by_label("You owe").fill("mg/m3 at 273.15 K, 101.325 kPa")
    press(series, "Restate the series")
    expect(panel.locator(".series-problem")).to_contain_text("doubt is open")
    panel.locator(".series-problem button").first.click()
    restated(series)
    rows = list(csv.reader(line for line in taken(series, "Rows as CSV").decode("utf-8").splitlines() if not line.startswith("# ")))
    assert float(rows[-1][1]) == pytest.approx(59 * 30.006 / 22.41396954, rel=1e-5)


@pytest.mark.parametrize("content, words", [(b"PK\x03\x04" + b"0" * 99, "workbook"), (b"\x00\x01\x02" * 999, "no text file"), (b"NO\n1\n2\n", "one column"), (b"", "empty")])
def test_a_file_that_is_none_says_what_and_what_to_do(series, content, words):
    series.page.get_by_label("A file of readings").set_input_files({"name": "readings.csv", "mimeType": "text/csv", "buffer": content})
    expect(series.page.locator("#series .series-understood .problem")).to_contain_text(words)


def test_day_or_month_is_asked(series):
    paste(series, "Time,NO (ppm)\n03/04/2026 10:00,1\n03/04/2026 10:01,2\n")
    question = series.page.locator("#series .series-question")
    expect(question).to_contain_text("day 3 of month 4")
    question.get_by_role("button", name="day first").click()
    expect(question).to_have_count(0)


def test_a_long_run_can_be_stopped_and_the_sheet_stays_alive(series):
    many = "Time,NO (ppm)\n" + "".join(f"2026-01-{1 + second // 86400:02d} {second // 3600 % 24:02d}:{second // 60 % 60:02d}:{second % 60:02d},{second % 90}\n" for second in range(300_000))
    series.page.get_by_label("A file of readings").set_input_files({"name": "long.csv", "mimeType": "text/csv", "buffer": many.encode()})
    panel = series.page.locator("#series")
    panel.get_by_label("You owe").fill("mg/m3 at 273.15 K, 101.325 kPa")
    panel.get_by_label("Take the usual reading").check()
    press(series, "Restate the series")
    expect(panel.locator(".series-run")).to_contain_text("left")
    press(series, "Stop")
    expect(panel.locator(".series-run")).to_contain_text("Stopped")
    panel.get_by_role("button", name="Close").click()
    series.write(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
    expect(series.value).to_have_text("8.339 µg/m³")


def test_the_plot_by_keyboard(series):
    press(series, "Look at an invented day")
    press(series, "Restate the series")
    restated(series)
    plot = series.page.locator("#series .series-plot").first
    before = plot.locator("canvas").evaluate("canvas => canvas.toDataURL()")
    plot.focus()
    series.page.keyboard.press("+")
    series.page.wait_for_timeout(300)
    assert plot.locator("canvas").evaluate("canvas => canvas.toDataURL()") != before

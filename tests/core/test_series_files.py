"""Whole files through: the demo day, bad input, what is written, the terminal."""
from __future__ import annotations

import csv
import json
import subprocess
import sys
import zipfile
from pathlib import Path

import pytest

from gasbasis.errors import CoreError
from gasbasis.records.restated import restated
from gasbasis.records.sheet import Sheet
from gasbasis.series.run import restate_file
from gasbasis.series.settings import read_settings
from gasbasis.series.template import row_texts

pytestmark = pytest.mark.native         # reads the demo and writes files

ROOT = Path(__file__).resolve().parents[2]
DEMO, SETTINGS = ROOT / "demo" / "logger_day.csv", ROOT / "demo" / "series" / "logger_day.json"
SIMPLE = {"species": [{"name": "NO", "hold": "NO {NO} ppm by volume, dry", "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry"}]}


def written(path: Path) -> tuple[list[str], list[list[str]]]:
    lines = path.read_text("utf-8").splitlines()
    above = [line for line in lines if line.startswith("# ")]
    return above, list(csv.reader(lines[len(above):], delimiter=";" if ";" in lines[len(above)] else ","))


@pytest.fixture(scope="module")
def demo(tmp_path_factory):
    folder = tmp_path_factory.mktemp("demo")
    given = json.loads(SETTINGS.read_text("utf-8")) | {"digits": 15}
    record = restate_file(DEMO, given, str(folder / "rows.csv"), str(folder / "means.csv"))
    return given, record, written(folder / "rows.csv"), written(folder / "means.csv")


def test_the_demo_day_is_counted_to_the_row(demo):
    """As it was invented: 1440 minutes, 43 without power, one row twice, 60 of calibration, two cells '----', one empty, one with a point."""
    record = demo[1]
    assert (record["rows"], record["good"], record["bad"], record["put_aside"]) == (1398, 1333, 65, 60)
    assert {entry["reason"]: entry["rows"] for entry in record["reasons"]} == {
        "Status: put aside by its status": 60, "O2: missing": 2, "NOx: missing": 1, "NOx: other decimal sign": 1, "Time: time": 1}
    assert record["means"]["gaps"] == 1 and record["means"]["gap_hours"] == pytest.approx(43 / 60)


def test_every_row_of_the_demo_is_its_single_sheet(demo):
    given, _, (_, rows), _ = demo
    settings = read_settings(given)
    source = list(csv.reader(DEMO.read_text("utf-8").splitlines(), delimiter=";"))[3:]
    names, compared = ["Time", "NOx", "CO", "O2", "H2O", "Flow", "Status"], 0
    for line, result in zip(source, rows[1:], strict=True):
        if compared >= 300 and result[3] == "":
            continue                    # some hundreds and every unusual row
        numbers = {name: cell.replace(",", ".") for name, cell in zip(names, line)}
        for index, species in enumerate(settings.species):
            if not result[1 + index] or result[1 + index].startswith("<"):
                continue
            texts = row_texts(species.texts, numbers)
            alone = restated(Sheet(texts.hold, texts.gas, texts.owe), take_usual=True)["figure"]["value"]
            assert float(result[1 + index].replace(",", ".")) == pytest.approx(alone, rel=1e-12)
            compared += 1
    assert compared >= 300


def test_a_row_of_the_demo_by_hand(demo):
    """The first row: 131.2 ppm wet, 8.34 % O2 dry, 12.4 % H2O. x p M/(R T) with M(NO2) = 46.005 g/mol (IUPAC abridged weights: N 14.007, O 15.999), R exact (SI)."""
    by_hand = 131.2e-6 * 101300 * 46.005 / (8.31446261815324 * 273.15) * 1e3 / (1 - 0.124) * (21 - 3) / (21 - 8.34)
    assert float(demo[2][1][1][1].replace(",", ".")) == pytest.approx(by_hand, rel=1e-12)


def test_the_block_above_states_basis_version_and_settings(demo):
    above = "\n".join(demo[2][0])
    assert "mg/m³ at 273.15 K, 101.3 kPa, dry, at 3 % O₂" in above and "gasbasis 0." in above and "Europe/Vienna" in above
    settings = next(line for line in demo[2][0] if line.startswith("# settings: "))
    assert json.loads(settings.removeprefix("# settings: ")) == demo[0]


def test_an_hourly_mean_of_the_demo_is_the_mean_of_its_rows(demo):
    _, _, (_, rows), (_, means) = demo
    hour = [float(row[1].replace(",", ".")) for row in rows[1:] if row[0].startswith("28.03.2026 19:")]
    mean = next(row for row in means if row[:3] == ["60 min", "NOx", "2026-03-28 19:00:00+01:00"])
    assert len(hour) == 60 and float(mean[4].replace(",", ".")) == pytest.approx(sum(hour) / 60, rel=1e-12)


def test_bad_rows_stay_in_the_file_with_their_reason(demo):
    problems = [row for row in demo[2][1][1:] if row[3]]
    assert len(problems) == 65 and any("has a point" in row[3] for row in problems) and any("repeats" in row[3] for row in problems)


def test_a_workbook(tmp_path):
    pytest.importorskip("xlsxwriter")
    restate_file(DEMO, json.loads(SETTINGS.read_text("utf-8")), str(tmp_path / "out.xlsx"))
    with zipfile.ZipFile(tmp_path / "out.xlsx") as book:
        names, sheet = book.read("xl/workbook.xml").decode(), book.read("xl/worksheets/sheet2.xml").decode()
    assert all(f'name="{name}"' in names for name in ("About", "Rows", "Means", "Bad rows"))
    assert sheet.count("<row ") == 1 + 1398


def run_lines(tmp_path, *lines, settings=SIMPLE, encoding="utf-8", name="file.csv"):
    path = tmp_path / name
    path.write_bytes("\n".join(lines).encode(encoding))
    return restate_file(path, settings, str(tmp_path / "out.csv")), written(tmp_path / "out.csv")[1]


def test_forty_percent_junk(tmp_path):
    lines = ["t,NO"] + [f"2026-01-01 {place // 60:02d}:{place % 60:02d},{'???' if place % 5 in (1, 2) else place}" for place in range(1000)]
    record, rows = run_lines(tmp_path, *lines)
    assert (record["rows"], record["good"], record["bad"], record["bad_rows_not_listed"]) == (1000, 600, 400, 200)
    assert record["bad_rows"][0] == {"line": 3, "column": "NO", "reason": "no number: '???'"} and len(rows) == 1001


@pytest.mark.parametrize("cell, reason", [("", "empty"), ("1_000", "no number"), ("nan", "no number"), ("inf", "no number"), ('"1,5"', "comma"), ("1e9999", "no number"), ("0x10", "no number")])
def test_cells_that_are_no_number(tmp_path, cell, reason):
    record, _ = run_lines(tmp_path, "t,NO", "2026-01-01 00:00,1.5", f"2026-01-01 00:01,{cell}", "2026-01-01 00:02,1.5")
    assert record["bad"] == 1 and reason in record["bad_rows"][0]["reason"] and record["bad_rows"][0]["line"] == 3


def test_duplicate_and_backward_times(tmp_path):
    record, _ = run_lines(tmp_path, "t,NO", "2026-01-01 00:01,1", "2026-01-01 00:01,1", "2026-01-01 00:00,1", "2026-01-01 00:02,1")
    assert [entry["reason"].split("'")[2].strip() for entry in record["bad_rows"]] == ["repeats the time of a row above", "lies before the time of a row above"]


def test_a_row_with_another_number_of_cells(tmp_path):
    record, rows = run_lines(tmp_path, "t,NO,x", "2026-01-01 00:00,1,", "2026-01-01 00:01,1", "", "2026-01-01 00:02,1,")
    assert (record["good"], record["bad"], record["blank"]) == (2, 1, 1) and record["bad_rows"][0]["line"] == 3


def test_no_header(tmp_path):
    settings = {"species": [{**SIMPLE["species"][0], "hold": "NO {column 2} ppm by volume, dry"}]}
    assert run_lines(tmp_path, "2026-01-01 00:00,1", "2026-01-01 00:01,2", settings=settings)[0]["good"] == 2


def test_quoted_cells_with_line_ends_keep_the_count_of_lines(tmp_path):
    record, _ = run_lines(tmp_path, "t,NO,note", "2026-01-01 00:00,1,\"two\nlines\"", "2026-01-01 00:01,?,")
    assert record["bad_rows"][0]["line"] == 4


def test_a_row_the_relations_refuse_has_the_sheets_reason(tmp_path):
    settings = {"species": [{"name": "NO", "hold": "NO {NO} ppm by volume, wet", "gas": "{w} % H2O", "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry"}]}
    record, _ = run_lines(tmp_path, "t,NO,w", "2026-01-01 00:00,1,10", "2026-01-01 00:01,1,101", settings=settings)
    assert record["good"] == 1 and "water content" in record["bad_rows"][0]["reason"]


@pytest.mark.parametrize("content, words", [(b"PK\x03\x04" + b"x" * 50, "workbook"), (bytes(range(256)) * 20, "no text file"), (b"NO\n1\n2\n", "one column"), (b"", "empty")])
def test_files_that_are_none(tmp_path, content, words):
    (tmp_path / "f.csv").write_bytes(content)
    with pytest.raises(CoreError, match=words) as raised:
        restate_file(tmp_path / "f.csv", SIMPLE)
    assert raised.value.hint


def test_a_column_that_is_not_there_is_named_with_those_there_are(tmp_path):
    with pytest.raises(CoreError, match="no column 'NO'") as raised:
        run_lines(tmp_path, "t,NOx", "2026-01-01 00:00,1")
    assert "'NOx'" in raised.value.hint


def terminal(*arguments):
    return subprocess.run([sys.executable, "-m", "gasbasis", "series", *map(str, arguments)], capture_output=True, text=True, cwd=ROOT / "pycore")


def test_the_terminal(tmp_path):
    done = terminal(DEMO, "--settings", SETTINGS, "--out", tmp_path / "o.csv", "--means", tmp_path / "m.csv")
    assert done.returncode == 0 and "1398 rows: 1333 restated" in done.stdout and (tmp_path / "m.csv").exists()
    looked = terminal(DEMO)
    assert looked.returncode == 0 and "{O2}  number, in %" in looked.stdout and "day first" in looked.stdout
    wrong = terminal(tmp_path / "none.csv", "--settings", SETTINGS)
    assert wrong.returncode == 2 and "cannot be opened" in wrong.stderr


def test_whole_columns_from_the_terminal(tmp_path):
    pytest.importorskip("polars")
    done = terminal(DEMO, "--settings", SETTINGS, "--out", tmp_path / "o.csv", "--columns")
    assert done.returncode == 0 and json.loads(done.stdout)["rows"] == 1398 and json.loads(done.stdout)["without NOx"] == 64


def test_memory_stays_constant(tmp_path):
    """Four times the rows, the same peak within a few megabytes."""
    peaks = []
    for rows in (50_000, 200_000):
        path = tmp_path / f"{rows}.csv"
        path.write_text("t,NO\n" + "".join(f"2026-01-{1 + place // 86400:02d} {place // 3600 % 24:02d}:{place // 60 % 60:02d}:{place % 60:02d},{place % 97}.5\n" for place in range(rows)))
        (tmp_path / "s.json").write_text(json.dumps(SIMPLE))
        script = ("import re, sys; from gasbasis.__main__ import main; main(sys.argv[1:]); "
                  "print(re.search(r'VmHWM:\\s+(\\d+)', open('/proc/self/status').read())[1], file=sys.stderr)")
        done = subprocess.run([sys.executable, "-c", script, "series", str(path), "--settings", str(tmp_path / "s.json"), "--out", str(tmp_path / "o.csv")],
                              capture_output=True, text=True, cwd=ROOT / "pycore", check=True)
        peaks.append(int(done.stderr.strip().splitlines()[-1]))
    assert peaks[1] - peaks[0] < 8_000   # kB

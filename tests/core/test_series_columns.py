"""Whole columns with polars, where it is installed: the same figures as row by row, and so as single sheets."""
from __future__ import annotations

import csv
import random

import pytest

from gasbasis.series.run import restate_file

pytestmark = pytest.mark.native
pytest.importorskip("polars")

CASES = {
    "oxygen and water": ({"hold": "NOx {a} ppm by volume as NO2, wet", "gas": "{h} % H2O, {o} % O2 dry, ambient O2 20.9 %", "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2"}, ""),
    "one-sided rule": ({"hold": "CO {a} ppm by volume, dry", "gas": "{o} % O2 dry, ambient O2 21 %", "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry, 11 % O2", "rule_book": "eu_incineration_hazardous"}, ""),
    "dew point": ({"hold": "CO {a} mg/m3 at 273.15 K, 101.3 kPa, wet", "gas": "dew point {h} °C, 1008 hPa, 80 °C", "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry"}, ""),
}


@pytest.mark.parametrize("decimal, delimiter", [(".", ","), (",", ";")])
@pytest.mark.parametrize("name", CASES)
def test_columns_equal_rows(tmp_path, name, decimal, delimiter):
    from gasbasis.series.columns import restate_columns
    draw = random.Random(3)
    lines = [delimiter.join(("t", "a", "h", "o"))]
    for place in range(400):
        cells = [f"{draw.uniform(0, 200):.2f}", f"{draw.uniform(0, 30):.2f}", f"{draw.uniform(4, 20.5):.2f}"]
        if place % 50 == 49:
            cells[place % 3] = "bad"
        lines.append(delimiter.join([f"2026-01-01 {place // 60:02d}:{place % 60:02d}", *(cell.replace(".", decimal) for cell in cells)]))
    (tmp_path / "f.csv").write_text("\n".join(lines) + "\n")
    given = {"species": [{"name": "X", **CASES[name][0]}], "usual": True, "digits": 17}
    record = restate_file(tmp_path / "f.csv", given, str(tmp_path / "rows.csv"))
    counted = restate_columns(str(tmp_path / "f.csv"), given, str(tmp_path / "columns.csv"))
    rows = [line for line in csv.reader((line for line in (tmp_path / "rows.csv").read_text().splitlines() if not line.startswith("# ")), delimiter=delimiter)][1:]
    columns = list(csv.reader((tmp_path / "columns.csv").read_text().splitlines(), delimiter=delimiter))[1:]
    assert (counted["rows"], counted["without X"]) == (400, record["bad"])
    for row, column in zip(rows, columns, strict=True):
        assert bool(row[1]) == bool(column[1])
        if row[1]:
            assert float(column[1].replace(",", ".")) == pytest.approx(float(row[1].replace(",", ".")), rel=1e-12)

"""The door the page's series worker uses: JSON text in, JSON text out, never raises. Files lie in the worker's file system."""
from __future__ import annotations

import json
import os
import re
import traceback
from array import array
from typing import Callable, Mapping

from gasbasis.calculation.verdict import RULES
from gasbasis.errors import CoreError
from gasbasis.language.numbers import significant
from gasbasis.series.layout import Column, Layout
from gasbasis.series.report import statistics_table, text_of
from gasbasis.series.run import layout_of, restate_file
from gasbasis.series.settings import BELOW_RULES, NEGATIVE_RULES, ORDERS, STAMPS
from gasbasis.series.writing import MEAN_NAMES, mean_cells

ROWS, MEANS, BOOK = "/tmp/rows.csv", "/tmp/means.csv", "/tmp/series.xlsx"
_MEANS_LISTED = 5_000                   # on the page; all of them are in the file
_ROLES = (("value", "a reading to restate"), ("oxygen", "oxygen"), ("water", "water content"), ("temperature", "gas temperature"), ("pressure", "gas pressure"),
          ("flow", "flow"), ("status", "status"), ("", "not used"))
# Names as loggers head such columns (common practice, no source); only proposals, each to be looked over.
_BY_NAME = (("oxygen", re.compile(r"\bO2|oxygen|sauerstoff", re.I)), ("water", re.compile(r"\bH2O|water|moist|feuchte", re.I)), ("flow", re.compile(r"\bflow|volumenstrom|\bQ\b", re.I)),
            ("temperature", re.compile(r"\btemp|^T\b", re.I)), ("pressure", re.compile(r"press|druck|^p\b", re.I)), ("status", re.compile(r"status|state|quality|flag", re.I)))
_GAS = {"oxygen": "{%s} %% O2", "water": "{%s} %% H2O", "temperature": "{%s} %s", "pressure": "{%s} %s"}


def respond(request: str, progress: Callable[[int, int], object] = lambda done, of: None) -> str:
    """Answer {"task": "look" | "propose" | "run", ...} as `gasbasis.answer` does."""
    try:
        data = json.loads(request)
        result = {"ok": True, "answer": {"look": _look, "propose": _propose, "run": _run}[data["task"]](data, progress)}
    except CoreError as error:
        result = {"ok": False, "error": error.as_json() | {"readings": getattr(error, "readings", [])}}
    except Exception as error:          # what is left is a defect of ours, and the page must hear of it
        result = {"ok": False, "error": {"kind": "defect", "field": "", "span": None, "message": f"gasbasis failed: {error!r}.", "hint": "Please report it.",
                                         "detail": traceback.format_exc(), "readings": []}}
    return json.dumps(result, ensure_ascii=False)


def _look(data: Mapping, progress) -> dict:
    layout = layout_of(data["path"], data.get("said"))
    return {"understood": layout.understood(), "size": os.path.getsize(data["path"]),
            "columns": [{"name": column.name, "unit": column.unit_text, "kind": column.kind, "example": column.example, "texts": list(column.texts), "role": _role(column)}
                        for column in layout.columns],
            "questions": [{"id": question.id, "question": question.question, "readings": [{"id": identity, "label": label} for identity, label in question.readings]}
                          for question in layout.questions],
            "roles": [{"id": identity, "label": label} for identity, label in _ROLES],
            "choices": {"stamp": STAMPS, "order": ORDERS, "below": BELOW_RULES, "negatives": NEGATIVE_RULES,
                        "rules": {rule.id: rule.title for rule in RULES.values()}}}


def _role(column: Column) -> str:
    if column.kind == "text":
        return "status" if dict(_BY_NAME)["status"].search(column.name) else ""
    if column.kind != "number":
        return ""
    return next((role for role, pattern in _BY_NAME if pattern.search(column.name)), "value")


def _propose(data: Mapping, progress) -> dict:
    """Settings from the roles given to the columns. What the columns do not say (wet or dry, the owed basis) is left to be typed."""
    layout: Layout = layout_of(data["path"], data.get("said"))
    roles: Mapping[str, str] = data["roles"]
    columns = {column.name: column for column in layout.columns}
    gas = ", ".join(_gas_text(role, columns[name]) for name, role in roles.items() if role in _GAS)
    species = [{"name": _bare(columns[name]), "hold": f"{_bare(columns[name])} {{{name}}} {columns[name].unit_text or 'ppm'}", "owe": data.get("owe", ""), "limit": ""}
               for name, role in roles.items() if role == "value"]
    settings: dict = {"schema": 1, "gas": gas, "species": species}
    status = next((name for name, role in roles.items() if role == "status"), None)
    if status is not None:
        settings["status"] = {"column": status, "valid": list(columns[status].texts[:1])}
    flow = next((name for name, role in roles.items() if role == "flow"), None)
    if flow is not None:
        settings["flow"] = {"column": flow, "unit": columns[flow].unit_text or "m3/h", "basis": ""}
    return settings


def _bare(column: Column) -> str:
    return re.sub(r"\s*[\[(].*", "", column.name)


def _gas_text(role: str, column: Column) -> str:
    return _GAS[role] % ((column.name, column.unit_text or {"temperature": "°C", "pressure": "hPa"}[role]) if role in ("temperature", "pressure") else column.name)


class Points:
    """What the page draws: times and figures as they come, and the means."""

    def __init__(self, species: int) -> None:
        self.times, self.figures, self.offset = array("d"), [array("d") for _ in range(species)], None

    def take(self, rows, means, block) -> None:
        if rows.clock is None:          # no stamps: the rows are counted
            self.times.extend(float(line) for line in block.lines)
        elif self.offset is None and block.seconds:
            self.offset = rows.clock.offset_at(block.seconds[0]) if block.seconds[0] == block.seconds[0] else 0.0
        if rows.clock is not None:      # a row whose stamp cannot be read has no place on the axis
            kept = [place for place, second in enumerate(block.seconds) if second == second and place not in block.problems] if block.problems else None
            if kept is not None:
                return self._some(block, kept)
            self.times.extend(block.seconds)
        for kept, figures in zip(self.figures, block.figures):
            kept.extend(figures)


    def _some(self, block, kept) -> None:
        self.times.extend(block.seconds[place] for place in kept)
        for column, figures in zip(self.figures, block.figures):
            column.extend(figures[place] for place in kept)


points = Points(0)


def _run(data: Mapping, progress) -> dict:
    global points
    given = data["settings"]
    points = Points(len(given.get("species", ())))
    means: list[dict] = []

    def mean(taken, each) -> None:
        if len(means) < _MEANS_LISTED:
            cells = mean_cells(taken.rows, taken, each)
            means.append({"window": cells[0], "species": cells[1], "from": cells[2], "to": cells[3], "value": each.value if each.value == each.value else None,
                          "texts": [cell if isinstance(cell, str) else "" if cell != cell else significant(cell, 4) if isinstance(cell, float) else str(cell) for cell in cells],
                          "start": each.start, "end": each.end, "enough": each.enough, "verdict": each.words})

    windows = given.get("means", {}).get("windows")
    record = restate_file(data["path"], given, BOOK if data.get("book") else ROWS, MEANS if windows else None, progress, points.take, mean)
    return record | {"summary": text_of(record, with_means=False), "statistics": statistics_table(record), "mean_names": list(MEAN_NAMES), "means_listed": means, "count": len(points.times), "offset_s": points.offset or 0.0,
                     "ends": [_ends(figures) for figures in points.figures], "upper_limits": _upper_limits(record, given)}


def _ends(figures: array) -> str:
    """From the lowest to the highest figure, in words."""
    known = [figure for figure in figures if figure == figure]
    return f"from {significant(min(known), 4)} to {significant(max(known), 4)}" if known else ""


def _upper_limits(record: dict, given: Mapping) -> list[float | None]:
    """The limits to draw, species by species."""
    windows = (record["means"] or {}).get("windows") or []
    return [species["upper_limit"] for species in windows[0]["species"]] if windows else [None] * len(given["species"])


def column_bytes(index: int) -> bytes:
    """The times (index 0) or the figures of a species (1, 2, ...) of the last run, as doubles."""
    return (points.times if index == 0 else points.figures[index - 1]).tobytes()

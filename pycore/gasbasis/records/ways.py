"""The lines on how the number came about: read from a sheet, and brought into its case."""
from __future__ import annotations

from dataclasses import dataclass
from typing import Mapping

from gasbasis.calculation import routes
from gasbasis.errors import CoreError
from gasbasis.language.basis import Statement
from gasbasis.language.emission import read_emission
from gasbasis.language.prepared import read_prepared
from gasbasis.language.sample import read_sample
from gasbasis.records.sheet import Sheet

_READERS = {"sample": read_sample, "prepared": read_prepared, "emission": read_emission}


@dataclass(frozen=True)
class Ways:
    """What is said of sample, prepared gas and emission; a line that is empty is not there."""

    records: Mapping[str, object]
    problems: tuple[CoreError, ...]


def read_ways(sheet: Sheet) -> Ways:
    """The lines of a sheet that are not empty, read."""
    records, problems = {}, []
    for side, read in _READERS.items():
        text = getattr(sheet, side)
        if text.strip():
            records[side], found = read(text)
            problems.extend(found)
    return Ways(records, tuple(problems))


def held(typed: Statement, ways: Ways) -> Statement:
    """What is held: as typed, or what a line on its origin comes to. Raises CoreError."""
    return routes.hold_statement(typed, ways.records.get("sample"), ways.records.get("prepared"))


def is_held_by_way(sheet: Sheet) -> bool:
    """Whether the held value comes from a sample or a prepared gas."""
    return bool(sheet.sample.strip() or sheet.prepared.strip())

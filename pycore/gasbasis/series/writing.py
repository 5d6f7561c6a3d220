"""What comes out: rows and means as CSV with a block above that states basis, version and settings, so that the file speaks for itself.

Delimiter and decimals are those of the file that was read.
"""
from __future__ import annotations

import csv
import json
import math
from itertools import repeat
from typing import Callable, Mapping, Sequence, TextIO

from gasbasis import __version__
from gasbasis.series.means import Mean, Means
from gasbasis.series.rows import Block, Rows
from gasbasis.series.settings import BELOW_RULES, NEGATIVE_RULES, ORDERS, STAMPS
from gasbasis.series.times import clock_text

_MARK = "# "
CAUTION = "A figure is no clearance to enter, no alarm setting and no medical advice. Local codes and licensed practice decide."


def bases(rows: Rows) -> list[tuple[str, str, str]]:
    """Name, unit and basis of each species, as far as a row has been restated."""
    found = []
    for species, restating in zip(rows.settings.species, rows.restatings):
        path = restating.paths[0] if restating.paths else None
        basis = ", ".join(path.basis) if path else "no row has been restated so far"
        found.append((f"{species.name}" + (f" ({path.species_text})" if path and path.species_text != species.name else ""), path.shown.unit_text if path else "", basis))
    return found


def about(rows: Rows, given: Mapping) -> list[str]:
    """The lines above the figures."""
    settings = rows.settings
    lines = [f"gasbasis {__version__}, series" + (f": {settings.title}" if settings.title else "")]
    lines += [f"{name}: {unit_text} {basis}" for name, unit_text, basis in bases(rows)]
    lines += [f"{species.name} from: {species.texts.hold} | {species.texts.gas} | {species.texts.owe}" for species in settings.species]
    lines += [f"read: {text}" for text in rows.layout.understood()]
    lines += [f"time zone: {settings.zone or 'the clock of the logger, as it is'}"]
    if settings.windows:
        below = BELOW_RULES.get(settings.below, "not counted: no rule was chosen")
        lines += [f"means: {ORDERS[settings.order]}; {STAMPS[settings.stamp]}; '<' {below}; negatives {NEGATIVE_RULES[settings.negatives]}",
                  f"data capture: {settings.capture_percent:g} % of the interval" if settings.capture_percent else "data capture: none asked for"]
    if settings.flow is not None:
        weighs = "; means are weighted by it" if settings.flow.weighs else ""
        lines += [f"flow: {settings.flow.column} in {settings.flow.unit} at {settings.flow.basis}{weighs}"]
    return [*lines, f"digits: {settings.digits} significant, rounded", f"settings: {json.dumps(given, ensure_ascii=False, sort_keys=True)}", CAUTION]


class _Table:
    """A CSV file with the block above it."""

    def __init__(self, target: TextIO, rows: Rows):
        self.target, self.rows = target, rows
        self.writer = csv.writer(target, delimiter=rows.layout.delimiter, lineterminator="\n")
        self.number = number_format(rows.settings.digits, rows.layout.decimal)

    def _head(self, given: Mapping, names: Sequence[str]) -> None:
        self.target.writelines(f"{_MARK}{line}\n" for line in about(self.rows, given))
        self.writer.writerow(names)


class RowsFile(_Table):
    """Each row of the file: its time, its figures, and why it has none."""

    def __init__(self, target: TextIO, rows: Rows, given: Mapping):
        super().__init__(target, rows)
        self.given, self.started, self.count = given, False, len(rows.settings.species)
        cell = f"{{:#.{rows.settings.digits}g}}{rows.layout.delimiter}"
        self.line = ("{}" + rows.layout.delimiter + cell * self.count + "\n").format if rows.layout.decimal == "." else None    # a row with nothing unusual

    def take(self, block: Block) -> None:
        if not self.started:
            self.started = True
            self._head(self.given, row_names(self.rows))
        if not block.problems and self.line is not None and self.rows.layout.delimiter not in "".join(block.stamps) and not any(block.below):
            self.target.write("".join(map(self.line, block.stamps, *block.figures[:self.count])))
            return
        number = self.number
        columns = [list(map(number, figures)) for figures in block.figures[:self.count]]
        for below, column in zip(block.below, columns):
            for place in below:
                column[place] = f"<{column[place]}"
        problems = [block.problems.get(place, "") for place in range(len(block.lines))] if block.problems else repeat("")
        self.writer.writerows(zip(block.stamps, *columns, problems))


def row_names(rows: Rows) -> list[str]:
    """The header of the restated rows."""
    time = " ".join(rows.layout.time_columns) or "time"
    return [time, *(f"{species.name} ({unit_text})" for species, (_, unit_text, _) in zip(rows.settings.species, bases(rows))), "problem"]


MEAN_NAMES = ("window", "species", "from", "to", "mean", "unit", "other order", "difference (%)", "rows", "rows expected", "capture (%)", "enough data", "verdict", "mass (kg)")


class MeansFile(_Table):
    """One line a mean."""

    def __init__(self, target: TextIO, rows: Rows, given: Mapping):
        super().__init__(target, rows)
        self.given, self.started = given, False

    def take(self, means: Means, mean: Mean) -> None:
        if not self.started:
            self.started = True
            self._head(self.given, MEAN_NAMES)
        self.writer.writerow([self.number(entry) if isinstance(entry, float) else entry for entry in mean_cells(self.rows, means, mean)])


def mean_cells(rows: Rows, means: Means, mean: Mean) -> list[str | int | float]:
    """A mean as one row of a table; numbers as numbers."""
    clock = rows.clock
    with_offset = clock.zone is not None
    start, end = (clock_text(moment, clock.offset_at(moment), with_offset) for moment in (mean.start, mean.end))
    unit_text = bases(rows)[mean.species][1]
    return [means.windows[mean.window].title, rows.settings.species[mean.species].name, start, end, mean.value, unit_text, mean.other, mean.difference_percent,
            mean.count, round(mean.expected), mean.capture_percent, "yes" if mean.enough else "no", mean.words, math.nan if mean.mass is None else mean.mass]


def number_format(digits: int, decimal: str) -> Callable[[float], str]:
    """A function that prints a number to so many significant digits in the file's decimals; NaN is an empty cell."""
    plain = f"{{:#.{digits}g}}".format         # trailing zeros are kept: they say how far the number was printed
    if decimal == ".":
        return lambda value: plain(value) if value == value else ""
    return lambda value: plain(value).replace(".", ",") if value == value else ""

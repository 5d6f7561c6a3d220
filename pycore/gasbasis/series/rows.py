"""The rows of a file, in blocks: cells to numbers, numbers to figures, bad rows counted and listed with their line and reason.

A block goes through by whole columns as long as nothing in it is unusual; otherwise row by row. Both give the same.
"""
from __future__ import annotations

import codecs
import csv
import io
import math
import re
from collections import Counter
from dataclasses import dataclass, field, replace
from itertools import chain, islice
from operator import lt
from typing import Iterable, Iterator, Sequence

from gasbasis.errors import CoreError, Missing, NotUnderstood
from gasbasis.series.layout import Layout
from gasbasis.series.restating import NAN, Restating
from gasbasis.series.settings import Settings, SpeciesSettings
from gasbasis.series.template import make_template
from gasbasis.series.times import YEAR_FIRST, Clock

BLOCK = 256                            # rows; small enough to stay near the processor, and one unusual row slows one block
LARGEST = 1e99                         # beyond it is no measured number, and products leave the floats
LISTED = 200                           # bad rows named one by one; all are counted
_NUMBER = {".": re.compile(r"[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,2})?"), ",": re.compile(r"[+-]?(?:\d+,?\d*|,\d+)(?:[eE][+-]?\d{1,2})?")}
_BELOW = re.compile(r"(?:<=?|≤)\s*")
_LONGEST_CELL = 60


class BadCell(Exception):
    """A cell that is no number: its column, and why in words."""

    def __init__(self, column: str, kind: str, cell: str = ""):
        super().__init__(kind)
        self.column, self.kind, self.cell = column, kind, cell


@dataclass(frozen=True)
class BadRow:
    line: int
    column: str
    reason: str


@dataclass
class Tally:
    """What became of the lines."""

    rows: int = 0                      # with anything in them
    good: int = 0                      # restated for every species
    blank: int = 0
    bad: int = 0                       # rows that lack at least one figure
    marked: int = 0                    # of these: put aside by their status
    outside: int = 0                   # rows before or behind the span asked for
    below: int = 0                     # figures from a "<" reading
    reasons: Counter = field(default_factory=Counter)     # reason without its numbers -> rows
    listed: list[BadRow] = field(default_factory=list)    # the first LISTED

    def refuse(self, line: int, column: str, kind: str, detail: str) -> str:
        reason = f"{kind}: {detail}" if detail else kind
        self.bad += 1
        self.reasons[f"{column}: {kind}" if column else kind] += 1
        if len(self.listed) < LISTED:
            self.listed.append(BadRow(line, column, reason))
        return reason


@dataclass(frozen=True)
class Block:
    """Restated rows. `figures`, `inputs` by species; NaN where a row has none, and `problems` says why."""

    lines: Sequence[int]
    stamps: Sequence[str]
    seconds: Sequence[float]           # NaN where the stamp cannot be read
    figures: Sequence[Sequence[float]]
    inputs: Sequence[Sequence[Sequence[float]]]
    below: Sequence[frozenset]         # rows whose figure is "<", by species
    flow: Sequence[float] | None
    problems: dict[int, str]           # place in the block -> reason


class Rows:
    """Reads a file's rows and restates them. `tally` counts as they pass."""

    def __init__(self, layout: Layout, settings: Settings):
        for question in layout.questions:
            readings = " or ".join(f'"{identity}" ({label})' for identity, label in question.readings)
            raise Missing(question.question, hint=f"Settle it in the settings: {question.id} = {readings}.", field=question.id)
        self.layout, self.settings, self.tally = layout, settings, Tally()
        typical = {column.name: column.example.replace(",", ".").lstrip("<≤ ") for column in layout.columns if column.kind == "number"}
        self.restatings = [Restating(make_template(species.texts, species.settled, settings.usual, typical)) for species in settings.species]
        if settings.flow is not None:      # for the mass: the same rows on the flow's own basis
            self.restatings += [_on_flow_basis(restating, species, settings, typical) for restating, species in zip(self.restatings, settings.species)]
        self.names = list(dict.fromkeys(name for restating in self.restatings for name in restating.template.columns))
        if settings.flow is not None and settings.flow.column not in self.names:
            self.names.append(settings.flow.column)
        self.places = [layout.index(name) for name in self.names]
        self.wanted = [[self.names.index(name) for name in restating.template.columns] for restating in self.restatings]
        self.flow = None if settings.flow is None else self.names.index(settings.flow.column)
        self.time_places = [layout.index(name) for name in layout.time_columns]
        self.status = None if settings.status_column is None else layout.index(settings.status_column)
        self.valid = frozenset(settings.status_valid)
        self.missing = frozenset(settings.missing)
        self._missing_numbers = [float(text.replace(",", ".")) for text in settings.missing if _NUMBER["."].fullmatch(text.replace(",", "."))]
        self.clock = Clock(layout.date_order, settings.zone) if layout.time_columns else None
        self.span = self._span()
        if self.status is not None and not self.valid:
            raise Missing("Which words of the status column mean a valid reading?", hint='Give status.valid, e.g. ["OK", ""].', field="status.valid")

    def blocks(self, source: Lines) -> Iterator[Block]:
        """The file's rows in blocks of BLOCK. `source` starts at the file's first line."""
        self._source, lines = source, iter(source)
        for _ in range(self.layout.first_line - 1):
            next(lines, None)
        reader, line = csv.reader(lines, delimiter=self.layout.delimiter), self.layout.first_line
        while rows := self._rows(reader):
            yield self._block(rows, line)
            line = self.layout.first_line + reader.line_num

    def _rows(self, reader) -> list[list[str]]:
        try:
            return list(islice(reader, BLOCK))
        except csv.Error as error:
            raise NotUnderstood(f"Line {self.layout.first_line + reader.line_num} cannot be read as a row: {error}.",
                                hint="Look for a quotation mark that is not closed.", field="file") from None

    def _block(self, rows: list[list[str]], line: int) -> Block:
        return self._by_columns(rows, line) or self._by_rows(rows, line)

    # --- whole columns, when nothing is unusual ---

    def _by_columns(self, rows: list[list[str]], line: int) -> Block | None:
        try:
            cells = list(zip(*rows, strict=True))
            if len(cells) != len(self.layout.columns) or self.status is not None and not self.valid.issuperset(map(str.strip, cells[self.status])):
                return None
            columns = [self._floats(cells[place]) for place in self.places]
            stamps = cells[self.time_places[0]] if len(self.time_places) == 1 else self._stamps(rows)
            seconds = self.clock.read_all(stamps) if self.clock else [NAN] * len(rows)
        except (ValueError, CoreError):
            return None
        if self.clock and not (seconds[0] > self.clock.last and all(map(lt, seconds, seconds[1:]))) or any(code in column for code in self._missing_numbers for column in columns):
            return None
        figures = [restating.column([columns[index] for index in wanted]) for restating, wanted in zip(self.restatings, self.wanted)]
        if any(math.isnan(sum(figure)) for figure in figures) or self.span and not self.span[0] <= seconds[0] <= seconds[-1] < self.span[1]:
            return None
        if self.clock:
            self.clock.last = seconds[-1]
        self.tally.rows += len(rows)
        self.tally.good += len(rows)
        inputs = [[columns[index] for index in wanted] for wanted in self.wanted]
        nothing = frozenset()
        return Block(range(line, line + len(rows)), stamps, seconds, figures, inputs, [nothing] * len(self.restatings),
                     None if self.flow is None else columns[self.flow], {})

    def _floats(self, cells: Sequence[str]) -> list[float]:
        """The numbers of a column. Raises ValueError when one cell is anything else than a plain number in the file's decimals."""
        if self.layout.decimal == "," or not self._source.plain:
            joined = "\n".join(cells)
            if "_" in joined or joined.count("\n") != len(cells) - 1 or (self.layout.decimal == "," and "." in joined):
                raise ValueError("not plain")
            cells = joined.replace(",", ".").split("\n") if self.layout.decimal == "," else cells
        numbers = list(map(float, cells))
        if not -LARGEST < sum(numbers) < LARGEST:        # also when one of them is none (nan) or endless
            raise ValueError("no measured number")
        return numbers

    def _stamps(self, rows: list[list[str]]) -> list[str]:
        return [" ".join(row[place].strip() for place in self.time_places) for row in rows]

    # --- row by row ---

    def _by_rows(self, rows: list[list[str]], line: int) -> Block:
        lines, stamps, seconds, flows, problems = [], [], [], [], {}
        figures, inputs = [[] for _ in self.restatings], [[[] for _ in wanted] for wanted in self.wanted]
        below = [set() for _ in self.restatings]
        for row in rows:
            here, line = line, line + 1 + sum(cell.count("\n") for cell in row)
            if not any(cell.strip() for cell in row):
                self.tally.blank += 1
                continue
            place, (stamp, second, values, found, marks, problem) = len(lines), self._row(row, here)
            if problem is None:
                self.tally.outside += 1
                continue
            self.tally.rows += 1
            lines.append(here)
            stamps.append(stamp)
            seconds.append(second)
            flows.append(values[self.flow] if self.flow is not None else NAN)
            for index, wanted in enumerate(self.wanted):
                figures[index].append(found[index])
                if marks[index]:
                    below[index].add(place)
                for kept, name in zip(inputs[index], wanted):
                    kept.append(values[name])
            if problem:
                problems[place] = problem
            else:
                self.tally.good += 1
        return Block(lines, stamps, seconds, figures, inputs, [frozenset(entry) for entry in below], None if self.flow is None else flows, problems)

    def _row(self, row: list[str], line: int):
        nothing = [NAN] * len(self.restatings), [False] * len(self.restatings)
        values = [NAN] * len(self.names)
        if len(row) != len(self.layout.columns):
            detail = f"{len(row)} cells where the file has {len(self.layout.columns)} columns"
            return "", NAN, values, *nothing, self.tally.refuse(line, "", "another number of cells", detail)
        stamp = self._stamps([row])[0]
        try:
            second = self._time(stamp)
        except CoreError as error:
            return stamp, NAN, values, *nothing, self.tally.refuse(line, self.layout.time_columns[0], "time", error.message)
        if self.span and not self.span[0] <= second < self.span[1]:
            return stamp, second, values, *nothing, None
        if self.status is not None and row[self.status].strip() not in self.valid:
            self.tally.marked += 1
            detail = f"'{row[self.status].strip()[:_LONGEST_CELL]}'"
            return stamp, second, values, *nothing, self.tally.refuse(line, self.settings.status_column, "put aside by its status", detail)
        return stamp, second, *self._restated(row, line)

    def _span(self) -> tuple[float, float] | None:
        """The span asked for, in seconds. Raises Missing, NotUnderstood."""
        first, last = self.settings.between
        if first is None and last is None:
            return None
        if self.clock is None:
            raise Missing("A span needs time stamps, and none were found in the file.", hint="Name the column (time.columns), or leave out time.from and time.to.", field="time")
        clock = Clock(YEAR_FIRST, self.settings.zone)
        return (clock.read(first)[0] if first else -math.inf, clock.read(last)[0] if last else math.inf)

    def _time(self, stamp: str) -> float:
        if self.clock is None:
            return NAN
        second = self.clock.read(stamp)[0]
        if second <= self.clock.last:
            words = "repeats" if second == self.clock.last else "lies before"
            raise NotUnderstood(f"'{stamp}' {words} the time of a row above", field="time")
        self.clock.last = second
        return second

    def _restated(self, row: list[str], line: int):
        """Values, figures, "<" marks and the problem of a row whose time is in order. One species may have a figure where another has none."""
        cells: dict[int, tuple[str, bool]] = {}
        values, wrong = [NAN] * len(self.names), {}
        for index, place in enumerate(self.places):
            try:
                text, below = self._cell(self.names[index], row[place])
                cells[index], values[index] = (text, below), float(text)
            except BadCell as bad:
                wrong[index] = bad
        figures, marks, problems = [], [], []
        for restating, wanted, species in zip(self.restatings, self.wanted, self.settings.species * 2):
            figure, mark = NAN, False
            bad = next((wrong[index] for index in wanted if index in wrong), None)
            if bad is not None:
                problems.append((bad.column, bad.kind, bad.cell))
            else:
                try:
                    figure = restating.figure([cells[index][0] for index in wanted], [values[index] for index in wanted])
                    mark = self._mark(restating, wanted, cells)
                except BadCell as bad:
                    problems.append((bad.column, bad.kind, bad.cell))
                except CoreError as error:
                    problems.append((species.name, "cannot be restated", error.message))
            figures.append(figure)
            marks.append(mark)
        if not problems:
            return values, figures, marks, ""
        column, kind, detail = problems[0]
        return values, figures, marks, self.tally.refuse(line, column, kind, detail)

    def _mark(self, restating: Restating, wanted: Sequence[int], cells) -> bool:
        """Whether the figure is "<". Only the held value may be: a "<" oxygen has no figure."""
        mark = False
        for slot, index in zip(restating.template.slots, wanted):
            if cells[index][1]:
                if slot.place != "hold.value":
                    raise BadCell(slot.column, "below detection", "a '<' reading can only be the held value")
                mark = True
                self.tally.below += 1
        return mark

    def _cell(self, column: str, cell: str) -> tuple[str, bool]:
        """The number of a cell as a plain decimal, and whether it is a "<" reading. Raises BadCell."""
        text = cell.strip()
        if not text or text in self.missing:
            raise BadCell(column, "missing", f"'{text}' stands for a missing reading" if text else "the cell is empty")
        found = _BELOW.match(text)
        number = text[found.end():] if found else text
        plain = number.replace(",", ".")
        if _NUMBER[self.layout.decimal].fullmatch(number) and abs(float(plain)) < LARGEST:
            if float(plain) in self._missing_numbers:
                raise BadCell(column, "missing", f"'{text}' stands for a missing reading")
            return plain, found is not None
        other = "," if self.layout.decimal == "." else "."
        if _NUMBER[other].fullmatch(number):
            sign = {".": "a point", ",": "a comma"}
            raise BadCell(column, "other decimal sign", f"'{text[:_LONGEST_CELL]}' has {sign[other]}; the file's decimals are written with {sign[self.layout.decimal]}")
        raise BadCell(column, "no number", f"'{text[:_LONGEST_CELL]}'")


def _on_flow_basis(restating: Restating, species: SpeciesSettings, settings: Settings, typical) -> Restating:
    """The species in mg/m3 on the basis the flow's volume is counted on. Raises CoreError."""
    as_what = restating.template.case.owe.reported_as or restating.template.case.hold.reported_as
    owe = f"mg/m3 at {settings.flow.basis}" + (f" as {as_what.id}" if as_what else "")
    return Restating(make_template(replace(species.texts, owe=owe, limit=""), species.settled, settings.usual, typical))


class Lines:
    """The lines of a file that comes in pieces, line ends kept. `plain` as long as no underscore was met: Python reads 1_000 as a number, loggers do not."""

    def __init__(self, chunks: Iterable[bytes], encoding: str):
        self._chunks, self._decoder, self.plain = chunks, codecs.getincrementaldecoder(encoding)("replace"), True

    def __iter__(self) -> Iterator[str]:
        return chain.from_iterable(self._pieces())

    def _pieces(self) -> Iterator[io.StringIO]:
        rest = ""
        for chunk in self._chunks:
            text = rest + self._decoder.decode(chunk)
            end = text.rfind("\n") + 1
            rest, text = text[end:], text[:end]
            self.plain = self.plain and "_" not in text
            yield io.StringIO(text, newline="\n")      # splits at line feeds only, at the speed of C
        rest += self._decoder.decode(b"", True)
        self.plain = self.plain and "_" not in rest
        yield io.StringIO(rest, newline="\n")

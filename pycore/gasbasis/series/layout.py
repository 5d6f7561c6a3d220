"""What a logger's file is made of: encoding, delimiter, decimal sign, header, units, time stamps. Nothing is read in silence:
what was understood is said, what is open is a doubt, what cannot be read says where and what to do."""
from __future__ import annotations

import codecs
import csv
import re
from collections import Counter
from dataclasses import dataclass, field
from typing import Mapping

from gasbasis.errors import CoreError, Missing, NotUnderstood, OutOfRange
from gasbasis.series.times import DATE, DAY_FIRST, MONTH_FIRST, STAMP, TIME, date_order

SAMPLE = 262_144                        # bytes looked at
_ROWS = 400                             # lines looked at
_DELIMITERS = {"\t": "tab", ";": "semicolon", "|": "bar", ",": "comma"}
_POINT, _COMMA = re.compile(r"[+-]?\d*\.\d+(?:[eE][+-]?\d{1,2})?"), re.compile(r"[+-]?\d*,\d+(?:[eE][+-]?\d{1,2})?")
_WHOLE = re.compile(r"[+-]?\d+(?:[eE][+-]?\d{1,2})?")
_GROUPED = re.compile(r"[+-]?[1-9]\d{0,2}[.,]\d{3}")
_BRACKET = re.compile(r"(.*?)\s*(?:\(([^()]*)\)|\[([^\[\]]*)\])\s*")
_MAGIC = {b"PK\x03\x04": "a workbook (XLSX) or another ZIP file", b"\xd0\xcf\x11\xe0": "an old workbook (XLS)", b"%PDF": "a PDF", b"\x1f\x8b": "compressed (gzip)",
          b"SQLite format 3": "a database", b"\x89PNG": "a picture", b"\xff\xd8\xff": "a picture", b"BZh": "compressed (bzip2)", b"7z\xbc\xaf": "compressed (7z)"}


@dataclass(frozen=True)
class Column:
    name: str                          # as in the header, or "column 3"; what a text names in braces
    unit_text: str                     # "" where the file says none
    kind: str                          # number | time | date | clock | text | empty
    example: str = ""
    texts: tuple[str, ...] = ()        # cells that are no number, in a column of numbers; or the words of a text column


@dataclass(frozen=True)
class Question:
    """Something the file leaves open: `settle` says how to answer it in the settings' "file" or "time"."""

    id: str
    question: str
    readings: tuple[tuple[str, str], ...]   # id, label


@dataclass(frozen=True)
class Layout:
    encoding: str
    delimiter: str
    decimal: str
    header_line: int | None
    unit_line: int | None
    first_line: int                    # of the data
    columns: tuple[Column, ...]
    time_columns: tuple[str, ...]      # one column of stamps, or a date and a time of day
    date_order: str | None
    notes: tuple[str, ...] = ()
    questions: tuple[Question, ...] = ()

    def index(self, name: str) -> int:
        """The place of a column. Raises NotUnderstood, naming those there are."""
        for place, column in enumerate(self.columns):
            if column.name == name:
                return place
        raise NotUnderstood(f"There is no column '{name}' in the file.", hint="Columns: " + ", ".join(f"'{column.name}'" for column in self.columns) + ".",
                            field="columns")

    def understood(self) -> list[str]:
        """What was understood, in plain sentences."""
        header = f"header in line {self.header_line}" if self.header_line else "no header"
        units = f", units in line {self.unit_line}" if self.unit_line else ""
        signs = {".": "point", ",": "comma"}
        time = f"time in {' and '.join(repr(name) for name in self.time_columns)}" + (f", {self.date_order.replace('_', ' ')}" if self.date_order else "") \
            if self.time_columns else "no time stamps"
        return [f"encoding {self.encoding}, columns parted by a {_DELIMITERS.get(self.delimiter, repr(self.delimiter))}, decimal {signs[self.decimal]}",
                f"{header}{units}, data from line {self.first_line}, {len(self.columns)} columns, {time}", *self.notes]


@dataclass
class _Draft:
    notes: list[str] = field(default_factory=list)
    questions: list[Question] = field(default_factory=list)


def look(sample: bytes, said: Mapping[str, object] | None = None) -> Layout:
    """The layout of a file from its beginning. `said` settles what the person knows better: encoding, delimiter, decimal, date_order.

    Raises NotUnderstood, OutOfRange, Missing.
    """
    said, draft = said or {}, _Draft()
    encoding = str(said.get("encoding") or _encoding(sample, draft))
    lines = [line.rstrip("\r") for line in _decoded(sample, encoding).split("\n")]
    if len(sample) >= SAMPLE:
        lines = lines[:-1]              # the last one may be cut
    lines = lines[:_ROWS]
    if not any(line.strip() for line in lines):
        raise Missing("The file is empty.", hint="Choose the logger's file, or paste its rows.", field="file")
    delimiter = str(said.get("delimiter") or _delimiter(lines))
    rows = list(csv.reader(lines, delimiter=delimiter))
    width = Counter(len(row) for row in rows if len(row) > 1).most_common(1)
    if not width:
        raise NotUnderstood("There is only one column.", hint="Say what parts the columns (file.delimiter), or export the file with more than one column.", field="file")
    width = width[0][0]
    first = _first_data_row(rows, width)
    body = [row for row in rows[first:] if len(row) == width]
    header, units = _header(rows, first, width)
    decimal = str(said.get("decimal") or _decimal(body, delimiter, draft))
    columns = _columns(rows, header, units, body, width)
    time_columns = tuple(said.get("time_columns") or _time_columns(columns))
    order = str(said["date_order"]) if said.get("date_order") else _order(columns, body, time_columns, draft)
    if header is None:
        draft.notes.append("no header was found: the columns are called column 1, column 2, ...")
    return Layout(encoding, delimiter, decimal, None if header is None else header + 1, None if units is None else units + 1, first + 1,
                  columns, time_columns, order, tuple(draft.notes), tuple(draft.questions))


def _encoding(sample: bytes, draft: _Draft) -> str:
    for magic, what in _MAGIC.items():
        if sample.startswith(magic):
            raise NotUnderstood(f"This is {what}, whatever its name says.", hint="Open it where it was made and save it as CSV (text).", field="file")
    if sample.startswith(codecs.BOM_UTF8):
        return "utf-8-sig"
    if sample.startswith((codecs.BOM_UTF16_LE, codecs.BOM_UTF16_BE)):
        return "utf-16"
    nulls = sample[:4096].count(0)
    if nulls > len(sample[:4096]) * 0.3 and sample[1:2] == b"\0":
        return "utf-16-le"
    if nulls or sum(byte < 9 or 13 < byte < 32 for byte in sample[:4096]) > len(sample[:4096]) * 0.02:
        place = next(place for place, byte in enumerate(sample) if byte < 9 or 13 < byte < 32)
        raise NotUnderstood(f"This is no text file: byte {place + 1} is a control character.", hint="Export the readings as CSV (text).", field="file")
    try:
        codecs.getincrementaldecoder("utf-8")().decode(sample)
        return "utf-8"
    except UnicodeDecodeError:
        draft.notes.append("the text is not UTF-8; it was read as Windows-1252 (common practice): look at the degree and micro signs")
        return "cp1252"


def _decoded(sample: bytes, encoding: str) -> str:
    try:
        return codecs.getincrementaldecoder(encoding)("strict").decode(sample)
    except (UnicodeDecodeError, LookupError) as error:
        raise NotUnderstood(f"The file cannot be read as {encoding}: {error}.", hint="Name another encoding, e.g. utf-8 or cp1252.", field="file.encoding") from None


def _delimiter(lines: list[str]) -> str:
    best, best_share = "", 0.0
    for delimiter in _DELIMITERS:
        counts = Counter(len(row) for row in csv.reader(lines, delimiter=delimiter) if row)
        width, share = max(((width, number / sum(counts.values())) for width, number in counts.items() if width > 1), key=lambda entry: entry[1], default=(1, 0.0))
        if width > 1 and share > best_share + 0.05:
            best, best_share = delimiter, share
    if not best:
        raise NotUnderstood("There is only one column: no tab, semicolon, bar or comma parts the lines.",
                            hint="Export the file as CSV, with the time and the readings in columns of their own.", field="file")
    return best


def is_number(cell: str) -> bool:
    cell = cell.strip().lstrip("<≤").strip()
    return bool(_WHOLE.fullmatch(cell) or _POINT.fullmatch(cell) or _COMMA.fullmatch(cell))


def _is_time(cell: str) -> bool:
    cell = cell.strip()
    return bool(STAMP.fullmatch(cell) or DATE.fullmatch(cell) or TIME.fullmatch(cell))


def _first_data_row(rows: list[list[str]], width: int) -> int:
    for place, row in enumerate(rows):
        filled = [cell for cell in row if cell.strip()]
        if len(row) == width and filled and sum(is_number(cell) or _is_time(cell) for cell in filled) * 2 >= len(filled):
            return place
    raise NotUnderstood(f"None of the first {len(rows)} lines holds numbers in columns.", hint="Choose the file with the readings; say the delimiter if it is unusual.",
                        field="file")


def _header(rows: list[list[str]], first: int, width: int) -> tuple[int | None, int | None]:
    """The lines of names and of units above the data, counted from 0."""
    above = [place for place in range(max(0, first - 3), first) if len(rows[place]) == width and any(cell.strip() for cell in rows[place])]
    if not above:
        return None, None
    if len(above) > 1 and _like_units(rows[above[-1]]):
        return above[-2], above[-1]
    return above[-1], None


def _like_units(row: list[str]) -> bool:
    filled = [cell.strip() for cell in row if cell.strip()]
    return bool(filled) and sum(bool(re.fullmatch(r"[\[(].*[\])]|[-–]", cell)) or _known_unit(cell) for cell in filled) * 2 >= len(filled)


def _known_unit(text: str) -> bool:
    from gasbasis.language.units import unit
    try:
        unit(text.strip(" []()"))
        return True
    except CoreError:
        return False


def _decimal(body: list[list[str]], delimiter: str, draft: _Draft) -> str:
    cells = [cell.strip().lstrip("<≤ ") for row in body for cell in row]
    points, commas = [cell for cell in cells if _POINT.fullmatch(cell)], [cell for cell in cells if _COMMA.fullmatch(cell)]
    if points and commas:
        few, sign = (commas, "point") if len(points) >= len(commas) else (points, "comma")
        draft.notes.append(f"decimals are mixed: most are written with a {sign}, {len(few)} of the first lines otherwise, e.g. '{few[0]}'; those rows are listed as bad")
    chosen = "," if len(commas) > len(points) else "."
    written = commas if chosen == "," else points
    if written and all(_GROUPED.fullmatch(cell) for cell in written):
        draft.questions.append(Question("file.decimal", f"Is '{written[0]}' a number with decimals, or are its thousands grouped?",
                                        ((chosen, "decimals"), ("." if chosen == "," else ",", "thousands: then write the file without grouping"))))
    return chosen


def _columns(rows, header, units, body, width) -> tuple[Column, ...]:
    names: list[str] = []
    found = []
    for place in range(width):
        name = rows[header][place].strip() if header is not None else ""
        name = name or f"column {place + 1}"
        if name in names:
            name = f"{name} ({names.count(name) + 1})"
        names.append(name)
        bracket = _BRACKET.fullmatch(name)
        unit_text = (bracket[2] or bracket[3] or "").strip() if bracket else ""
        if units is not None and rows[units][place].strip():
            unit_text = rows[units][place].strip(" []()")
        cells = [row[place].strip() for row in body]
        found.append(Column(name, unit_text, *_kind(cells)))
    return tuple(found)


def _kind(cells: list[str]) -> tuple[str, str, tuple[str, ...]]:
    filled = [cell for cell in cells if cell]
    if not filled:
        return "empty", "", ()
    for kind, test in (("time", STAMP.fullmatch), ("date", DATE.fullmatch), ("clock", TIME.fullmatch), ("number", is_number)):
        hits = [cell for cell in filled if test(cell)]
        if len(hits) * 2 > len(filled):
            others = tuple(dict.fromkeys(cell for cell in filled if not test(cell)))[:12]
            return kind, hits[0], others
    return "text", filled[0], tuple(dict.fromkeys(filled))[:12]


def _time_columns(columns: tuple[Column, ...]) -> tuple[str, ...]:
    stamps = [column.name for column in columns if column.kind == "time"]
    if stamps:
        return (stamps[0],)
    dates, clocks = ([column.name for column in columns if column.kind == kind] for kind in ("date", "clock"))
    return (dates[0], clocks[0]) if dates and clocks else ()


def _order(columns, body, time_columns, draft: _Draft) -> str | None:
    if not time_columns:
        return None
    place = next((place for place, column in enumerate(columns) if column.name == time_columns[0]), None)
    if place is None:
        raise NotUnderstood(f"There is no column '{time_columns[0]}'.", hint="Columns: " + ", ".join(column.name for column in columns), field="time.columns")
    texts = [row[place].strip() for row in body if DATE.match(row[place].strip())]
    if not texts:
        raise OutOfRange(f"The column '{time_columns[0]}' holds no dates.", hint="Choose the column with the time stamps.", field="time.columns")
    found = date_order(texts)
    if found.order is None:
        first, second = re.split(r"[-/.]", DATE.match(found.example)[1])[:2]
        draft.questions.append(Question("time.date_order", f"Is '{found.example}' day {int(first)} of month {int(second)}, or day {int(second)} of month {int(first)}?",
                                        ((DAY_FIRST, "day first"), (MONTH_FIRST, "month first"))))
    else:
        draft.notes.append(f"dates: {found.order.replace('_', ' ')}, because {found.why}")
    return found.order

"""Read a concentration statement: text in; pieces with their places, doubts in the text, and problems out.

The reader walks through the normalised text and at each place tries a short list of readers. What
none of them reads, and what is no connecting word, is a problem with its place: nothing is dropped.
"""
from __future__ import annotations

import re
from dataclasses import replace
from functools import lru_cache

from gasbasis.errors import CoreError, NotUnderstood
from gasbasis.language import clauses, readers
from gasbasis.language.basis import Doubt, Piece, Quantity, Reading, Statement
from gasbasis.language.normalise import gathered, normalise
from gasbasis.language.species import find, search
from gasbasis.language.tokens import CONNECTOR, WORD
from gasbasis.language.units import unit

LONGEST = 2000                         # characters
_GUESSED = 5                           # unknown words for which a species is searched; a pasted paragraph has many
_NO_WORD = "'{}' is not understood."
_COMMON = "common practice, no source"
_UNDERSTOOD = ("Understood are: a species or formula, a number with a unit, a temperature and pressure, wet or dry, "
               "'at 11 % O2', 'as NO2', 'by volume', 'in nitrogen'.")


class Reader:
    """What has been read so far of one text; a reader function adds to it and moves the place on.

    Readers work on the gathered text, `original` as typed and `text` in plain spelling; pieces and problems
    have their places in the text as it was given.
    """

    def __init__(self, text: str, side: str):
        self.given, self.side = text, side
        self.original, self._kept = gathered(text)
        self.text = normalise(self.original)
        self.place = 0
        self.unknown = 0               # words not understood so far
        self.fields: dict[str, object] = {}
        self.pieces: list[Piece] = []
        self.problems: list[CoreError] = []
        self.last = ""                 # the field of the quantity read last: a spread behind it is its own

    def take(self, field: str, value: object, start: int, end: int) -> None:
        """Record a piece. A second, different one for the same field is a problem."""
        if field in self.fields and self.fields[field] != value:
            first = next((piece.text for piece in self.pieces if piece.field == field), "")
            self.problems.append(NotUnderstood(
                f"'{self.original[start:end].strip()}' contradicts '{first}' before it.",
                hint="Keep one of the two.", field=self.side, span=self.typed(start, end)))
            return
        self.fields[field] = value
        if isinstance(value, Quantity):
            self.last = field
        span = self.typed(start, end)
        if span not in [piece.span for piece in self.pieces if piece.field == field]:
            self.pieces.append(Piece(field, self.given[slice(*span)], span))

    def take_one_more(self, field: str, value: object, start: int, end: int) -> None:
        """Record one more piece of a field that may stand several times."""
        self.fields[field] = (*self.fields.get(field, ()), value)
        span = self.typed(start, end)
        self.pieces.append(Piece(field, self.given[slice(*span)], span))

    def amend(self, quantity: Quantity, end: int) -> None:
        """The quantity read last, with what stood behind it up to `end`; its piece grows by that."""
        self.fields[self.last] = quantity
        index = max(index for index, piece in enumerate(self.pieces) if piece.field == self.last)
        span = self.pieces[index].span[0], self.typed(0, end)[1]
        self.pieces[index] = Piece(self.last, self.given[slice(*span)], span)
        self.place = max(self.place, end)

    def refuse(self, error: CoreError, start: int, end: int) -> None:
        self.problems.append(error.at(self.side, self.typed(start, end)))

    def typed(self, start: int, end: int) -> tuple[int, int]:
        """The span in the text as it was given."""
        start, end = _trimmed(self.original, start, end)
        return (self._kept[start], self._kept[end - 1] + 1) if end > start else (start, end)


def _trimmed(text: str, start: int, end: int) -> tuple[int, int]:
    """The span without blanks and loose punctuation at its ends; brackets stay when both are inside."""
    while start < end and text[start] in " ,;\n\t":
        start += 1
    while end > start and text[end - 1] in " ,;\n\t":
        end -= 1
    inner = text[start:end]
    if inner.startswith("(") and inner.count("(") > inner.count(")"):
        start += 1
    if inner.endswith(")") and inner.count(")") > inner.count("("):
        end -= 1
    return start, end


def read_statement(text: str, side: str) -> tuple[Statement, tuple[CoreError, ...]]:
    """The statement a text makes on a side ("hold", "owe", "limit"), and what could not be read of it."""
    refusal = refuse_text(text, side)
    if refusal is not None:
        return Statement(text=text), (refusal,)
    return _read(text, side)


@lru_cache(maxsize=64)                  # while one line is typed the others stay as they are
def _read(text: str, side: str) -> tuple[Statement, tuple[CoreError, ...]]:
    reader = Reader(text, side)
    walk(reader, STATEMENT)
    conclude(reader)
    known = {name: value for name, value in reader.fields.items() if name in Statement.__dataclass_fields__}
    statement = Statement(text=text, pieces=tuple(sorted(reader.pieces, key=lambda piece: piece.span)), **known)
    return replace(statement, ambiguities=ambiguities(statement, side)), tuple(reader.problems)


# The readers in the order they are tried. What bounds a value is looked for before the value.
STATEMENT: tuple[readers.Read, ...] = (
    clauses.averaging, clauses.limit_direction, readers.late_spread, readers.named_share, readers.stated_molar_mass, readers.coverage, readers.reported_as,
    readers.oxygen_meaning, readers.matrix_gas, clauses.range_led, clauses.second_value, readers.number_led,
    readers.actual_volume, readers.water, readers.conditions_word, clauses.approximate, readers.parts_by, readers.unit_led, readers.species)


def conclude(reader: Reader) -> None:
    """What only the whole text decides: "O2 9.2 % dry" alone is a value of oxygen, and a lone number has no unit."""
    if "value" not in reader.fields and reader.side != "owe":
        for field, identity in (("oxygen", "O2"), ("water_content", "H2O"), ("carbon_dioxide", "CO2")):
            if field in reader.fields and "species" not in reader.fields:
                _as_value(reader, field, identity)
                break
    if reader.side == "hold" and "value" not in reader.fields and "unit" not in reader.fields and "pressure" in reader.fields:
        _rename(reader, "pressure", "value")                  # "CO 1.2 Pa": the only number is the value
        reader.fields["unit"] = reader.fields["value"].unit
    if reader.side == "limit" and reader.text.strip() and not reader.problems and not {"value", "pending"} & set(reader.fields):
        reader.refuse(NotUnderstood("There is no number in this limit.", hint="For example 'not more than 200 mg/m3'."), 0, len(reader.text))
    clauses.bound_by_sign(reader)
    value = reader.fields.get("value")
    if value is not None and value.unit.kind == "parts" and "parts_by" not in reader.fields and value.unit.id == "%":
        measured = reader.fields.get("species")
        if measured is not None and measured.id in ("O2", "CO2", "H2O"):
            reader.fields["parts_by"] = "volume"              # oxygen, carbon dioxide and water in % are by volume: never asked
    if "pending" in reader.fields:
        number, start, end = reader.fields.pop("pending")
        reader.refuse(NotUnderstood(f"'{number.text}' has no unit.", hint="Put its unit behind it, e.g. ppm or mg/m3."), start, end)


def _as_value(reader: Reader, field: str, identity: str) -> None:
    _rename(reader, field, "value")
    reader.fields.update(unit=reader.fields["value"].unit, species=find(identity))
    if f"{field}_water" in reader.fields:
        _rename(reader, f"{field}_water", "water")


def _rename(reader: Reader, field: str, to: str) -> None:
    reader.fields[to] = reader.fields.pop(field)
    reader.pieces = [replace(piece, field=to) if piece.field == field else piece for piece in reader.pieces]


def refuse_text(text: str, side: str) -> CoreError | None:
    """A text that is too long, or holds control characters, halves of characters or endless numbers, is not read at all."""
    if len(text) > LONGEST:
        return NotUnderstood(f"The text has {len(text):,} characters; {LONGEST:,} can be read.".replace(",", " "),
                             hint="Paste one statement, not a whole document.", field=side)
    for place, character in enumerate(text):
        if ord(character) < 32 and character not in "\n\r\t" or character == "\x7f" or "\ud800" <= character <= "\udfff":
            return NotUnderstood(f"The text holds a control character at place {place + 1}.",
                                 hint="Type it anew, or paste it as plain text.", field=side, span=(place, place + 1))
    endless = re.search(r"\d{40,}", text)
    if endless is not None:
        return NotUnderstood(f"A number of {len(endless.group())} digits is no measured number.", hint="Shorten it, or write it with a power of ten.",
                             field=side, span=endless.span())
    return None


def walk(reader: Reader, table) -> None:
    """Try each reader at each place; step over connecting words; name what is left."""
    text = reader.text
    while reader.place < len(text):
        if text[reader.place].isspace():
            reader.place += 1
            continue
        start = reader.place
        if any(read(reader) for read in table):
            if reader.place <= start:
                raise AssertionError(f"a reader did not move on at {start} of {text!r}")
            continue
        found = CONNECTOR.match(text, start)
        if found is not None:
            reader.place = found.end()
            continue
        word = WORD.match(text, start) or WORD.match(text, start + 1)
        reader.place = word.end() if word else start + 1
        _leave(reader, start, reader.place)


def _leave(reader: Reader, start: int, end: int) -> None:
    """Name what is not understood; a word next to another unknown one joins it."""
    last = reader.problems[-1] if reader.problems else None
    span = reader.typed(start, end)
    if isinstance(last, Unknown) and not reader.given[last.span[1]:span[0]].strip(" ,;()"):
        span = last.span[0], span[1]
        reader.problems.pop()
    reader.unknown += 1
    word = reader.given[slice(*span)]
    reader.problems.append((_not_understood(word) if reader.unknown <= _GUESSED else Unknown(_NO_WORD.format(word[:60]), hint=_UNDERSTOOD)).at(reader.side, span))


class Unknown(NotUnderstood):
    """Words none of the readers knows."""


def _not_understood(word: str) -> NotUnderstood:
    if re.fullmatch(r"(?:[A-Z][a-z]?\d*){2,}|[A-Z][a-z]?\d+", word):   # meant as a formula: say what is wrong with it
        try:
            find(word)
        except NotUnderstood as error:
            return error
    near = search(word)[:3] if len(word) > 2 else []
    hint = f"Did you mean {', '.join(entry['name'] for entry in near)}? " if near else ""
    return Unknown(_NO_WORD.format(word[:60]), hint=hint + _UNDERSTOOD)


def ambiguities(record, side: str) -> tuple[Doubt, ...]:
    """Numbers whose only separator may be a decimal sign or group thousands."""
    doubts = []
    for field in ("value", "water_content", "oxygen", "carbon_dioxide"):
        quantity = getattr(record, field, None)
        if quantity is not None and quantity.number.thousands is not None and not _beyond_the_whole(quantity):
            doubts.append(_number_doubt(quantity, field, side))
    if getattr(record, "unit_in_millions", None) is not None:
        doubts.append(_thousand_doubt(record, side))
    if getattr(record, "ton_said", None) is not None:
        doubts.append(_ton_doubt(record, side))
    species = getattr(record, "species", None)
    if species is not None and species.id in _MET_IN_PERCENT and getattr(record, "value", None) and record.value.unit.id == "ppt":
        doubts.append(_trillion_doubt(record, side))
    return tuple(doubts)


# For these a part per trillion is nobody's reading: the text itself gives reason to ask.
_MET_IN_PERCENT = ("H2O", "CO2", "O2", "N2", "Ar", "CH4", "C2H6", "C3H8", "H2", "CO")


def _trillion_doubt(record: Statement, side: str) -> Doubt:
    readings = []
    for identity, name, label in (("thousand", "‰", "parts per thousand"), ("trillion", "ppt", "parts per trillion (10⁻¹²)")):
        measured = unit(name) if identity == "thousand" else record.unit
        patch = (("unit", measured), ("value", replace(record.value, unit=measured)))
        readings.append(Reading(identity, label, patch, _COMMON))
    return Doubt(f"{side}.ppt", "ppt", f"Does 'ppt' of {record.species.name} mean per thousand or per trillion?", "A factor of 10⁹.", tuple(readings))


def _thousand_doubt(record: Statement, side: str) -> Doubt:
    """ "lb/Mscf": M is a thousand in the gas trade, and mega elsewhere. MM is a million to everybody."""
    readings = []
    for identity, measured, label, usual in (("thousand", record.unit, "a thousand", "in gas-trade units M is a thousand and MM a million (common practice)"),
                                             ("million", record.unit_in_millions, "a million", "")):
        patch = (("unit", measured), ("value", replace(record.value, unit=measured) if record.value else None), ("unit_in_millions", None))
        readings.append(Reading(identity, label, patch, _COMMON, usual))
    return Doubt(f"{side}.unit_count", "M", "Is the M before the volume a thousand or a million?", "It changes the figure a thousandfold.", tuple(readings))


def _ton_doubt(record: Statement, side: str) -> Doubt:
    readings = []
    for identity, name, label in (("metric", "t", "metric, 1000 kg"), ("short", "short ton", "short, 2000 lb = 907.2 kg"), ("long", "long ton", "long, 2240 lb = 1016 kg")):
        measured = unit(f"{name}/{record.ton_said}")
        patch = (("unit", measured), ("value", replace(record.value, unit=measured) if record.value else None), ("ton_said", None))
        readings.append(Reading(identity, label, patch, _COMMON))
    return Doubt(f"{side}.ton", "ton", "Is the ton metric, short or long?", "A short ton is 9 % less, a long ton 2 % more than a metric one.", tuple(readings))


def _beyond_the_whole(quantity: Quantity) -> bool:
    """ "20.946 %" cannot mean 20946 %: a fraction ends at one."""
    fraction = quantity.unit.kind in ("parts", "amount_fraction", "mass_fraction")
    return fraction and float(quantity.number.thousands) * quantity.unit.factor > 1.0


def _number_doubt(quantity: Quantity, field: str, side: str) -> Doubt:
    number = quantity.number
    readings = []
    for identity, value, label in (("decimal", number.decimal, "decimal sign"), ("thousands", number.thousands, "thousands")):
        repeated = tuple(reading * value / number.decimal for reading in number.readings)
        settled = replace(quantity, number=replace(number, decimal=value, thousands=None, text=str(value), readings=repeated))
        readings.append(Reading(identity, f"{value} ({label})", ((field, settled),), _COMMON))
    return Doubt(f"{side}.number" if field == "value" else f"{side}.{field}_number", "decimal sign",
                 f"Is '{number.text}' {number.decimal} or {number.thousands}?",
                 "The separator is a decimal sign in one habit and groups thousands in the other: a factor of 1000.",
                 tuple(readings))

"""A sheet whose texts name columns: "NOx {NOx (ppm)} ppm dry as NO2". A row puts its numbers there and is a sheet like any other.

The texts are read once, with probe numbers; after that a row only replaces the quantities its columns stand for.
"""
from __future__ import annotations

import re
from dataclasses import dataclass, fields, is_dataclass, replace
from decimal import Decimal
from typing import Mapping, Sequence

from gasbasis.calculation.case import Case, make_case
from gasbasis.calculation.outcomes import Settled, settle
from gasbasis.calculation.rules import find_rule
from gasbasis.errors import CoreError, Missing, NotUnderstood
from gasbasis.language.basis import Gas, Quantity, Statement
from gasbasis.language.gas import read_gas
from gasbasis.language.statement import read_statement

PLACE = re.compile(r"\{([^{}]*)\}")
# Numbers a probe tries in turn: one of them is a credible percentage, temperature and pressure.
_PROBES = ("10", "20", "1", "100", "1000")
_NEVER_A_COLUMN = ("owe", "limit")


@dataclass(frozen=True)
class Texts:
    """What one species of a series is read from: a sheet's texts, with columns in braces."""

    hold: str
    gas: str
    owe: str
    limit: str = ""
    rule_book: str = ""


@dataclass(frozen=True)
class Slot:
    """A column in the texts and the quantity it stands for, as the probe was read."""

    column: str
    probe: str                         # the number text the probe had; no other number of the sheet has it
    quantity: Quantity
    place: str                         # "hold.value", "gas.oxygen", "gas.water_route": the field of the case it lies in


@dataclass(frozen=True)
class Row:
    case: Case
    quantities: tuple[Quantity, ...]   # of its columns, the very ones that lie in the case


@dataclass(frozen=True)
class Template:
    texts: Texts
    case: Case                         # settled, with the probes in it
    slots: tuple[Slot, ...]

    @property
    def columns(self) -> tuple[str, ...]:
        return tuple(slot.column for slot in self.slots)

    def row(self, numbers: Sequence[str]) -> Row:
        """The case of one row; its numbers as plain decimals ("12.5") in the order of `columns`."""
        quantities = tuple(_with_number(slot.quantity, text) for slot, text in zip(self.slots, numbers))
        changed = dict(zip((slot.probe for slot in self.slots), quantities))
        return Row(replace(self.case, hold=_put(self.case.hold, changed), gas=_put(self.case.gas, changed)), quantities)


def row_texts(texts: Texts, numbers: Mapping[str, str]) -> Texts:
    """The sheet of one row, as somebody would have typed it."""
    return replace(texts, hold=_filled(texts.hold, numbers), gas=_filled(texts.gas, numbers))


def make_template(texts: Texts, settled: Mapping[str, str], take_usual: bool, typical: Mapping[str, str] | None = None) -> Template:
    """Read the texts and settle their doubts. `typical` gives numbers to probe with, by column.

    Raises NotUnderstood for a column in a text that owes, Missing for an open doubt, and whatever reading raises.
    """
    for side in _NEVER_A_COLUMN:
        found = PLACE.search(getattr(texts, side))
        if found:
            raise NotUnderstood(f"'{found[0]}' names a column, but what is owed does not change from row to row.",
                                hint="Type its number.", field=side, span=found.span())
    columns = list(dict.fromkeys(PLACE.findall(texts.hold) + PLACE.findall(texts.gas)))
    probes = _probes(texts, columns, typical or {})
    case = _read(row_texts(texts, probes))
    slots = tuple(_slot(case, column, probes[column]) for column in columns)
    done = settle(case, settled, take_usual)
    if done.open:
        doubt = done.open[0]
        readings = " or ".join(f"{doubt.id}={reading.id} ({reading.label})" for reading in doubt.readings)
        missing = Missing(f"A doubt is open: {doubt.question}", hint=f"Settle it for the whole series: {readings}.", field=doubt.id)
        missing.readings = [{"id": reading.id, "label": reading.label} for reading in doubt.readings]
        raise missing
    _refuse_doubt_of_some_rows(case, slots, done)
    case = done.case
    for doubt in done.about_spread:    # these move no figure
        case = case.taking(doubt.id, doubt.readings[0])
    return Template(texts, case, tuple(_settled_slot(case, slot) for slot in slots))


def _refuse_doubt_of_some_rows(case: Case, slots: tuple[Slot, ...], done: Settled) -> None:
    """A reading holds for every row or for none: a doubt that only large values raise has to be written out of the text."""
    for factor in ("0.001", "1000"):
        scaled = {slot.probe: _with_number(slot.quantity, str(Decimal(slot.probe) * Decimal(factor))) for slot in slots}
        other = settle(replace(case, hold=_put(case.hold, scaled), gas=_put(case.gas, scaled)), {doubt.id: reading.id for doubt, reading in done.taken})
        raised = {doubt.id: doubt for doubt in (*other.open, *(doubt for doubt, _ in other.taken))}
        known = {doubt.id for doubt, _ in done.taken}
        for identity in sorted(raised.keys() ^ known):
            question = raised[identity].question if identity in raised else next(doubt.question for doubt, _ in done.taken if doubt.id == identity)
            raise Missing(f"For some rows a doubt is open, and not for others: {question}", hint="Write it into the text, e.g. 'absolute' or 'gauge'.",
                          field=identity)


def _read(texts: Texts) -> Case:
    (hold, hold_problems), (gas, gas_problems), (owe, owe_problems) = (
        read_statement(texts.hold, "hold"), read_gas(texts.gas), read_statement(texts.owe, "owe"))
    for problem in (*hold_problems, *gas_problems, *owe_problems):
        raise problem
    if hold.value is None:
        raise Missing("What you hold names no value.", hint="Put its column and its unit there, e.g. 'NOx {NOx} ppm dry'.", field="hold.value")
    if owe.unit is None:
        raise Missing("A unit is needed in You owe.", hint="For example 'mg/m3'.", field="owe.unit")
    rule = find_rule(texts.rule_book) if texts.rule_book else None
    if texts.rule_book and rule is None:
        raise NotUnderstood(f"There is no rule-book '{texts.rule_book}'.", hint="Choose one from the list, or leave it out.", field="rule_book")
    return make_case(hold, gas, owe, rule)


def _probes(texts: Texts, columns: list[str], typical: Mapping[str, str]) -> dict[str, str]:
    """A number for each column with which the texts can be read and laid; made unlike every other number of the sheet."""
    last: CoreError | None = None
    for candidate in (None, *_PROBES):
        probes = {}
        for index, column in enumerate(columns, start=1):
            number = typical.get(column, _PROBES[0]) if candidate is None else candidate
            probes[column] = _unlike(number, index)
        try:
            case = _read(row_texts(texts, probes))
            for column in columns:
                _slot(case, column, probes[column])
            return probes
        except CoreError as error:
            last = last or error
    raise last


def _unlike(number: str, index: int) -> str:
    """The number with a tail of digits of its own, far behind what an analyser shows."""
    return f"{Decimal(number):.6f}" + f"{index:03d}7"


def _filled(text: str, numbers: Mapping[str, str]) -> str:
    def number(found: re.Match) -> str:
        if found[1] not in numbers:
            raise NotUnderstood(f"There is no column '{found[1]}'.", hint=f"Columns: {', '.join(numbers) or 'none'}.", field="columns")
        return numbers[found[1]]
    return PLACE.sub(number, text)


def _slot(case: Case, column: str, probe: str) -> Slot:
    found = [(f"{side}.{name}", quantity) for side in ("hold", "gas") for name, quantity in _quantities(case.record(side))
             if quantity.number.decimal == Decimal(probe)]
    if not found:
        raise NotUnderstood(f"The column '{column}' stands where no number is read.", hint="Put it where its number would be, with the unit behind it.", field="columns")
    place, quantity = found[0]
    if place.endswith("matrix_gas"):   # its total is checked where it is read, once
        raise NotUnderstood(f"The column '{column}' stands in the composition of the gas.", hint="Type the composition as a constant.", field="gas.matrix_gas")
    return Slot(column, probe, quantity, place)


def _settled_slot(case: Case, slot: Slot) -> Slot:
    return _slot(case, slot.column, slot.probe)


def _quantities(record: Statement | Gas):
    """Every quantity of a record with the field it lies in, also inside routes and compositions."""
    for entry in fields(record):
        if entry.name in ("pieces", "ambiguities", "text"):
            continue
        yield from ((entry.name, quantity) for quantity in _within(getattr(record, entry.name)))


def _within(value: object):
    if isinstance(value, Quantity):
        yield value
    elif isinstance(value, tuple):
        for part in value:
            yield from _within(part)
    elif is_dataclass(value):
        for entry in fields(value):
            yield from _within(getattr(value, entry.name))


def _put(value, changed: Mapping[str, Quantity]):
    """The value with the quantities of the probes replaced."""
    if isinstance(value, Quantity):
        for probe, quantity in changed.items():
            if value.number.decimal == Decimal(probe):
                return quantity if quantity.unit == value.unit else replace(value, number=quantity.number)
        return value
    if isinstance(value, tuple):
        return tuple(_put(part, changed) for part in value)
    if is_dataclass(value) and not isinstance(value, type):
        parts = {entry.name: _put(getattr(value, entry.name), changed) for entry in fields(value)
                 if entry.name not in ("text", "pieces", "ambiguities", "number", "unit")}
        return replace(value, **{name: part for name, part in parts.items() if part is not getattr(value, name)})
    return value


def _with_number(quantity: Quantity, text: str) -> Quantity:
    return replace(quantity, number=replace(quantity.number, decimal=Decimal(text), text=text, thousands=None))

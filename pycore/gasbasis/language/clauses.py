"""What stands around a value in a clause: bounds, ranges, a second value, averaging times, "about"."""
from __future__ import annotations

import re
from dataclasses import replace
from decimal import Decimal

from gasbasis.errors import NotUnderstood
from gasbasis.language import readers, tokens
from gasbasis.language.basis import LOWER, UPPER, Number, Quantity
from gasbasis.language.numbers import NUMBER, number_at

_SAME = Decimal("0.01")                # two prints of one value may differ by their rounding


def limit_direction(reader) -> bool:
    """ "not more than", "≥", "max.": which way a limit bounds. On the other sides a value is stated, not bounded."""
    for direction, pattern in tokens.LIMIT_DIRECTION:
        found = pattern.match(reader.text, reader.place)
        if found is None:
            continue
        if reader.side == "limit":
            return _second_bound(reader, direction, found) or _bound(reader, direction, found)
        if found.group() in ("<", "<=", "=<", "≤") or re.match(r"less than\s", found.group() + " ", re.IGNORECASE):
            return False               # a value below detection
        reader.refuse(NotUnderstood(f"'{found.group()}' sets a limit; a value is stated here.",
                                    hint="Put the clause in Limit, or leave the word out; a value below detection is written '< 0.5'."), *found.span())
        reader.place = found.end()
        return True
    return False


def _bound(reader, direction: str, found: re.Match) -> bool:
    reader.take("limit_direction", direction, *found.span())
    reader.place = found.end()
    return True


def _second_bound(reader, direction: str, found: re.Match) -> bool:
    """ "at least 5 and at most 10 ppm": the second of two bounds."""
    first = reader.fields.get("value")
    pending = reader.fields.get("pending")
    opposite = LOWER if direction == UPPER else UPPER
    number = _number(reader, readers.skip(reader.text, found.end(), ",:"))
    if reader.fields.get("limit_direction") != opposite or (first is None and pending is None) or number is None:
        return False
    marks = readers.concentration_unit(reader, readers.skip(reader.text, number.end()))
    if marks is None:
        return False
    start, end = found.start(), marks[1]
    second = Quantity(_typed(reader, number), marks[0])
    if first is None:
        typed, start, _ = reader.fields.pop("pending")
        first = Quantity(typed, marks[0])
    reader.fields.pop("value", None)
    reader.fields.pop("limit_direction")
    ends = (first, second) if opposite == LOWER else (second, first)
    return _take_range(reader, *ends, start, end)


def bound_by_sign(reader) -> None:
    """ "O2 < 0.2 %" in a limit: the sign read with the number bounds it, it marks no detection limit."""
    value = reader.fields.get("value")
    if reader.side == "limit" and value is not None and value.number.below:
        reader.fields["value"] = replace(value, number=replace(value.number, below=False))
        reader.fields.setdefault("limit_direction", UPPER)


def range_led(reader) -> bool:
    """ "5-10 ppm", "between 5 and 10 ppm", "5 ppm to 10 ppm": a two-sided limit; elsewhere one value is needed."""
    opening = tokens.RANGE_OPENING.match(reader.text, reader.place)
    first = _number(reader, opening.end() if opening else reader.place)
    if first is None:
        return False
    own_unit = _peeked_unit(reader, first.end())
    sign = tokens.RANGE_SIGN.match(reader.text, own_unit[1] if own_unit else first.end())
    second = _number(reader, sign.end()) if sign else None
    if second is None or (sign.group().strip().lower() == "and" and not opening):
        return False
    marks = readers.concentration_unit(reader, readers.skip(reader.text, second.end())) if _peeked_unit(reader, second.end()) else None
    if marks is None:
        return own_unit is None and _other_range(reader, second)
    unit = own_unit[0] if own_unit else marks[0]
    ends = Quantity(_typed(reader, first), unit), Quantity(_typed(reader, second), marks[0])
    return _take_range(reader, *ends, reader.place, marks[1])


def _other_range(reader, second: re.Match) -> bool:
    """A range of a temperature, pressure or share is never one value."""
    place = readers.skip(reader.text, second.end())
    found = readers.percent_at(reader.text, second.end()) or tokens.TEMPERATURE_UNIT.match(reader.text, place) or tokens.PRESSURE_UNIT.match(reader.text, place)
    if found is None:
        return False
    _refuse_range(reader, reader.place, found.end())
    return True


def _take_range(reader, low: Quantity, high: Quantity, start: int, end: int) -> bool:
    reader.place = end
    if reader.side != "limit":
        _refuse_range(reader, start, end)
        reader.fields["unit"] = low.unit
        return True
    unsure = next((end.number for end in (low, high) if end.number.thousands is not None), None)
    if unsure is not None:
        reader.refuse(NotUnderstood(f"'{unsure.text}' is {unsure.decimal} or {unsure.thousands}.",
                                    hint="In a range, write the ends without a sign that groups thousands."), start, end)
        return True
    if low.unit.kind != high.unit.kind:
        reader.refuse(NotUnderstood("The two ends of the range are in units that do not compare.", hint="Give both in one unit."), start, end)
        return True
    high = _in_unit(high, low)
    if low.number.decimal >= high.number.decimal:
        reader.refuse(NotUnderstood(f"The range runs from {low.number.text} to {high.number.text}.", hint="Give the lower end first."), start, end)
        return True
    reader.take("value", low, start, end)
    reader.fields.update(unit=low.unit, upper_value=high)
    return True


def _refuse_range(reader, start: int, end: int) -> None:
    reader.refuse(NotUnderstood(f"'{reader.original[start:end].strip()}' is a range; give one value.",
                                hint="A range is read as a two-sided limit in Limit; here type the value itself."), start, end)
    reader.place = end


def _in_unit(quantity: Quantity, like: Quantity) -> Quantity:
    scale = Decimal(repr(quantity.unit.factor)) / Decimal(repr(like.unit.factor))
    return quantity if scale == 1 else Quantity(replace(quantity.number, decimal=quantity.number.decimal * scale), like.unit)


def _number(reader, place: int) -> re.Match | None:
    found = NUMBER.match(reader.text, place)
    return None if found is None or found["below"] or readers.glued_sign(reader.text, place) else found


def _typed(reader, found: re.Match) -> Number:
    """An end of a range; its separators are read as decimal signs or groups by the same rules as any number's."""
    return number_at(found, reader.original[found.start():found.end()].strip())


def _peeked_unit(reader, place: int):
    """The unit of concentration at a place, without taking what is glued to it."""
    return readers.concentration_unit(_Looker(reader.text), readers.skip(reader.text, place))


class _Looker:
    """A reader that looks and takes nothing."""

    side = ""

    def __init__(self, text: str):
        self.text = text
        self.fields: dict[str, object] = {}

    def take(self, *_: object) -> None:
        """Nothing is taken."""


def second_value(reader) -> bool:
    """ "10 ppm (15 mg/m3)", "1000 ppm = 0.1 %": the value said again. In the same kind of unit it must agree."""
    first = reader.fields.get("value")
    number = _number(reader, reader.place) if first is not None else None
    marks = _peeked_unit(reader, number.end()) if number else None
    if marks is None or readers.is_share(reader.text, number.end()):
        return False
    measured, end = marks
    second = Quantity(_typed(reader, number), measured)
    start, reader.place = reader.place, end
    same_kind = measured.kind == first.unit.kind
    if same_kind and _agree(first, second) or not same_kind and reader.side == "limit" and "second_value" not in reader.fields:
        readers.concentration_unit(reader, readers.skip(reader.text, number.end()))      # takes what is glued to it
        reader.take("second_value", second, start, end)
        return True
    reader.refuse(NotUnderstood(f"'{reader.original[start:end].strip()}' is a second value beside '{first.number.text} {first.unit.text}'.",
                                hint="Keep one of the two."), start, end)
    return True


def _agree(first: Quantity, second: Quantity) -> bool:
    one, other = first.number.decimal, _in_unit(second, first).number.decimal
    return abs(one - other) <= _SAME * max(abs(one), abs(other))


def averaging(reader) -> bool:
    """ "8-h TWA", "STEL", "daily mean": the time a value stands for. It changes no figure and is kept as it was written."""
    found = tokens.AVERAGING.match(reader.text, reader.place)
    if found is None:
        return False
    said = reader.original[found.start():found.end()].strip()
    earlier = reader.fields.pop("averaging", None)
    reader.take("averaging", f"{earlier}, {said}" if earlier else said, *found.span())
    reader.place = found.end()
    return True


def approximate(reader) -> bool:
    """ "approx. 10 ppm", "~10 ppm" """
    found = tokens.APPROXIMATE.match(reader.text, reader.place)
    if found is None:
        return False
    reader.take("approximate", True, *found.span())
    reader.place = found.end()
    return True

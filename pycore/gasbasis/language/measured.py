"""Quantities of any kind in a text, and the clause readers the lines on samples, prepared gas and emission are made of."""
from __future__ import annotations

import re
from dataclasses import replace
from decimal import Decimal
from typing import Callable

from gasbasis.errors import CoreError, NotUnderstood, OutOfRange
from gasbasis.language.basis import Quantity, Unit
from gasbasis.language.columns import column_at
from gasbasis.language.numbers import NUMBER, PLUS_MINUS, number_at, uncertainty_at
from gasbasis.language.readers import skip
from gasbasis.language.statement import Reader, refuse_text, walk
from gasbasis.language.units import unit

Read = Callable[[Reader], bool]

_UNIT = re.compile(
    r"(?P<unit>(?:mm|in\.?) ?(?:Hg|H2O|WC)|° ?[CFKR]|deg ?[CF]|%|ppm|ppb|ppt|(?:kg|g|lb|t)/(?:kWh|MWh|GWh)"
    r"|(?:(?:short|long) tons?|ton|(?:d?s|n|N|S|a)?(?:c[fm]|L|l|m3|ft3)|s?cc(?:m)?|slpm|slm|sccm|[A-Za-z]{1,5}[23]?)"
    r"(?:\s?/\s?(?:(?:short|long) tons?|[A-Za-z]{1,5}[23]?))?)(?:\s?\((?P<absolute>a|abs|g|gauge)\))?(?![A-Za-z0-9/])")
# What a volume or a flow is called in its unit: dscf is dry and standard, NL normal. -> the plain unit, dry, and the word.
_CALLED = re.compile(r"(?P<dry>d)?(?P<word>s|S|n|N)(?P<plain>cf|cm|L|l|m3|ft3)(?P<rest>(?:/.*)?)")
_WHOLE = {"slm": ("L/min", "standard"), "slpm": ("L/min", "standard"), "sccm": ("cm3/min", "standard")}
_PLAIN = {"cf": "ft3", "cm": "m3"}
PURE = Unit("1", "", "number", 1.0)


def quantity_at(reader: Reader, place: int, kinds: tuple[str, ...]) -> tuple[Quantity, int, dict[str, str]] | None:
    """A number with a unit of one of the kinds, where it ends, and what its volume is called ("water", "word")."""
    found = NUMBER.match(reader.text, place)
    if found is None:
        return None
    number, after = number_at(found, reader.original[found.start():found.end()].strip()), found.end()
    spread = PLUS_MINUS.match(reader.text, skip(reader.text, after))
    if spread:
        number, after = replace(number, uncertainty=replace(uncertainty_at(spread), relative=False)), spread.end("amount")
    if "number" in kinds:
        return Quantity(number, PURE), after, {}
    measured = unit_at(reader, skip(reader.text, after), kinds)
    if measured is None and spread and spread["percent"]:          # "120 ± 5 % ng/min"
        measured, number = unit_at(reader, skip(reader.text, spread.end()), kinds), replace(number, uncertainty=uncertainty_at(spread))
    return (Quantity(number, measured[0]), measured[1], measured[2]) if measured else None


def unit_at(reader: Reader, place: int, kinds: tuple[str, ...]) -> tuple[Unit, int, dict[str, str]] | None:
    found = _UNIT.match(reader.text, place)
    if found is None:
        return None
    text, called = re.sub(r"\s?/\s?", "/", found["unit"]), {}
    named = _CALLED.fullmatch(text)
    if text in _WHOLE:
        text, called = _WHOLE[text][0], {"word": _WHOLE[text][1]}
    elif named and (named["plain"] not in ("cm",) or named["rest"] or named["dry"] or named["word"] in "sn"):
        text = _PLAIN.get(named["plain"], named["plain"]) + named["rest"]
        called = {"word": "normal" if named["word"] in "nN" else "standard", **({"water": "dry"} if named["dry"] else {})}
    try:
        measured = unit(text)
    except NotUnderstood:
        return None
    end = found.end()
    if measured.kind == "pressure":
        measured, end = column_at(reader, end, measured)
    return (measured, end, called) if measured.kind in kinds else None


def clause(field: str, head: str, kinds: tuple[str, ...], tail: str = "", check: Callable[[Quantity], CoreError | None] | None = None) -> Read:
    """A clause reader: a word, and one quantity that is the field."""
    pattern, ending = re.compile(head, re.IGNORECASE), re.compile(tail, re.IGNORECASE)

    def read(reader: Reader) -> bool:
        found = pattern.match(reader.text, reader.place)
        read_here = quantity_at(reader, found.end(), kinds) if found else None
        if read_here is None:
            return False
        quantity, end, _ = read_here
        behind = ending.match(reader.text, end) if tail else None
        if tail and behind is None:
            return False
        start, reader.place = reader.place, behind.end() if behind else end
        take(reader, field, quantity, start, end, check)
        return True

    return read


def take(reader: Reader, field: str, quantity: Quantity, start: int, end: int, check: Callable[[Quantity], CoreError | None] | None = None) -> None:
    """Record the quantity, and beside it what is wrong with it."""
    reader.take(field, quantity, start, end)
    wrong = check(quantity) if check else None
    if wrong is not None:
        reader.refuse(wrong.at(f"{reader.side}.{field}"), start, end)


def above_zero(name: str, cure: str = "Check its sign and unit.") -> Callable[[Quantity], CoreError | None]:
    """Refuses a quantity that is zero or negative."""
    def check(quantity: Quantity) -> CoreError | None:
        if quantity.si > 0:
            return None
        return OutOfRange(f"The {name} is {quantity.number.text} {quantity.unit.text}".rstrip() + "; it is above zero.", hint=cure)
    return check


def word(field: str, value: object, pattern: str) -> Read:
    """A clause reader of a word that sets a field."""
    compiled = re.compile(pattern, re.IGNORECASE)

    def read(reader: Reader) -> bool:
        found = compiled.match(reader.text, reader.place)
        if found is None:
            return False
        reader.take(field, value, reader.place, found.end())
        reader.place = found.end()
        return True

    return read


def late_spread(reader: Reader) -> bool:
    """ "12.4 ng ± 5 %", "24 °C ± 1 K": a spread behind the quantity it belongs to, in percent or in a unit of its kind."""
    found = PLUS_MINUS.match(reader.text, reader.place)
    quantity = reader.fields.get(reader.last)
    if found is None or not isinstance(quantity, Quantity) or quantity.number.uncertainty is not None:
        return False
    uncertainty, end = uncertainty_at(found), found.end()
    own = None if uncertainty.relative else unit_at(reader, skip(reader.text, end), (quantity.unit.kind,))
    if own is not None:
        scale = Decimal(repr(own[0].factor)) / Decimal(repr(quantity.unit.factor))
        uncertainty, end = replace(uncertainty, amount=uncertainty.amount * scale), own[1]
    reader.amend(replace(quantity, number=replace(quantity.number, uncertainty=uncertainty)), end)
    return True


def read_line(text: str, side: str, clauses: tuple[Read, ...]) -> tuple[Reader, CoreError | None]:
    """Walk a line with its clause readers. The error is one that keeps the whole text from being read."""
    reader = Reader("" if (refusal := refuse_text(text, side)) else text, side)
    if refusal is None:
        walk(reader, clauses)
    return reader, refusal

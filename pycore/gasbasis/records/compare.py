"""Two sheets side by side: only what differs, and which difference moves the figure by how much.

Each difference is carried over alone, from mine to theirs, and all of them together. Where the pieces of a text cannot be
carried over one by one so that theirs comes out, the whole line is one difference.
"""
from __future__ import annotations

import math
from dataclasses import dataclass, replace
from typing import Callable

from gasbasis.calculation.leaves import SIDE_TITLES
from gasbasis.calculation.outcomes import QUICK_BOUND
from gasbasis.calculation.rules import find_rule
from gasbasis.errors import CoreError
from gasbasis.language.basis import Gas, Number, Piece, Quantity, Statement
from gasbasis.language.describe import GAS_TITLES, fields_of
from gasbasis.language.edit import edit, read_side
from gasbasis.language.numbers import significant
from gasbasis.language.units import unit
from gasbasis.records.restated import restated
from gasbasis.records.sheet import Sheet

_SIDES = ("sample", "prepared", "hold", "gas", "emission", "owe", "limit")
_DIGITS = 4
_NOTHING = "not stated"
_SAME = 1e-9                           # relative: below it a figure was not moved


@dataclass(frozen=True)
class Difference:
    """One thing that the sheets say differently, and how to bring it from theirs into another sheet."""

    id: str
    title: str
    mine: str
    theirs: str
    carry: Callable[[Sheet], Sheet]


def compared(mine: Sheet, theirs: Sheet) -> dict:
    """Differences with what each does to mine's figure, alone and together."""
    found = differences(mine, theirs)
    start, end = _outcome(mine), _outcome(theirs)
    rows = [_row(difference, mine, start) for difference in found]
    moved = [row["factor"] for row in rows if row["factor"] is not None]
    together = _factor(start, end)
    rows.sort(key=lambda row: -abs(math.log(row["factor"])) if row["factor"] else (0.0 if row["factor"] is None else -math.inf))
    return {"mine": start["shown"], "theirs": end["shown"], "differences": rows,
            "together": {"factor": together, "factor_text": _factor_text(together)}, "sentence": _sentence(rows, start, end, together),
            "interplay_text": _interplay(moved, together) if len(moved) == len(rows) else ""}


def differences(mine: Sheet, theirs: Sheet) -> tuple[Difference, ...]:
    """All that differs in meaning. "9,2 %" and "9.2 %" do not; nor do a title and notes, which move nothing."""
    found: list[Difference] = []
    for side in _SIDES:
        found.extend(_side_differences(side, mine, theirs))
    if mine.rule_book != theirs.rule_book:
        found.append(Difference("rule_book", "rule-book", _book(mine), _book(theirs), lambda sheet: replace(sheet, rule_book=theirs.rule_book)))
    for doubt in sorted({*mine.settled, *theirs.settled}):
        one, other = mine.settled.get(doubt), theirs.settled.get(doubt)
        if one != other:
            found.append(Difference(f"settled.{doubt}", _doubt_title(doubt), _reading(doubt, mine), _reading(doubt, theirs), _settling(doubt, other)))
    return tuple(found)


def _side_differences(side: str, mine: Sheet, theirs: Sheet) -> list[Difference]:
    one, other = getattr(mine, side), getattr(theirs, side)
    if one.strip() == other.strip():
        return []
    before, after = read_side(one, side), read_side(other, side)
    parts = _parts_of((before[0], after[0]))
    fields = [field for field in parts if _meaning(before[0], parts[field]) != _meaning(after[0], parts[field])]
    if not before[1] and not after[1]:
        if not fields:
            return []
        found = [_piece_difference(side, field, before[0], after[0]) for field in fields]
        if one.strip() and other.strip() and _leads_there(found, mine, side, after[0]):
            return found
    return [_whole_line(side, mine, theirs)]


def _whole_line(side: str, mine: Sheet, theirs: Sheet) -> Difference:
    one, other = getattr(mine, side), getattr(theirs, side)
    return Difference(side, SIDE_TITLES[side], one or _NOTHING, other or _NOTHING, lambda sheet: replace(sheet, **{side: other}))


def _piece_difference(side: str, field: str, before: Statement | Gas, after: Statement | Gas) -> Difference:
    texts = [_text(record, field) for record in (before, after)]
    described = fields_of(side).get(field)
    title = GAS_TITLES.get(field) if side == "gas" and field in GAS_TITLES else described.title if described else field.replace("_", " ")

    def carry(sheet: Sheet) -> Sheet:
        return replace(sheet, **{side: edit(getattr(sheet, side), side, field, texts[1])})
    return Difference(f"{side}.{field}", f"{SIDE_TITLES[side]}: {title}", texts[0] or _NOTHING, texts[1] or _NOTHING, carry)


def _leads_there(found: list[Difference], mine: Sheet, side: str, wanted: Statement | Gas) -> bool:
    """Carrying all of them over gives what theirs means, and each can be carried over alone."""
    try:
        whole = mine
        for difference in found:
            difference.carry(mine)
            whole = difference.carry(whole)
    except CoreError:
        return False
    record, problems = read_side(getattr(whole, side), side)
    fields = sorted({piece.field for piece in (*record.pieces, *wanted.pieces)})
    return not problems and _meaning(record, fields) == _meaning(wanted, fields)


def _text(record: Statement | Gas, field: str) -> str:
    return ", ".join(piece.text for piece in record.pieces if piece.field == field)


def _parts_of(records: tuple[Statement | Gas, Statement | Gas]) -> dict[str, list[str]]:
    """The fields that stand for themselves, each with those told inside it: "9.2 % O2 dry" is one thing, and "ppmv" is."""
    around: dict[str, set[str | None]] = {}
    for record in records:
        for piece in record.pieces:
            around.setdefault(piece.field, set()).add(_told_in(piece, record))
    own = {field: [field] for field, homes in around.items() if len(homes) > 1 or None in homes}
    for field, homes in around.items():
        if field not in own:
            own.setdefault(next(iter(homes)), []).append(field)
    return own


def _told_in(piece: Piece, record: Statement | Gas) -> str | None:
    """The field of the piece that this one lies in, if it does."""
    start, end = piece.span
    return next((other.field for other in record.pieces if other.field != piece.field and other.span[0] <= start and end <= other.span[1]
                 and (other.span != piece.span or piece.field.startswith(f"{other.field}_"))), None)


def _meaning(record: Statement | Gas, fields: list[str]) -> list[object]:
    """What the pieces set, without the way they were written; the text where the record holds no such field."""
    values = [(field, getattr(record, field, None)) for field in fields]
    return [_text(record, field) if value is None else _bare(value) for field, value in values]


def _bare(value: object) -> object:
    if isinstance(value, Quantity):
        return (_bare(value.number), value.unit.id)
    if isinstance(value, Number):
        return (value.decimal, value.below, value.uncertainty, value.thousands)
    return value


def _book(sheet: Sheet) -> str:
    rule = find_rule(sheet.rule_book) if sheet.rule_book else None
    return rule.title if rule else sheet.rule_book or "none"


def _settling(doubt: str, reading: str | None) -> Callable[[Sheet], Sheet]:
    def carry(sheet: Sheet) -> Sheet:
        settled = {name: chosen for name, chosen in sheet.settled.items() if name != doubt}
        return replace(sheet, settled=settled if reading is None else {**settled, doubt: reading})
    return carry


def _doubt_title(doubt: str) -> str:
    side, _, field = doubt.partition(".")
    described = fields_of(side).get(field)
    title = described.title if described else field.replace("_", " ")
    return f"{SIDE_TITLES.get(side, side)}: {title} settled as"


def _reading(doubt: str, sheet: Sheet) -> str:
    """The reading in words where the sheet's own answer names it, else its id."""
    chosen = sheet.settled.get(doubt)
    if chosen is None:
        return "not settled"
    for record in restated(sheet, bound=QUICK_BOUND)["doubts"]:
        if record["id"] == doubt:
            return next((reading["label"] for reading in record["readings"] if reading["id"] == chosen), chosen)
    return chosen.replace("_", " ")


def _outcome(sheet: Sheet) -> dict:
    """The figure of a sheet for comparing: its value in the unit's SI size, and how it is shown."""
    found = restated(sheet, bound=QUICK_BOUND)
    figure, spread, verdict = found["figure"], found["spread"], found["verdict"]
    shown = {"text": "", "basis": "", "verdict": f"{verdict['limit_text']}: {verdict['sentence']}" if verdict else "", "problem": ""}
    if figure:
        held = unit(figure["unit"])
        return {"size": figure["value"] * held.factor, "kind": held.kind, "shown": shown | {"text": f"{figure['number_text']} {figure['unit_text']}", "basis": figure["basis"]}}
    if spread and "low" in spread:
        low, high = spread["low"]["text"], spread["high"]["text"]
        text = f"{low if low == high else f'{low} to {high}'} {spread['unit_text']}"
        return {"size": None, "kind": "", "shown": shown | {"text": text, "basis": found["sentence"]}}
    problem = found["problems"][0]["message"] if found["problems"] else ""
    return {"size": None, "kind": "", "shown": shown | {"text": "no figure", "problem": problem}}


def _row(difference: Difference, mine: Sheet, start: dict) -> dict:
    end = _outcome(difference.carry(mine))
    factor = _factor(start, end)
    return {"id": difference.id, "title": difference.title, "mine": difference.mine, "theirs": difference.theirs,
            "alone": end["shown"], "factor": factor, "factor_text": _factor_text(factor)}


def _factor(start: dict, end: dict) -> float | None:
    """Theirs over mine; None where one of them is no single figure, or they are of different kinds."""
    if start["size"] is None or end["size"] is None or start["kind"] != end["kind"] or start["size"] == 0 or end["size"] / start["size"] <= 0:
        return None
    factor = end["size"] / start["size"]
    return 1.0 if abs(factor - 1) < _SAME else factor


def _factor_text(factor: float | None) -> str:
    if factor is None:
        return ""
    if factor == 1.0:
        return "moves nothing"
    percent = 100 * (factor - 1)
    sign = "+" if percent > 0 else "−"
    return f"× {significant(factor, _DIGITS)} ({sign}{significant(abs(percent), 2)} %)"


def _interplay(factors: list[float], together: float | None) -> str:
    """Differences that act on each other do not multiply; said when it shows."""
    if together is None or len(factors) < 2:
        return ""
    product = math.prod(factors)
    if significant(product, _DIGITS) == significant(together, _DIGITS):
        return "One by one they multiply to the same."
    return f"One by one they multiply to × {significant(product, _DIGITS)}: the rest is their acting on each other."


def _sentence(rows: list[dict], start: dict, end: dict, together: float | None) -> str:
    if not rows:
        return "The two sheets say the same."
    if start["size"] is None or end["size"] is None:
        return "Settle the open doubts of both to see which difference moves the figure by how much."
    if together is None:
        return "The two figures are of different kinds: no one factor leads from one to the other."
    mover = rows[0]
    if mover["factor"] in (None, 1.0):
        return "What differs moves the figure by nothing." if together == 1.0 else "No difference moves the figure alone; together they do."
    return f"What moves the figure most is {mover['title']}."

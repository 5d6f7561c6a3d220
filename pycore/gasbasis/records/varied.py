"""One input varied over a range: the figure along it, where it crosses the limit, and a table."""
from __future__ import annotations

from dataclasses import replace
from decimal import Decimal
from typing import Callable

from gasbasis.calculation.case import WAYS, Case
from gasbasis.calculation.conformity import limits_of, on_limit_basis
from gasbasis.calculation.outcomes import settle_calm
from gasbasis.calculation.path import Path, figure_value
from gasbasis.calculation.restate import lay
from gasbasis.errors import CoreError, Missing, NotUnderstood, OutOfRange
from gasbasis.language.basis import Quantity
from gasbasis.language.numbers import read_number, significant
from gasbasis.language.statement import read_statement
from gasbasis.records.sheet import Sheet
from gasbasis.records.simulated import settled_sheet
from gasbasis.records.worth import input_title

_POINTS = 41
_DIGITS = 4
_HALVINGS = 40


def variables(case: Case, path: Path) -> list[dict]:
    """The typed inputs of a path that can be varied: field, title, value and unit as text."""
    fields = dict.fromkeys(leaf.field for leaf in path.leaves.values() if leaf.field)
    found = [(field, _quantity(case, field)) for field in fields]
    return [{"field": field, "title": input_title(field), "text": quantity.number.text, "unit_text": quantity.unit.text}
            for field, quantity in found if quantity is not None and not quantity.number.readings]


def varied(sheet: Sheet, field: object, low: object, high: object, take_usual: bool) -> dict:
    """The figure (on the limit's basis when there is a limit) over a range of one input. Raises CoreError."""
    settled = settled_sheet(sheet, take_usual)
    limit, problems = read_statement(sheet.limit, "limit")
    limits = None
    if sheet.limit.strip() and not problems:
        limits = limits_of(limit, sheet.settled)
        settled = on_limit_basis(settled, limit, sheet.settled, take_usual)
    case = settle_calm(settled)
    quantity = _quantity(case, field) if isinstance(field, str) else None
    if quantity is None:
        raise NotUnderstood(f"There is no input '{field}' to vary.", hint="Choose one of the inputs of the working.", field="vary")
    ends = [_end(text) for text in (low, high)]
    if ends[0] >= ends[1]:
        raise OutOfRange(f"The range runs from {ends[0]} to {ends[1]}.", hint="Give the lower end first, and a higher one.", field="vary")
    xs = [float(ends[0]) + (float(ends[1]) - float(ends[0])) * index / (_POINTS - 1) for index in range(_POINTS)]
    figures = [_figure(case, field, x) for x in xs]
    shown = lay(case).shown
    lines = [value for value in (limits.lower, limits.upper) if value is not None] if limits else []
    return {"field": field, "title": input_title(field), "x_unit_text": quantity.unit.text, "y_unit_text": shown.unit_text, "x": xs, "y": [value for value, _ in figures],
            "here": float(quantity.number.decimal), "limits": lines, "limit_texts": [significant(value, _DIGITS) for value in lines],
            "left_out": _left_out([problem for _, problem in figures]),
            "crossings": [{"x": x, "text": f"{significant(x, _DIGITS)} {quantity.unit.text}"} for line in lines for x in _crossings(case, field, xs, figures, line)],
            "rows": [{"x_text": significant(x, _DIGITS), "y_text": "" if value is None else significant(value, _DIGITS), "problem": str(problem or "")}
                     for x, (value, problem) in list(zip(xs, figures))[::4]]}


def _quantity(case: Case, field: str) -> Quantity | None:
    side, _, name = field.partition(".")
    record = getattr(case, side, None) if side in ("hold", "gas", *WAYS) else None
    quantity = getattr(record, name, None)
    return quantity if isinstance(quantity, Quantity) else None


def _end(text: object) -> Decimal:
    if not isinstance(text, str) or not text.strip():
        raise Missing("A range needs both its ends.", hint="Type the lowest and the highest value, e.g. 2 and 14.", field="vary")
    return read_number(text).decimal


def _figure(case: Case, field: str, x: float) -> tuple[float | None, str]:
    side, _, name = field.partition(".")
    quantity = _quantity(case, field)
    text = significant(x, 8)
    changed = replace(quantity, number=replace(quantity.number, decimal=Decimal(repr(x)), text=text, uncertainty=None, below=False))
    record = replace(getattr(case, side), **{name: changed})
    if field == "hold.value":
        record = replace(record, unit=changed.unit)
    try:
        return figure_value(lay(replace(case, **{side: record}))), ""
    except CoreError as error:
        return None, error.message


def _left_out(problems: list[str]) -> str:
    said = [problem for problem in problems if problem]
    return f"{len(said)} of {len(problems)} points have no figure: {said[0]}" if said else ""


def _crossings(case: Case, field: str, xs: list[float], figures: list, line: float) -> list[float]:
    """Where the figure passes the limit, by halving between two points on either side."""
    found = []
    for (a, (at_a, _)), (b, (at_b, _)) in zip(zip(xs, figures), zip(xs[1:], figures[1:])):
        if at_a is None or at_b is None or (at_a - line) * (at_b - line) >= 0:
            continue
        found.append(_halved(lambda x: _figure(case, field, x)[0], a, b, line))
    return found


def _halved(figure: Callable[[float], float | None], a: float, b: float, line: float) -> float:
    rising = figure(b) > line
    for _ in range(_HALVINGS):
        middle = (a + b) / 2
        value = figure(middle)
        if value is None:
            break
        a, b = (a, middle) if (value > line) == rising else (middle, b)
    return (a + b) / 2

"""A limit said twice in units that do not convert into each other, "10 ppm (15 mg/m3)": which of the two binds."""
from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Mapping

from gasbasis.calculation.case import make_case
from gasbasis.calculation.conformity import limit_statement
from gasbasis.calculation.outcomes import Settled, settle, spread
from gasbasis.language.basis import LOWER, Statement
from gasbasis.language.numbers import significant

FIRST, SECOND = "first", "second"
_DIGITS = 4


@dataclass(frozen=True)
class Binding:
    which: str | None                  # FIRST | SECOND; None: it depends on open doubts
    low_text: str                      # the first limit in the unit of the second, over the readings of open doubts
    high_text: str


def second(limit: Statement) -> Statement:
    """The limit as it was said the second time, on the same basis."""
    return replace(limit, value=limit.second_value, unit=limit.second_value.unit, second_value=None, unit_in_millions=None,
                   parts_by=limit.parts_by if limit.second_value.unit.kind == "parts" else None)


def binding(settled: Settled, limit: Statement, choices: Mapping[str, str], take_usual: bool, bound: int) -> Binding:
    """Which of the two is the stricter. The first is restated onto the basis of the second. Raises CoreError."""
    case = settled.case
    other = limit_statement(second(limit), case.owe)
    first = replace(limit_statement(replace(limit, second_value=None), case.owe), species=case.hold.species or case.owe.species)
    own = {f"{side}.{doubt.partition('.')[2]}": reading for doubt, reading in choices.items() if doubt.startswith("limit.") for side in ("hold", "owe")}
    there = settle(make_case(first, case.gas, replace(other, value=None), case.rule), {**choices, **own}, take_usual)
    found = spread(there.case, bound)
    if not found.values:
        raise next(outcome.problem for outcome in found.outcomes)
    number = float(other.value.number.decimal)
    low, high = min(found.values), max(found.values)
    which = None if low < number < high else FIRST if (high <= number) != (limit.limit_direction == LOWER) else SECOND
    return Binding(which, significant(low, _DIGITS), significant(high, _DIGITS))

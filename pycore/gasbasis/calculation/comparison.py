"""What a value becomes before it is compared with its limit: rounding, results below detection, negatives. Each a named choice."""
from __future__ import annotations

from dataclasses import dataclass
from decimal import ROUND_DOWN, ROUND_HALF_EVEN, ROUND_HALF_UP, Decimal
from typing import Callable, Mapping

from gasbasis.errors import OutOfRange

ROUNDING, BELOW_DETECTION, NEGATIVE = "limit.rounding", "limit.below_detection", "limit.negative"


@dataclass(frozen=True)
class Option:
    id: str
    title: str
    source: str
    apply: Callable[[float, Decimal], float]     # the value and the limit as it was typed


def _as_it_is(value: float, limit: Decimal) -> float:
    return value


def _to_decimals(mode: str) -> Callable[[float, Decimal], float]:
    """Rounding to as many decimals as the limit prints."""
    def rounded(value: float, limit: Decimal) -> float:
        step = Decimal(1).scaleb(min(limit.as_tuple().exponent, 0))
        return float(Decimal(repr(value)).quantize(step, mode))
    return rounded


def _to_digits(value: float, limit: Decimal) -> float:
    """Rounding to as many significant digits as the limit prints."""
    exact, digits = Decimal(repr(value)), len(limit.as_tuple().digits)
    return float(exact.quantize(Decimal(1).scaleb(exact.adjusted() - digits + 1), ROUND_HALF_UP)) if exact else 0.0


_COMMON = "common practice, no source"
CHOICES: Mapping[str, tuple[str, tuple[Option, ...]]] = {    # id -> title and options; the first is taken until another is chosen
    ROUNDING: ("rounding", (
        Option("none", "not rounded", _COMMON, _as_it_is),
        Option("decimals", "to the limit's decimals, half away from zero", "US 40 CFR 1090.50 (from an excerpt)", _to_decimals(ROUND_HALF_UP)),
        Option("even", "to the limit's decimals, half to even", "ASTM E29, rounding method (from memory)", _to_decimals(ROUND_HALF_EVEN)),
        Option("truncated", "cut to the limit's decimals", "Pennsylvania DEP 273-4110-002 (from an excerpt)", _to_decimals(ROUND_DOWN)),
        Option("digits", "to the limit's significant digits", "US 40 CFR 86.1112 (from an excerpt)", _to_digits))),
    BELOW_DETECTION: ("a result below detection", (
        Option("bound", "its bound, within only when that is", _COMMON, _as_it_is),
        Option("half", "half its bound", _COMMON, lambda value, limit: value / 2),
        Option("zero", "zero", "US 40 CFR 60.5965 for congeners (from an excerpt)", lambda value, limit: 0.0))),
    NEGATIVE: ("a negative value", (
        Option("kept", "kept as it is", "EPA AQS note of 2011 (from an excerpt)", _as_it_is),
        Option("zero", "set to zero", _COMMON, lambda value, limit: max(value, 0.0)))),
}


def option(choice: str, choices: Mapping[str, str]) -> Option:
    """The option taken of a choice. Raises OutOfRange."""
    options = CHOICES[choice][1]
    wanted = choices.get(choice, options[0].id)
    found = next((entry for entry in options if entry.id == wanted), None)
    if found is None:
        raise OutOfRange(f"There is no choice '{wanted}' for {CHOICES[choice][0]}.", hint=f"Choices: {', '.join(entry.id for entry in options)}.", field=choice)
    return found


def counted(value: float, below: bool, limit: Decimal, choices: Mapping[str, str]) -> float:
    """The value that a result counts as, before rounding."""
    if below:
        return option(BELOW_DETECTION, choices).apply(value, limit)
    return option(NEGATIVE, choices).apply(value, limit) if value < 0 else value

"""A relation: one formula with its symbols, validity and citation.

The physics function is called with floats (the value), traced symbols (the formula and its
substituted line), `uncertainties` numbers (the budget), pint quantities (proof of dimensions) or columns.
"""
from __future__ import annotations

import inspect
import math
from dataclasses import dataclass
from typing import Callable, Mapping

from gasbasis.errors import OutOfRange


@dataclass(frozen=True)
class Symbol:
    """A letter with its mark (subscript), the SI unit, and the unit its dimension is proved with."""

    letter: str
    mark: str
    unit: str
    meaning: str
    proof: str = ""                    # a unit of the proof's own dimensions; the SI unit where none is given


@dataclass(frozen=True)
class Bound:
    """Where a relation holds: an argument between two ends, each a number or another argument's name."""

    argument: str
    need: str                          # "it must lie above 0 K"
    cure: str
    low: float | str = -math.inf
    high: float | str = math.inf
    low_allowed: bool = False
    high_allowed: bool = False

    def holds(self, values: Mapping[str, float]) -> bool:
        value = values[self.argument]
        low = values[self.low] if isinstance(self.low, str) else self.low
        high = values[self.high] if isinstance(self.high, str) else self.high
        return (value > low or self.low_allowed and value == low) and (value < high or self.high_allowed and value == high)


class OutsideValidity(OutOfRange):
    """An argument lies outside a relation's bounds. `argument` lets the caller say which input it was."""

    def __init__(self, message: str, *, hint: str, argument: str, need: str):
        super().__init__(message, hint=hint)
        self.argument = argument
        self.need = need


@dataclass(frozen=True, eq=False)
class Relation:
    id: str
    title: str
    function: Callable
    result: Symbol
    symbols: Mapping[str, Symbol]
    source: str                        # a facts source id
    locator: str = ""
    validity: tuple[Bound, ...] = ()
    note: str = ""

    def __post_init__(self) -> None:
        arguments = tuple(inspect.signature(self.function).parameters)
        if arguments != tuple(self.symbols):
            raise TypeError(f"{self.id}: symbols {tuple(self.symbols)} do not match arguments {arguments}")

    def __call__(self, **values):
        """The function itself, for any type of number."""
        return self.function(**values)

    def value(self, **values: float) -> float:
        """The value for floats. Raises OutOfRange outside the validity, or when it is not finite and real."""
        for bound in self.validity:
            if not bound.holds(values):
                symbol = self.symbols[bound.argument]
                raise OutsideValidity(f"The {symbol.meaning} is {values[bound.argument]:.6g} {symbol.unit}: {bound.need}.",
                                      hint=bound.cure, argument=bound.argument, need=bound.need)
        try:
            result = self.function(**values)
        except (ZeroDivisionError, OverflowError, ValueError) as error:
            raise OutOfRange(f"{self.title} has no value here ({error}).", hint="Check the values that enter it.") from error
        if isinstance(result, complex) or not math.isfinite(result):
            raise OutOfRange(f"{self.title} has no real, finite value here.", hint="Check the values that enter it.")
        return result

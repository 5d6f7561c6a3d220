"""Sums that do not lose digits, over more values than are kept."""
from __future__ import annotations

import math
from typing import Iterable


class ExactSum:
    """A running sum kept without rounding (partial sums that do not overlap, as math.fsum keeps them)."""

    def __init__(self) -> None:
        self.count = 0
        self._parts: list[float] = []

    def add(self, values: Iterable[float]) -> None:
        for value in values:
            self.count += 1
            kept = 0
            for part in self._parts:
                if abs(value) < abs(part):
                    value, part = part, value
                high = value + part
                low = part - (high - value)
                if low:
                    self._parts[kept] = low
                    kept += 1
                value = high
            self._parts[kept:] = [value]

    @property
    def total(self) -> float:
        return math.fsum(self._parts)

    @property
    def mean(self) -> float:
        return self.total / self.count if self.count else math.nan

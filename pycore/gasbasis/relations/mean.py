"""The mean of repeated, already corrected contents."""
from __future__ import annotations

import inspect
from functools import lru_cache

from gasbasis.relations.relation import Relation, Symbol


@lru_cache(maxsize=None)
def mean_of(count: int) -> Relation:
    """The mean of so many contents y_1, y_2, ..., and e, the error of that mean: zero, with the readings' scatter as its uncertainty."""
    symbols = {f"y_{index}": Symbol("y", str(index), "1", f"content, reading {index}", "dimensionless") for index in range(1, count + 1)}
    symbols["e"] = Symbol("e", "", "1", "error of the mean by the scatter of the readings", "dimensionless")

    def mean(**values):
        total = values["y_1"]
        for index in range(2, count + 1):
            total = total + values[f"y_{index}"]
        return total / count + values["e"]

    mean.__signature__ = inspect.Signature([inspect.Parameter(name, inspect.Parameter.KEYWORD_ONLY) for name in symbols])
    return Relation(f"mean_of_{count}", "Mean of the corrected readings", mean, Symbol("y", "mean", "1", "mean content", "dimensionless"), symbols,
                    "jcgm-100-2008", "4.2.1")

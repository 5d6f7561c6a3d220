"""Rows restated: each path a row may need compiled once, into one function of the row's numbers.

A path is laid for a row's own case; it keeps the decisions it was laid by and its relations their bounds. The compiled function
checks them all and returns NaN where one fails: then another path is tried, at last one laid for that row alone. So every row's
figure is that of a single sheet, and a row without one has the sheet's own reason.
"""
from __future__ import annotations

import math
import re
from dataclasses import dataclass, field
from decimal import Decimal
from typing import Callable, Mapping, Sequence

from gasbasis.calculation.fuse import step_lines, surroundings
from gasbasis.calculation.path import Decision, Leaf, Path, figure_value
from gasbasis.calculation.restate import lay
from gasbasis.errors import CoreError
from gasbasis.language.basis import Quantity
from gasbasis.series.template import Row, Template

NAN = math.nan
# Where a number only ever becomes a leaf, or is looked at by a recorded decision. Elsewhere each row is laid by itself.
_LEAF_ONLY = ("hold.value", "gas.water_content", "gas.water_route", "gas.cooler", "gas.oxygen", "gas.carbon_dioxide", "gas.temperature",
              "gas.pressure", "gas.pressure_route", "gas.barometer", "gas.barometer_route", "gas.ambient_oxygen")
_VARIABLE = re.compile(r"\b[cv]\d+\b")  # a check of constants alone held when the path was laid
_MOST_PATHS = 64                       # a file that needs more is laid row by row


@dataclass
class Restating:
    """The rows of one species. Calls take the row's numbers as floats, in the order of `template.columns`."""

    template: Template
    functions: list[Callable[..., float]] = field(default_factory=list)
    paths: list[Path] = field(default_factory=list)
    laid: list[tuple[Path, Row]] = field(default_factory=list)    # what the functions were compiled from
    row_by_row: bool = False           # a column stands where a number decides by itself

    def __post_init__(self) -> None:
        self.row_by_row = self.template.case.gas.model is not None or any(slot.place not in _LEAF_ONLY for slot in self.template.slots)

    def figure(self, texts: Sequence[str], values: Sequence[float]) -> float:
        """The figure in the owed unit. Raises CoreError with the reason there is none."""
        for index, function in enumerate(self.functions):
            found = function(*values)
            if found == found:
                if index:              # what held for this row is likely to hold for the next
                    self.functions.insert(0, self.functions.pop(index))
                return found
        return self._laid(texts, values)

    def column(self, columns: Sequence[Sequence[float]]) -> list[float]:
        """The figures of many rows by the paths met so far; NaN where none of them holds."""
        if not self.functions:
            return [NAN] * len(columns[0]) if columns else []
        found = list(map(self.functions[0], *columns))
        for function in self.functions[1:]:
            if not math.isnan(sum(found)):
                break
            found = [figure if figure == figure else function(*row) for figure, row in zip(found, zip(*columns))]
        return found

    def _laid(self, texts: Sequence[str], values: Sequence[float]) -> float:
        row = self.template.row(texts)
        path = lay(row.case)
        figure = figure_value(path)
        if not self.paths:
            self.paths.append(path)
        if not self.row_by_row and len(self.functions) < _MOST_PATHS:
            function = compiled(path, self.template, row)
            if function is None or not _same(function(*values), figure):
                self.row_by_row = True
            else:
                self.functions.append(function)
                self.laid.append((path, row))
        return figure


def _same(first: float, second: float) -> bool:
    return first == second or abs(first - second) <= 1e-13 * abs(second)


def compiled(path: Path, template: Template, row: Row) -> Callable[..., float] | None:
    """The path as a checked function of the columns. None where a column feeds a leaf in a way of its own."""
    fed = fed_leaves(path, template, row)
    if fed is None:
        return None
    names = {name: f"v{index}" for index, name in enumerate([*path.leaves, *(step.result for step in path.steps)])}
    arguments = [f"c{index}" for index in range(len(template.slots))]
    constant = {name: leaf.value for name, leaf in path.leaves.items() if name not in fed}
    names |= {name: repr(value) for name, value in constant.items()}
    lines = [f"{names[leaf]} = {_affine(arguments[index], factor, offset)}" for leaf, (index, factor, offset) in fed.items()]
    for number, step in enumerate(path.steps):
        lines += [_decision(decision, names, row) for decision in path.decisions if decision.before == number]
        if all(name in constant for name in step.arguments.values()):      # the same in every row: computed once
            constant[step.result] = step.relation.value(**{argument: constant[name] for argument, name in step.arguments.items()})
            names[step.result] = repr(constant[step.result])
        else:
            lines += [line.strip() for line in step_lines(step, names, checked=True) if _VARIABLE.search(line)]
    lines += [_decision(decision, names, row) for decision in path.decisions if decision.before == len(path.steps)]
    lines += [f"figure = {names[path.figure]} / {path.shown.factor!r}", "return figure if -1e300 < figure < 1e300 else nan"]
    text = [f"def figure({', '.join(arguments)}):", "    try:", *(f"        {line}" for line in lines),
            "    except (ZeroDivisionError, OverflowError, ValueError, TypeError): return nan"]
    space = surroundings()
    exec(compile("\n".join(text), "<row>", "exec"), space)     # noqa: S102 - the text is made above from our own relations
    return space["figure"]


def _affine(argument: str, factor: float, offset: float) -> str:
    scaled = argument if factor == 1.0 else f"{argument} * {factor!r}"
    return scaled if offset == 0.0 else f"{scaled} + {offset!r}"


def fed_leaves(path: Path, template: Template, row: Row) -> dict[str, tuple[int, float, float]] | None:
    """Leaf -> the column that feeds it, with factor and offset to SI. None when a leaf follows a column in another way."""
    fed: dict[str, tuple[int, float, float]] = {}
    for index, quantity in enumerate(row.quantities):
        other = _moved(path, template, row, index)
        if other is None or list(other.leaves) != list(path.leaves):
            return None
        for name, leaf in path.leaves.items():
            if other.leaves[name].value == leaf.value:
                continue
            feeding = _feeding(quantity, path, leaf)
            if feeding is None or name in fed:
                return None
            fed[name] = (index, *feeding)
    return fed


def _moved(path: Path, template: Template, row: Row, index: int) -> Path | None:
    """The same path with one column's number moved a little. None if no small move keeps it."""
    texts = [str(quantity.number.decimal) for quantity in row.quantities]
    here = row.quantities[index].number.decimal
    for by in ("0.000001", "-0.000001"):
        texts[index] = str(here + (here or 1) * Decimal(by))
        try:
            other = lay(template.row(texts).case)
        except CoreError:
            continue
        if [step.relation.id for step in other.steps] == [step.relation.id for step in path.steps]:
            return other
    return None


def _feeding(quantity: Quantity, path: Path, leaf: Leaf) -> tuple[float, float] | None:
    ways = [(quantity.unit.factor, quantity.unit.offset)]
    if leaf.name == path.held:
        ways.insert(0, (path.held_factor, 0.0))
    here = float(quantity.number.decimal)
    return next(((factor, offset) for factor, offset in ways if here * factor + offset == leaf.value), None)


def _decision(decision: Decision, names: Mapping[str, str], row: Row) -> str:
    left, right = (_operand(side, names, row) for side in (decision.left, decision.right))
    compared = f"{left} {'>=' if decision.or_equal else '>'} {right}"
    return f"if not {compared}: return nan" if decision.above else f"if {compared}: return nan"


def _operand(side: str | float | Quantity, names: Mapping[str, str], row: Row) -> str:
    if isinstance(side, str):
        return names[side]
    if not isinstance(side, Quantity):
        return repr(float(side))
    for index, quantity in enumerate(row.quantities):
        if quantity is side:
            return f"({_affine(f'c{index}', quantity.unit.factor, quantity.unit.offset)})"
    return repr(side.si)

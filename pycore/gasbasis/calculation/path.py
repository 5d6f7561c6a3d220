"""A path from the held value to the owed figure: leaves (what was typed, read or looked up) and steps.

A path is data. The same path gives the figure with floats, the budget with `uncertainties` numbers
and a column with array types, because every step is one call of one relation.
"""
from __future__ import annotations

import math
from dataclasses import dataclass, field
from types import MappingProxyType
from typing import Mapping

from gasbasis.errors import OutOfRange
from gasbasis.language.basis import Quantity
from gasbasis.relations.relation import OutsideValidity, Relation

TYPED, TABLE, READING, CONVENTION = "typed", "table", "reading", "convention"


@dataclass(frozen=True)
class Leaf:
    """A number the path starts from, in SI, with the print of it and where it came from."""

    name: str
    value: float
    text: str
    unit_text: str
    origin: str                        # TYPED | TABLE | READING | CONVENTION
    origin_text: str
    field: str = ""                    # the input it answers to: "hold.value", "gas.water_content"
    standard_uncertainty: float = 0.0  # in SI
    distribution: str = "normal"       # normal | rectangular | triangular
    degrees_of_freedom: float = math.inf
    unit_factor: float = 1.0           # SI value of one printed unit, for printing an uncertainty beside the value


@dataclass(frozen=True)
class Shown:
    """How a step's result is printed: SI value / factor, and the unit's text."""

    factor: float = 1.0
    unit_text: str = ""


@dataclass(frozen=True)
class Step:
    """One relation with the names its arguments are taken from. `through` is the argument that
    carries the concentration; None for side steps such as the molar mass of the gas."""

    relation: Relation
    arguments: Mapping[str, str]
    result: str
    shown: Shown
    label: str = ""
    through: str | None = None
    parts: tuple[tuple[str, tuple[tuple[str, str], ...]], ...] = ()   # label, arguments to swap to undo it
    note: str = ""
    solved: bool = False               # its result starts from a root found by iteration; the note tells the residual


@dataclass(frozen=True)
class Choice:
    """A decision on the way that is no relation: shown in the working with its reason."""

    title: str
    reason: str
    source: str = ""
    before: int = 0                    # shown before the step with this index


@dataclass(frozen=True)
class Decision:
    """What the path was laid by: whether the first lies above the second. A row of a series on which it
    falls otherwise needs a path of its own."""

    left: str | float | Quantity       # a leaf or result by name, a number in SI, or a quantity that is no leaf
    right: str | float | Quantity
    or_equal: bool
    above: bool
    before: int                        # all that is named is known before the step with this index


@dataclass(frozen=True)
class Path:
    leaves: Mapping[str, Leaf]
    steps: tuple[Step, ...]
    choices: tuple[Choice, ...]
    held: str                          # the leaf that is the held value
    held_factor: float                 # SI value of one held unit
    figure: str                        # the name of the owed result, in SI
    shown: Shown
    basis: tuple[str, ...]             # the owed basis in words, part by part
    species_text: str = ""
    warnings: tuple[str, ...] = ()
    decisions: tuple[Decision, ...] = ()
    correlations: Mapping[tuple[str, str], float] = field(default_factory=dict)   # pairs of leaf names


def evaluate(path: Path, values: Mapping[str, object] = MappingProxyType({})) -> dict[str, object]:
    """Every named result of the path. `values` replaces leaves (uncertain numbers, columns)."""
    known: dict[str, object] = {name: leaf.value for name, leaf in path.leaves.items()}
    known.update(values)
    for step in path.steps:
        arguments = {argument: known[name] for argument, name in step.arguments.items()}
        known[step.result] = step.relation(**arguments) if values else _checked(path, step, arguments)
    return known


def _checked(path: Path, step: Step, arguments: Mapping[str, float]) -> float:
    """The step's value; an error names the input as it was typed, and its field."""
    try:
        return step.relation.value(**arguments)
    except OutsideValidity as error:
        leaf = path.leaves.get(step.arguments[error.argument])
        if leaf is None:
            raise
        meaning = step.relation.symbols[error.argument].meaning
        raise OutOfRange(f"The {meaning} is {leaf.text} {leaf.unit_text}: {error.need}.", hint=error.hint, field=leaf.field) from error


def figure_value(path: Path) -> float:
    """The figure in the owed unit."""
    return evaluate(path)[path.figure] / path.shown.factor


class Drafting:
    """Collects leaves and steps while a path is being laid."""

    def __init__(self) -> None:
        self.leaves: dict[str, Leaf] = {}
        self.steps: list[Step] = []
        self.choices: list[Choice] = []
        self.warnings: list[str] = []
        self.decisions: list[Decision] = []

    def leaf(self, leaf: Leaf) -> str:
        self.leaves.setdefault(leaf.name, leaf)
        return leaf.name

    def step(self, step: Step) -> str:
        if not any(done.result == step.result for done in self.steps):
            self.steps.append(step)
        return step.result

    def value(self, name: str) -> float:
        """The value of a leaf, or of a result so far: what a choice has to look at."""
        if name in self.leaves:
            return self.leaves[name].value
        step = next(step for step in self.steps if step.result == name)
        return step.relation.value(**{argument: self.value(source) for argument, source in step.arguments.items()})

    def is_above(self, left: str | float | Quantity, right: str | float | Quantity, or_equal: bool = False) -> bool:
        """Whether one value lies above another. Every choice that looks at a value asks here, so that the path keeps it."""
        first, second = self._worth(left), self._worth(right)
        above = first > second or or_equal and first == second
        self.decisions.append(Decision(left, right, or_equal, above, len(self.steps)))
        return above

    def _worth(self, what: str | float | Quantity) -> float:
        if isinstance(what, Quantity):
            return what.si
        return self.value(what) if isinstance(what, str) else what

    def choose(self, title: str, reason: str, source: str = "") -> None:
        self.choices.append(Choice(title, reason, source, len(self.steps)))

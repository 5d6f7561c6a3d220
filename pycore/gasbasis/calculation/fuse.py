"""Compile a path into one Python function: the traced relations, one line each, in their own order.

The compiled function computes bit for bit what the path computes step by step, several times faster:
for Monte Carlo trials and for the rows of a series.
"""
from __future__ import annotations

import math
from typing import Callable, Mapping, Sequence

from gasbasis.calculation.path import Path, Step
from gasbasis.physics.elementary import exp, log, sqrt
from gasbasis.relations.relation import Bound
from gasbasis.relations.trace import Traced, python_source, trace


def fuse(path: Path, varying: Sequence[str], checked: bool = False) -> Callable[..., float]:
    """A function of the varying leaves (in that order) that returns the figure in the owed unit.

    With `checked`, a draw outside a relation's validity returns NaN.
    """
    names = {name: f"v{index}" for index, name in enumerate([*path.leaves, *(step.result for step in path.steps)])}
    constants = {names[name]: leaf.value for name, leaf in path.leaves.items() if name not in varying}
    lines = [f"def figure({', '.join(names[name] for name in varying)}):"]
    for step in path.steps:
        lines += step_lines(step, names, checked)
    lines.append(f"    return {names[path.figure]} / {path.shown.factor!r}")
    space = {**surroundings(), **constants}
    exec(compile("\n".join(lines), "<path>", "exec"), space)   # noqa: S102 - the text is made above from our own relations
    return space["figure"]


def step_lines(step: Step, names: Mapping[str, str], checked: bool) -> list[str]:
    """One step as lines of Python; `names` maps leaves and results to variables."""
    checks = [_check(bound, step.arguments, names) for bound in step.relation.validity] if checked else []
    expression = python_source(_renamed(trace(step.relation), {a: names[n] for a, n in step.arguments.items()}))
    return [*checks, f"    {names[step.result]} = {expression}"]


def surroundings() -> dict[str, object]:
    """What the lines call."""
    return {"exp": exp, "log": log, "sqrt": sqrt, "nan": math.nan, "inf": math.inf}


def _renamed(node: Traced, names: Mapping[str, str]) -> Traced:
    if node.op == "leaf":
        return Traced("leaf", (names[node.args[0]],))
    return Traced(node.op, tuple(_renamed(arg, names) if isinstance(arg, Traced) else arg for arg in node.args))


def _check(bound: Bound, arguments, names: Mapping[str, str]) -> str:
    def end(value) -> str:
        return names[arguments[value]] if isinstance(value, str) else repr(value)
    low, high = ("<=" if bound.low_allowed else "<"), ("<=" if bound.high_allowed else "<")
    return f"    if not {end(bound.low)} {low} {names[arguments[bound.argument]]} {high} {end(bound.high)}: return nan"

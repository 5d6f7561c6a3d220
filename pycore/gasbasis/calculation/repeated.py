"""Repeated readings: which quantities have them, what their order of averaging leaves open, and the path that corrects each."""
from __future__ import annotations

import math
from dataclasses import fields, replace
from statistics import stdev
from typing import Callable

from gasbasis import relations
from gasbasis.calculation.case import Case
from gasbasis.calculation.path import Leaf, Path, Step, evaluate
from gasbasis.language.basis import APART, EACH, TOGETHER, Doubt, Quantity, Reading

_MEANS = "US 40 CFR 60.284 corrects the 12-hour means (from an excerpt)"
_FIELD = "hold.averaging_order"
_ONE_BY_ONE = "US 40 CFR 60.1755 corrects hourly averages, then averages (from an excerpt)"


def repeated_inputs(case: Case) -> list[tuple[str, Quantity]]:
    """The inputs that were given as repeated readings, by field."""
    return [(f"{side}.{field.name}", quantity) for side in ("hold", "gas") for field in fields(case.record(side))
            if isinstance(quantity := getattr(case.record(side), field.name), Quantity) and quantity.number.readings]


def order_doubt(case: Case) -> list[Doubt]:
    """Correct each and average, or average and correct? Asked where something beside the held value was read as often."""
    inputs = repeated_inputs(case)
    counts = {len(quantity.number.readings) for _, quantity in inputs}
    if case.hold.averaging_order is not None or len(counts) != 1 or all(field == "hold.value" for field, _ in inputs):
        return []
    count = counts.pop()
    readings = [Reading(EACH, "each is corrected, then they are averaged", (("averaging_order", EACH),), _ONE_BY_ONE)]
    if len(inputs) > 1:
        readings.append(Reading(TOGETHER, "the means are corrected; the readings were taken together", (("averaging_order", TOGETHER),), "JCGM 100:2008, 5.2.3"))
    readings.append(Reading(APART, "the means are corrected; the readings have nothing to do with each other", (("averaging_order", APART),), _MEANS))
    return [Doubt(_FIELD, "order of averaging", f"Are the {count} readings corrected one by one, or are their means corrected?",
                  "A correction is no straight line, so the mean of corrected readings is not the corrected mean.", tuple(readings))]


def run(case: Case, index: int) -> Case:
    """The case of one of the repeated readings alone."""
    for field, quantity in repeated_inputs(case):
        side, _, name = field.partition(".")
        value = quantity.number.readings[index]
        alone = replace(quantity, number=replace(quantity.number, decimal=value, text=format(value, "f"), readings=(), uncertainty=None))
        case = replace(case, **{side: replace(case.record(side), **{name: alone})})
    return replace(case, hold=replace(case.hold, averaging_order=None))


def corrected_one_by_one(case: Case, lay: Callable[[Case], Path]) -> Path:
    """The path that brings every reading to the owed basis and averages there; what is common to all stands once.

    The scatter of the corrected values is the type A uncertainty (JCGM 100:2008, H.2.4, approach 2).
    """
    count = len(repeated_inputs(case)[0][1].number.readings)
    paths = [lay(run(case, index)) for index in range(count)]
    common = {name for name, leaf in paths[0].leaves.items() if all(path.leaves.get(name) == leaf for path in paths)}
    leaves, steps = dict.fromkeys([]), []
    for index, path in enumerate(paths, start=1):
        own = _own_names(path, common, index)
        leaves.update({own.get(name, name): replace(leaf, name=own.get(name, name)) for name, leaf in path.leaves.items()})
        steps.extend(_renamed(step, own, index) for step in path.steps if index == 1 or step.result in own)
    ends = {f"y_{index}": _own_names(path, common, index).get(path.figure, path.figure) for index, path in enumerate(paths, start=1)}
    leaves["scatter"] = _scatter([evaluate(path)[path.figure] for path in paths], paths[0])
    mean = Step(relations.mean_of(count), {**ends, "e": "scatter"}, "mean", paths[0].shown, f"mean of {count}")
    return replace(paths[0], leaves=leaves, steps=(*steps, mean), figure="mean", held="", basis=(*paths[0].basis, f"mean of {count} corrected readings"))


def _scatter(values: list[float], path: Path) -> Leaf:
    u = stdev(values) / math.sqrt(len(values))
    return Leaf("scatter", 0.0, "0", path.shown.unit_text, "reading", f"scatter of the {len(values)} corrected readings, s/√n", _FIELD, standard_uncertainty=u,
                degrees_of_freedom=len(values) - 1, unit_factor=path.shown.factor)


def _own_names(path: Path, common: set[str], index: int) -> dict[str, str]:
    """The names that differ from run to run, and what they are called in this one."""
    own = {name for name in path.leaves if name not in common}
    for step in path.steps:
        if own & set(step.arguments.values()):
            own.add(step.result)
    return {name: f"{name} ({index})" for name in own}


def _renamed(step: Step, own: dict[str, str], index: int) -> Step:
    if step.result not in own:
        return step
    return replace(step, arguments={argument: own.get(name, name) for argument, name in step.arguments.items()}, result=own[step.result],
                   label=f"{step.label}, reading {index}" if step.label else "", note=f"reading {index}" + (f"; {step.note}" if step.note else ""))

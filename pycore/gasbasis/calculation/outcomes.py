"""What the open doubts do to the figure: settle, try every combination, rank, and see which are calm."""
from __future__ import annotations

import math
from dataclasses import dataclass
from itertools import islice
from statistics import fmean
from typing import Iterator, Mapping

from gasbasis.calculation.case import Case
from gasbasis.calculation.doubts import raised
from gasbasis.calculation.path import figure_value
from gasbasis.calculation.restate import lay
from gasbasis.calculation.stated_spread import spread_doubts
from gasbasis.errors import CoreError
from gasbasis.language.basis import Doubt, Reading

BOUND = 4096
QUICK_BOUND = 24                       # while somebody types: beyond it one doubt at a time, and the rest when they rest
_NEGLIGIBLE = 1e-12


@dataclass(frozen=True)
class Settled:
    """A case with the chosen readings taken, and what is still open."""

    case: Case
    taken: tuple[tuple[Doubt, Reading], ...]
    open: tuple[Doubt, ...]            # those that may move the figure

    @property
    def about_spread(self) -> tuple[Doubt, ...]:
        """Open doubts that touch the uncertainty only."""
        return tuple(spread_doubts(self.case))


@dataclass(frozen=True)
class Outcome:
    """The figure under one combination of readings, or the reason there is none."""

    readings: Mapping[str, str]        # doubt id -> reading id
    label: str                         # the readings in words
    value: float | None
    problem: CoreError | None = None


@dataclass(frozen=True)
class Spread:
    outcomes: tuple[Outcome, ...]
    complete: bool                     # False: more combinations than BOUND, only a part was tried

    @property
    def values(self) -> tuple[float, ...]:
        return tuple(outcome.value for outcome in self.outcomes if outcome.value is not None)


def settle(case: Case, choices: Mapping[str, str], take_usual: bool = False) -> Settled:
    """Take the chosen readings as far as their doubts are raised; one may raise the next.

    `take_usual` also takes the reading a doubt names as usual where nothing was chosen.
    """
    taken: list[tuple[Doubt, Reading]] = []
    while True:
        doubts = raised(case)
        for doubt in [*doubts, *spread_doubts(case)]:
            reading = _chosen(doubt, choices, take_usual)
            if reading is not None:
                taken.append((doubt, reading))
                case = case.taking(doubt.id, reading)
                break
        else:
            return Settled(case, tuple(taken), tuple(doubts))


def _chosen(doubt: Doubt, choices: Mapping[str, str], take_usual: bool) -> Reading | None:
    wanted = choices.get(doubt.id)
    for reading in doubt.readings:
        if reading.id == wanted or (wanted is None and take_usual and reading.usual_because):
            return reading
    return None


def settle_calm(settled: Settled) -> Case:
    """The case with every remaining doubt at its usual, else first, reading: none of them shows in the figure."""
    case = settled.case
    for doubt in (*settled.open, *settled.about_spread):
        reading = next((reading for reading in doubt.readings if reading.usual_because), doubt.readings[0])
        case = case.taking(doubt.id, reading)
    return case


def spread(case: Case, bound: int = BOUND) -> Spread:
    """The figure under every combination of readings of the open doubts, `bound` at most."""
    if _combinations(raised(case)) <= bound:
        tried = tuple(islice(_outcomes(case, {}, ()), bound + 1))
        if len(tried) <= bound:
            return Spread(tried, True)
    return Spread(tuple(_one_at_a_time(case)), False)


def _combinations(doubts: list[Doubt]) -> int:
    """How many there are at least: readings may raise further doubts."""
    return math.prod(len(doubt.readings) for doubt in doubts)


def _outcomes(case: Case, readings: dict[str, str], labels: tuple[str, ...]) -> Iterator[Outcome]:
    doubts = raised(case)
    if not doubts:
        yield _outcome(case, readings, labels)
        return
    doubt = doubts[0]
    for reading in doubt.readings:
        yield from _outcomes(case.taking(doubt.id, reading), {**readings, doubt.id: reading.id}, (*labels, reading.label))


def _outcome(case: Case, readings: Mapping[str, str], labels: tuple[str, ...]) -> Outcome:
    label = "; ".join(labels)
    try:
        return Outcome(readings, label, figure_value(lay(case)))
    except CoreError as error:
        return Outcome(readings, label, None, error)


def _one_at_a_time(case: Case) -> Iterator[Outcome]:
    """Above the bound: every reading of every doubt with the others at their first, then the extremes."""
    first = _follow(case, {})
    yield first
    lowest, highest = dict(first.readings), dict(first.readings)
    for doubt in raised(case):
        tried = [_follow(case, {doubt.id: reading.id}) for reading in doubt.readings]
        yield from tried[1:]
        known = [outcome for outcome in tried if outcome.value is not None]
        if known:
            lowest[doubt.id] = min(known, key=lambda outcome: outcome.value).readings[doubt.id]
            highest[doubt.id] = max(known, key=lambda outcome: outcome.value).readings[doubt.id]
    yield _follow(case, lowest)
    yield _follow(case, highest)


def _follow(case: Case, wanted: Mapping[str, str]) -> Outcome:
    """The outcome with the wanted readings, and each other doubt's first."""
    readings: dict[str, str] = {}
    labels: list[str] = []
    while doubts := raised(case):
        doubt = doubts[0]
        reading = next((r for r in doubt.readings if r.id == wanted.get(doubt.id)), doubt.readings[0])
        readings[doubt.id] = reading.id
        labels.append(reading.label)
        case = case.taking(doubt.id, reading)
    return _outcome(case, readings, tuple(labels))


def effect(doubt_id: str, outcomes: tuple[Outcome, ...]) -> float:
    """The largest ratio of figures that this doubt alone can make, less one; infinite across zero.

    Compares outcomes that agree in every other doubt; where none do (one reading opens further
    doubts), compares the means under each reading.
    """
    groups: dict[tuple, list[float]] = {}
    by_reading: dict[str, list[float]] = {}
    for outcome in outcomes:
        if outcome.value is None or doubt_id not in outcome.readings:
            continue
        others = tuple(sorted(item for item in outcome.readings.items() if item[0] != doubt_id))
        groups.setdefault(others, []).append(outcome.value)
        by_reading.setdefault(outcome.readings[doubt_id], []).append(outcome.value)
    if not by_reading:
        return 0.0                     # no figure under any reading: the problem is shown in its place
    largest = max((_ratio(values) for values in groups.values()), default=0.0)
    aligned = any(len(values) == len(by_reading) for values in groups.values())
    return largest if aligned else max(largest, _ratio([fmean(values) for values in by_reading.values()]))


def _ratio(values: list[float]) -> float:
    low, high = min(values), max(values)
    if high - low <= _NEGLIGIBLE * max(abs(low), abs(high)):
        return 0.0
    return abs(high - low) / min(abs(low), abs(high)) if low * high > 0 else math.inf


def reading_range(doubt_id: str, reading_id: str, outcomes: tuple[Outcome, ...]) -> tuple[float, float] | None:
    """The smallest and the largest figure with this reading."""
    values = [o.value for o in outcomes if o.value is not None and o.readings.get(doubt_id) == reading_id]
    return (min(values), max(values)) if values else None


def reading_problem(doubt_id: str, reading_id: str, outcomes: tuple[Outcome, ...]) -> CoreError | None:
    """What stands in the way of a figure with this reading, at least in some combination."""
    return next((o.problem for o in outcomes if o.problem is not None and o.readings.get(doubt_id) == reading_id), None)

"""Means over windows of time, with their rules: what "<" and negatives count as, how much data a mean needs, in which order
mean and correction are taken (the other is shown beside it), weighting by flow, mass, exceedances of a limit.

Both of the two orders are computed for every mean. Sums are exact (fsum).
"""
from __future__ import annotations

import math
from array import array
from bisect import bisect_left
from collections import deque
from dataclasses import dataclass, field
from typing import Callable, Iterator, Sequence

from gasbasis.calculation.conformity import limit_statement, limits_of
from gasbasis.calculation.verdict import WITHIN, Limits, Result, judge
from gasbasis.errors import CoreError, Missing, NotUnderstood, OutOfRange
from gasbasis.language.statement import read_statement
from gasbasis.language.units import unit
from gasbasis.series.rows import Block, Rows
from gasbasis.series.settings import FULL, HALF, KEEP, LEAVE_OUT, ZERO, Settings
from gasbasis.series.sums import ExactSum
from gasbasis.series.windows import AS_MEASURED, DAY, EIGHT_HOURS, FIXED, ROLLING, RUN, SHIFT, Window, piece, read_window

LISTED = 200                           # exceedances and gaps named one by one; all are counted
_BELOW_SHARE = {ZERO: 0.0, HALF: 0.5, FULL: 1.0}
_MILLIGRAM = 1e-6                      # kg
_GAP = 1.5                             # intervals between two stamps from which on something is missing


@dataclass(frozen=True)
class Mean:
    window: int
    species: int
    start: float
    end: float
    value: float                       # NaN: no data
    other: float                       # taken in the other order; NaN where it has no figure
    count: int
    expected: float
    enough: bool                       # holds the data capture asked for
    words: str = ""                    # the verdict against the limit
    mass: float | None = None          # kg, over the rows that were measured

    @property
    def capture_percent(self) -> float:
        return 100.0 * self.count / self.expected if self.expected else math.nan

    @property
    def difference_percent(self) -> float:
        """How much the other order differs, in percent of the value."""
        return 100.0 * (self.other / self.value - 1.0) if self.value else math.nan


@dataclass
class Gathered:
    """What lies in one piece of time, for one species."""

    values: list[float] = field(default_factory=list)
    inputs: list[list[float]] = field(default_factory=list)
    weights: list[float] = field(default_factory=list)
    loads: list[float] = field(default_factory=list)       # kg/s


@dataclass
class Statistics:
    """Of the means of one window and species that have enough data."""

    values: array = field(default_factory=lambda: array("d"))
    highest: Mean | None = None
    lacking: int = 0
    exceedances: int = 0
    listed: list[Mean] = field(default_factory=list)

    def take(self, mean: Mean) -> None:
        if not mean.enough or math.isnan(mean.value):
            self.lacking += 1
            return
        self.values.append(mean.value)
        if self.highest is None or mean.value > self.highest.value:
            self.highest = mean
        if mean.words and mean.words != WITHIN:
            self.exceedances += 1
            if len(self.listed) < LISTED:
                self.listed.append(mean)

    def percentile(self, percent: float) -> float:
        """The smallest mean that at least so many percent do not exceed (nearest rank). NaN without means."""
        ordered = sorted(self.values)
        return ordered[max(0, math.ceil(percent / 100.0 * len(ordered) - 1e-9) - 1)] if ordered else math.nan


@dataclass
class _Open:
    """A piece of time that rows still come to."""

    start: float
    end: float
    species: list[Gathered]


class Means:
    """Takes blocks of rows and gives each finished mean to `listener`."""

    def __init__(self, rows: Rows, settings: Settings, listener: Callable[[Mean], None] = lambda mean: None):
        if rows.clock is None:
            raise Missing("Means need time stamps, and none were found in the file.", hint="Name the columns (time.columns).", field="time.columns")
        if settings.stamp is None:
            raise Missing("Is a stamp the start or the end of its interval?", hint='Give time.stamp: "start" or "end".', field="time.stamp")
        self.rows, self.settings, self.listener = rows, settings, listener
        self.windows = [read_window(text, rows.clock.__class__("year_first", settings.zone)) for text in settings.windows]
        self.count = len(settings.species)
        self.interval = settings.interval
        self.limits = [_limits(rows, index, settings) for index in range(self.count)]
        self.flow_factor = None if settings.flow is None else _flow_factor(settings.flow.unit)
        self.held = [_held_place(restating) for restating in rows.restatings[:self.count]]
        self.open: list[_Open | None] = [None] * len(self.windows)
        self.past: list[deque[_Open]] = [deque() for _ in self.windows]
        self.statistics = [[Statistics() for _ in range(self.count)] for _ in self.windows]
        self.total_mass = [ExactSum() for _ in range(self.count)]
        self.measured = [0] * self.count
        self.ruled_out = 0             # "<" rows without a rule, and rows left out by one
        self.gaps: list[tuple[float, float]] = []
        self.gap_count, self.gap_seconds, self._last = 0, 0.0, math.nan

    # --- taking rows ---

    def take(self, block: Block) -> None:
        kept = [place for place, second in enumerate(block.seconds) if second == second]
        if not kept:
            return
        seconds = [block.seconds[place] for place in kept]
        if self.interval is None:
            self.interval = _usual_step(seconds)
        self._find_gaps(seconds)
        shift = self.interval if self.settings.stamp == "end" else 0.0
        starts = [second - shift for second in seconds]
        ruled = [self._ruled(block, species, kept) for species in range(self.count)]
        for index, species in enumerate(ruled):
            self.total_mass[index].add(load * self.interval for _, _, _, load in species if load == load)
            self.measured[index] += sum(entry[0] == entry[0] for entry in species)
        for index, window in enumerate(self.windows):
            self._into(index, window, starts, ruled)

    def _ruled(self, block: Block, species: int, kept: Sequence[int]) -> list[tuple[float, tuple, float, float]]:
        """Value, inputs, weight and load of each row, by the rules for "<" and negatives; NaN where it does not count."""
        figures, inputs, below, held = block.figures[species], block.inputs[species], block.below[species], self.held[species]
        columns = list(zip(*inputs)) if inputs else [()] * len(figures)
        weighs = self.settings.flow is not None and self.settings.flow.weighs
        entries = []
        for place in kept:
            value, row = figures[place], columns[place]
            share = self._share(value, place in below)
            if value == value and share is None:
                self.ruled_out += 1
            if value != value or share is None:
                entries.append((math.nan, (), math.nan, math.nan))
                continue
            if share != 1.0 and held is not None:
                row = (*row[:held], row[held] * share, *row[held + 1:])
            load = math.nan
            if self.flow_factor is not None:
                load = block.figures[self.count + species][place] * share * _MILLIGRAM * block.flow[place] * self.flow_factor
            entries.append((value * share, row, block.flow[place] if weighs else 1.0, load))
        return entries

    def _share(self, value: float, below: bool) -> float | None:
        """What part of a figure counts; None: none of it."""
        if below:
            return _BELOW_SHARE.get(self.settings.below) if self.settings.below != LEAVE_OUT else None
        if value < 0 and self.settings.negatives != KEEP:
            return 0.0 if self.settings.negatives == ZERO else None
        return 1.0

    def _find_gaps(self, seconds: Sequence[float]) -> None:
        for before, after in zip([self._last, *seconds], seconds):
            if after - before > _GAP * self.interval:
                self.gap_count += 1
                self.gap_seconds += after - before - self.interval
                if len(self.gaps) < LISTED:
                    self.gaps.append((before, after))
        self._last = seconds[-1]

    def _into(self, index: int, window: Window, starts: Sequence[float], ruled) -> None:
        place = 0
        while place < len(starts):
            here = self._piece(index, window, starts[place])
            if here is None:
                following = bisect_left(starts, window.first, place) if starts[place] < window.first else len(starts)
                place = max(following, place + 1)
                continue
            until = bisect_left(starts, here.end, place)
            for gathered, species in zip(here.species, ruled):
                _gather(gathered, species[place:until])
            place = max(until, place + 1)

    def _piece(self, index: int, window: Window, start: float) -> _Open | None:
        """The open piece a moment lies in; the one before is finished when the moment lies behind it."""
        here = self.open[index]
        if here is not None and start < here.end:
            return here
        if window.kind in (RUN, SHIFT):
            if not window.first <= start < window.last:
                return None
            bounds = window.first, window.last
        else:
            bounds = piece(window, start, self.rows.clock.offset_at(start), self.rows.clock)
        if here is not None:
            self._close(index, window, here)
        self.open[index] = _Open(*bounds, [Gathered() for _ in range(self.count)])
        return self.open[index]

    # --- finishing ---

    def finish(self) -> None:
        """The last rows have come: what is open is finished."""
        for index, window in enumerate(self.windows):
            if self.open[index] is not None:
                self._close(index, window, self.open[index])
                self.open[index] = None

    def _close(self, index: int, window: Window, here: _Open) -> None:
        if window.kind != ROLLING:
            return self._report(index, window, here.start, here.end, [[gathered] for gathered in here.species])
        past = self.past[index]
        past.append(here)
        while past[0].start < here.end - window.length - 1e-6:
            past.popleft()
        self._report(index, window, here.end - window.length, here.end, [[each.species[species] for each in past] for species in range(self.count)])

    def _report(self, index: int, window: Window, start: float, end: float, parts: Sequence[Sequence[Gathered]]) -> None:
        for species, gathered in enumerate(parts):
            mean = self._mean(index, window, species, start, end, gathered)
            self.statistics[index][species].take(mean)
            self.listener(mean)

    def _mean(self, index: int, window: Window, species: int, start: float, end: float, parts: Sequence[Gathered]) -> Mean:
        values, weights, rows, loads = ([entry for part in parts for entry in getattr(part, name)] for name in ("values", "weights", "inputs", "loads"))
        expected = (end - start) / self.interval
        if not values or not math.fsum(weights):
            return Mean(index, species, start, end, math.nan, math.nan, 0, expected, False)
        corrected = _weighted(values, weights)
        means = [_weighted(column, weights) for column in zip(*rows)]
        try:
            other = self.rows.restatings[species].figure([format(mean, ".17g") for mean in means], means)
        except CoreError:
            other = math.nan
        scale = _shift_share(window, len(values) * self.interval)
        first, second = (corrected, other) if self.settings.order == "mean_of_corrected" else (other, corrected)
        first, second = first * scale, second * scale
        capture = self.settings.capture_percent
        enough = capture is None or 100.0 * len(values) / expected >= capture - 1e-9
        mass = math.fsum(loads) * self.interval if self.flow_factor is not None else None
        words = self._words(species, first) if enough and first == first else ""
        return Mean(index, species, start, end, first, second, len(values), expected, enough, words, mass)

    def _words(self, species: int, value: float) -> str:
        limits, rule = self.limits[species], self.settings.limit
        if limits is None or rule is None:
            return ""
        u = None if rule.percent is None else abs(value) * rule.percent / 200.0     # typed as U with k = 2
        return judge(rule.rule, Result(value, u), limits, rule.number).words


def _gather(gathered: Gathered, entries) -> None:
    for value, row, weight, load in entries:
        if value == value:
            gathered.values.append(value)
            gathered.inputs.append(row)
            gathered.weights.append(weight)
            if load == load:
                gathered.loads.append(load)


def _weighted(values: Sequence[float], weights: Sequence[float]) -> float:
    return math.fsum(value * weight for value, weight in zip(values, weights)) / math.fsum(weights)


def _shift_share(window: Window, measured: float) -> float:
    """What part of 8 h the measured mean stands for (directive 98/24/EC: a time-weighted mean over a reference period of 8 h)."""
    if window.kind != SHIFT:
        return 1.0
    return (window.length if window.rest == AS_MEASURED else measured) / EIGHT_HOURS


def _usual_step(seconds: Sequence[float]) -> float:
    """The interval of the stamps: the median of the steps. Raises Missing for a single row."""
    steps = sorted(after - before for before, after in zip(seconds, seconds[1:]))
    if not steps:
        raise Missing("The interval of the readings cannot be seen from one row.", hint="Give time.interval_s.", field="time.interval_s")
    return steps[len(steps) // 2]


def _held_place(restating) -> int | None:
    return next((place for place, slot in enumerate(restating.template.slots) if slot.place == "hold.value"), None)


def _flow_factor(text: str) -> float:
    read = unit(text)
    if read.kind != "volume_rate":
        raise NotUnderstood(f"'{text}' is no volume per time.", hint="For example m3/h.", field="flow.unit")
    return read.factor


def _limits(rows: Rows, species: int, settings: Settings) -> Limits | None:
    """The limit of a species, on the very basis that is owed. Raises CoreError."""
    text = settings.species[species].texts.limit
    if not text.strip():
        return None
    statement, problems = read_statement(text, "limit")
    for problem in problems:
        raise problem
    if settings.limit is None:
        raise Missing("Exceedances need the decision rule that was agreed.", hint='Give "limit": {"rule": "simple"} or another rule.', field="limit.rule")
    owe = rows.restatings[species].template.case.owe
    there = limit_statement(statement, owe)
    if statement.unit.id != owe.unit.id or any(_differs(getattr(there, name), getattr(owe, name)) for name in ("temperature", "pressure", "water", "oxygen", "reported_as")):
        raise OutOfRange("The limit is on another basis than what is owed.", hint="Write what you owe on the limit's unit and basis: rows are restated onto it, never the limit onto theirs.",
                         field="limit")
    return limits_of(statement, settings.species[species].settled)


def _differs(first, second) -> bool:
    if first is None or second is None:
        return first is not second
    return getattr(first, "si", getattr(first, "id", first)) != getattr(second, "si", getattr(second, "id", second))

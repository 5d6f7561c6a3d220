"""Propagation of distributions by Monte Carlo (JCGM 101:2008), as a check on the budget."""
from __future__ import annotations

import math
from array import array
from dataclasses import dataclass
from random import Random
from statistics import fmean, pstdev
from typing import Callable, Sequence

from gasbasis.calculation.correlations import Correlations, cholesky, correlation_matrix
from gasbasis.calculation.fuse import fuse
from gasbasis.calculation.path import Leaf, Path
from gasbasis.errors import OutOfRange

FEWEST, MOST = 200_000, 5_000_000
_BLOCK = 10_000                        # trials a block (JCGM 101:2008, 7.9.4 takes the larger of 100/(1-p) and 10^4)
_COVERAGE = 0.95
_LARGEST_LOSS = 1e-3                   # share of draws outside a domain above which nothing is said
_BINS = 40
_WINDOW, _FITTED = 0.4, 20             # of the share left out, to either side of the shortest interval; points fitted there


@dataclass(frozen=True)
class Simulation:
    trials: int
    mean: float
    standard_uncertainty: float
    low: float                         # ends of the shortest 95 % interval
    high: float
    outside: int                       # draws outside a relation's domain, left out
    stable: bool                       # the adaptive procedure came to rest (7.9)
    errors: tuple[float, float]        # what two such simulations may differ by at low and high (7.9.4 e)
    counts: tuple[int, ...]            # histogram over equal bins
    edges: tuple[float, float]


def simulate(path: Path, seed: int, progress: Callable[[int, int], None] = lambda done, of: None, most: int = MOST) -> Simulation:
    """Draw the inputs until mean, u and interval are stable, FEWEST trials at least.

    Correlated inputs are drawn together; they must be Gaussian. Raises OutOfRange.
    """
    if not FEWEST <= most <= MOST:
        raise OutOfRange(f"{most} trials were asked for; {FEWEST} to {MOST} can be run.", hint="Leave it at the usual number.",
                         field="monte_carlo.trials")
    leaves = [leaf for leaf in path.leaves.values() if leaf.standard_uncertainty]
    figure = fuse(path, [leaf.name for leaf in leaves], checked=True)
    draw = _drawing(leaves, path.correlations, Random(seed))
    values, blocks, outside, drawn = array("d"), [], 0, 0
    stable = False
    while drawn < most and not (stable and drawn >= FEWEST):
        block = array("d", (figure(*draw()) for _ in range(_BLOCK)))
        drawn += _BLOCK
        good = array("d", (value for value in block if value == value))
        outside += _BLOCK - len(good)
        _refuse_loss(outside, drawn)
        values.extend(good)
        blocks.append(_summary(sorted(good)))
        stable = _at_rest(blocks, pstdev(good))
        progress(drawn, max(FEWEST, drawn))
    ordered = sorted(values)
    low, high = shortest_interval(ordered)
    return Simulation(drawn, fmean(values), pstdev(values), low, high, outside, stable, _errors(blocks)[2:],
                      _histogram(ordered), (ordered[0], ordered[-1]))


def _refuse_loss(outside: int, drawn: int) -> None:
    if outside > _LARGEST_LOSS * drawn:
        raise OutOfRange(f"{outside} of {drawn} draws lie outside what the relations allow (more than 0.1 %).",
                         hint="An uncertainty reaches beyond a physical bound, such as water below 0 % or oxygen above ambient. "
                              "Check the largest ones.", field="uncertainty")


def _drawing(leaves: Sequence[Leaf], correlations: Correlations, random: Random) -> Callable[[], list[float]]:
    """A function that draws one set of inputs; those that are correlated are drawn together."""
    names = list(dict.fromkeys(name for pair in correlations for name in pair))
    together = [leaf for leaf in leaves if leaf.name in names]
    for leaf in together:
        if leaf.distribution != "normal":
            raise OutOfRange(f"A {leaf.distribution} input cannot be drawn with a correlation: only Gaussian ones can.",
                             hint="State its uncertainty with a k, or leave the correlation out.", field="gas.correlations")
    rows = cholesky(correlation_matrix([leaf.name for leaf in together], correlations))
    makers = [None if leaf in together else _maker(leaf, random) for leaf in leaves]
    gauss = random.gauss

    def independent() -> list[float]:
        return [one() for one in makers]

    def correlated() -> list[float]:
        normal = [gauss(0.0, 1.0) for _ in together]
        joint = iter([leaf.value + leaf.standard_uncertainty * sum(a * z for a, z in zip(row, normal)) for leaf, row in zip(together, rows)])
        return [one() if one else next(joint) for one in makers]

    return correlated if together else independent


def _maker(leaf: Leaf, random: Random) -> Callable[[], float]:
    """A function that draws one input from its distribution."""
    value, u = leaf.value, leaf.standard_uncertainty
    gauss, uniform = random.gauss, random.uniform
    if leaf.distribution == "rectangular":
        half = u * math.sqrt(3.0)
        return lambda: uniform(value - half, value + half)
    if leaf.distribution == "triangular":
        half = u * math.sqrt(6.0)
        return lambda: random.triangular(value - half, value + half, value)
    if math.isfinite(leaf.degrees_of_freedom):
        freedom = leaf.degrees_of_freedom     # scaled and shifted t (JCGM 101:2008, 6.4.9)
        return lambda: value + u * gauss(0.0, 1.0) / math.sqrt(random.gammavariate(freedom / 2, 2.0) / freedom)
    return lambda: gauss(value, u)


def shortest_interval(ordered: Sequence[float], coverage: float = _COVERAGE) -> tuple[float, float]:
    """The shortest interval that holds the given share of sorted values (JCGM 101:2008, 5.3.4)."""
    held = max(1, round(coverage * len(ordered)))
    starts = len(ordered) - held + 1
    _, first = min((ordered[start + held - 1] - ordered[start], start) for start in range(starts))
    first = _smoothed(ordered, held, first, round(_WINDOW * starts))
    return ordered[first], ordered[first + held - 1]


def _smoothed(ordered: Sequence[float], held: int, first: int, reach: int) -> int:
    """Where a parabola through the widths around the shortest is lowest.

    The widths near the minimum differ by less than they scatter, so the raw place of the shortest wanders by several
    hundredths of u. Without a minimum inside the window (a uniform or one-sided distribution) the raw place stands.
    """
    step = reach // _FITTED
    if step == 0 or first < reach or first + reach + held > len(ordered):
        return first
    places = range(-step * _FITTED, step * _FITTED + 1, step)
    widths = [ordered[first + at + held - 1] - ordered[first + at] for at in places]
    ones, squares, fourths = len(widths), sum(at**2 for at in places), sum(at**4 for at in places)
    slope = sum(at * width for at, width in zip(places, widths)) / squares
    bend = (ones * sum(at**2 * width for at, width in zip(places, widths)) - squares * sum(widths)) / (ones * fourths - squares**2)
    lowest = round(-slope / (2 * bend)) if bend > 0 else 0
    return first + lowest if abs(lowest) < reach else first


def _summary(ordered: Sequence[float]) -> tuple[float, float, float, float]:
    return fmean(ordered), pstdev(ordered), *shortest_interval(ordered)


def _at_rest(blocks: Sequence[tuple[float, ...]], u: float) -> bool:
    """Twice the standard deviation of each mean over the blocks is below the numerical tolerance (7.9.4)."""
    tolerance = numerical_tolerance(u)
    return len(blocks) > 1 and all(error < tolerance for error in _errors(blocks))


def _errors(blocks: Sequence[tuple[float, ...]]) -> tuple[float, ...]:
    """Twice the standard deviation of the mean of each summary over the blocks."""
    return tuple(2.0 * pstdev(column) / math.sqrt(len(blocks) - 1) for column in zip(*blocks))


def numerical_tolerance(u: float) -> float:
    """Half the last of two significant digits of u (JCGM 101:2008, 7.9.2)."""
    return 0.0 if u == 0 else 0.5 * 10.0 ** (math.floor(math.log10(u)) - 1)


def _histogram(ordered: Sequence[float]) -> tuple[int, ...]:
    low, high = ordered[0], ordered[-1]
    counts = [0] * _BINS
    if high == low:
        return tuple(counts)
    scale = _BINS / (high - low)
    for value in ordered:
        counts[min(_BINS - 1, int((value - low) * scale))] += 1
    return tuple(counts)


def agrees(budget_low: float, budget_high: float, simulation: Simulation) -> bool | None:
    """Whether the budget's 95 % interval is validated (JCGM 101:2008, clause 8): both ends within the tolerance.

    None while the draws scatter too much to tell.
    """
    tolerance = numerical_tolerance(simulation.standard_uncertainty)
    apart = (abs(budget_low - simulation.low), abs(budget_high - simulation.high))
    margins = (0.0, 0.0) if simulation.stable else simulation.errors
    if all(distance + margin <= tolerance for distance, margin in zip(apart, margins)):
        return True
    return False if any(distance - margin > tolerance for distance, margin in zip(apart, margins)) else None

"""The figure's uncertainty by the law of propagation (JCGM 100:2008 clause 5), over the whole path.

The path is evaluated once with `uncertainties` numbers seeded at its leaves, so that an input which
enters several steps keeps its correlation with itself.
"""
from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Mapping

from uncertainties import ufloat, umath

from gasbasis import facts
from gasbasis.calculation.path import Leaf, Path, evaluate
from gasbasis.errors import OutOfRange
from gasbasis.physics import elementary

elementary.register("uncertainties", lambda name, value: getattr(umath, name)(value))
COVERAGE_FACTOR = 2.0                  # about 95 % for a Gaussian figure (JCGM 100:2008, 6.3.3)


@dataclass(frozen=True)
class Contribution:
    """One line of the budget, in the figure's unit."""

    leaf: Leaf
    sensitivity: float                 # figure's unit per SI unit of the input
    contribution: float                # |sensitivity| * u, in the figure's unit
    share: float                       # of the combined variance; correlated inputs may be negative


@dataclass(frozen=True)
class Budget:
    value: float
    standard_uncertainty: float
    coverage_factor: float
    degrees_of_freedom: float          # math.inf where none were stated
    rows: tuple[Contribution, ...]     # biggest first, all of them

    @property
    def expanded_uncertainty(self) -> float:
        return self.coverage_factor * self.standard_uncertainty


def budget(path: Path) -> Budget | None:
    """The uncertainty budget of a path, with its correlations; None when no input carries an uncertainty."""
    correlations = path.correlations
    uncertain = {name: leaf for name, leaf in path.leaves.items() if leaf.standard_uncertainty}
    if not uncertain:
        return None
    seeds = {name: ufloat(leaf.value, leaf.standard_uncertainty) for name, leaf in uncertain.items()}
    figure = evaluate(path, seeds)[path.figure] / path.shown.factor
    slopes = {name: figure.derivatives.get(seed, 0.0) if hasattr(figure, "derivatives") else 0.0
              for name, seed in seeds.items()}
    effects = {name: slopes[name] * leaf.standard_uncertainty for name, leaf in uncertain.items()}
    covariances = {name: _with_correlated(name, effects, correlations) for name in effects}
    variance = sum(covariances.values())
    combined = math.sqrt(max(variance, 0.0))
    rows = [Contribution(leaf, slopes[name], abs(effects[name]), covariances[name] / variance if variance else 0.0)
            for name, leaf in uncertain.items()]
    rows.sort(key=lambda row: -row.contribution)
    freedom = math.inf if correlations else _effective_degrees_of_freedom(combined, rows)
    nominal = figure.nominal_value if hasattr(figure, "nominal_value") else figure
    return Budget(nominal, combined, _coverage_factor(freedom), freedom, tuple(rows))


def _with_correlated(name: str, effects: Mapping[str, float], correlations: Mapping[tuple[str, str], float]) -> float:
    """The input's own variance and its covariances with the others (JCGM 100:2008, eq. 16)."""
    total = effects[name] ** 2
    for (first, second), coefficient in correlations.items():
        if name in (first, second) and first in effects and second in effects:
            total += coefficient * effects[first] * effects[second]
    return total


def _effective_degrees_of_freedom(combined: float, rows: list[Contribution]) -> float:
    """Welch-Satterthwaite (JCGM 100:2008, G.2b)."""
    stated = [row for row in rows if math.isfinite(row.leaf.degrees_of_freedom)]
    bottom = sum(row.contribution ** 4 / row.leaf.degrees_of_freedom for row in stated)
    return combined ** 4 / bottom if bottom else math.inf


def _coverage_factor(freedom: float) -> float:
    """k = 2, or Student's t at 95.45 % for the effective degrees of freedom, rounded down (JCGM 100:2008, G.4.1)."""
    if math.isinf(freedom):
        return COVERAGE_FACTOR
    table = facts.student_t()
    below = [dof for dof in table if dof <= freedom]
    if not below:
        raise OutOfRange(f"The effective degrees of freedom are {freedom:.2g}; at least 1 are needed for a coverage factor.",
                         hint="Take more repeated readings.")
    return table[max(below)]

"""A Monte Carlo check of a settled sheet's uncertainty, as a record with its histogram."""
from __future__ import annotations

import math
from statistics import NormalDist

from gasbasis.calculation.case import make_case
from gasbasis.calculation.monte_carlo import FEWEST, MOST, agrees, simulate
from gasbasis.calculation.outcomes import Settled, settle, settle_calm
from gasbasis.calculation.restate import lay
from gasbasis.calculation.rules import find_rule
from gasbasis.calculation.uncertainty import budget
from gasbasis.errors import Missing, NotUnderstood
from gasbasis.language.gas import read_gas
from gasbasis.language.numbers import significant, with_uncertainty
from gasbasis.language.statement import read_statement
from gasbasis.records.sheet import Sheet
from gasbasis.records.ways import held, read_ways

_QUANTILE = NormalDist().inv_cdf(0.975)  # both intervals must hold 95 %; k = 2 would hold 95.45
_POINTS = 80                           # of the drawn curve
progress = None                        # a door may set a function (done, of) here; it is called after each block


def simulated(sheet: Sheet, seed: object, trials: object, take_usual: bool) -> dict:
    """Draw, compare with the budget, and return the histogram. Raises CoreError when there is no one figure to draw.

    Without `trials` FEWEST are drawn; with more, drawing goes on until two digits of u have settled (`stable`). `agrees` is
    None while the draws scatter too much to tell.
    """
    if not isinstance(seed, int) or not (trials is None or isinstance(trials, int)):
        raise NotUnderstood("Seed and trials are whole numbers.", hint="Leave them out for the usual ones.", field="monte_carlo")
    path = lay(settle_calm(settled_sheet(sheet, take_usual)))
    known = budget(path)
    if known is None:
        raise Missing("No input carries an uncertainty, so there is nothing to draw.",
                      hint="Give one, e.g. '142 ± 5 ppm (k=2)'.", field="hold.value")
    found = simulate(path, seed, progress=progress or (lambda done, of: None), most=FEWEST if trials is None else trials)
    half = _QUANTILE * known.standard_uncertainty
    low, high = known.value - half, known.value + half
    mean_text, half_text = with_uncertainty(found.mean, (found.high - found.low) / 2)
    return {"trials": found.trials, "most": MOST, "seed": seed, "mean": found.mean, "standard_uncertainty": found.standard_uncertainty,
            "unit_text": path.shown.unit_text, "mean_text": mean_text, "half_text": half_text,
            "low_text": significant(found.low, 4), "high_text": significant(found.high, 4), "low": found.low, "high": found.high,
            "budget_low": low, "budget_high": high, "budget_low_text": significant(low, 4), "budget_high_text": significant(high, 4),
            "outside": found.outside, "stable": found.stable, "agrees": agrees(low, high, found),
            "counts": list(found.counts), "edges": list(found.edges),
            "curve": _gaussian(found.edges, known.value, known.standard_uncertainty)}


def _gaussian(edges: tuple[float, float], mean: float, u: float) -> list[float]:
    """The budget's Gaussian over the histogram's range, its top at 1."""
    low, high = edges
    return [math.exp(-0.5 * ((low + (high - low) * index / _POINTS - mean) / u) ** 2) for index in range(_POINTS + 1)]


def settled_sheet(sheet: Sheet, take_usual: bool) -> Settled:
    """The case of a readable sheet with its readings taken. Raises CoreError."""
    (hold, hold_problems), (gas, gas_problems), (owe, owe_problems) = (
        read_statement(sheet.hold, "hold"), read_gas(sheet.gas), read_statement(sheet.owe, "owe"))
    ways = read_ways(sheet)
    for problem in (*hold_problems, *gas_problems, *owe_problems, *ways.problems):
        raise problem
    hold = held(hold, ways)
    if hold.value is None or owe.unit is None:
        raise Missing("A figure is needed before it can be drawn.", hint="Type what you hold and what you owe.", field="hold")
    return settle(make_case(hold, gas, owe, find_rule(sheet.rule_book), **ways.records), sheet.settled, take_usual)

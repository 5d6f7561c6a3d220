"""Is the figure within its limit? Decision rules of JCGM 106:2012 and ILAC-G8:09/2019, none by default.

Everything is compared on the limit's own basis: the result is restated onto it, never the reverse.
"""
from __future__ import annotations

import math
from dataclasses import dataclass
from statistics import NormalDist
from typing import Callable, Mapping

from gasbasis.errors import Missing, OutOfRange

WITHIN, ABOVE, BELOW, OUTSIDE = "within", "above", "below", "outside"
NOT_SHOWN, NOT_DECIDED = "not shown within", "not decided"
GUARD_ONE_SIDED = 1.64                 # w = 1.64 u leaves 5 % at the limit (ILAC-G8:09/2019, table 1)


def _unrounded(value: float) -> float:
    return value


@dataclass(frozen=True)
class Limits:
    """The tolerance interval, in the figure's unit. None: no limit on that side."""

    lower: float | None = None
    upper: float | None = None
    rounded: Callable[[float], float] = _unrounded

    def beyond(self, value: float) -> str | None:
        """On which side a value, rounded as agreed, lies outside, in words; None inside or on a limit."""
        value = self.rounded(value)
        high = self.upper is not None and value > self.upper
        low = self.lower is not None and value < self.lower
        if self.lower is not None and self.upper is not None:
            return OUTSIDE if high or low else None
        return ABOVE if high else BELOW if low else None

    def moved(self, guard: float) -> "Limits":
        """The acceptance interval with both limits moved inwards by a guard band (outwards when negative)."""
        return Limits(None if self.lower is None else self.lower + guard, None if self.upper is None else self.upper - guard, self.rounded)


@dataclass(frozen=True)
class Result:
    """What is compared: the value and what is known of its uncertainty, in the figure's unit."""

    value: float
    standard_uncertainty: float | None = None
    coverage_factor: float = 2.0

    @property
    def expanded(self) -> float:
        if self.standard_uncertainty is None:
            raise Missing("This decision rule needs the uncertainty of the figure.",
                          hint="Give an input its uncertainty, e.g. '142 ± 5 ppm (k=2)', or take simple acceptance.",
                          field="limit.rule")
        return self.coverage_factor * self.standard_uncertainty


@dataclass(frozen=True)
class Verdict:
    """The words, the rule by name, what was compared with what, and the risk it stands for."""

    words: str
    rule: str
    compared: float                    # the value after subtraction and rounding, in the figure's unit
    guard_band: float
    probability_of_conformity: float | None
    counted: float = math.nan          # the value the result counts as, before subtraction and rounding


def probability_of_conformity(result: Result, limits: Limits) -> float | None:
    """The probability that the measurand conforms, for a Gaussian (JCGM 106:2012, 7.2 and 7.4). None without u."""
    u = result.standard_uncertainty
    if not u:
        return None
    gaussian = NormalDist(result.value, u)
    below = gaussian.cdf(limits.upper) if limits.upper is not None else 1.0
    return below - (gaussian.cdf(limits.lower) if limits.lower is not None else 0.0)


def risk_at_guard(guard_in_standard_uncertainties: float) -> float:
    """The probability of a wrong acceptance at the acceptance limit, one-sided. [1]"""
    return 1.0 - NormalDist().cdf(guard_in_standard_uncertainties)


def simple_acceptance(result: Result, limits: Limits, typed: float | None) -> tuple[str, float, float]:
    return limits.beyond(result.value) or WITHIN, result.value, 0.0


def guarded_acceptance(result: Result, limits: Limits, typed: float | None) -> tuple[str, float, float]:
    """Within only when the guard band still fits between value and limit; w = U unless typed."""
    guard = result.expanded if typed is None else typed
    if limits.beyond(result.value):
        return limits.beyond(result.value), result.value, guard
    return (NOT_SHOWN if limits.moved(guard).beyond(result.value) else WITHIN), result.value, guard


def guarded_acceptance_one_sided(result: Result, limits: Limits, typed: float | None) -> tuple[str, float, float]:
    """Guarded acceptance with w = 1.64 u: a risk of 5 % at the limit."""
    return guarded_acceptance(result, limits, GUARD_ONE_SIDED * result.expanded / result.coverage_factor)


def guarded_rejection(result: Result, limits: Limits, typed: float | None) -> tuple[str, float, float]:
    """Beyond only when the value exceeds the limit by more than the guard band."""
    guard = result.expanded if typed is None else typed
    return limits.moved(-guard).beyond(result.value) or WITHIN, result.value, -guard


def three_way(result: Result, limits: Limits, typed: float | None) -> tuple[str, float, float]:
    """Periodic tests: within when value and U are inside, beyond when both are outside, else not decided."""
    guard = result.expanded
    outside = limits.moved(-guard).beyond(result.value)
    if outside:
        return outside, result.value, guard
    return (NOT_DECIDED if limits.moved(guard).beyond(result.value) else WITHIN), result.value, guard


def subtract_percent_of_limit(result: Result, limits: Limits, typed: float | None) -> tuple[str, float, float]:
    """Continuous averages: the rule's percentage of the limit is taken off the value, floor at zero."""
    return _subtracted(result, limits, _percent(typed) * _upper(limits))


def subtract_percent_of_value(result: Result, limits: Limits, typed: float | None) -> tuple[str, float, float]:
    return _subtracted(result, limits, _percent(typed) * abs(result.value))


def subtract_expanded_uncertainty_capped(result: Result, limits: Limits, typed: float | None) -> tuple[str, float, float]:
    """The actual U is taken off, but no more than the rule's percentage of the limit."""
    return _subtracted(result, limits, min(result.expanded, _percent(typed) * _upper(limits)))


def _subtracted(result: Result, limits: Limits, amount: float) -> tuple[str, float, float]:
    compared = max(result.value - amount, 0.0) if result.value >= 0 else result.value
    return limits.beyond(compared) or WITHIN, compared, -amount


def _percent(typed: float | None) -> float:
    if typed is None:
        raise Missing("This rule needs its percentage.", hint="Type it, e.g. 20 % of the limit for NOx.", field="limit.rule")
    if not 0 <= typed <= 100:
        raise OutOfRange(f"A percentage of {typed:g} was given; it lies between 0 and 100.",
                         hint="Take it from the rule-book.", field="limit.rule")
    return typed / 100.0


def _upper(limits: Limits) -> float:
    if limits.upper is None:
        raise OutOfRange("Subtraction is a rule for upper limits.", hint="Choose another decision rule.", field="limit.rule")
    return limits.upper


@dataclass(frozen=True)
class DecisionRule:
    id: str
    title: str
    help: str
    source: str
    decide: Callable[[Result, Limits, float | None], tuple[str, float, float]]
    needs: str = ""                    # what the typed number is, if one is needed or allowed


_RULES = (
    DecisionRule("simple", "simple acceptance", "The value is compared as it is; at the limit the risk is up to 50 %.",
                 "jcgm-106-2012", simple_acceptance),
    DecisionRule("guarded", "guarded acceptance, w = U", "Within only when value + U is within: risk 2.3 % or less.",
                 "ilac-g8-2019", guarded_acceptance, "guard band"),
    DecisionRule("guarded_5", "guarded acceptance, w = 1.64 u", "Within only when value + 1.64 u is within: risk 5 % or less.",
                 "ilac-g8-2019", guarded_acceptance_one_sided),
    DecisionRule("guarded_rejection", "guarded rejection, w = U", "Beyond only when value - U is beyond the limit.",
                 "ilac-g8-2019", guarded_rejection, "guard band"),
    DecisionRule("three_way", "three-way, for periodic tests", "Within, beyond, or not decided when the limit lies inside value ± U.",
                 "jcgm-106-2012", three_way),
    DecisionRule("subtract_percent_of_limit", "subtract a percentage of the limit",
                 "Continuous averages: the rule's share of the limit is taken off first, floor at zero.",
                 "eu-2010-75", subtract_percent_of_limit, "percent of the limit"),
    DecisionRule("subtract_percent_of_value", "subtract a percentage of the value",
                 "Continuous averages: a share of the value is taken off first, floor at zero.",
                 "eu-2010-75", subtract_percent_of_value, "percent of the value"),
    DecisionRule("subtract_capped", "subtract U, capped", "U is taken off first, but no more than the rule's share of the limit.",
                 "eu-2010-75", subtract_expanded_uncertainty_capped, "cap in percent of the limit"),
)
RULES: Mapping[str, DecisionRule] = {rule.id: rule for rule in _RULES}


def judge(rule_id: str, result: Result, limits: Limits, typed: float | None = None) -> Verdict:
    """The verdict under a named rule. Raises Missing, OutOfRange."""
    if rule_id not in RULES:
        raise OutOfRange(f"There is no decision rule '{rule_id}'.", hint=f"Rules: {', '.join(RULES)}.", field="limit.rule")
    if limits.lower is not None and limits.upper is not None and limits.lower > limits.upper:
        raise OutOfRange("The lower limit lies above the upper one.", hint="Swap them.", field="limit")
    if not math.isfinite(result.value):
        raise OutOfRange("The figure is not a number.", field="limit")
    rule = RULES[rule_id]
    words, compared, guard = rule.decide(result, limits, typed)
    return Verdict(words, rule.title, limits.rounded(compared), guard, probability_of_conformity(result, limits), result.value)

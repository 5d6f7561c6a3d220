"""The figure against its limit: restated onto the limit's basis, judged under a decision rule, and turned round."""
from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Mapping

from gasbasis.calculation.basis_words import unit_words as printed_unit
from gasbasis.calculation.case import Case, make_case
from gasbasis.calculation.comparison import ROUNDING, counted, option
from gasbasis.calculation.outcomes import BOUND, Outcome, Settled, Spread, settle, spread
from gasbasis.calculation.path import Path, evaluate
from gasbasis.calculation.restate import lay
from gasbasis.calculation.uncertainty import Budget, budget
from gasbasis.calculation.verdict import RULES, Limits, Result, Verdict, judge
from gasbasis.errors import CoreError, Missing, NotConverged, OutOfRange
from gasbasis.language.basis import Doubt, Reading, Statement

RULE = "limit.decision_rule"
NUMBER = "limit.decision_number"
_INHERITED = ("temperature", "pressure", "conditions_word", "actual_volume", "water", "oxygen", "oxygen_meaning", "carbon_dioxide", "carbon_dioxide_meaning",
              "reported_as", "species")
_STEPS = 60
_CLOSE = 1e-12


def limit_statement(limit: Statement, owe: Statement) -> Statement:
    """The limit with what it leaves unsaid carried over from the owed basis, as far as it is of the same kind of unit."""
    same_kind = limit.unit.kind == owe.unit.kind
    carried = {name: getattr(owe, name) for name in _INHERITED if getattr(limit, name) is None or getattr(limit, name) is False}
    if (limit.temperature or limit.pressure or limit.conditions_word) and same_kind:
        carried = {name: value for name, value in carried.items() if name not in ("temperature", "pressure", "conditions_word", "actual_volume")}
    for own, other in (("oxygen", "carbon_dioxide"), ("carbon_dioxide", "oxygen")):
        if getattr(limit, own) is not None:    # a limit is at one reference: its own oxygen shuts out an owed carbon dioxide
            carried = {name: value for name, value in carried.items() if not name.startswith(other)}
    if limit.unit.kind == "parts" and limit.parts_by is None and owe.unit.kind == "parts":
        carried["parts_by"] = owe.parts_by
    return replace(limit, **carried)


def unit_words(limit: Statement, owe: Statement) -> str:
    """The limit's unit as printed, with what its parts count."""
    return printed_unit(limit_statement(limit, owe))


def limits_of(limit: Statement, choices: Mapping[str, str]) -> Limits:
    """The interval in the limit's own unit, with the rounding agreed for the comparison. Raises Missing, OutOfRange."""
    if limit.value is None:
        raise Missing("The limit has no value.", hint="For example '200 mg/m3', or 'at least 20 ppm'.", field="limit")
    typed, rounding = limit.value.number.decimal, option(ROUNDING, choices)
    def rounded(value: float) -> float:
        return rounding.apply(value, typed)
    first = float(typed)
    upper = getattr(limit, "upper_value", None)
    if upper is not None:
        return Limits(first, float(upper.number.decimal), rounded)
    return Limits(lower=first, rounded=rounded) if getattr(limit, "limit_direction", None) == "lower" else Limits(upper=first, rounded=rounded)


def on_limit_basis(settled: Settled, limit: Statement, choices: Mapping[str, str], take_usual: bool) -> Settled:
    """The same held value on the limit's basis, with the readings already taken and those of the limit's own doubts."""
    owe = limit_statement(limit, settled.case.owe)
    case = make_case(settled.case.hold, settled.case.gas, replace(owe, value=None), settled.case.rule, **settled.case.ways)
    own = {f"owe.{doubt.partition('.')[2]}": reading for doubt, reading in choices.items() if doubt.startswith("limit.")}
    return settle(case, {**choices, **own}, take_usual)


@dataclass(frozen=True)
class Judged:
    """What is said of the limit; `verdicts` by decision rule when none is chosen."""

    limits: Limits
    spread: Spread
    chosen: str | None
    verdicts: Mapping[str, tuple[Verdict, ...]]    # rule id -> one verdict a combination of readings
    problems: Mapping[str, CoreError]              # rule id -> why it cannot decide
    path: Path | None                              # when no doubt is open
    budget: Budget | None
    outcomes: tuple[Outcome, ...]                  # those judged, in the order of the verdicts
    open: tuple[Doubt, ...]                        # what the figure on the limit's basis still leaves open

    @property
    def spread_open(self) -> bool:
        """Whether doubts are open, so that there is more than one figure."""
        return self.path is None

    def words(self, rule: str) -> tuple[str, ...]:
        """The distinct verdicts under a rule, over all readings."""
        return tuple(dict.fromkeys(verdict.words for verdict in self.verdicts.get(rule, ())))

    def words_with(self, rule: str, doubt: str, reading: str) -> tuple[str, ...]:
        """The distinct verdicts under a rule with one reading of a doubt, over all readings of the others."""
        pairs = zip(self.outcomes, self.verdicts.get(rule, ()))
        return tuple(dict.fromkeys(verdict.words for outcome, verdict in pairs if outcome.readings.get(doubt) == reading))

    def decides(self, rule: str, doubt: str) -> bool:
        """Whether the verdict changes with this doubt alone, somewhere; as a whole where one reading opens further doubts."""
        groups: dict[tuple, set[str]] = {}
        for outcome, verdict in zip(self.outcomes, self.verdicts.get(rule, ())):
            if doubt in outcome.readings:
                others = tuple(sorted(item for item in outcome.readings.items() if item[0] != doubt))
                groups.setdefault(others, set()).add(verdict.words)
        readings = {outcome.readings[doubt] for outcome in self.outcomes if doubt in outcome.readings}
        aligned = any(len(words) > 1 for words in groups.values())
        return aligned or len({frozenset(self.words_with(rule, doubt, reading)) for reading in readings}) > 1


def judged(settled: Settled, limit: Statement, choices: Mapping[str, str], take_usual: bool = False, bound: int = BOUND) -> Judged:
    """The verdicts under the chosen rule, or under every rule when none is chosen. Raises CoreError."""
    limits = limits_of(limit, choices)
    _refuse_number(choices.get(NUMBER))
    there = on_limit_basis(settled, limit, choices, take_usual)
    found = spread(there.case, bound)
    if not found.values:
        raise next(outcome.problem for outcome in found.outcomes)
    path = lay(there.case) if not there.open else None
    known = budget(path) if path else None
    below, typed = settled.case.hold.value.number.below, limit.value.number.decimal
    telling = tuple(_telling(found))
    results = [Result(counted(outcome.value, below, typed, choices), *_uncertainty(there.case, outcome.readings, known)) for outcome in telling]
    chosen = choices.get(RULE) if choices.get(RULE) in RULES else None
    verdicts, problems = {}, {}
    for rule in [chosen] if chosen else RULES:
        try:
            verdicts[rule] = tuple(judge(rule, result, limits, _number(choices)) for result in results)
        except CoreError as error:
            problems[rule] = error
    return Judged(limits, found, chosen, verdicts, problems, path, known, telling, there.open)


def _telling(found: Spread, most: int = 64) -> list:
    """The outcomes that are judged: all of them, or the extremes when there are many."""
    known = [outcome for outcome in found.outcomes if outcome.value is not None]
    if len(known) <= most:
        return known
    return [min(known, key=lambda outcome: outcome.value), max(known, key=lambda outcome: outcome.value)]


def _uncertainty(case: Case, readings: Mapping[str, str], known: Budget | None) -> tuple:
    found = known if known or not readings else budget(lay(settle(case, readings).case))
    return (found.standard_uncertainty, found.coverage_factor) if found else (None,)


def _number(choices: Mapping[str, str]) -> float | None:
    text = choices.get(NUMBER, "").strip()
    return float(text.replace(",", ".")) if text else None


def _refuse_number(text: str | None) -> None:
    if not text:
        return
    try:
        float(text.replace(",", "."))
    except ValueError:
        raise OutOfRange(f"'{text}' is no number for the decision rule.", hint="Type a percentage or a guard band, e.g. 20.",
                         field="limit.decision_number") from None


def rule_doubt(limits: Limits) -> Doubt:
    """The decision rule is agreed between people; none is usual."""
    readings = tuple(Reading(rule.id, rule.title, (), rule.source) for rule in RULES.values()
                     if limits.upper is not None or not rule.id.startswith("subtract"))
    return Doubt(RULE, "decision rule", "Which decision rule was agreed for this limit?",
                 "It says what the uncertainty does to the verdict.", readings)


def turned_round(path: Path, target: float) -> float:
    """The held value, in the held unit, at which the figure equals `target` (in the figure's unit). Raises NotConverged.

    Secant steps on the path itself; a path that is linear in the held value is there after one.
    """
    def figure(held: float) -> float:
        return evaluate(path, {path.held: held})[path.figure] / path.shown.factor

    first, second = 0.0, path.leaves[path.held].value or path.held_factor
    at_first, at_second = figure(first), figure(second)
    for _ in range(_STEPS):
        if abs(at_second - target) <= _CLOSE * max(abs(target), abs(at_second)):
            return second / path.held_factor
        if at_second == at_first:
            break
        first, second = second, second + (target - at_second) * (second - first) / (at_second - at_first)
        at_first, at_second = at_second, figure(second)
    raise NotConverged("The held value at the limit was not found.", hint="Check that the figure depends on the held value.", field="limit")



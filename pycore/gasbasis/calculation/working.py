"""The working: every step from held to owed, with formula, numbers, result, factor and source."""
from __future__ import annotations

import math

from gasbasis import facts
from gasbasis.calculation.path import Path, Shown, Step, evaluate
from gasbasis.language.numbers import significant
from gasbasis.relations.trace import formula_tree, plain_text, substituted_tree

_STEP_DIGITS = 6                       # enough for a checker to arrive at the printed figure
_FACTOR_DIGITS = 4


def working(path: Path) -> list[dict]:
    """The steps as records for a page or a printout, choices in their place."""
    known = evaluate(path)
    shown = {step.result: step.shown for step in path.steps}
    numbers = {step.result: index for index, step in enumerate(path.steps, start=1)}
    records = []
    for index, step in enumerate(path.steps):
        records.extend(_choice_record(choice) for choice in path.choices if choice.before == index)
        records.append(_step_record(path, step, known, shown, numbers))
    records.extend(_choice_record(choice) for choice in path.choices if choice.before >= len(path.steps))
    if not path.steps:
        records.append(_unit_record(path, known))
    return [{"number": number, **record} for number, record in enumerate(records, start=1)]


def _step_record(path: Path, step: Step, known: dict, shown: dict[str, Shown], numbers: dict[str, int]) -> dict:
    relation = step.relation
    substitutes, inputs = {}, []
    for argument, name in step.arguments.items():
        symbol = relation.symbols[argument]
        leaf = path.leaves.get(name)
        if leaf is not None:
            text, unit_text, origin, origin_text = leaf.text, leaf.unit_text, leaf.origin, leaf.origin_text
        else:
            text, unit_text = _number(known[name], shown[name]), shown[name].unit_text
            origin, origin_text = "step", f"from step {numbers[name]}"
        substitutes[argument] = (text, unit_text)
        if symbol.meaning.startswith("coefficient"):
            continue                   # an equation's own numbers stand in the formula; its source is the step's
        inputs.append({"symbol": ["symbol", symbol.letter, symbol.mark], "meaning": symbol.meaning,
                       "text": f"{text} {unit_text}".strip(), "origin": origin, "origin_text": origin_text})
    factor = _factor(path, step, known, shown)
    source = facts.source(relation.source)
    formula, substitution = formula_tree(relation), substituted_tree(relation, substitutes)
    result = ["symbol", relation.result.letter, relation.result.mark]
    return {"kind": "solved" if step.solved else "relation", "relation": relation.id, "source": relation.source, "title": relation.title,
            "formula": formula, "substitution": substitution,
            "formula_text": f"{plain_text(result)} = {plain_text(formula)}",
            "substitution_text": f"{plain_text(result)} = {plain_text(substitution)}", "inputs": inputs,
            "result": {"symbol": result, "meaning": relation.result.meaning,
                       "text": f"{_number(known[step.result], step.shown)} {step.shown.unit_text}".strip()},
            "factor": factor, "factor_text": _factor_text(factor),
            "source_text": f"{source.title}, {relation.locator}" if relation.locator else source.title,
            "note": step.note or relation.note}


def _choice_record(choice) -> dict:
    return {"kind": "choice", "title": choice.title, "formula": None, "substitution": None, "formula_text": "",
            "substitution_text": "", "inputs": [], "result": None, "factor": None, "factor_text": "",
            "source_text": choice.source, "note": choice.reason}


def _unit_record(path: Path, known: dict) -> dict:
    """Nothing but the unit changes."""
    leaf = path.leaves[path.held]
    value = known[path.figure] / path.shown.factor
    text = f"{leaf.text} {leaf.unit_text} = {significant(value, _STEP_DIGITS)} {path.shown.unit_text}"
    return {"kind": "unit", "title": "Change of unit only", "formula": None, "substitution": None, "formula_text": "",
            "substitution_text": text, "inputs": [], "result": None, "factor": None, "factor_text": "",
            "source_text": "", "note": "The basis is the same on both sides."}


def _number(value: float, shown: Shown) -> str:
    return significant(value / shown.factor, _STEP_DIGITS)


def _display(path: Path, name: str, known: dict, shown: dict[str, Shown]) -> float:
    """A result, or the held value, as the number that is printed."""
    if name in path.leaves:
        return path.leaves[name].value / path.held_factor
    return known[name] / shown[name].factor


def _factor(path: Path, step: Step, known: dict, shown: dict[str, Shown]) -> float | None:
    """What the step multiplies the printed number by; None for side steps and where it is not defined."""
    if step.through is None:
        return None
    before = _display(path, step.arguments[step.through], known, shown)
    after = known[step.result] / step.shown.factor
    return after / before if before else None


def _factor_text(factor: float | None) -> str:
    return "" if factor is None else f"× {significant(factor, _FACTOR_DIGITS)}"


def bars(path: Path) -> list[dict]:
    """What each correction did, as factors with the signed share of the longest bar on a log axis."""
    known = evaluate(path)
    shown = {step.result: step.shown for step in path.steps}
    rows: list[tuple[str, float]] = []
    for step in path.steps:
        factor = _factor(path, step, known, shown)
        if factor is None:
            continue
        rest = factor
        for label, swaps in step.parts:
            part = _part(step, swaps, known)
            if part is not None and part != 1.0:
                rows.append((label, part))
                rest /= part
        if not step.parts:
            rows.append((step.label, rest))
    longest = max((abs(math.log(factor)) for _, factor in rows if factor > 0), default=0.0)
    return [{"label": label, "factor": factor, "factor_text": _factor_text(factor),
             "log_share": math.log(factor) / longest if longest and factor > 0 else 0.0} for label, factor in rows]


def _part(step: Step, swaps: tuple[tuple[str, str], ...], known: dict) -> float | None:
    """The factor that is undone when some arguments take the place of others."""
    arguments = {argument: known[name] for argument, name in step.arguments.items()}
    value = step.relation.value(**arguments)
    without = step.relation.value(**{**arguments, **{a: arguments[b] for a, b in swaps}})
    return value / without if without else None

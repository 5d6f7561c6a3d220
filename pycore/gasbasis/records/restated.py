"""A sheet restated: everything the page and the terminal show, as one record."""
from __future__ import annotations

import math
from dataclasses import replace
from typing import Mapping

from gasbasis.calculation.basis_words import unit_words
from gasbasis.calculation.case import Case, make_case
from gasbasis.calculation.leaves import SIDE_TITLES
from gasbasis.calculation.outcomes import BOUND, Settled, Spread, effect, reading_problem, reading_range, settle, settle_calm, spread
from gasbasis.calculation.path import figure_value
from gasbasis.calculation.repeated import repeated_inputs
from gasbasis.calculation.restate import lay
from gasbasis.calculation.uncertainty import budget
from gasbasis.calculation.working import bars, working
from gasbasis.calculation.routes.mercury import above_saturation
from gasbasis.calculation.rules import find_rule
from gasbasis.errors import CoreError, Missing, NotUnderstood
from gasbasis.facts import RuleBook
from gasbasis.language.basis import APART, EACH, Doubt, Gas, Statement
from gasbasis.language.gas import read_gas
from gasbasis.language.numbers import half_last_digit, significant
from gasbasis.language.statement import read_statement
from gasbasis.records.about_gas import about_gas
from gasbasis.records.about_ways import about_sample, below_detection
from gasbasis.records.sheet import Sheet
from gasbasis.records.sides import empty_side, side_record
from gasbasis.records.varied import variables
from gasbasis.records.ways import held, is_held_by_way, read_ways
from gasbasis.records.worth import budget_record, verdict_record, worth_problem

DIGITS = 4                             # significant digits of a figure without uncertainty

_NEEDED = {"hold": ("What you hold is needed.", "Type or paste it as it was written, e.g. 'NOx 142 ppm dry'."),
           "owe": ("What you owe is needed.", "Type the unit and basis, e.g. 'mg/m3 at 273.15 K, 101.3 kPa, dry'.")}


def restated(sheet: Sheet, take_usual: bool = False, bound: int = BOUND, sides: tuple[str, ...] = ()) -> dict:
    """All that follows from a sheet. Problems are listed, never raised, so that what is understood stays in view.

    Up to `bound` combinations of readings are tried; above it the record's spread says that it is not complete.
    `sides` are lines on how the number came about that are wanted though they are empty: what may be added to them is told.
    """
    return _whole(sheet, take_usual, bound) | {side: empty_side(side) for side in sides if not getattr(sheet, side).strip()}


def _whole(sheet: Sheet, take_usual: bool, bound: int) -> dict:
    if sheet.limit.strip() and not sheet.hold.strip() and not is_held_by_way(sheet):
        return challenged(sheet, take_usual, bound)
    return _restated(sheet, *read_statement(sheet.hold, "hold"), take_usual, bound) | {"challenge": False}


def challenged(sheet: Sheet, take_usual: bool, bound: int) -> dict:
    """Nothing is held: the clause itself is restated, to see all it could mean before somebody signs it.

    Its doubts are the limit's: settled here, they stay settled when a value is held against it.
    """
    settled = {_swap(doubt, "limit", "hold"): reading for doubt, reading in sheet.settled.items() if not doubt.startswith("hold.")}
    notes = {_swap(doubt, "limit", "hold"): note for doubt, note in sheet.notes.items()}
    clause, problems = read_statement(sheet.limit, "limit")
    record = _restated(replace(sheet, limit="", settled=settled, notes=notes), clause, problems, take_usual, bound)
    for doubt in record["doubts"]:
        doubt |= {"id": _swap(doubt["id"], "hold", "limit"), "side": _swap(doubt["side"], "hold", "limit"),
                  "question": doubt["question"].replace(SIDE_TITLES["hold"], SIDE_TITLES["limit"])}
    for entry in (*record["problems"], *record["hold"]["pieces"]):
        entry["field"] = _swap(entry["field"], "hold", "limit")
    for piece in record["hold"]["pieces"]:
        piece["doubt"] = piece["doubt"] and _swap(piece["doubt"], "hold", "limit")
    return record | {"limit": record["hold"] | {"adds": record["limit"]["adds"]}, "hold": record["limit"] | {"text": ""}, "challenge": True}


def _swap(identity: str, one: str, other: str) -> str:
    side, dot, field = identity.partition(".")
    return f"{other}{dot}{field}" if side == one else identity


def _restated(sheet: Sheet, hold: Statement, hold_problems: tuple[CoreError, ...], take_usual: bool, bound: int) -> dict:
    gas, gas_problems = read_gas(sheet.gas)
    owe, owe_problems = read_statement(sheet.owe, "owe")
    limit, limit_problems = read_statement(sheet.limit, "limit")
    ways = read_ways(sheet)
    problems = [*hold_problems, *gas_problems, *owe_problems, *ways.problems]
    try:
        hold = held(hold, ways)
    except CoreError as error:
        problems.append(error)
    problems.extend(_incomplete(sheet, hold, owe))
    result: dict = {"verdict": None, "uncertainty": None, "figure": None, "spread": None, "sentence": "", "doubts": [], "working": [], "steps": [], "varies": [], "warnings": []}
    settled = Settled(Case(hold, gas, owe), (), ())
    if not problems:
        try:
            settled = settle(make_case(hold, gas, owe, _rule(sheet), **ways.records), sheet.settled, take_usual)
            result |= _outcome(settled, sheet, hold.value.number.below, bound)
        except CoreError as error:
            problems.append(error)
    problems.extend(result.pop("problems", ()))
    problems.extend(limit_problems)
    if sheet.limit.strip() and not problems:
        try:
            result["verdict"] = verdict_record(settled, limit, sheet, take_usual, bound)
        except CoreError as error:
            problems.append(worth_problem(error))
    result["warnings"] = [*result["warnings"], *_said_loosely(hold, limit)]
    sides = {"hold": hold, "gas": gas, "owe": owe, "limit": limit, **ways.records}
    records = {side: side_record(side, record, settled, problems) for side, record in sides.items()}
    if "sample" in records:
        records["sample"]["about"] = result.get("about_sample", [])
    result.pop("about_sample", None)
    records["gas"]["about"] = about_gas(settled.case) if not gas_problems else []
    return {**records,
            "problems": [error.as_json() for error in problems], **result}


def _said_loosely(hold: Statement, limit: Statement) -> list[str]:
    """What a text says that no calculation can take up."""
    loose = [f"{title} is said to be approximate: no figure can be better than that."
             for title, statement in (("What you hold", hold), ("The limit", limit)) if statement.approximate]
    return loose


def _rule(sheet: Sheet) -> RuleBook | None:
    if not sheet.rule_book:
        return None
    rule = find_rule(sheet.rule_book)
    if rule is None:
        raise NotUnderstood(f"There is no rule-book '{sheet.rule_book}'.", hint="Choose one from the list, or leave it out.", field="owe")
    return rule


def _incomplete(sheet: Sheet, hold: Statement, owe: Statement) -> list[CoreError]:
    """What must be there before anything can be restated."""
    missing: list[CoreError] = []
    for side, statement in (("hold", hold), ("owe", owe)):
        if not statement.text.strip() and not (side == "hold" and is_held_by_way(sheet)):
            message, hint = _NEEDED[side]
            missing.append(Missing(message, hint=hint, field=side))
    if hold.text.strip() and hold.value is None:
        missing.append(Missing("A value with its unit is needed in You hold.", hint="For example '142 ppm' or '35 mg/m3'.",
                               field="hold.value"))
    if owe.text.strip() and owe.unit is None:
        missing.append(Missing("A unit is needed in You owe.", hint="For example 'mg/m3' or 'ppb by volume'.",
                               field="owe.unit"))
    return missing


def _outcome(settled: Settled, sheet: Sheet, below: bool, bound: int) -> dict:
    """Figure, spread, doubts and working of a readable case."""
    found = spread(settled.case, bound)
    effects = {doubt.id: effect(doubt.id, found.outcomes) for doubt in settled.open}
    calm = {doubt.id for doubt in settled.open if _is_calm(effects[doubt.id], found)}
    asked = [doubt for doubt in settled.open if doubt.id not in calm]
    doubts = _doubt_records(settled, sheet, found, effects, calm)
    record: dict = {"doubts": doubts}
    if not asked:
        return record | _figure(settle_calm(settled), below)
    return record | {"spread": _spread_record(settled, found), "sentence": _sentence(asked, effects),
                     "problems": _shared_problem(found)}


def _figure(case: Case, below: bool) -> dict:
    try:
        path = lay(case)
        value = figure_value(path)
    except CoreError as error:
        return {"problems": [error]}
    found = budget(path)
    worth = budget_record(found, path.shown.unit_text) if found else None
    number = ("< " if below else "") + (worth["value_text"] if worth else significant(value, DIGITS))
    plus_minus = f" ± {worth['expanded_text']}" if worth else ""
    basis = ", ".join((*path.basis, *((f"U with k = {worth['coverage_text']}",) if worth else ())))
    number += plus_minus
    return {"uncertainty": worth, "figure": {"value": value, "number_text": number, "unit": case.owe.unit.id, "unit_text": path.shown.unit_text,
                       "species_text": path.species_text, "basis": basis,
                       "text": f"{path.species_text} {number} {path.shown.unit_text} {basis}".strip()},
            "about_sample": about_sample(case, path), "working": working(path), "steps": bars(path), "varies": variables(case, path), "warnings": [*path.warnings, *above_saturation(case), *below_detection(case), *_other_order(case, path.shown.unit_text)]}


def _other_order(case: Case, unit_text: str) -> list[str]:
    """What repeated readings come to in the order that was not taken."""
    order = case.hold.averaging_order
    counts = {len(quantity.number.readings) for _, quantity in repeated_inputs(case)}
    if order is None or len(counts) != 1:
        return []
    taken, other, words = (("corrected one by one and averaged", APART, "the means, corrected, come to") if order == EACH else
                           ("averaged and then corrected", EACH, "corrected one by one and averaged they come to"))
    value = figure_value(lay(replace(case, hold=replace(case.hold, averaging_order=other))))
    return [f"The readings were {taken}; {words} {significant(value, DIGITS)} {unit_text}."]


def _is_calm(size: float, found: Spread) -> bool:
    """A doubt is calm when it moves the figure by less than half its last printed digit."""
    if any(outcome.problem for outcome in found.outcomes) or not found.values:
        return False
    smallest = min(found.values, key=abs)
    return size * abs(smallest) < half_last_digit(significant(smallest, DIGITS))


def _spread_record(settled: Settled, found: Spread) -> dict:
    values = found.values
    ends = {"low": min(values), "high": max(values)} if values else {}
    return {**{end: {"value": value, "text": significant(value, DIGITS)} for end, value in ends.items()},
            "unit_text": unit_words(settled.case.owe), "complete": found.complete, "counted": len(found.outcomes),
            "readings": [{"settled": dict(outcome.readings),
                          "label": outcome.label,
                          "value": outcome.value,
                          "text": "" if outcome.value is None else significant(outcome.value, DIGITS),
                          "problem": outcome.problem.as_json() if outcome.problem else None}
                         for outcome in found.outcomes]}


def _sentence(asked: list[Doubt], effects: Mapping[str, float]) -> str:
    ranked = sorted(asked, key=lambda doubt: -effects[doubt.id])
    return "depends on: " + ", ".join(doubt.title for doubt in ranked)


def _shared_problem(found: Spread) -> list[CoreError]:
    """What is wrong under every reading is wrong whatever was meant."""
    problems = [outcome.problem for outcome in found.outcomes]
    return problems[:1] if problems and all(problems) else []


def _doubt_records(settled: Settled, sheet: Sheet, found: Spread, effects: Mapping[str, float], calm: set[str]) -> list[dict]:
    ranked = sorted(settled.open, key=lambda doubt: (doubt.id in calm, -effects[doubt.id]))
    records = [_doubt_record(doubt, "calm" if doubt.id in calm else "open", None, sheet, found, effects[doubt.id])
               for doubt in ranked]
    records.extend(_doubt_record(doubt, "calm", None, sheet, found, None) for doubt in settled.about_spread)
    records.extend(_doubt_record(doubt, "settled", reading.id, sheet, found, None) for doubt, reading in settled.taken)
    return records


def _doubt_record(doubt: Doubt, state: str, chosen: str | None, sheet: Sheet, found: Spread, size: float | None) -> dict:
    readings = []
    for reading in doubt.readings:
        ends = reading_range(doubt.id, reading.id, found.outcomes) if state != "settled" else None
        problem = reading_problem(doubt.id, reading.id, found.outcomes) if state != "settled" else None
        readings.append({"id": reading.id, "label": reading.label, "source": reading.source,
                         "usual_because": reading.usual_because, "text": _range_text(ends),
                         "figure": {"low": ends[0], "high": ends[1]} if ends else None,
                         "problem": problem.as_json() if problem else None})
    usual = next((reading.id for reading in doubt.readings if reading.usual_because), None)
    side = doubt.id.partition(".")[0]
    return {"id": doubt.id, "side": side, "side_title": SIDE_TITLES.get(side, side), "title": doubt.title,
            "question": doubt.question, "changes": doubt.changes, "state": state, "chosen": chosen, "usual": usual,
            "effect_text": _effect_text(size, state), "note": sheet.notes.get(doubt.id, ""), "readings": readings}


def _range_text(ends: tuple[float, float] | None) -> str:
    if ends is None:
        return ""
    low, high = (significant(value, DIGITS) for value in ends)
    return low if low == high else f"{low} to {high}"


def _effect_text(size: float | None, state: str) -> str:
    if size is None or (state == "open" and not size):
        return "changes the uncertainty, not the figure" if state == "calm" else ""
    if state == "calm":
        return f"no visible effect: {significant(100 * size, 1)} %" if size else "no effect"
    if math.isinf(size):
        return "changes the sign"
    return f"up to {significant(100 * size, 2)} %" if size < 1 else f"up to × {significant(1 + size, 3)}"

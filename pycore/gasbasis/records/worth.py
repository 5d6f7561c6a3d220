"""What a figure is worth, as records: its uncertainty with the budget, and the verdict at the limit."""
from __future__ import annotations

import math
from typing import Mapping

from gasbasis.calculation import conformity, two_limits
from gasbasis.calculation.comparison import BELOW_DETECTION, CHOICES, NEGATIVE, ROUNDING, option
from gasbasis.calculation.conformity import NUMBER, Judged, judged, rule_doubt, turned_round
from gasbasis.calculation.leaves import SIDE_TITLES
from gasbasis.calculation.outcomes import Settled
from gasbasis.calculation.two_limits import FIRST, SECOND
from gasbasis.calculation.uncertainty import Budget
from gasbasis.calculation.verdict import ABOVE, BELOW, OUTSIDE, RULES, WITHIN, Verdict, risk_at_guard
from gasbasis.errors import CoreError
from gasbasis.language.basis import Statement
from gasbasis.language.numbers import significant, with_uncertainty
from gasbasis.records.sheet import Sheet

_DIGITS = 4


def budget_record(found: Budget, unit_text: str) -> dict:
    """U with its k, and every input's part in it, biggest first."""
    value_text, expanded_text = with_uncertainty(found.value, found.expanded_uncertainty)
    freedom = found.degrees_of_freedom
    return {
        "value_text": value_text, "expanded_text": expanded_text, "unit_text": unit_text,
        "standard_uncertainty": found.standard_uncertainty, "standard_text": significant(found.standard_uncertainty, 2),
        "coverage_factor": found.coverage_factor, "coverage_text": f"{found.coverage_factor:.3g}",
        "freedom_text": "" if math.isinf(freedom) else significant(freedom, 3),
        "relative_text": f"{significant(100 * found.expanded_uncertainty / abs(found.value), 2)} %" if found.value else "",
        "rows": [{"field": row.leaf.field, "input": _input(row.leaf), "value_text": f"{row.leaf.text} {row.leaf.unit_text}".strip(),
                  "standard_text": f"{significant(row.leaf.standard_uncertainty / row.leaf.unit_factor, 2)} {row.leaf.unit_text}".strip(),
                  "sensitivity_text": f"{significant(row.sensitivity * row.leaf.unit_factor, 3)} {unit_text} per {row.leaf.unit_text or '1'}",
                  "contribution_text": f"{significant(row.contribution, 2)} {unit_text}", "contribution": row.contribution,
                  "share": row.share, "share_text": f"{significant(100 * row.share, 2)} %", "distribution": row.leaf.distribution}
                 for row in found.rows]}


_INPUTS = {"hold.value": "held value", "gas.water_content": "water content", "gas.oxygen": "measured oxygen", "hold.oxygen": "oxygen it is stated at",
           "gas.carbon_dioxide": "carbon dioxide", "hold.carbon_dioxide": "carbon dioxide it is stated at", "gas.ambient_oxygen": "ambient oxygen", "gas.matrix_gas": "gas", "hold.temperature": "held temperature",
           "hold.pressure": "held pressure", "gas.temperature": "gas temperature", "gas.pressure": "gas pressure", "gas.model": "equation of state"}


def input_title(field: str) -> str:
    """What an input is called, from its field."""
    return _INPUTS.get(field, field.partition(".")[2].replace("_", " "))


def _input(leaf) -> str:
    return input_title(leaf.field) or leaf.name


def verdict_record(settled: Settled, limit: Statement, sheet: Sheet, take_usual: bool, bound: int) -> dict:
    """The verdict under the chosen rule, or under every rule; and the display reading at the limit. Raises CoreError."""
    found = judged(settled, limit, sheet.settled, take_usual, bound)
    below = settled.case.hold.value.number.below and option(BELOW_DETECTION, sheet.settled).id == "bound"
    unit_text = found.path.shown.unit_text if found.path else conformity.unit_words(limit, settled.case.owe)
    record = {
        "unit_text": unit_text, "limit_text": _limit_text(found, limit, unit_text), "compared_on": ", ".join(found.path.basis) if found.path else "",
        "values_text": _values(found), "rule": found.chosen, "below": below,
        "rules": [_rule_record(found, rule.id, unit_text, below) for rule in rule_doubt(found.limits).readings],
        "number": sheet.settled.get(NUMBER, ""), "turned_round": _turned(found),
        "doubts": _doubts_of_limit(found, settled),
        "choices": _choices(settled, found, sheet.settled)}
    record |= _headline(found, below) | ({"decision": _decision(found, unit_text)} if found.chosen and not found.spread_open else {})
    return record if limit.second_value is None else _with_second(record, settled, limit, sheet, take_usual, bound)


_STRICTNESS = {"within": 0, "open": 1, "beyond": 2}


def _with_second(record: dict, settled: Settled, limit: Statement, sheet: Sheet, take_usual: bool, bound: int) -> dict:
    """A limit said twice in units that do not convert into each other: both verdicts, the stricter in front, and which binds."""
    other = verdict_record(settled, two_limits.second(limit), sheet, take_usual, bound)
    binds = two_limits.binding(settled, limit, sheet.settled, take_usual, bound)
    said = {FIRST: f"{record['limit_text']} binds", SECOND: f"{other['limit_text']} binds", None: "which of the two binds depends on the open doubts"}[binds.which]
    sentence = f"On one basis {limit.value.number.text} {limit.value.unit.text} stands for {binds.low_text}" + (
        f" to {binds.high_text}" if binds.high_text != binds.low_text else "") + f" {other['unit_text']}: {said}."
    stricter = max(record, other, key=lambda one: _STRICTNESS[one["shape"]])
    return record | {"second": {name: other[name] for name in ("limit_text", "values_text", "unit_text", "sentence", "words", "shape")} | {"binding": sentence},
                     **{name: stricter[name] for name in ("words", "shape", "sentence")}}


def _doubts_of_limit(found: Judged, settled: Settled) -> list[dict]:
    """Each open doubt with the verdict under each of its readings; the limit's own doubts can be settled here."""
    rules = [found.chosen] if found.chosen else list(found.verdicts)
    figure = {doubt.id for doubt in settled.open}
    records = []
    for doubt in found.open:
        readings = [{"id": reading.id, "label": reading.label, "source": reading.source, "usual_because": reading.usual_because, "problem": None,
                     "words": list(dict.fromkeys(word for rule in rules for word in found.words_with(rule, doubt.id, reading.id)))} for reading in doubt.readings]
        own = doubt.id.startswith("owe.") and doubt.id not in figure
        records.append({"id": f"limit.{doubt.id.partition('.')[2]}" if own else doubt.id, "own": own, "title": doubt.title, "question": _of_limit(doubt.question) if own else doubt.question,
                        "changes": doubt.changes, "decides": any(found.decides(rule, doubt.id) for rule in rules), "chosen": None, "readings": readings})
    return records


def _of_limit(question: str) -> str:
    return question.replace(SIDE_TITLES["owe"], SIDE_TITLES["limit"])


def _choices(settled: Settled, found: Judged, chosen: Mapping[str, str]) -> list[dict]:
    """The named choices of the comparison that matter for this result, with the one taken."""
    wanted = [ROUNDING] + [BELOW_DETECTION] * settled.case.hold.value.number.below + [NEGATIVE] * any(value < 0 for value in found.spread.values)
    return [{"id": choice, "title": CHOICES[choice][0], "chosen": option(choice, chosen).id,
             "options": [{"id": entry.id, "title": entry.title, "source": entry.source} for entry in CHOICES[choice][1]]} for choice in wanted]


def _limit_text(found: Judged, limit: Statement, unit_text: str) -> str:
    typed = limit.value.number.text
    if found.limits.lower is not None and found.limits.upper is not None:
        return f"{typed} to {limit.upper_value.number.text} {unit_text}"
    return f"{'at most' if found.limits.upper is not None else 'at least'} {typed} {unit_text}"


def _values(found: Judged) -> str:
    low, high = (significant(value, _DIGITS) for value in (min(found.spread.values), max(found.spread.values)))
    return low if low == high else f"{low} to {high}"


def _words(found: Judged, rule: str, below: bool) -> tuple[str, ...]:
    """A "<" result is within when its bound is, else not decided: the bound is all that is known."""
    words = found.words(rule)
    return tuple(dict.fromkeys(word if word == WITHIN else "not decided" for word in words)) if below else words


def _headline(found: Judged, below: bool) -> dict:
    """One line: what is said whatever was meant, or what it depends on."""
    rules = [found.chosen] if found.chosen else list(found.verdicts)
    words = tuple(dict.fromkeys(word for rule in rules for word in _words(found, rule, below)))
    if found.chosen and found.problems:
        return {"words": "not decided", "shape": "open", "sentence": next(iter(found.problems.values())).message}
    if len(words) == 1:
        sure = "whatever was meant" if found.spread_open else "" if found.chosen else "under every decision rule that could be applied"
        place = " the limit" if words[0] in (WITHIN, ABOVE, BELOW) else ""
        return {"words": words[0], "shape": _shape(words[0]), "sentence": f"{words[0]}{place} {sure}".strip()}
    deciding = [doubt.title for doubt in found.open if any(found.decides(rule, doubt.id) for rule in rules)]
    depends = ([] if found.chosen else ["decision rule"]) + (deciding or ["the open doubts"] if found.spread_open else [])
    return {"words": "not decided", "shape": "open", "sentence": f"depends on: {', '.join(depends)}" if depends else "not decided"}


def _shape(words: str) -> str:
    return "within" if words == WITHIN else "beyond" if words in (ABOVE, BELOW, OUTSIDE) else "open"


def _rule_record(found: Judged, rule: str, unit_text: str, below: bool) -> dict:
    described = RULES[rule]
    problem = found.problems.get(rule)
    return {"id": rule, "title": described.title, "help": described.help, "needs": described.needs, "source": described.source,
            "words": list(_words(found, rule, below)), "problem": problem.as_json() if problem else None}


def _decision(found: Judged, unit_text: str) -> dict:
    """Raw value, what was taken off or kept free, the value compared, and the probability of conformity."""
    if not found.verdicts.get(found.chosen):
        return {}
    verdict: Verdict = found.verdicts[found.chosen][0]
    probability = verdict.probability_of_conformity
    guard = verdict.guard_band
    u = found.budget.standard_uncertainty if found.budget else None
    return {"rule": verdict.rule, "raw_text": _values(found), "counted_text": significant(verdict.counted, _DIGITS), "compared_text": _exactly(verdict.compared),
            "guard_text": f"{significant(abs(guard), 2)} {unit_text}" if guard else "",
            "risk_text": f"{significant(100 * risk_at_guard(guard / u), 2)} %" if u and guard > 0 else "",
            "probability_text": "" if probability is None else f"{significant(100 * probability, 3)} %",
            "probability_note": "" if probability is None else "for a Gaussian figure (JCGM 106:2012, clause 7)"}


def _exactly(value: float) -> str:
    """A rounded value with every digit it has, else to four digits."""
    plain = format(value, ".12g")
    return plain.replace("-", "−") if "e" not in plain and len(plain.strip("-").replace(".", "")) <= 6 else significant(value, _DIGITS)


def _turned(found: Judged) -> dict | None:
    """What the display shows when the figure stands at the limit."""
    if found.path is None or not found.path.held:      # readings corrected one by one have no one display reading
        return None
    unit_text = found.path.leaves[found.path.held].unit_text
    targets = {"lower": found.limits.lower, "upper": found.limits.upper}
    readings = {side: turned_round(found.path, target) for side, target in targets.items() if target is not None}
    record = {"unit_text": unit_text, **{f"{side}_text": significant(value, _DIGITS) for side, value in readings.items()}}
    if found.budget and found.limits.upper is not None:
        guarded = found.limits.upper - found.budget.expanded_uncertainty
        record["guarded_text"] = significant(turned_round(found.path, guarded), _DIGITS)
    return record


def worth_problem(error: CoreError) -> CoreError:
    """An error on the limit's basis is shown at the limit."""
    if error.field.startswith("owe"):
        error.field = "limit" + error.field[3:]
    return error


"""The record of a sheet (ISO/IEC 17025:2017, 7.5 and 7.8): all that is needed to redo the calculation, sealed by a checksum.

Texts only, as they were printed: a record made in one Python has the same checksum in another. The checksum finds accidents
and careless changes; it is no signature.
"""
from __future__ import annotations

import hashlib
import json
from dataclasses import dataclass, replace
from datetime import datetime

from gasbasis import __version__, facts
from gasbasis.errors import CoreError, Missing, NotUnderstood
from gasbasis.calculation.leaves import SIDE_TITLES
from gasbasis.calculation.rules import find_rule
from gasbasis.calculation.verdict import RULES
from gasbasis.records.catalogue import CAUTIONS
from gasbasis.records.link import write_code
from gasbasis.records.restated import restated
from gasbasis.records.sheet import Sheet, read_sheet, write_sheet

KIND, SCHEMA = "gasbasis record", 1
_SIDES = ("sample", "prepared", "hold", "gas", "emission", "owe", "limit")
_OPEN_SCHEMAS = (SCHEMA,)
_LONGEST_NOTE = 4_000                  # characters
_ALIKE = ("figure", "spread", "verdict")     # what a recomputation has to agree with, word for word


@dataclass(frozen=True)
class About:
    """What the person says of a record: when, by whom, notes, and which record it amends and why."""

    made_at: str
    made_by: str = ""
    notes: str = ""
    amends: str = ""
    why: str = ""


def make_record(sheet: Sheet, about: About, take_usual: bool = False) -> dict:
    """The record as JSON. Raises Missing while there is nothing to record, NotUnderstood for a bad date or amendment."""
    _check(about)
    found = restated(sheet, take_usual)
    if found["figure"] is None and not (found["spread"] and "low" in found["spread"]):
        problem = found["problems"][0]["message"] if found["problems"] else "Type what you hold and what you owe."
        raise Missing(f"There is no figure to record yet. {problem}", hint="Bring the sheet to a figure first.", field="record")
    whole = replace(sheet, settled={**sheet.settled, **{doubt["id"]: doubt["chosen"] for doubt in found["doubts"] if doubt["state"] == "settled"}})
    return seal({
        "kind": KIND, "schema": SCHEMA,
        "app": {"name": "gasbasis", "version": __version__, "data": facts.digest()},
        "made_at": about.made_at, "made_by": about.made_by.strip(), "notes": about.notes.strip(),
        "amends": {"checksum": about.amends, "why": about.why.strip()} if about.amends else None,
        "sheet": write_sheet(whole), "link_code": _link_code(whole, found),
        **_results(found), "texts": _texts(whole, found),
        "rule_book": _rule_book(whole), "settled": _doubts(found, "settled"), "left_open": _doubts(found, "open"),
        "no_visible_effect": _doubts(found, "calm"), "working": [_step(step) for step in found["working"]],
        "sources": _sources(found), "cautions": list(CAUTIONS)})


def seal(record: dict) -> dict:
    """The record with its checksum. Raises NotUnderstood for a text with half a character in it."""
    return {**record, "checksum": checksum_of(record)}


def checksum_of(record: dict) -> str:
    """SHA-256 over the canonical JSON (keys sorted, no spaces, UTF-8) of all but the checksum itself."""
    rest = {name: value for name, value in record.items() if name != "checksum"}
    try:
        text = json.dumps(rest, ensure_ascii=False, sort_keys=True, separators=(",", ":")).encode()
    except UnicodeEncodeError as error:
        raise NotUnderstood("A text holds half a character, which no record can carry.", hint="Type it anew.", field="record") from error
    return f"sha256:{hashlib.sha256(text).hexdigest()}"


def open_record(record: dict) -> dict:
    """The sheet of a record, whether its checksum holds, and whether it comes to the same here. Raises NotUnderstood."""
    if record.get("kind") != KIND:
        raise NotUnderstood("This is no gasbasis record.", hint="Choose the file that was saved as a record.", field="receive")
    if record.get("schema") not in _OPEN_SCHEMAS:
        raise NotUnderstood(f"This record is of schema {record.get('schema')!r}; this version reads {SCHEMA}.",
                            hint="Open it with a newer gasbasis.", field="receive")
    stated, computed = record.get("checksum"), checksum_of(record)
    sheet = read_sheet(record.get("sheet"))
    now = _results(restated(sheet))
    as_recorded = {name: record.get(name) for name in _ALIKE}
    differs = [name for name in _ALIKE if _alike(as_recorded[name]) != _alike(now[name])]
    app = record.get("app") if isinstance(record.get("app"), dict) else {}
    return {"sheet": write_sheet(sheet), "record": record, "checksum_holds": stated == computed, "same": not differs,
            "recorded_text": headline(as_recorded), "recomputed_text": headline(now),
            "same_version": app.get("version") == __version__ and app.get("data") == facts.digest(),
            "sentence": _opened_sentence(stated == computed, differs, as_recorded, now)}


def headline(results: dict) -> str:
    """Figure or range in a few words; empty where there is none, or where a foreign file holds something else."""
    figure, spread = results.get("figure"), results.get("spread")
    if isinstance(figure, dict):
        return str(figure.get("text", ""))
    return str(spread.get("text", "")) if isinstance(spread, dict) else ""


def _opened_sentence(holds: bool, differs: list[str], before: dict, now: dict) -> str:
    seal_words = "The checksum holds: nothing in this record was changed." if holds else \
        "The checksum does not hold: this record was changed after it was made. Do not rely on its figures; ask its sender."
    if not differs:
        return f"{seal_words} Recomputed here: the same."
    if headline(before) != headline(now):
        return f"{seal_words} Recomputed here it differs: {headline(now) or 'no figure'}, recorded as {headline(before) or 'no figure'}."
    return f"{seal_words} Recomputed here the figure is the same; what is said of the limit differs."


def _alike(part: object) -> object:
    """What has to agree: of a verdict its words, of a figure or range its text."""
    if not isinstance(part, dict):
        return None
    return part.get("sentence", part.get("text"))


def _check(about: About) -> None:
    try:
        stamped = datetime.fromisoformat(about.made_at)
    except ValueError as error:
        raise NotUnderstood(f"'{about.made_at}' is no date.", hint="Give it as 2025-03-31T14:05:00+02:00.", field="record") from error
    if stamped.utcoffset() is None:
        raise NotUnderstood(f"'{about.made_at}' does not say how far its clock is from UTC.", hint="For example 2025-03-31T14:05:00+02:00.", field="record")
    if max(len(about.made_by), len(about.notes), len(about.why)) > _LONGEST_NOTE:
        raise NotUnderstood(f"A note may have {_LONGEST_NOTE} characters.", hint="Keep the rest in a file of its own.", field="record")
    if about.amends and not about.why.strip():
        raise Missing("An amended record says why.", hint="Write the reason in a few words.", field="record.why")
    if about.why.strip() and not about.amends:
        raise Missing("A reason to amend needs the record that is amended.", hint="Open that record first.", field="record.amends")


def _results(found: dict) -> dict:
    figure, spread = found["figure"], found["spread"]
    texts = None if figure is None else {name: figure[name] for name in ("number_text", "unit_text", "species_text", "basis", "text")}
    between = None
    if spread and "low" in spread:
        low, high, unit = spread["low"]["text"], spread["high"]["text"], spread["unit_text"]
        between = {"text": f"{low if low == high else f'{low} to {high}'} {unit}", "depends": found["sentence"], "counted": spread["counted"], "complete": spread["complete"]}
    return {"figure": texts, "spread": between, "warnings": list(found["warnings"]), "challenge": found["challenge"],
            "uncertainty": _uncertainty(found["uncertainty"]), "verdict": _verdict(found["verdict"])}


def _uncertainty(worth: dict | None) -> dict | None:
    if worth is None:
        return None
    whole = {name: worth[name] for name in ("value_text", "expanded_text", "unit_text", "standard_text", "coverage_text", "freedom_text", "relative_text")}
    names = ("input", "value_text", "standard_text", "distribution", "sensitivity_text", "contribution_text", "share_text")
    return whole | {"rows": [{name: row[name] for name in names} for row in worth["rows"]]}


def _verdict(verdict: dict | None) -> dict | None:
    if verdict is None:
        return None
    rule = RULES.get(verdict["rule"])
    names = ("raw_text", "compared_text", "guard_text", "risk_text", "probability_text", "probability_note")
    turned = verdict["turned_round"] or {}
    return {"limit_text": verdict["limit_text"], "values_text": f"{verdict['values_text']} {verdict['unit_text']}", "compared_on": verdict["compared_on"],
            "words": verdict["words"], "sentence": verdict["sentence"],
            "rule": rule.title if rule else "none chosen", "rule_means": rule.help if rule else "", "rule_source": _title(rule.source) if rule else "",
            "number": verdict["number"], **{name: (verdict.get("decision") or {}).get(name, "") for name in names},
            "display_at_limit": f"{turned['upper_text']} {turned['unit_text']}" if "upper_text" in turned else ""}


def _title(source: str) -> str:
    """A source's title with its edition; what is no id is words already."""
    known = facts.sources().get(source)
    return ", ".join(filter(None, (known.title, known.edition))) if known else source


def _texts(sheet: Sheet, found: dict) -> list[dict]:
    """Each line of the sheet as it was typed, with the pieces it was read into."""
    return [{"side": side, "title": SIDE_TITLES[side], "typed": getattr(sheet, side),
             "understood": [{"title": piece["title"], "text": piece["text"], "state": piece["state"]} for piece in found[side]["pieces"]]}
            for side in _SIDES if getattr(sheet, side).strip()]


def _rule_book(sheet: Sheet) -> dict | None:
    rule = find_rule(sheet.rule_book) if sheet.rule_book else None
    return None if rule is None else {"title": rule.title, "clause": f"{rule.edition}, {rule.clause}", "note": rule.note, "read": rule.read}


def _doubts(found: dict, state: str) -> list[dict]:
    return [_doubt(doubt, found) for doubt in found["doubts"] if doubt["state"] == state]


def _doubt(doubt: dict, found: dict) -> dict:
    taken = next((reading for reading in doubt["readings"] if reading["id"] == doubt["chosen"]), None)
    row = {"side": doubt["side_title"], "title": doubt["title"], "question": doubt["question"]}
    if doubt["state"] == "calm":
        return row | {"effect": doubt["effect_text"], "computed_as": _computed_as(doubt["readings"]) if found["figure"] else ""}
    if taken is None:
        return row | {"effect": doubt["effect_text"], "readings": [" ".join(filter(None, (reading["label"], reading["text"]))) for reading in doubt["readings"]]}
    return row | {"reading": taken["label"], "source": _title(taken["source"]), "usual_because": taken["usual_because"], "note": doubt["note"]}


def _computed_as(readings: list[dict]) -> str:
    """The reading that a figure is computed with where none shows in it: the usual, else the first (see settle_calm)."""
    return next((reading for reading in readings if reading["usual_because"]), readings[0])["label"]


def _step(step: dict) -> dict:
    inputs = [{"symbol": "_".join(filter(None, entry["symbol"][1:])), "meaning": entry["meaning"], "text": entry["text"], "origin": entry["origin_text"]}
              for entry in step["inputs"]]
    result = step["result"] and {"symbol": "_".join(filter(None, step["result"]["symbol"][1:])), "text": step["result"]["text"]}
    names = ("number", "kind", "title", "formula_text", "substitution_text", "factor_text", "source_text", "note")
    return {**{name: step[name] for name in names}, "inputs": inputs, "result": result}


def _sources(found: dict) -> list[dict]:
    """Each document once, with how we know it: itself, a copy, from memory."""
    used = [step["source"] for step in found["working"] if "source" in step]
    if found["verdict"] and found["verdict"]["rule"]:
        used.append(RULES[found["verdict"]["rule"]].source)
    return [{"text": _title(name), "read": facts.source(name).read} for name in dict.fromkeys(used) if name in facts.sources()]


def _link_code(sheet: Sheet, found: dict) -> str:
    """The code of the sheet, names left out; empty where it would be too long for a link."""
    figure, spread = found["figure"], found["spread"]
    shown = f"{figure['number_text']} {figure['unit_text']}" if figure else \
        f"{spread['low']['text']} to {spread['high']['text']} {spread['unit_text']}"
    try:
        return write_code(sheet, shown)
    except CoreError:
        return ""

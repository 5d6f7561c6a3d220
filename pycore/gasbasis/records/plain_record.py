"""A record as plain text, for an e-mail or a checker's file: every line fits 78 characters where words allow it."""
from __future__ import annotations

import textwrap

_WIDTH = 78
_READ = {"memory": "from memory, not from the document", "secondary": "read in a copy", "abstract": "abstract only", "convention": "", "primary": ""}


def plain_record(record: dict) -> str:
    """The whole record, in the order of the printed one."""
    blocks = [_head(record), _figure(record), _texts(record), _doubts(record), _worth(record), *_working(record), _sources(record), _notes(record), _foot(record)]
    return "\n\n".join("\n".join(block) for block in blocks if block) + "\n"


def _head(record: dict) -> list[str]:
    title = record["sheet"].get("title", "")
    lines = ["RECORD", *([title] if title else []), f"Made at {record['made_at']}" + (f" by {record['made_by']}" if record["made_by"] else ""),
             f"gasbasis {record['app']['version']}, tables {record['app']['data'][:16]}"]
    if record["amends"]:
        lines += _wrapped(f"Amends the record {record['amends']['checksum']}: {record['amends']['why']}")
    return lines


def _figure(record: dict) -> list[str]:
    text = record["figure"]["text"] if record["figure"] else f"{record['spread']['text']}, {record['spread']['depends']}"
    lines = ["FIGURE" if not record["challenge"] else "WHAT THE CLAUSE COULD MEAN", *_wrapped(text)]
    lines += [line for warning in record["warnings"] for line in _wrapped(warning)]
    verdict = record["verdict"]
    if verdict:
        lines += _wrapped(f"Limit {verdict['limit_text']}: {verdict['values_text']} is {verdict['sentence']}.")
        lines += _wrapped(f"Decision rule: {verdict['rule']}{': ' + verdict['rule_means'] if verdict['rule_means'] else ''} {verdict['rule_source']}".strip())
        details = [("raw", verdict["raw_text"]), ("compared", verdict["compared_text"]), ("guard band", verdict["guard_text"]), ("typed with the rule", verdict["number"]),
                   ("probability of conformity", f"{verdict['probability_text']} {verdict['probability_note']}".strip() if verdict["probability_text"] else ""),
                   ("held reading at the limit", verdict["display_at_limit"])]
        lines += _wrapped("; ".join(f"{name} {text}" for name, text in details if text))
    return lines


def _texts(record: dict) -> list[str]:
    lines = ["AS TYPED, AND AS UNDERSTOOD"]
    for line in record["texts"]:
        lines += _wrapped(f"{line['title']}: {line['typed']}")
        lines += _wrapped("; ".join(f"{piece['title']} = {piece['text']}" for piece in line["understood"]), "    ")
    if record["rule_book"]:
        book = record["rule_book"]
        lines += _wrapped(f"Rule-book: {', '.join(filter(None, (book['title'], book['clause'], _READ.get(book['read'], ''), book['note'])))}")
    return lines


def _doubts(record: dict) -> list[str]:
    lines = [line for doubt in record["settled"] for line in _wrapped(_settled(doubt), "  ")]
    lines += [line for doubt in record["left_open"] for line in _wrapped(f"left open: {doubt['side']}, {doubt['title']} ({doubt['effect']}): {'; '.join(doubt['readings'])}", "  ")]
    lines += [line for doubt in record["no_visible_effect"] for line in _wrapped(_unseen(doubt), "  ")]
    return ["DOUBTS", *lines] if lines else []


def _settled(doubt: dict) -> str:
    because = f"usual: {doubt['usual_because']}" if doubt["usual_because"] else doubt["source"]
    note = f" - {doubt['note']}" if doubt["note"] else ""
    return f"settled: {doubt['side']}, {doubt['title']} = {doubt['reading']} ({because}){note}"


def _unseen(doubt: dict) -> str:
    computed = f"; computed as {doubt['computed_as']}" if doubt["computed_as"] else ""
    return f"not asked: {doubt['side']}, {doubt['title']}: {doubt['effect']}{computed}"


def _worth(record: dict) -> list[str]:
    worth = record["uncertainty"]
    if not worth:
        return ["UNCERTAINTY", "Not stated: no input carries one."]
    lines = ["UNCERTAINTY (JCGM 100:2008)", f"u = {worth['standard_text']} {worth['unit_text']}, U = {worth['expanded_text']} {worth['unit_text']} with k = {worth['coverage_text']} ({worth['relative_text']})"]
    for row in worth["rows"]:
        lines += _wrapped(f"{row['input']}: {row['value_text']}, u = {row['standard_text']} ({row['distribution']}), sensitivity {row['sensitivity_text']}, "
                          f"contributes {row['contribution_text']} ({row['share_text']})", "  ")
    return lines


def _working(record: dict) -> list[list[str]]:
    return [_step(step, first=index == 0) for index, step in enumerate(record["working"])]


def _step(step: dict, first: bool) -> list[str]:
    lines = ["WORKING", ""] if first else []
    lines += _wrapped(" ".join(filter(None, (f"{step['number']}. {step['title']}", step["factor_text"]))))
    lines += [line for text in (step["formula_text"], step["substitution_text"]) if text for line in _wrapped(text, "   ")]
    if step["result"]:
        lines.append(f"   = {step['result']['text']}")
    for entry in step["inputs"]:
        lines += _wrapped(f"{entry['symbol']}: {entry['meaning']}, {entry['text']}, {entry['origin']}", "     ")
    lines += _wrapped(" ".join(filter(None, (step["note"], step["source_text"]))), "   ")
    return lines


def _sources(record: dict) -> list[str]:
    return ["SOURCES", *(line for source in record["sources"] for line in _wrapped(", ".join(filter(None, (source["text"], _READ.get(source["read"], "")))), "  "))] if record["sources"] else []


def _notes(record: dict) -> list[str]:
    return ["NOTES", *(line for paragraph in record["notes"].splitlines() for line in (_wrapped(paragraph) or [""]))] if record["notes"] else []


def _foot(record: dict) -> list[str]:
    lines = [f"Code of the sheet, to paste into gasbasis: {record['link_code']}"] if record["link_code"] else []
    return [*lines, f"Checksum {record['checksum']}", *(line for text in record["cautions"] for line in _wrapped(text))]


def _wrapped(text: str, indent: str = "") -> list[str]:
    return textwrap.wrap(text, _WIDTH, initial_indent=indent, subsequent_indent=indent + "  ", break_long_words=False, break_on_hyphens=False)

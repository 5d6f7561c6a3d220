"""The same requests from a terminal: `python3 -m gasbasis restate --hold "Hg 1 ppb v/v" --owe "..."`."""
from __future__ import annotations

import argparse
import json
import sys

from gasbasis.answer import answer
from gasbasis.errors import CoreError, NotUnderstood
from gasbasis.language.edit import edit
from gasbasis.language.gas import read_gas
from gasbasis.language.statement import read_statement
from gasbasis.series import terminal

FIGURE, NOT_UNDERSTOOD, DOUBTS_OPEN = 0, 2, 3


def main(arguments: list[str] | None = None) -> int:
    """Run one command. Exit status 0: a figure; 3: doubts open; 2: not understood."""
    parser = _parser()
    options = parser.parse_args(arguments)
    if options.command == "series":
        return options.run(options)
    for choice in options.settle:
        if "=" not in choice:
            parser.error(f"--settle {choice}: give DOUBT=READING, e.g. hold.parts_by=volume")
    try:
        sheet = _with_uncertainties(_sheet(options), options.uncertain)
    except CoreError as error:
        print(_problem_text(error.as_json()), file=sys.stderr)
        return NOT_UNDERSTOOD
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet, "usual": options.usual})))
    if not reply["ok"]:
        print(_problem_text(reply["error"]), file=sys.stderr)
        return NOT_UNDERSTOOD
    result = reply["answer"]
    print(json.dumps(_named(result), ensure_ascii=False, indent=1) if options.json else _text(result))
    return _status(result)


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(prog="gasbasis", description="Restate a trace-gas concentration on another basis.")
    commands = parser.add_subparsers(dest="command", required=True)
    restate = commands.add_parser("restate", help="restate a held statement as an owed figure")
    restate.add_argument("--hold", required=True, help='what you hold, as written: "NOx 142 ppm dry as NO2"')
    restate.add_argument("--owe", required=True, help='what you owe: "mg/m3 at 273.15 K, 101.3 kPa, dry, 11 %% O2"')
    restate.add_argument("--gas", default="", help='the gas it was in: "12 %% H2O, 9.2 %% O2 dry, ambient O2 20.9 %%"')
    restate.add_argument("--limit", default="", help='the limit, with its own basis: "200 mg/m3"')
    restate.add_argument("--rule", default="", help="the decision rule agreed, e.g. simple, guarded, three_way")
    restate.add_argument("--rule-book", default="", metavar="ID", help="a rule-book, for its usual readings and own constants")
    restate.add_argument("--uncertain", action="append", default=[], metavar='"NAME ± ..."',
                         help='the uncertainty of an input: "T 2 K", "O2 0.2 % (k=2)", "value 5 %%"; repeatable')
    restate.add_argument("--settle", action="append", default=[], metavar="DOUBT=READING", help="settle a doubt; repeatable")
    restate.add_argument("--usual", action="store_true", help="take the usual readings and list them")
    restate.add_argument("--json", action="store_true", help="print the whole answer as JSON")
    terminal.add_command(commands)
    return parser


def _sheet(options: argparse.Namespace) -> dict:
    settled = {}
    for choice in options.settle:
        doubt, _, reading = choice.partition("=")
        settled[doubt.strip()] = reading.strip()
    if options.rule:
        settled["limit.decision_rule"] = options.rule
    return {"hold": options.hold, "gas": options.gas, "owe": options.owe, "limit": options.limit, "rule_book": options.rule_book, "settled": settled}


_INPUTS = {"value": (("hold", "value"),), "O2": (("gas", "oxygen"), ("hold", "oxygen")), "CO2": (("gas", "carbon_dioxide"),), "H2O": (("gas", "water_content"), ("gas", "water_route")),
           "T": (("gas", "temperature"), ("hold", "temperature")), "p": (("gas", "pressure"), ("gas", "pressure_route"), ("hold", "pressure")), "barometer": (("gas", "barometer"),)}


def _with_uncertainties(sheet: dict, stated: list[str]) -> dict:
    """The texts with each stated uncertainty written behind its input. Raises CoreError."""
    for text in stated:
        name, _, amount = text.strip().partition(" ")
        if name not in _INPUTS or not amount.strip():
            raise NotUnderstood(f"--uncertain '{text}' names no input and its uncertainty.", hint=f"For example 'T 2 K'; inputs: {', '.join(_INPUTS)}.")
        for side, field in _INPUTS[name]:
            record, _ = read_gas(sheet[side]) if side == "gas" else read_statement(sheet[side], side)
            piece = next((piece for piece in record.pieces if piece.field == field), None)
            if piece is not None:
                sheet[side] = edit(sheet[side], side, field, f"{piece.text} ± {amount.strip().lstrip('±').strip()}")
                break
        else:
            raise NotUnderstood(f"--uncertain '{text}': that input is not in the texts.", hint="Type the input first, or name another.")
    return sheet


def _named(result: dict) -> dict:
    """The answer with the budget and the display reading also under names of their own, for scripts."""
    return result | {"budget": (result["uncertainty"] or {}).get("rows", []), "turned_round": (result["verdict"] or {}).get("turned_round")}


def _status(result: dict) -> int:
    if result["figure"]:
        return FIGURE
    return NOT_UNDERSTOOD if result["problems"] else DOUBTS_OPEN


def _text(result: dict) -> str:
    lines: list[str] = []
    if result["figure"]:
        lines.append(result["figure"]["text"])
        lines.extend(f"warning  {text}" for text in result["warnings"])
    lines.extend(_problem_text(problem) for problem in result["problems"])
    lines.extend(_verdict_lines(result["verdict"]))
    if result["spread"] and "low" in result["spread"]:
        ends = result["spread"]
        lines.append(f"{ends['low']['text']} to {ends['high']['text']} {ends['unit_text']}; {result['sentence']}")
    for doubt in result["doubts"]:
        lines.extend(_doubt_lines(doubt))
    for step in result["working"]:
        lines.extend(_step_lines(step))
    return "\n".join(lines)


def _verdict_lines(verdict: dict | None) -> list[str]:
    if verdict is None:
        return []
    lines = [f"limit    {verdict['limit_text']}: {verdict['values_text']} is {verdict['sentence']}"]
    if verdict["rule"] is None:
        lines.extend(f"  --rule {rule['id']}: {rule['title']}: {', '.join(rule['words']) or rule['problem']['message']}" for rule in verdict["rules"])
    turned = verdict["turned_round"]
    if turned and "upper_text" in turned:
        guarded = f"; guarded {turned['guarded_text']}" if "guarded_text" in turned else ""
        lines.append(f"display  at the limit it shows {turned['upper_text']} {turned['unit_text']}{guarded}")
    return lines


def _problem_text(problem: dict) -> str:
    where = f"{problem['field']}: " if problem["field"] else ""
    return f"{where}{problem['message']} {problem['hint']}".strip()


def _doubt_lines(doubt: dict) -> list[str]:
    if doubt["state"] == "settled":
        reading = next(reading for reading in doubt["readings"] if reading["id"] == doubt["chosen"])
        because = f" (usual: {reading['usual_because']})" if reading["usual_because"] else ""
        return [f"settled  {doubt['id']}={reading['id']}: {reading['label']}{because}"]
    if doubt["state"] == "calm":
        return [f"quiet    {doubt['id']}: {doubt['effect_text']}"]
    effect = f" ({doubt['effect_text']})" if doubt["effect_text"] else ""
    lines = ["", f"doubt    {doubt['id']}{effect}: {doubt['question']}"]
    for reading in doubt["readings"]:
        usual = "  usual" if reading["usual_because"] else ""
        needs = f"  ({reading['problem']['message']})" if reading["problem"] else ""
        lines.append(f"  {doubt['id']}={reading['id']}: {reading['label']}  {reading['text']}{usual}{needs}")
    return lines


def _step_lines(step: dict) -> list[str]:
    lines = ["", f"{step['number']}. {step['title']}" + (f"  {step['factor_text']}" if step["factor_text"] else "")]
    lines.extend(f"   {text}" for text in (step["formula_text"], step["substitution_text"]) if text)
    if step["result"]:
        lines.append(f"   = {step['result']['text']}")
    lines.extend(f"     {plain(entry['symbol'])}: {entry['meaning']}, {entry['text']}, {entry['origin_text']}" for entry in step["inputs"])
    lines.extend(f"   {text}" for text in (step["note"], step["source_text"]) if text)
    return lines


def plain(symbol: list) -> str:
    return f"{symbol[1]}_{symbol[2]}" if symbol[2] else symbol[1]


if __name__ == "__main__":
    sys.exit(main())

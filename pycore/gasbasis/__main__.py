"""The same requests from a terminal: `python3 -m gasbasis restate --hold "Hg 1 ppb v/v" --owe "..."`; `record` seals the same, `check` reads it back."""
from __future__ import annotations

import argparse
import json
import sys
from datetime import datetime

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
    if options.command == "check":
        return _check(options.file)
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
    except (OSError, ValueError) as error:
        print(f"The sheet {options.file} cannot be read: {error}. Give a file that gasbasis kept, or the texts.", file=sys.stderr)
        return NOT_UNDERSTOOD
    if options.command == "record":
        return _record(options, sheet)
    reply = _asked({"task": "restate", "sheet": sheet, "usual": options.usual})
    if not reply["ok"]:
        print(_problem_text(reply["error"]), file=sys.stderr)
        return NOT_UNDERSTOOD
    result = reply["answer"]
    print(json.dumps(_named(result), ensure_ascii=False, indent=1) if options.json else _text(result))
    return _status(result)


def _asked(request: dict) -> dict:
    return json.loads(answer(json.dumps(request)))


def _record(options: argparse.Namespace, sheet: dict) -> int:
    """Print a record of the sheet, sealed with this machine's date, as text or as the JSON that `check` and the page read."""
    about = {"made_at": datetime.now().astimezone().isoformat(timespec="seconds"), "made_by": options.by, "notes": options.note,
             "amends": options.amends, "why": options.why}
    reply = _asked({"task": "record", "sheet": sheet, "usual": options.usual, "about": about})
    if not reply["ok"]:
        print(_problem_text(reply["error"]), file=sys.stderr)
        return NOT_UNDERSTOOD
    made = reply["answer"]
    print(json.dumps(made["record"], ensure_ascii=False, indent=1) if options.json else made["plain_text"].rstrip("\n"))
    return FIGURE if made["record"]["figure"] else DOUBTS_OPEN


def _check(name: str) -> int:
    """Say whether a record's checksum holds and whether it comes to the same here. 0: both; 2: it is no record; 3: one does not."""
    try:
        with open(name, encoding="utf-8") as file:
            text = file.read()
    except (OSError, UnicodeDecodeError) as error:
        print(f"{name} cannot be read: {error}", file=sys.stderr)
        return NOT_UNDERSTOOD
    reply = _asked({"task": "receive", "text": text})
    if not reply["ok"] or reply["answer"]["form"] != "record":
        print(_problem_text(reply["error"]) if not reply["ok"] else f"{name} holds a {reply['answer']['form']}, no record.", file=sys.stderr)
        return NOT_UNDERSTOOD
    print(reply["answer"]["sentence"])
    return FIGURE if reply["answer"]["checksum_holds"] and reply["answer"]["same"] else DOUBTS_OPEN


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(prog="gasbasis", description="Restate a trace-gas concentration on another basis.")
    commands = parser.add_subparsers(dest="command", required=True)
    _add_sheet(commands.add_parser("restate", help="restate a held statement as an owed figure"))
    record = commands.add_parser("record", help="the same, sealed as a record with date, working and checksum")
    _add_sheet(record)
    record.add_argument("--by", default="", help="who makes the record")
    record.add_argument("--note", default="", help="notes for the record")
    record.add_argument("--amends", default="", metavar="CHECKSUM", help="the checksum of the record that this one amends")
    record.add_argument("--why", default="", help="why it is amended")
    commands.add_parser("check", help="read a record back: is it unchanged, does it come to the same?").add_argument("file")
    terminal.add_command(commands)
    return parser


def _add_sheet(restate: argparse.ArgumentParser) -> None:
    restate.add_argument("file", nargs="?", default="", metavar="SHEET.json", help="a sheet file; what is given beside it takes the place of its texts")
    restate.add_argument("--hold", default="", help='what you hold, as written: "NOx 142 ppm dry as NO2"')
    restate.add_argument("--owe", default="", help='what you owe: "mg/m3 at 273.15 K, 101.3 kPa, dry, 11 %% O2"')
    restate.add_argument("--gas", default="", help='the gas it was in: "12 %% H2O, 9.2 %% O2 dry, ambient O2 20.9 %%"')
    restate.add_argument("--sample", default="", help='a collected sample: "Hg 12.4 ng, meter 1204.3 L to 1324.8 L, meter 24 °C, barometer 98.2 kPa, dry"')
    restate.add_argument("--prepared", default="", help='a prepared gas: "cylinder NO 998 ppm, 250 mL/min at 0 °C, 101.325 kPa, in 4750 mL/min at 0 °C, 101.325 kPa"')
    restate.add_argument("--emission", default="", help='what makes a rate of it: "flow 42000 m3/h at 273.15 K, 101.325 kPa, dry", "fuel natural gas, 20 MW gross"')
    restate.add_argument("--limit", default="", help='the limit, with its own basis: "200 mg/m3"')
    restate.add_argument("--rule", default="", help="the decision rule agreed, e.g. simple, guarded, three_way")
    restate.add_argument("--rule-book", default="", metavar="ID", help="a rule-book, for its usual readings and own constants")
    restate.add_argument("--uncertain", action="append", default=[], metavar='"NAME ± ..."',
                         help='the uncertainty of an input: "T 2 K", "O2 0.2 %% (k=2)", "value 5 %%"; repeatable')
    restate.add_argument("--settle", action="append", default=[], metavar="DOUBT=READING", help="settle a doubt; repeatable")
    restate.add_argument("--usual", action="store_true", help="take the usual readings and list them")
    restate.add_argument("--json", action="store_true", help="print the whole answer as JSON")


_TEXTS = ("hold", "gas", "owe", "limit", "sample", "prepared", "emission", "rule_book")


def _sheet(options: argparse.Namespace) -> dict:
    """The sheet of the file, with what was given beside it in its place. Raises OSError, ValueError for a file that cannot be read."""
    sheet = {"schema": 1}
    if options.file:
        with open(options.file, encoding="utf-8") as file:
            sheet = json.load(file)
        if not isinstance(sheet, dict):
            raise ValueError("it holds no sheet")
    settled = dict(sheet.get("settled", {}))
    for choice in options.settle:
        doubt, _, reading = choice.partition("=")
        settled[doubt.strip()] = reading.strip()
    if options.rule:
        settled["limit.decision_rule"] = options.rule
    return {**sheet, **{name: getattr(options, name) or sheet.get(name, "") for name in _TEXTS}, "settled": settled}


_INPUTS = {"value": (("hold", "value"),), "O2": (("gas", "oxygen"), ("hold", "oxygen")), "CO2": (("gas", "carbon_dioxide"),), "H2O": (("gas", "water_content"), ("gas", "water_route")),
           "T": (("gas", "temperature"), ("hold", "temperature")), "p": (("gas", "pressure"), ("gas", "pressure_route"), ("hold", "pressure")), "barometer": (("gas", "barometer"),)}


def _with_uncertainties(sheet: dict, stated: list[str]) -> dict:
    """The texts with each stated uncertainty written behind its input. Raises CoreError."""
    for text in stated:
        name, _, amount = text.strip().partition(" ")
        if name not in _INPUTS or not amount.strip():
            raise NotUnderstood(f"--uncertain '{text}' names no input and its uncertainty.", hint=f"For example 'T 2 K'; inputs: {', '.join(_INPUTS)}.")
        for side, field in _INPUTS[name]:
            record, _ = read_gas(sheet.get(side, "")) if side == "gas" else read_statement(sheet.get(side, ""), side)
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
    lines.extend(f"{row['title']}: {row['text']}" for row in result.get("sample", {}).get("about", ()))
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

"""The one door the page uses: a request as JSON text in, an answer as JSON text out. Never raises."""
from __future__ import annotations

import json
import traceback
from typing import Callable, Mapping

from gasbasis import __version__
from gasbasis.calculation.case import WAYS
from gasbasis.calculation.outcomes import BOUND, QUICK_BOUND
from gasbasis.errors import CoreError, NotUnderstood
from gasbasis.language.edit import edit
from gasbasis.records.catalogue import catalogue, search
from gasbasis.records.link import read_code, write_code
from gasbasis.records.restated import restated
from gasbasis.records import bounded_json
from gasbasis.records import simulated as simulated_record
from gasbasis.records.sheet import read_sheet, write_sheet
from gasbasis.records.varied import varied

LONGEST_REQUEST = 200_000              # characters; a sheet is far below, a pasted file far above
SIDES = ("hold", "gas", "owe", "limit", "sample", "prepared", "emission")


def answer(request: str) -> str:
    """Answer one request. `{"ok": true, "answer": ...}` or `{"ok": false, "error": {kind, field, message, hint, span}}`."""
    try:
        result = {"ok": True, "answer": respond(_parsed(request))}
    except CoreError as error:
        result = {"ok": False, "error": error.as_json()}
    except Exception as error:          # the door must not raise: what is left is a defect of ours
        result = {"ok": False, "error": {
            "kind": "defect", "field": "", "span": None, "message": f"gasbasis failed: {error!r}. Your inputs are kept.",
            "hint": "Please report it with the texts you typed.", "detail": traceback.format_exc()}}
    return json.dumps(result, ensure_ascii=False, allow_nan=False)


def report_progress_to(listener: Callable[[int, int], object]) -> None:
    """Long work calls `listener(done, of)` now and then."""
    simulated_record.progress = listener


def respond(request: Mapping) -> dict:
    """The answer to a parsed request. Raises CoreError."""
    task = request.get("task")
    if not isinstance(task, str) or task not in TASKS:
        raise NotUnderstood(f"There is no task {task!r}.", hint=f"Tasks: {', '.join(TASKS)}.", field="task")
    return TASKS[task](request)


def _parsed(request: str) -> Mapping:
    if len(request) > LONGEST_REQUEST:
        raise NotUnderstood(f"The request has {len(request)} characters; {LONGEST_REQUEST} can be read.",
                            hint="Paste one statement, not a whole file.", field="hold")
    try:
        data = bounded_json.loads(request)
    except ValueError as error:
        raise NotUnderstood(f"The request is not JSON: {error}.", hint="Send one JSON object.") from error
    if not isinstance(data, Mapping):
        raise NotUnderstood("The request must be one JSON object.", hint='For example {"task": "catalogue"}.')
    return data


def _restate(request: Mapping) -> dict:
    return restated(read_sheet(request.get("sheet")), take_usual=request.get("usual") is True,
                    bound=QUICK_BOUND if request.get("quick") is True else BOUND, sides=_sides(request))


def _sides(request: Mapping) -> tuple[str, ...]:
    """The lines on how the number came about that are wanted though they are still empty."""
    sides = request.get("sides", [])
    return tuple(side for side in WAYS if side in sides) if isinstance(sides, list) else ()


def _edit(request: Mapping) -> dict:
    texts = {name: request.get(name) for name in ("text", "side", "field", "to")}
    for name, text in texts.items():
        if not isinstance(text, str):
            raise NotUnderstood(f"An edit needs '{name}' as text.", hint="Give side, field, text and to.", field=name)
    if texts["side"] not in SIDES:
        raise NotUnderstood(f"There is no side {texts['side']!r}.", hint=f"Sides: {', '.join(SIDES)}.", field="side")
    return {"text": edit(**texts)}


def _search(request: Mapping) -> dict:
    what, text = request.get("what"), request.get("text")
    if not isinstance(what, str) or not isinstance(text, str):
        raise NotUnderstood("A search needs 'what' and 'text'.", hint="For example what 'species', text 'merc'.")
    return {"found": search(what, text)}


def _link(request: Mapping) -> dict:
    figure = request.get("figure")
    if not isinstance(figure, str):
        raise NotUnderstood("A link carries the figure as it is shown, as text.", hint="Give 'figure', empty if there is none.", field="link")
    code = write_code(read_sheet(request.get("sheet")), figure, with_names=request.get("with_names") is True)
    return {"code": code, "length": len(code)}


def _open(request: Mapping) -> dict:
    code = request.get("code")
    if not isinstance(code, str):
        raise NotUnderstood("There is no link to open.", hint="Paste the whole link.", field="link")
    opened = read_code(code)
    return {"sheet": write_sheet(opened.sheet), "as_sent": opened.as_sent}


def _monte_carlo(request: Mapping) -> dict:
    return simulated_record.simulated(read_sheet(request.get("sheet")), request.get("seed", 1), request.get("trials"), request.get("usual") is True)


def _vary(request: Mapping) -> dict:
    return varied(read_sheet(request.get("sheet")), request.get("field"), request.get("low"), request.get("high"), request.get("usual") is True)


def _record(request: Mapping) -> dict:
    from gasbasis.records.plain_record import plain_record        # records, files and comparing are read when first asked for: the
    from gasbasis.records.record import About, make_record         # first figure does not wait for them
    about = _texts_of(request.get("about"), About.__dataclass_fields__)
    record = make_record(read_sheet(request.get("sheet")), About(**{"made_at": "", **about}), request.get("usual") is True)
    return {"record": record, "plain_text": plain_record(record)}


def _texts_of(given: object, names) -> dict:
    if not isinstance(given, Mapping) or not set(given) <= set(names) or not all(isinstance(text, str) for text in given.values()):
        raise NotUnderstood(f"'about' holds texts: {', '.join(names)}.", hint="Leave out what there is not.", field="record")
    return dict(given)


def _receive(request: Mapping) -> dict:
    from gasbasis.records.received import received
    text = request.get("text")
    if not isinstance(text, str):
        raise NotUnderstood("There is nothing to open.", hint="Give 'text'.", field="receive")
    return received(text)


def _open_record(request: Mapping) -> dict:
    from gasbasis.records.record import open_record
    record = request.get("record")
    if not isinstance(record, dict):
        raise NotUnderstood("There is no record to open.", hint="Give 'record' as it was saved.", field="receive")
    return open_record(record)


def _check_sheets(request: Mapping) -> dict:
    from gasbasis.records.received import checked
    return checked(request.get("sheets"))


def _compare(request: Mapping) -> dict:
    from gasbasis.records.compare import compared
    return compared(read_sheet(request.get("mine")), read_sheet(request.get("theirs")))


TASKS: Mapping[str, Callable[[Mapping], dict]] = {
    "restate": _restate,
    "edit": _edit,
    "search": _search,
    "link": _link,
    "open": _open,
    "monte_carlo": _monte_carlo,
    "vary": _vary,
    "record": _record,
    "open_record": _open_record,
    "receive": _receive,
    "check_sheets": _check_sheets,
    "compare": _compare,
    "catalogue": lambda request: catalogue(),
    "version": lambda request: {"version": __version__},
}

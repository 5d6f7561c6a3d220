"""What somebody passed on, whatever form it has: a link, a bare code, a record, a sheet. What it is not is said."""
from __future__ import annotations

import re

from gasbasis.errors import CoreError, NotUnderstood
from gasbasis.records import bounded_json
from gasbasis.records.link import read_code
from gasbasis.records.record import KIND, open_record
from gasbasis.records.sheet import read_sheet, write_sheet

MOST_SHEETS = 1_000                    # in one portion of a file of kept sheets
_FORMS = "a gasbasis link, its code, or the text of a record that was saved as a file"
_LINK = re.compile(r"(?:^\s*|#|%(?:25)*23)[0-9][tz][A-Za-z0-9_-]{6}")
_WRITTEN = re.compile(r"[0-9].*[A-Za-z%µ]")


def received(text: str) -> dict:
    """{"form": "link" | "record" | "sheet", "sheet", ...} Raises NotUnderstood for anything else."""
    if not text.strip():
        raise NotUnderstood("There is nothing to open.", hint=f"Paste {_FORMS}.", field="receive")
    if text.lstrip("\ufeff \t\r\n").startswith("{"):
        return _from_json(text.lstrip("\ufeff"))
    if _LINK.search(text):
        opened = read_code(text)
        return {"form": "link", "sheet": write_sheet(opened.sheet), "as_sent": opened.as_sent}
    raise NotUnderstood("This is no link, code or record of gasbasis.", hint=_advice(text), field="receive")


def _from_json(text: str) -> dict:
    try:
        data = bounded_json.loads(text)
    except (ValueError, RecursionError) as error:
        raise NotUnderstood("This begins like a record but was cut off or altered on its way: it is no JSON.", hint="Ask for the file again.", field="receive") from error
    if isinstance(data, dict) and data.get("kind") == KIND:
        return {"form": "record", **open_record(data)}
    if isinstance(data, dict) and isinstance(data.get("sheet"), dict):
        data = data["sheet"]
    if isinstance(data, dict) and isinstance(data.get("hold", data.get("limit")), str):
        return {"form": "sheet", "sheet": write_sheet(read_sheet(data))}
    raise NotUnderstood("This file is none that gasbasis wrote.", hint=f"Paste {_FORMS}.", field="receive")


def _advice(text: str) -> str:
    """What to do with what is something else."""
    if "://" in text:
        return "It is the address of another page, or its end was lost: the code stands behind the # of a gasbasis link."
    if len(text) < 200 and _WRITTEN.search(text):
        return "If it is a statement such as '142 ppm dry', it goes into You hold."
    return f"Paste {_FORMS}."


def checked(sheets: object) -> dict:
    """Each sheet of a portion of a file as it is read, or what is wrong with it. Raises NotUnderstood for no list."""
    if not isinstance(sheets, list) or len(sheets) > MOST_SHEETS:
        raise NotUnderstood(f"A list of at most {MOST_SHEETS} sheets is needed.", hint="Give 'sheets'.", field="receive")
    return {"checked": [_checked(sheet) for sheet in sheets]}


def _checked(sheet: object) -> dict:
    try:
        return {"sheet": write_sheet(read_sheet(sheet)), "problem": None}
    except CoreError as error:
        return {"sheet": None, "problem": error.as_json()}

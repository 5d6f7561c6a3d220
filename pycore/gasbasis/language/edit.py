"""Change one piece of a text and keep everything else as it was typed."""
from __future__ import annotations

import re

from gasbasis.errors import NotUnderstood
from gasbasis.language.basis import Gas, Piece, Statement
from gasbasis.language.describe import FIELDS
from gasbasis.language.gas import read_gas
from gasbasis.language.statement import read_statement


def edit(text: str, side: str, field: str, to: str) -> str:
    """The text with one piece replaced, added or (to = "") taken out. Raises NotUnderstood when it would not read so."""
    if field not in FIELDS:
        raise NotUnderstood(f"There is no piece '{field}'.", hint=f"Pieces: {', '.join(FIELDS)}.", field=side)
    before = _read(text, side)
    pieces = [piece for piece in before.pieces if piece.field == field]
    wanted = to.strip()
    changed = _replaced(text, pieces, wanted, before) if pieces else _appended(text, wanted)
    _verify(changed, side, field, wanted)
    return changed


def _read(text: str, side: str) -> Statement | Gas:
    return read_gas(text)[0] if side == "gas" else read_statement(text, side)[0]


def _replaced(text: str, pieces: list[Piece], wanted: str, record: Statement | Gas) -> str:
    start, end = pieces[0].span
    if not wanted:
        return _removed(text, start, end)
    glued = start > 0 and (text[start - 1].isalnum() or text[start - 1] == "/") and not text[start].isspace()
    if glued:                          # "ppmvd": the d goes, the word stands behind
        return _appended(text[:start] + text[end:], wanted)
    return text[:start] + wanted + text[end:]


def _removed(text: str, start: int, end: int) -> str:
    """Without the piece, the brackets that held only it, and the connector before it."""
    before, after = text[:start], text[end:]
    if before.rstrip().endswith("(") and after.lstrip().startswith(")"):
        before, after = before.rstrip()[:-1], after.lstrip()[1:]
    before = re.sub(r"(?:[\s,;@]|\bat|\bin|\bon|\band)+$", "", before)
    return (before + after) if before else after.lstrip(" ,;")


def _appended(text: str, wanted: str) -> str:
    if not wanted:
        return text
    return f"{text.rstrip()}, {wanted}" if text.strip() else wanted


def _verify(text: str, side: str, field: str, wanted: str) -> None:
    record = _read(text, side)
    has = any(piece.field == field for piece in record.pieces)
    if bool(wanted) != has:
        title = FIELDS[field].title
        given = f"'{wanted}' does not read as {title}" if wanted else f"{title} cannot be taken out here"
        raise NotUnderstood(f"{given}.", hint=f"For example: {FIELDS[field].example}." if wanted else "Change it in the text line.",
                            field=f"{side}.{field}")

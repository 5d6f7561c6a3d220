"""Change one piece of a text and keep everything else as it was typed."""
from __future__ import annotations

import re

from gasbasis.errors import CoreError, NotUnderstood
from gasbasis.language.basis import Gas, Piece, Statement
from gasbasis.language.describe import fields_of
from gasbasis.language.emission import read_emission
from gasbasis.language.gas import read_gas
from gasbasis.language.prepared import read_prepared
from gasbasis.language.sample import read_sample
from gasbasis.language.statement import read_statement

_READERS = {"gas": read_gas, "sample": read_sample, "prepared": read_prepared, "emission": read_emission}


def edit(text: str, side: str, field: str, to: str) -> str:
    """The text with one piece replaced, added or (to = "") taken out. Raises NotUnderstood when it would not read so."""
    known = fields_of(side)
    if field not in known:
        raise NotUnderstood(f"There is no piece '{field}'.", hint=f"Pieces: {', '.join(known)}.", field=side)
    before, problems = read_side(text, side)
    pieces = [piece for piece in before.pieces if piece.field == field]
    wanted = to.strip()
    changed = _replaced(text, pieces, wanted) if pieces else _appended(text, wanted)
    _verify(changed, side, field, wanted, len(problems))
    return changed


def read_side(text: str, side: str) -> tuple[Statement | Gas, tuple[CoreError, ...]]:
    """The text of a side as its own reader takes it, with what it could not read."""
    return _READERS[side](text) if side in _READERS else read_statement(text, side)


def _replaced(text: str, pieces: list[Piece], wanted: str) -> str:
    """The first piece makes room for what is wanted; where the same is said again, that is taken out."""
    for piece in reversed(pieces[1:]):
        text = _removed(text, *piece.span)
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


def _verify(text: str, side: str, field: str, wanted: str, problems_before: int) -> None:
    """The changed text has the piece, or has it no more, and nothing in it became unreadable."""
    record, problems = read_side(text, side)
    has = any(piece.field == field for piece in record.pieces)
    if bool(wanted) != has:
        described = fields_of(side)[field]
        title = described.title
        given = f"'{wanted}' does not read as {title}" if wanted else f"{title} cannot be taken out here"
        raise NotUnderstood(f"{given}.", hint=f"For example: {described.example}." if wanted else "Change it in the text line.",
                            field=f"{side}.{field}")
    if wanted and len(problems) > problems_before:
        raise NotUnderstood(problems[-1].message, hint=problems[-1].hint, field=f"{side}.{field}")

"""One side of a sheet for the page: its text, its pieces with their state, and what could be added."""
from __future__ import annotations

from gasbasis.calculation.composition import total_text
from gasbasis.calculation.outcomes import Settled
from gasbasis.errors import CoreError
from gasbasis.language.basis import Doubt, Gas, Piece, Statement
from gasbasis.language.describe import ADDABLE, GAS_CHOICES, GAS_EXAMPLES, GAS_HELP, GAS_TITLES, fields_of


def side_record(side: str, record: Statement | Gas, settled: Settled, problems: list[CoreError]) -> dict:
    """The text, the pieces in the order of the text, then doubts without a piece of their own, then what may be added."""
    wrong = {problem.field.partition(".")[2] for problem in problems if problem.field.startswith(f"{side}.")}
    doubts = {doubt.id.partition(".")[2]: doubt for doubt in settled.open if doubt.id.startswith(f"{side}.")}
    taken = {doubt.id.partition(".")[2]: (doubt, reading) for doubt, reading in settled.taken if doubt.id.startswith(f"{side}.")}
    pieces = [_stated(side, piece, record, wrong, doubts) for piece in record.pieces if not _told_elsewhere(piece, record)]
    shown = {piece["field"] for piece in pieces}
    pieces.extend(_open(side, field, doubt) for field, doubt in doubts.items() if field not in shown)
    pieces.extend(_settled(side, field, doubt, reading) for field, (doubt, reading) in taken.items() if field not in shown)
    covered = {piece["field"] for piece in pieces} | _covered_by(doubts, taken)
    return {"text": record.text, "pieces": pieces,
            "adds": [{"field": field, **_described(side, field)} for field in ADDABLE[side] if field not in covered]}


def _told_elsewhere(piece: Piece, record: Statement | Gas) -> bool:
    """ "9.2 % O2 dry" is one piece to the eye: how it was read needs no button of its own."""
    if not piece.field.endswith(("_water", "_meaning")):
        return False
    whole = piece.field.rpartition("_")[0]
    return any(other.field == whole and other.span[0] <= piece.span[0] and piece.span[1] <= other.span[1] for other in record.pieces)


def _covered_by(doubts: dict[str, Doubt], taken: dict) -> set[str]:
    return {"temperature", "pressure"} if "conditions" in doubts or "conditions" in taken else set()


_PARTS = {"volume": "by volume", "mass": "by mass", "mass_by_volume": "mass in volume"}


def _words(piece: Piece, record: Statement | Gas) -> str:
    """The piece as understood where what was typed is a letter glued to a unit; else as typed."""
    if len(piece.text) > 2:
        return piece.text
    value = getattr(record, piece.field, None)
    if piece.field == "parts_by":
        return _PARTS[value]
    if piece.field == "reported_as":
        return f"as {piece.text}"
    return value if piece.field in ("water", "conditions_word") else "actual" if piece.field == "actual_volume" else piece.text


def _stated(side: str, piece: Piece, record: Statement | Gas, wrong: set[str], doubts: dict[str, Doubt]) -> dict:
    state = "wrong" if piece.field in wrong else "open" if piece.field in doubts else "stated"
    doubt = doubts[piece.field].id if piece.field in doubts else _number_doubt(piece, doubts)
    return _components(piece, record) | {"field": piece.field, "text": _words(piece, record), "span": list(piece.span), "state": "open" if doubt else state,
            "doubt": doubt, **_described(side, piece.field)}


def _components(piece: Piece, record: Statement | Gas) -> dict:
    """A composition's components, as typed, for its editor."""
    gas = record.matrix_gas if piece.field == "matrix_gas" else None
    if gas is None or not gas.composition:
        return {}
    total = total_text(gas)
    return {"components": [{"name": species.id, "text": quantity.number.text} for species, quantity in gas.composition],
            "by_mass": gas.by_mass, "total_text": total, "whole": float(total) == 100.0}


def _number_doubt(piece: Piece, doubts: dict[str, Doubt]) -> str | None:
    """The doubt about a number's separator is settled at the piece that holds the number."""
    name = "number" if piece.field == "value" else f"{piece.field}_number"
    return doubts[name].id if name in doubts else None


def _open(side: str, field: str, doubt: Doubt) -> dict:
    labels = [reading.label for reading in doubt.readings]
    text = " or ".join(labels) + "?" if len(labels) == 2 and all(len(label) < 16 for label in labels) else f"which of {len(labels)}?"
    return {"field": field, "text": text, "span": None, "state": "open", "doubt": doubt.id,
            **_described(side, field), "title": doubt.title}


def _settled(side: str, field: str, doubt: Doubt, reading) -> dict:
    return {"field": field, "text": reading.label, "span": None, "state": "settled", "doubt": doubt.id,
            **_described(side, field), "title": doubt.title}


def _described(side: str, field: str) -> dict:
    described = fields_of(side).get(field)
    if described is None:
        return {"title": field, "help": "", "example": "", "choices": [], "numeric": False}
    in_gas = side == "gas"
    return {"title": GAS_TITLES.get(field, described.title) if in_gas else described.title,
            "help": GAS_HELP.get(field, described.help) if in_gas else described.help,
            "example": GAS_EXAMPLES.get(field, described.example) if in_gas else described.example,
            "choices": list(GAS_CHOICES.get(field, described.choices) if in_gas else described.choices),
            "numeric": described.numeric}


def empty_side(side: str) -> dict:
    """A side nothing is typed in yet: what may be added to it."""
    return {"text": "", "pieces": [], "adds": [{"field": field, **_described(side, field)} for field in ADDABLE[side]]}

"""Read the line on a prepared gas: a cylinder diluted by flow controllers, a permeation device, or saturated mercury vapour.

"cylinder NO 998 ppm ± 1 %, 250 mL/min at 0 °C 101.325 kPa, in 4750 mL/min at 20 °C 1 atm"
"permeation Hg 120 ng/min in 1.5 L/min at 0 °C 101.325 kPa"
"saturated mercury vapour 100 uL at 22 °C in 2.0 L at 20 °C, 1 atm"
A temperature and a pressure belong to the flow or volume they stand behind.
"""
from __future__ import annotations

import re
from dataclasses import dataclass
from functools import lru_cache

from gasbasis.errors import CoreError, NotUnderstood
from gasbasis.language import readers
from gasbasis.language.basis import Doubt, MatrixGas, Piece, Quantity, Species
from gasbasis.language.measured import Read, above_zero, clause, late_spread, quantity_at, read_line, take, word
from gasbasis.language.species import find
from gasbasis.language.statement import Reader

CYLINDER, PERMEATION, VAPOUR = "cylinder", "permeation", "vapour"


@dataclass(frozen=True)
class Prepared:
    """A prepared gas. None means: not stated."""

    text: str = ""
    pieces: tuple[Piece, ...] = ()
    ambiguities: tuple[Doubt, ...] = ()
    way: str | None = None                # CYLINDER | PERMEATION | VAPOUR
    species: Species | None = None
    content: Quantity | None = None       # of the cylinder
    parts_by: str | None = None
    permeation: Quantity | None = None    # mass rate
    cylinder_flow: Quantity | None = None
    cylinder_flow_word: str | None = None
    cylinder_temperature: Quantity | None = None    # its controller counts at
    cylinder_pressure: Quantity | None = None
    flow: Quantity | None = None          # of the dilution or carrier gas
    flow_word: str | None = None
    flow_temperature: Quantity | None = None
    flow_pressure: Quantity | None = None
    vapour_volume: Quantity | None = None
    vapour_temperature: Quantity | None = None
    volume: Quantity | None = None        # the vapour is in
    volume_temperature: Quantity | None = None
    volume_pressure: Quantity | None = None
    equation: str | None = None           # of the mercury vapour: "dumarey" | "huber"
    matrix_gas: MatrixGas | None = None


_WAYS = ((CYLINDER, r"(?:calibration\s|certified\s|gas\s)?(?:cylinder|bottle)(?:\sgas)?(?:\sof)?"), (PERMEATION, r"permeation(?:\s(?:device|tube|source|rate))*(?:\sof)?"),
         (VAPOUR, r"saturated\s(?:mercury|Hg)(?:\svapou?r)?(?:\sof)?|(?:mercury|Hg)\s(?:saturated\s)?vapou?r(?:\sgenerator)?(?:\sof)?"))
_INTO = re.compile(r"(?:diluted\s)?(?:in(?:to)?|with|by|dilution(?:\sflow)?)\s(?:of\s)?(?:(?P<gas>dry air|zero air|air|nitrogen|N2)\s)?", re.IGNORECASE)
_BEHIND = re.compile(r"\s(?:of\s)?(?P<gas>dry air|zero air|air|nitrogen|N2)(?![A-Za-z0-9])", re.IGNORECASE)
_GASES = {"nitrogen": "nitrogen", "n2": "nitrogen"}


def _way(reader: Reader) -> bool:
    for way, pattern in _WAYS:
        found = re.compile(rf"(?:{pattern})(?![A-Za-z])\s?[:=]?\s?", re.IGNORECASE).match(reader.text, reader.place)
        if found:
            reader.take("way", way, reader.place, found.end())
            if way == VAPOUR:
                reader.fields["species"] = find("Hg")
            reader.place = found.end()
            return True
    return False


def _content(reader: Reader) -> bool:
    """What the certificate says: "998 ppm", "10.2 umol/mol"."""
    found = quantity_at(reader, reader.place, ("parts", "amount_fraction"))
    if found is None:
        return False
    quantity, end, _ = found
    start, reader.place = reader.place, end
    take(reader, "content", quantity, start, end, above_zero("content of the cylinder"))
    return True


def _permeation(reader: Reader) -> bool:
    found = quantity_at(reader, reader.place, ("mass_rate",))
    if found is None:
        return False
    start, reader.place = reader.place, found[1]
    take(reader, "permeation", found[0], start, found[1], above_zero("permeation rate"))
    return True


def _flow(reader: Reader) -> bool:
    """The first flow of a cylinder is its own; one behind "in", and a second one, that of the dilution."""
    into = _INTO.match(reader.text, reader.place)
    found = quantity_at(reader, into.end() if into else reader.place, ("volume_rate", "volume"))
    if found is None:
        return False
    quantity, end, called = found
    own_first = reader.fields.get("way") == CYLINDER and not into and "cylinder_flow" not in reader.fields
    if quantity.unit.kind == "volume":
        field = "vapour_volume" if not into and "vapour_volume" not in reader.fields else "volume"
    else:
        field = "cylinder_flow" if own_first else "flow"
    start, reader.place = reader.place, end
    take(reader, field, quantity, start, end, above_zero("flow" if quantity.unit.kind == "volume_rate" else "volume"))
    reader.fields["behind"] = field
    if "word" in called:
        reader.fields[f"{field}_word"] = called["word"]
    behind = _BEHIND.match(reader.text, end)
    gas = (into and into["gas"]) or (behind and behind["gas"])
    if gas:
        reader.fields["matrix_gas"] = MatrixGas(_GASES.get(gas.lower(), "dry_air"))
        reader.place = behind.end() if behind else end
    return True


def _condition(kind: str) -> Read:
    """A temperature or pressure of the flow or volume before it."""
    def read(reader: Reader) -> bool:
        head = re.compile(r"(?:at|@|counted at|referred to|ref\.?)\s", re.IGNORECASE).match(reader.text, reader.place)
        found = quantity_at(reader, head.end() if head else reader.place, (kind,))
        if found is None:
            return False
        start, reader.place = reader.place, found[1]
        owner = {"cylinder_flow": "cylinder", "vapour_volume": "vapour"}.get(reader.fields.get("behind"), reader.fields.get("behind"))
        if owner is None or (owner == "vapour" and kind == "pressure"):
            reader.refuse(NotUnderstood(f"'{reader.original[start:found[1]].strip()}' stands behind no flow or volume.", hint="Put it behind the flow it is counted at."), start, found[1])
        else:
            take(reader, f"{owner}_{kind}", found[0], start, found[1], above_zero(f"absolute {kind}"))
        return True
    return read


_CLAUSES: tuple[Read, ...] = (
    late_spread, readers.coverage, _way, _content, _permeation, _flow, _condition("temperature"), _condition("pressure"),
    clause("permeation", r"rate\s?[:=]?\s?", ("mass_rate",)), word("equation", "dumarey", r"(?:by\s)?Dumarey"),
    word("equation", "huber", r"(?:by\s)?Huber(?:,? Laesecke(?:,? and Friend)?)?"),
    readers.parts_by, word("matrix_gas", MatrixGas("nitrogen"), r"(?:in\s|of\s)?(?:nitrogen|N2)(?![A-Za-z0-9])"),
    word("matrix_gas", MatrixGas("dry_air"), r"(?:in\s|of\s)?(?:dry\s|zero\s|synthetic\s)?air(?![A-Za-z0-9])"), readers.species)


def read_prepared(text: str) -> tuple[Prepared, tuple[CoreError, ...]]:
    """The prepared gas a text describes, and what could not be read of it."""
    return _read(text)


@lru_cache(maxsize=16)
def _read(text: str) -> tuple[Prepared, tuple[CoreError, ...]]:
    reader, refusal = read_line(text, "prepared", _CLAUSES)
    if refusal is not None:
        return Prepared(text=text), (refusal,)
    known = {name: value for name, value in reader.fields.items() if name in Prepared.__dataclass_fields__}
    return Prepared(text=text, pieces=tuple(sorted(reader.pieces, key=lambda piece: piece.span)), **known), tuple(reader.problems)

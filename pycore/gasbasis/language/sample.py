"""Read the line on a collected sample: mass found, blank, recovery, sections, the meter's volume, factor, temperature and pressure.

"Hg 12.4 ng ± 5 %, field blank 0.3 ng subtracted, recovery 96 % corrected, meter 1204.3 L to 1324.8 L, Y 1.012, meter 24 °C,
barometer 98.2 kPa, dry". Behind "train B" the same words are those of the second of two paired trains.
"""
from __future__ import annotations

import re
from dataclasses import dataclass
from functools import lru_cache

from gasbasis.errors import CoreError, OutOfRange
from gasbasis.language import readers
from gasbasis.language.basis import DRY, WET, Doubt, Piece, Quantity, Species
from gasbasis.language.measured import Read, above_zero, clause, late_spread, quantity_at, read_line, take, unit_at, word
from gasbasis.language.numbers import NUMBER, number_at
from gasbasis.language.readers import skip
from gasbasis.language.statement import Reader

SATURATED = "saturated"                # the metered gas left the last impinger saturated at the meter's temperature
SECOND = "_b"                          # behind the name of a field of the second train
_PER_TRAIN = ("mass", "back", "meter_start", "meter_end", "volume", "meter_factor", "temperature", "head", "leak")


@dataclass(frozen=True)
class Sample:
    """A collected sample, or two paired ones. None means: not stated."""

    text: str = ""
    pieces: tuple[Piece, ...] = ()
    ambiguities: tuple[Doubt, ...] = ()
    species: Species | None = None
    reported_as: Species | None = None
    mass: Quantity | None = None
    back: Quantity | None = None          # second section of the trap
    blank: Quantity | None = None
    blank_subtracted: bool = False
    recovery: Quantity | None = None
    recovery_corrected: bool = False
    detection_limit: Quantity | None = None   # as a mass
    volume: Quantity | None = None        # metered in all
    volume_word: str | None = None        # "normal", "standard": the volume is one already brought to reference conditions
    meter_start: Quantity | None = None
    meter_end: Quantity | None = None
    meter_factor: Quantity | None = None
    temperature: Quantity | None = None   # at the meter
    pressure: Quantity | None = None      # at the meter, absolute
    barometer: Quantity | None = None
    head: Quantity | None = None          # of the meter over the barometer
    duration: Quantity | None = None
    leak: Quantity | None = None
    water: str | None = None              # of the gas metered: DRY | WET | SATURATED
    mass_b: Quantity | None = None
    back_b: Quantity | None = None
    volume_b: Quantity | None = None
    meter_start_b: Quantity | None = None
    meter_end_b: Quantity | None = None
    meter_factor_b: Quantity | None = None
    temperature_b: Quantity | None = None
    head_b: Quantity | None = None
    leak_b: Quantity | None = None

    def of_train(self, field: str, second: bool) -> tuple[Quantity | None, str]:
        """A train's own value and the name of its field; what only the first train says holds for both, masses and volumes excepted."""
        own = f"{field}{SECOND}" if second else field
        value = getattr(self, own, None)
        if second and value is None and field in ("meter_factor", "temperature", "head"):
            return getattr(self, field), field
        return value, own

    @property
    def paired(self) -> bool:
        return self.mass_b is not None or self.volume_b is not None or self.meter_end_b is not None


_M, _V, _T, _P = ("mass",), ("volume",), ("temperature",), ("pressure",)
_IS = r"\s?[:=]?\s?(?:of\s|was\s)?"
_TO = re.compile(r"\s?(?:to|-|\.\.\.?|→|…|until)\s?")


def _in_train(read: Read) -> Read:
    """The same clause, its field that of the second train once the text has come to it."""
    def of_train(reader: Reader) -> bool:
        if not reader.fields.get("in_second"):
            return read(reader)
        before = {name: reader.fields.pop(name) for name in _PER_TRAIN if name in reader.fields}
        own = {name: reader.fields.pop(f"{name}{SECOND}") for name in _PER_TRAIN if f"{name}{SECOND}" in reader.fields}
        reader.fields.update(own)
        pieces, first = reader.pieces, [piece for piece in reader.pieces if piece.field in _PER_TRAIN]
        reader.pieces = [Piece(piece.field.removesuffix(SECOND), piece.text, piece.span) if piece.field.endswith(SECOND) else piece
                         for piece in pieces if piece not in first]
        done = read(reader)
        reader.pieces = first + [Piece(f"{piece.field}{SECOND}", piece.text, piece.span) if piece.field in _PER_TRAIN else piece for piece in reader.pieces]
        for name in _PER_TRAIN:
            if name in reader.fields:
                reader.fields[f"{name}{SECOND}"] = reader.fields.pop(name)
        reader.fields.update(before)
        if reader.last in _PER_TRAIN and done:
            reader.last += SECOND
        return done
    return of_train


def _train(reader: Reader) -> bool:
    found = re.compile(r"(?:and\s)?(?:paired\s)?(?:train|trap|tube|sample|pair)\s?(?P<which>[AaBb12])(?![A-Za-z0-9])\s?[:=]?\s?", re.IGNORECASE).match(reader.text, reader.place)
    if found is None:
        return False
    reader.fields["in_second"] = found["which"].upper() in ("B", "2")
    reader.place = found.end()
    return True


def _readings(reader: Reader) -> bool:
    """ "meter 1204.3 L to 1324.8 L", "meter 1204.3 to 1324.8 L", "1204.3 L to 1324.8 L"."""
    head = re.compile(r"(?:(?:gas\s)?meter\s?(?:readings?\s?)?[:=]?\s?(?:from\s)?)?", re.IGNORECASE).match(reader.text, reader.place)
    first = NUMBER.match(reader.text, head.end())
    if first is None:
        return False
    own = unit_at(reader, skip(reader.text, first.end()), _V)
    between = _TO.match(reader.text, own[1] if own else first.end())
    last = quantity_at(reader, between.end(), _V) if between else None
    if last is None:
        return False
    number = number_at(first, reader.original[first.start():first.end()].strip())
    start_end = own[1] if own else first.end()
    take(reader, "meter_start", Quantity(number, own[0] if own else last[0].unit), reader.place, start_end)
    take(reader, "meter_end", last[0], between.end(), last[1])
    reader.place = last[1]
    return True


def _volume(reader: Reader) -> bool:
    """ "in 120.5 L", "volume 120.5 L", "0.5 dscm": metered in all."""
    head = re.compile(r"(?:(?:total\s|gas\s|sample\s|metered\s)*volume\s?[:=]?\s?(?:of\s)?|in\s|meter(?:ed)?\s(?:total\s)?)?", re.IGNORECASE).match(reader.text, reader.place)
    found = quantity_at(reader, head.end(), _V)
    if found is None:
        return False
    quantity, end, called = found
    start, reader.place = reader.place, end
    take(reader, "volume", quantity, start, end, above_zero("volume metered"))
    if "word" in called:
        reader.fields["volume_word"] = called["word"]
    if "water" in called:
        reader.fields["water"] = called["water"]
    return True


_CLAUSES: tuple[Read, ...] = (
    late_spread, readers.coverage, _train,
    clause("blank", rf"(?:field\s|trip\s)?blank{_IS}", _M), word("blank_subtracted", False, r"not subtracted"),
    word("blank_subtracted", True, r"(?:blank\s)?(?:is\s|was\s)?subtracted|blank[- ]corrected|less blank"),
    clause("recovery", rf"(?:spike\s)?recovery{_IS}", ("parts",), check=above_zero("recovery")), word("recovery_corrected", False, r"not corrected"),
    word("recovery_corrected", True, r"(?:is\s|was\s)?corrected(?:\sfor(?:\srecovery)?)?|recovery[- ]corrected"),
    clause("detection_limit", rf"(?:LOD|MDL|detection limit|limit of detection){_IS}", _M, check=above_zero("detection limit")),
    _in_train(clause("back", rf"(?:back(?:\ssection)?|second section|section 2|breakthrough){_IS}", _M)),
    _in_train(clause("mass", rf"(?:(?:front(?:\ssection)?|first section|section 1|mass(?:\sfound)?|found|result|lab(?:oratory)?(?:\sresult)?){_IS})?", _M)),
    _in_train(clause("leak", rf"leak(?:\s?rate|age)?{_IS}", ("volume_rate",))),
    _in_train(clause("meter_start", rf"(?:meter\s)?start{_IS}", _V)), _in_train(clause("meter_end", rf"(?:meter\s)?end{_IS}", _V)),
    _in_train(_readings),
    _in_train(clause("meter_factor", rf"(?:(?:dry\s)?(?:gas\s)?meter\s?(?:calibration\s)?(?:factor|Y)(?:\sY)?|Y(?=\s?[:=\d])){_IS}", ("number",), check=above_zero("meter factor"))),
    clause("barometer", rf"(?:barometer|barometric(?:\spressure)?|p_?bar|ambient pressure){_IS}", _P, check=above_zero("barometer")),
    _in_train(clause("head", rf"(?:orifice(?:\shead)?|meter\s(?:gauge|head|over-?pressure)|ΔH|dH|delta H){_IS}", _P)),
    _in_train(clause("temperature", rf"(?:(?:gas\s)?meter(?:\stemperature|\sat)?{_IS}|at\s)?", _T, check=above_zero("meter temperature in kelvin"))),
    clause("pressure", rf"(?:(?:gas\s)?meter(?:\spressure|\sat)?{_IS}|at\s)?", _P, check=above_zero("meter pressure")),
    _in_train(_volume),
    clause("duration", rf"(?:duration|time|sampled|for|over){_IS}(?:for\s)?", ("time",), check=above_zero("duration")), clause("duration", "", ("time",), check=above_zero("duration")),
    word("water", SATURATED, r"saturated(?:\sat the meter)?|wet meter|water[- ]saturated"), word("water", DRY, r"dr(?:y|ied)(?:\s(?:gas|meter|basis))?(?![A-Za-z])"),
    word("water", WET, r"(?:wet|moist)(?:\s(?:gas|basis))?(?![A-Za-z])"),
    readers.reported_as, readers.species)


def read_sample(text: str) -> tuple[Sample, tuple[CoreError, ...]]:
    """The sample a text describes, and what could not be read of it."""
    return _read(text)


@lru_cache(maxsize=16)
def _read(text: str) -> tuple[Sample, tuple[CoreError, ...]]:
    reader, refusal = read_line(text, "sample", _CLAUSES)
    if refusal is not None:
        return Sample(text=text), (refusal,)
    known = {name: value for name, value in reader.fields.items() if name in Sample.__dataclass_fields__}
    sample = Sample(text=text, pieces=tuple(sorted(reader.pieces, key=lambda piece: piece.span)), **known)
    return sample, (*reader.problems, *_contradictions(sample))


def _contradictions(sample: Sample) -> list[CoreError]:
    """What no single clause sees."""
    wrong: list[CoreError] = []
    for second in (False, True):
        start, (end, field), total = sample.of_train("meter_start", second)[0], sample.of_train("meter_end", second), sample.of_train("volume", second)[0]
        if start is not None and end is not None and end.si <= start.si:
            wrong.append(OutOfRange(f"The meter ends at {end.number.text} {end.unit.text}, at or below its start of {start.number.text} {start.unit.text}.",
                                    hint="Check the two readings: are they swapped, or did the counter turn over?", field=f"sample.{field}"))
        if end is not None and total is not None:
            wrong.append(OutOfRange("The volume is given twice, as readings of the meter and as a total.", hint="Keep the one that was read.", field=f"sample.{field}"))
    return wrong

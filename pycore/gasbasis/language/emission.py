"""Read the line on an emission: the duct and its velocity or flow, the fuel and its heat, the output.

"duct 1.8 m diameter, pitot Cp 0.84, dp 12.1, 13.0, 14.2 mmH2O" · "flow 42000 m3/h at 273.15 K, 101.325 kPa, dry"
"fuel natural gas, 20 MW" · "fuel C 75.2, H 5.1, S 1.2, N 1.5, O 7.9, gross 29.5 MJ/kg" · "output 5 MW net" · "product 12 t/h"
"""
from __future__ import annotations

import re
from dataclasses import dataclass, replace
from functools import lru_cache

from gasbasis import facts
from gasbasis.errors import CoreError, NotUnderstood
from gasbasis.language import readers
from gasbasis.language.basis import DRY, WET, Doubt, Piece, Quantity
from gasbasis.language.measured import PURE, Read, above_zero, clause, late_spread, quantity_at, read_line, take, unit_at, word
from gasbasis.language.numbers import NUMBER, number_at
from gasbasis.language.readers import skip
from gasbasis.language.statement import Reader
from gasbasis.language.units import unit

BY_OXYGEN, BY_CARBON_DIOXIDE, BY_WET_OXYGEN = "oxygen", "carbon_dioxide", "wet_oxygen"
GROSS, NET = "gross", "net"


@dataclass(frozen=True)
class Emission:
    """What turns a concentration into a rate. None means: not stated."""

    text: str = ""
    pieces: tuple[Piece, ...] = ()
    ambiguities: tuple[Doubt, ...] = ()
    diameter: Quantity | None = None
    sides: tuple[Quantity, Quantity] | None = None
    area: Quantity | None = None
    pitot: Quantity | None = None         # its coefficient
    velocity_pressures: tuple[Quantity, ...] = ()
    velocity: Quantity | None = None
    flow: Quantity | None = None
    flow_word: str | None = None          # "normal", "standard"
    temperature: Quantity | None = None   # the flow is counted at
    pressure: Quantity | None = None
    actual_volume: bool = False
    water: str | None = None              # DRY | WET, the flow counts
    oxygen: Quantity | None = None        # the flow is referred to
    fuel: str | None = None               # id of a row of the F factors
    by: str | None = None                 # BY_OXYGEN | BY_CARBON_DIOXIDE | BY_WET_OXYGEN
    factor: Quantity | None = None        # a F factor of one's own
    analysis: tuple[tuple[str, Quantity], ...] = ()   # element -> percent by mass
    heating_value: Quantity | None = None
    heating_value_said: str | None = None # GROSS | NET
    air_water: Quantity | None = None     # of the ambient air
    heat: Quantity | None = None          # of the fuel, per time
    heat_said: str | None = None          # GROSS | NET
    output: Quantity | None = None
    output_said: str | None = None        # GROSS | NET
    product: Quantity | None = None
    hours: Quantity | None = None         # of operation in a year


_IS = r"\s?[:=]?\s?(?:of\s|is\s)?"
_LENGTH, _P = ("length",), ("pressure",)
_CROSS = re.compile(r"\s?(?:x|×|by|\*|·)\s?")


def _sides(reader: Reader) -> bool:
    """ "duct 1.2 m x 2.1 m", "1.2 x 2.1 m"."""
    head = re.compile(r"(?:duct|stack|flue)?\s?", re.IGNORECASE).match(reader.text, reader.place)
    first = NUMBER.match(reader.text, head.end())
    if first is None:
        return False
    own = unit_at(reader, skip(reader.text, first.end()), _LENGTH)
    between = _CROSS.match(reader.text, own[1] if own else first.end())
    second = quantity_at(reader, between.end(), _LENGTH) if between else None
    if second is None:
        return False
    number = number_at(first, reader.original[first.start():first.end()].strip())
    reader.take("sides", (Quantity(number, own[0] if own else second[0].unit), second[0]), reader.place, second[1])
    reader.place = second[1]
    return True


def _velocity_pressures(reader: Reader) -> bool:
    """ "dp 12.1, 13.0, 14.2 mmH2O": one number a traverse point, the unit behind the last."""
    head = re.compile(r"(?:dp|Δp|delta p|velocity pressures?|traverse(?: points)?)" + _IS, re.IGNORECASE).match(reader.text, reader.place)
    if head is None:
        return False
    numbers, place = [], head.end()
    while (found := NUMBER.match(reader.text, place)) is not None:
        numbers.append(number_at(found, reader.original[found.start():found.end()].strip()))
        measured = unit_at(reader, skip(reader.text, found.end()), _P)
        if measured is not None:
            points = tuple(Quantity(replace(number, thousands=None), measured[0]) for number in numbers)
            reader.take("velocity_pressures", points, reader.place, measured[1])
            reader.place = measured[1]
            return True
        place = re.compile(r"\s*(?:[,;/]|and)?\s*").match(reader.text, found.end()).end()
        if place == found.end():
            break
    reader.refuse(NotUnderstood("The velocity pressures need a unit behind the last of them.", hint="For example 'dp 12.1, 13.0, 14.2 mmH2O'."), reader.place, place)
    reader.place = max(place, head.end())
    return True


def _flow(reader: Reader) -> bool:
    """ "flow 42000 m3/h", "42 000 dscm/h"."""
    head = re.compile(r"(?:(?:duct|stack|gas|volume|flue)\s)*(?:flow(?:\s?rate)?)?" + _IS, re.IGNORECASE).match(reader.text, reader.place)
    found = quantity_at(reader, head.end() if head else reader.place, ("volume_rate",))
    if found is None:
        return False
    quantity, end, called = found
    start, reader.place = reader.place, end
    take(reader, "flow", quantity, start, end, above_zero("flow"))
    if "word" in called:
        reader.fields["flow_word"] = called["word"]
    if "water" in called:
        reader.fields["water"] = called["water"]
    return True


def _oxygen(reader: Reader) -> bool:
    found = re.compile(r"(?:at\s|referred to\s|corrected to\s)?(?=[\d.,]+\s?%\s?(?:O2|oxygen))", re.IGNORECASE).match(reader.text, reader.place)
    quantity = quantity_at(reader, found.end(), ("parts",)) if found else None
    if quantity is None:
        return False
    end = re.compile(r"\s?(?:O2|oxygen)", re.IGNORECASE).match(reader.text, quantity[1]).end()
    start, reader.place = reader.place, end
    take(reader, "oxygen", quantity[0], start, end)
    return True


@lru_cache(maxsize=1)
def _fuels() -> tuple[tuple[str, str], ...]:
    """Every name of a fuel -> its row, the longest first."""
    names: dict[str, str] = {}
    for row in facts.table("f_factors")["fuels"]:
        for name in (row["name"], row["id"].replace("_", " "), *row["name"].split(" and ")):
            names.setdefault(name.lower(), row["id"])
    names |= {"gas": "natural_gas", "coal": "bituminous", "fuel oil": "oil", "waste": "municipal_waste", "sub-bituminous": "bituminous"}
    return tuple(sorted(names.items(), key=lambda pair: -len(pair[0])))


_ELEMENT = re.compile(r"(?P<element>[CHSNO])(?![a-z0-9])\s?[:=]?\s?(?=[\d.,])")


def _fuel(reader: Reader) -> bool:
    """ "fuel natural gas", or an ultimate analysis in percent by mass: "fuel C 75.2, H 5.1, S 1.2, N 1.5, O 7.9"."""
    head = re.compile(r"fuel" + _IS, re.IGNORECASE).match(reader.text, reader.place)
    if head is None:
        return False
    low = reader.text.lower()
    for name, identity in _fuels():
        if low.startswith(name, head.end()) and not low[head.end() + len(name):][:1].isalpha():
            reader.take("fuel", identity, reader.place, head.end() + len(name))
            reader.place = head.end() + len(name)
            return True
    return _analysis(reader, head.end())


def _analysis(reader: Reader, place: int) -> bool:
    parts: dict[str, Quantity] = {}
    end = place
    while (found := _ELEMENT.match(reader.text, place)) and (number := NUMBER.match(reader.text, found.end())):
        typed = number_at(number, reader.original[number.start():number.end()].strip())
        percent = re.compile(r"\s?%").match(reader.text, number.end())
        end = percent.end() if percent else number.end()
        parts[found["element"]] = Quantity(replace(typed, thousands=None), unit("%"))
        place = re.compile(r"\s*[,;]?\s*").match(reader.text, end).end()
    if not parts:
        known = ", ".join(row["name"] for row in facts.table("f_factors")["fuels"])
        wrong = re.compile(r"[^,;]*").match(reader.text, place).end()
        reader.refuse(NotUnderstood(f"'{reader.original[place:wrong].strip()}' is no fuel that is known here.", hint=f"Known: {known}; or give its analysis, 'fuel C 75.2, H 5.1, ...'."),
                      reader.place, wrong)
        reader.place = max(wrong, reader.place + 1)
        return True
    total = sum(float(part.number.decimal) for part in parts.values())
    if total > 100.5:
        reader.refuse(NotUnderstood(f"The elements of the fuel add up to {total:.4g} %, more than all of it.", hint="Give percent by mass.", field="emission.analysis"), reader.place, end)
    reader.take("analysis", tuple(parts.items()), reader.place, end)
    reader.place = end
    return True


def _hours(reader: Reader) -> bool:
    """ "6500 h/a", "operating 6500 hours a year"."""
    head = re.compile(r"(?:operat(?:ing|es|ed|ion)|runs?|running)?" + _IS, re.IGNORECASE).match(reader.text, reader.place)
    found = NUMBER.match(reader.text, head.end())
    behind = re.compile(r"\s?(?:h|hours|hrs?)\s?(?:/|per|a)\s?(?:a|yr|year)(?![A-Za-z])", re.IGNORECASE).match(reader.text, found.end()) if found else None
    if behind is None:
        return False
    number = number_at(found, reader.original[found.start():found.end()].strip())
    start, reader.place = reader.place, behind.end()
    take(reader, "hours", Quantity(replace(number, thousands=None), replace(PURE, id="h/a", text="h/a")), start, behind.end(), above_zero("time of operation"))
    return True


_SAID = {"gross": GROSS, "hhv": GROSS, "gcv": GROSS, "upper": GROSS, "higher": GROSS, "net": NET, "lhv": NET, "ncv": NET, "lower": NET}
_HEATS = {"energy_per_mass": "heating_value", "power": "heat"}


def _gross_or_net(reader: Reader) -> bool:
    """ "gross 29.5 MJ/kg", "20 MW net", "output 5 MW gross": the word belongs to the quantity behind it, else to the one before."""
    found = re.compile(r"(?P<said>gross|net|GCV|HHV|NCV|LHV|upper|higher|lower)(?![A-Za-z])(?:\s(?:calorific|heating)\svalue|\sheat(?:\sinput)?)?" + _IS, re.IGNORECASE).match(reader.text, reader.place)
    if found is None:
        return False
    said, behind = _SAID[found["said"].lower()], quantity_at(reader, found.end(), tuple(_HEATS))
    if behind is not None:
        field = _HEATS[behind[0].unit.kind]
        take(reader, field, behind[0], reader.place, behind[1], above_zero("heat"))
        reader.fields[f"{field}_said"] = said
        reader.place = behind[1]
        return True
    field = reader.last if reader.last in ("heat", "heating_value", "output") else "output"
    reader.take(f"{field}_said", said, reader.place, found.end())
    reader.place = found.end()
    return True


_BY = r"(?:\s?[:=]\s?|\s)?"
_CLAUSES: tuple[Read, ...] = (
    late_spread, readers.coverage, _hours, _sides,
    clause("diameter", rf"(?:(?:duct|stack|flue)\s)?(?:(?:inner|inside)\s)?diameter{_IS}|(?:duct|stack|flue)\sD?{_BY}", _LENGTH, check=above_zero("diameter")),
    clause("area", rf"(?:(?:duct|stack|flue)\s)?(?:cross[- ]section|area){_IS}|(?:duct|stack|flue)\s", ("area",), check=above_zero("cross-section")),
    clause("pitot", rf"(?:(?:S-?type\s)?pitot(?:\stube)?\s?)?(?:C_?p|coefficient){_IS}|pitot{_IS}", ("number",),
           check=above_zero("pitot coefficient", "0.84 is common for an S type, 0.99 for a standard type: take it from the calibration.")),
    _velocity_pressures, clause("velocity", rf"(?:(?:gas|duct|mean)\s)*velocity{_IS}", ("velocity",), check=above_zero("velocity")),
    clause("velocity", "", ("velocity",), check=above_zero("velocity")), _fuel,
    clause("factor", rf"(?:own\s)?F(?:[_ -]?[dcw])?(?:[- ]?factor)?{_IS}", ("volume_per_energy",), check=above_zero("F factor")),
    _gross_or_net, clause("heating_value", rf"(?:(?:calorific|heating) value|heat)?{_IS}", ("energy_per_mass",), check=above_zero("calorific value")),
    clause("air_water", rf"(?:ambient\s)?air\s?(?:water|moisture|humidity){_IS}|B_?wa{_IS}", ("parts",)),
    clause("output", rf"(?:(?:electric(?:al)?|power)\s)?(?:output|generation|load){_IS}", ("power",), check=above_zero("output")),
    clause("heat", rf"(?:heat(?:\s?(?:input|rate))?|firing(?:\srate)?|thermal input){_IS}", ("power",), check=above_zero("heat input")),
    clause("heat", "", ("power",), check=above_zero("heat input")),
    clause("product", rf"(?:product(?:ion)?|clinker|glass|throughput){_IS}", ("mass_rate",), check=above_zero("production rate")),
    _flow, _oxygen,
    clause("temperature", r"(?:at\s|@\s?)?", ("temperature",), check=above_zero("absolute temperature")), clause("pressure", r"(?:at\s|@\s?)?", _P, check=above_zero("absolute pressure")),
    word("by", BY_CARBON_DIOXIDE, r"by\s(?:CO2|carbon dioxide|F_?c)(?![A-Za-z0-9])"), word("by", BY_WET_OXYGEN, r"by\s(?:wet (?:O2|oxygen)|F_?w)(?![A-Za-z0-9])"),
    word("by", BY_OXYGEN, r"by\s(?:O2|oxygen|F_?d)(?![A-Za-z0-9])"),
    word("actual_volume", True, r"(?:as it flowed|actual|operating conditions|duct conditions)"),
    word("water", DRY, r"dry(?:\s(?:gas|basis))?(?![A-Za-z])"), word("water", WET, r"(?:wet|moist)(?:\s(?:gas|basis))?(?![A-Za-z])"), word("round", True, r"round|circular|diameter|inner|inside|S-?type"))


def read_emission(text: str) -> tuple[Emission, tuple[CoreError, ...]]:
    """The emission line's record, and what could not be read of it."""
    return _read(text)


@lru_cache(maxsize=16)
def _read(text: str) -> tuple[Emission, tuple[CoreError, ...]]:
    reader, refusal = read_line(text, "emission", _CLAUSES)
    if refusal is not None:
        return Emission(text=text), (refusal,)
    known = {name: value for name, value in reader.fields.items() if name in Emission.__dataclass_fields__}
    pieces = tuple(sorted((piece for piece in reader.pieces if piece.field != "round"), key=lambda piece: piece.span))
    return Emission(text=text, pieces=pieces, **known), tuple(reader.problems)

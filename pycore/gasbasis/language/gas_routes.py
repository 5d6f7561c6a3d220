"""Clauses of the gas line that lead to its water content or its pressure by another way than a plain value."""
from __future__ import annotations

import re
from dataclasses import replace

from gasbasis.errors import NotUnderstood
from gasbasis.language.basis import Quantity, Route, Unit
from gasbasis.language.numbers import NUMBER, PLUS_MINUS, number_at, uncertainty_at
from gasbasis.language.columns import column_at
from gasbasis.language.units import unit

_ANY_UNIT = re.compile(r"\s?(?P<unit>(?:mm ?Hg|in\.? ?Hg|mm ?H2O|mm ?WC|in\.? ?H2O|in\.? ?w\.?c\.?|%|° ?[CFKR]|deg ?[CF]|kg/kg|g/kg|g/m3|mg/m3|kPa|hPa|MPa|Pa|mbar|bar|psi|atm|"
                       r"dm3|m3|ft3|mL|ml|L|l|kg|mg|g|m|ft|K|C|F))(?:\((?:g|a)\)|g(?=[\s,;]|$)|a(?=[\s,;]|$))?(?![A-Za-z0-9])")
_AT = r"[\s,]*(?:(?:at|@|in|of|and|altitude|elevation|,)\s*)*"


def _quantity(reader, place: int, kinds: tuple[str, ...]) -> tuple[Quantity, int] | None:
    """A number with a unit of one of the kinds at a place, and where it ends."""
    found = NUMBER.match(reader.text, place)
    if found is None:
        return None
    number, after = number_at(found, reader.original[found.start():found.end()].strip()), found.end()
    spread = PLUS_MINUS.match(reader.text, after + (1 if reader.text[after:after + 1] == " " else 0))
    if spread:

        number, after = replace(number, uncertainty=replace(uncertainty_at(spread), relative=False)), spread.end("amount")
    measured = _ANY_UNIT.match(reader.text, after)
    if measured is None:
        return None
    read, end = unit(measured["unit"]), measured.end()
    if read.kind == "pressure":
        read, end = column_at(reader, end, read)
    return (Quantity(number, read), end) if read.kind in kinds else None


def _more(reader, place: int, wanted: dict[str, tuple[str, ...]]) -> tuple[dict[str, Quantity], int]:
    """Further quantities behind a clause ("at 20 °C, 101.3 kPa"), each of a kind still wanted."""
    given: dict[str, Quantity] = {}
    end = place
    while len(given) < len(wanted):
        start = re.compile(_AT).match(reader.text, end).end()
        rest = {name: kinds for name, kinds in wanted.items() if name not in given}
        found = next(((name, *read) for name, kinds in rest.items() if (read := _quantity(reader, start, kinds))), None)
        if found is None:
            break
        given[found[0]], end = found[1], found[2]
    return given, end


def _route(identity: str, field: str, head: str, first: tuple[str, tuple[str, ...]], more: dict[str, tuple[str, ...]] | None = None,
           needs: tuple[str, ...] = (), tail: str = ""):
    """A clause reader: a word, a quantity, and what may or must stand behind it."""
    pattern, name, kinds = re.compile(head, re.IGNORECASE), *first
    ending = re.compile(tail, re.IGNORECASE)

    def read(reader) -> bool:
        found = pattern.match(reader.text, reader.place)
        quantity = _quantity(reader, found.end(), kinds) if found else None
        if quantity is None:
            return False
        value, end = quantity
        said = ending.match(reader.text, end) if tail else None
        if tail and said is None:
            return False
        given, end = _more(reader, said.end() if said else end, more or {})
        given = {name: value, **given}
        missing = [wanted for wanted in needs if wanted not in given]
        if missing:
            reader.refuse(NotUnderstood(f"'{reader.original[found.start():end].strip()}' needs {' and '.join(_WORDS[name] for name in missing)}.",
                                        hint=f"For example '{_EXAMPLES[identity]}'."), found.start(), end)
        else:
            reader.take(field, Route(identity, tuple(given.items())), found.start(), end)
        reader.place = end
        return True

    return read


_WORDS = {"temperature": "a temperature", "pressure": "a pressure", "dry_bulb": "the dry bulb", "volume": "the dry gas volume that was metered",
          "barometer": "a barometer"}
_EXAMPLES = {"dew_point": "dew point 45 °C", "relative_humidity": "RH 60 % at 25 °C", "wet_bulb": "wet bulb 40 °C, dry bulb 80 °C",
             "collected": "collected water 34.2 g in 0.512 m3 at 293 K, 101.3 kPa", "mass_per_volume": "85 g/m3 water dry at 273.15 K, 101.3 kPa",
             "mixing_ratio": "0.08 kg/kg water", "saturated": "saturated at 45 °C"}
_T, _P, _PERCENT = ("temperature",), ("pressure",), ("parts",)
_MASS_OR_VOLUME, _VOLUME = ("mass", "volume"), ("volume",)

ROUTES = (
    _route("dew_point", "water_route", r"dew\s?-?point\s?[:=]?\s?(?:of\s)?", ("temperature", _T), {"pressure": _P}),
    _route("frost_point", "water_route", r"frost\s?-?point\s?[:=]?\s?(?:of\s)?", ("temperature", _T), {"pressure": _P}),
    _route("relative_humidity", "water_route", r"(?:RH|rel(?:ative|\.)? humidity|r\.h\.)\s?[:=]?\s?(?:of\s)?", ("humidity", _PERCENT), {"temperature": _T, "pressure": _P}, ("temperature",)),
    _route("relative_humidity", "water_route", "", ("humidity", _PERCENT), {"temperature": _T, "pressure": _P}, ("temperature",), r"\s?(?:RH|rel(?:ative|\.)? humidity|r\.h\.)"),
    _route("saturated", "water_route", r"(?:water[- ]?)?saturated\s?(?:at|@|:)?\s?", ("temperature", _T), {"pressure": _P}),
    _route("collected", "water_route", r"(?:collected|condensed)\s(?:water|moisture)\s?[:=]?\s?(?:of\s)?|(?:water|moisture)\s(?:collected|condensed)\s?[:=]?\s?", ("water", _MASS_OR_VOLUME),
           {"volume": _VOLUME, "temperature": _T, "pressure": _P}, ("volume", "temperature", "pressure")),
    _route("mass_per_volume", "water_route", r"(?:water|moisture)\s?[:=]?\s?", ("content", ("mass_concentration",)), {"temperature": _T, "pressure": _P}, ("temperature", "pressure"),
           r"(?:\s?\(?(?:on\s)?dry(?:\sgas)?\)?)?"),
    _route("mixing_ratio", "water_route", r"(?:water|moisture)\s?[:=]?\s?", ("ratio", ("mass_fraction",)), {}, (), r"(?:\s?\(?(?:on\s)?dry(?:\s(?:gas|air))?\)?)?"),
    _route("gauge", "pressure_route", r"gauge\s?(?:pressure)?\s?[:=]?\s?(?:of\s)?", ("pressure", _P)),
    _route("static", "pressure_route", r"(?:duct\s)?static\s?(?:pressure)?\s?[:=]?\s?(?:of\s)?", ("pressure", _P)),
    _route("sea_level", "barometer_route", r"(?:sea[- ]level|weather report|QNH)\s?(?:pressure)?\s?[:=]?\s?(?:of\s)?", ("pressure", _P), {"altitude": ("length",)}),
    _route("altitude", "barometer_route", r"(?:altitude|elevation|height)\s?[:=]?\s?(?:of\s)?", ("altitude", ("length",))),
)


def wet_and_dry_bulb(reader) -> bool:
    """ "wet bulb 40 °C, dry bulb 80 °C", in either order."""
    word = re.compile(r"(?P<which>wet|dry)\s?-?bulb\s?[:=]?\s?(?:of\s)?", re.IGNORECASE)
    given: dict[str, Quantity] = {}
    place = reader.place
    while (found := word.match(reader.text, place)) and (quantity := _quantity(reader, found.end(), _T)):
        given[f"{found['which'].lower()}_bulb"], end = quantity
        place = re.compile(_AT).match(reader.text, end).end()
    if not given:
        return False
    start, reader.place = reader.place, end
    if len(given) < 2:
        reader.refuse(NotUnderstood("A wet bulb needs its dry bulb, and a dry bulb its wet bulb.", hint=f"For example '{_EXAMPLES['wet_bulb']}'."), start, end)
    else:
        reader.take("water_route", Route("wet_bulb", tuple(given.items())), start, end)
    return True


def _plain(field: str, head: str, kinds: tuple[str, ...]):
    """A clause reader: a word and one quantity that is the field itself."""
    pattern = re.compile(head, re.IGNORECASE)

    def read(reader) -> bool:
        found = pattern.match(reader.text, reader.place)
        quantity = _quantity(reader, found.end(), kinds) if found else None
        if quantity is None:
            return False
        reader.take(field, quantity[0], reader.place, quantity[1])
        reader.place = quantity[1]
        return True

    return read


_barometer = _plain("barometer", r"(?:barometer|barometric(?:\spressure)?|p_?bar|station pressure|ambient pressure)\s?[:=]?\s?(?:of\s)?", _P)
_cooler = _plain("cooler", r"(?:(?:behind|after)\s(?:a\s)?)?(?:sample\s|gas\s)?(?:cooler|chiller|condenser)\s?(?:at|of|@|:|=)?\s?", _T)

_FACTOR = re.compile(r"(?:(?:dry\s)?(?:gas\s)?meter\s?(?:calibration\s)?factor\s?(?:Y|gamma)?|Y)\s?[:=]?\s?(?=\d)", re.IGNORECASE)


def _meter_factor(reader) -> bool:
    """ "Y 1.012", "meter factor 0.998": what the meter's reading is multiplied by."""
    found = _FACTOR.match(reader.text, reader.place)
    number = NUMBER.match(reader.text, found.end()) if found else None
    if number is None:
        return False
    typed, end = number_at(number, reader.original[number.start():number.end()].strip()), number.end()
    spread = PLUS_MINUS.match(reader.text, end + (1 if reader.text[end:end + 1] == " " else 0))
    if spread:
        typed, end = replace(typed, uncertainty=uncertainty_at(spread)), spread.end()
    reader.take("meter_factor", Quantity(typed, Unit("1", "", "number", 1.0)), reader.place, end)
    reader.place = end
    return True


_NAMES = (
    (("hold.value",), r"value|reading|NOx|SO2|CO|Hg|dust"), (("gas.oxygen", "hold.oxygen"), r"O2|oxygen"),
    (("gas.carbon_dioxide", "hold.carbon_dioxide"), r"CO2"), (("gas.water_content", "gas.water_route"), r"H2O|water|moisture|h"),
    (("gas.temperature",), r"T|temperature"), (("gas.pressure", "gas.pressure_route", "gas.barometer"), r"p|pressure"),
)
_NAME = r"[A-Za-z][A-Za-z0-9]*"
_CORRELATION = re.compile(rf"(?:(?:r|corr(?:elation)?)\s?\(|corr(?:elation)?\s(?:of|between)\s)\s?(?P<first>{_NAME})\s?(?:,|;|and|with)\s?"
                          rf"(?P<second>{_NAME})(?:\s?\)\s?[=:]?|\s?[=:]|\s)\s?(?=[-+]?[\d.,])", re.IGNORECASE)


def _correlation(reader) -> bool:
    """ "r(NOx, O2) = 0.6": two inputs whose errors move together."""
    found = _CORRELATION.match(reader.text, reader.place)
    number = NUMBER.match(reader.text, found.end()) if found else None
    if number is None:
        return False
    start, reader.place = reader.place, number.end()
    pair = [next((fields for fields, pattern in _NAMES if re.fullmatch(pattern, name.strip(), re.IGNORECASE)), None) for name in (found["first"], found["second"])]
    if None in pair or pair[0] == pair[1]:
        reader.refuse(NotUnderstood("A correlation stands between two different inputs.",
                                    hint="Names: value, O2, CO2, H2O, T, p; for example 'r(value, O2) = 0.6'."), start, number.end())
        return True
    typed = number_at(number, reader.original[number.start():number.end()].strip())
    reader.take_one_more("correlations", (*pair, Quantity(replace(typed, thousands=None), Unit("1", "", "number", 1.0))), start, number.end())
    return True


CLAUSES = (wet_and_dry_bulb, _correlation, _meter_factor, _barometer, _cooler, *ROUTES)

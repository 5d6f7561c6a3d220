"""Units of a rate on the owed side and at a limit: mass per time, per heat of fuel, per output, per product."""
from __future__ import annotations

import re

from gasbasis.language.units import unit

_MASS = r"(?P<mass>kg|mg|ug|ng|g|lbs?|tonnes?|short tons?|long tons?|(?P<ton>tons?)|t)"
_TIME = r"(?:s|sec|min|h|hr|hour|d|day|a|yr|year)"
_ENERGY = r"(?:J|kJ|MJ|GJ|TJ|kWh|MWh|GWh|Btu|MMBtu|MMBTU|mmBtu|million Btu|10\^?6 Btu|TBtu)"
_RATE = re.compile(rf"{_MASS}\s?(?:/|per\s)\s?(?P<below>{_TIME}|{_ENERGY}|(?P<product>t|tonne)(?:\s(?:product|clinker|glass|of product))?)(?![A-Za-z0-9])")
_ONE_SPELLING = {"lbs": "lb", "tonne": "t", "tonnes": "t", "sec": "s", "hr": "h", "hour": "h", "day": "d", "yr": "a", "year": "a", "million Btu": "MMBtu", "10^6 Btu": "MMBtu", "106 Btu": "MMBtu",
                 "MMBTU": "MMBtu", "mmBtu": "MMBtu", "short tons": "short ton", "long tons": "long ton"}


def rate_unit(reader, place: int):
    """The unit at a place and where it ends, or None. A bare "ton" is read as metric until its doubt is settled."""
    found = _RATE.match(reader.text, place)
    if found is None or (found["product"] and found["mass"] not in ("kg", "g", "lb")):
        return None
    above = "t" if found["ton"] else _ONE_SPELLING.get(found["mass"], found["mass"])
    below = "t" if found["product"] else _ONE_SPELLING.get(found["below"], found["below"])
    if found["ton"]:
        reader.fields["ton_said"] = below
    return unit(f"{above}/{below}"), found.end()

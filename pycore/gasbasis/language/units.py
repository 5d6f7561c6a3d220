"""Units of measurement: from the text somebody typed to a factor on SI. The only importer of pint.

Parts (ppm, %, ...) are counted here but not qualified: what they are parts of is a piece of the
statement. A volume's "normal" or "dry" is read by the statement reader, never by a unit.
"""
from __future__ import annotations

import re
from functools import lru_cache
from importlib import resources
from typing import Mapping

from pint import UnitRegistry

from gasbasis.errors import NotUnderstood
from gasbasis.language.basis import Unit
from gasbasis.language.normalise import normalise

# kind -> (SI unit it is measured in, in the definitions' notation)
_SI = {"mass_concentration": "kg/m**3", "amount_concentration": "mol/m**3", "pressure": "Pa", "mass": "kg", "amount": "mol",
       "volume": "m**3", "length": "m", "area": "m**2", "time": "s", "velocity": "m/s", "mass_rate": "kg/s", "volume_rate": "m**3/s",
       "molar_mass": "kg/mol", "energy": "J", "mass_per_energy": "kg/J", "volume_per_energy": "m**3/J", "amount_rate": "mol/s",
       "power": "J/s", "energy_per_mass": "J/kg"}

# Parts without a word on what they count; text as printed.
_PARTS: Mapping[str, tuple[str, float]] = {
    "%": ("%", 1e-2), "percent": ("%", 1e-2), "permil": ("‰", 1e-3), "‰": ("‰", 1e-3), "pphm": ("pphm", 1e-8),
    "ppm": ("ppm", 1e-6), "ppb": ("ppb", 1e-9), "ppt": ("ppt", 1e-12), "ppq": ("ppq", 1e-15),
}
_FRACTION_KIND = {"mass": "mass_fraction", "amount": "amount_fraction", "volume": "amount_fraction"}

# What people type -> our notation. Exact case first; then without regard to case.
_ATOMS: Mapping[str, tuple[str, ...]] = {
    "kg": ("kilogram", "kilograms"), "g": ("gram", "grams", "gramme"), "mg": ("milligram", "milligrams"),
    "ug": ("mcg", "microgram", "micrograms"), "ng": ("nanogram", "nanograms"), "pg": ("picogram", "picograms"), "fg": (),
    "lb": ("lbs", "pound", "pounds"), "gr": ("grain", "grains"), "tonne": ("tonnes",),
    "mol": ("mole", "moles"), "kmol": (), "mmol": (), "umol": (), "nmol": (), "pmol": (), "lbmol": ("lb-mol", "lbmole", "lb-mole"),
    "m**3": ("m3", "m^3", "cubic metre", "cubic meter", "cubic metres", "cbm"), "dm**3": ("dm3", "dm^3"),
    "cm**3": ("cm3", "cm^3", "cc", "ccm"), "mm**3": ("mm3",), "L": ("l", "litre", "liter", "litres", "liters", "ltr"),
    "mL": ("ml",), "uL": ("ul",), "nL": ("nl",),
    "ft**3": ("ft3", "ft^3", "cf", "cu ft", "cu.ft.", "cu. ft.", "cuft", "cubic foot", "cubic feet"),
    "m": (), "mm": (), "cm": (), "in": ("inch", "inches"), "ft": ("foot", "feet"), "m**2": ("m2", "m^2"), "ft**2": ("ft2", "ft^2"),
    "s": ("sec", "second"), "min": ("minute",), "h": ("hr", "hour"), "d": ("day",), "a": ("yr", "year"), "t": (),
    "J": (), "kJ": (), "MJ": (), "GJ": (), "TJ": (), "MWh": (), "GWh": (), "kWh": (), "Btu": ("btu", "BTU"), "MMBtu": ("MMBTU", "mmBtu", "million Btu"), "TBtu": ("TBTU",),
    "W": (), "kW": (), "MW": (), "GW": (), "short_ton": ("short ton", "short tons"), "long_ton": ("long ton", "long tons"),
}
_PRESSURES: Mapping[str, tuple[str, ...]] = {
    "Pa": (), "hPa": (), "kPa": ("kpa",), "MPa": ("Mpa",), "mbar": ("millibar", "mb"), "bar": ("bars",),
    "atm": ("atmosphere", "atmospheres"), "technical_atmosphere": ("at",), "psi": ("lbf/in2", "lb/in2"), "torr": (),
    "mmHg": ("mm Hg", "mm hg"), "inHg": ("in Hg", "in. Hg", "inches Hg", '"Hg', "in.Hg", "inches of mercury"),
    "mmH2O": ("mm H2O", "mmWC", "mm WC", "mmWS", "mm wg"), "inH2O": ("in H2O", "in. H2O", '"H2O', "inWC", "in. w.c.", "in w.c.", "inWG", "inches H2O", "in.H2O"),
    "inH2O_60F": (), "inHg_60F": (),
}
_TEMPERATURES: Mapping[str, tuple[str, ...]] = {
    "K": ("kelvin",), "degC": ("°C", "° C", "C", "deg C", "deg. C", "celsius"), "degF": ("°F", "° F", "F", "deg F", "deg. F"),
    "degR": ("°R", "R", "deg R", "rankine"),
}
_PRINTED = {"degC": "°C", "degF": "°F", "degR": "°R", "torr": "Torr", "mmH2O": "mmH₂O", "inH2O": "inH₂O", "technical_atmosphere": "at",
            "short_ton": "short ton", "long_ton": "long ton", "inH2O_60F": "inH₂O (60 °F)", "inHg_60F": "inHg (60 °F)"}


@lru_cache(maxsize=1)
def _registry() -> UnitRegistry:
    registry = UnitRegistry(None, cache_folder=None)
    registry.load_definitions(resources.files("gasbasis.language").joinpath("units.txt").read_text("utf-8").splitlines())
    return registry


@lru_cache(maxsize=1)
def _names() -> Mapping[str, str]:
    """Every spelling -> our notation."""
    names: dict[str, str] = {}
    for table in (_ATOMS, _PRESSURES, _TEMPERATURES):
        for name, spellings in table.items():
            for spelling in (name, *spellings):
                names.setdefault(spelling, name)
    return names


def atom(text: str) -> str | None:
    """Our notation for one unit without a fraction bar, or None."""
    plain = re.sub(r"\s+", " ", normalise(text).strip())
    names = _names()
    return names.get(plain) or next((name for spelling, name in names.items() if len(plain) > 2 and spelling.lower() == plain.lower()), None)


@lru_cache(maxsize=512)
def unit(text: str) -> Unit:
    """The unit a text names: "mg/m3", "µg/m³", "gr/100 ft3", "ppb", "°C", "inHg". Raises NotUnderstood."""
    plain = re.sub(r"\s+", " ", normalise(text).strip())
    if plain.lower() in _PARTS:
        printed, factor = _PARTS[plain.lower()]
        return Unit(printed, printed, "parts", factor)
    top, bar, bottom = plain.partition("/") if "/" in plain and plain not in _names() else plain.partition(" per ")
    if bar:
        return _ratio(text, top.strip(), bottom.strip())
    if top in _names() and _names()[top] in _TEMPERATURES:
        return _temperature(_names()[top])
    name = atom(top)
    if name is None:
        raise _unknown(text)
    return _made(name, name)


def _ratio(text: str, top: str, bottom: str) -> Unit:
    """A unit with a fraction bar; a count such as 100 or a million may stand before the lower unit."""
    found = re.fullmatch(r"(?P<count>1000|100|million|10\^?6|MM|M)?\s?(?P<unit>.+)", bottom)
    above, below = atom(top), atom(bottom)
    count = ""
    if below is None and found and found["count"]:
        below, count = atom(found["unit"]), {"million": "1e6", "106": "1e6", "10^6": "1e6", "MM": "1e6", "M": "1e3"}.get(found["count"], found["count"])
    if above is None or below is None:
        raise _unknown(text)
    return _made(f"{above}/({count} {below})" if count else f"{above}/{below}", above, below, count)


def _made(identity: str, above: str, below: str = "", count: str = "") -> Unit:
    registry = _registry()
    quantity = registry.parse_expression(above) / (registry.parse_expression(below) if below else 1) / float(count or 1)
    kind = _kind(quantity, above)
    si = _SI.get(kind, "")
    return Unit(identity.replace("**", ""), _print(above, below, count), kind, _exact(quantity.to(si).magnitude))


def _exact(value: float) -> float:
    """Without the last-bit noise of chained factors: 1e-12, not 1.0000000000000002e-12."""
    return float(f"{value:.15g}")


def _kind(quantity, above: str) -> str:
    registry = _registry()
    if quantity.dimensionless:
        counted = next((kind for kind in _FRACTION_KIND if registry.parse_expression(above).check(_dimension(kind))), None)
        if counted is None:            # hours per year and the like are no share of a gas
            raise _unknown(above)
        return _FRACTION_KIND[counted]
    for kind, si in _SI.items():
        if quantity.is_compatible_with(si):
            return kind
    raise _unknown(above)


@lru_cache(maxsize=None)
def _dimension(kind: str):
    return _registry().parse_units(_SI[kind]).dimensionality


def _temperature(name: str) -> Unit:
    registry = _registry()
    zero, hundred = (registry.Quantity(number, name).to("K").magnitude for number in (0.0, 100.0))
    return Unit(name, _PRINTED.get(name, name), "temperature", _exact((hundred - zero) / 100.0), _exact(zero))


def _print(above: str, below: str, count: str) -> str:
    text = _PRINTED.get(above, above)
    if below:
        counted = {"": "", "1e6": "10⁶ ", "1e3": "1000 "}.get(count, f"{count} ")
        text += f"/{counted}{_PRINTED.get(below, below)}"
    text = re.sub(r"\bu(?=(g|mol|L)\b)", "µ", text)
    return text.replace("**3", "³").replace("**2", "²")


def _unknown(text: str) -> NotUnderstood:
    return NotUnderstood(f"'{text.strip()[:40]}' is not a unit that is known here.",
                         hint="For example mg/m3, µg/m3, ppm, ppb, umol/mol, mg/kg, gr/100 ft3, lb/ft3, mmol/m3, kPa, °C.")


GROUPS: Mapping[str, tuple[str, ...]] = {
    "mass per volume": ("kg/m3", "g/m3", "mg/m3", "ug/m3", "ng/m3", "pg/m3", "mg/L", "ug/L", "ng/L", "pg/L", "ng/mL", "ug/ft3",
                        "gr/ft3", "gr/100 ft3", "lb/ft3", "lb/million ft3"),
    "parts": ("%", "‰", "ppm", "ppb", "ppt"),
    "amount fraction": ("mol/mol", "mmol/mol", "umol/mol", "nmol/mol", "pmol/mol", "mL/m3", "uL/L", "nL/L"),
    "mass fraction": ("g/kg", "mg/kg", "ug/kg", "ng/kg", "ug/g", "ng/g"),
    "amount per volume": ("mol/m3", "mmol/m3", "umol/m3", "nmol/m3", "mmol/L"),
    "pressure": tuple(_PRESSURES),
    "temperature": tuple(_TEMPERATURES),
    "mass rate": ("g/s", "kg/h", "lb/h", "t/a", "short ton/a", "long ton/a"),
    "mass per heat or output": ("ng/J", "mg/MJ", "g/GJ", "lb/MMBtu", "lb/TBtu", "g/kWh", "lb/MWh", "lb/GWh", "kg/t"),
}

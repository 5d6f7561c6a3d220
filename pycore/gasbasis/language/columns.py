"""Pressures read as the height of a liquid: an inch or millimetre of water or mercury at a stated temperature."""
from __future__ import annotations

import re
from functools import lru_cache

from gasbasis import facts
from gasbasis.errors import OutOfRange
from gasbasis.language.basis import Unit
from gasbasis.language.units import unit
from gasbasis.physics import liquid
from gasbasis.physics.pressure import liquid_column

_METRES = {"inH2O": 0.0254, "inHg": 0.0254, "mmH2O": 1e-3, "mmHg": 1e-3}
_DEGREES = r"(?P<{0}>[+-]?\d+(?:[.,]\d+)?)\s?(?P<{0}_unit>°\s?[CFK]|deg\s?[CF]|[CFK](?![A-Za-z]))"
_STATED = re.compile(rf"\s?\(\s?(?:at\s|@\s?)?{_DEGREES.format('bracketed')}\s?\)|\s?,?\s?(?:the\s)?(?:column|fluid|liquid)\s(?:at|@)\s?{_DEGREES.format('said')}")
_CELSIUS_ZERO = unit("degC").offset


def column_at(reader, place: int, measured: Unit) -> tuple[Unit, int]:
    """The unit with the temperature of its column, where one stands behind it ("inH2O (60 °F)"), and where that ends.

    A temperature at which the liquid's density is not known here becomes a problem of the reader.
    """
    found = _STATED.match(reader.text, place) if measured.id in _METRES else None
    if found is None:
        return measured, place
    name = "bracketed" if found["bracketed"] else "said"
    degrees = unit(found[f"{name}_unit"].replace(" ", ""))
    celsius = float(found[name].replace(",", ".")) * degrees.factor + degrees.offset - _CELSIUS_ZERO
    try:
        return _column(measured, round(celsius, 9), f"{found[name]} {degrees.text}"), found.end()
    except OutOfRange as error:
        reader.refuse(error, place, found.end())
        return measured, found.end()


@lru_cache(maxsize=64)
def _column(measured: Unit, celsius: float, said: str) -> Unit:
    name = "water" if measured.id.endswith("H2O") else "mercury"
    equation = next(equation for equation in facts.table("liquid_densities")["equations"] if equation["id"] == name)
    low, high = (float(end) for end in equation["range"])
    if not low <= celsius <= high:
        raise OutOfRange(f"A column of {name} at {said} is outside {low:g} to {high:g} °C.", hint="Give the temperature of the gauge, not that of the gas.")
    if name == "water":
        density = liquid.density_of_water(celsius, *(float(text) for text in equation["a"]))
    else:
        density = liquid.density_of_mercury(celsius, float(equation["rho0"]), *(float(text) for text in equation["b"]))
    g = float(facts.constant("iso_2533_acceleration").number)
    return Unit(f"{measured.id}@{celsius:g}", f"{measured.text} ({said})", "pressure", liquid_column(density, g, _METRES[measured.id]))

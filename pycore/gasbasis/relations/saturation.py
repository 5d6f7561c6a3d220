"""Relations of the saturation pressure of water."""
from __future__ import annotations

from gasbasis.physics import saturation
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import PRESSURE, TEMPERATURE, marked

_SATURATION = marked(PRESSURE, "s", "saturation pressure of water")
_TAU = Symbol("τ", "", "1", "1 − T/Tc", "dimensionless")
_THETA = Symbol("θ", "", "1", "T/Tt", "dimensionless")
_CURE = ("Give a temperature the equation is made for.",)


def _coefficients(letter: str, count: int) -> dict[str, Symbol]:
    return {f"{letter}_{index}": Symbol(letter, str(index), "1", f"coefficient {index}", "dimensionless") for index in range(1, count + 1)}


RELATIONS = (
    Relation("reduced_temperature_complement", "Reduced temperature of water", saturation.reduced_temperature_complement, _TAU,
             {"T": TEMPERATURE, "T_c": marked(TEMPERATURE, "c", "critical temperature of water")}, "wagner-pruss-1993", "eq. 1",
             (Bound("T", "over liquid water it lies from 273.15 K to 647.096 K", *_CURE, low=273.15, high="T_c", low_allowed=True, high_allowed=True),)),
    Relation("saturation_pressure_over_water", "Saturation pressure over liquid water", saturation.saturation_pressure_over_water, _SATURATION,
             {"tau": _TAU, "T": TEMPERATURE, "T_c": marked(TEMPERATURE, "c", "critical temperature of water"),
              "p_c": marked(PRESSURE, "c", "critical pressure of water"), **_coefficients("a", 6)}, "wagner-pruss-1993", "eq. 1"),
    Relation("reduced_temperature", "Reduced temperature of ice", saturation.reduced_temperature, _THETA,
             {"T": TEMPERATURE, "T_t": marked(TEMPERATURE, "t", "triple-point temperature of water")}, "iapws-r14-08", "eq. 6",
             (Bound("T", "over ice it lies from 50 K to 273.16 K", *_CURE, low=50.0, high=273.16, low_allowed=True, high_allowed=True),)),
    Relation("sublimation_pressure_over_ice", "Saturation pressure over ice", saturation.sublimation_pressure_over_ice, _SATURATION,
             {"theta": _THETA, "p_t": marked(PRESSURE, "t", "triple-point pressure of water"), **_coefficients("a", 3), **_coefficients("b", 3)},
             "iapws-r14-08", "eq. 6"),
)

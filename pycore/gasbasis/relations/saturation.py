"""Relations of the saturation pressure of water."""
from __future__ import annotations

from gasbasis.physics import saturation
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import PRESSURE, TEMPERATURE, marked

_SATURATION = marked(PRESSURE, "s", "saturation pressure of water")
_TAU = Symbol("τ", "", "1", "distance from the critical temperature, 1 − T/Tc", "dimensionless")
_THETA = Symbol("θ", "", "1", "temperature over that of the triple point", "dimensionless")
_CRITICAL = marked(TEMPERATURE, "c", "critical temperature of water")


def _coefficients(letter: str, count: int) -> dict[str, Symbol]:
    return {f"{letter}_{index}": Symbol(letter, str(index), "1", f"coefficient {letter}{index} of the equation", "dimensionless")
            for index in range(1, count + 1)}


# The equation over water begins at the triple point, 273.16 K; 0 degC lies 0.01 K below it and is let through.
_LIQUID = (Bound("T", "over liquid water it lies from 273.15 K to the critical temperature", "Below freezing give a frost point.",
                 low=273.15, high="T_c", low_allowed=True, high_allowed=True),)
_ICE = (Bound("T", "over ice it lies from 50 K to the triple point", "Above freezing give a dew point.",
              low=50.0, high="T_t", low_allowed=True, high_allowed=True),)

RELATIONS = (
    Relation("reduced_temperature_complement", "Distance from the critical temperature", saturation.reduced_temperature_complement, _TAU,
             {"T": TEMPERATURE, "T_c": _CRITICAL}, "wagner-pruss-1993", "eq. 1", _LIQUID),
    Relation("saturation_pressure_over_water", "Saturation pressure over liquid water", saturation.saturation_pressure_over_water,
             _SATURATION, {"tau": _TAU, "T": TEMPERATURE, "T_c": _CRITICAL, "p_c": marked(PRESSURE, "c", "critical pressure of water"),
                           **_coefficients("a", 6)}, "wagner-pruss-1993", "eq. 1", _LIQUID),
    Relation("reduced_temperature", "Temperature over that of the triple point", saturation.reduced_temperature, _THETA,
             {"T": TEMPERATURE, "T_t": marked(TEMPERATURE, "t", "triple-point temperature of water")}, "iapws-r14-08", "eq. 6", _ICE),
    Relation("sublimation_pressure_over_ice", "Saturation pressure over ice", saturation.sublimation_pressure_over_ice, _SATURATION,
             {"theta": _THETA, "p_t": marked(PRESSURE, "t", "triple-point pressure of water"), **_coefficients("a", 3),
              **_coefficients("b", 3)}, "iapws-r14-08", "eq. 6",
             (Bound("theta", "it lies above zero, up to the triple point", "Above freezing give a dew point.",
                    low=0.0, high=1.0, high_allowed=True),)),
)

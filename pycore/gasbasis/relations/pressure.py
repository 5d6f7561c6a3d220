"""Relations of the absolute pressure."""
from __future__ import annotations

from gasbasis.physics import pressure
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import PRESSURE, TEMPERATURE, marked, positive, pressure_bound, temperature_bound

_BAROMETER = marked(PRESSURE, "b", "barometer at the station")
_GAUGE = marked(PRESSURE, "g", "gauge or static pressure")
_ACCELERATION = Symbol("g", "", "m/s2", "standard acceleration", "m/s**2")
# The air of the atmosphere is no sample, so its moles are plain moles in the proof.
_AIR = {
    "T_0": marked(TEMPERATURE, "0", "standard temperature at sea level"),
    "L": Symbol("L", "", "K/m", "fall of temperature with altitude"),
    "H": Symbol("H", "", "m", "altitude"),
    "g": _ACCELERATION,
    "M": Symbol("M", "air", "kg/mol", "molar mass of air"),
    "R": Symbol("R", "", "J/(mol K)", "gas constant of the standard", "J/(mol*K)"),
}
_LAYER = (
    Bound("H", "the formula holds from 500 m below to 11 000 m above sea level", "Give the altitude of the station in metres.",
          low=-500.0, high=11000.0, low_allowed=True, high_allowed=True),
    positive("L", "it counts as positive where the air grows colder upwards", "Give the standard's 6.5 K/km without its minus sign."),
    temperature_bound("T_0"),
)

RELATIONS = (
    Relation("absolute_pressure", "Absolute pressure", pressure.absolute_pressure, marked(PRESSURE, "", "absolute pressure of the gas"),
             {"p_b": _BAROMETER, "p_g": _GAUGE}, "common-practice", "",
             (pressure_bound("p_b"),)),
    Relation("barometer_at_altitude", "Barometer at the altitude", pressure.barometer_at_altitude, _BAROMETER,
             {"p_0": marked(PRESSURE, "0", "standard pressure at sea level"), **_AIR}, "iso-2533", "geopotential altitude",
             (*_LAYER, pressure_bound("p_0")), "A standard atmosphere: the weather moves the true barometer by some 3 %."),
    Relation("barometer_from_sea_level", "Barometer at the station, from the weather report", pressure.barometer_from_sea_level, _BAROMETER,
             {"p_sl": marked(PRESSURE, "sea", "pressure reduced to sea level"), **_AIR}, "iso-2533", "geopotential altitude, turned round",
             (*_LAYER, pressure_bound("p_sl")),
             "Undone with the standard atmosphere's temperature; a weather service may have reduced with the day's own."),
    Relation("liquid_column", "Pressure under a column of liquid", pressure.liquid_column, _GAUGE,
             {"rho": Symbol("ρ", "", "kg/m3", "density of the liquid at its temperature"), "g": _ACCELERATION,
              "z": Symbol("z", "", "m", "height of the column")}, "common-practice", "hydrostatics",
             (positive("rho", "a density is above zero", "Give the liquid and its temperature."),)),
)

"""Relations of the water content.

In the proof of dimensions the water counts as the species (kg_s, mol_s) until it is taken as a part of the gas: there its
amount is an amount of gas (mol_g), and a share of it has no dimension.
"""
from __future__ import annotations

import math

from gasbasis.physics import humidity
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import (COMPRESSION_FACTOR, GAS_CONSTANT, GAS_MOLAR_MASS, MASS_CONCENTRATION, MOLAR_MASS, PRESSURE,
                                        TEMPERATURE, WATER, WATER_BOUND, marked, positive, pressure_bound, temperature_bound)

_TOTAL = marked(PRESSURE, "", "pressure of the gas")
_VAPOUR = marked(PRESSURE, "w", "partial pressure of the water vapour")
_SATURATION = marked(PRESSURE, "s", "saturation pressure of water")


def _not_negative(argument: str, cure: str) -> Bound:
    return Bound(argument, "it cannot be negative", cure, low=0.0, high=math.inf, low_allowed=True)


_FROM_VAPOUR = (
    Relation("water_from_vapour_pressure", "Water content from the vapour pressure", humidity.water_from_vapour_pressure, WATER,
             {"e": _VAPOUR, "p": _TOTAL}, "common-practice", "partial pressures of an ideal mixture",
             (pressure_bound("p"),
              Bound("e", "it lies from zero to below the pressure of the gas",
                    "Check the temperatures and the pressure: the gas cannot hold more vapour than there is pressure, nor less than none.",
                    low=0.0, high="p", low_allowed=True))),
    Relation("vapour_pressure_from_relative_humidity", "Vapour pressure at the relative humidity",
             humidity.vapour_pressure_from_relative_humidity, _VAPOUR,
             {"phi": Symbol("φ", "", "1", "relative humidity", "dimensionless"), "p_s": _SATURATION}, "common-practice",
             "definition over the condensed phase",
             (Bound("phi", "a relative humidity lies from 0 to 100 %", "Give the relative humidity in percent.",
                    low=0.0, high=1.0, low_allowed=True, high_allowed=True),)),
    Relation("vapour_pressure_from_wet_bulb", "Vapour pressure by the psychrometer", humidity.vapour_pressure_from_wet_bulb, _VAPOUR,
             {"p_w": marked(PRESSURE, "s,wet", "saturation pressure at the wet bulb"),
              "A": Symbol("A", "", "1/K", "psychrometer constant"), "p": _TOTAL,
              "T_d": marked(TEMPERATURE, "dry", "temperature of the dry bulb"),
              "T_w": marked(TEMPERATURE, "wet", "temperature of the wet bulb")}, "common-practice", "ventilated psychrometer, air-like gas",
             (Bound("T_w", "the wet bulb is not above the dry bulb", "Check that the two are not swapped.",
                    low=0.0, high="T_d", high_allowed=True), pressure_bound("p"))),
)

_MASS = Symbol("m", "water", "kg", "mass of water collected", "kg_s")
_AMOUNT = Symbol("n", "water", "mol", "amount of water collected", "mol_s")
_METERED = Symbol("V", "m", "m3", "dry gas volume metered")
_AMOUNT_OF_GAS = Symbol("n", "gas", "mol", "amount of dry gas metered", "mol_g")
_WATER_MASS = marked(MOLAR_MASS, "water", "molar mass of water")
_READ_VOLUME = "Give the volume the dry gas meter passed."
_WATER_MASS_BOUND = positive("M_water", "a molar mass is above zero", "Give it in g/mol.")
_COLLECTED = (
    Relation("mass_of_collected_water", "Mass of the water collected", humidity.mass_of_collected_water, _MASS,
             {"V_l": Symbol("V", "water", "m3", "volume of water collected"),
              "rho": Symbol("ρ", "water", "kg/m3", "density of water", "kg_s/m3")}, "us-epa-method-4", "",
             (_not_negative("V_l", "Read the impingers again."), positive("rho", "a density is above zero", "Give it in kg/m3."))),
    Relation("amount_of_collected_water", "Amount of the water collected", humidity.amount_of_collected_water, _AMOUNT,
             {"m": _MASS, "M_water": _WATER_MASS}, "us-epa-method-4", "",
             (_not_negative("m", "Weigh the water again, or leave the clause out."), _WATER_MASS_BOUND)),
    Relation("metered_volume", "Dry gas volume by the meter's calibration", humidity.metered_volume, _METERED,
             {"V_read": marked(_METERED, "read", "volume the meter shows"),
              "Y": Symbol("Y", "", "1", "calibration factor of the meter", "dimensionless")}, "us-epa-method-5", "",
             (positive("V_read", "it lies above zero", _READ_VOLUME),
              positive("Y", "a calibration factor is above zero", "Give it as on the meter's certificate, near 1."))),
    Relation("amount_of_metered_gas", "Amount of the dry gas metered", humidity.amount_of_metered_gas, _AMOUNT_OF_GAS,
             {"V": _METERED, "p": marked(PRESSURE, "m", "pressure at the meter"),
              "T": marked(TEMPERATURE, "m", "temperature at the meter"), "Z": COMPRESSION_FACTOR, "R": GAS_CONSTANT},
             "us-epa-method-4", "",
             (positive("V", "it lies above zero", _READ_VOLUME), pressure_bound("p"), temperature_bound("T"))),
    Relation("water_from_amounts", "Water content from the water collected", humidity.water_from_amounts, WATER,
             {"n_w": Symbol("n", "water", "mol", "amount of water collected", "mol_g"), "n_g": _AMOUNT_OF_GAS}, "us-epa-method-4", "",
             (_not_negative("n_w", "Weigh the water again."), positive("n_g", "it lies above zero", _READ_VOLUME))),
)

_PER_DRY_GAS = Symbol("X", "", "1", "water per amount of dry gas", "mol_s/mol_g")
_CONCENTRATION = marked(MASS_CONCENTRATION, "water", "mass of water per volume of dry gas")
_RATIOS = (
    Relation("water_per_dry_gas_from_mass_concentration", "Water per dry gas from its mass concentration",
             humidity.water_per_dry_gas_from_mass_concentration, _PER_DRY_GAS,
             {"g": _CONCENTRATION, "M_water": _WATER_MASS, "p": PRESSURE, "T": TEMPERATURE, "Z": COMPRESSION_FACTOR, "R": GAS_CONSTANT},
             "en-14790", "",
             (_not_negative("g", "Give the mass of water per volume of dry gas."), _WATER_MASS_BOUND, pressure_bound("p"),
              temperature_bound("T"))),
    Relation("water_per_dry_gas_from_mixing_ratio", "Water per dry gas from its mass ratio",
             humidity.water_per_dry_gas_from_mixing_ratio, _PER_DRY_GAS,
             {"r": Symbol("r", "", "1", "mass of water per mass of dry gas", "kg_s/kg_g"),
              "M_dry": marked(GAS_MOLAR_MASS, "dry", "molar mass of the dry gas"), "M_water": _WATER_MASS}, "common-practice", "",
             (_not_negative("r", "Give kg of water per kg of dry gas."), _WATER_MASS_BOUND)),
    Relation("water_from_water_per_dry_gas", "Water content of the wet gas", humidity.water_from_water_per_dry_gas, WATER,
             {"X": Symbol("X", "", "1", "water per amount of dry gas", "dimensionless")}, "en-14790", "",
             (_not_negative("X", "Check the water it was made from."),)),
)

_Y = Symbol("y", "", "1", "content per amount or volume of gas", "dimensionless")
_READ = marked(_Y, "cooled", "content read behind the cooler")
_LEFT = marked(WATER, "r", "water left by the cooler")
_LEFT_BOUND = Bound("h_r", "the water left lies from 0 up to, but not including, 100 %",
                    "Give the temperature and the pressure of the cooler.", low=0.0, high=1.0, low_allowed=True)
_COOLED = (
    Relation("dry_from_cooled", "Behind the cooler to dry", humidity.dry_from_cooled, marked(_Y, "dry", "content of the dry gas"),
             {"y": _READ, "h_r": _LEFT}, "common-practice", "", (_LEFT_BOUND,)),
    Relation("wet_from_cooled", "Behind the cooler to wet", humidity.wet_from_cooled, marked(_Y, "wet", "content of the wet gas"),
             {"y": _READ, "h": WATER, "h_r": _LEFT}, "common-practice", "",
             (WATER_BOUND,
              Bound("h_r", "a cooler leaves no more water than there was", "Use the water content itself where the cooler takes none out.",
                    low=0.0, high="h", low_allowed=True, high_allowed=True))),
)

RELATIONS = (*_FROM_VAPOUR, *_COLLECTED, *_RATIOS, *_COOLED)

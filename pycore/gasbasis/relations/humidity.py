"""Relations of the water content."""
from __future__ import annotations

import math

from gasbasis.physics import humidity
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import COMPRESSION_FACTOR, GAS_CONSTANT, PRESSURE, TEMPERATURE, WATER, marked, positive, pressure_bound, temperature_bound

_VAPOUR = marked(PRESSURE, "w", "partial pressure of the water vapour")
_SATURATION = marked(PRESSURE, "s", "saturation pressure of water")
_TOTAL = marked(PRESSURE, "", "pressure of the gas")
_WATER_MASS = Symbol("M", "water", "kg/mol", "molar mass of water", "kg_s/mol_s")
_DRY_MASS = Symbol("M", "dry", "kg/mol", "molar mass of the dry gas", "kg_g/mol_g")
_AMOUNT_WATER = Symbol("n", "water", "mol", "amount of water collected", "mol_s")
_AMOUNT_GAS = Symbol("n", "gas", "mol", "amount of dry gas metered", "mol_g")
_RATIO = Symbol("X", "", "1", "water per amount of dry gas", "mol_s/mol_g")
_PROOF_R = Symbol("R", "", "J/(mol K)", "molar gas constant", "J/(mol_g*K)")
_NOT_NEGATIVE = dict(low=0.0, high=math.inf, low_allowed=True)

RELATIONS = (
    Relation("water_from_vapour_pressure", "Water content from the vapour pressure", humidity.water_from_vapour_pressure, WATER,
             {"e": _VAPOUR, "p": _TOTAL}, "common-practice", "partial pressures of an ideal mixture", (pressure_bound("p"), Bound("e", "it lies from zero to below the pressure of the gas",
             "Check the dew point and the pressure: the gas would boil its water.", low=0.0, high="p", low_allowed=True))),
    Relation("vapour_pressure_from_relative_humidity", "Vapour pressure at the relative humidity", humidity.vapour_pressure_from_relative_humidity,
             _VAPOUR, {"phi": Symbol("φ", "", "1", "relative humidity", "dimensionless"), "p_s": _SATURATION}, "common-practice", "definition over the condensed phase",
             (Bound("phi", "a relative humidity lies from 0 to 100 %", "Give the relative humidity in percent.", low=0.0, high=1.0, low_allowed=True, high_allowed=True),)),
    Relation("vapour_pressure_from_wet_bulb", "Vapour pressure by the psychrometer", humidity.vapour_pressure_from_wet_bulb, _VAPOUR,
             {"p_w": marked(PRESSURE, "s,wet", "saturation pressure at the wet bulb"), "A": Symbol("A", "", "1/K", "psychrometer constant", "1/K"), "p": _TOTAL,
              "T_d": marked(TEMPERATURE, "dry", "temperature of the dry bulb"), "T_w": marked(TEMPERATURE, "wet", "temperature of the wet bulb")},
             "common-practice", "ventilated psychrometer, air-like gas",
             (Bound("T_w", "the wet bulb is not above the dry bulb", "Check that the two are not swapped.", low=0.0, high="T_d", high_allowed=True), pressure_bound("p"))),
    Relation("mass_of_collected_water", "Mass of the water collected", humidity.mass_of_collected_water, Symbol("m", "water", "kg", "mass of water collected", "kg_s"),
             {"V_l": Symbol("V", "water", "m3", "volume of water collected", "m**3"), "rho": Symbol("ρ", "water", "kg/m3", "density of water", "kg_w/m**3")},
             "us-epa-method-4", "", (Bound("V_l", "it cannot be negative", "Read the impingers again.", **_NOT_NEGATIVE),)),
    Relation("amount_of_collected_water", "Amount of the water collected", humidity.amount_of_collected_water, _AMOUNT_WATER,
             {"m": Symbol("m", "water", "kg", "mass of water collected", "kg_s"), "M_water": _WATER_MASS}, "us-epa-method-4", "",
             (Bound("m", "it cannot be negative", "Weigh the water again, or leave the clause out.", **_NOT_NEGATIVE),)),
    Relation("amount_of_metered_gas", "Amount of the dry gas metered", humidity.amount_of_metered_gas, _AMOUNT_GAS,
             {"V": Symbol("V", "", "m3", "dry gas volume metered", "m**3"), "p": marked(PRESSURE, "m", "pressure at the meter"), "T": marked(TEMPERATURE, "m", "temperature at the meter"),
              "Z": COMPRESSION_FACTOR, "R": GAS_CONSTANT}, "us-epa-method-4", "",
             (positive("V", "it lies above zero", "Give the volume the dry gas meter passed."), pressure_bound("p"), temperature_bound("T"))),
    Relation("water_from_amounts", "Water content from the water collected", humidity.water_from_amounts, WATER, {"n_w": _AMOUNT_WATER, "n_g": _AMOUNT_GAS}, "us-epa-method-4"),
    Relation("water_per_dry_gas_from_mass_concentration", "Water per dry gas from its mass concentration", humidity.water_per_dry_gas_from_mass_concentration, _RATIO,
             {"g": Symbol("γ", "water", "kg/m3", "mass of water per volume of dry gas", "kg_s/m3"), "M_water": _WATER_MASS, "p": PRESSURE, "T": TEMPERATURE, "Z": COMPRESSION_FACTOR, "R": _PROOF_R},
             "en-14790", "", (Bound("g", "it cannot be negative", "Give the mass of water per volume of dry gas.", **_NOT_NEGATIVE), pressure_bound("p"), temperature_bound("T"))),
    Relation("water_per_dry_gas_from_mixing_ratio", "Water per dry gas from its mass ratio", humidity.water_per_dry_gas_from_mixing_ratio, _RATIO,
             {"r": Symbol("r", "", "1", "mass of water per mass of dry gas", "kg_s/kg_g"), "M_dry": _DRY_MASS, "M_water": _WATER_MASS}, "common-practice", "",
             (Bound("r", "it cannot be negative", "Give kg of water per kg of dry gas.", **_NOT_NEGATIVE),)),
    Relation("water_from_water_per_dry_gas", "Water content of the wet gas", humidity.water_from_water_per_dry_gas, WATER, {"X": _RATIO}, "en-14790"),
)

"""Relations of flow in a duct and of what it carries."""
from __future__ import annotations

import inspect
import math
from functools import lru_cache

from gasbasis.physics import flow, fuel_heat
from gasbasis.physics.elementary import sqrt
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import GAS_CONSTANT, MASS_CONCENTRATION, PRESSURE, TEMPERATURE, WATER, marked, positive, pressure_bound, temperature_bound

_VELOCITY = Symbol("v", "", "m/s", "mean velocity of the gas")
_AREA = Symbol("A", "", "m2", "cross-section of the duct")
_FLOW = Symbol("q", "V", "m3/s", "volume flow")
_MASS_RATE = Symbol("m", "t", "kg/s", "mass rate of the species", "kg_s/s")
_PER_HEAT = Symbol("E", "", "kg/J", "mass of the species per heat of fuel", "kg_s/J")
_POWER = Symbol("P", "", "J/s", "heat of fuel per time")
_ROOT = Symbol("s", "", "Pa^0.5", "mean root of the velocity pressures", "Pa**0.5")
_AMBIENT = Symbol("A", "", "1", "oxygen of ambient air, as the rule counts it", "dimensionless")
# In a velocity the gas's mass is the mass that force accelerates: plain kilograms in the proof.
_GAS_MASS = Symbol("M", "gas", "kg/mol", "molar mass of the wet gas", "kg/mol_g")
_FLOWING = "It is a flow: give it as a positive number."


def _length(letter: str, meaning: str) -> Symbol:
    return Symbol(letter, "", "m", meaning)


def _factor(mark: str, meaning: str) -> Symbol:
    return Symbol("F", mark, "m3/J", meaning)


def _above_zero(argument: str, what: str) -> Bound:
    return positive(argument, f"{what} is above zero", "Check its sign and unit.")


@lru_cache(maxsize=None)
def mean_of_roots(points: int) -> Relation:
    """The mean of the square roots of so many velocity pressures; arguments dp_1, dp_2, ..."""
    symbols = {f"dp_{index}": Symbol("Δp", str(index), "Pa", f"velocity pressure at traverse point {index}") for index in range(1, points + 1)}

    def mean(**values):
        total = sqrt(values["dp_1"])
        for index in range(2, points + 1):
            total = total + sqrt(values[f"dp_{index}"])
        return total / points

    mean.__signature__ = inspect.Signature([inspect.Parameter(name, inspect.Parameter.KEYWORD_ONLY) for name in symbols])
    bounds = tuple(Bound(name, "a velocity pressure is not negative", "Swap the two legs of the pitot tube, or leave the point out with the reason.",
                         low=0.0, high=math.inf, low_allowed=True) for name in symbols)
    return Relation(f"mean_of_roots_of_{points}", "Mean root of the velocity pressures", mean, _ROOT, symbols, "us-epa-method-2", "eq. 2-7", bounds,
                    "The roots are averaged, never the pressures." if points > 1 else "")


_BELOW_AMBIENT = "it must lie below the ambient oxygen the rule counts from"
_CHECK = "Check the reading: near ambient oxygen the sample was mostly air."
_GROSS = "The factor counts per gross heat; at 20 °C and 1 atm."
_K = {name: Symbol("K", mark, "m3/kg", f"coefficient of {word}") for name, mark, word in (
    ("K_h", "h", "hydrogen"), ("K_c", "c", "carbon"), ("K_s", "s", "sulphur"), ("K_n", "n", "nitrogen"), ("K_o", "o", "oxygen"))}
_CONTENT = {name: Symbol(name, "", "kg/kg", f"{word} of the fuel", "dimensionless") for name, word in (
    ("H", "hydrogen"), ("C", "carbon"), ("S", "sulphur"), ("N", "nitrogen"), ("O", "oxygen"))}
_HEAT = Symbol("Q", "", "J/kg", "gross calorific value of the fuel")
_HEAT_BOUND = _above_zero("Q", "a calorific value")

RELATIONS = (
    Relation("duct_velocity", "Velocity in the duct", flow.duct_velocity, _VELOCITY,
             {"C_p": Symbol("C", "p", "1", "coefficient of the pitot tube", "dimensionless"), "s": _ROOT, "R": GAS_CONSTANT, "T": TEMPERATURE,
              "p": PRESSURE, "M": _GAS_MASS}, "us-epa-method-2", "eq. 2-7, in SI",
             (positive("C_p", "a pitot coefficient is above zero", "0.84 is common for an S type, 0.99 for a standard type: take it from the calibration."),
              temperature_bound(), pressure_bound(), _above_zero("M", "a molar mass"))),
    Relation("area_of_circle", "Cross-section of the duct", flow.area_of_circle, _AREA, {"pi": Symbol("π", "", "1", "circumference of a circle over its diameter", "dimensionless"), "D": _length("D", "inner diameter of the duct")}, "us-epa-method-2", "", (_above_zero("D", "a diameter"),)),
    Relation("area_of_rectangle", "Cross-section of the duct", flow.area_of_rectangle, _AREA, {"a": _length("a", "width of the duct"), "b": _length("b", "depth of the duct")},
             "us-epa-method-2", "", (_above_zero("a", "a width"), _above_zero("b", "a depth"))),
    Relation("volume_flow", "Flow in the duct", flow.volume_flow, _FLOW, {"v": _VELOCITY, "A": _AREA}, "us-epa-method-2", "", (_above_zero("A", "a cross-section"),)),
    Relation("mass_rate", "Concentration times flow", flow.mass_rate, _MASS_RATE, {"gamma": MASS_CONCENTRATION, "q": _FLOW}, "us-40-cfr-75", "Appendix F, one basis for both",
             (positive("q", "a flow is above zero", _FLOWING),)),
    Relation("mass_rate_from_heat_rate", "Mass rate from the heat of the fuel", flow.mass_rate_from_heat_rate, _MASS_RATE, {"E": _PER_HEAT, "P": _POWER}, "us-epa-method-19", "",
             (_above_zero("P", "a heat rate"),)),
    Relation("mass_per_heat_from_mass_rate", "Mass per heat of fuel", flow.mass_per_heat_from_mass_rate, _PER_HEAT, {"m": _MASS_RATE, "P": _POWER}, "us-epa-method-19", "",
             (_above_zero("P", "a heat rate"),)),
    Relation("rate_over_operation", "Over the hours of operation", flow.rate_over_operation, _MASS_RATE,
             {"m": marked(_MASS_RATE, "run", "mass rate while it runs"), "t": Symbol("t", "run", "s", "operation in a year"), "t_a": Symbol("t", "a", "s", "the whole year")}, "common-practice", "",
             (Bound("t", "it lies above 0, up to the hours of a year", "Give the hours of operation in a year, e.g. '6500 h/a'.", low=0.0, high="t_a", high_allowed=True),)),
    Relation("mass_per_output", "Mass per output", flow.mass_per_output, Symbol("E", "out", "kg/J", "mass of the species per output", "kg_s/J"),
             {"m": _MASS_RATE, "P": marked(_POWER, "out", "output")}, "common-practice", "", (_above_zero("P", "an output"),)),
    Relation("mass_per_product", "Mass per product", flow.mass_per_product, Symbol("e", "", "kg/kg", "mass of the species per mass of product", "kg_s/kg"),
             {"m": _MASS_RATE, "r": Symbol("r", "", "kg/s", "product per time")}, "common-practice", "", (_above_zero("r", "a production rate"),)),
    Relation("mass_per_heat_from_dry_oxygen", "Mass per heat of fuel, by oxygen", fuel_heat.mass_per_heat_from_dry_oxygen, _PER_HEAT,
             {"gamma": MASS_CONCENTRATION, "F_d": _factor("d", "dry gas per heat of fuel"), "A": _AMBIENT, "O": Symbol("O", "", "1", "measured oxygen, dry", "dimensionless")},
             "us-epa-method-19", "eq. 19-1", (_above_zero("F_d", "an F factor"), Bound("O", _BELOW_AMBIENT, _CHECK, low=0.0, high="A", low_allowed=True)), _GROSS),
    Relation("mass_per_heat_from_wet_oxygen", "Mass per heat of fuel, by wet oxygen", fuel_heat.mass_per_heat_from_wet_oxygen, _PER_HEAT,
             {"gamma": MASS_CONCENTRATION, "F_w": _factor("w", "wet gas per heat of fuel"), "A": _AMBIENT, "B": marked(WATER, "air", "water of the ambient air"),
              "O_wet": Symbol("O", "wet", "1", "measured oxygen, wet", "dimensionless")}, "us-epa-method-19", "eq. 19-2",
             (_above_zero("F_w", "an F factor"), Bound("O_wet", _BELOW_AMBIENT, _CHECK, low=0.0, high="A", low_allowed=True)), _GROSS),
    Relation("mass_per_heat_from_carbon_dioxide", "Mass per heat of fuel, by carbon dioxide", fuel_heat.mass_per_heat_from_carbon_dioxide, _PER_HEAT,
             {"gamma": MASS_CONCENTRATION, "F_c": _factor("c", "carbon dioxide per heat of fuel"), "CO2": Symbol("CO₂", "", "1", "measured carbon dioxide, dry", "dimensionless")},
             "us-epa-method-19", "eq. 19-6", (_above_zero("F_c", "an F factor"), positive("CO2", "it must lie above zero", "Give the carbon dioxide measured.")), _GROSS),
    Relation("dry_gas_factor", "F factor of the fuel, dry gas", fuel_heat.dry_gas_factor, _factor("d", "dry gas per heat of fuel"),
             {"K_h": _K["K_h"], "H": _CONTENT["H"], "K_c": _K["K_c"], "C": _CONTENT["C"], "K_s": _K["K_s"], "S": _CONTENT["S"], "K_n": _K["K_n"], "N": _CONTENT["N"],
              "K_o": _K["K_o"], "O": _CONTENT["O"], "Q": _HEAT}, "us-epa-method-19", "eq. 19-13", (_HEAT_BOUND,)),
    Relation("carbon_dioxide_factor", "F factor of the fuel, carbon dioxide", fuel_heat.carbon_dioxide_factor, _factor("c", "carbon dioxide per heat of fuel"),
             {"K_c": marked(_K["K_c"], "cc"), "C": _CONTENT["C"], "Q": _HEAT}, "us-epa-method-19", "eq. 19-15",
             (_HEAT_BOUND, positive("C", "a fuel without carbon has no carbon dioxide factor", "Use the dry gas factor: leave out 'by CO2'."))),
)

"""Relations of a collected sample and of a prepared gas."""
from __future__ import annotations

import math

from gasbasis.physics import mercury_vapour, preparation, sampling
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import (AMOUNT_FRACTION, COMPRESSION_FACTOR, GAS_CONSTANT, MASS_CONCENTRATION, MOLAR_MASS, PARTIAL_PRESSURE, PRESSURE, TEMPERATURE, marked,
                                        positive, pressure_bound, temperature_bound)

_MASS = Symbol("m", "", "kg", "mass of the species", "kg_s")
_VOLUME = Symbol("V", "", "m3", "volume of gas metered")
_TIME = Symbol("t", "", "s", "duration of sampling")
_METER = "Check the readings and their unit."
_A, _B = marked(MASS_CONCENTRATION, "a", "mass concentration by the first train"), marked(MASS_CONCENTRATION, "b", "mass concentration by the second train")
_VOLUME_BOUND = positive("V", "a metered volume is above zero", _METER)


def _mass(mark: str, meaning: str) -> Symbol:
    return marked(_MASS, mark, meaning)


_SAMPLE = (
    Relation("volume_between", "Volume between two readings", sampling.volume_between, _VOLUME,
             {"V_end": marked(_VOLUME, "end", "reading of the meter at the end"), "V_start": marked(_VOLUME, "start", "reading of the meter at the start")}, "us-epa-method-5", "",
             (Bound("V_end", "the meter's end must lie above its start", "Check the two readings: are they swapped, or did the counter turn over?", low="V_start", high=math.inf),)),
    Relation("mass_of_sections", "Both sections together", sampling.mass_of_sections, _MASS, {"m_front": _mass("1", "mass in the first section"), "m_back": _mass("2", "mass in the second section")},
             "us-epa-method-30b", ""),
    Relation("mass_less_blank", "Field blank subtracted", sampling.mass_less_blank, _MASS, {"m": _mass("found", "mass found"), "m_blank": _mass("blank", "mass in the field blank")},
             "common-practice", "a choice of the method"),
    Relation("mass_for_recovery", "Corrected for recovery", sampling.mass_for_recovery, _MASS, {"m": _mass("found", "mass found"), "r": Symbol("r", "", "1", "recovery", "dimensionless")},
             "common-practice", "a choice of the method", (positive("r", "a recovery is above zero", "Give it in percent, e.g. 'recovery 96 %'."),)),
    Relation("mass_concentration_of_sample", "Mass in the volume metered", sampling.mass_concentration_of_sample, MASS_CONCENTRATION, {"m": _MASS, "V": _VOLUME}, "us-epa-method-5", "", (_VOLUME_BOUND,)),
    Relation("mean_of_two_trains", "Mean of the two trains", sampling.mean_of_two_trains, MASS_CONCENTRATION, {"gamma_a": _A, "gamma_b": _B}, "us-epa-method-30b", "8.2.6.2"),
    Relation("relative_difference_of_trains", "How far the two trains differ", sampling.relative_difference_of_trains, Symbol("d", "", "1", "relative difference of the trains", "dimensionless"),
             {"gamma_a": _A, "gamma_b": _B}, "us-epa-method-30b", "eq. 30B-9"),
    Relation("breakthrough", "Breakthrough", sampling.breakthrough, Symbol("B", "", "1", "second section over first", "dimensionless"),
             {"m_back": _mass("2", "mass in the second section"), "m_front": _mass("1", "mass in the first section")}, "us-epa-method-30b", "eq. 30B-3"),
    Relation("mean_rate", "Mean sampling rate", sampling.mean_rate, Symbol("q", "", "m3/s", "sampling rate"), {"V": _VOLUME, "t": _TIME}, "us-epa-method-5", "",
             (positive("t", "a duration is above zero", "Give it in minutes or hours."),)),
)

_FLOW = Symbol("q", "", "m3/s", "volume flow as the controller counts it")
_AMOUNT_FLOW = Symbol("n", "t", "mol/s", "amount flow", "mol_g/s")
_FLOW_BOUND = positive("q", "a flow is above zero", "Check the sign and the unit of the flow.")
_PREPARED = (
    Relation("amount_flow", "Amount flow of a flow controller", preparation.amount_flow, _AMOUNT_FLOW,
             {"q": _FLOW, "p": marked(PRESSURE, "", "pressure the controller counts at"), "T": marked(TEMPERATURE, "", "temperature the controller counts at"), "Z": COMPRESSION_FACTOR, "R": GAS_CONSTANT},
             "common-practice", "gas law", (_FLOW_BOUND, pressure_bound(), temperature_bound())),
    Relation("diluted_amount_fraction", "Diluted cylinder gas", preparation.diluted_amount_fraction, AMOUNT_FRACTION,
             {"x": marked(AMOUNT_FRACTION, "cyl", "amount fraction in the cylinder"), "n_c": marked(_AMOUNT_FLOW, "cyl", "amount flow from the cylinder"),
              "n_d": marked(_AMOUNT_FLOW, "dil", "amount flow of the dilution gas")}, "iso-6145-7", ""),
    Relation("mass_concentration_of_permeation", "Permeation into the flow", preparation.mass_concentration_of_permeation, MASS_CONCENTRATION,
             {"m": Symbol("m", "t", "kg/s", "mass rate of the permeation device", "kg_s/s"), "q": _FLOW}, "iso-6145-10", "", (_FLOW_BOUND,)),
    Relation("mass_of_vapour", "Mass in the volume of vapour", preparation.mass_of_vapour, _MASS,
             {"gamma": marked(MASS_CONCENTRATION, "sat", "mass concentration of the saturated vapour"), "V": marked(_VOLUME, "vap", "volume of saturated vapour")}, "dumarey-1985", ""),
    Relation("mass_concentration_of_injection", "Vapour in the volume of gas", preparation.mass_concentration_of_injection, MASS_CONCENTRATION,
             {"m": _MASS, "V": marked(_VOLUME, "gas", "volume of gas it is in")}, "dumarey-1985", "", (_VOLUME_BOUND,)),
)

_RANGE = Bound("T", "the equation is for liquid mercury near ambient: 234.3156 K to 400 K", "Give the temperature of the vapour's bottle.", low=234.3156, high=400.0, low_allowed=True,
               high_allowed=True)
_VAPOUR = marked(PARTIAL_PRESSURE, "s", "vapour pressure of mercury")
_MERCURY = (
    Relation("saturated_mass_concentration", "Saturated mercury vapour, Dumarey", mercury_vapour.saturated_mass_concentration, marked(MASS_CONCENTRATION, "sat", "mass concentration of the saturated vapour"),
             {"T": TEMPERATURE, "A": Symbol("A", "", "1", "coefficient A of the equation", "dimensionless"), "B": Symbol("B", "", "K", "coefficient B of the equation"),
              "D": Symbol("D", "", "kg K/m3", "coefficient D of the equation", "kg_s*K/m3")}, "dumarey-1985", "", (_RANGE,)),
    Relation("vapour_pressure_of_mercury", "Vapour pressure of mercury", mercury_vapour.vapour_pressure, Symbol("p", "s", "Pa", "vapour pressure of mercury"),
             {"T": TEMPERATURE, "T_c": marked(TEMPERATURE, "c", "critical temperature of mercury"), "p_c": marked(PRESSURE, "c", "critical pressure of mercury"),
              **{f"a_{i}": Symbol("a", str(i), "1", f"coefficient a{i} of the equation", "dimensionless") for i in range(1, 7)},
              **{f"e_{i}": Symbol("e", str(i), "1", f"coefficient e{i} of the equation", "dimensionless") for i in range(2, 7)}}, "huber-2006", "eq. 4", (_RANGE,)),
    Relation("mass_concentration_of_vapour", "Saturated mercury vapour", mercury_vapour.mass_concentration_of_vapour, marked(MASS_CONCENTRATION, "sat", "mass concentration of the saturated vapour"),
             {"p_s": Symbol("p", "s", "Pa", "vapour pressure of mercury"), "M": MOLAR_MASS, "R": Symbol("R", "", "J/(mol K)", "molar gas constant", "J/(mol_s*K)"), "T": TEMPERATURE},
             "huber-2006", "with the gas law", (temperature_bound(),)),
)

RELATIONS = (*_SAMPLE, *_PREPARED, *_MERCURY)

"""Relations of the compression factor by ISO 6976."""
from __future__ import annotations

from gasbasis.physics import compression
from gasbasis.relations.mixture import SUMMATION_FACTOR
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import (COMPRESSION_FACTOR, GAS_CONSTANT, GAS_MOLAR_MASS, PRESSURE, TEMPERATURE, marked, positive,
                                        pressure_bound, temperature_bound)


RELATIONS = (
    Relation("compression_factor", "Compression factor", compression.compression_factor, COMPRESSION_FACTOR,
             {"p": PRESSURE, "p_0": marked(PRESSURE, "0", "pressure the factors are tabulated at"), "s": SUMMATION_FACTOR}, "iso-6976-2016", "eq. 1",
             (Bound("p", "the summation factors hold from 90 kPa to 110 kPa", "At other pressures another equation of state is needed.",
                    low=90e3, high=110e3, low_allowed=True, high_allowed=True), pressure_bound("p_0"))),
    Relation("density", "Density of the gas", compression.density, Symbol("ρ", "", "kg/m3", "density of the gas", "kg_g/m3"),
             {"p": PRESSURE, "M_gas": GAS_MOLAR_MASS, "Z": COMPRESSION_FACTOR, "R": GAS_CONSTANT, "T": TEMPERATURE}, "iso-6976-2016",
             "eq. 8",
             (pressure_bound(), temperature_bound(), positive("Z", "a compression factor is above zero", "Check the gas model."))),
)

"""Relations of the compression factor by ISO 6976."""
from __future__ import annotations

import inspect
from functools import lru_cache

from gasbasis.physics import compression
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import (COMPRESSION_FACTOR, GAS_CONSTANT, GAS_MOLAR_MASS, PRESSURE, TEMPERATURE, marked, positive,
                                        pressure_bound, temperature_bound)

_SUM = Symbol("s", "", "1", "summation factor of the gas", "dimensionless")

RELATIONS = (
    Relation("compression_factor", "Compression factor", compression.compression_factor, COMPRESSION_FACTOR,
             {"p": PRESSURE, "p_0": marked(PRESSURE, "0", "pressure the factors are tabulated at"), "s": _SUM}, "iso-6976-2016", "eq. 1",
             (Bound("p", "the summation factors hold from 90 kPa to 110 kPa", "At other pressures another equation of state is needed.",
                    low=90e3, high=110e3, low_allowed=True, high_allowed=True), pressure_bound("p_0"))),
    Relation("density", "Density of the gas", compression.density, Symbol("ρ", "", "kg/m3", "density of the gas", "kg_g/m3"),
             {"p": PRESSURE, "M_gas": GAS_MOLAR_MASS, "Z": COMPRESSION_FACTOR, "R": GAS_CONSTANT, "T": TEMPERATURE}, "iso-6976-2016",
             "eq. 8",
             (pressure_bound(), temperature_bound(), positive("Z", "a compression factor is above zero", "Check the gas model."))),
)


@lru_cache(maxsize=None)
def summation_factor_of_mixture(components: int) -> Relation:
    """Sum of x_j s_j over so many components; arguments x_1, s_1, x_2, s_2, ..."""
    names = [f"{letter}_{index}" for index in range(1, components + 1) for letter in "xs"]

    def mixture(**values):
        total = values["x_1"] * values["s_1"]
        for index in range(2, components + 1):
            total = total + values[f"x_{index}"] * values[f"s_{index}"]
        return total

    mixture.__signature__ = inspect.Signature([inspect.Parameter(name, inspect.Parameter.KEYWORD_ONLY) for name in names])
    symbols = {}
    for index in range(1, components + 1):
        symbols[f"x_{index}"] = Symbol("x", str(index), "1", f"amount fraction of component {index}", "dimensionless")
        symbols[f"s_{index}"] = Symbol("s", str(index), "1", f"summation factor of component {index}", "dimensionless")
    return Relation(f"summation_factor_of_mixture_of_{components}", "Summation factor of the gas from its composition", mixture, _SUM,
                    symbols, "iso-6976-2016", "eq. 1")

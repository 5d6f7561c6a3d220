"""Relations of the compression factor by ISO 6976 and by AGA8 DETAIL."""
from __future__ import annotations

from gasbasis.physics import compression
from gasbasis.physics import detail as compression_by_detail
from gasbasis.relations.mixture import SUMMATION_FACTOR
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import (COMPRESSION_FACTOR, GAS_CONSTANT, GAS_MOLAR_MASS, PRESSURE, TEMPERATURE, marked, positive,
                                        pressure_bound, temperature_bound)

_AMOUNT_DENSITY = Symbol("d", "", "mol/m3", "amount density of the gas", "mol_g/m3")
_ROOT = marked(_AMOUNT_DENSITY, "0", "amount density found by iteration")
_SLOPE = positive("p_d", "at a stable gas the pressure rises with the density", "The gas may be about to condense: check temperature, pressure and composition.")

RELATIONS = (
    Relation("compression_factor", "Compression factor", compression.compression_factor, COMPRESSION_FACTOR,
             {"p": PRESSURE, "p_0": marked(PRESSURE, "0", "pressure the factors are tabulated at"), "s": SUMMATION_FACTOR}, "iso-6976-2016", "eq. 1",
             (Bound("p", "the summation factors hold from 90 kPa to 110 kPa", "At other pressures another equation of state is needed.",
                    low=90e3, high=110e3, low_allowed=True, high_allowed=True), pressure_bound("p_0"))),
    Relation("amount_density_step", "Amount density by AGA8 DETAIL, solved", compression_by_detail.amount_density_step, _AMOUNT_DENSITY,
             {"d_0": _ROOT, "p": PRESSURE, "p_0": marked(PRESSURE, "0", "pressure the equation gives at the density found"),
              "p_T": Symbol("p", "T", "Pa/K", "slope of the equation's pressure by temperature"), "T": TEMPERATURE,
              "T_0": marked(TEMPERATURE, "0", "temperature it was found at"),
              "p_d": Symbol("p", "d", "Pa m3/mol", "slope of the equation's pressure by density", "Pa*m3/mol_g")}, "aga8-part1", "DETAIL equation",
             (pressure_bound("p"), temperature_bound("T"), _SLOPE),
             "The last Newton step is written out: it carries the uncertainties of temperature and pressure."),
    Relation("compression_factor_from_amount_density", "Compression factor by AGA8 DETAIL", compression_by_detail.compression_factor_from_amount_density,
             COMPRESSION_FACTOR,
             {"p": PRESSURE, "d": _AMOUNT_DENSITY, "R": marked(GAS_CONSTANT, "", "molar gas constant of the equation"), "T": TEMPERATURE,
              "f": Symbol("f", "", "1", "what the equation itself is worth", "dimensionless")}, "aga8-part1", "definition of Z",
             (pressure_bound("p"), temperature_bound("T"), positive("d", "an amount density is above zero", "Check the pressure."))),
    Relation("density", "Density of the gas", compression.density, Symbol("ρ", "", "kg/m3", "density of the gas", "kg_g/m3"),
             {"p": PRESSURE, "M_gas": GAS_MOLAR_MASS, "Z": COMPRESSION_FACTOR, "R": GAS_CONSTANT, "T": TEMPERATURE}, "iso-6976-2016",
             "eq. 8",
             (pressure_bound(), temperature_bound(), positive("Z", "a compression factor is above zero", "Check the gas model."))),
)

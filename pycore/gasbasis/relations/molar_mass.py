"""Relations of the molar mass of the gas that carries the species."""
from __future__ import annotations

from gasbasis.physics import molar_mass
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import GAS_MOLAR_MASS, WATER, WATER_BOUND, marked, positive

_DRY = marked(GAS_MOLAR_MASS, "dry", "molar mass of the dry gas")
_WET = marked(GAS_MOLAR_MASS, "wet", "molar mass of the wet gas")
_WATER_MASS = marked(GAS_MOLAR_MASS, "water", "molar mass of water")
_POSITIVE = positive("M_dry", "a molar mass is above zero", "Give it in g/mol.")
_SHARE = ("it lies from 0 to 100 %", "Give the measured share in percent.")

RELATIONS = (
    Relation("molar_mass_of_wet_gas", "Molar mass of the wet gas", molar_mass.molar_mass_of_wet_gas, _WET,
             {"M_dry": _DRY, "h": WATER, "M_water": _WATER_MASS}, "us-epa-method-4", "", (WATER_BOUND, _POSITIVE)),
    Relation("molar_mass_of_combustion_gas", "Molar mass of the dry combustion gas", molar_mass.molar_mass_of_combustion_gas, _DRY,
             {"O2": Symbol("O₂", "", "1", "oxygen of the dry gas", "dimensionless"),
              "CO2": Symbol("CO₂", "", "1", "carbon dioxide of the dry gas", "dimensionless"),
              **{f"M_{gas}": marked(GAS_MOLAR_MASS, gas.replace("2", "₂"), f"molar mass of {name}, as the method rounds it")
                 for gas, name in (("O2", "oxygen"), ("CO2", "carbon dioxide"), ("N2", "nitrogen and carbon monoxide"))}},
             "us-epa-method-3", "eq. 3-1",
             (Bound("O2", *_SHARE, low=0.0, high=1.0, low_allowed=True), Bound("CO2", *_SHARE, low=0.0, high=1.0, low_allowed=True)),
             "A convention of the method: the rest counts as nitrogen, argon is left out."),
    Relation("relative_density", "Relative density", molar_mass.relative_density,
             Symbol("d", "", "1", "density relative to dry air, both ideal", "dimensionless"),
             {"M_gas": GAS_MOLAR_MASS, "M_air": marked(GAS_MOLAR_MASS, "air", "molar mass of dry air")}, "iso-6976-2016"),
)

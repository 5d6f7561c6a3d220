"""The gas law's relations."""
from __future__ import annotations

from gasbasis.physics import gas_law
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import (AMOUNT_CONCENTRATION, AMOUNT_FRACTION, COMPRESSION_FACTOR, GAS_CONSTANT,
                                        GAS_MOLAR_MASS, MASS_CONCENTRATION, MASS_FRACTION, MASS_PER_AMOUNT, MOLAR_MASS,
                                        PARTIAL_PRESSURE, PRESSURE, TEMPERATURE, marked, positive, pressure_bound,
                                        temperature_bound)

_SOURCE = "iso-14912"
_SYMBOLS: dict[str, Symbol] = {
    "x": AMOUNT_FRACTION, "w": MASS_FRACTION, "gamma": MASS_CONCENTRATION, "c": AMOUNT_CONCENTRATION,
    "p_i": PARTIAL_PRESSURE, "q": MASS_PER_AMOUNT, "p": PRESSURE, "T": TEMPERATURE, "Z": COMPRESSION_FACTOR,
    "R": GAS_CONSTANT, "M": MOLAR_MASS, "M_gas": GAS_MOLAR_MASS,
    "K": Symbol("K", "", "kg/m3", "mass concentration of the pure species, as the rule prints it", "kg_s*mol_g/(m3*mol_s)"),
    "V_m": Symbol("V", "m", "m3/mol", "molar volume of a gas", "m3/mol_g"),
    "p_1": marked(PRESSURE, "1", "pressure the volume is held at"), "p_2": marked(PRESSURE, "2", "pressure the volume is owed at"),
    "T_1": marked(TEMPERATURE, "1", "temperature the volume is held at"),
    "T_2": marked(TEMPERATURE, "2", "temperature the volume is owed at"),
    "Z_1": marked(COMPRESSION_FACTOR, "1", "compression factor at the held conditions"),
    "Z_2": marked(COMPRESSION_FACTOR, "2", "compression factor at the owed conditions"),
}
_BOUNDS: dict[str, Bound] = {
    **{name: temperature_bound(name) for name in ("T", "T_1", "T_2")},
    **{name: pressure_bound(name) for name in ("p", "p_1", "p_2")},
    **{name: positive(name, "a molar mass is above zero", "Give it in g/mol, e.g. 'M 28.9 g/mol'.") for name in ("M", "M_gas")},
    "K": positive("K", "a factor is above zero", "Leave out the rule-book."),
    "V_m": positive("V_m", "a molar volume is above zero", "Give it in L/mol."),
}


def _relation(function, result: str, title: str) -> Relation:
    names = function.__code__.co_varnames[:function.__code__.co_argcount]
    return Relation(function.__name__, title, function, _SYMBOLS[result], {name: _SYMBOLS[name] for name in names}, _SOURCE,
                    "gas law with compression factor", tuple(_BOUNDS[name] for name in names if name in _BOUNDS))


RELATIONS = (
    _relation(gas_law.mass_concentration_from_amount_fraction, "gamma", "Amount fraction to mass concentration"),
    _relation(gas_law.amount_fraction_from_mass_concentration, "x", "Mass concentration to amount fraction"),
    _relation(gas_law.amount_concentration_from_amount_fraction, "c", "Amount fraction to amount concentration"),
    _relation(gas_law.amount_fraction_from_amount_concentration, "x", "Amount concentration to amount fraction"),
    _relation(gas_law.partial_pressure_from_amount_fraction, "p_i", "Amount fraction to partial pressure"),
    _relation(gas_law.amount_fraction_from_partial_pressure, "x", "Partial pressure to amount fraction"),
    _relation(gas_law.mass_fraction_from_amount_fraction, "w", "Amount fraction to mass fraction"),
    _relation(gas_law.amount_fraction_from_mass_fraction, "x", "Mass fraction to amount fraction"),
    _relation(gas_law.mass_concentration_from_mass_fraction, "gamma", "Mass fraction to mass concentration"),
    _relation(gas_law.mass_fraction_from_mass_concentration, "w", "Mass concentration to mass fraction"),
    _relation(gas_law.mass_concentration_from_amount_concentration, "gamma", "Amount concentration to mass concentration"),
    _relation(gas_law.amount_concentration_from_mass_concentration, "c", "Mass concentration to amount concentration"),
    _relation(gas_law.mass_concentration_at_conditions, "gamma", "Mass concentration at other temperature and pressure"),
    _relation(gas_law.amount_concentration_at_conditions, "c", "Amount concentration at other temperature and pressure"),
    _relation(gas_law.molar_volume, "V_m", "Molar volume of the gas"),
    _relation(gas_law.mass_concentration_from_molar_volume, "gamma", "Amount fraction to mass concentration by a stated molar volume"),
    _relation(gas_law.amount_fraction_from_molar_volume, "x", "Mass concentration to amount fraction by a stated molar volume"),
    _relation(gas_law.mass_concentration_from_printed_factor, "gamma", "Amount fraction to mass concentration by the rule's factor"),
    _relation(gas_law.amount_fraction_from_printed_factor, "x", "Mass concentration to amount fraction by the rule's factor"),
    _relation(gas_law.mass_per_amount_of_gas_from_mass_fraction, "q", "Mass fraction to mass per amount of gas"),
    _relation(gas_law.mass_fraction_from_mass_per_amount_of_gas, "w", "Mass per amount of gas to mass fraction"),
)

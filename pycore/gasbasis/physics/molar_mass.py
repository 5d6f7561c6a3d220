"""Molar masses."""
from __future__ import annotations


def molar_mass(counts: dict[str, int], atomic_weights: dict[str, float]) -> float:
    """Sum of atomic weights times counts, in the weights' unit. Raises KeyError naming an unknown element."""
    return sum(number * atomic_weights[element] for element, number in counts.items())


def molar_mass_of_wet_gas(M_dry, h, M_water):
    """Molar mass of a wet gas. [kg/mol]"""
    return M_dry * (1 - h) + M_water * h


def molar_mass_of_combustion_gas(O2, CO2, M_O2, M_CO2, M_N2):
    """Dry molar mass of a combustion gas; the rest counts as nitrogen and argon is left out. [kg/mol]"""
    return M_O2 * O2 + M_CO2 * CO2 + M_N2 * (1 - O2 - CO2)


def relative_density(M_gas, M_air):
    """Density of a gas relative to dry air at the same conditions, both ideal. [1]"""
    return M_gas / M_air

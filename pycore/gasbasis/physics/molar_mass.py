"""Molar masses."""
from __future__ import annotations


def molar_mass(counts: dict[str, int], atomic_weights: dict[str, float]) -> float:
    """Sum of atomic weights times counts, in the weights' unit. Raises KeyError naming an unknown element."""
    return sum(number * atomic_weights[element] for element, number in counts.items())


def molar_mass_of_wet_gas(M_dry, h, M_water):
    """Molar mass of a wet gas. [kg/mol]"""
    return M_dry * (1 - h) + M_water * h


def molar_mass_of_combustion_gas(O2, CO2):
    """Dry molar mass of a combustion gas, 0.320 O2 + 0.440 CO2 + 0.280 (N2 + CO) in percent; argon is left out. [kg/mol]"""
    return (32.0 * O2 + 44.0 * CO2 + 28.0 * (1 - O2 - CO2)) / 1000


def relative_density(M_gas, M_air):
    """Density of a gas relative to dry air at the same conditions, both ideal. [1]"""
    return M_gas / M_air

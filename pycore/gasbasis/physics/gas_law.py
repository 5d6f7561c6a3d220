"""The gas law with a compression factor Z, p V = Z n R T, in the forms that restate a content."""
from __future__ import annotations


def mass_concentration_from_amount_fraction(x, p, M, Z, R, T):
    """Mass of a species in a volume of gas. [kg/m3]"""
    return x * p * M / (Z * R * T)


def amount_fraction_from_mass_concentration(gamma, p, M, Z, R, T):
    """Amount of a species per amount of gas. [mol/mol]"""
    return gamma * Z * R * T / (p * M)


def amount_concentration_from_amount_fraction(x, p, Z, R, T):
    """Amount of a species in a volume of gas. [mol/m3]"""
    return x * p / (Z * R * T)


def amount_fraction_from_amount_concentration(c, p, Z, R, T):
    """Amount of a species per amount of gas. [mol/mol]"""
    return c * Z * R * T / p


def partial_pressure_from_amount_fraction(x, p):
    """Partial pressure of a species. [Pa]"""
    return x * p


def amount_fraction_from_partial_pressure(p_i, p):
    """Amount of a species per amount of gas. [mol/mol]"""
    return p_i / p


def mass_fraction_from_amount_fraction(x, M, M_gas):
    """Mass of a species per mass of gas. [kg/kg]"""
    return x * M / M_gas


def amount_fraction_from_mass_fraction(w, M, M_gas):
    """Amount of a species per amount of gas. [mol/mol]"""
    return w * M_gas / M


def mass_concentration_from_mass_fraction(w, p, M_gas, Z, R, T):
    """Mass of a species in a volume of gas: its share of the density. [kg/m3]"""
    return w * p * M_gas / (Z * R * T)


def mass_fraction_from_mass_concentration(gamma, p, M_gas, Z, R, T):
    """Mass of a species per mass of gas. [kg/kg]"""
    return gamma * Z * R * T / (p * M_gas)


def mass_concentration_from_amount_concentration(c, M):
    """Mass of a species in a volume of gas. [kg/m3]"""
    return c * M


def amount_concentration_from_mass_concentration(gamma, M):
    """Amount of a species in a volume of gas. [mol/m3]"""
    return gamma / M


def mass_concentration_at_conditions(gamma, p_1, T_1, Z_1, p_2, T_2, Z_2):
    """The same content counted in a volume at other conditions. [kg/m3]"""
    return gamma * p_2 * T_1 * Z_1 / (p_1 * T_2 * Z_2)


def amount_concentration_at_conditions(c, p_1, T_1, Z_1, p_2, T_2, Z_2):
    """The same content counted in a volume at other conditions. [mol/m3]"""
    return c * p_2 * T_1 * Z_1 / (p_1 * T_2 * Z_2)


def mass_concentration_from_printed_factor(x, K):
    """Amount fraction times a mass concentration per amount fraction that a rule prints. [kg/m3]"""
    return x * K


def amount_fraction_from_printed_factor(gamma, K):
    """Mass concentration over the factor a rule prints. [mol/mol]"""
    return gamma / K


def mass_per_amount_of_gas_from_mass_fraction(w, M_gas):
    """Mass of a species per amount of gas. [kg/mol]"""
    return w * M_gas


def mass_fraction_from_mass_per_amount_of_gas(q, M_gas):
    """Mass of a species per mass of gas. [kg/kg]"""
    return q / M_gas


def molar_volume(Z, R, T, p):
    """Volume of one mole of gas. [m3/mol]"""
    return Z * R * T / p


def mass_concentration_from_molar_volume(x, M, V_m):
    """Mass of a species in a volume of gas, by a rule's own molar volume. [kg/m3]"""
    return x * M / V_m


def amount_fraction_from_molar_volume(gamma, M, V_m):
    """Amount of a species per amount of gas, by a rule's own molar volume. [mol/mol]"""
    return gamma * V_m / M

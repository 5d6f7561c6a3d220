"""Mass of a pollutant per heat of fuel from its concentration: the F-factor forms (US EPA Method 19), and F factors from an ultimate analysis.

Contents are fractions, F factors volumes per gross heat.
"""
from __future__ import annotations


def mass_per_heat_from_dry_oxygen(gamma, F_d, A, O):
    """Concentration and oxygen on dry gas. [kg/J]"""
    return gamma * F_d * A / (A - O)


def mass_per_heat_from_wet_oxygen(gamma, F_w, A, B, O_wet):
    """Concentration and oxygen on wet gas, B the water of the ambient air. [kg/J]"""
    return gamma * F_w * A / (A * (1 - B) - O_wet)


def mass_per_heat_from_carbon_dioxide(gamma, F_c, CO2):
    """Concentration and carbon dioxide on dry gas. [kg/J]"""
    return gamma * F_c / CO2


def dry_gas_factor(K_h, H, K_c, C, K_s, S, K_n, N, K_o, O, Q):
    """Dry gas per heat from an ultimate analysis in mass fractions and the gross calorific value Q. [m3/J]"""
    return (K_h * H + K_c * C + K_s * S + K_n * N - K_o * O) / Q


def carbon_dioxide_factor(K_c, C, Q):
    """Carbon dioxide per heat from the fuel's carbon. [m3/J]"""
    return K_c * C / Q

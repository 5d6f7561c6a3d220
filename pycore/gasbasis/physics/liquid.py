"""Densities of the liquids in pressure columns, at atmospheric pressure."""
from __future__ import annotations


def density_of_water(t, a_1, a_2, a_3, a_4, a_5):
    """Density of air-free water; t in degC. [kg/m3]"""
    return a_5 * (1 - (t + a_1) ** 2 * (t + a_2) / (a_3 * (t + a_4)))


def density_of_mercury(t, rho_0, b_1, b_2):
    """Density of mercury from its density and expansion at 0 degC; t in degC. [kg/m3]"""
    return rho_0 / (1 + b_1 * t + b_2 * t**2)

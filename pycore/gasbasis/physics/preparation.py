"""Prepared gas: flows brought together, a permeation device in a flow, a volume of saturated vapour in a volume of gas."""
from __future__ import annotations


def amount_flow(q, p, T, Z, R):
    """Amount per time, from a volume flow at the temperature and pressure its controller counts in. [mol/s]"""
    return p * q / (Z * R * T)


def diluted_amount_fraction(x, n_c, n_d):
    """A cylinder's amount fraction after its flow met a flow without the species. [mol/mol]"""
    return x * n_c / (n_c + n_d)


def mass_concentration_of_permeation(m, q):
    """Mass per time into a volume flow, on the flow's basis. [kg/m3]"""
    return m / q


def mass_of_vapour(gamma, V):
    """Mass in a volume of vapour. [kg]"""
    return gamma * V


def mass_concentration_of_injection(m, V):
    """Mass in a volume of gas, on that volume's basis. [kg/m3]"""
    return m / V

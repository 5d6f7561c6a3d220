"""Flow in a duct and what it carries: velocity from a pitot tube, volume flow, mass rate, rate per output."""
from __future__ import annotations

from gasbasis.physics.elementary import sqrt


def duct_velocity(C_p, s, R, T, p, M):
    """Mean velocity from the mean root of the velocity pressures s, with pressure, temperature and wet molar mass of the duct. [m/s]"""
    return C_p * s * sqrt(2 * R * T / (p * M))


def area_of_circle(pi, D):
    """Cross-section of a round duct. [m2]"""
    return pi / 4 * D ** 2


def area_of_rectangle(a, b):
    """Cross-section of a rectangular duct. [m2]"""
    return a * b


def volume_flow(v, A):
    """Volume flow as it is in the duct. [m3/s]"""
    return v * A


def mass_rate(gamma, q):
    """Mass per time, from concentration and flow on one and the same basis. [kg/s]"""
    return gamma * q


def mass_rate_from_heat_rate(E, P):
    """Mass per time, from mass per heat and heat per time. [kg/s]"""
    return E * P


def rate_over_operation(m, t, t_a):
    """Mass per year of a plant that runs for t of the t_a of a year, as a rate over the whole year. [kg/s]"""
    return m * t / t_a


def mass_per_output(m, P):
    """Mass per energy put out. [kg/J]"""
    return m / P


def mass_per_product(m, r):
    """Mass per mass of product. [kg/kg]"""
    return m / r


def mass_per_heat_from_mass_rate(m, P):
    """Mass per heat, from mass per time and heat per time. [kg/J]"""
    return m / P

"""Saturation pressure of water over liquid (Wagner and Pruss 1993) and over ice (IAPWS R14-08). Coefficients come from the facts."""
from __future__ import annotations

from gasbasis.physics.elementary import exp


def reduced_temperature_complement(T, T_c):
    """tau = 1 - T/Tc. [1]"""
    return 1 - T / T_c


def saturation_pressure_over_water(tau, T, T_c, p_c, a_1, a_2, a_3, a_4, a_5, a_6):
    """Saturation pressure over liquid water. [Pa]"""
    return p_c * exp(T_c / T * (a_1 * tau + a_2 * tau ** 1.5 + a_3 * tau ** 3
                               + a_4 * tau ** 3.5 + a_5 * tau ** 4 + a_6 * tau ** 7.5))


def reduced_temperature(T, T_t):
    """theta = T/Tt. [1]"""
    return T / T_t


def sublimation_pressure_over_ice(theta, p_t, a_1, a_2, a_3, b_1, b_2, b_3):
    """Saturation pressure over ice. [Pa]"""
    return p_t * exp((a_1 * theta ** b_1 + a_2 * theta ** b_2 + a_3 * theta ** b_3) / theta)

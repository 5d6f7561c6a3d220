"""Saturated mercury vapour by two published equations. Coefficients come from the facts."""
from __future__ import annotations

from gasbasis.physics.elementary import exp, log


def saturated_mass_concentration(T, A, B, D):
    """Dumarey: (D/T) 10^-(A + B/T). [kg/m3]"""
    return D / T * exp(-log(10.0) * (A + B / T))


def vapour_pressure(T, T_c, p_c, a_1, a_2, a_3, a_4, a_5, a_6, e_2, e_3, e_4, e_5, e_6):
    """Huber, Laesecke and Friend: ln(p/pc) = (Tc/T) sum a tau^e, tau = 1 - T/Tc, the first exponent 1. [Pa]"""
    tau = 1 - T / T_c
    return p_c * exp(T_c / T * (a_1 * tau + a_2 * tau ** e_2 + a_3 * tau ** e_3 + a_4 * tau ** e_4 + a_5 * tau ** e_5 + a_6 * tau ** e_6))


def mass_concentration_of_vapour(p_s, M, R, T):
    """Ideal vapour at its own pressure. [kg/m3]"""
    return p_s * M / (R * T)

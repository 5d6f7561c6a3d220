"""Absolute pressure from what is read: gauge, static, a column of liquid, an altitude (ISO 2533), a weather report."""
from __future__ import annotations


def absolute_pressure(p_b, p_g):
    """Barometer plus gauge or static pressure, which may be negative. [Pa]"""
    return p_b + p_g


def barometer_at_altitude(p_0, T_0, L, H, g, M, R):
    """Pressure of the standard atmosphere at a geopotential altitude below 11 km; T falls by L per metre. [Pa]"""
    return p_0 * (1 - L * H / T_0) ** (g * M / (R * L))


def barometer_from_sea_level(p_sl, T_0, L, H, g, M, R):
    """Pressure at the station, from one that a weather report has reduced to sea level. [Pa]"""
    return barometer_at_altitude(p_sl, T_0, L, H, g, M, R)


def liquid_column(rho, g, z):
    """Pressure under a column of liquid, which may be negative with its height. [Pa]"""
    return rho * g * z

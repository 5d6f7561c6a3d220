"""Water content of a gas from what is measured. h is the amount fraction of water vapour in the wet gas."""
from __future__ import annotations


def water_from_vapour_pressure(e, p):
    """From the partial pressure of the vapour. [mol/mol]"""
    return e / p


def vapour_pressure_from_relative_humidity(phi, p_s):
    """Partial pressure of the vapour at a relative humidity. [Pa]"""
    return phi * p_s


def vapour_pressure_from_wet_bulb(p_w, A, p, T_d, T_w):
    """Psychrometer: p_w is the saturation pressure at the wet bulb, A the psychrometer constant. [Pa]"""
    return p_w - A * p * (T_d - T_w)


def mass_of_collected_water(V_l, rho):
    """Mass of the water collected, from its volume. [kg]"""
    return V_l * rho


def amount_of_collected_water(m, M_water):
    """Amount of the water collected. [mol]"""
    return m / M_water


def metered_volume(V_read, Y):
    """Dry gas volume, from what the meter shows and its calibration factor. [m3]"""
    return V_read * Y


def amount_of_metered_gas(V, p, T, Z, R):
    """Amount of the dry gas metered. [mol]"""
    return p * V / (Z * R * T)


def water_from_amounts(n_w, n_g):
    """Water collected with a dry metered gas. [mol/mol]"""
    return n_w / (n_w + n_g)


def water_per_dry_gas_from_mass_concentration(g, M_water, p, T, Z, R):
    """Amount of water per amount of dry gas, from mass of water per volume of dry gas. [mol/mol]"""
    return g * Z * R * T / (M_water * p)


def water_per_dry_gas_from_mixing_ratio(r, M_dry, M_water):
    """Amount of water per amount of dry gas, from mass of water per mass of dry gas. [mol/mol]"""
    return r * M_dry / M_water


def water_from_water_per_dry_gas(X):
    """Water in the wet gas, from water per amount of dry gas. [mol/mol]"""
    return X / (1 + X)


def dry_from_cooled(y, h_r):
    """A content of the dry gas, from a reading behind a cooler that leaves the water h_r."""
    return y / (1 - h_r)


def wet_from_cooled(y, h, h_r):
    """A content of the wet gas, from a reading behind a cooler that leaves the water h_r of the gas's h."""
    return y * (1 - h) / (1 - h_r)

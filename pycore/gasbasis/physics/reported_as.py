"""The same content counted or weighed as another entity; n of it stand for one of the species."""
from __future__ import annotations


def amount_fraction_as(x, n):
    """Amount of the entity reported per amount of gas. [mol/mol]"""
    return x * n


def amount_concentration_as(c, n):
    """Amount of the entity reported in a volume of gas. [mol/m3]"""
    return c * n


def mass_concentration_as(gamma, n, M_as, M):
    """Mass of the entity reported in a volume of gas. [kg/m3]"""
    return gamma * n * M_as / M


def mass_fraction_as(w, n, M_as, M):
    """Mass of the entity reported per mass of gas. [kg/kg]"""
    return w * n * M_as / M

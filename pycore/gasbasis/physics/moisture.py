"""Wet and dry gas. h is the amount fraction of water vapour in the wet gas."""
from __future__ import annotations


def dry_from_wet(y, h):
    """A content of the dry gas from that of the wet gas; any content per amount or per volume of gas."""
    return y / (1 - h)


def wet_from_dry(y, h):
    """A content of the wet gas from that of the dry gas."""
    return y * (1 - h)


def oxygen_dry_from_wet(O_wet, h):
    """Oxygen of the dry gas. [mol/mol]"""
    return O_wet / (1 - h)


def oxygen_wet_from_dry(O_dry, h):
    """Oxygen of the wet gas. [mol/mol]"""
    return O_dry * (1 - h)


def carbon_dioxide_dry_from_wet(CO2_wet, h):
    """Carbon dioxide of the dry gas. [mol/mol]"""
    return CO2_wet / (1 - h)

"""Reference oxygen and carbon dioxide, all on dry gas. A is the rule's own oxygen of ambient air."""
from __future__ import annotations


def corrected_to_reference_oxygen(y, A, O_ref, O):
    """A content of the dry gas, as if the gas had been diluted with air to the reference oxygen."""
    return y * (A - O_ref) / (A - O)


def uncorrected_from_reference_oxygen(y, A, O_ref, O):
    """The content as measured, from one referred to a reference oxygen."""
    return y * (A - O) / (A - O_ref)


def referred_from_one_oxygen_to_another(y, A, O_hold, O_owe):
    """From one reference oxygen to another; the measured oxygen cancels."""
    return y * (A - O_owe) / (A - O_hold)


def corrected_to_reference_carbon_dioxide(y, CO2_ref, CO2):
    """A content of the dry gas, referred to a carbon dioxide content."""
    return y * CO2_ref / CO2


def fuel_factor(A, O, CO2):
    """Fuel factor Fo of a combustion gas. [1]"""
    return (A - O) / CO2

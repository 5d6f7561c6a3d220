"""The symbols relations share, so that one letter means one thing in every formula.

`proof` units belong to dimensions of the proof only: mol_s and kg_s are amount and mass of the
species, mol_g and kg_g of the gas, so that v/v and m/m cannot be taken for one another.
"""
from __future__ import annotations

import math

from gasbasis.relations.relation import Bound, Symbol

AMOUNT_FRACTION = Symbol("x", "", "1", "amount fraction", "mol_s/mol_g")
MASS_FRACTION = Symbol("w", "", "1", "mass fraction", "kg_s/kg_g")
MASS_CONCENTRATION = Symbol("γ", "", "kg/m3", "mass concentration", "kg_s/m3")
AMOUNT_CONCENTRATION = Symbol("c", "", "mol/m3", "amount concentration", "mol_s/m3")
PARTIAL_PRESSURE = Symbol("p", "i", "Pa", "partial pressure", "Pa*mol_s/mol_g")
MASS_PER_AMOUNT = Symbol("q", "", "kg/mol", "mass of the species per amount of gas", "kg_s/mol_g")
PRESSURE = Symbol("p", "", "Pa", "pressure")
TEMPERATURE = Symbol("T", "", "K", "temperature")
COMPRESSION_FACTOR = Symbol("Z", "", "1", "compression factor")
GAS_CONSTANT = Symbol("R", "", "J/(mol K)", "molar gas constant", "J/(mol_g*K)")
MOLAR_MASS = Symbol("M", "", "kg/mol", "molar mass of the species", "kg_s/mol_s")
GAS_MOLAR_MASS = Symbol("M", "gas", "kg/mol", "molar mass of the gas", "kg_g/mol_g")
WATER = Symbol("h", "", "1", "water content", "dimensionless")


def marked(symbol: Symbol, mark: str, meaning: str = "") -> Symbol:
    """The same quantity under another mark."""
    return Symbol(symbol.letter, mark, symbol.unit, meaning or symbol.meaning, symbol.proof)


def positive(argument: str, need: str, cure: str) -> Bound:
    return Bound(argument, need, cure, low=0.0, high=math.inf)


def temperature_bound(argument: str = "T") -> Bound:
    return positive(argument, "it must lie above absolute zero", "Give it in K, °C or °F, e.g. '20 °C'.")


def pressure_bound(argument: str = "p") -> Bound:
    return positive(argument, "an absolute pressure is above zero",
                    "Give the absolute pressure; a gauge pressure needs the barometer added.")


WATER_BOUND = Bound("h", "the water content lies from 0 up to, but not including, 100 %",
                    "Give the share of water vapour in the wet gas, e.g. '12 % H2O'.", low=0.0, high=1.0, low_allowed=True)

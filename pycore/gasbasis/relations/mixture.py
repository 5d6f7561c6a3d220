"""Relations over as many components as a gas has: sums of amount fractions times a property."""
from __future__ import annotations

import inspect
from functools import lru_cache

from gasbasis.relations.relation import Relation, Symbol
from gasbasis.relations.symbols import GAS_MOLAR_MASS

SUMMATION_FACTOR = Symbol("s", "", "1", "sum of x times summation factor", "dimensionless")


@lru_cache(maxsize=None)
def molar_mass_of_mixture(components: int) -> Relation:
    """The molar mass of a mixture of so many components; arguments x_1, M_1, x_2, M_2, ..."""
    return _sum_over_components("molar_mass_of_mixture", "Molar mass of the gas from its composition", components, GAS_MOLAR_MASS,
                                Symbol("M", "", "kg/mol", "molar mass of component", "kg_g/mol_g"), "eq. 5")


@lru_cache(maxsize=None)
def molar_mass_of_mixture_by_mass(components: int) -> Relation:
    """The molar mass of a mixture from mass fractions; arguments w_1, M_1, w_2, M_2, ..."""
    symbols: dict[str, Symbol] = {}
    for index in range(1, components + 1):
        symbols[f"w_{index}"] = Symbol("w", str(index), "1", f"mass fraction of component {index}", "dimensionless")
        symbols[f"M_{index}"] = Symbol("M", str(index), "kg/mol", f"molar mass of component {index}", "kg_g/mol_g")

    def mixture(**values):
        total = values["w_1"] / values["M_1"]
        for index in range(2, components + 1):
            total = total + values[f"w_{index}"] / values[f"M_{index}"]
        return 1 / total

    mixture.__signature__ = _signature(symbols)
    return Relation(f"molar_mass_of_mixture_by_mass_of_{components}", "Molar mass of the gas from its composition by mass", mixture, GAS_MOLAR_MASS, symbols,
                    "iso-14912", "mass fractions to amount fractions")


@lru_cache(maxsize=None)
def summation_factor_of_mixture(components: int) -> Relation:
    """Sum of x_j s_j over so many components; arguments x_1, s_1, x_2, s_2, ..."""
    return _sum_over_components("summation_factor_of_mixture", "Summation factor of the gas from its composition", components, SUMMATION_FACTOR,
                                Symbol("s", "", "1", "summation factor of component", "dimensionless"), "eq. 1")


def _sum_over_components(identity: str, title: str, components: int, result: Symbol, each: Symbol, locator: str) -> Relation:
    symbols: dict[str, Symbol] = {}
    for index in range(1, components + 1):
        symbols[f"x_{index}"] = Symbol("x", str(index), "1", f"amount fraction of component {index}", "dimensionless")
        symbols[f"{each.letter}_{index}"] = Symbol(each.letter, str(index), each.unit, f"{each.meaning} {index}", each.proof)

    def mixture(**values):
        total = values["x_1"] * values[f"{each.letter}_1"]
        for index in range(2, components + 1):
            total = total + values[f"x_{index}"] * values[f"{each.letter}_{index}"]
        return total

    mixture.__signature__ = _signature(symbols)
    return Relation(f"{identity}_of_{components}", title, mixture, result, symbols, "iso-6976-2016", locator)


def _signature(symbols) -> inspect.Signature:
    return inspect.Signature([inspect.Parameter(name, inspect.Parameter.KEYWORD_ONLY) for name in symbols])

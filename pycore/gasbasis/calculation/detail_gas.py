"""The AGA8 DETAIL equation solved for the amount density of a gas at a temperature and pressure; its ranges and what it is worth.

The sums over a composition are kept per composition, a solved state per composition, temperature and pressure.
"""
from __future__ import annotations

import math
from dataclasses import dataclass
from functools import lru_cache
from types import MappingProxyType
from typing import Mapping

from gasbasis import facts
from gasbasis.errors import NotConverged, OutOfRange
from gasbasis.physics import detail

Shares = tuple[tuple[str, float], ...]           # species id, amount fraction; sums to 1

NORMAL, EXTENDED = "normal", "extended"
_MOST_STEPS = 60
_SETTLED = 1e-13                       # of the density, relative
_BIGGEST_STEP = 0.5                    # of the density, relative: keeps Newton on the branch it started on
_ROOT_METRE = 0.1                      # (dm3/mol)^(1/3) in (m3/mol)^(1/3)
_SLACK = 1e-9                          # of a limit, relative: a share brought to 100 % may lie a rounding above it


@dataclass(frozen=True)
class State:
    """A solved state: the amount density [mol/m3], the pressure there [Pa] and its slopes [Pa m3/mol; Pa/K]."""

    temperature: float
    density: float
    pressure: float
    by_density: float
    by_temperature: float
    steps: int

    @property
    def Z(self) -> float:
        return self.pressure / (self.density * gas_constant() * self.temperature)


@dataclass(frozen=True)
class Mixture:
    """The temperature-free sums of one composition."""

    virial: tuple[float, ...]
    density: tuple[float, ...]
    K3: float


@lru_cache(maxsize=1)
def gas_constant() -> float:
    """The equation's own molar gas constant. [J/(mol K)]"""
    return float(facts.table("aga8_detail")["molar_gas_constant"])


@lru_cache(maxsize=1)
def _terms() -> tuple[Mapping[str, float], ...]:
    flags = ("f", "g", "q", "s", "w", "k")
    return tuple(MappingProxyType({name: int(text) if name in flags else float(text) for name, text in row.items()})
                 for row in facts.table("aga8_detail")["terms"])


@lru_cache(maxsize=1)
def _rows() -> dict[str, tuple[int, Mapping[str, float]]]:
    """Species id -> its place in the tables of pairs, and its parameters in SI."""
    found = {}
    for place, row in enumerate(facts.table("aga8_detail")["components"], start=1):
        numbers = {name: float(row[name]) for name in ("E", "K", "G", "Q", "F", "S", "W")}
        found[row["species"]] = place, {**numbers, "K": numbers["K"] * _ROOT_METRE}
    return found


def _pairs(letter: str, places: tuple[int, ...]) -> dict[tuple[int, int], float]:
    """The binary parameters among the components of a mixture, by their index in it."""
    index = {place: number for number, place in enumerate(places)}
    return {tuple(sorted((index[i], index[j]))): float(value) for i, j, value in facts.table("aga8_detail")["binary"][letter]
            if i in index and j in index}


@lru_cache(maxsize=32)
def _mixture(shares: Shares) -> Mixture:
    strange = [species for species, _ in shares if species not in _rows()]
    if strange:
        raise OutOfRange(f"{strange[0]} is not among the 21 components of AGA8 DETAIL.",
                         hint="Count it with the nearest component it has (heavier hydrocarbons with n-decane), or leave out 'real gas'.", field="gas.matrix_gas")
    x = tuple(share for _, share in shares)
    places, rows = zip(*(_rows()[species] for species, _ in shares))
    terms = _terms()
    E, U, K, G = (_pairs(letter, places) for letter in "EUKG")
    return Mixture(detail.second_virial_sums(x, rows, E, G, terms), detail.density_sums(x, rows, U, G, terms), detail.size_parameter(x, rows, K))


@lru_cache(maxsize=256)
def solve(shares: Shares, temperature: float, pressure: float) -> State:
    """The gas at a temperature [K] and pressure [Pa]. Raises NotConverged; OutOfRange for a component DETAIL does not know."""
    mixture, R, terms = _mixture(shares), gas_constant(), _terms()
    virial, virial_slopes = detail.at_temperature(mixture.virial, terms, temperature)
    C, C_slopes = detail.at_temperature(mixture.density, terms[12:], temperature)
    B, B_T = detail.second_virial(virial), detail.second_virial(virial_slopes)
    d = pressure / (R * temperature)
    for step in range(1, _MOST_STEPS + 1):
        Z, Z_d = detail.compression_factor(d, B, C, mixture.K3, terms)
        p, p_d = detail.pressure(d, temperature, R, Z), R * temperature * (Z + d * Z_d)
        if not math.isfinite(p) or p_d <= 0:
            break
        change = (pressure - p) / p_d
        if abs(change) <= _SETTLED * d:
            Z_T = detail.compression_factor(d, B_T, C_slopes, mixture.K3, terms)[0] - 1.0
            return State(temperature, d, p, p_d, R * d * (Z + temperature * Z_T), step)
        d += max(-_BIGGEST_STEP * d, min(_BIGGEST_STEP * d, change))
    raise NotConverged(f"The density of the gas at {temperature:.6g} K and {pressure:.6g} Pa was not found by AGA8 DETAIL.",
                       hint="The gas may be about to condense there: check temperature, pressure and composition.", field="gas.model")


def range_of(shares: Shares, temperature: float, pressure: float) -> tuple[str, tuple[str, ...]]:
    """Normal or extended, and what lies outside the normal range, in words. Raises OutOfRange beyond the extended one."""
    table = facts.table("aga8_ranges")
    outside: list[str] = []
    for name, value, factor, unit_text, field in (("temperature", temperature, 1.0, "K", "gas.temperature"), ("pressure", pressure, 1e6, "MPa", "gas.pressure")):
        _place(f"a {name} of {value / factor:.6g} {unit_text}", value / factor, table[NORMAL][name], table[EXTENDED][name], unit_text, field, outside)
    fractions = dict(shares)
    for row in table["components"]:
        percent = 100 * sum(fractions.get(species, 0.0) for species in row["species"])
        if percent:
            _place(f"{percent:.3g} % {' and '.join(row['species'])}", percent, row[NORMAL], row[EXTENDED], "%", "gas.matrix_gas", outside)
    return (EXTENDED if outside else NORMAL), tuple(outside)


def _place(words: str, value: float, normal, extended, unit_text: str, field: str, outside: list[str]) -> None:
    if not _within(value, extended):
        raise OutOfRange(f"{words[0].upper()}{words[1:]} lies outside what AGA8 DETAIL is for: {extended[0]} to {extended[1]} {unit_text}.",
                         hint="Give the compression factor's conditions inside it, or leave out 'real gas'.", field=field)
    if not _within(value, normal):
        outside.append(f"{words} (normal is {normal[0]} to {normal[1]} {unit_text})")


def _within(value: float, ends) -> bool:
    low, high = map(float, ends)
    return low - _SLACK * abs(low) <= value <= high * (1 + _SLACK)


def worth(range_name: str) -> tuple[float, str]:
    """The equation's relative standard uncertainty, and its print as expanded. [1]"""
    text = facts.table("aga8_ranges")[range_name]["uncertainty"]
    return float(text) / 200.0, text

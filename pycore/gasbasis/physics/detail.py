"""The DETAIL equation of state (AGA Report No. 8 Part 1, ISO 20765-1) in SI. Its parameters come from the facts.

First the sums over a composition, which hold at every state; then the coefficients at a temperature;
then compression factor and pressure at an amount density, with their slopes for a solver.
"""
from __future__ import annotations

from typing import Mapping, Sequence

from gasbasis.physics.elementary import exp

_SECOND_VIRIAL = 18                    # the first 18 terms make the second virial coefficient
_FIRST_IN_DENSITY = 12                 # terms 13 to 58 count in the reduced density


def _flagged(value: float, flag: int) -> float:
    """(value + 1 - flag)^flag: the factor where a term has it, else 1. [1]"""
    return value if flag else 1.0


def second_virial_sums(x: Sequence[float], rows: Sequence[Mapping[str, float]], E_star: Mapping, G_star: Mapping,
                       terms: Sequence[Mapping[str, float]]) -> tuple[float, ...]:
    """The sums over all pairs of components that term n of the second virial coefficient multiplies T^-u by. [m3/mol K^u]"""
    sums = [0.0] * _SECOND_VIRIAL
    count = len(x)
    for i in range(count):
        for j in range(i, count):
            one, other = rows[i], rows[j]
            weight = x[i] * x[j] * (1.0 if i == j else 2.0) * (one["K"] * other["K"]) ** 1.5
            E = E_star.get((i, j), 1.0) * (one["E"] * other["E"]) ** 0.5
            G = G_star.get((i, j), 1.0) * (one["G"] + other["G"]) / 2.0
            Q, F = one["Q"] * other["Q"], (one["F"] * other["F"]) ** 0.5
            S, W = one["S"] * other["S"], one["W"] * other["W"]
            for n, term in enumerate(terms[:_SECOND_VIRIAL]):
                sums[n] += (weight * term["a"] * E ** term["u"] * _flagged(G, term["g"]) * _flagged(Q, term["q"]) * _flagged(F, term["f"])
                            * _flagged(S, term["s"]) * _flagged(W, term["w"]))
    return tuple(sums)


def size_parameter(x: Sequence[float], rows: Sequence[Mapping[str, float]], K_star: Mapping) -> float:
    """K^3 of the mixture. [m3/mol]"""
    return _fifth_power_mean(x, [row["K"] for row in rows], K_star) ** 0.6


def _fifth_power_mean(x: Sequence[float], values: Sequence[float], star: Mapping) -> float:
    """(sum x v^2.5)^2 + 2 sum x_i x_j (star^5 - 1)(v_i v_j)^2.5."""
    total = sum(share * value ** 2.5 for share, value in zip(x, values)) ** 2
    for (i, j), factor in star.items():
        total += 2.0 * x[i] * x[j] * (factor ** 5 - 1.0) * (values[i] * values[j]) ** 2.5
    return total


def density_sums(x: Sequence[float], rows: Sequence[Mapping[str, float]], U_star: Mapping, G_star: Mapping,
                 terms: Sequence[Mapping[str, float]]) -> tuple[float, ...]:
    """What terms 13 to 58 multiply T^-u by. [K^u]"""
    U = _fifth_power_mean(x, [row["E"] for row in rows], U_star) ** 0.2
    G = sum(share * row["G"] for share, row in zip(x, rows))
    G += sum(x[i] * x[j] * (factor - 1.0) * (rows[i]["G"] + rows[j]["G"]) for (i, j), factor in G_star.items())
    Q = sum(share * row["Q"] for share, row in zip(x, rows))
    F = sum(share ** 2 * row["F"] for share, row in zip(x, rows))
    return tuple(term["a"] * _flagged(G, term["g"]) * _flagged(Q ** 2, term["q"]) * _flagged(F, term["f"]) * U ** term["u"]
                 for term in terms[_FIRST_IN_DENSITY:])


def at_temperature(sums: Sequence[float], terms: Sequence[Mapping[str, float]], T: float) -> tuple[tuple[float, ...], tuple[float, ...]]:
    """The sums times T^-u, and their slopes by temperature. [unit of the term; the same per K]"""
    values = tuple(total * T ** -term["u"] for total, term in zip(sums, terms))
    return values, tuple(-term["u"] * value / T for value, term in zip(values, terms))


def second_virial(terms_at_temperature: Sequence[float]) -> float:
    """The second virial coefficient. [m3/mol]"""
    return sum(terms_at_temperature)


def compression_factor(d: float, B: float, C: Sequence[float], K3: float, terms: Sequence[Mapping[str, float]]) -> tuple[float, float]:
    """Z at the amount density d, and its slope by d. [1; m3/mol]"""
    D = K3 * d
    early = sum(C[:_SECOND_VIRIAL - _FIRST_IN_DENSITY])
    Z, slope = 1.0 + B * d - D * early, B - K3 * early
    for coefficient, term in zip(C, terms[_FIRST_IN_DENSITY:]):
        b, k = term["b"], term["k"]
        power = D ** k if k else 0.0
        bracket = b - k * power
        common = coefficient * D ** (b - 1) * (exp(-power) if k else 1.0)
        Z += common * D * bracket
        slope += K3 * common * (bracket * bracket - k * k * power)
    return Z, slope


def pressure(d: float, T: float, R: float, Z: float) -> float:
    """The pressure at an amount density. [Pa]"""
    return Z * d * R * T


def amount_density_step(d_0, p, p_0, p_T, T, T_0, p_d):
    """One Newton step from the root d0, solved at p0 and T0, to the pressure and temperature as they are. [mol/m3]"""
    return d_0 + (p - p_0 - p_T * (T - T_0)) / p_d


def compression_factor_from_amount_density(p, d, R, T, f):
    """Z = f p/(d R T); f = 1 carries what the equation of state itself is worth. [1]"""
    return f * (p / (d * R * T))

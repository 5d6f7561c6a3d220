"""Correlations between inputs: those stated, those observed in readings taken together, and their matrix (JCGM 100:2008, 5.2)."""
from __future__ import annotations

import math
from statistics import correlation
from typing import Mapping, Sequence

from gasbasis.calculation.case import Case
from gasbasis.calculation.input_uncertainty import scatter
from gasbasis.calculation.path import Leaf
from gasbasis.calculation.repeated import repeated_inputs
from gasbasis.errors import OutOfRange
from gasbasis.language.basis import TOGETHER

Correlations = Mapping[tuple[str, str], float]
_FIELD = "gas.correlations"
_ROUNDING = 1e-9


def correlations_of(case: Case, leaves: Mapping[str, Leaf]) -> tuple[Correlations, tuple[str, ...]]:
    """Pairs of leaf names with their coefficients, and a warning for each stated pair that has no effect. Raises OutOfRange."""
    uncertain = {leaf.field: leaf for leaf in leaves.values() if leaf.standard_uncertainty and leaf.field}
    found, warnings = _observed(case, uncertain), []
    for first, second, coefficient in case.gas.correlations:
        pair = [next((uncertain[field] for field in fields if field in uncertain), None) for fields in (first, second)]
        if None in pair:
            warnings.append(f"The correlation of {coefficient.number.text} has no effect: one of its two inputs carries no uncertainty here.")
            continue
        found[pair[0].name, pair[1].name] = float(coefficient.number.decimal)
    if found:
        names = list(dict.fromkeys(name for pair in found for name in pair))
        cholesky(correlation_matrix(names, found))
    return found, tuple(warnings)


def _observed(case: Case, uncertain: Mapping[str, Leaf]) -> dict[tuple[str, str], float]:
    """r of the means of readings taken together, as a share of what else is in the two uncertainties (5.2.3)."""
    if case.hold.averaging_order != TOGETHER:
        return {}
    inputs = [(uncertain[field], quantity) for field, quantity in repeated_inputs(case) if field in uncertain]
    found = {}
    for index, (first, one) in enumerate(inputs):
        for second, other in inputs[index + 1:]:
            r = correlation(*([float(value) for value in quantity.number.readings] for quantity in (one, other)))
            part = scatter(one) / first.standard_uncertainty * scatter(other) / second.standard_uncertainty
            found[first.name, second.name] = max(-1.0, min(1.0, r)) * part
    return found


def correlation_matrix(names: Sequence[str], correlations: Correlations) -> list[list[float]]:
    """The full matrix of the coefficients. Raises OutOfRange outside -1..1."""
    matrix = [[1.0 if a == b else 0.0 for b in names] for a in names]
    for (first, second), coefficient in correlations.items():
        if not -1.0 <= coefficient <= 1.0:
            raise OutOfRange(f"A correlation of {coefficient:g} was given; it lies from -1 to 1.", hint="Check its sign and point.", field=_FIELD)
        i, j = names.index(first), names.index(second)
        matrix[i][j] = matrix[j][i] = coefficient
    return matrix


def cholesky(matrix: Sequence[Sequence[float]]) -> list[list[float]]:
    """The lower triangle L with L L^T = matrix. Raises OutOfRange when the coefficients contradict each other."""
    size = len(matrix)
    rows = [[0.0] * size for _ in range(size)]
    for i in range(size):
        for j in range(i + 1):
            rest = matrix[i][j] - sum(rows[i][k] * rows[j][k] for k in range(j))
            if i == j and rest < -_ROUNDING or i != j and rows[j][j] == 0.0 and abs(rest) > _ROUNDING:
                raise OutOfRange("The correlations contradict each other (the matrix is not positive definite).",
                                 hint="Lower the coefficients between inputs that cannot all move together.", field=_FIELD)
            if i == j:                 # a coefficient of exactly 1 or -1 leaves nothing of its own
                rows[i][i] = math.sqrt(rest) if rest > _ROUNDING else 0.0
            else:
                rows[i][j] = rest / rows[j][j] if rows[j][j] else 0.0
    return rows

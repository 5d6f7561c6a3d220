"""The compression factor of the gas where somebody asked for a real gas.

By ISO 6976 at its four temperatures near ambient pressure, by AGA8 DETAIL elsewhere; the text may ask for one of them.
"""
from __future__ import annotations

from typing import Callable

from gasbasis import facts, relations
from gasbasis.calculation import composition, detail_gas, leaves
from gasbasis.calculation.case import Case
from gasbasis.calculation.path import TABLE, Drafting, Leaf, Shown, Step
from gasbasis.errors import Missing, OutOfRange
from gasbasis.language.basis import MatrixGas
from gasbasis.language.numbers import significant

_ONE = Shown(1.0, "")
_KELVIN = {"0": 273.15, "15": 288.15, "15.55": 288.7, "20": 293.15}      # degC as the table heads its columns; 15.55 stands for 60 degF
_NEAR = 0.02                           # K: 60 degF is 15.556 degC


def ideal_or_real(draft: Drafting, case: Case, side: str, condition: Callable[[str, str], str]) -> str:
    """The name of Z for the volume of a side: 1 unless the gas line asks for a real gas. `condition` lays its T and p.

    Raises Missing, OutOfRange, NotConverged.
    """
    if case.gas.model is None:
        return leaves.ideal(draft, f"Z_{side}")
    matrix = case.hold.matrix_gas or case.gas.matrix_gas or case.owe.matrix_gas
    if matrix is None or matrix.id != "composition":
        raise Missing("A real gas needs its composition.", hint="Type it, e.g. 'CH4 93.3, C2H6 2.6, N2 4.1', or leave out 'real gas'.", field="gas.matrix_gas")
    T, p = condition("T", side), condition("p", side)
    return (_by_iso_6976 if _iso_reaches(draft, case, matrix, T, p) else _by_detail)(draft, matrix, side, T, p)


def _iso_reaches(draft: Drafting, case: Case, matrix: MatrixGas, T: str, p: str) -> bool:
    """Whether ISO 6976 is used: where it was asked for, else wherever its tables reach."""
    if case.gas.model != "real":
        return case.gas.model == "iso_6976"
    table = facts.table("iso6976_2016")
    low, high = (float(end) * 1e3 for end in table["pressure_range"])
    known = {row["species"] for row in table["components"]}
    return _column(draft.value(T)) is not None and low <= draft.value(p) <= high and all(species.id in known for species, _ in matrix.composition)


def _column(kelvin: float) -> str | None:
    return next((column for column, tabulated in _KELVIN.items() if abs(kelvin - tabulated) <= _NEAR), None)


def _by_iso_6976(draft: Drafting, matrix: MatrixGas, side: str, T: str, p: str) -> str:
    table = facts.table("iso6976_2016")
    column = _column(draft.value(T))
    if column is None:
        raise OutOfRange(f"ISO 6976 tabulates 0, 15, 15.55 and 20 °C; the volume's temperature is {significant(draft.value(T), 6)} K.",
                         hint="Take one of these, or say 'real gas' alone: AGA8 DETAIL reaches other temperatures.", field="gas.model")
    rows = {row["species"]: row["s"][column] for row in table["components"]}
    fractions = composition.amount_fractions(draft, matrix)
    source = f"{facts.source(table['source']).title}, {table['locator']}"
    arguments = {}
    for index, (species, _) in enumerate(matrix.composition, start=1):
        if species.id not in rows:
            raise OutOfRange(f"{species.name} has no summation factor in ISO 6976.", hint="Leave it out of the composition, or leave out 'real gas'.",
                             field="gas.matrix_gas")
        arguments[f"x_{index}"] = fractions[species.id]
        arguments[f"s_{index}"] = draft.leaf(Leaf(f"s_{species.id}_{column}", float(rows[species.id]), rows[species.id], "", TABLE, f"{source}, {column} °C"))
    s = draft.step(Step(relations.summation_factor_of_mixture(len(matrix.composition)), arguments, f"s_{side}", _ONE))
    p_0 = draft.leaf(Leaf("p_0_iso_6976", float(table["p0"]) * 1e3, table["p0"], "kPa", TABLE, source))
    return draft.step(Step(relations.get("compression_factor"), {"p": p, "p_0": p_0, "s": s}, f"Z_{side}_real", _ONE))


def _by_detail(draft: Drafting, matrix: MatrixGas, side: str, T: str, p: str) -> str:
    """The density is found by iteration; a last Newton step and the definition of Z carry what T, p and the equation are worth.

    The composition counts as exact.
    """
    fractions = composition.amount_fractions(draft, matrix)
    shares = tuple((species.id, draft.value(fractions[species.id])) for species, _ in matrix.composition)
    kelvin, pascal = draft.value(T), draft.value(p)
    range_name, outside = detail_gas.range_of(shares, kelvin, pascal)
    state = detail_gas.solve(shares, kelvin, pascal)
    u, u_text = detail_gas.worth(range_name)
    if outside:
        draft.warnings.append(f"AGA8 DETAIL is used in its extended range, where it is worth some {u_text} %: {'; '.join(outside)}.")
    found = "found by iteration for the composition, temperature and pressure"
    density = draft.step(Step(relations.get("amount_density_step"), {
        "d_0": _found(draft, f"d_0_{side}", state.density, "mol/m³", found), "p": p, "p_0": _found(draft, f"p_0_{side}", state.pressure, "Pa", found),
        "p_T": _found(draft, f"p_T_{side}", state.by_temperature, "Pa/K", found), "T": T, "T_0": _found(draft, f"T_0_{side}", kelvin, "K", found),
        "p_d": _found(draft, f"p_d_{side}", state.by_density, "Pa·m³/mol", found)}, f"d_{side}", Shown(1.0, "mol/m³"),
        note=f"Solved in {state.steps} steps; residual {_residual(state.pressure, pascal)} of the pressure. {_words(range_name)}.", solved=True))
    table, ranges = facts.table("aga8_detail"), facts.table("aga8_ranges")
    R = draft.leaf(Leaf("R_aga8", detail_gas.gas_constant(), table["molar_gas_constant"], "J/(mol·K)", TABLE, facts.source(table["source"]).title))
    f = draft.leaf(Leaf(f"f_{side}", 1.0, "1", "", TABLE, f"{facts.source(ranges['source']).title}, {ranges['locator']}: {u_text} % in the {range_name} range, taken as k = 2",
                        "gas.model", standard_uncertainty=u))
    return draft.step(Step(relations.get("compression_factor_from_amount_density"), {"p": p, "d": density, "R": R, "T": T, "f": f}, f"Z_{side}_real", _ONE))


def _found(draft: Drafting, name: str, value: float, unit_text: str, origin_text: str) -> str:
    return draft.leaf(Leaf(name, value, significant(value, 9), unit_text, TABLE, origin_text))


def _residual(found: float, wanted: float) -> str:
    return significant(abs(found / wanted - 1), 1) if found != wanted else "0"


def _words(range_name: str) -> str:
    return f"{range_name.capitalize()} range of the equation"

"""The compression factor of the gas where somebody asked for a real gas: ISO 6976 at its four temperatures near ambient pressure."""
from __future__ import annotations

from gasbasis import facts, relations
from gasbasis.calculation import composition, leaves
from gasbasis.calculation.case import Case
from gasbasis.calculation.path import TABLE, Drafting, Leaf, Shown, Step
from gasbasis.errors import Missing, OutOfRange
from gasbasis.language.basis import Quantity

_ONE = Shown(1.0, "")
_KELVIN = {"0": 273.15, "15": 288.15, "15.55": 288.7, "20": 293.15}      # degC as the table heads its columns; 15.55 stands for 60 degF
_NEAR = 0.02                           # K: 60 degF is 15.556 degC


def compression_factor(draft: Drafting, case: Case, side: str, temperature: Quantity | None, pressure_name: str) -> str:
    """The name of Z for the volume of a side. Raises Missing, OutOfRange."""
    matrix = case.hold.matrix_gas or case.gas.matrix_gas or case.owe.matrix_gas
    if matrix is None or matrix.id != "composition":
        raise Missing("A real gas needs its composition.", hint="Type it, e.g. 'CH4 93.3, C2H6 2.6, N2 4.1', or leave out 'real gas'.", field="gas.matrix_gas")
    table = facts.table("iso6976_2016")
    column = _column(temperature)
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
    return draft.step(Step(relations.get("compression_factor"), {"p": pressure_name, "p_0": p_0, "s": s}, f"Z_{side}_real", _ONE))


def _column(temperature: Quantity | None) -> str:
    for column, kelvin in _KELVIN.items():
        if temperature is not None and abs(temperature.si - kelvin) <= _NEAR:
            return column
    given = f"{temperature.number.text} {temperature.unit.text}" if temperature is not None else "none"
    raise OutOfRange(f"ISO 6976 tabulates 0, 15, 15.55 and 20 °C; the volume's temperature is {given}.",
                     hint="Take one of these, or leave out 'real gas'.", field="gas.model")


def ideal_or_real(draft: Drafting, case: Case, side: str, temperature: Quantity | None, pressure_name: str) -> str:
    """Z = 1 unless the gas line asks for a real gas."""
    return leaves.ideal(draft, f"Z_{side}") if case.gas.model is None else compression_factor(draft, case, side, temperature, pressure_name)

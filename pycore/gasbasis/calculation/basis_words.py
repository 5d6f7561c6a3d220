"""The basis of a figure spelled out in words. No unit ever stands without it."""
from __future__ import annotations

from gasbasis.calculation.case import VOLUMETRIC, Case, kind_and_factor, stated_carbon_dioxide, stated_oxygen
from gasbasis.calculation.leaves import kelvin_text
from gasbasis.calculation.path import Drafting
from gasbasis.language.basis import Species, Statement

_PARTS = {"volume": "by volume", "mass": "by mass", "mass_by_volume": "mass in volume", None: ""}


def unit_words(statement: Statement) -> str:
    """A unit as we print it; parts say what they are counted by."""
    unit = statement.unit
    return f"{unit.text} {_PARTS[statement.parts_by]}".strip() if unit.kind == "parts" else unit.text


def species_words(case: Case, entity: Species | None) -> str:
    species = case.hold.species or case.owe.species
    named = species.id if species else ""
    if entity is not None and species is not None and entity.id != species.id:
        return f"{named} as {entity.id}"
    return named or (f"as {entity.id}" if entity else "")


def basis_words(case: Case, water: str | None, draft: Drafting) -> tuple[str, ...]:
    """The owed basis, part by part: conditions, water, oxygen, gas, model."""
    words = []
    kind, _ = kind_and_factor(case.owe)
    if kind in VOLUMETRIC:
        words.append(_conditions(case))
    if case.owe.total_pressure is not None:
        words.append(f"in {case.owe.total_pressure.number.text} {case.owe.total_pressure.unit.text}")
    words.append(water if water is not None else "water: not stated, as held")
    words.extend(_oxygen(case))
    words.extend(_carbon_dioxide(case))
    matrix = case.hold.matrix_gas or case.gas.matrix_gas or case.owe.matrix_gas
    if kind == "mass_fraction" and matrix is not None:
        words.append(_MATRIX[matrix.id])
    if any(name.startswith("Z_") for name in draft.leaves):
        words.append("ideal gas")
    equations = dict.fromkeys(name for step in draft.steps if (name := _EQUATIONS.get(step.relation.id)))
    if equations:
        words.append(f"real gas by {' and '.join(equations)}")
    return tuple(words)


_EQUATIONS = {"compression_factor": "ISO 6976", "compression_factor_from_amount_density": "AGA8 DETAIL"}
_MATRIX = {"nitrogen": "in nitrogen", "dry_air": "in dry air", "combustion_gas": "in combustion gas",
           "stated": "in a gas of stated molar mass", "composition": "in the stated gas"}


def _conditions(case: Case) -> str:
    owe, hold = case.owe, case.hold
    if owe.actual_volume:
        return "at the conditions of the gas as it flowed"
    said = owe if owe.temperature is not None or owe.pressure is not None else hold
    if said.temperature is None and said.pressure is None:
        return "temperature and pressure: not stated, as held"
    temperature = f"{kelvin_text(said.temperature)} K" if said.temperature else "temperature not stated"
    pressure = f"{said.pressure.number.text} {said.pressure.unit.text}" if said.pressure else "pressure not stated"
    return f"at {temperature}, {pressure}"


def _carbon_dioxide(case: Case) -> list[str]:
    owed, held = stated_carbon_dioxide(case.owe), stated_carbon_dioxide(case.hold)
    if owed is not None:
        return [f"at {owed.number.text} % CO₂"]
    if held is None or stated_oxygen(case.owe) is not None:
        return []
    return ["at the measured carbon dioxide" if case.owe.carbon_dioxide_meaning == "measured" else f"at {held.number.text} % CO₂, as held"]


def _oxygen(case: Case) -> list[str]:
    owed, held = stated_oxygen(case.owe), stated_oxygen(case.hold)
    if owed is not None:
        return [f"at {owed.number.text} % O₂"]
    if stated_carbon_dioxide(case.owe) is not None:
        return []
    if held is not None and case.owe.oxygen_meaning != "measured":
        return [f"at {held.number.text} % O₂, as held"]
    if case.hold.oxygen is not None:
        return [f"at the measured oxygen, {case.hold.oxygen.number.text} %"]
    return ["at the measured oxygen"] if case.owe.oxygen_meaning == "measured" else []

"""What the gas line comes to: water content, absolute pressure, molar mass, relative density and fuel factor, as far as it says."""
from __future__ import annotations

from typing import Callable

from gasbasis import facts, relations
from gasbasis.calculation import composition, matrix, pressure, water
from gasbasis.calculation.case import Case
from gasbasis.calculation.path import TABLE, Drafting, Leaf, Shown, Step
from gasbasis.errors import CoreError
from gasbasis.language.basis import DRY, WET
from gasbasis.language.numbers import significant

_DIGITS = 4


def about_gas(case: Case) -> list[dict]:
    """Title and text of each property that follows from what the gas line says; what it does not say has no row."""
    rows = [{"title": title, "text": text} for title, read in _ROWS if (text := _text(case, read))]
    gas = case.gas.matrix_gas
    if gas is not None and gas.composition and float(composition.total_text(gas)) != 100.0:
        rows.insert(0, {"title": "composition", "text": f"adds up to {composition.total_text(gas)} %, brought to 100 %"})
    return rows


def _text(case: Case, read: Callable[[Drafting, Case], tuple[float, str] | None]) -> str:
    try:
        found = read(Drafting(), case)
    except CoreError:                  # the row needs what was not given; the figure asks for it where it needs it
        return ""
    return f"{significant(found[0], _DIGITS)} {found[1]}".strip() if found else ""


def _water(draft: Drafting, case: Case):
    if case.gas.water_route is None and not case.gas.droplets:
        return None
    return draft.value(water.water_content(draft, case, "")) * 100, "%"


def _residual(draft: Drafting, case: Case):
    return None if case.gas.cooler is None else (draft.value(water.residual_water(draft, case)) * 100, "%")


def _pressure(draft: Drafting, case: Case):
    return None if case.gas.pressure_route is None else (draft.value(pressure.gas_pressure(draft, case, "")) * 1e-3, "kPa, absolute")


def _dry_mass(draft: Drafting, case: Case):
    gas = case.gas.matrix_gas
    return None if gas is None or gas.id == "stated" else (draft.value(matrix.dry_gas_molar_mass(draft, case)) * 1e3, "g/mol")


def _wet_mass(draft: Drafting, case: Case):
    gas = case.gas.matrix_gas
    return None if gas is None or gas.id == "stated" else (draft.value(matrix.gas_molar_mass(draft, case, WET)) * 1e3, "g/mol")


def _relative_density(draft: Drafting, case: Case):
    if case.gas.matrix_gas is None:
        return None
    air = facts.constant("molar_mass_of_dry_air")
    M_air = draft.leaf(Leaf("M_air", float(air.number) * 1e-3, air.text, "g/mol", TABLE, facts.source(air.source).title))
    name = draft.step(Step(relations.get("relative_density"), {"M_gas": matrix.gas_molar_mass(draft, case, DRY), "M_air": M_air}, "d", Shown()))
    return draft.value(name), "to dry air, both ideal"


def _fuel_factor(draft: Drafting, case: Case):
    if case.gas.oxygen is None or case.gas.carbon_dioxide is None:
        return None
    air = next(datum for datum in facts.ambient_oxygens() if datum.id == "us_20.9")
    arguments = {"A": draft.leaf(Leaf("A", float(air.number) / 100, air.text, "%", TABLE, air.locator)), "O": matrix.oxygen_dry(draft, case),
                 "CO2": matrix.carbon_dioxide_dry(draft, case)}
    return draft.value(draft.step(Step(relations.get("fuel_factor"), arguments, "F_o", Shown()))), f"(with {air.text} %, US EPA Method 3B)"


_ROWS = (("water content", _water), ("water left by the cooler", _residual), ("pressure", _pressure), ("molar mass, dry", _dry_mass),
         ("molar mass, wet", _wet_mass), ("relative density", _relative_density), ("fuel factor Fo", _fuel_factor))

"""From a concentration to a rate: the concentration is brought to the basis of the flow or of the F factor, then multiplied.

A mass rate is never corrected for oxygen: a concentration that was is un-corrected with the measured oxygen, or the flow is
referred to the same oxygen; else it is refused.
"""
from __future__ import annotations

import math
from dataclasses import replace
from typing import Callable

from gasbasis import facts, relations
from gasbasis.calculation import leaves, matrix, pressure
from gasbasis.calculation.case import VOLUMETRIC, Case, stated_carbon_dioxide, stated_oxygen
from gasbasis.calculation.conditions import conditions_doubt
from gasbasis.calculation.path import TABLE, Drafting, Leaf, Path, Shown, Step
from gasbasis.calculation.routes.fuel import per_heat, wanted_water
from gasbasis.errors import CoreError, Missing, OutOfRange
from gasbasis.language.basis import CORRECTED, DRY, MEASURED, WET, Doubt, Reading, Statement
from gasbasis.language.emission import BY_CARBON_DIOXIDE, GROSS, NET, Emission
from gasbasis.language.units import unit

_RATE, _PER_ENERGY, _FRACTION = "mass_rate", "mass_per_energy", "mass_fraction"
_PER_OUTPUT = ("Wh",)                  # a rate per kWh, MWh, GWh is per output; per J, MJ, Btu per heat of fuel
_INSIDE = unit("mg/m3")
_COMMON = "common practice, no source"
_SUPPLIED = ("owe.water", "owe.conditions", "owe.temperature", "owe.pressure", "owe.oxygen", "owe.oxygen_water")   # the emission line says it
_VELOCITY, _AREA, _FLOW = Shown(1.0, "m/s"), Shown(1.0, "m²"), Shown(1.0 / 3600.0, "m³/h")
_HOURS = 8760.0


def is_owed(owe: Statement, emission: Emission | None) -> bool:
    """Whether what is owed is a rate, and no concentration."""
    if owe.unit is None:
        return False
    return owe.unit.kind in (_RATE, _PER_ENERGY) or (owe.unit.kind == _FRACTION and emission is not None and emission.product is not None)


def inner(case: Case) -> Case:
    """The case that ends at the concentration on the basis the rate needs. Raises Missing, OutOfRange."""
    emission = case.emission
    if emission is None:
        raise Missing(f"A figure in {case.owe.unit.text} needs what makes a rate of the concentration.",
                      hint="Add the emission: a flow ('flow 42000 m3/h at 273.15 K, 101.325 kPa, dry'), a duct and its velocity, or the fuel.", field="emission")
    if case.owe.oxygen is not None or case.owe.carbon_dioxide is not None:
        raise OutOfRange("A mass rate is not corrected for oxygen: diluting the gas lowers its concentration and raises its flow, the mass stays.",
                         hint="Leave the oxygen out of what you owe.", field="owe.oxygen")
    owe = replace(case.owe, value=None, unit=_INSIDE, parts_by=None, carbon_dioxide_meaning=MEASURED if stated_carbon_dioxide(case.hold) else None)
    flow_oxygen = emission.oxygen if _by_flow(emission) else None
    if flow_oxygen is not None:
        owe = replace(owe, oxygen=flow_oxygen, oxygen_meaning=CORRECTED)
    elif stated_oxygen(case.hold) is not None:
        owe = replace(owe, oxygen_meaning=MEASURED)
    return replace(case, owe=replace(owe, **_basis(case, emission)))


def _by_flow(emission: Emission) -> bool:
    return emission.flow is not None or emission.velocity is not None or bool(emission.velocity_pressures)


def _measured(emission: Emission) -> bool:
    """A flow as it was in the duct: actual and wet."""
    return emission.flow is None


def _basis(case: Case, emission: Emission) -> dict:
    """Temperature, pressure and water the concentration has to be on."""
    if _by_flow(emission):
        if _measured(emission) or emission.actual_volume:
            return {"actual_volume": True, "water": WET if _measured(emission) else emission.water, "temperature": None, "pressure": None, "conditions_word": None}
        if (emission.temperature is None) != (emission.pressure is None):
            lacks = "pressure" if emission.pressure is None else "temperature"
            raise Missing(f"The {lacks} the flow is counted at is needed.", hint="For example 'flow 42000 m3/h at 273.15 K, 101.325 kPa, dry'.", field=f"emission.{lacks}")
        return {"temperature": emission.temperature, "pressure": emission.pressure, "conditions_word": emission.flow_word, "water": emission.water}
    if emission.fuel is None and emission.factor is None and not emission.analysis:
        raise Missing("A rate needs a flow, or the fuel.", hint="Add 'flow 42000 m3/h at 273.15 K, 101.325 kPa, dry', a duct with its velocity, or 'fuel natural gas, 20 MW'.",
                      field="emission")
    table = facts.table("f_factors")
    return {"temperature": leaves.fixed_quantity(table["temperature"], "degC"), "pressure": leaves.fixed_quantity(table["pressure"], "mmHg"), "water": wanted_water(emission)}


def lay(case: Case, to_concentration: Callable[[Case], Path]) -> Path:
    """The path of a rate: that of the concentration, and the steps from there. Raises CoreError."""
    ready = inner(case)
    path = _with_reason(ready, to_concentration)
    draft = Drafting()
    draft.leaves, draft.steps, draft.choices, draft.warnings = dict(path.leaves), list(path.steps), list(path.choices), list(path.warnings)
    owed = Shown(case.owe.unit.factor, case.owe.unit.text)
    name, words = _RATES[_way(case)](draft, ready, path.figure, owed)
    return replace(path, leaves=draft.leaves, steps=tuple(draft.steps), choices=tuple(draft.choices), figure=name, shown=owed, basis=words, warnings=tuple(draft.warnings))


def _with_reason(ready: Case, to_concentration: Callable[[Case], Path]) -> Path:
    try:
        return to_concentration(ready)
    except Missing as error:
        if error.field == "gas.oxygen" and stated_oxygen(ready.hold) is not None:
            oxygen = stated_oxygen(ready.hold).number.text
            raise Missing(f"The held concentration is corrected to {oxygen} % O₂, the flow is not: their product is no mass rate.",
                          hint=f"Give the measured oxygen ('9.2 % O2 dry' in the gas) to undo the correction, or the flow at {oxygen} % O2.", field="gas.oxygen") from error
        raise


def _way(case: Case) -> str:
    kind = case.owe.unit.kind
    if kind == _RATE:
        return "rate"
    if kind == _FRACTION:
        return "product"
    return "output" if case.owe.unit.id.endswith(_PER_OUTPUT) else "heat"


# --- each owed kind: its name, and the basis in words ---

def _mass_rate(draft: Drafting, case: Case, gamma: str, owed: Shown) -> tuple[str, tuple[str, ...]]:
    name, words = _rate(draft, case, gamma, owed)
    if case.emission.hours is None or not owed.unit_text.endswith("/a"):
        return name, (*words, *(("as if it ran the whole year",) if owed.unit_text.endswith("/a") else ()))
    hours = case.emission.hours
    whole = draft.leaf(Leaf("t_year", _HOURS, "8760", "h/a", TABLE, "365 days of 24 h"))
    running = leaves.from_quantity(draft, case, "t_running", hours, "emission.hours")
    name = draft.step(Step(relations.get("rate_over_operation"), {"m": name, "t": running, "t_a": whole}, "m_year", owed))
    return name, (*words, f"{hours.number.text} h of operation a year")


def _rate(draft: Drafting, case: Case, gamma: str, shown: Shown) -> tuple[str, tuple[str, ...]]:
    """Mass per time, by the flow or by the heat of the fuel."""
    if _by_flow(case.emission):
        q, words = _volume_flow(draft, case)
        return draft.step(Step(relations.get("mass_rate"), {"gamma": gamma, "q": q}, "m_rate", shown)), words
    if case.emission.heat is None:
        raise Missing("A mass rate by the fuel needs its heat input.", hint="Add it, e.g. '20 MW gross', or a flow.", field="emission.heat")
    E, words = per_heat(draft, case, gamma, Shown(1e-12, "ng/J"))
    return draft.step(Step(relations.get("mass_rate_from_heat_rate"), {"E": E, "P": _heat(draft, case)}, "m_rate", shown)), words


def _heat(draft: Drafting, case: Case) -> str:
    if case.emission.heat_said == NET:
        raise OutOfRange("F factors count the gross heat of the fuel; the heat input is net.", hint="Give the gross heat input: for natural gas it is some 11 % higher, for oil 6 %, for coal 4 %.",
                         field="emission.heat")
    return leaves.from_quantity(draft, case, "P_heat", case.emission.heat, "emission.heat")


def _per_heat(draft: Drafting, case: Case, gamma: str, owed: Shown) -> tuple[str, tuple[str, ...]]:
    emission = case.emission
    if not _by_flow(emission):
        return per_heat(draft, case, gamma, owed)
    if emission.heat is None:
        raise Missing("A figure per heat of fuel needs the heat input, or the fuel alone.", hint="Add '20 MW gross'; or leave out the flow and name the fuel.", field="emission.heat")
    name, words = _rate(draft, case, gamma, Shown(1.0 / 3600.0, "kg/h"))
    P = leaves.from_quantity(draft, case, "P_heat", emission.heat, "emission.heat")
    said = {GROSS: "gross heat", NET: "net heat", None: "heat, gross or net not stated"}[emission.heat_said]
    return draft.step(Step(relations.get("mass_per_heat_from_mass_rate"), {"m": name, "P": P}, "E_heat", owed)), (*words, f"per {said}")


def _per_output(draft: Drafting, case: Case, gamma: str, owed: Shown) -> tuple[str, tuple[str, ...]]:
    emission = case.emission
    if emission.output is None:
        raise Missing(f"A figure in {owed.unit_text} is per output, which is needed.", hint="Add it, e.g. 'output 5 MW net'. Per heat of fuel the units are ng/J, mg/MJ, lb/MMBtu.",
                      field="emission.output")
    name, words = _rate(draft, case, gamma, Shown(1.0 / 3600.0, "kg/h"))
    P = leaves.from_quantity(draft, case, "P_output", emission.output, "emission.output")
    said = emission.output_said or "gross or net not stated"
    return draft.step(Step(relations.get("mass_per_output"), {"m": name, "P": P}, "E_output", owed)), (*words, f"per output ({said})")


def _per_product(draft: Drafting, case: Case, gamma: str, owed: Shown) -> tuple[str, tuple[str, ...]]:
    name, words = _rate(draft, case, gamma, Shown(1.0 / 3600.0, "kg/h"))
    r = leaves.from_quantity(draft, case, "r_product", case.emission.product, "emission.product")
    return draft.step(Step(relations.get("mass_per_product"), {"m": name, "r": r}, "e_product", owed)), (*words, "per mass of product")


_RATES = {"rate": _mass_rate, "heat": _per_heat, "output": _per_output, "product": _per_product}


# --- the flow ---

def _volume_flow(draft: Drafting, case: Case) -> tuple[str, tuple[str, ...]]:
    """The name of the volume flow on its own basis [m3/s], and that basis in words."""
    emission = case.emission
    if emission.flow is not None:
        counted = case.owe.temperature is not None
        at = "as it flowed" if emission.actual_volume else "as the concentration" if not counted else f"at {leaves.kelvin_text(case.owe.temperature)} K, {case.owe.pressure.number.text} {case.owe.pressure.unit.text}"
        oxygen = (f"at {emission.oxygen.number.text} % O₂",) if emission.oxygen else ()
        return leaves.from_quantity(draft, case, "q_flow", emission.flow, "emission.flow"), (f"flow stated {at}", case.owe.water or "water: not stated, as held", *oxygen)
    v = leaves.from_quantity(draft, case, "v", emission.velocity, "emission.velocity") if emission.velocity else _pitot(draft, case)
    way = "by velocity and cross-section" if emission.velocity else "by pitot traverse"
    return draft.step(Step(relations.get("volume_flow"), {"v": v, "A": _area(draft, case)}, "q_duct", _FLOW)), (f"flow {way}, wet, as it flowed",)


def _area(draft: Drafting, case: Case) -> str:
    emission = case.emission
    if emission.area is not None:
        return leaves.from_quantity(draft, case, "A_duct", emission.area, "emission.area")
    if emission.diameter is not None:
        D = leaves.from_quantity(draft, case, "D_duct", emission.diameter, "emission.diameter")
        pi = draft.leaf(Leaf("pi", math.pi, "3.14159265", "", TABLE, "geometry"))
        return draft.step(Step(relations.get("area_of_circle"), {"pi": pi, "D": D}, "A_duct", _AREA))
    if emission.sides is None:
        raise Missing("A velocity becomes a flow by the cross-section of the duct, which is needed.", hint="Add it: 'duct 1.8 m diameter', 'duct 1.2 m x 2.1 m' or 'area 2.5 m2'.", field="emission.area")
    a, b = (leaves.from_quantity(draft, case, f"side_{letter}", side, "emission.sides") for letter, side in zip("ab", emission.sides))
    return draft.step(Step(relations.get("area_of_rectangle"), {"a": a, "b": b}, "A_duct", _AREA))


def _pitot(draft: Drafting, case: Case) -> str:
    emission = case.emission
    if emission.pitot is None:
        raise Missing("The coefficient of the pitot tube is needed.", hint="Add it, e.g. 'pitot Cp 0.84'; it stands in the tube's calibration.", field="emission.pitot")
    if case.gas.temperature is None:
        raise Missing("The temperature of the gas in the duct is needed for its velocity.", hint="Add it to the gas, e.g. '182 °C'.", field="gas.temperature")
    if (case.hold.matrix_gas or case.gas.matrix_gas) is None:
        raise Missing("The molar mass of the gas in the duct is needed for its velocity.",
                      hint="Add it to the gas: 'in combustion gas' with O2 and CO2, a composition, or 'M 28.8 g/mol' for the wet gas.", field="gas.matrix_gas")
    points = emission.velocity_pressures
    arguments = {f"dp_{index}": leaves.from_quantity(draft, case, f"dp_{index}", point, "emission.velocity_pressures") for index, point in enumerate(points, start=1)}
    s = draft.step(Step(relations.mean_of_roots(len(points)), arguments, "s_dp", Shown(1.0, "Pa^0.5")))
    return draft.step(Step(relations.get("duct_velocity"), {
        "C_p": leaves.from_quantity(draft, case, "C_p", emission.pitot, "emission.pitot"), "s": s, "R": leaves.gas_constant(draft),
        "T": leaves.from_temperature(draft, case, "T_gas", case.gas.temperature, "gas.temperature"), "p": pressure.gas_pressure(draft, case, "for the velocity in the duct"),
        "M": matrix.gas_molar_mass(draft, case, WET)}, "v_duct", _VELOCITY))


# --- what the emission line leaves open ---

def doubts(case: Case, of_concentration: Callable[[Case], list[Doubt]]) -> list[Doubt]:
    """Those of the emission line, and those of the concentration it needs, as far as the line does not settle them."""
    try:
        ready = inner(case)
    except CoreError:                  # laying the path says what is missing
        return []
    own = _own(case.emission, ready)
    asked = {*_SUPPLIED, *(doubt.id for doubt in own)}
    return own + [doubt for doubt in of_concentration(ready) if doubt.id not in asked]


def _own(emission: Emission, ready: Case) -> list[Doubt]:
    found = []
    if emission.flow is not None and not emission.actual_volume:
        silent = ready.hold.unit.kind in VOLUMETRIC and ready.hold.temperature is None and ready.hold.pressure is None and not ready.hold.actual_volume
        if emission.temperature is None and emission.pressure is None and not (silent and ready.hold.conditions_word == emission.flow_word):
            found.append(_flow_conditions(emission.flow_word))
    if emission.flow is not None and emission.water is None and (ready.hold.water is not None or ready.gas.water_content is not None):
        found.append(Doubt("emission.water", "flow, water", "Is the flow of wet or of dry gas?", "Wet flow carries the water vapour too, so it is larger.",
                           (Reading(DRY, "dry", (("water", DRY),), _COMMON), Reading(WET, "wet", (("water", WET),), _COMMON, "what a velocity and a cross-section give is wet" if emission.actual_volume else ""))))
    by_factor = not _by_flow(emission)
    if by_factor and emission.heat is not None and emission.heat_said is None:
        found.append(_gross("heat", "heat input"))
    if by_factor and emission.analysis and emission.heating_value is not None and emission.heating_value_said is None:
        found.append(_gross("heating_value", "calorific value"))
    if by_factor and emission.by != BY_CARBON_DIOXIDE and ready.gas.ambient_oxygen is None:
        found.append(_ambient())
    return found


def _ambient() -> Doubt:
    readings = tuple(Reading(datum.text, f"{datum.text} %", (("ambient_oxygen", leaves.fixed_quantity(datum.text, "%")),), f"{facts.source(datum.source).title}, {datum.locator}",
                             "the F factors' own method counts so" if datum.id == "us_20.9" else "") for datum in facts.ambient_oxygens())
    return Doubt("gas.ambient_oxygen", "ambient oxygen", "Which oxygen content of ambient air does the rule count from?", "It is the A in A/(A − measured).", readings)


def _gross(field: str, name: str) -> Doubt:
    return Doubt(f"emission.{field}_said", name, f"Is the {name} gross (with the heat of condensing the water) or net?", "F factors count gross heat; net is some 4 to 11 % less.",
                 (Reading(GROSS, "gross", ((f"{field}_said", GROSS),), _COMMON), Reading(NET, "net", ((f"{field}_said", NET),), _COMMON)))


def _flow_conditions(word: str | None) -> Doubt:
    published = conditions_doubt("emission", Statement(conditions_word=word), flowed=True)
    readings = tuple(reading for reading in published.readings)
    return replace(published, question="At which temperature and pressure is the flow counted?", changes="The warmer or thinner the reference volume, the larger the flow.", readings=readings)

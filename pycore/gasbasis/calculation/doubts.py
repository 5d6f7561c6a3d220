"""What a case leaves open: each rule looks at the case and raises at most one doubt.

A doubt is raised only when the two sides differ in what they state, or when a relation on the way
needs what is missing. Silence on both sides is carried over and printed.
"""
from __future__ import annotations

from dataclasses import replace
from functools import lru_cache
from typing import Callable

from gasbasis import facts
from gasbasis.calculation.case import (MASS_FRACTION, MASS_LIKE, PARTIAL_PRESSURE,
                                       UNSTATED_PARTS, VOLUMETRIC, Case, diluent_changes, kind_and_factor,
                                       same_conditions, stated_carbon_dioxide, stated_oxygen)
from gasbasis.calculation.conditions import conditions_doubt, pressure_doubt, temperature_doubt
from gasbasis.calculation.leaves import SIDE_TITLES, fixed_quantity
from gasbasis.calculation.repeated import order_doubt
from gasbasis.calculation import routes
from gasbasis.calculation.routes import emission
from gasbasis.calculation.rules import with_usual
from gasbasis.language.basis import (CORRECTED, DRY, MASS, MASS_BY_VOLUME, MEASURED, VOLUME, WET, Doubt, MatrixGas,
                                     Reading, Route)
from gasbasis.language.species import find
from gasbasis.language.units import unit

COMMON = "common practice, no source"
_SIDES = ("hold", "owe")


def raised(case: Case) -> list[Doubt]:
    """The doubts a case raises as it stands, in the order a person would settle them."""
    doubts = [*case.hold.ambiguities, *case.gas.ambiguities, *case.owe.ambiguities]
    doubts.extend(routes.doubts(case))
    doubts.extend(emission.doubts(case, _of_concentration) if emission.is_owed(case.owe, case.emission) else _of_concentration(case))
    species = case.hold.species or case.owe.species
    return [with_usual(doubt, case.rule, species) for doubt in doubts]


def _of_concentration(case: Case) -> list[Doubt]:
    return [doubt for rule in _RULES for doubt in rule(case)]


def _parts_by(case: Case) -> list[Doubt]:
    """ppm, ppb, % of what? Asked when the other side says, is of another kind, or the basis changes."""
    unstated = [side for side in _SIDES if kind_and_factor(case.record(side))[0] == UNSTATED_PARTS]
    if len(unstated) == 2 and not _basis_changes(case):
        return []
    if len(unstated) == 2:
        unstated = ["hold"] if case.hold.parts_by is None else ["owe"]
    return [_parts_doubt(side, case.record(side).unit.text, _trade_uses_all_three(case)) for side in unstated]


@lru_cache(maxsize=64)
def _parts_doubt(side: str, parts: str, in_all_three_ways: bool) -> Doubt:
    usual = "" if in_all_three_ways else "gas analysers and gas limits count parts by volume (common practice)"
    return Doubt(
        f"{side}.parts_by", "parts by", f"Is '{parts}' in {SIDE_TITLES[side]} by volume, by mass, or mass in volume?",
        "By mass the gas that carried it enters; mass in volume is the mass in a litre or cubic metre.",
        (Reading(VOLUME, "by volume (amount of substance)", (("parts_by", VOLUME),), COMMON, usual),
         Reading(MASS, "by mass", (("parts_by", MASS),), COMMON),
         Reading(MASS_BY_VOLUME, "mass in volume", (("parts_by", MASS_BY_VOLUME),), COMMON)))


def _trade_uses_all_three(case: Case) -> bool:
    """Mercury surveys report ppb in all three ways, so none of them is usual."""
    species = case.hold.species or case.owe.species
    return species is None or (species.atoms is not None and any(element == "Hg" for element, _ in species.atoms))


def _conditions(case: Case) -> list[Doubt]:
    """The temperature and pressure a volume is counted at."""
    doubts = []
    hold_kind, owe_kind = (kind_and_factor(case.record(side))[0] for side in _SIDES)
    both = hold_kind in VOLUMETRIC and owe_kind in VOLUMETRIC
    for side, kind in zip(_SIDES, (hold_kind, owe_kind)):
        if kind not in VOLUMETRIC or case.record(side).actual_volume:
            continue
        if both and same_conditions(case.hold, case.owe):
            continue
        if not both and not _needs_volume(hold_kind, owe_kind):
            continue
        statement = case.record(side)
        if statement.temperature is None and statement.pressure is None:
            flowed = case.gas.temperature is not None and (case.gas.pressure is not None or case.gas.pressure_route is not None)
            doubts.append(conditions_doubt(side, statement, flowed and side == "hold"))
        elif statement.temperature is None:
            doubts.append(temperature_doubt(side))
        elif statement.pressure is None:
            doubts.append(pressure_doubt(side))
    return doubts


# The prints that stand for one another in rules, and by how much they differ in fact.
_PRINTS = {("pressure", "kPa"): (("101.3", "101.325"),), ("temperature", "K"): (("293", "293.15"), ("273", "273.15"), ("298", "298.15"))}


def _printed_conditions(case: Case) -> list[Doubt]:
    """101.3 on one side and 101.325 kPa on the other: two conditions, or one printed shorter?"""
    hold, owe = case.hold, case.owe
    if any(kind_and_factor(case.record(side))[0] not in VOLUMETRIC for side in _SIDES):
        return []
    doubts = []
    for (field, kind), pairs in _PRINTS.items():
        first, second = getattr(hold, field), getattr(owe, field)
        if first is None or second is None or first.unit.id != kind or second.unit.id != kind or f"hold.{field}" in case.chosen:
            continue
        texts = {first.number.text.replace(",", "."), second.number.text.replace(",", ".")}
        pair = next((pair for pair in pairs if texts == set(pair)), None)
        if pair:
            doubts.append(Doubt(f"hold.{field}_print", f"{pair[0]} or {pair[1]} {kind}", f"Are {pair[0]} and {pair[1]} {kind} two conditions, or one printed shorter?",
                                "Taken as printed the figure changes by a few hundredths of a percent.",
                                (Reading("as_printed", "two, as printed", ((field, first),), COMMON), Reading("same", "one and the same", ((field, second),), COMMON))))
    return doubts


def _barometer(case: Case) -> list[Doubt]:
    """A barometer and an altitude: read at the station, or reduced to sea level as weather reports are?"""
    gas = case.gas
    if gas.barometer is None or gas.barometer_route is None or gas.barometer_route.id != "altitude":
        return []
    reduced = Route("sea_level", (("pressure", gas.barometer), *gas.barometer_route.given))
    return [Doubt("gas.barometer_meaning", "barometer", f"Was the barometer of {gas.barometer.number.text} {gas.barometer.unit.text} read at the station, or reduced to sea level?",
                  "Weather reports give sea-level pressures; some 1 % for every 85 m of altitude.",
                  (Reading("station", "read at the station", (("barometer_route", None),), COMMON),
                   Reading("sea_level", "reduced to sea level", (("barometer", None), ("barometer_route", reduced)), COMMON)))]


_SURELY_ABSOLUTE = 1.2e5                # Pa; up to here a plain pressure reads like a barometer


def _gauge_or_absolute(case: Case) -> list[Doubt]:
    """A line pressure with no word on what it is counted from, where it enters the figure."""
    gas = case.gas
    if gas.pressure is None or gas.pressure_said is not None or gas.pressure.si <= _SURELY_ABSOLUTE:
        return []
    uses = any(case.record(side).actual_volume or kind_and_factor(case.record(side))[0] == PARTIAL_PRESSURE for side in _SIDES)
    if not uses:
        return []
    text = f"{gas.pressure.number.text} {gas.pressure.unit.text}"
    gauge = (("pressure", None), ("pressure_route", Route("gauge", (("pressure", gas.pressure),))))
    return [Doubt("gas.pressure_said", "gas pressure", f"Is the gas pressure of {text} absolute or gauge?",
                  "A gauge pressure has the barometer still to be added: at 1 bar that is a factor of two.",
                  (Reading("absolute", "absolute", (("pressure_said", "absolute"),), COMMON), Reading("gauge", "gauge, the barometer comes on top", gauge, COMMON)))]


_COLUMNS = {"inH2O": "inH2O_60F", "inHg": "inHg_60F"}


def _column_temperature(case: Case) -> list[Doubt]:
    """An inch of water at 4 degC or at 60 degF, of mercury at 0 degC or at 60 degF."""
    route = case.gas.pressure_route
    quantity = route.get("pressure") if route else None
    if quantity is None or quantity.unit.id not in _COLUMNS or "gas.pressure_route" in case.chosen:
        return []
    warm = replace(quantity, unit=unit(_COLUMNS[quantity.unit.id]))
    cold = "4 °C" if quantity.unit.id == "inH2O" else "0 °C"
    return [Doubt("gas.pressure_column", quantity.unit.text, f"Is the {quantity.unit.text} counted at {cold} or at 60 °F?",
                  "The warmer column is lighter: 0.1 % of the reading for water, 0.3 % for mercury.",
                  (Reading("conventional", f"at {cold}, as gauges are marked", (("pressure_route", route),), COMMON, "pressure gauges are marked so (common practice)"),
                   Reading("60F", "at 60 °F", (("pressure_route", Route(route.id, (("pressure", warm),))),), COMMON)))]


def _needs_volume(hold_kind: str, owe_kind: str) -> bool:
    """A volume's conditions enter whenever the other side is of a settled, non-volumetric kind."""
    return UNSTATED_PARTS not in (hold_kind, owe_kind)


def _water(case: Case) -> list[Doubt]:
    """Wet or dry: asked when one side states it and the other does not, or oxygen is corrected."""
    hold, owe = case.hold, case.owe
    doubts = []
    if hold.water is None and (owe.water is not None or diluent_changes(hold, owe)):
        doubts.append(_water_doubt("hold", ""))
    if owe.water is None and (hold.water is not None or diluent_changes(hold, owe)):
        usual = "a figure at a reference oxygen or carbon dioxide is stated on dry gas" if stated_oxygen(owe) or stated_carbon_dioxide(owe) else ""
        doubts.append(_water_doubt("owe", usual))
    return doubts


@lru_cache(maxsize=8)
def _water_doubt(side: str, dry_because: str) -> Doubt:
    return Doubt(
        f"{side}.water", "water", f"Is the value in {SIDE_TITLES[side]} on wet or on dry gas?",
        "Wet gas holds its water vapour, so the same species is a smaller share of it.",
        (Reading(DRY, "dry", (("water", DRY),), COMMON, dry_because), Reading(WET, "wet", (("water", WET),), COMMON)))


_DILUENTS = (("oxygen", "oxygen", "O₂"), ("carbon_dioxide", "carbon dioxide", "CO₂"))


def _diluent_meaning(case: Case) -> list[Doubt]:
    """'at 9 % O2': measured in the gas, or already corrected to it. On the owed side it is what to correct to."""
    hold, owe = case.hold, case.owe
    doubts = []
    for field, name, formula in _DILUENTS:
        meaning = f"{field}_meaning"
        stated, owed = getattr(hold, field), getattr(owe, field)
        if stated is None or getattr(hold, meaning) is not None:
            continue
        if owed is None and getattr(owe, meaning) is None and getattr(case.gas, field) is None:
            continue
        percent = stated.number.text
        doubts.append(Doubt(
            f"hold.{meaning}", f"{percent} % {formula}", f"Is {percent} % the {name} measured, or the {name} it is corrected to?",
            f"A measured {name} is where the correction starts; a corrected value has had it already.",
            (Reading(MEASURED, "measured", ((meaning, MEASURED),), COMMON), Reading(CORRECTED, "corrected to it", ((meaning, CORRECTED),), COMMON))))
    return doubts


def _owed_diluent(case: Case) -> list[Doubt]:
    """The held value is at a reference oxygen or carbon dioxide and the owed side is silent about it."""
    doubts = []
    for field, name, formula in _DILUENTS:
        meaning = f"{field}_meaning"
        if getattr(case.hold, meaning) != CORRECTED or getattr(case.owe, field) is not None or getattr(case.owe, meaning) is not None:
            continue
        held = getattr(case.hold, field)
        doubts.append(Doubt(
            f"owe.{field}", name, f"You hold a value at {held.number.text} % {formula}. Is the owed figure at the same?",
            f"Left at the reference {name} the value stays; as measured, the correction is undone.",
            (Reading("as_held", f"at {held.number.text} % {formula} too", ((field, held), (meaning, CORRECTED)), COMMON),
             Reading(MEASURED, "as measured in the gas", ((meaning, MEASURED),), COMMON))))
    return doubts


def _oxygen_water(case: Case) -> list[Doubt]:
    """Whether the measured oxygen was read wet or dry; in-situ probes read wet."""
    if not _corrects_from_measured(case):
        return []
    hold, gas = case.hold, case.gas
    side = "hold" if hold.oxygen is not None and hold.oxygen_meaning == MEASURED else "gas"
    oxygen, water = (hold.oxygen, hold.oxygen_water or gas.oxygen_water) if side == "hold" else (gas.oxygen, gas.oxygen_water)
    if oxygen is None or water is not None or (side == "hold" and hold.water == DRY):
        return []                      # "142 ppm dry at 9.2 % O2": a statement's dry holds for its oxygen too
    return [Doubt(
        f"{side}.oxygen_water", "oxygen read", f"Was the oxygen of {oxygen.number.text} % read in wet or in dry gas?",
        "Extractive analysers behind a cooler read dry gas, probes in the duct read wet gas.",
        (Reading(DRY, "dry", (("oxygen_water", DRY),), COMMON),
         Reading(WET, "wet", (("oxygen_water", WET),), COMMON)))]


def _ambient_oxygen(case: Case) -> list[Doubt]:
    """The ambient oxygen an oxygen correction counts from is the rule's own."""
    if case.gas.ambient_oxygen is not None or not _oxygen_changes(case):
        return []
    return [_ambient_doubt()]


@lru_cache(maxsize=1)
def _ambient_doubt() -> Doubt:
    readings = tuple(
        Reading(datum.text, f"{datum.text} %", (("ambient_oxygen", fixed_quantity(datum.text, "%")),),
                f"{facts.source(datum.source).title}, {datum.locator}")
        for datum in facts.ambient_oxygens())
    return Doubt("gas.ambient_oxygen", "ambient oxygen", "Which oxygen content of ambient air does the rule count from?",
                 "It is the A in (A − reference)/(A − measured); it matters most near ambient oxygen.", readings)


def _reported_as(case: Case) -> list[Doubt]:
    """NOx, TOC and total sulphur have a mass only 'as' something."""
    species = case.hold.species or case.owe.species
    if species is None or not species.needs_reported_as:
        return []
    hold_kind, owe_kind = (kind_and_factor(case.record(side))[0] for side in _SIDES)
    hold, owe = case.hold.reported_as, case.owe.reported_as
    crosses = (hold_kind in MASS_LIKE) != (owe_kind in MASS_LIKE) and UNSTATED_PARTS not in (hold_kind, owe_kind)
    counts_one = species.id == "NOx"                 # one nitrogen an entity: amounts are the same as NO or NO2
    doubts = []
    if hold is None and (owe is not None or crosses) and not (counts_one and hold_kind not in MASS_LIKE):
        doubts.append(_as_doubt("hold", species))
    if owe is None and (hold is not None or crosses) and owe_kind in MASS_LIKE and (hold is None or hold_kind in MASS_LIKE):
        doubts.append(_as_doubt("owe", species))
    return doubts if not (hold is None and len(doubts) == 2) else doubts[:1]


def _as_doubt(side: str, species) -> Doubt:
    readings = []
    for name in species.reported_as:
        usual = f"{species.name} is usually reported as {name}" if name == species.usual_reported_as else ""
        readings.append(Reading(name, f"as {name}", (("reported_as", find(name)),), COMMON, usual))
    return Doubt(f"{side}.reported_as", "reported as", f"As what is the {species.name} in {SIDE_TITLES[side]} reported?",
                 f"{species.name} is a sum: its mass, and its count by carbon, depend on what it is reported as.",
                 tuple(readings))


def _matrix_gas(case: Case) -> list[Doubt]:
    """A mass fraction is a share of the mass of a gas that has to be known."""
    if case.hold.matrix_gas or case.gas.matrix_gas or case.owe.matrix_gas:
        return []
    kinds = [kind_and_factor(case.record(side))[0] for side in _SIDES]
    if MASS_FRACTION not in kinds or (kinds[0] == kinds[1] and not _basis_changes(case)):
        return []
    readings = [Reading("nitrogen", "nitrogen", (("matrix_gas", MatrixGas("nitrogen")),), COMMON),
                Reading("dry_air", "dry air", (("matrix_gas", MatrixGas("dry_air")),), COMMON)]
    if case.gas.carbon_dioxide is not None:
        readings.append(Reading("combustion_gas", "combustion gas of this oxygen and carbon dioxide",
                                (("matrix_gas", MatrixGas("combustion_gas")),), COMMON))
    return [Doubt("gas.matrix_gas", "gas", "Which gas carried it?",
                  "Parts by mass are parts of the mass of that gas: the heavier it is, the fewer.", tuple(readings))]


def _oxygen_changes(case: Case) -> bool:
    held, owed = stated_oxygen(case.hold), stated_oxygen(case.owe)
    if owed is not None:
        return held is None or held.si != owed.si
    return held is not None and case.owe.oxygen_meaning == MEASURED


def _corrects_from_measured(case: Case) -> bool:
    held, owed = stated_oxygen(case.hold), stated_oxygen(case.owe)
    return _oxygen_changes(case) and (held is None) != (owed is None)


def _basis_changes(case: Case) -> bool:
    hold, owe = case.hold, case.owe
    water = hold.water is not None and owe.water is not None and hold.water != owe.water
    return water or diluent_changes(hold, owe)


_RULES: tuple[Callable[[Case], list[Doubt]], ...] = (
    _parts_by, _conditions, _gauge_or_absolute, _column_temperature, _printed_conditions, _barometer, _reported_as, _diluent_meaning, _owed_diluent, _water, _oxygen_water, _ambient_oxygen, _matrix_gas, order_doubt)

"""Mercury in a gas against what the gas can hold: more than saturated vapour is no vapour."""
from __future__ import annotations

from dataclasses import replace

from gasbasis.calculation import pressure
from gasbasis.calculation.case import Case
from gasbasis.calculation.path import Drafting, evaluate
from gasbasis.calculation.routes import prepared
from gasbasis.calculation.restate import lay
from gasbasis.errors import CoreError, Missing
from gasbasis.language.basis import Quantity, Statement
from gasbasis.language.numbers import significant
from gasbasis.language.units import unit

_EQUATION = "huber"
_PER_CENT = 1.02                       # the equation is worth 1 % (k = 2), and the vapour is not quite ideal


def above_saturation(case: Case) -> list[str]:
    """A warning when the held mercury is more than the gas can hold as vapour at its own temperature and pressure; else nothing."""
    species = case.hold.species or case.owe.species
    if species is None or species.id != "Hg":
        return []
    try:
        share, temperature, total = _amount_fraction(case), _temperature(case), _pressure(case)
        most = _saturation(case, temperature)
    except CoreError:                  # what it would need was not given; the figure does not need it
        return []
    if share * total <= most * _PER_CENT:
        return []
    held, holds = (significant(value / total * 1e9, 3) for value in (share * total, most))
    return [f"The held mercury, {held} ppb by volume, is above saturation: at {temperature.number.text} {temperature.unit.text} and this pressure the gas holds {holds} ppb "
            "(Huber, Laesecke and Friend). Check value, unit and temperature; liquid mercury may have been in the sample."]


def _amount_fraction(case: Case) -> float:
    path = lay(replace(case, emission=None, owe=Statement(unit=unit("mol/mol"), water=case.hold.water)))
    return evaluate(path)[path.figure]


def _temperature(case: Case) -> Quantity:
    own = case.gas.temperature or (case.hold.temperature if case.sample is None and case.prepared is None else None)
    if own is None:
        raise Missing("No temperature is known.")
    return own


def _pressure(case: Case) -> float:
    if case.gas.temperature is None:
        if case.hold.pressure is None:
            raise Missing("No pressure is known.")
        return case.hold.pressure.si
    draft = Drafting()
    return draft.value(pressure.gas_pressure(draft, case, ""))


def _saturation(case: Case, temperature: Quantity) -> float:
    """The vapour pressure of mercury. [Pa]"""
    draft = Drafting()
    prepared.saturated(draft, case, temperature, "gas.temperature", _EQUATION)
    return draft.value("p_mercury")

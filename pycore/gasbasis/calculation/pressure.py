"""The absolute pressure of the gas as it flowed, by whichever way the case knows it."""
from __future__ import annotations

from gasbasis import facts, relations
from gasbasis.calculation import leaves
from gasbasis.calculation.case import Case
from gasbasis.calculation.path import TABLE, Drafting, Leaf, Shown, Step
from gasbasis.errors import Missing, OutOfRange
from gasbasis.language.basis import Route
from gasbasis.language.units import unit

_SHOWN = Shown(1e3, "kPa")


def gas_pressure(draft: Drafting, case: Case, why: str) -> str:
    """The name of the gas's absolute pressure. [Pa] Raises Missing, saying `why` it is needed."""
    gas = case.gas
    if gas.pressure is not None:
        return leaves.from_quantity(draft, case, "p_gas", gas.pressure, "gas.pressure")
    if gas.pressure_route is not None:
        given = leaves.from_quantity(draft, case, "p_gauge", gas.pressure_route.get("pressure"), "gas.pressure_route")
        whole = draft.step(Step(relations.get("absolute_pressure"), {"p_b": barometer(draft, case), "p_g": given}, "p_absolute", _SHOWN))
        if not draft.is_above(whole, 0.0):
            raise OutOfRange("Barometer and gauge add up to no pressure at all.", hint="Check the sign and the unit of the gauge or static pressure.",
                             field="gas.pressure_route")
        return whole
    raise Missing(f"The pressure of the gas is needed {why}.",
                  hint="Add it absolute ('1008 hPa'), or as 'gauge 2.3 bar' or 'static -12 mmH2O' with a barometer.", field="gas.pressure")


def barometer(draft: Drafting, case: Case) -> str:
    """The name of the barometric pressure at the station. [Pa] Raises Missing: a gauge value is not taken for one over 1 atm."""
    gas = case.gas
    if gas.barometer is not None:
        return leaves.from_quantity(draft, case, "p_barometer", gas.barometer, "gas.barometer")
    if gas.barometer_route is None:
        raise Missing("A gauge or static pressure needs the barometer at the station.",
                      hint="Add 'barometer 1008 hPa', or 'altitude 420 m', or 'sea level 1013 hPa, altitude 420 m'.", field="gas.barometer")
    return _at_altitude(draft, case, gas.barometer_route)


def _at_altitude(draft: Drafting, case: Case, route: Route) -> str:
    altitude = route.get("altitude")
    if altitude is None:
        raise Missing("A sea-level pressure needs the altitude of the station.", hint="For example 'sea level 1013 hPa, altitude 420 m'.",
                      field="gas.barometer")
    arguments = {"H": leaves.from_quantity(draft, case, "H", altitude, "gas.barometer_route"),
                 **{name: _standard(draft, name, identity) for name, identity in _ATMOSPHERE.items()}}
    if route.id == "sea_level":
        arguments["p_sl"] = leaves.from_quantity(draft, case, "p_sea", route.get("pressure"), "gas.barometer_route")
    relation = relations.get("barometer_from_sea_level" if route.id == "sea_level" else "barometer_at_altitude")
    return draft.step(Step(relation, {name: arguments[name] for name in relation.symbols}, "p_station", _SHOWN))


_ATMOSPHERE = {"p_0": "iso_2533_pressure", "T_0": "iso_2533_temperature", "L": "iso_2533_gradient", "g": "iso_2533_acceleration",
               "M": "iso_2533_molar_mass", "R": "iso_2533_gas_constant"}
# The formula is written with a positive gradient L; units the reader of statements has no use for.
_IN_SI = {"K/m": 1.0, "K/km": 1e-3, "m/s2": 1.0, "J/(mol K)": 1.0, "J/(kmol K)": 1e-3, "kg/kmol": 1e-3, "g/mol": 1e-3}


def _standard(draft: Drafting, name: str, identity: str) -> str:
    datum = facts.constant(identity)
    if datum.unit in _IN_SI:
        value = float(datum.number) * _IN_SI[datum.unit]
    else:
        read = unit(datum.unit)
        value = float(datum.number) * read.factor + read.offset
    value = abs(value) if name == "L" else value
    text = datum.text.lstrip("-−") if name == "L" else datum.text
    return draft.leaf(Leaf(f"standard_{name}", value, text, datum.unit.replace("/m2", "/m²").replace("s2", "s²"), TABLE,
                           f"{facts.source(datum.source).title}, {datum.locator}"))

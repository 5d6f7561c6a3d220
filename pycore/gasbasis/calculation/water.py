"""The water content of the gas, by whichever way the case knows it."""
from __future__ import annotations

from gasbasis import facts, relations
from gasbasis.calculation import leaves
from gasbasis.calculation.case import Case
from gasbasis.calculation.path import TABLE, Drafting, Leaf, Shown, Step
from gasbasis.calculation.pressure import gas_pressure
from gasbasis.errors import Missing, OutOfRange
from gasbasis.language.basis import Quantity, Route
from gasbasis.language.species import find

_PERCENT, _PASCAL, _MOLE, _ONE = Shown(1e-2, "%"), Shown(1e3, "kPa"), Shown(1.0, "mol"), Shown(1.0, "")
_FIELD = "gas.water_route"
_FREEZING = 273.15                     # K; the equation over liquid water ends at the triple point, 0.01 K above
_HIGHEST = 5e5                         # Pa; at 60 bar p_sat/p is a third too low


def water_content(draft: Drafting, case: Case, why: str) -> str:
    """The name of the water content. [mol/mol] Raises Missing, saying `why` it is needed."""
    if case.gas.droplets:
        return _with_droplets(draft, case, why)
    return _measured(draft, case, why)


def _with_droplets(draft: Drafting, case: Case, why: str) -> str:
    """Droplets show that the gas is saturated: the lower of measured and saturated counts (US EPA Method 4)."""
    if case.gas.temperature is None:
        raise Missing("With droplets the gas is saturated at its own temperature, which is needed.",
                      hint="Add it to the gas, e.g. '48 °C', and its pressure.", field="gas.temperature")
    saturated = _saturated_at(draft, case, case.gas.temperature, None, "gas.temperature", "gas")
    if case.gas.water_content is None and case.gas.water_route is None:
        return saturated
    measured = _measured(draft, case, why)
    taken, words = (measured, "measured") if draft.is_above(saturated, measured) else (saturated, "saturated")
    draft.choose(f"Droplets: the {words} water content is taken", "droplets are caught with the vapour, so the lower of measured and saturated counts",
                 facts.source("us-epa-method-4").title)
    return taken


def _measured(draft: Drafting, case: Case, why: str) -> str:
    if case.gas.water_content is not None:
        return leaves.from_quantity(draft, case, "h", case.gas.water_content, "gas.water_content")
    route = case.gas.water_route
    if route is None:
        raise Missing(f"Water content is needed {why}.",
                      hint="Add it to the gas in percent ('12 % H2O'), as a dew point, a relative humidity, wet and dry bulb, or water collected.",
                      field="gas.water_content")
    return _ROUTES[route.id](draft, case, route)


def residual_water(draft: Drafting, case: Case) -> str:
    """The water the analyser's gas still holds behind its cooler: saturated there, or all there was if that is less. [mol/mol]"""
    left = _saturated_at(draft, case, case.gas.cooler, None, "gas.cooler", "cooler")
    if case.gas.water_content is None and case.gas.water_route is None:
        return left
    whole = water_content(draft, case, "")
    if draft.is_above(left, whole):
        draft.choose("The cooler takes out no water", "the gas holds less water than it could hold at the cooler")
        return whole
    return left


def _from_vapour(draft: Drafting, case: Case, vapour: str, pressure: Quantity | None, name: str = "h") -> str:
    total = leaves.from_quantity(draft, case, f"p_{name}", pressure, _FIELD) if pressure else gas_pressure(draft, case, "with a dew point, a humidity or a cooler")
    if draft.is_above(total, _HIGHEST):
        raise OutOfRange("At this pressure the water content is not saturation pressure over total pressure: at 60 bar it would be a third too low.",
                         hint="Give the water content in percent, measured or from an equation made for line pressure.", field="gas.water_content")
    return draft.step(Step(relations.get("water_from_vapour_pressure"), {"e": vapour, "p": total}, name, _PERCENT))


def _saturation(draft: Drafting, case: Case, temperature: Quantity, field: str, tag: str, over_ice: bool = False) -> str:
    """The saturation pressure at a temperature: over liquid water from the triple point up, over ice when it is a frost point."""
    T = leaves.from_temperature(draft, case, f"T_{tag}", temperature, field)
    if over_ice:
        return _over_ice(draft, T, tag)
    if not draft.is_above(temperature, _FREEZING, or_equal=True):
        raise OutOfRange(f"{temperature.number.text} {temperature.unit.text} lies below freezing: over ice and over supercooled water the pressures differ.",
                         hint="If it was a frost point, say so: 'frost point -20 °C'.", field=field)
    equation = _equation("wagner-pruss")
    T_c = _table_leaf(draft, "T_c", equation["Tc"], "K", equation)
    tau = draft.step(Step(relations.get("reduced_temperature_complement"), {"T": T, "T_c": T_c}, f"tau_{tag}", _ONE))
    arguments = {"tau": tau, "T": T, "T_c": T_c, "p_c": _table_leaf(draft, "p_c", equation["pc"], "Pa", equation),
                 **{f"a_{i}": _table_leaf(draft, f"a_{i}", text, "", equation) for i, text in enumerate(equation["a"], start=1)}}
    return draft.step(Step(relations.get("saturation_pressure_over_water"), arguments, f"p_s_{tag}", _PASCAL))


saturation_pressure = _saturation      # also of a metered gas, at the meter


def _over_ice(draft: Drafting, T: str, tag: str) -> str:
    equation = _equation("iapws-r14-08")
    theta = draft.step(Step(relations.get("reduced_temperature"), {"T": T, "T_t": _table_leaf(draft, "T_t", equation["Tt"], "K", equation)}, f"theta_{tag}", _ONE))
    arguments = {"theta": theta, "p_t": _table_leaf(draft, "p_t", equation["pt"], "Pa", equation),
                 **{f"{letter}_{i}": _table_leaf(draft, f"ice_{letter}_{i}", text, "", equation)
                    for letter in "ab" for i, text in enumerate(equation[letter], start=1)}}
    return draft.step(Step(relations.get("sublimation_pressure_over_ice"), arguments, f"p_s_{tag}", _PASCAL))


def _equation(identity: str):
    return next(equation for equation in facts.table("water_saturation")["equations"] if equation["id"] == identity)


def _table_leaf(draft: Drafting, name: str, text: str, unit_text: str, equation) -> str:
    return draft.leaf(Leaf(f"water_{name}", float(text), text, unit_text, TABLE, f"{facts.source(equation['source']).title}, {equation['locator']}"))


def _constant(draft: Drafting, identity: str, factor: float) -> str:
    datum = facts.constant(identity)
    return draft.leaf(Leaf(identity, float(datum.number) * factor, datum.text, datum.unit, TABLE, f"{facts.source(datum.source).title}, {datum.locator}"))


def _water_mass(draft: Drafting) -> str:
    return leaves.species_mass(draft, "M_water", find("H2O"), _FIELD)


def _saturated_at(draft: Drafting, case: Case, temperature: Quantity, pressure: Quantity | None, field: str, tag: str, over_ice: bool = False) -> str:
    return _from_vapour(draft, case, _saturation(draft, case, temperature, field, tag, over_ice), pressure, "h" if tag == "dew" else f"h_{tag}")


def _dew_point(draft: Drafting, case: Case, route: Route) -> str:
    _refuse_above_gas(draft, case, route.get("temperature"))
    return _saturated_at(draft, case, route.get("temperature"), route.get("pressure"), _FIELD, "dew", route.id == "frost_point")


def _refuse_above_gas(draft: Drafting, case: Case, dew: Quantity) -> None:
    gas = case.gas.temperature
    if gas is not None and draft.is_above(dew, gas):
        raise OutOfRange(f"The dew point of {dew.number.text} {dew.unit.text} lies above the gas temperature of {gas.number.text} {gas.unit.text}.",
                         hint="A gas cannot be warmer at its dew point than it is; with droplets say 'saturated at' the gas temperature.", field=_FIELD)


def _relative_humidity(draft: Drafting, case: Case, route: Route) -> str:
    saturation = _saturation(draft, case, route.get("temperature"), _FIELD, "air")
    phi = leaves.from_quantity(draft, case, "phi", route.get("humidity"), _FIELD)
    vapour = draft.step(Step(relations.get("vapour_pressure_from_relative_humidity"), {"phi": phi, "p_s": saturation}, "e", _PASCAL))
    return _from_vapour(draft, case, vapour, route.get("pressure"))


def _wet_bulb(draft: Drafting, case: Case, route: Route) -> str:
    saturation = _saturation(draft, case, route.get("wet_bulb"), _FIELD, "wet")
    arguments = {"p_w": saturation, "A": _constant(draft, "psychrometer_constant", 1.0), "p": gas_pressure(draft, case, "with wet and dry bulb"),
                 "T_d": leaves.from_temperature(draft, case, "T_dry_bulb", route.get("dry_bulb"), _FIELD), "T_w": "T_wet"}
    vapour = draft.step(Step(relations.get("vapour_pressure_from_wet_bulb"), arguments, "e", _PASCAL))
    return _from_vapour(draft, case, vapour, None)


def _collected(draft: Drafting, case: Case, route: Route) -> str:
    water = route.get("water")
    mass = leaves.from_quantity(draft, case, "water_collected", water, _FIELD)
    if water.unit.kind == "volume":
        mass = draft.step(Step(relations.get("mass_of_collected_water"), {"V_l": mass, "rho": _constant(draft, "density_of_water", 1e3)}, "m_water", Shown(1e-3, "g")))
    n_w = draft.step(Step(relations.get("amount_of_collected_water"), {"m": mass, "M_water": _water_mass(draft)}, "n_w", _MOLE))
    volume = leaves.from_quantity(draft, case, "V_metered", route.get("volume"), _FIELD)
    if case.gas.meter_factor is not None:
        factor = leaves.from_quantity(draft, case, "Y", case.gas.meter_factor, "gas.meter_factor")
        volume = draft.step(Step(relations.get("metered_volume"), {"V_read": volume, "Y": factor}, "V_true", Shown(1.0, "m³")))
    n_g = draft.step(Step(relations.get("amount_of_metered_gas"), {
        "V": volume, "p": leaves.from_quantity(draft, case, "p_meter", route.get("pressure"), _FIELD),
        "T": leaves.from_temperature(draft, case, "T_meter", route.get("temperature"), _FIELD), "Z": leaves.ideal(draft, "Z_meter"), "R": leaves.gas_constant(draft)},
        "n_g", _MOLE))
    return draft.step(Step(relations.get("water_from_amounts"), {"n_w": n_w, "n_g": n_g}, "h", _PERCENT))


def _mass_per_volume(draft: Drafting, case: Case, route: Route) -> str:
    ratio = draft.step(Step(relations.get("water_per_dry_gas_from_mass_concentration"), {
        "g": leaves.from_quantity(draft, case, "water_per_volume", route.get("content"), _FIELD), "M_water": _water_mass(draft),
        "p": leaves.from_quantity(draft, case, "p_water", route.get("pressure"), _FIELD), "T": leaves.from_temperature(draft, case, "T_water", route.get("temperature"), _FIELD),
        "Z": leaves.ideal(draft, "Z_water"), "R": leaves.gas_constant(draft)}, "X", Shown(1.0, "mol/mol")))
    return draft.step(Step(relations.get("water_from_water_per_dry_gas"), {"X": ratio}, "h", _PERCENT))


def _mixing_ratio(draft: Drafting, case: Case, route: Route) -> str:
    from gasbasis.calculation.matrix import dry_gas_molar_mass   # the two ask for each other: wet gas needs its water, a mass ratio its gas
    ratio = draft.step(Step(relations.get("water_per_dry_gas_from_mixing_ratio"), {
        "r": leaves.from_quantity(draft, case, "water_per_mass", route.get("ratio"), _FIELD), "M_dry": dry_gas_molar_mass(draft, case), "M_water": _water_mass(draft)},
        "X", Shown(1.0, "mol/mol")))
    return draft.step(Step(relations.get("water_from_water_per_dry_gas"), {"X": ratio}, "h", _PERCENT))


_ROUTES = {"dew_point": _dew_point, "frost_point": _dew_point, "saturated": _dew_point, "relative_humidity": _relative_humidity, "wet_bulb": _wet_bulb,
           "collected": _collected, "mass_per_volume": _mass_per_volume, "mixing_ratio": _mixing_ratio}

"""Mass per heat of fuel by an F factor: from the table, one's own, or from the fuel's ultimate analysis."""
from __future__ import annotations

from gasbasis import facts, relations
from gasbasis.calculation import leaves, matrix
from gasbasis.calculation.case import Case
from gasbasis.calculation.path import TABLE, Drafting, Leaf, Shown, Step
from gasbasis.errors import Missing, OutOfRange
from gasbasis.language.basis import DRY, WET
from gasbasis.language.emission import BY_CARBON_DIOXIDE, BY_WET_OXYGEN, NET, Emission
from gasbasis.language.units import unit

_COLUMN = {None: "Fd", "oxygen": "Fd", BY_CARBON_DIOXIDE: "Fc", BY_WET_OXYGEN: "Fw"}
_MEGAJOULE = Shown(1e-6, "m³/MJ")


def wanted_water(emission: Emission) -> str:
    """The water basis the form counts concentration and diluent on."""
    return WET if emission.by == BY_WET_OXYGEN else DRY


def per_heat(draft: Drafting, case: Case, gamma: str, shown: Shown) -> tuple[str, tuple[str, ...]]:
    """The name of the mass per heat [kg/J], and its basis in words. Raises Missing, OutOfRange."""
    emission = case.emission
    by = emission.by
    F = _factor(draft, case)
    if by == BY_CARBON_DIOXIDE:
        arguments = {"gamma": gamma, "F_c": F, "CO2": matrix.carbon_dioxide_dry(draft, case)}
        relation, words = "mass_per_heat_from_carbon_dioxide", "by carbon dioxide"
    elif by == BY_WET_OXYGEN:
        arguments = {"gamma": gamma, "F_w": F, "A": _ambient(draft, case), "B": _air_water(draft, case), "O_wet": _wet_oxygen(draft, case)}
        relation, words = "mass_per_heat_from_wet_oxygen", "by wet oxygen"
    else:
        arguments = {"gamma": gamma, "F_d": F, "A": _ambient(draft, case), "O": matrix.oxygen_dry(draft, case)}
        relation, words = "mass_per_heat_from_dry_oxygen", "by oxygen"
    name = draft.step(Step(relations.get(relation), arguments, "E_heat", shown))
    return name, (f"F factor of {_fuel_words(emission)}, {words}", "gross heat")


def _fuel_words(emission: Emission) -> str:
    if emission.factor is not None:
        return "one's own"
    return "the fuel's analysis" if emission.analysis else _row(emission)["name"]


def _row(emission: Emission):
    return next(row for row in facts.table("f_factors")["fuels"] if row["id"] == emission.fuel)


def _factor(draft: Drafting, case: Case) -> str:
    """The F factor the form takes. [m3/J]"""
    emission = case.emission
    if emission.factor is not None:
        return leaves.from_quantity(draft, case, "F", emission.factor, "emission.factor")
    if emission.analysis:
        return _from_analysis(draft, case)
    row, column, table = _row(emission), _COLUMN[emission.by], facts.table("f_factors")
    if column not in row:
        raise Missing(f"{row['name'].capitalize()} has no {column} in the table.", hint="Count by dry oxygen or by carbon dioxide, or give a factor of your own: 'F 9240 ft3/MMBtu'.", field="emission.fuel")
    return draft.leaf(Leaf("F", float(row[column]) * unit(table["unit"]).factor, row[column], "ft³/MMBtu", TABLE,
                           f"{column} of {row['name']}: {facts.source(table['source']).title}, {table['locator']}"))


_ELEMENTS = {"H": ("K_h", "Khd"), "C": ("K_c", "Kc"), "S": ("K_s", "Ks"), "N": ("K_n", "Kn"), "O": ("K_o", "Ko")}


def _from_analysis(draft: Drafting, case: Case) -> str:
    emission = case.emission
    analysis = dict(emission.analysis)
    if emission.heating_value is None:
        raise Missing("An F factor from the analysis needs the gross calorific value of the fuel.", hint="Add it, e.g. 'gross 29.5 MJ/kg'.", field="emission.heating_value")
    if emission.heating_value_said == NET:
        raise OutOfRange("F factors count the gross heat of the fuel; the calorific value is net.",
                         hint="Give the gross one: net and 2.44 MJ/kg times the water formed and held, 9 H + W.", field="emission.heating_value")
    if emission.by == BY_WET_OXYGEN:
        raise Missing("The wet factor from an analysis is not worked out here.", hint="Count by dry oxygen or by carbon dioxide, or give the factor: 'F 10610 ft3/MMBtu'.", field="emission.by")
    Q = leaves.from_quantity(draft, case, "Q_fuel", emission.heating_value, "emission.heating_value")
    if emission.by == BY_CARBON_DIOXIDE:
        if "C" not in analysis or not analysis["C"].si:
            raise OutOfRange("A fuel without carbon has no carbon dioxide factor.", hint="Count by oxygen: leave out 'by CO2'.", field="emission.analysis")
        arguments = {"K_c": _coefficient(draft, "Kcc"), "C": _content(draft, case, "C", analysis["C"]), "Q": Q}
        return draft.step(Step(relations.get("carbon_dioxide_factor"), arguments, "F", _MEGAJOULE))
    missing = [element for element in _ELEMENTS if element not in analysis]
    if missing:
        raise Missing(f"The analysis of the fuel leaves out {', '.join(missing)}.", hint="Give all of C, H, S, N and O in percent by mass; what is not there is 0.", field="emission.analysis")
    arguments = {}
    for element, (letter, column) in _ELEMENTS.items():
        arguments[letter] = _coefficient(draft, column)
        arguments[element] = _content(draft, case, element, analysis[element])
    relation = relations.get("dry_gas_factor")
    return draft.step(Step(relation, {name: Q if name == "Q" else arguments[name] for name in relation.symbols}, "F", _MEGAJOULE))


def _content(draft: Drafting, case: Case, element: str, quantity) -> str:
    return leaves.from_quantity(draft, case, f"content_{element}", quantity, "emission.analysis")


def _coefficient(draft: Drafting, column: str) -> str:
    """As printed: cubic feet of gas per pound of fuel and percent of the element."""
    table = facts.table("f_factor_coefficients")
    per_percent = 100.0 * unit("ft3").factor / unit("lb").factor
    return draft.leaf(Leaf(f"coefficient_{column}", float(table[column]) * per_percent, table[column], "ft³/(lb·%)", TABLE, f"{facts.source(table['source']).title}, {table['locator']}"))


def _ambient(draft: Drafting, case: Case) -> str:
    if case.gas.ambient_oxygen is None:
        raise Missing("The oxygen of ambient air that the form counts from is needed.", hint="Add it to the gas, e.g. 'ambient O2 20.9 %'.", field="gas.ambient_oxygen")
    return leaves.from_quantity(draft, case, "A", case.gas.ambient_oxygen, "gas.ambient_oxygen")


def _air_water(draft: Drafting, case: Case) -> str:
    if case.emission.air_water is None:
        raise Missing("The wet form needs the water of the ambient air.", hint="Add it, e.g. 'air water 2.7 %': the method lets 0.027 stand for it.", field="emission.air_water")
    return leaves.from_quantity(draft, case, "B_air", case.emission.air_water, "emission.air_water")


def _wet_oxygen(draft: Drafting, case: Case) -> str:
    """The measured oxygen on wet gas."""
    quantity, water, field = matrix.measured_oxygen(case)
    if water == WET:
        return leaves.from_quantity(draft, case, "O", quantity, field)
    raise OutOfRange(f"The wet form takes the oxygen as read in wet gas; {quantity.number.text} % was read {'dry' if water else 'without saying how'}.",
                     hint="Say '7.1 % O2 wet' in the gas, or count by dry oxygen.", field=field)

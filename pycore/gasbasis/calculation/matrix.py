"""The molar mass of the gas that carried the species, by whichever way the case knows it."""
from __future__ import annotations

from gasbasis import facts, relations
from gasbasis.calculation import composition, leaves
from gasbasis.calculation.case import Case
from gasbasis.calculation.path import TABLE, Drafting, Leaf, Shown, Step
from gasbasis.calculation.water import residual_water, water_content
from gasbasis.errors import Missing, OutOfRange
from gasbasis.language.basis import DRY, WET, MatrixGas, Quantity
from gasbasis.language.species import find

_GRAM_PER_MOLE = Shown(1e-3, "g/mol")


def gas_molar_mass(draft: Drafting, case: Case, water: str | None) -> str:
    """The name of the molar mass of the gas on the given basis. [kg/mol]

    On a wet basis the dry gas of a preset or a composition is wetted with the case's water content;
    a stated molar mass is that of the gas on the basis of the statement. Raises Missing.
    """
    matrix = case.hold.matrix_gas or case.gas.matrix_gas or case.owe.matrix_gas
    if matrix is None:
        raise Missing("A mass fraction needs the molar mass of the gas that carried the species.",
                      hint="Add the gas, e.g. 'in nitrogen', 'in dry air', 'M 28.9 g/mol' or a composition.",
                      field="gas.matrix_gas")
    dry = _MOLAR_MASS[matrix.id](draft, case, matrix)
    return _wetted(draft, case, dry) if water == WET and matrix.id != "stated" else dry


def dry_gas_molar_mass(draft: Drafting, case: Case) -> str:
    """The name of the molar mass of the dry gas. [kg/mol] Raises Missing."""
    return gas_molar_mass(draft, case, DRY)


def oxygen_dry(draft: Drafting, case: Case) -> str:
    """The name of the measured oxygen on dry gas. [mol/mol]"""
    quantity, water, field = measured_oxygen(case)
    name = leaves.from_quantity(draft, case, "O", quantity, field)
    if water == DRY and case.gas.cooler is not None:
        relation = relations.get("oxygen_dry_from_wet")
        return draft.step(Step(relation, {"O_wet": name, "h": residual_water(draft, case)}, "O_dry", Shown(0.01, "%"),
                               note="The analyser's gas still held the water of its cooler."))
    return name if water != WET else _dried(draft, case, "oxygen_dry_from_wet", "O_wet", name, "O_dry", "%", 0.01)


def measured_oxygen(case: Case) -> tuple[Quantity, str | None, str]:
    """The oxygen measured in the gas, how it was read, and the input it is in. Raises Missing."""
    hold, gas = case.hold, case.gas
    if hold.oxygen is not None and hold.oxygen_meaning == "measured":
        if gas.oxygen is not None and gas.oxygen.si != hold.oxygen.si:
            raise OutOfRange(f"The measured oxygen is given twice: {hold.oxygen.number.text} % in You hold and "
                             f"{gas.oxygen.number.text} % in It was in.",
                             hint="Keep the one measured with the held value.", field="gas.oxygen")
        return hold.oxygen, hold.oxygen_water or gas.oxygen_water, "hold.oxygen"
    if gas.oxygen is None:
        raise Missing("The measured oxygen is needed to refer the figure to another oxygen.",
                      hint="Add it to the gas, e.g. '9.2 % O2 dry'. If the held value is already referred to an "
                           "oxygen, say so there: 'corrected to 11 % O2'.", field="gas.oxygen")
    return gas.oxygen, gas.oxygen_water, "gas.oxygen"


def carbon_dioxide_dry(draft: Drafting, case: Case) -> str:
    """The name of the measured carbon dioxide on dry gas. [mol/mol] Raises Missing."""
    hold, gas = case.hold, case.gas
    own = hold.carbon_dioxide is not None and hold.carbon_dioxide_meaning == "measured"
    quantity, water, field = ((hold.carbon_dioxide, hold.carbon_dioxide_water or hold.water, "hold.carbon_dioxide") if own
                              else (gas.carbon_dioxide, gas.carbon_dioxide_water, "gas.carbon_dioxide"))
    if quantity is None:
        raise Missing("The measured carbon dioxide is needed: for a correction to it, and for the molar mass of a combustion gas.",
                      hint="Add it to the gas, e.g. '10.1 % CO2 dry'; for the molar mass alone 'M 30.2 g/mol' will do.",
                      field="gas.carbon_dioxide")
    name = leaves.from_quantity(draft, case, "CO2", quantity, field)
    return name if water != WET else _dried(draft, case, "carbon_dioxide_dry_from_wet", "CO2_wet", name, "CO2_dry", "%", 0.01)


def _dried(draft: Drafting, case: Case, relation_id: str, argument: str, name: str, result: str,
           unit_text: str, factor: float) -> str:
    h = water_content(draft, case, "to bring the oxygen from wet to dry gas")
    return draft.step(Step(relations.get(relation_id), {argument: name, "h": h}, result, Shown(factor, unit_text)))


def _wetted(draft: Drafting, case: Case, dry: str) -> str:
    h = water_content(draft, case, "for the molar mass of the wet gas")
    water = leaves.species_mass(draft, "M_water", find("H2O"), "gas.water_content")
    return draft.step(Step(relations.get("molar_mass_of_wet_gas"), {"M_dry": dry, "h": h, "M_water": water},
                           "M_gas_wet", _GRAM_PER_MOLE))


def _nitrogen(draft: Drafting, case: Case, matrix: MatrixGas) -> str:
    return leaves.species_mass(draft, "M_gas", find("N2"), "gas.matrix_gas")


def _dry_air(draft: Drafting, case: Case, matrix: MatrixGas) -> str:
    datum = facts.constant("molar_mass_of_dry_air")
    return draft.leaf(Leaf("M_gas", float(datum.number) * 1e-3, datum.text, "g/mol", TABLE,
                           f"{facts.source(datum.source).title}, {datum.locator}"))


def _stated(draft: Drafting, case: Case, matrix: MatrixGas) -> str:
    return leaves.from_quantity(draft, case, "M_gas", matrix.molar_mass, "gas.matrix_gas")


def _composition(draft: Drafting, case: Case, matrix: MatrixGas) -> str:
    return composition.molar_mass(draft, matrix)


def _combustion_gas(draft: Drafting, case: Case, matrix: MatrixGas) -> str:
    oxygen = oxygen_dry(draft, case)
    name = carbon_dioxide_dry(draft, case)
    rounded = {f"M_{gas}": _method_3(draft, gas) for gas in ("O2", "CO2", "N2")}
    return draft.step(Step(relations.get("molar_mass_of_combustion_gas"), {"O2": oxygen, "CO2": name, **rounded}, "M_gas", _GRAM_PER_MOLE))


def _method_3(draft: Drafting, gas: str) -> str:
    datum = facts.constant(f"method_3_{gas}")
    return draft.leaf(Leaf(f"M_{gas}_rounded", float(datum.number) * 1e-3, datum.text, datum.unit, TABLE,
                           f"{facts.source(datum.source).title}, {datum.locator}"))


_MOLAR_MASS = {"nitrogen": _nitrogen, "dry_air": _dry_air, "stated": _stated, "composition": _composition,
               "combustion_gas": _combustion_gas}

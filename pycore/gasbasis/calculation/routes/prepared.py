"""A held value from a prepared gas: a diluted cylinder, a permeation device, or saturated mercury vapour."""
from __future__ import annotations

from gasbasis import facts, relations
from gasbasis.calculation import leaves
from gasbasis.calculation.case import Case
from gasbasis.calculation.conditions import conditions_doubt
from gasbasis.calculation.path import TABLE, Drafting, Leaf, Shown, Step
from gasbasis.calculation.routes.held import Held, plain
from gasbasis.errors import Missing, OutOfRange
from gasbasis.language.basis import VOLUME, Doubt, Quantity, Reading, Statement
from gasbasis.language.prepared import CYLINDER, PERMEATION, VAPOUR, Prepared
from gasbasis.language.species import find
from gasbasis.language.units import unit

_FLOW = Shown(1e-3, "mmol/s")
_NANOGRAM = Shown(1e-12, "ng")
_CONCENTRATION = "ug/m3"
_COUNTED = {"cylinder": "cylinder_flow", "flow": "flow", "volume": "volume"}


def hold_statement(prepared: Prepared) -> Statement:
    """What is held: an amount fraction, or a mass concentration where the flow or volume counts. Raises Missing, naming the field."""
    if prepared.way is None:
        raise Missing("How the gas was prepared is needed.", hint="Say 'cylinder NO 998 ppm, ...', 'permeation Hg 120 ng/min in ...' or 'saturated mercury vapour 100 uL at 22 °C in ...'.",
                      field="prepared")
    if prepared.way == CYLINDER:
        _require(prepared, "content", "The content of the cylinder", "998 ppm")
        if prepared.flow is not None:
            _require(prepared, "cylinder_flow", "The flow from the cylinder", "250 mL/min at 0 °C, 101.325 kPa")
        elif prepared.cylinder_flow is not None:
            _require(prepared, "flow", "The flow it is diluted in", "in 4750 mL/min at 0 °C, 101.325 kPa")
        return Statement(species=prepared.species, value=plain(prepared.content), unit=prepared.content.unit, parts_by=prepared.parts_by, matrix_gas=prepared.matrix_gas)
    if prepared.way == PERMEATION:
        _require(prepared, "permeation", "The permeation rate", "120 ng/min")
        _require(prepared, "flow", "The flow it goes into", "in 1.5 L/min at 0 °C, 101.325 kPa")
        value, owner = prepared.permeation, "flow"
    else:
        _require(prepared, "vapour_volume", "The volume of vapour", "100 uL")
        _require(prepared, "vapour_temperature", "The temperature of the vapour", "100 uL at 22 °C")
        _require(prepared, "volume", "The volume of gas it is in", "in 2.0 L at 20 °C, 1 atm")
        value, owner = prepared.vapour_volume, "volume"
    return Statement(species=prepared.species, value=plain(value), unit=unit(_CONCENTRATION), temperature=_plain(getattr(prepared, f"{owner}_temperature")),
                     pressure=_plain(getattr(prepared, f"{owner}_pressure")), conditions_word=prepared.flow_word if owner == "flow" else None, matrix_gas=prepared.matrix_gas)


def _plain(quantity: Quantity | None) -> Quantity | None:
    return None if quantity is None else plain(quantity)


def _require(prepared: Prepared, field: str, what: str, example: str) -> None:
    if getattr(prepared, field) is None:
        raise Missing(f"{what} is needed.", hint=f"Add it, e.g. '{example}'.", field=f"prepared.{field}")


def condition(draft: Drafting, case: Case, letter: str) -> str | None:
    """The name of the temperature or pressure the flow or volume is counted at; None where the line does not say it."""
    owner = {PERMEATION: "flow", VAPOUR: "volume"}.get(case.prepared.way)
    word = "temperature" if letter == "T" else "pressure"
    quantity = getattr(case.prepared, f"{owner}_{word}") if owner else None
    if quantity is None:
        return None
    lay = leaves.from_temperature if letter == "T" else leaves.from_quantity
    return lay(draft, case, f"{letter}_{owner}", quantity, f"prepared.{owner}_{word}")


def held(draft: Drafting, case: Case) -> Held:
    """Lay the steps from the certificate, the permeation rate or the volume of vapour to the content of the gas."""
    return {CYLINDER: _diluted, PERMEATION: _permeated, VAPOUR: _injected}[case.prepared.way](draft, case)


def _diluted(draft: Drafting, case: Case) -> Held:
    prepared, unit_ = case.prepared, case.prepared.content.unit
    shown = Shown(unit_.factor, unit_.text)
    x = leaves.from_quantity(draft, case, "x_cylinder", prepared.content, "prepared.content")
    if prepared.flow is None:
        return Held(x, x, unit_.factor, shown)
    if case.hold.parts_by not in (None, VOLUME):
        raise OutOfRange("Flows are brought together by amounts: a content by mass is not diluted so.", hint="Give the certificate's amount fraction, e.g. '998 ppm by volume'.", field="prepared.content")
    n_c, n_d = _amount_flow(draft, case, "cylinder"), _amount_flow(draft, case, "flow")
    return Held(draft.step(Step(relations.get("diluted_amount_fraction"), {"x": x, "n_c": n_c, "n_d": n_d}, "x_diluted", shown)), x, unit_.factor, shown)


def _amount_flow(draft: Drafting, case: Case, owner: str) -> str:
    field = _COUNTED[owner]
    q = leaves.from_quantity(draft, case, f"q_{owner}", getattr(case.prepared, field), f"prepared.{field}")
    temperature, pressure = (getattr(case.prepared, f"{owner}_{name}") for name in ("temperature", "pressure"))
    for name, quantity, example in (("temperature", temperature, "0 °C"), ("pressure", pressure, "101.325 kPa")):
        if quantity is None:
            raise Missing(f"The reference {name} of the flow controller is needed.", hint=f"Put it behind its flow, e.g. 'at {example}'; it stands in the controller's manual.",
                          field=f"prepared.{owner}_{name}")
    return draft.step(Step(relations.get("amount_flow"), {
        "q": q, "p": leaves.from_quantity(draft, case, f"p_{owner}", pressure, f"prepared.{owner}_pressure"),
        "T": leaves.from_temperature(draft, case, f"T_{owner}", temperature, f"prepared.{owner}_temperature"), "Z": leaves.ideal(draft, "Z_controller"),
        "R": leaves.gas_constant(draft)}, f"n_{owner}", _FLOW))


def _permeated(draft: Drafting, case: Case) -> Held:
    prepared, shown = case.prepared, Shown(case.hold.unit.factor, case.hold.unit.text)
    rate = leaves.from_quantity(draft, case, "m_permeation", prepared.permeation, "prepared.permeation")
    q = leaves.from_quantity(draft, case, "q_flow", prepared.flow, "prepared.flow")
    name = draft.step(Step(relations.get("mass_concentration_of_permeation"), {"m": rate, "q": q}, "gamma_prepared", shown))
    return Held(name, rate, prepared.permeation.unit.factor, shown)


def _injected(draft: Drafting, case: Case) -> Held:
    prepared, shown = case.prepared, Shown(case.hold.unit.factor, case.hold.unit.text)
    V = leaves.from_quantity(draft, case, "V_vapour", prepared.vapour_volume, "prepared.vapour_volume")
    gamma = saturated(draft, case, prepared.vapour_temperature, "prepared.vapour_temperature", prepared.equation)
    mass = draft.step(Step(relations.get("mass_of_vapour"), {"gamma": gamma, "V": V}, "m_vapour", _NANOGRAM))
    volume = leaves.from_quantity(draft, case, "V_gas", prepared.volume, "prepared.volume")
    name = draft.step(Step(relations.get("mass_concentration_of_injection"), {"m": mass, "V": volume}, "gamma_prepared", shown))
    return Held(name, V, prepared.vapour_volume.unit.factor, shown)


# --- saturated mercury vapour ---

def saturated(draft: Drafting, case: Case, temperature: Quantity, field: str, equation: str | None) -> str:
    """The name of the mass concentration of saturated mercury vapour. [kg/m3] Raises Missing when the equation is not settled."""
    T = leaves.from_temperature(draft, case, "T_vapour", temperature, field)
    if equation is None:
        raise Missing("The equation of the saturated mercury vapour is needed: the two in use differ by 7 %.", hint="Say 'Dumarey' or 'Huber'.", field="prepared.equation")
    return {"dumarey": _dumarey, "huber": _huber}[equation](draft, T)


def _equation(identity: str):
    return next(row for row in facts.table("mercury_vapour")["equations"] if row["id"] == identity)


def _coefficient(draft: Drafting, row, name: str, text: str, unit_text: str = "", factor: float = 1.0) -> str:
    return draft.leaf(Leaf(f"mercury_{name}", float(text) * factor, text, unit_text, TABLE, f"{facts.source(row['source']).title}, {row['locator']}"))


def _dumarey(draft: Drafting, T: str) -> str:
    row = _equation("dumarey")
    per_millilitre = unit("ng/mL").factor
    arguments = {"T": T, "A": _coefficient(draft, row, "A", row["A"]), "B": _coefficient(draft, row, "B", row["B"], "K"),
                 "D": _coefficient(draft, row, "D", row["D"], "ng·K/mL", per_millilitre)}
    return draft.step(Step(relations.get("saturated_mass_concentration"), arguments, "gamma_saturated", Shown(per_millilitre, "ng/mL")))


def _huber(draft: Drafting, T: str) -> str:
    row = _equation("huber")
    arguments = {"T": T, "T_c": _coefficient(draft, row, "T_c", row["Tc"], "K"), "p_c": _coefficient(draft, row, "p_c", row["pc"], "Pa"),
                 **{f"a_{i}": _coefficient(draft, row, f"a_{i}", text) for i, text in enumerate(row["a"], start=1)},
                 **{f"e_{i}": _coefficient(draft, row, f"e_{i}", text) for i, text in enumerate(row["e"], start=1) if i > 1}}
    p_s = draft.step(Step(relations.get("vapour_pressure_of_mercury"), arguments, "p_mercury", Shown(1.0, "Pa")))
    mass = leaves.species_mass(draft, "M_Hg", find("Hg"), "prepared.species")
    return draft.step(Step(relations.get("mass_concentration_of_vapour"), {"p_s": p_s, "M": mass, "R": leaves.gas_constant(draft), "T": T}, "gamma_saturated", Shown(1e-6, "ng/mL")))


# --- what the text leaves open ---

def doubts(case: Case) -> list[Doubt]:
    """The reference conditions of each controller, and the equation of the vapour. A permeation flow's are those of what is held."""
    prepared = case.prepared
    found = []
    if prepared.way == VAPOUR and prepared.equation is None:
        found.append(equation_doubt())
    if prepared.way == CYLINDER and prepared.flow is not None and prepared.cylinder_flow is not None:
        for owner, name in (("cylinder", "cylinder gas"), ("flow", "dilution gas")):
            if getattr(prepared, f"{owner}_temperature") is None and getattr(prepared, f"{owner}_pressure") is None:
                found.append(_controller_doubt(owner, name, getattr(prepared, f"{_COUNTED[owner]}_word")))
    return found


def _controller_doubt(owner: str, name: str, word: str | None) -> Doubt:
    published = conditions_doubt("prepared", Statement(conditions_word=word))
    readings = tuple(Reading(reading.id, reading.label, tuple((f"{owner}_{field}", value) for field, value in reading.patch), reading.source) for reading in published.readings)
    return Doubt(f"prepared.{owner}_conditions", "flow controller", f"At which temperature and pressure does the controller of the {name} count its flow?",
                 "Controllers are set up for 0, 20, 21.1 or 25 °C; where both count alike it cancels.", readings)


def equation_doubt() -> Doubt:
    readings = []
    for identity in ("dumarey", "huber"):
        row = _equation(identity)
        readings.append(Reading(identity, row["name"], (("equation", identity),), f"{facts.source(row['source']).title}; {row['note']}"))
    return Doubt("prepared.equation", "mercury vapour", "By which equation is the saturated mercury vapour counted?",
                 "The two published equations differ by some 7 % near 20 °C.", tuple(readings))

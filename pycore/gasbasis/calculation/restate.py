"""Lay the path from a held statement to an owed one: which relations, in which order, on which inputs.

Nothing is computed here. The path is the shortest that is right and asks for nothing it does not use.
Order: bring the kind and the species to what is owed, then water, then oxygen; a mass fraction is
left first or reached last, because its gas changes with every basis.
"""
from __future__ import annotations

from dataclasses import dataclass, replace

from gasbasis import facts, relations
from gasbasis.calculation import leaves, matrix, pressure, real_gas, routes, rules, water
from gasbasis.calculation.basis_words import basis_words, species_words, unit_words
from gasbasis.calculation.case import (AMOUNT_CONCENTRATION, AMOUNT_FRACTION, MASS_CONCENTRATION, MASS_FRACTION,
                                       MASS_LIKE, PARTIAL_PRESSURE, UNSTATED_PARTS, VOLUMETRIC, Case, kind_and_factor,
                                       diluent_changes, same_conditions, stated_carbon_dioxide, stated_oxygen)
from gasbasis.calculation.correlations import correlations_of
from gasbasis.calculation.entity import entities_per, entity
from gasbasis.calculation.path import TABLE, Drafting, Leaf, Path, Shown, Step
from gasbasis.calculation.repeated import corrected_one_by_one
from gasbasis.calculation.routes import emission
from gasbasis.errors import Missing, OutOfRange
from gasbasis.language.basis import DRY, EACH, TOGETHER, WET, Quantity, Species, Statement
from gasbasis.language.numbers import significant
from gasbasis.language.species import molar_mass

MASS_PER_AMOUNT = "mass_per_amount_of_gas"
NEAR_AMBIENT = 0.02                    # oxygen this close below ambient is warned of
_SYMBOL = {AMOUNT_FRACTION: "x", MASS_FRACTION: "w", MASS_CONCENTRATION: "gamma", AMOUNT_CONCENTRATION: "c",
           PARTIAL_PRESSURE: "p_i", MASS_PER_AMOUNT: "q"}
_DIRECT = {(AMOUNT_FRACTION, MASS_CONCENTRATION), (MASS_CONCENTRATION, AMOUNT_FRACTION),
           (AMOUNT_FRACTION, AMOUNT_CONCENTRATION), (AMOUNT_CONCENTRATION, AMOUNT_FRACTION),
           (AMOUNT_FRACTION, PARTIAL_PRESSURE), (PARTIAL_PRESSURE, AMOUNT_FRACTION),
           (AMOUNT_FRACTION, MASS_FRACTION), (MASS_FRACTION, AMOUNT_FRACTION),
           (MASS_FRACTION, MASS_CONCENTRATION), (MASS_CONCENTRATION, MASS_FRACTION),
           (AMOUNT_CONCENTRATION, MASS_CONCENTRATION), (MASS_CONCENTRATION, AMOUNT_CONCENTRATION),
           (MASS_FRACTION, MASS_PER_AMOUNT), (MASS_PER_AMOUNT, MASS_FRACTION)}
_SHOWN = {AMOUNT_FRACTION: Shown(1e-6, "µmol/mol"), MASS_CONCENTRATION: Shown(1e-6, "mg/m³"),
          AMOUNT_CONCENTRATION: Shown(1e-3, "mmol/m³"), MASS_FRACTION: Shown(1e-6, "mg/kg"),
          PARTIAL_PRESSURE: Shown(1.0, "Pa"), MASS_PER_AMOUNT: Shown(1e-6, "mg/mol")}
_LABEL = {AMOUNT_FRACTION: "to amount fraction", MASS_CONCENTRATION: "to mass concentration",
          AMOUNT_CONCENTRATION: "to amount concentration", MASS_FRACTION: "to mass fraction",
          PARTIAL_PRESSURE: "to partial pressure", MASS_PER_AMOUNT: "to mass per amount of gas"}


@dataclass(frozen=True)
class Place:
    """Where the path has got to."""

    name: str                          # of the current result
    kind: str
    side: str                          # whose temperature and pressure a volume has: "hold" or "owe"
    water: str | None
    entity: Species | None
    shown: Shown


class _Laying:
    """One path being laid; `place` moves from held to owed."""

    def __init__(self, case: Case):
        self.case = case
        self.draft = Drafting()
        self.species = _one_species(case)
        self.owed_kind, owed_factor = kind_and_factor(case.owe)
        self.owed_shown = Shown(owed_factor, unit_words(case.owe))
        hold = case.hold
        kind, factor = kind_and_factor(hold)
        way = routes.lay_held(self.draft, case)
        self.held, self.held_factor = (way.leaf, way.leaf_factor) if way else (self.typed(hold, factor), factor)
        self.place = Place(way.name if way else self.held, kind, "hold", hold.water, entity(hold, self.species), Shown(factor, unit_words(hold)))
        self.uses_partial_pressure = False

    def typed(self, hold: Statement, factor: float) -> str:
        value = hold.value.si if hold.unit.kind != "parts" else float(hold.value.number.decimal) * factor
        spread = leaves.uncertain(hold.value, "hold.value")
        in_si = factor / hold.unit.factor              # parts by mass in volume count in kg/m3
        spread |= {"standard_uncertainty": spread["standard_uncertainty"] * in_si, "unit_factor": factor}
        return self.draft.leaf(Leaf("held", value, hold.value.number.text, unit_words(hold), "typed",
                                    "typed in You hold", "hold.value", **spread))

    # --- supplying what a relation asks for, by the name of its argument ---

    def supply(self, argument: str, side: str) -> str:
        case, draft = self.case, self.draft
        match argument:
            case "R":
                return leaves.gas_constant(draft)
            case "T" | "Z":
                return self.condition(argument, side)
            case "p":
                return self.total_pressure(side) if self.uses_partial_pressure else self.condition("p", side)
            case "M":
                if self.place.entity is None:
                    raise Missing("The species is needed: its molar mass enters here.",
                                  hint="Say what was measured, e.g. 'Hg' or 'SO2', or type its formula.",
                                  field="hold.species")
                return leaves.species_mass(draft, f"M_{self.place.entity.id}", self.place.entity, "hold.reported_as")
            case "V_m" | "K":
                return argument
            case "M_gas":
                return matrix.gas_molar_mass(draft, case, self.place.water)
        raise KeyError(argument)

    def condition(self, letter: str, side: str) -> str:
        """Temperature, pressure or compression factor of the volume a statement counts in."""
        case, draft = self.case, self.draft
        statement = case.record(side)
        if letter == "Z":
            return real_gas.ideal_or_real(draft, case, side, self.condition)
        if side == "hold" and (known := routes.condition(draft, case, letter)):
            return known
        word = "temperature" if letter == "T" else "pressure"
        if statement.actual_volume and word == "pressure":
            return pressure.gas_pressure(draft, case, "for a volume as it flowed")
        quantity, field = getattr(statement, word), f"{side}.{word}"
        if statement.actual_volume:
            quantity, field = case.gas.temperature, "gas.temperature"
        if quantity is None:
            where = "the gas as it flowed" if statement.actual_volume else leaves.SIDE_TITLES[side]
            raise Missing(f"The {word} that the volume in {leaves.SIDE_TITLES[side]} is counted at is needed.",
                          hint=f"Add it to {where}, e.g. 'at 20 °C, 101.325 kPa'.", field=field)
        lay = leaves.from_temperature if letter == "T" else leaves.from_quantity
        return lay(draft, case, f"{letter}_{side}", quantity, field)

    def total_pressure(self, side: str) -> str:
        quantity, field = self.case.record(side).total_pressure, f"{side}.total_pressure"
        if quantity is None and (self.case.gas.pressure or self.case.gas.pressure_route):
            return pressure.gas_pressure(self.draft, self.case, "for a partial pressure")
        if quantity is None:
            raise Missing("A partial pressure needs the total pressure of the gas.",
                          hint="Add it, e.g. '15 Pa in 1013 hPa', or give the gas its pressure.",
                          field=f"{side}.total_pressure")
        return leaves.from_quantity(self.draft, self.case, f"p_{side}_total", quantity, field)

    # --- moves ---

    def to_kind(self, kind: str) -> None:
        """Change the kind of quantity, on the basis the place stands on."""
        here = self.place
        if here.kind == kind:
            return
        if here.kind in VOLUMETRIC and kind in VOLUMETRIC:
            self.to_conditions()
        if (here.kind, kind) not in _DIRECT:
            self.to_kind(AMOUNT_FRACTION)
            return self.to_kind(kind)
        side = "owe" if kind in VOLUMETRIC and here.kind not in VOLUMETRIC or kind == PARTIAL_PRESSURE else self.place.side
        self.uses_partial_pressure = PARTIAL_PRESSURE in (here.kind, kind)
        relation = self.relation_between(self.place.kind, kind, side)
        through = next(iter(relation.symbols))
        arguments = {argument: self.place.name if argument == through else self.supply(argument, side)
                     for argument in relation.symbols}
        shown = self.owed_shown if kind == self.owed_kind else _SHOWN[kind]
        self.move(relation, arguments, through, shown, _LABEL[kind], kind=kind, side=side)

    def relation_between(self, held: str, owed: str, side: str):
        """The gas law, or the rule's own molar volume where it has one."""
        if {held, owed} == {AMOUNT_FRACTION, MASS_CONCENTRATION}:
            statement = self.case.record(side)
            own = rules.molar_volume(self.case.rule, statement.temperature, statement.pressure)
            if own is not None:
                self.draft.leaf(Leaf("V_m", float(own.number) * 1e-3, own.text, own.unit, TABLE, f"the rule's own, {own.locator}"))
                self.draft.choose("The rule's own molar volume", self.difference_from_exact(own, statement),
                                  f"{self.case.rule.title}, {self.case.rule.clause}")
                return relations.get(f"{owed}_from_molar_volume")
            printed = rules.printed_factor(self.case.rule, self.species, self.place.entity, statement.temperature, statement.pressure)
            if printed is not None:
                self.draft.leaf(Leaf("K", printed[0], printed[1].text, printed[1].unit, TABLE, f"the rule's own, {printed[1].locator}"))
                self.draft.choose("The rule's own factor", self.factor_from_exact(*printed, statement), f"{self.case.rule.title}, {self.case.rule.clause}")
                return relations.get(f"{owed}_from_printed_factor")
        return relations.get(f"{owed}_from_{held}")

    def difference_from_exact(self, own, statement) -> str:
        exact = relations.get("molar_volume").value(Z=1.0, R=float(facts.constant("molar_gas_constant").number),
                                                    T=statement.temperature.si, p=statement.pressure.si) * 1e3
        percent = significant(100 * (float(own.number) / exact - 1), 2)
        return f"{own.text} {own.unit} is used as the rule prints it; exact is {significant(exact, 6)} {own.unit}, a difference of {percent} %"

    def factor_from_exact(self, factor: float, own, statement) -> str:
        exact = relations.get("mass_concentration_from_amount_fraction").value(
            x=1.0, Z=1.0, R=float(facts.constant("molar_gas_constant").number), T=statement.temperature.si, p=statement.pressure.si, M=molar_mass(self.place.entity)[0])
        percent = significant(100 * (factor / exact - 1), 2)
        return f"{own.text} {own.unit} is used as the rule prints it; exact is {significant(float(own.number) * exact / factor, 5)} {own.unit}, a difference of {percent} %"

    def to_conditions(self) -> None:
        """Bring a volume from the held temperature and pressure to the owed ones."""
        if self.place.side == "owe":
            return
        if same_conditions(self.case.hold, self.case.owe):
            self.place = replace(self.place, side="owe")
            return
        relation = relations.get(f"{self.place.kind}_at_conditions")
        through = next(iter(relation.symbols))
        arguments = {through: self.place.name}
        for letter in ("p", "T", "Z"):
            arguments[f"{letter}_1"] = self.condition(letter, "hold")
            arguments[f"{letter}_2"] = self.condition(letter, "owe")
        parts = (("temperature", (("T_2", "T_1"),)), ("pressure", (("p_2", "p_1"),)))
        self.move(relation, {name: arguments[name] for name in relation.symbols}, through, self.step_shown(),
                  "to owed conditions", parts=parts, side="owe")

    def to_entity(self) -> None:
        """Count or weigh the species as what is owed."""
        here, owed = self.place, entity(self.case.owe, self.species)
        if self.case.owe.reported_as is None and self.case.hold.reported_as is not None:
            owed = here.entity                       # silence is carried over
        if owed is None or here.entity is None or owed.id == here.entity.id or here.kind == UNSTATED_PARTS:
            return
        number = entities_per(here.entity, owed, "owe.reported_as")
        if here.kind not in MASS_LIKE and number == 1.0:
            self.draft.choose(f"Reported as {owed.name}",
                              f"one {owed.name} stands for one {here.entity.name}: amounts do not change, only masses do")
            self.place = replace(here, entity=owed)
            return
        relation = relations.get(f"{here.kind}_as")
        through = next(iter(relation.symbols))
        n = self.draft.leaf(Leaf("n", number, significant(number, 6).rstrip("0").rstrip("."), "", TABLE,
                                 f"{owed.name} per {here.entity.name}, counted by the element they share"))
        arguments = {through: here.name, "n": n}
        if here.kind in MASS_LIKE:
            arguments["M_as"] = leaves.species_mass(self.draft, f"M_{owed.id}", owed, "owe.reported_as")
            arguments["M"] = leaves.species_mass(self.draft, f"M_{here.entity.id}", here.entity, "hold.reported_as")
        self.move(relation, {name: arguments[name] for name in relation.symbols}, through, self.step_shown(),
                  f"as {owed.name}", entity=owed)

    def to_water(self, owed: str | None) -> None:
        """Bring the content from wet to dry gas, or back."""
        here = self.place
        if owed is None or here.water is None or owed == here.water:
            return
        relation = relations.get("dry_from_wet" if owed == DRY else "wet_from_dry")
        why = "to go from wet to dry" if owed == DRY else "to go from dry to wet"
        arguments = {"y": here.name, "h": water.water_content(self.draft, self.case, why)}
        self.move(relation, arguments, "y", self.step_shown(), "wet to dry" if owed == DRY else "dry to wet", water=owed)

    def to_oxygen(self) -> None:
        """Refer the content to the owed oxygen. The correction is made on dry gas."""
        held, owed = stated_oxygen(self.case.hold), stated_oxygen(self.case.owe)
        if owed is None and (held is None or self.case.owe.oxygen_meaning != "measured"):
            return
        if held is not None and owed is not None and held.si == owed.si:
            return
        if self.place.water == WET:
            self.to_water(DRY)
        ambient = self.ambient_oxygen()
        if held is not None and owed is not None:
            self.oxygen_step("referred_from_one_oxygen_to_another",
                             {"A": ambient, "O_hold": self.oxygen_leaf("hold"), "O_owe": self.oxygen_leaf("owe")},
                             f"oxygen to {owed.number.text} %")
        elif owed is not None:
            self.correct_oxygen(ambient, owed)
        else:
            self.oxygen_step("uncorrected_from_reference_oxygen",
                             {"A": ambient, "O_ref": self.oxygen_leaf("hold"), "O": matrix.oxygen_dry(self.draft, self.case)},
                             "oxygen as measured")

    def to_carbon_dioxide(self) -> None:
        """Refer the content to the owed carbon dioxide, on dry gas: contents go as the carbon dioxide does."""
        held, owed = stated_carbon_dioxide(self.case.hold), stated_carbon_dioxide(self.case.owe)
        if owed is None and (held is None or self.case.owe.carbon_dioxide_meaning != "measured"):
            return
        if held is not None and owed is not None and held.si == owed.si:
            return
        if self.place.water == WET:
            self.to_water(DRY)
        sides = {side: leaves.from_quantity(self.draft, self.case, f"CO2_ref_{side}", quantity, f"{side}.carbon_dioxide")
                 for side, quantity in (("hold", held), ("owe", owed)) if quantity is not None}
        measured = matrix.carbon_dioxide_dry(self.draft, self.case) if len(sides) == 1 else ""
        label = f"carbon dioxide to {owed.number.text} %" if owed is not None else "carbon dioxide as measured"
        self.oxygen_step("corrected_to_reference_carbon_dioxide", {"CO2_ref": sides.get("owe", measured), "CO2": sides.get("hold", measured)}, label)

    def correct_oxygen(self, ambient: str, owed: Quantity) -> None:
        """From the measured oxygen to the owed one, as far as the rule lets it."""
        rule, measured = self.case.rule, matrix.oxygen_dry(self.draft, self.case)
        if rule is not None and rule.one_sided and not self.draft.is_above(measured, owed.si):
            self.draft.choose("No oxygen correction", f"the rule corrects only above its reference oxygen of {owed.number.text} %",
                              f"{rule.title}, {rule.clause}")
            return
        if rule is not None and rule.diluent_cap is not None and self.draft.is_above(measured, float(rule.diluent_cap.number) / 100):
            cap = rule.diluent_cap
            self.draft.choose("Diluent cap", f"the measured oxygen is above the rule's cap; {cap.text} % is used in its place",
                              f"{rule.title}, {cap.locator}")
            measured = self.draft.leaf(Leaf("O_cap", float(cap.number) / 100, cap.text, "%", TABLE, f"{rule.title}, {cap.locator}"))
        elif self.draft.value(measured) > self.draft.value(ambient) - NEAR_AMBIENT:
            self.draft.warnings.append("The measured oxygen is within 2 % of ambient: the correction multiplies every error in it.")
        self.oxygen_step("corrected_to_reference_oxygen", {"A": ambient, "O_ref": self.oxygen_leaf("owe"), "O": measured},
                         f"oxygen to {owed.number.text} %")

    def oxygen_step(self, relation_id: str, arguments: dict[str, str], label: str) -> None:
        relation = relations.get(relation_id)
        through = next(iter(relation.symbols))
        named = {through: self.place.name, **arguments}
        self.move(relation, {name: named[name] for name in relation.symbols}, through, self.step_shown(), label)

    def oxygen_leaf(self, side: str) -> str:
        return leaves.from_quantity(self.draft, self.case, f"O_ref_{side}", self.case.record(side).oxygen, f"{side}.oxygen")

    def ambient_oxygen(self) -> str:
        quantity = self.case.gas.ambient_oxygen
        if quantity is None:
            raise Missing("The oxygen of ambient air that the correction counts from is needed.",
                          hint="Add it, e.g. 'ambient O2 20.9 %', or choose a rule-book.", field="gas.ambient_oxygen")
        return leaves.from_quantity(self.draft, self.case, "A", quantity, "gas.ambient_oxygen")

    def step_shown(self) -> Shown:
        return self.owed_shown if self.place.kind == self.owed_kind else self.place.shown

    def move(self, relation, arguments, through, shown, label, parts=(), **changes) -> None:
        name = self.draft.step(Step(relation, arguments, f"y{len(self.draft.steps) + 1}", shown, label, through, parts))
        self.place = replace(self.place, name=name, shown=shown, **changes)

    # --- the whole way ---

    def lay(self) -> Path:
        case = self.case
        basis_changes = self.needs_basis_change()
        if MASS_FRACTION in (self.place.kind, self.owed_kind) and basis_changes:
            self.from_or_to_mass_fraction()
        else:
            self.to_owed_kind()
            self.to_bases()
        return Path(self.draft.leaves, tuple(self.draft.steps), tuple(self.draft.choices), self.held, self.held_factor,
                    self.place.name,
                    self.owed_shown, basis_words(case, self.place.water, self.draft), species_words(case, self.place.entity), tuple(self.draft.warnings),
                    tuple(self.draft.decisions))

    def needs_basis_change(self) -> bool:
        hold, owe = self.case.hold, self.case.owe
        water = hold.water is not None and owe.water is not None and hold.water != owe.water
        return water or diluent_changes(hold, owe)

    def to_owed_kind(self) -> None:
        if self.place.kind not in MASS_LIKE:
            self.to_entity()                         # by count: no molar mass is needed
        self.to_kind(self.owed_kind)
        if self.place.kind in VOLUMETRIC:
            self.to_conditions()
        if self.place.kind == PARTIAL_PRESSURE:
            self.to_total_pressure()
        self.to_entity()

    def to_total_pressure(self) -> None:
        """A partial pressure owed at another total pressure goes through the amount fraction."""
        hold, owe = self.case.hold.total_pressure, self.case.owe.total_pressure
        if self.place.side == "hold" and hold is not None and owe is not None and hold.si != owe.si:
            self.to_kind(AMOUNT_FRACTION)
            self.to_kind(PARTIAL_PRESSURE)

    def behind_cooler(self) -> None:
        """A value read dry behind a cooler was read in gas that still held the cooler's water."""
        if self.case.gas.cooler is None or self.place.water != DRY or not self.case.hold.water:
            return
        relation = relations.get("dry_from_wet")
        self.move(relation, {"y": self.place.name, "h": water.residual_water(self.draft, self.case)}, "y", self.step_shown(), "water left by the cooler")

    def to_bases(self) -> None:
        self.behind_cooler()
        undo_oxygen_first = stated_carbon_dioxide(self.case.owe) is not None
        for move in (self.to_oxygen, self.to_carbon_dioxide) if undo_oxygen_first else (self.to_carbon_dioxide, self.to_oxygen):
            move()
        self.to_water(self.case.owe.water)

    def from_or_to_mass_fraction(self) -> None:
        """A mass fraction's gas changes with water and oxygen: leave it before, reach it after."""
        if self.place.kind == MASS_FRACTION and self.owed_kind == MASS_FRACTION:
            self.to_kind(MASS_PER_AMOUNT)
        elif self.place.kind == MASS_FRACTION:
            self.to_owed_kind()
        self.to_bases()
        self.to_owed_kind()


def lay(case: Case) -> Path:
    """The path of a settled case. Raises Missing, naming what a relation needs and was not given."""
    if case.hold.averaging_order == EACH:
        return corrected_one_by_one(case, lay)
    path = emission.lay(case, _concentration) if emission.is_owed(case.owe, case.emission) else _concentration(case)
    if not case.gas.correlations and case.hold.averaging_order != TOGETHER:
        return path
    found, warnings = correlations_of(case, path.leaves)
    return replace(path, correlations=found, warnings=(*path.warnings, *warnings))


def _concentration(case: Case) -> Path:
    return _Laying(case).lay()


def _one_species(case: Case) -> Species | None:
    held, owed = case.hold.species, case.owe.species
    if held is not None and owed is not None and held.id != owed.id:
        raise OutOfRange(f"You hold {held.name} but owe {owed.name}: one does not become the other by restating.",
                         hint=f"To report one as the other, say so: 'as {owed.id}'.", field="owe.species")
    return held or owed

"""One case: the held statement, the gas it was in and the owed statement, as far as they are settled."""
from __future__ import annotations

from dataclasses import dataclass, field, replace
from typing import Mapping

from gasbasis.errors import OutOfRange
from gasbasis.facts import RuleBook
from gasbasis.language.basis import Gas, Quantity, Reading, Statement
from gasbasis.language.emission import Emission
from gasbasis.language.prepared import Prepared
from gasbasis.language.sample import Sample

AMOUNT_FRACTION = "amount_fraction"
MASS_FRACTION = "mass_fraction"
MASS_CONCENTRATION = "mass_concentration"
AMOUNT_CONCENTRATION = "amount_concentration"
PARTIAL_PRESSURE = "partial_pressure"
UNSTATED_PARTS = "parts"                 # a fraction whose kind neither side states

VOLUMETRIC = (MASS_CONCENTRATION, AMOUNT_CONCENTRATION)
MASS_LIKE = (MASS_CONCENTRATION, MASS_FRACTION)

WAYS = ("sample", "prepared", "emission")
_PARTS_KIND = {"volume": AMOUNT_FRACTION, "mass": MASS_FRACTION, "mass_by_volume": MASS_CONCENTRATION}
# 1 part by mass in volume counts 1 g in 1 mL: 1 ppm (m/v) = 1 g/m3 (common practice).
_KILOGRAM_PER_CUBIC_METRE_PER_PART = 1000.0


@dataclass(frozen=True)
class Case:
    hold: Statement
    gas: Gas
    owe: Statement
    rule: RuleBook | None = None
    chosen: Mapping[str, str] = field(default_factory=dict)     # "hold.parts_by" -> label of the reading taken
    sample: Sample | None = None       # where the held value comes from, when it is no direct reading
    prepared: Prepared | None = None
    emission: Emission | None = None   # what makes a rate of the concentration

    def record(self, side: str) -> Statement | Gas | Sample | Prepared | Emission:
        return getattr(self, side)

    @property
    def ways(self) -> dict[str, Sample | Prepared | Emission]:
        """The sample, the prepared gas and the emission, as far as there are any."""
        return {side: record for side in WAYS if (record := self.record(side)) is not None}

    def taking(self, doubt_id: str, reading: Reading) -> "Case":
        """The case with one doubt settled by one of its readings."""
        side, _, field = doubt_id.partition(".")
        record = self.record(side)
        left = tuple(doubt for doubt in record.ambiguities if doubt.id != doubt_id)
        changed = replace(record, **dict(reading.patch), ambiguities=left)
        # How far a number may be off is no other number: it stays the one that was typed.
        taken = {} if field.endswith("_spread") else {f"{side}.{name}": reading.label for name, _ in reading.patch}
        chosen = {**self.chosen, **taken}
        return replace(self, **{side: changed}, chosen=chosen)


def make_case(hold: Statement, gas: Gas, owe: Statement, rule: RuleBook | None = None, **ways) -> Case:
    """Bring together what the statement itself says of its gas and what the gas line says.

    Raises OutOfRange when the two contradict each other.
    """
    for name, words in (("water_content", "water content"), ("ambient_oxygen", "ambient oxygen")):
        said, given = getattr(hold, name), getattr(gas, name)
        if said is not None and given is not None and said.si != given.si:
            raise OutOfRange(
                f"The {words} is given twice: {said.number.text} {said.unit.text} in You hold and "
                f"{given.number.text} {given.unit.text} in It was in.",
                hint="Keep the one that was measured and delete the other.", field=f"gas.{name}")
        if given is None and said is not None:
            gas = replace(gas, **{name: said})
    if gas.water_content is not None and gas.water_route is not None:
        raise OutOfRange("The water content is given twice, in percent and by another way.", hint="Keep the one that was measured.",
                         field="gas.water_content")
    if gas.ambient_oxygen is None and owe.ambient_oxygen is not None:
        gas = replace(gas, ambient_oxygen=owe.ambient_oxygen)
    if owe.oxygen is not None and owe.oxygen_meaning is None:
        owe = replace(owe, oxygen_meaning="corrected")      # owed "at 11 % O2" can only be what to correct to
    if owe.carbon_dioxide is not None and owe.carbon_dioxide_meaning is None:
        owe = replace(owe, carbon_dioxide_meaning="corrected")
    if owe.oxygen is not None and owe.carbon_dioxide is not None:
        raise OutOfRange("You owe a figure at a reference oxygen and at a reference carbon dioxide: a correction is by one of them.",
                         hint="Keep the one the permit names.", field="owe.carbon_dioxide")
    owe = _undone(hold, owe)
    return Case(hold, gas, owe, rule, **ways)


def _undone(hold: Statement, owe: Statement) -> Statement:
    """Referred to the one diluent, a figure is at the measured content of the other."""
    if stated_carbon_dioxide(owe) is not None and stated_oxygen(hold) is not None:
        return replace(owe, oxygen_meaning="measured")
    if stated_oxygen(owe) is not None and stated_carbon_dioxide(hold) is not None:
        return replace(owe, carbon_dioxide_meaning="measured")
    return owe


def kind_and_factor(statement: Statement) -> tuple[str, float]:
    """The kind of quantity a statement is in, and the SI value of one of its units."""
    unit = statement.unit
    if unit.kind == "parts":
        if statement.parts_by is None:
            return UNSTATED_PARTS, unit.factor
        kind = _PARTS_KIND[statement.parts_by]
        return kind, unit.factor * (_KILOGRAM_PER_CUBIC_METRE_PER_PART if kind == MASS_CONCENTRATION else 1.0)
    if unit.kind == "pressure":
        return PARTIAL_PRESSURE, unit.factor
    return unit.kind, unit.factor


def stated_oxygen(statement: Statement) -> Quantity | None:
    """The oxygen a statement is referred to, if it says that it was corrected to one."""
    return statement.oxygen if statement.oxygen_meaning == "corrected" else None


def stated_carbon_dioxide(statement: Statement) -> Quantity | None:
    """The carbon dioxide a statement is referred to, if it says that it was corrected to one."""
    return statement.carbon_dioxide if statement.carbon_dioxide_meaning == "corrected" else None


def diluent_changes(hold: Statement, owe: Statement) -> bool:
    """Whether a correction to oxygen or carbon dioxide is made or undone on the way."""
    pairs = ((stated_oxygen(hold), stated_oxygen(owe), owe.oxygen_meaning),
             (stated_carbon_dioxide(hold), stated_carbon_dioxide(owe), owe.carbon_dioxide_meaning))
    return any((owed is not None and (held is None or held.si != owed.si)) or (held is not None and meaning == "measured")
               for held, owed, meaning in pairs)


def same_conditions(first: Statement, second: Statement) -> bool:
    """Whether two volumetric statements are on the same temperature and pressure, as far as they say."""
    if first.actual_volume or second.actual_volume:
        return first.actual_volume and second.actual_volume
    pairs = ((first.temperature, second.temperature), (first.pressure, second.pressure))
    if all(a is not None and b is not None for a, b in pairs):
        return all(a.si == b.si for a, b in pairs)
    return all(a is None and b is None for a, b in pairs) and first.conditions_word == second.conditions_word

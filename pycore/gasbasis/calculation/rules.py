"""What a chosen rule-book adds: usual readings of doubts, its own constants, one-sided corrections and caps."""
from __future__ import annotations

from dataclasses import replace

from gasbasis import facts
from gasbasis.calculation.leaves import fixed_quantity
from gasbasis.facts import RuleBook
from gasbasis.language.basis import Doubt, Quantity, Reading, Species
from gasbasis.language.units import unit

_SAME_KELVIN, _SAME_PASCAL = 0.05, 15.0   # prints of one condition: 68 degF and 20 degC, 29.92 inHg and 101.325 kPa


def with_usual(doubt: Doubt, rule: RuleBook | None, species: Species | None) -> Doubt:
    """The doubt with the rule's reading as the usual one, where the rule decides it."""
    if rule is None:
        return doubt
    chosen = _decided(doubt, rule, species)
    if chosen is None:
        return doubt
    because = f"{rule.title}: {rule.edition}, {rule.clause}"
    return replace(doubt, readings=tuple(replace(reading, usual_because=because if reading is chosen else "")
                                         for reading in doubt.readings))


def _decided(doubt: Doubt, rule: RuleBook, species: Species | None) -> Reading | None:
    field = doubt.id.partition(".")[2]
    if field == "conditions":
        return _with_conditions(doubt, rule)
    key = f"reported_as:{species.id}" if field == "reported_as" and species else field
    wanted = rule.usual.get(key)
    return next((reading for reading in doubt.readings if reading.id == wanted), None)


def _with_conditions(doubt: Doubt, rule: RuleBook) -> Reading | None:
    if "conditions" not in rule.usual:
        return None
    temperature, pressure = conditions_of(rule)
    for reading in doubt.readings:
        patch = dict(reading.patch)
        if same(patch["temperature"], temperature, _SAME_KELVIN) and same(patch["pressure"], pressure, _SAME_PASCAL):
            return reading
    return None


def conditions_of(rule: RuleBook) -> tuple[Quantity, Quantity]:
    """The rule's temperature and pressure."""
    row = next(row for row in facts.reference_conditions() if row.id == rule.usual["conditions"])
    return (fixed_quantity(row.temperature.text, row.temperature.unit), fixed_quantity(row.pressure.text, row.pressure.unit))


def same(first: Quantity, second: Quantity, within: float) -> bool:
    return abs(first.si - second.si) <= within


def molar_volume(rule: RuleBook | None, temperature: Quantity | None, pressure: Quantity | None):
    """The rule's own molar volume, if it has one and the volume is on the rule's conditions; else None."""
    if rule is None or "molar_volume" not in rule.conventions or temperature is None or pressure is None:
        return None
    own = conditions_of(rule)
    on_them = same(temperature, own[0], _SAME_KELVIN) and same(pressure, own[1], _SAME_PASCAL)
    return rule.conventions["molar_volume"] if on_them else None


def find_rule(identity: str) -> RuleBook | None:
    return next((book for book in facts.rule_books() if book.id == identity), None)


# A rule prints its factor per ppm of the species and cubic foot of its standard gas, in pounds: in SI per whole of the gas.
_PRINTED_FACTOR = {"lb/scf per ppm": ("lb/ft3", 1e6)}


def printed_factor(rule: RuleBook | None, species: Species | None, counted_as: Species | None, temperature: Quantity | None, pressure: Quantity | None):
    """The rule's own factor from ppm to mass concentration [kg/m3 per mol/mol] and its datum, on the rule's conditions; else None."""
    own = rule.conventions.get(f"factor:{species.id}") if rule is not None and species is not None else None
    if own is None or counted_as is None or counted_as.id not in (species.id, rule.usual.get(f"reported_as:{species.id}")):
        return None
    if own.unit not in _PRINTED_FACTOR or temperature is None or pressure is None:
        return None
    if not (same(temperature, conditions_of(rule)[0], _SAME_KELVIN) and same(pressure, conditions_of(rule)[1], _SAME_PASCAL)):
        return None
    unit_text, per = _PRINTED_FACTOR[own.unit]
    return float(own.number) * unit(unit_text).factor * per, own

"""The numbers a path starts from, each with its print and its origin."""
from __future__ import annotations

from decimal import Decimal
from functools import lru_cache

from gasbasis import facts
from gasbasis.calculation.case import Case
from gasbasis.calculation.input_uncertainty import degrees_of_freedom, distribution, standard_uncertainty
from gasbasis.calculation.path import CONVENTION, READING, TABLE, TYPED, Drafting, Leaf
from gasbasis.errors import Missing, OutOfRange
from gasbasis.language.basis import Quantity, Species
from gasbasis.language.numbers import read_number, significant
from gasbasis.language.species import molar_mass
from gasbasis.language.units import unit

SIDE_TITLES = {"hold": "You hold", "gas": "It was in", "owe": "You owe", "limit": "Limit", "sample": "The sample", "prepared": "The prepared gas", "emission": "The emission"}
_GRAMS = 1e3


def _origin(case: Case, field: str) -> tuple[str, str]:
    if field in case.chosen:
        return READING, f"taken as: {case.chosen[field]}"
    return TYPED, f"typed in {SIDE_TITLES[field.partition('.')[0]]}"


def from_quantity(draft: Drafting, case: Case, name: str, quantity: Quantity, field: str) -> str:
    """A typed quantity, printed as it was typed."""
    origin, origin_text = _origin(case, field)
    return draft.leaf(Leaf(name, quantity.si, quantity.number.text, quantity.unit.text, origin, origin_text, field,
                           **uncertain(quantity, field)))


def uncertain(quantity: Quantity, field: str) -> dict:
    """What a leaf keeps of a quantity's uncertainty. Raises OutOfRange by the quantity's field."""
    try:
        return {"standard_uncertainty": standard_uncertainty(quantity), "distribution": distribution(quantity),
                "degrees_of_freedom": degrees_of_freedom(quantity), "unit_factor": quantity.unit.factor}
    except OutOfRange as error:
        raise error.at(field)


def from_temperature(draft: Drafting, case: Case, name: str, quantity: Quantity, field: str) -> str:
    """A temperature, printed in kelvin because formulas need it so; the origin keeps what was typed."""
    origin, origin_text = _origin(case, field)
    if quantity.unit.id != "K":
        origin_text += f" ({quantity.number.text} {quantity.unit.text})"
    spread = uncertain(quantity, field) | {"unit_factor": 1.0}
    return draft.leaf(Leaf(name, quantity.si, kelvin_text(quantity), "K", origin, origin_text, field, **spread))


def kelvin_text(quantity: Quantity) -> str:
    """The temperature in kelvin with every digit that was given."""
    if quantity.unit.id == "K":
        return quantity.number.text
    if quantity.unit.factor == 1.0:
        return str(quantity.number.decimal + Decimal(str(quantity.unit.offset)))
    return significant(quantity.si, 7).rstrip("0").rstrip(".")


def gas_constant(draft: Drafting) -> str:
    datum = facts.constant("molar_gas_constant")
    return draft.leaf(Leaf("R", float(datum.number), datum.text, "J/(mol·K)", TABLE,
                           f"{facts.source(datum.source).title}, {datum.locator}"))


def ideal(draft: Drafting, name: str) -> str:
    """The compression factor of an ideal gas."""
    return draft.leaf(Leaf(name, 1.0, "1", "", CONVENTION, "ideal gas"))


def species_mass(draft: Drafting, name: str, species: Species, field: str) -> str:
    """The molar mass of a species, added up from its atoms."""
    if species.atoms is None:
        raise Missing(f"{species.name} has no molar mass of its own.",
                      hint="Say what it is reported as, e.g. 'as NO2' or 'as C'.", field=field)
    value, added_up = molar_mass(species)
    source = facts.source(facts.atomic_weight(species.atoms[0][0]).source)
    return draft.leaf(Leaf(name, value, significant(value * _GRAMS, 7).rstrip("0").rstrip("."), "g/mol", TABLE,
                           f"{species.formula} = {added_up}; {source.title}"))


@lru_cache(maxsize=256)
def fixed_quantity(text: str, unit_text: str) -> Quantity:
    """A quantity from a table row, as printed there."""
    return Quantity(read_number(text), unit(unit_text))

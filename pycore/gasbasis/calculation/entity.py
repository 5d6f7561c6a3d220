"""Reported as what: which entity a statement counts or weighs, and how many make one of another."""
from __future__ import annotations

from gasbasis.errors import Missing, OutOfRange
from gasbasis.language.basis import Species, Statement

# Elements that do not tell one entity from another when a third is shared: NO and NO2 are counted by N.
_COMMON = ("O", "H")


def entity(statement: Statement, species: Species | None) -> Species | None:
    """What the statement counts or weighs: what it is reported as, else the species itself."""
    return statement.reported_as or species


def entities_per(one: Species, other: Species, field: str) -> float:
    """How many entities of `other` stand for one entity of `one`, by the element they share.

    Propane as C: 3. Methane as propane: 1/3. NO as NO2: 1. Raises OutOfRange when no single
    element decides it.
    """
    if one.id == other.id:
        return 1.0
    if one.atoms is None or other.atoms is None:
        # NOx holds one nitrogen atom an entity whatever it is made of; other sums have no formula.
        if one.id == "NOx" and other.atoms is not None and dict(other.atoms).get("N") == 1:
            return 1.0
        if other.id == "NOx" and one.atoms is not None and dict(one.atoms).get("N") == 1:
            return 1.0
        unknown = one if one.atoms is None else other
        raise Missing(f"{unknown.name} has no formula of its own, so it cannot be counted as {other.name}.",
                      hint="Say what it is reported as, e.g. 'as C' or 'as propane'.", field=field)
    first, second = dict(one.atoms), dict(other.atoms)
    shared = [element for element in first if element in second]
    telling = [element for element in shared if element not in _COMMON] or shared
    if len(telling) != 1:
        given = " and ".join(telling) if telling else "none"
        raise OutOfRange(f"{one.name} as {other.name}: the elements they share are {given}, so there is no single "
                         "element to count by.",
                         hint="Report it as one that shares a single element, such as C, S, N or Cl.", field=field)
    return first[telling[0]] / second[telling[0]]

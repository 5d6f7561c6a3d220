"""The register of relations: what a physics function means, its symbols, validity and citation."""
from __future__ import annotations

from types import MappingProxyType
from typing import Mapping

from gasbasis.relations import bases, compression, flow, gas_law, humidity, molar_mass, pressure, sampling, saturation
from gasbasis.relations.flow import mean_of_roots
from gasbasis.relations.mean import mean_of
from gasbasis.relations.mixture import molar_mass_of_mixture, molar_mass_of_mixture_by_mass, summation_factor_of_mixture
from gasbasis.relations.relation import Relation

__all__ = ["get", "every", "mean_of", "mean_of_roots", "molar_mass_of_mixture", "molar_mass_of_mixture_by_mass", "summation_factor_of_mixture", "Relation"]

_REGISTER: Mapping[str, Relation] = MappingProxyType(
    {relation.id: relation for room in (gas_law, bases, molar_mass, saturation, humidity, pressure, compression, flow, sampling)
     for relation in room.RELATIONS})


def get(relation_id: str) -> Relation:
    """A relation by its id. Raises KeyError."""
    return _REGISTER[relation_id]


def every() -> tuple[Relation, ...]:
    """All registered relations."""
    return tuple(_REGISTER.values())

"""Doubts about what a stated ± means. They never move the figure, only its uncertainty."""
from __future__ import annotations

from dataclasses import fields, replace
from decimal import Decimal

from gasbasis.calculation.case import Case
from gasbasis.language.basis import Doubt, Quantity, Reading

_COMMON = "common practice, no source"
_GUM = "JCGM 100:2008, 4.3"
_FIELDS = {"hold": ("value", "temperature", "pressure", "oxygen", "water_content", "total_pressure"),
           "gas": ("water_content", "oxygen", "carbon_dioxide", "ambient_oxygen", "temperature", "pressure")}
_WORDS = {"value": "the held value", "water_content": "the water content", "carbon_dioxide": "the carbon dioxide",
          "total_pressure": "the total pressure", "ambient_oxygen": "the ambient oxygen"}


def spread_doubts(case: Case) -> list[Doubt]:
    """One doubt for each ± without a k or a form, and for each "± n %" behind a value that is itself in %."""
    doubts = []
    for side, names in [*_FIELDS.items(), *((side, tuple(field.name for field in fields(record))) for side, record in case.ways.items())]:
        for field in names:
            quantity = getattr(case.record(side), field)
            if not isinstance(quantity, Quantity) or quantity.number.uncertainty is None:
                continue
            stated = quantity.number.uncertainty
            if stated.form == "expanded" and stated.coverage_factor is None:
                doubts.append(_coverage(side, field, quantity))
            if stated.relative and quantity.unit.id == "%" and not stated.points:
                doubts.append(_points(side, field, quantity))
    return doubts


def _coverage(side: str, field: str, quantity: Quantity) -> Doubt:
    amount = quantity.number.uncertainty.amount
    forms = (("k2", "expanded, k = 2", {"coverage_factor": Decimal(2)}, _COMMON, "certificates and reports mostly state it so"),
             ("standard", "a standard uncertainty, k = 1", {"form": "standard"}, _GUM, ""),
             ("rectangular", "limits: anywhere between them alike", {"form": "rectangular"}, _GUM, ""),
             ("triangular", "limits: the middle likelier", {"form": "triangular"}, _GUM, ""))
    readings = tuple(Reading(identity, label, ((field, _changed(quantity, **change)),), source, usual)
                     for identity, label, change, source, usual in forms)
    name = _WORDS.get(field, f"the {field.replace('_', ' ')}")
    return Doubt(f"{side}.{field}_spread", f"± {amount}", f"What is the ± {amount} of {name}?",
                 "It changes the uncertainty, not the figure.", readings)


def _points(side: str, field: str, quantity: Quantity) -> Doubt:
    amount = quantity.number.uncertainty.amount
    readings = (Reading("points", "percentage points", ((field, _changed(quantity, relative=False, points=True)),), _COMMON),
                Reading("of_value", "percent of the value", ((field, _changed(quantity, points=True)),), _COMMON))
    return Doubt(f"{side}.{field}_percent", f"± {amount} %", f"Is ± {amount} % of {_WORDS.get(field, f'the {field}')} in percentage points, or of the value?",
                 "It changes the uncertainty, not the figure.", readings)


def _changed(quantity: Quantity, **change) -> Quantity:
    uncertainty = replace(quantity.number.uncertainty, **change)
    return replace(quantity, number=replace(quantity.number, uncertainty=uncertainty))

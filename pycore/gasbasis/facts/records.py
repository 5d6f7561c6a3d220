"""The frozen records the tables are read into. Every number keeps its print, its unit and where it was read."""
from __future__ import annotations

from dataclasses import dataclass, field
from decimal import Decimal
from types import MappingProxyType
from typing import Mapping

PRIMARY, SECONDARY, ABSTRACT, MEMORY, CONVENTION = "primary", "secondary", "abstract", "memory", "convention"
EXACT = "exact"


@dataclass(frozen=True)
class Source:
    """A document, and how it was read: primary (itself), secondary (a copy or transcription), abstract, memory, convention."""

    id: str
    title: str
    edition: str
    read: str


@dataclass(frozen=True)
class Datum:
    """A number as printed. `uncertainty` is as printed too: "exact", a half-width in the same unit, or "" (not stated)."""

    id: str
    text: str
    unit: str
    uncertainty: str
    source: str
    locator: str
    read: str
    note: str = ""

    @property
    def number(self) -> Decimal:
        return Decimal(self.text)


@dataclass(frozen=True)
class SpeciesRow:
    """A species met in this trade, or a quantity measured like one (dust, odour). The molar mass is computed, not stored."""

    id: str
    name: str
    formula: str | None                # None: a sum or a quantity with no molar mass of its own
    cas: str | None
    names: tuple[str, ...]             # what people type, beside the id and the name
    family: str
    needs_reported_as: bool            # its mass has no meaning without "as": NOx, TOC, total sulphur
    usual_reported_as: str | None      # the species it is usually reported as
    reported_as: tuple[str, ...]       # every species it is credibly reported as, the usual one first
    note: str
    source: str
    locator: str
    read: str


@dataclass(frozen=True)
class ReferenceConditions:
    """A published pair of temperature and pressure that a gas volume is counted at."""

    id: str
    name: str
    words: tuple[str, ...]             # what people call it: "normal", "standard", "scf" ...
    temperature: Datum
    pressure: Datum
    water: str | None                  # "dry" where the definition says so
    region: str
    source: str
    locator: str
    read: str
    note: str


@dataclass(frozen=True)
class RuleBook:
    """A basis somebody owes a figure on, with the rule's own constants."""

    id: str
    title: str
    edition: str
    clause: str
    source: str
    read: str
    owe: str                           # a statement as a person would type it
    words: tuple[str, ...]             # what people search for
    ambient_oxygen: Datum | None = None
    one_sided: bool = False            # corrected only when the measured oxygen is above the reference
    diluent_cap: Datum | None = None   # the largest oxygen used in the correction
    conventions: Mapping[str, Datum] = field(default_factory=lambda: MappingProxyType({}))
    usual: Mapping[str, str] = field(default_factory=lambda: MappingProxyType({}))
    note: str = ""

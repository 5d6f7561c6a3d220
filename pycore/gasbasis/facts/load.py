"""Reads the compiled tables once, each only when it is first asked for, and hands out frozen records."""
from __future__ import annotations

import hashlib
import json
from functools import lru_cache
from importlib import resources
from types import MappingProxyType
from typing import Any, Mapping

from gasbasis.errors import FactsError
from gasbasis.facts.records import Datum, ReferenceConditions, RuleBook, Source, SpeciesRow

COMPILED = "facts.json"


def _text() -> str:
    try:
        return resources.files("gasbasis.facts").joinpath(COMPILED).read_text("utf-8")
    except FileNotFoundError as error:
        raise FactsError(f"The compiled tables ({COMPILED}) are missing.",
                         hint="Make them: python pycore/making/compile_facts.py") from error


@lru_cache(maxsize=None)
def _compiled() -> dict:
    return json.loads(_text())


@lru_cache(maxsize=None)
def digest() -> str:
    """What tells one state of the tables from another: the SHA-256 of all of them."""
    return hashlib.sha256(_text().encode()).hexdigest()


def _rows(collection: str) -> list[dict[str, Any]]:
    """The rows of a collection; its field names are stored once."""
    stored = _compiled()[collection]
    return [dict(zip(stored["fields"], row)) for row in stored["rows"]]


def _find(records: Mapping[str, Any], what: str, id: str):
    try:
        return records[id]
    except KeyError:
        raise FactsError(f"There is no {what} '{id}' in the tables.", hint=f"Known: {', '.join(sorted(records))}.") from None


@lru_cache(maxsize=None)
def sources() -> Mapping[str, Source]:
    """Every source by its id."""
    return MappingProxyType({row["id"]: Source(**row) for row in _rows("source")})


def source(id: str) -> Source:
    """The source with this id. Raises FactsError."""
    return _find(sources(), "source", id)


@lru_cache(maxsize=None)
def constants() -> Mapping[str, Datum]:
    """Every constant by its id."""
    return MappingProxyType({row["id"]: Datum(**row) for row in _rows("constant")})


def constant(id: str) -> Datum:
    """The constant with this id. Raises FactsError."""
    return _find(constants(), "constant", id)


@lru_cache(maxsize=None)
def atomic_weights() -> Mapping[str, Datum]:
    """The atomic weight of every element that has a standard one, by symbol. [1]"""
    return MappingProxyType({row["id"]: Datum(**row) for row in _rows("atomic_weight")})


def atomic_weight(symbol: str) -> Datum:
    """The atomic weight of an element. [1] Raises FactsError."""
    return _find(atomic_weights(), "element", symbol)


@lru_cache(maxsize=None)
def ambient_oxygens() -> tuple[Datum, ...]:
    """The oxygen contents of ambient air that rules count from. [%]"""
    return tuple(Datum(**row) for row in _rows("ambient_oxygen"))


@lru_cache(maxsize=None)
def student_t() -> Mapping[int, float]:
    """Student's t for a coverage probability of 95.45 %, by degrees of freedom. [1]"""
    return MappingProxyType({int(freedom): float(t) for freedom, t in table("student_t")["t"].items()})


@lru_cache(maxsize=None)
def species() -> tuple[SpeciesRow, ...]:
    """Every species of the table."""
    return tuple(SpeciesRow(**{**row, "names": tuple(row["names"]), "reported_as": tuple(row["reported_as"])}) for row in _rows("species"))


@lru_cache(maxsize=None)
def cautious_names() -> frozenset[str]:
    """Names that are ordinary words in another case ("no", "as", "in"): they match only as they are written here."""
    return frozenset(table("cautious_names")["names"])


@lru_cache(maxsize=None)
def reference_conditions() -> tuple[ReferenceConditions, ...]:
    """Every published pair of temperature and pressure."""
    return tuple(_conditions(row) for row in _rows("reference_conditions"))


def _conditions(row: dict[str, Any]) -> ReferenceConditions:
    where = (row["source"], row["locator"], row["read"])
    data = {kind: Datum(f"{row['id']}.{kind}", *row[kind], "", *where) for kind in ("temperature", "pressure")}
    return ReferenceConditions(**{**row, **data, "words": tuple(row["words"])})


@lru_cache(maxsize=None)
def rule_books() -> tuple[RuleBook, ...]:
    """Every owed basis by rule-book."""
    return tuple(_rule_book(row) for row in _rows("rule_book"))


def _rule_book(row: dict[str, Any]) -> RuleBook:
    where = (row["source"], row["clause"], row["read"])

    def datum(name: str, printed: list[str] | None) -> Datum | None:
        """A number of the rule: its text and unit, and a locator and `read` of its own where they differ from the row's."""
        if printed is None:
            return None
        text, unit, *own = printed
        locator, read = own if own else where[1:]
        return Datum(f"{row['id']}.{name}", text, unit, "", where[0], locator, read)

    conventions = {name: datum(name, printed) for name, printed in row["conventions"].items()}
    return RuleBook(**{**row, "words": tuple(row["words"]), "conventions": MappingProxyType(conventions),
                       "ambient_oxygen": datum("ambient_oxygen", row["ambient_oxygen"]),
                       "diluent_cap": datum("diluent_cap", row["diluent_cap"]), "usual": MappingProxyType(row["usual"])})


@lru_cache(maxsize=None)
def table(name: str) -> Mapping[str, Any]:
    """The coefficient table of an equation, numbers as printed (text). Raises FactsError."""
    return _frozen(_find(_compiled()["tables"], "table", name))


def _frozen(value: Any) -> Any:
    if isinstance(value, dict):
        return MappingProxyType({key: _frozen(inner) for key, inner in value.items()})
    return tuple(_frozen(inner) for inner in value) if isinstance(value, list) else value

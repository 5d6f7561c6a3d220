"""Refuses tables that are incomplete or contradict themselves. Used when the tables are compiled, not when they are read."""
from __future__ import annotations

import re
from decimal import Decimal, InvalidOperation
from typing import Any, Iterable, Mapping

from gasbasis.errors import FactsError
from gasbasis.facts.records import ABSTRACT, CONVENTION, EXACT, MEMORY, PRIMARY, SECONDARY

TABLE = "table"                        # the key raw coefficient tables stand under
FIELDS: Mapping[str, Mapping[str, Any]] = {   # collection -> field -> default; ... where the row must say it
    "source": {"id": ..., "title": ..., "edition": "", "read": ...},
    "constant": {"id": ..., "text": ..., "unit": ..., "uncertainty": "", "source": ..., "locator": ..., "read": ..., "note": ""},
    "atomic_weight": {"id": ..., "text": ..., "unit": ..., "uncertainty": ..., "source": ..., "locator": ..., "read": ..., "note": ""},
    "ambient_oxygen": {"id": ..., "text": ..., "unit": ..., "uncertainty": "", "source": ..., "locator": ..., "read": ..., "note": ""},
    "species": {"id": ..., "name": ..., "formula": None, "cas": None, "names": ..., "family": ..., "needs_reported_as": False,
                "usual_reported_as": None, "reported_as": [], "note": "", "source": ..., "locator": ..., "read": ...},
    "reference_conditions": {"id": ..., "name": ..., "words": ..., "temperature": ..., "pressure": ..., "water": None,
                             "region": ..., "source": ..., "locator": ..., "read": ..., "note": ""},
    "rule_book": {"id": ..., "title": ..., "edition": ..., "clause": ..., "source": ..., "read": ..., "owe": ..., "words": ...,
                  "ambient_oxygen": None, "one_sided": False, "diluent_cap": None, "conventions": {}, "usual": {}, "note": ...},
}
UNITS: Mapping[str, frozenset[str]] = {       # kind -> the units a number of that kind may be printed in
    "temperature": frozenset({"K", "degC", "degF", "degR"}),
    "pressure": frozenset({"Pa", "hPa", "kPa", "MPa", "bar", "mbar", "atm", "mmHg", "torr", "inHg", "psi", "psia"}),
    "percent": frozenset({"%"}),
    "atomic_weight": frozenset({"1"}),
    "molar_gas_constant": frozenset({"J/(mol K)", "J/(kmol K)"}),
    "molar_volume": frozenset({"L/mol", "m3/mol", "m3/kmol", "ft3/lbmol", "ft3/kmol"}),
    "molar_mass": frozenset({"g/mol", "kg/kmol", "kg/mol"}),
    "acceleration": frozenset({"m/s2"}),
    "temperature_gradient": frozenset({"K/m", "K/km"}),
    "mass_concentration_per_part": frozenset({"lb/scf per ppm", "lb m3/(ug ft3)"}),
    "pitot": frozenset({"m/s (g/mol mmHg/(K mmH2O))^0.5", "ft/s (lb/lbmol inHg/(degR inH2O))^0.5"}),
    "density": frozenset({"g/mL", "kg/m3"}),
    "psychrometer": frozenset({"1/K"}),
    "water_vapour_volume": frozenset({"m3/mL", "m3/g", "ft3/mL", "ft3/g"}),
    "temperature_per_pressure": frozenset({"K/mmHg", "degR/inHg"}),
}
CONVENTIONS = {"molar_volume": "molar_volume", "factor": "mass_concentration_per_part"}    # a convention's first word -> kind of its number
WORDS = frozenset({"normal", "Nm3", "m3N", "standard", "Sm3", "scm", "scf", "dscm", "dscf", "sccm", "slm", "STP", "NTP", "ANR"})
_TRUST = {PRIMARY: 3, SECONDARY: 2, ABSTRACT: 1, MEMORY: 0, CONVENTION: 3}
_CAS = re.compile(r"([0-9]{2,7})-([0-9]{2})-([0-9])")


def check(collections: Mapping[str, list[dict[str, Any]]], tables: Mapping[str, dict[str, Any]], cited_elsewhere: Iterable[str]) -> None:
    """Check every row against its fields, units and sources.

    `cited_elsewhere`: source ids that the code itself cites. Raises FactsError naming the row.
    """
    for collection, rows in collections.items():
        _unique(collection, [row["id"] for row in rows])
        for row in rows:
            _CHECKS.get(collection, lambda row: None)(row)
    sources = {row["id"]: row for row in collections["source"]}
    cited = {id for id in cited_elsewhere if id in sources}
    for collection, rows in collections.items():
        if collection != "source":
            for row in rows:
                cited.add(_cites(f"{collection} {row['id']}", row, sources))
    for name, content in tables.items():
        cited.update(_check_table(name, content, sources))
    orphans = sorted(set(sources) - cited)
    if orphans:
        raise FactsError(f"Nobody cites the source '{orphans[0]}'.", hint="Cite it or take it out.")
    _check_species_names(collections["species"], tables.get("cautious_names", {}).get("names", ()))
    _check_usual(collections["rule_book"], {row["id"] for row in collections["reference_conditions"]})
    _check_reported_as(collections["species"], {row["id"] for row in collections["atomic_weight"]})


def complete(collection: str, row: Mapping[str, Any], common: Mapping[str, Any]) -> dict[str, Any]:
    """The row with the table-wide fields of its file and the defaults filled in. Raises FactsError."""
    fields = FIELDS[collection]
    name = f"{collection} {row.get('id', '(no id)')}"
    given = {**{key: value for key, value in common.items() if key in fields}, **row}
    for key in given:
        if key not in fields and (collection, key) != ("constant", "kind"):
            raise FactsError(f"{name}: the field '{key}' is not known.", hint=f"Known: {', '.join(fields)}.")
    for key, default in fields.items():
        if default is ... and given.get(key, "") in ("", None):
            raise FactsError(f"{name}: '{key}' is missing.", hint="Every row says what it is and where it was read.")
        given.setdefault(key, default)
    return given


def cas_is_right(cas: str) -> bool:
    """Whether the check digit of a CAS registry number agrees with its other digits."""
    found = _CAS.fullmatch(cas)
    if found is None:
        return False
    digits = found.group(1) + found.group(2)
    return sum(place * int(digit) for place, digit in enumerate(reversed(digits), start=1)) % 10 == int(found.group(3))


def _unique(what: str, ids: list[str]) -> None:
    seen: set[str] = set()
    for id in ids:
        if id in seen:
            raise FactsError(f"{what} {id}: the id is given twice.")
        seen.add(id)


def _cites(name: str, row: Mapping[str, Any], sources: Mapping[str, Any]) -> str:
    """The source a row cites; the row may not claim to be better read than its source was."""
    source, read = row["source"], row["read"]
    if source not in sources:
        raise FactsError(f"{name}: there is no source '{source}'.")
    _read_tag(name, read)
    if _TRUST[read] > _TRUST[sources[source]["read"]]:
        raise FactsError(f"{name}: read as '{read}', but its source was read as '{sources[source]['read']}'.")
    return source


def _read_tag(name: str, read: str) -> None:
    if read not in _TRUST:
        raise FactsError(f"{name}: '{read}' is no way of reading.", hint=f"Use one of {', '.join(_TRUST)}.")


def _number(name: str, text: str) -> None:
    try:
        as_printed = isinstance(text, str) and Decimal(text).is_finite()
    except InvalidOperation:
        as_printed = False
    if not as_printed:
        raise FactsError(f"{name}: '{text}' is not a number as text.", hint="A float has lost its printed digits.")


def _unit(name: str, kind: str, unit: str) -> None:
    if kind not in UNITS:
        raise FactsError(f"{name}: the kind '{kind}' is not known.", hint=f"Known: {', '.join(sorted(UNITS))}.")
    if unit not in UNITS[kind]:
        raise FactsError(f"{name}: '{unit}' is no unit of {kind}.", hint=f"Use one of {', '.join(sorted(UNITS[kind]))}.")


def _datum(kind: str | None):
    def of_kind(row: Mapping[str, Any]) -> None:
        _number(row["id"], row["text"])
        _unit(row["id"], kind or row.get("kind", ""), row["unit"])
        if row["uncertainty"] not in ("", EXACT):
            _number(row["id"], row["uncertainty"])
    return of_kind


def _source(row: Mapping[str, Any]) -> None:
    _read_tag(f"source {row['id']}", row["read"])


def _species(row: Mapping[str, Any]) -> None:
    if row["cas"] is not None and not cas_is_right(row["cas"]):
        raise FactsError(f"species {row['id']}: the check digit of the CAS number {row['cas']} is wrong.")
    if row["needs_reported_as"] and row["formula"] is not None:
        raise FactsError(f"species {row['id']}: a species with a formula needs no 'reported as'.")
    if row["needs_reported_as"] != bool(row["reported_as"]) or row["usual_reported_as"] not in (None, *row["reported_as"][:1]):
        raise FactsError(f"species {row['id']}: 'reported_as' lists what it is reported as, the usual one first, and only where it needs it.")


def _conditions(row: Mapping[str, Any]) -> None:
    for kind in ("temperature", "pressure"):
        _printed(f"{row['id']}.{kind}", kind, row[kind])
    for word in row["words"]:
        if word not in WORDS:
            raise FactsError(f"{row['id']}: the word '{word}' is not known.", hint=f"Known: {', '.join(sorted(WORDS))}.")
    if row["water"] not in (None, "dry"):
        raise FactsError(f"{row['id']}: water is 'dry' or not said.")


def _rule_book(row: Mapping[str, Any]) -> None:
    for field in ("ambient_oxygen", "diluent_cap"):
        if row[field] is not None:
            _printed(f"{row['id']}.{field}", "percent", row[field])
    for name, printed in row["conventions"].items():
        word = name.partition(":")[0]
        if word not in CONVENTIONS:
            raise FactsError(f"{row['id']}: the convention '{name}' is not known.", hint=f"Known: {', '.join(CONVENTIONS)}.")
        _printed(f"{row['id']}.{name}", CONVENTIONS[word], printed)


def _printed(name: str, kind: str, printed: list[str]) -> None:
    """[text, unit], or [text, unit, locator, read] where a rule's number was read elsewhere than the rule."""
    if len(printed) not in (2, 4):
        raise FactsError(f"{name}: needs text and unit, or text, unit, locator and read.")
    _number(name, printed[0])
    _unit(name, kind, printed[1])
    if len(printed) == 4:
        _read_tag(name, printed[3])


def _check_table(name: str, content: Mapping[str, Any], sources: Mapping[str, Any]) -> set[str]:
    """A raw table says where it was read, as a whole or equation by equation."""
    parts = [content] if "source" in content else content.get("equations", [])
    if not parts:
        raise FactsError(f"table {name}: 'source' is missing.")
    for part in parts:
        for key in ("source", "locator", "read"):
            if not part.get(key):
                raise FactsError(f"table {name} {part.get('id', '')}: '{key}' is missing.")
    return {_cites(f"table {name}", part, sources) for part in parts}


def _check_species_names(rows: list[dict[str, Any]], cautious: Iterable[str]) -> None:
    """No name may mean two species. Cautious names count as written, all others in any case."""
    cautious = set(cautious)
    owner: dict[str, str] = {}
    for row in rows:
        for name in {row["id"], row["name"], *row["names"]}:
            key = name if name in cautious else name.casefold()
            if owner.setdefault(key, row["id"]) != row["id"]:
                raise FactsError(f"The name '{name}' belongs to two species: {owner[key]} and {row['id']}.")


def _check_usual(rows: list[dict[str, Any]], conditions: set[str]) -> None:
    """The readings a rule-book suggests are the rule-book's own."""
    for row in rows:
        usual = row["usual"]
        if usual.get("conditions") not in (None, *conditions):
            raise FactsError(f"rule_book {row['id']}: there are no reference conditions '{usual['conditions']}'.")
        if usual.get("ambient_oxygen") != (row["ambient_oxygen"] or [None])[0]:
            raise FactsError(f"rule_book {row['id']}: its usual ambient oxygen is not its own ambient oxygen.")


def _check_reported_as(rows: list[dict[str, Any]], elements: set[str]) -> None:
    known = elements | {row["id"] for row in rows if row["formula"]}
    for row in rows:
        for id in row["reported_as"]:
            if id not in known:
                raise FactsError(f"species {row['id']}: is reported as '{id}', which is no element and no species with a formula.")


_CHECKS = {"source": _source, "constant": _datum(None), "atomic_weight": _datum("atomic_weight"), "ambient_oxygen": _datum("percent"),
           "species": _species, "reference_conditions": _conditions, "rule_book": _rule_book}

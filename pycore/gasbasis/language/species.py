"""Which species a typed name or formula means."""
from __future__ import annotations

import re
from difflib import SequenceMatcher
from functools import lru_cache
from typing import Mapping

from gasbasis import facts
from gasbasis.errors import NotUnderstood
from gasbasis.language.basis import Species
from gasbasis.language.normalise import normalise
from gasbasis.physics import molar_mass as formulas

_GRAM = 1e-3
_ALIKE = 0.72


@lru_cache(maxsize=1)
def _rows() -> Mapping[str, object]:
    return {row.id: row for row in facts.species()}


@lru_cache(maxsize=1)
def _exact_names() -> Mapping[str, str]:
    """Spellings that count only in their exact case: formulas and short names such as NO, CO, As."""
    return {name: row.id for row in facts.species() for name in (row.id, row.formula, *row.names) if name}


@lru_cache(maxsize=1)
def _loose_names() -> Mapping[str, str]:
    """Spellings that count in any case: words of four letters and more, unless a formula reads the same."""
    return {name.lower(): row.id for row in facts.species() for name in (row.name, *row.names) if len(name) > 3}


def known(text: str) -> Species | None:
    """The species of a name in the table, or None."""
    plain = normalise(text).strip()
    identity = _exact_names().get(plain) or _loose_names().get(plain.lower())
    return _species(identity) if identity else None


@lru_cache(maxsize=512)
def find(text: str) -> Species:
    """The species of a name in the table or of any formula. Raises NotUnderstood naming an unknown element."""
    species = known(text)
    if species is not None:
        return species
    plain = normalise(text).strip()
    try:
        counts = formulas.atoms(plain)
    except ValueError:
        raise _unknown(text, "it is no name in the table and no formula") from None
    strange = [element for element in counts if element not in facts.atomic_weights()]
    if strange:
        raise _unknown(text, f"'{strange[0]}' is not an element with a standard atomic weight")
    return Species(plain, plain, plain, tuple(counts.items()))


@lru_cache(maxsize=None)
def _species(identity: str) -> Species:
    row = _rows()[identity]
    atoms = tuple(formulas.atoms(row.formula).items()) if row.formula else None
    return Species(row.id, row.name, row.formula, atoms, row.cas, row.needs_reported_as, row.usual_reported_as)


def _unknown(text: str, why: str) -> NotUnderstood:
    near = [species["id"] for species in search(text)[:3]]
    hint = f"Did you mean {', '.join(near)}?" if near else "Type a formula such as C6H5Cl, or a name such as benzene."
    return NotUnderstood(f"'{text.strip()[:40]}' is not a species: {why}.", hint=hint)


@lru_cache(maxsize=512)
def molar_mass(species: Species) -> tuple[float, str]:
    """The molar mass [kg/mol] and how it adds up, e.g. "32.06 + 2 × 15.999"."""
    weights = {element: facts.atomic_weight(element) for element, _ in species.atoms}
    total = formulas.molar_mass(dict(species.atoms), {element: float(datum.number) for element, datum in weights.items()})
    sums = [weights[element].text if number == 1 else f"{number} × {weights[element].text}" for element, number in species.atoms]
    return total * _GRAM, " + ".join(sums)


def search(text: str) -> list[dict]:
    """Species that a text may mean, best first: beginnings, then contained, then alike in spelling."""
    wanted = normalise(text).strip().lower()
    if not wanted:
        return []
    scored = []
    for row in facts.species():
        score = max(_score(wanted, name.lower()) for name in (row.id, row.name, row.formula or "", row.cas or "", *row.names) if name)
        if score >= _ALIKE:
            scored.append((-score, row.name, {"id": row.id, "name": row.name, "formula": row.formula, "cas": row.cas}))
    return [entry for _, _, entry in sorted(scored, key=lambda item: item[:2])]


def _score(wanted: str, name: str) -> float:
    if wanted == name:
        return 3.0
    if name.startswith(wanted):
        return 2.0 + len(wanted) / len(name)
    if len(wanted) > 2 and wanted in name:
        return 1.0 + len(wanted) / len(name)
    if abs(len(wanted) - len(name)) > 3 or len(wanted) < 4:
        return 0.0
    matcher = SequenceMatcher(None, wanted, name)
    return matcher.ratio() if matcher.quick_ratio() >= _ALIKE else 0.0


_NAME = re.compile(r"[A-Za-z0-9()\-,']+(?: [A-Za-z0-9()\-]+){0,3}")


def match_at(text: str, place: int) -> tuple[Species, int] | None:
    """The longest species name or formula that starts at a place of a normalised text, and where it ends."""
    found = _NAME.match(text, place)
    if found is None:
        return None
    candidate = found.group().rstrip("-,'")
    while candidate:
        species = known(candidate) or (_formula(candidate) if " " not in candidate else None)
        if species is not None:
            return species, place + len(candidate)
        shorter = re.sub(r"(?:[ ,][^ ,]*|[-)(']+)$", "", candidate)
        candidate = shorter if shorter != candidate else ""
    return None


def _formula(text: str) -> Species | None:
    """A typed formula; one capital with small letters alone is taken for a word."""
    if not re.search(r"\d|[A-Z].*[A-Z]", text) or text.count("(") != text.count(")"):
        return None
    try:
        return find(text)
    except NotUnderstood:
        return None

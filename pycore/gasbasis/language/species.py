"""Which species a typed name or formula means."""
from __future__ import annotations

import re
from difflib import SequenceMatcher
from functools import lru_cache
from typing import Mapping

from gasbasis import facts
from gasbasis.errors import NotUnderstood
from gasbasis.language import formula as formulas
from gasbasis.language.basis import Species
from gasbasis.language.normalise import normalise
from gasbasis.physics.molar_mass import molar_mass as summed

_GRAM = 1e-3
_ALIKE = 0.72


@lru_cache(maxsize=1)
def _rows() -> Mapping[str, object]:
    return {row.id: row for row in facts.species()}


@lru_cache(maxsize=1)
def _exact_names() -> Mapping[str, str]:
    """Spellings in their exact case: ids and short names such as NO, CO, As. A formula several share is nobody's name."""
    return {name: row.id for row in facts.species() for name in (row.id, *row.names)}


@lru_cache(maxsize=1)
def _loose_names() -> Mapping[str, str]:
    """Spellings that count in any case: all but the cautious ones, which are ordinary words when written otherwise."""
    names = ((name, row.id) for row in facts.species() for name in (row.id, row.name, *row.names))
    return {name.lower(): identity for name, identity in names if name.lower() not in _cautious()}


@lru_cache(maxsize=1)
def _cautious() -> frozenset[str]:
    return frozenset(name.lower() for name in facts.cautious_names())


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
    return Species(row.id, row.name, row.formula, atoms, row.cas, row.needs_reported_as, tuple(row.reported_as), row.usual_reported_as)


def _unknown(text: str, why: str) -> NotUnderstood:
    near = [species["id"] for species in search(text)[:3]]
    hint = f"Did you mean {', '.join(near)}?" if near else "Type a formula such as C6H5Cl, or a name such as benzene."
    return NotUnderstood(f"'{text.strip()[:40]}' is not a species: {why}.", hint=hint)


@lru_cache(maxsize=512)
def molar_mass(species: Species) -> tuple[float, str]:
    """The molar mass [kg/mol] and how it adds up, e.g. "32.06 + 2 × 15.999"."""
    weights = {element: facts.atomic_weight(element) for element, _ in species.atoms}
    total = summed(dict(species.atoms), {element: float(datum.number) for element, datum in weights.items()})
    sums = [weights[element].text if number == 1 else f"{number} × {weights[element].text}" for element, number in species.atoms]
    return total * _GRAM, " + ".join(sums)


@lru_cache(maxsize=1)
def _searched() -> tuple[tuple[tuple[str, ...], dict], ...]:
    """Every species with the lower-case names it is found by."""
    return tuple((tuple({name.lower() for name in (row.id, row.name, row.formula, row.cas, *row.names) if name}),
                  {"id": row.id, "name": row.name, "formula": row.formula, "cas": row.cas}) for row in facts.species())


@lru_cache(maxsize=256)
def search(text: str) -> tuple[dict, ...]:
    """Species that a text may mean, best first: beginnings, then contained, then alike in spelling."""
    wanted = normalise(text).strip().lower()
    if not wanted:
        return ()
    matcher = SequenceMatcher(None, "", wanted)
    scored = [(-max(_score(wanted, name, matcher) for name in names), entry["name"], entry) for names, entry in _searched()]
    return tuple(entry for score, _, entry in sorted(scored, key=lambda item: item[:2]) if -score >= _ALIKE)


def _score(wanted: str, name: str, matcher: SequenceMatcher) -> float:
    if wanted == name:
        return 3.0
    if name.startswith(wanted):
        return 2.0 + len(wanted) / len(name)
    if len(wanted) > 2 and wanted in name:
        return 1.0 + len(wanted) / len(name)
    if len(wanted) < 4 or abs(len(wanted) - len(name)) > 3 or len(set(wanted) & set(name)) < len(set(wanted)) - 2:
        return 0.0
    matcher.set_seq1(name)
    return matcher.ratio() if matcher.quick_ratio() >= _ALIKE else 0.0


_LONGEST_NAME = 60                     # characters; more are not searched for a name or formula
_NAME = re.compile(r"[A-Za-z0-9()\-,']+(?: [A-Za-z0-9()\-]+){0,3}")


def match_at(text: str, place: int) -> tuple[Species, int] | None:
    """The longest species name or formula that starts at a place of a normalised text, and where it ends."""
    found = _NAME.match(text, place)
    if found is None:
        return None
    candidate = found.group()[:_LONGEST_NAME].rstrip("-,'")
    while candidate:
        species = known(candidate) or (_formula(candidate) if " " not in candidate else None)
        if species is not None:
            return species, place + len(candidate)
        candidate = _shorter(candidate)
    return None


def _shorter(candidate: str) -> str:
    """Without its last word, or without the brackets behind its only word; empty when nothing is left to try."""
    cut = max(candidate.rfind(" "), candidate.rfind(","))
    shorter = candidate[:cut] if cut >= 0 else candidate.rstrip("-)('")
    return shorter if shorter != candidate else ""


def _formula(text: str) -> Species | None:
    """A typed formula; one capital with small letters alone is taken for a word."""
    if not re.search(r"\d|[A-Z].*[A-Z]", text) or text.count("(") != text.count(")"):
        return None
    try:
        return find(text)
    except NotUnderstood:
        return None

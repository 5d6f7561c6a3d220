"""The ways to a held value that is no direct reading, and from a concentration to a rate."""
from __future__ import annotations

from gasbasis.calculation.case import Case
from gasbasis.calculation.path import Drafting
from gasbasis.calculation.routes import collected, prepared
from gasbasis.calculation.routes.held import Held
from gasbasis.errors import OutOfRange
from gasbasis.language.basis import Doubt, Statement
from gasbasis.language.prepared import Prepared
from gasbasis.language.sample import Sample


def hold_statement(typed: Statement, sample: Sample | None, gas: Prepared | None) -> Statement:
    """What is held: as typed, or what the sample or the prepared gas comes to. Raises Missing; OutOfRange when it is given twice."""
    ways = [way for way in (sample, gas) if way is not None]
    if not ways:
        return typed
    if len(ways) > 1 or typed.text.strip():
        raise OutOfRange("What you hold is given twice: typed, and by the way it came about.", hint="Keep one: empty the line of the other.", field="hold")
    return collected.hold_statement(sample) if sample is not None else prepared.hold_statement(gas)


def lay_held(draft: Drafting, case: Case) -> Held | None:
    """The steps of the way the held value came by; None for a direct reading."""
    if case.sample is not None:
        return collected.held(draft, case)
    return prepared.held(draft, case) if case.prepared is not None else None


def condition(draft: Drafting, case: Case, letter: str) -> str | None:
    """The temperature or pressure of the held volume, where the way knows it better than the statement does."""
    if case.sample is not None:
        return collected.condition(draft, case, letter)
    return prepared.condition(draft, case, letter) if case.prepared is not None else None


def doubts(case: Case) -> list[Doubt]:
    """What the ways leave open."""
    return prepared.doubts(case) if case.prepared is not None else []

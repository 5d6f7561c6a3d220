"""What a route to a held value hands on."""
from __future__ import annotations

from dataclasses import dataclass, replace

from gasbasis.calculation.path import Shown
from gasbasis.language.basis import Quantity


@dataclass(frozen=True)
class Held:
    """A held value that is the result of steps."""

    name: str                          # of the result
    leaf: str                          # the leaf that counts as held and is turned round; empty where no single one does
    leaf_factor: float                 # SI value of one of its units
    shown: Shown                       # how the result is printed


def plain(quantity: Quantity) -> Quantity:
    """The quantity without its spread, which lives at the route's own leaf."""
    return replace(quantity, number=replace(quantity.number, uncertainty=None, thousands=None))

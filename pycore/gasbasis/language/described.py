"""How a piece is described to whoever reads or adds it."""
from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class Field:
    title: str
    help: str
    example: str
    choices: tuple[str, ...] = ()
    numeric: bool = False

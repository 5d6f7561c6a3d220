"""Chemical formulas as people type them."""
from __future__ import annotations

import re

_TOKEN = re.compile(r"([A-Z][a-z]?)|(\()|(\))|(\[)|(\])|([0-9]+)|([·.*])")
_SUBSCRIPTS = str.maketrans("₀₁₂₃₄₅₆₇₈₉", "0123456789")


def atoms(formula: str) -> dict[str, int]:
    """Count the atoms of a formula: "(CH3)2S" -> {"C": 2, "H": 6, "S": 1}. Hydrates: "CuSO4·5H2O".

    Raises ValueError naming the place when the text is no formula. Whether an element exists is not checked here.
    """
    text = formula.translate(_SUBSCRIPTS)
    total: dict[str, int] = {}
    for part in re.split("[·*]", text):
        ahead = re.match("[0-9]+", part)
        times = int(ahead.group()) if ahead else 1
        counts, end = _group(part, ahead.end() if ahead else 0, "")
        if end != len(part) or not counts:
            raise ValueError(f"'{formula}' is not a formula: unexpected '{part[end:end + 1]}' at place {end + 1}")
        for element, number in counts.items():
            total[element] = total.get(element, 0) + number * times
    return total


def _group(text: str, start: int, closing: str) -> tuple[dict[str, int], int]:
    """The atoms from `start` to the closing bracket, and the place behind it."""
    counts: dict[str, int] = {}
    place = start
    while place < len(text):
        found = _TOKEN.match(text, place)
        if found is None or found.group(6) or found.group(7):
            return counts, place
        if text[place] in ")]":
            return (counts, place + 1) if text[place] == closing else (counts, place)
        if text[place] in "([":
            inner, place = _group(text, place + 1, ")" if text[place] == "(" else "]")
            if text[place - 1] not in ")]" or not inner:
                return counts, place - 1
        else:
            inner, place = {found.group(): 1}, found.end()
        number = re.compile("[0-9]+").match(text, place)
        times = int(number.group()) if number else 1
        place = number.end() if number else place
        for element, count in inner.items():
            counts[element] = counts.get(element, 0) + count * times
    return counts, place

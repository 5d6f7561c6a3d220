"""Doubts about the temperature and pressure a volume is counted at, read from the published definitions."""
from __future__ import annotations

from functools import lru_cache

from gasbasis import facts
from gasbasis.calculation.leaves import SIDE_TITLES, fixed_quantity, kelvin_text
from gasbasis.language.basis import Doubt, Quantity, Reading, Statement

_CHANGES = "The warmer or thinner the reference volume, the less of the species it holds."


@lru_cache(maxsize=None)
def _published() -> tuple[tuple[Quantity, Quantity, tuple], ...]:
    """Every distinct published pair of temperature and pressure with the rows that define it."""
    groups: dict[tuple[float, float], list] = {}
    for row in facts.reference_conditions():
        temperature = fixed_quantity(row.temperature.text, row.temperature.unit)
        pressure = fixed_quantity(row.pressure.text, row.pressure.unit)
        key = (round(temperature.si, 4), round(pressure.si, 1))
        groups.setdefault(key, []).append((temperature, pressure, row))
    return tuple((members[0][0], members[0][1], tuple(row for _, _, row in members)) for _, members in sorted(groups.items()))


def _readings(word: str | None) -> tuple[Reading, ...]:
    """One reading a distinct definition. With a word, only the definitions that go by it."""
    readings = []
    for temperature, pressure, rows in _published():
        named = [row for row in rows if word is None or word in row.words]
        if not named:
            continue
        label = f"{kelvin_text(temperature)} K, {pressure.number.text} {pressure.unit.text}"
        others = f" and {len(named) - 2} more" if len(named) > 2 else ""
        names = "; ".join(row.name for row in named[:2]) + others
        readings.append(Reading(label.replace(" ", "").replace(",", "-"), label, (("temperature", temperature), ("pressure", pressure)), names))
    return tuple(readings)


_ACTUAL = Reading("actual", "the volume as it flowed, not a reference volume", (("actual_volume", True),), "common practice, no source")


def conditions_doubt(side: str, statement: Statement, flowed: bool = False) -> Doubt:
    """Neither temperature nor pressure is stated; a word such as 'normal' narrows the definitions.

    Where the gas's own temperature and pressure are known (`flowed`) and no word says reference, the volume may be the actual one.
    """
    return _conditions_doubt(side, statement.conditions_word, flowed)


@lru_cache(maxsize=64)
def _conditions_doubt(side: str, word: str | None, flowed: bool) -> Doubt:
    readings = (_readings(word) or _readings(None)) + ((_ACTUAL,) if flowed and not word else ())
    question = (f"'{word}' has {len(readings)} published meanings. Which one is meant in {SIDE_TITLES[side]}?" if word
                else f"At which temperature and pressure is the volume in {SIDE_TITLES[side]} counted?")
    return Doubt(f"{side}.conditions", "temperature and pressure", question, _CHANGES, readings)


@lru_cache(maxsize=8)
def temperature_doubt(side: str) -> Doubt:
    seen: dict[str, Reading] = {}
    for temperature, _, rows in _published():
        text = f"{kelvin_text(temperature)} K"
        seen.setdefault(text, Reading(text.replace(" ", ""), text, (("temperature", temperature),), rows[0].name))
    return Doubt(f"{side}.temperature", "temperature", f"At which temperature is the volume in {SIDE_TITLES[side]} counted?",
                 _CHANGES, tuple(seen.values()))


@lru_cache(maxsize=8)
def pressure_doubt(side: str) -> Doubt:
    seen: dict[float, Reading] = {}
    for _, pressure, rows in _published():
        text = f"{pressure.number.text} {pressure.unit.text}"
        seen.setdefault(round(pressure.si, 1), Reading(text.replace(" ", ""), text, (("pressure", pressure),), rows[0].name))
    return Doubt(f"{side}.pressure", "pressure", f"At which pressure is the volume in {SIDE_TITLES[side]} counted?",
                 _CHANGES, tuple(seen.values()))

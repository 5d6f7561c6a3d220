"""Read what is said of the gas: clauses such as "12 % H2O", "9.2 % O2 dry", "in combustion gas", a composition."""
from __future__ import annotations

import re
from dataclasses import replace
from functools import lru_cache

from gasbasis.errors import CoreError, NotUnderstood, OutOfRange
from gasbasis.language import gas_routes, readers
from gasbasis.language.basis import Gas, MatrixGas, Quantity, Species
from gasbasis.language.numbers import NUMBER, number_at
from gasbasis.language.species import match_at
from gasbasis.language.statement import Reader, ambiguities, refuse_text, walk
from gasbasis.language.units import unit

_TOTAL, _TOLERANCE = 100.0, 1.0        # a composition in percent
_FLUE = ("O2", "CO2", "H2O", "CO")     # these alone are measured contents, not a composition
_BASE = re.compile(r"(?:in\s)?(?:natural gas|pipeline gas|biogas|syngas|gas)\s?[:=]?\s?|composition\s?[:=]?\s?|mol\.?-?\s?%\s?[:=]?\s?", re.IGNORECASE)
_PERCENT = re.compile(r"\s?(?:(?:mol|vol|wt|mass|weight|m)\.?-?\s?)?%(?:\s?\(?(?:m/m|w/w|mol/mol)\)?)?", re.IGNORECASE)
_BY_MASS = re.compile(r"(?:composition\s)?(?:by\s(?:mass|weight)|(?:mass|wt|weight|m)\.?-?\s?(?:%|percent|fractions?))\s?[:=]?\s?", re.IGNORECASE)
_SAID_MASS = re.compile(r"wt|mass|weight|m-?%|m/m|w/w", re.IGNORECASE)
_SEPARATOR = re.compile(r"\s*(?:[,;+/\n]|and\s)?\s*")
_AMBIENT = re.compile(r"(?:ambient|air)\s(?:oxygen|O2)\s?[:=]?\s?(?:of\s)?|A\s?=\s?", re.IGNORECASE)
_MATRIX_ALONE = (
    ("nitrogen", re.compile(r"(?:nitrogen|N2)(?=\s*(?:[,;]|$))", re.IGNORECASE)),
    ("dry_air", re.compile(r"(?:dry |synthetic |zero )?air(?=\s*(?:[,;]|$))", re.IGNORECASE)),
    ("combustion_gas", re.compile(r"(?:combustion|flue|stack|exhaust)\s?gas(?=\s*(?:[,;]|$))", re.IGNORECASE)),
)


def read_gas(text: str) -> tuple[Gas, tuple[CoreError, ...]]:
    """The gas a text describes, and what could not be read of it."""
    refusal = refuse_text(text, "gas")
    if refusal is not None:
        return Gas(text=text), (refusal,)
    return _read(text)


@lru_cache(maxsize=32)
def _read(text: str) -> tuple[Gas, tuple[CoreError, ...]]:
    reader = Reader(text, "gas")
    walk(reader, _CLAUSES)
    if "pending" in reader.fields:
        number, start, end = reader.fields.pop("pending")
        reader.refuse(NotUnderstood(f"'{number.text}' has no unit.", hint="Put its unit behind it, e.g. '12 % H2O' or '182 °C'."),
                      start, end)
    known = {name: value for name, value in reader.fields.items() if name in Gas.__dataclass_fields__}
    gas = Gas(text=text, pieces=tuple(sorted(reader.pieces, key=lambda piece: piece.span)), **known)
    return replace(gas, ambiguities=ambiguities(gas, "gas")), tuple(reader.problems)


def _ambient(reader) -> bool:
    found = _AMBIENT.match(reader.text, reader.place)
    number = NUMBER.match(reader.text, found.end()) if found else None
    if number is None:
        return False
    percent = _PERCENT.match(reader.text, number.end())
    end = percent.end() if percent else number.end()
    typed = number_at(number, reader.original[number.start():number.end()].strip())
    reader.take("ambient_oxygen", Quantity(typed, unit("%")), reader.place, end)
    reader.place = end
    return True


def _composition(reader) -> bool:
    """ "CH4 93.3, C2H6 2.6, N2 1.0": at least two components, 100 ± 1 % in all."""
    base = _BASE.match(reader.text, reader.place)
    place = base.end() if base else reader.place
    mass = _BY_MASS.match(reader.text, place)
    place = mass.end() if mass else place
    parts: list[tuple[Species, Quantity]] = []
    begin = end = place
    while (component := _component(reader, place)) is not None:
        species, quantity, end = component
        parts.append((species, quantity))
        place = _SEPARATOR.match(reader.text, end).end()
    stranger = _STRANGER.match(reader.text, place) if parts and end > begin and any(species.id not in _FLUE for species, _ in parts) else None
    if stranger and stranger["name"] not in _OTHER_LETTERS:
        reader.refuse(NotUnderstood(f"'{stranger['name']}' in the composition is no component that is known.",
                                    hint="Type its formula, e.g. C3H8, or its usual name."),
                      stranger.start("name"), stranger.end())
        reader.place = stranger.end()
        return True
    if len(parts) < 2 or all(species.id in _FLUE for species, _ in parts):
        return False
    behind = re.compile(r"[\s,(]*" + _BY_MASS.pattern + r"\)?", re.IGNORECASE).match(reader.text, end)
    end = behind.end() if behind else end
    by_mass = bool(mass or behind or _SAID_MASS.search(reader.text[begin:end]))
    start, reader.place = reader.place, end
    total = sum(quantity.si for _, quantity in parts) * _TOTAL
    names = [species.id for species, _ in parts]
    if len(set(names)) < len(names):
        reader.refuse(NotUnderstood("A component is given twice in the composition.", hint="Give each once."), start, end)
    elif abs(total - _TOTAL) > _TOLERANCE:
        reader.refuse(OutOfRange(f"The composition adds up to {total:.4g} %; 100 ± 1 % is needed.",
                                 hint="Add what is missing, for example 'N2 1.0', or correct a component.",
                                 field="gas.matrix_gas"), start, end)
    else:
        reader.take("matrix_gas", MatrixGas("composition", composition=tuple(parts), by_mass=by_mass), start, end)
    return True


# A word with a bare share behind it, in the row of components; Y, A and M have clauses of their own.
_STRANGER = re.compile(r"(?P<name>[A-Za-z][A-Za-z0-9-]{0,20})\s?[:=]?\s?\d+(?:[.,]\d+)?\s?%?\s*(?=[,;]|$)")
_OTHER_LETTERS = ("Y", "A", "M")


def _component(reader, place: int) -> tuple[Species, Quantity, int] | None:
    found = match_at(reader.text, place)
    if found is None:
        return None
    species, end = found
    sign = re.compile(r"\s?[:=]?\s?").match(reader.text, end)
    number = NUMBER.match(reader.text, sign.end())
    if number is None:
        return None
    typed = number_at(number, reader.original[number.start():number.end()].strip())
    percent = _PERCENT.match(reader.text, number.end())
    return species, Quantity(replace(typed, thousands=None), unit("%")), percent.end() if percent else number.end()


_EQUATION = r"(?:ISO\s?6976(?::2016)?|AGA\s?-?8(?:\sDETAIL)?|DETAIL|ISO\s?(?:20765-1|12213-2))(?!\w)"
_REAL = re.compile(rf"(?:as\s)?(?:a\s)?real gas(?:\s(?:by|per|to)\s{_EQUATION})?|(?:Z\s)?(?:by|per)\s{_EQUATION}", re.IGNORECASE)


def _model(reader) -> bool:
    found = _REAL.match(reader.text, reader.place)
    if found is None:
        return False
    said = found.group().upper()
    model = "iso_6976" if "6976" in said else "aga8_detail" if re.search(r"AGA|DETAIL|20765|12213", said) else "real"
    reader.take("model", model, reader.place, found.end())
    reader.place = found.end()
    return True


def _matrix_alone(reader) -> bool:
    for identity, pattern in _MATRIX_ALONE:
        found = pattern.match(reader.text, reader.place)
        if found:
            reader.take("matrix_gas", MatrixGas(identity), reader.place, found.end())
            reader.place = found.end()
            return True
    return False


_DROPLETS = re.compile(r"(?:with\s|water\s|carries\s)?(?:droplets?(?:[ -]laden)?|mist)(?:\spresent)?", re.IGNORECASE)


def _droplets(reader) -> bool:
    found = _DROPLETS.match(reader.text, reader.place)
    if found is None:
        return False
    reader.take("droplets", True, reader.place, found.end())
    reader.place = found.end()
    return True


def _gas_word(reader) -> bool:
    """ "wet", "dry" and "natural gas" on their own say nothing the gas line needs: named, not dropped."""
    found = re.compile(r"natural gas|pipeline gas|flue gas", re.IGNORECASE).match(reader.text, reader.place)
    if found is None:
        return False
    reader.refuse(NotUnderstood(f"'{found.group()}' alone does not give a molar mass.",
                                hint="Type its composition behind it, e.g. 'CH4 93.3, C2H6 2.6, ...', or 'M 17.4 g/mol'."),
                  reader.place, found.end())
    reader.place = found.end()
    return True


_CLAUSES = (readers.late_spread, readers.coverage, *gas_routes.CLAUSES, _model, _droplets, _ambient, _composition, readers.named_share, readers.stated_molar_mass, readers.matrix_gas, _matrix_alone,
            _gas_word, readers.number_led)


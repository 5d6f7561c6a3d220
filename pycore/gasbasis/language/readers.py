"""The readers of a statement's parts. Each looks at the reader's place, takes what it knows and moves on, or declines."""
from __future__ import annotations

import re
from dataclasses import replace
from decimal import Decimal
from typing import Callable

from gasbasis.errors import NotUnderstood
from gasbasis.language import tokens
from gasbasis.language.basis import CORRECTED, DRY, MEASURED, WET, MatrixGas, Number, Quantity, Route, Species, Uncertainty
from gasbasis.language.numbers import NUMBER, PLUS_MINUS, number_at, numbers_at, uncertainty_at
from gasbasis.language.columns import column_at
from gasbasis.language.rate_units import rate_unit
from gasbasis.language.species import find, match_at
from gasbasis.language.units import unit

Read = Callable[[object], bool]
_PERCENT = re.compile(r"\s?(?:vol\.?-?\s?)?%(?:\s?\(?(?:v/v|vol\.?|v)\)?)?(?!\w)|\s?(?:percent|vol-%)(?!\w)", re.IGNORECASE)
_READ_AS = re.compile(r"[\s,]*\(?\s?(?:(?:measured|read|on a?)\s)?(?P<water>dry|wet)(?:\sbasis)?\s?\)?(?![A-Za-z0-9])", re.IGNORECASE)
_CONTENTS = (("oxygen", tokens.OXYGEN_NAME), ("water_content", tokens.WATER_NAME), ("carbon_dioxide", tokens.CARBON_DIOXIDE_NAME))


# --- numbers with units ---

def number_led(reader) -> bool:
    """A number and what follows it: a concentration, a temperature, a pressure, a share of O2 or water."""
    found = numbers_at(reader.text, reader.original, reader.place)
    if found is None or glued_sign(reader.text, reader.place):
        return False
    start, (number, after) = reader.place, found
    after, number = _spread(reader, after, number)
    for follow in (_share, _concentration, _molar_mass, _pressure, _temperature):
        if follow(reader, number, start, after):
            return True
    if "value" not in reader.fields and "unit" in reader.fields:
        return _take(reader, "value", Quantity(number, reader.fields["unit"]), start, after)   # "NOx (ppm): 142"
    if "value" not in reader.fields and "pending" not in reader.fields and not tokens.NO_CONCENTRATION.match(reader.text, skip(reader.text, after)):
        reader.fields["pending"] = (number, start, after)      # "Hg: 8.3 (ug/m3)": the unit may follow
        reader.place = after
        return True
    mass = tokens.NO_CONCENTRATION.match(reader.text, skip(reader.text, after))
    after = mass.end() if mass else after
    given = reader.original[start:after].strip()
    reader.refuse(NotUnderstood(f"'{given}' is a mass; a concentration is a mass in a volume." if mass else f"'{given}' is a number without a unit that is known.",
                                hint="Put its unit behind it, e.g. mg/m3, ppm, °C, kPa."), start, after)
    reader.place = after
    return True


def glued_sign(text: str, place: int) -> bool:
    """The point of "approx.10" and the hyphen of "NOx-142" end the word before; they begin no number."""
    return text[place] in ".,-+" and place > 0 and text[place - 1].isalpha()


def _spread(reader, after: int, number: Number) -> tuple[int, Number]:
    """ "35.2 ± 1.1" before the unit; a % behind it is the unit's, unless a unit of concentration follows: "50 ± 5 % mg/m3"."""
    found = PLUS_MINUS.match(reader.text, skip(reader.text, after))
    if found is None:
        return after, number
    uncertainty = uncertainty_at(found)
    if uncertainty.relative and not tokens.MASS_PER_VOLUME.match(reader.text, skip(reader.text, found.end())):
        return found.end("amount"), replace(number, uncertainty=replace(uncertainty, relative=False))
    return found.end(), replace(number, uncertainty=uncertainty)


def skip(text: str, place: int, extra: str = "") -> int:
    while place < len(text) and text[place] in " " + extra:
        place += 1
    return place


_BEFORE_NAME = re.compile(r"[\s]*(?:\((?:dry|wet)\)\s*|(?:dry|wet)\s+)?(?:ref\.?\s+|reference\s+|of\s+)?")


def percent_at(text: str, place: int) -> re.Match | None:
    return _PERCENT.match(text, place)


def is_share(text: str, after: int) -> bool:
    """Whether the number that ends here is a share of O2, water or CO2."""
    percent = _PERCENT.match(text, after)
    ahead = _BEFORE_NAME.match(text, percent.end()) if percent else None
    return ahead is not None and any(re.compile(name, re.IGNORECASE).match(text, ahead.end()) for _, name in _CONTENTS)


def _share(reader, number: Number, start: int, after: int) -> bool:
    """ "9.2 % O2", "14 % moisture", "11 % (dry) O2" """
    if not is_share(reader.text, after):
        return False
    ahead = _BEFORE_NAME.match(reader.text, _PERCENT.match(reader.text, after).end())
    for field, name in _CONTENTS:
        found = re.compile(name, re.IGNORECASE).match(reader.text, ahead.end())
        if found:
            said = ahead.group().lower()
            water = DRY if "dry" in said else WET if "wet" in said else None
            reference = CORRECTED if "ref" in said else None
            return _take_share(reader, field, number, start, found.end(), water, reference)
    return False


def _take_share(reader, field: str, number: Number, start: int, end: int, water: str | None = None, meaning: str | None = None) -> bool:
    quantity = Quantity(number, unit("%"))
    end, read = _read_as(reader, field, end)
    reader.take(field, quantity, start, end)
    if field in ("oxygen", "carbon_dioxide") and (water or read):
        reader.take(f"{field}_water", water or read, start, end)
    meaning = meaning or reader.fields.pop("oxygen_ahead", None)
    if field in ("oxygen", "carbon_dioxide") and meaning:
        reader.take(f"{field}_meaning", meaning, start, end)
    reader.place = end
    return True


def _read_as(reader, field: str, end: int) -> tuple[int, str | None]:
    """Directly behind an oxygen in the gas, "dry" says how it was read; in a statement it is the statement's own."""
    found = _READ_AS.match(reader.text, end)
    bracketed = found and "(" in found.group()
    if found is None or field == "water_content" or not (reader.side == "gas" or bracketed):
        return end, None
    return found.end(), found["water"].lower()


def named_share(reader) -> bool:
    """ "O2 9,2 %", "O2: 9.2 % dry", "moisture 14 %", "ambient O2 20.9 %", "ref. O2 11 %" """
    for field, name in _CONTENTS:
        found = re.compile(rf"(?P<ambient>ambient\s)?(?P<ref>ref(?:erence|\.)?\s)?(?P<said>(?:dry|wet)\s)?(?:{name})\s?(?:ref\.?\s?)?(?:content\s)?[:=]?\s?(?:of\s)?"
                           rf"(?P<read>\((?:dry|wet)\)\s?)?", re.IGNORECASE).match(reader.text, reader.place)
        listed = numbers_at(reader.text, reader.original, found.end()) if found else None
        if listed is None:
            continue
        after, value = _spread(reader, listed[1], listed[0])
        percent = _PERCENT.match(reader.text, after)
        if percent is None:
            continue
        if found["ambient"]:
            return _take(reader, "ambient_oxygen", Quantity(value, unit("%")), reader.place, percent.end())
        words = (found["said"] or found["read"] or "").lower()
        water = DRY if "dry" in words else WET if "wet" in words else None
        meaning = CORRECTED if found["ref"] or re.search(r"\bref", found.group(), re.IGNORECASE) else None
        return _take_share(reader, field, value, reader.place, percent.end(), water, meaning)
    return False


def _as_number(reader, found: re.Match) -> Number:
    return number_at(found, reader.original[found.start():found.end()].strip())


def _concentration(reader, number: Number, start: int, after: int) -> bool:
    place = skip(reader.text, after)
    if place == after and re.match(r"-[A-Za-z%]", reader.text[place:place + 2]):      # "a 10-ppm limit"
        place += 1
    closing = reader.text.startswith(")", place)              # "(35.2 ± 1.1) mg/m3"
    marks = concentration_unit(reader, skip(reader.text, place + 1) if closing else place)
    if marks is None:
        return False
    measured, end = marks
    if "value" in reader.fields and measured.kind == "parts":
        return False
    reader.take("value", Quantity(number, measured), start, end)
    reader.fields["unit"] = measured
    reader.place = end
    return True


def late_spread(reader) -> bool:
    """ "142 ppm ± 5 %", "20 °C ± 2 K", "9.2 % O2 ± 0.2 %": a spread behind the quantity it belongs to."""
    found = PLUS_MINUS.match(reader.text, reader.place)
    quantity = reader.fields.get(reader.last)
    if found is None or quantity is None or quantity.number.uncertainty is not None:
        return False
    uncertainty, end = uncertainty_at(found), found.end()
    if not uncertainty.relative:
        uncertainty, end = _in_unit_of(quantity, uncertainty, reader, end)
    reader.amend(replace(quantity, number=replace(quantity.number, uncertainty=uncertainty)), end)
    return True


def _in_unit_of(quantity: Quantity, uncertainty: Uncertainty, reader, end: int) -> tuple[Uncertainty, int]:
    """A spread with a unit of its own, brought to the quantity's: "20 °C ± 1.8 °F"."""
    for pattern in (tokens.TEMPERATURE_UNIT, tokens.PRESSURE_UNIT, tokens.MASS_PER_VOLUME, tokens.PARTS):
        found = pattern.match(reader.text, skip(reader.text, end))
        own = _unit_or_none(found.group()) if found else None
        if own is not None and own.kind == quantity.unit.kind:
            scale = Decimal(repr(own.factor)) / Decimal(repr(quantity.unit.factor))
            return replace(uncertainty, amount=uncertainty.amount * scale), found.end()
    return uncertainty, end


def _unit_or_none(text: str):
    try:
        return unit(text)
    except NotUnderstood:
        return None


def _molar_mass(reader, number: Number, start: int, after: int) -> bool:
    found = tokens.MOLAR_MASS.match(reader.text, skip(reader.text, after))
    if found is None:
        return False
    measured = unit("g/mol" if found.group() == "kg/kmol" else found.group())
    return _take(reader, "matrix_gas", MatrixGas("stated", Quantity(number, measured)), reader.fields.pop("ahead", start), found.end())


def _pressure(reader, number: Number, start: int, after: int) -> bool:
    found = tokens.PRESSURE_UNIT.match(reader.text, skip(reader.text, after))
    if found is None:
        return False
    gauge = found["gauge"]
    text = found.group()[:len(found.group()) - len(gauge or "")]
    measured, end = column_at(reader, found.end(), unit(text.strip()))
    quantity = Quantity(_plausible(number, measured.factor, 2e4, 4e7), measured)
    if reader.side == "gas" and gauge:
        if "g" in gauge.lower():
            return _take(reader, "pressure_route", Route("gauge", (("pressure", quantity),)), start, found.end())
        reader.fields["pressure_said"] = "absolute"
    if gauge and "g" in gauge.lower().replace("gauge", "g"):
        reader.refuse(NotUnderstood(f"'{reader.original[start:found.end()]}' is a gauge pressure.",
                                    hint="Give the absolute pressure: gauge plus barometer."), start, found.end())
        reader.place = found.end()
        return True
    inside = re.compile(r"\s?(?:in|of)\s(?=[\d.,])").match(reader.text, end)
    if inside and "value" not in reader.fields and reader.side != "gas":
        reader.take("value", quantity, start, end)
        reader.fields["unit"] = quantity.unit
        reader.fields["partial"] = True
    elif reader.fields.get("partial"):
        reader.take("total_pressure", quantity, start, end)
    else:
        reader.take("pressure", quantity, start, end)
    reader.place = end
    return True


def _temperature(reader, number: Number, start: int, after: int) -> bool:
    found = tokens.TEMPERATURE_UNIT.match(reader.text, skip(reader.text, after))
    if found is None:
        return False
    letter = re.sub(r"[^CFKR]", "", found.group().upper().replace("DEG", "").replace("REES", "").replace("CELSIUS", "C").replace("KELVIN", "K"))[:1]
    measured = unit({"C": "degC", "F": "degF", "K": "K", "R": "degR"}[letter])
    return _take(reader, "temperature", Quantity(_plausible(number, measured.factor, 150.0, 2500.0, measured.offset), measured), start, found.end())


def _plausible(number: Number, factor: float, low: float, high: float, offset: float = 0.0) -> Number:
    """Where only one of the two readings of "101.325" is a possible pressure or temperature, it is the one."""
    if number.thousands is None:
        return number
    fits = [low <= float(value) * factor + offset <= high for value in (number.decimal, number.thousands)]
    if fits == [False, True]:
        return replace(number, decimal=number.thousands, thousands=None)
    return replace(number, thousands=None)


# --- units of concentration ---

def concentration_unit(reader, place: int):
    """A unit of concentration at a place, taking what is glued to it as pieces. Returns (unit, end) or None."""
    for read in (*((rate_unit,) if reader.side != "hold" else ()), _power_notation, _mass_per_volume, _amount_per_volume, _plain_ratio, _parts):
        found = read(reader, place)
        if found is not None:
            return found
    return None


def _volume(text: str) -> str:
    plain = text.lower().replace("^", "").replace(" ", "").replace(".", "")
    if plain in ("cm", "cbm", "cubicmetre", "cubicmetres", "cubicmeter", "cubicmeters"):
        return "m3"
    if plain in ("cf", "cft", "ft3", "cuft", "cubicfoot", "cubicfeet"):
        return "ft3"
    return text.replace("^", "")


def _mass_per_volume(reader, place: int):
    found = tokens.MASS_PER_VOLUME.match(reader.text, place)
    if found is None:
        return None
    entity = found["entity"]
    if entity and _species_or_none(entity) is None:
        return None
    count = {"million": "million ", "MM": "million ", "10^6": "million ", "106": "million "}.get(found["count"], f"{found['count'] or ''} ")
    if found["count"] == "M":
        reader.fields["unit_in_millions"] = unit(f"{found['mass']}/million {_volume(found['volume'])}")
        count = "1000 "                                       # the gas trade's M
    measured = unit(f"{found['mass']}/{count.lstrip()}{_volume(found['volume'])}")
    if entity:
        reader.take("reported_as", _species_or_none(entity), *found.span("entity"))
    _called(reader, (found["called"] or "").lower().replace(".", ""), found.span("called"))
    behind = (found["behind"] or "").strip(" ()").lower()
    _called(reader, {"stp": "STP"}.get(behind, behind), found.span("behind"))
    return measured, found.end()


def _called(reader, word: str, span: tuple[int, int]) -> None:
    """What a volume is called: normal, standard, dry, actual."""
    if not word:
        return
    if "d" in word.replace("standard", "s").replace("std", "s"):
        reader.take("water", DRY, *span)
    elif word.startswith("w"):
        reader.take("water", WET, *span)
    if word == "STP":
        reader.take("conditions_word", "STP", *span)
    elif "actual" in word or word == "a":
        reader.take("actual_volume", True, *span)
    elif "n" in word.replace("standard", "s"):
        reader.take("conditions_word", "normal", *span)
    elif "s" in word:
        reader.take("conditions_word", "standard", *span)
    elif word == "r":
        reader.take("conditions_word", "reference", *span)


def _amount_per_volume(reader, place: int):
    found = tokens.AMOUNT_PER_VOLUME.match(reader.text, place)
    if found is None:
        return None
    _called(reader, (found["called"] or "").lower(), found.span("called"))
    return unit(f"{found['amount']}/{_volume(found['volume'])}"), found.end()


def _power_notation(reader, place: int):
    found = tokens.POWER_NOTATION.match(reader.text, place)
    if found is None or (found["power"] == "3") != (found["bottom"] in ("m", "dm", "cm")):
        return None
    return unit(f"{found['top']}/{found['bottom']}{'3' if found['power'] == '3' else ''}"), found.end()


def _plain_ratio(reader, place: int):
    for pattern in (tokens.MASS_PER_MASS, tokens.AMOUNT_PER_AMOUNT, tokens.VOLUME_PER_VOLUME):
        found = pattern.match(reader.text, place)
        if found is not None:
            return unit(f"{found['top']}/{found['bottom'].replace('^', '')}"), found.end()
    return None


_SPELT = {"vpm": "ppm", "parts per million": "ppm", "parts per billion": "ppb", "parts per trillion": "ppt"}
_BEFORE = {"vol": "volume", "v": "volume", "mol": "volume", "mole": "volume", "wt": "mass", "w": "mass", "mass": "mass", "m": "mass"}


def _parts(reader, place: int):
    found = tokens.PARTS.match(reader.text, place)
    if found is None:
        return None
    parts = re.sub("per ?cent", "percent", found["parts"].lower())
    measured = unit(_SPELT.get(parts, parts))
    by, glued = _BEFORE.get((found["before"] or "").lower()), found["glued"] or ""
    by_span = found.span("before")
    if parts == "vpm":
        by, by_span = "volume", (found.start("parts"), found.start("parts") + 1)
    if glued:
        letters, start = glued.lower(), found.start("glued")
        water_at = next((index for index in (letters.find("d"), letters.rfind("w")) if index >= 0 and (letters[index] == "d" or "v" in letters)), None)
        if water_at is not None:           # vd, dv, vw, wv, md: one letter is water, the rest what the parts count
            reader.take("water", DRY if letters[water_at] == "d" else WET, start + water_at, start + water_at + 1)
        by_span = (start + (1 if water_at == 0 else 0), found.end("glued") - (1 if water_at else 0))
        by = "volume" if letters.strip("dw")[:1] == "v" or "vol" in letters or "mol" in letters else "mass"
    if found["ending_dry"]:
        reader.take("water", DRY, *found.span("ending_dry"))
    if by:
        reader.take("parts_by", by, *by_span)
    return measured, found.end()


def unit_led(reader) -> bool:
    """A unit without a number: on the owed side, or in a heading such as "NOx (ppm): 142"."""
    marks = concentration_unit(reader, reader.place) or _owed_pressure(reader)
    if marks is None:
        return False
    measured, end = marks
    start = reader.place
    reader.place = end
    if "pending" in reader.fields:
        number, began, _ = reader.fields.pop("pending")
        reader.take("value", Quantity(number, measured), began, end)
        reader.fields["unit"] = measured
        return True
    if reader.fields.get("unit") not in (None, measured):
        reader.refuse(NotUnderstood(f"A second unit, '{reader.original[start:end]}'.", hint="Give one value in one unit."), start, end)
        return True
    reader.fields["unit"] = measured
    reader.take("unit", measured, start, end)
    return True


def _owed_pressure(reader):
    """ "Pa in 1013 hPa": a partial pressure is owed."""
    found = tokens.PRESSURE_UNIT.match(reader.text, reader.place)
    if found is None or reader.side != "owe" or "unit" in reader.fields or found["gauge"]:
        return None
    reader.fields["partial"] = True
    return unit(found.group()), found.end()


# --- words ---

def _word_reader(field: str, table) -> Read:
    def read(reader) -> bool:
        for value, pattern in table:
            found = pattern.match(reader.text, reader.place)
            if found:
                return _take(reader, field, value, reader.place, found.end())
        return False
    return read


def _take(reader, field: str, value: object, start: int, end: int) -> bool:
    reader.take(field, value, start, end)
    reader.place = end
    return True


_parts_word = _word_reader("parts_by", tokens.PARTS_BY)
water = _word_reader("water", tokens.WATER)
conditions_word = _word_reader("conditions_word", tokens.CONDITIONS_WORD)
actual_volume = _word_reader("actual_volume", ((True, tokens.ACTUAL),))
matrix_gas = _word_reader("matrix_gas", tuple((MatrixGas(identity), pattern) for identity, pattern in tokens.MATRIX))


def parts_by(reader) -> bool:
    """ "v/v", "by mass", ... - but a "mol/mol" with no unit before it is the unit itself."""
    return not ("unit" not in reader.fields and reader.text.startswith("mol/mol", reader.place)) and _parts_word(reader)


def reported_as(reader) -> bool:
    found = tokens.REPORTED_AS.match(reader.text, reader.place)
    if found is None:
        return False
    name = re.sub(r"\s?(?:equivalent|carbon)$", "", found["name"]) or found["name"]
    if name.lower() in ("carbon", "total"):
        name = "C"
    species = _species_or_none(name.rstrip(")")) or _species_or_none(found["name"].rstrip(")"))
    if species is None:
        return False
    end = found.end() - (1 if found["name"].endswith(")") and "(" not in found["name"] else 0)
    return _take(reader, "reported_as", species, reader.place, end)


def _species_or_none(name: str) -> Species | None:
    try:
        return find(name)
    except NotUnderstood:
        return None


def oxygen_meaning(reader) -> bool:
    """ "corrected to", "ref.", "measured at": what the oxygen behind it is."""
    for meaning, pattern in ((CORRECTED, tokens.CORRECTED), (MEASURED, tokens.MEASURED)):
        found = pattern.match(reader.text, reader.place)
        if found and re.compile(rf"[\d<.,]|{tokens.OXYGEN_NAME}|{tokens.CARBON_DIOXIDE_NAME}", re.IGNORECASE).match(reader.text, found.end()):
            reader.fields["oxygen_ahead"] = meaning
            reader.place = found.end()
            return True
    return False


_FORMS = (("rectangular", re.compile(r"\(?\s?(?:rect(?:angular|\.)?|half-?width|limits?|uniform)\s?\)?(?![A-Za-z])", re.IGNORECASE)),
          ("triangular", re.compile(r"\(?\s?triang(?:ular|\.)?\s?\)?(?![A-Za-z])", re.IGNORECASE)),
          ("standard", re.compile(r"\(?\s?(?:standard uncertainty|std\.? unc\.?|1\s?(?:s|σ|sd))\s?\)?(?![A-Za-z])", re.IGNORECASE)),
          ("expanded", re.compile(r"\(?\s?(?:2\s?(?:s|σ|sd)|95\s?%(?:\s?(?:CI|confidence))?)\s?\)?(?![A-Za-z])", re.IGNORECASE)))


def coverage(reader) -> bool:
    """ "(k=2)", "(rectangular)", "(1 s)", "(95 %)": what the spread of the quantity before it means."""
    quantity = reader.fields.get(reader.last)
    if quantity is None or quantity.number.uncertainty is None:
        return False
    found = tokens.COVERAGE.match(reader.text, reader.place)
    freedom = tokens.DEGREES_OF_FREEDOM.match(reader.text, reader.place)
    if freedom:
        found, changed = freedom, replace(quantity.number.uncertainty, degrees_of_freedom=Decimal(freedom["dof"].replace(",", ".")))
    elif found:
        changed = replace(quantity.number.uncertainty, coverage_factor=Decimal(found["k"].replace(",", ".")))
    else:
        form, found = next(((name, match) for name, pattern in _FORMS if (match := pattern.match(reader.text, reader.place))), (None, None))
        if found is None:
            return False
        changed = replace(quantity.number.uncertainty, form=form, coverage_factor=Decimal(2) if form == "expanded" else None)
    reader.amend(replace(quantity, number=replace(quantity.number, uncertainty=changed)), found.end())
    return True


def stated_molar_mass(reader) -> bool:
    found = tokens.STATED_MOLAR_MASS.match(reader.text, reader.place)
    number = NUMBER.match(reader.text, found.end()) if found else None
    if number is None or tokens.MOLAR_MASS.match(reader.text, skip(reader.text, number.end())) is None:
        return False
    return _molar_mass(reader, _as_number(reader, number), found.start(), number.end())


def species(reader) -> bool:
    found = match_at(reader.text, reader.place)
    if found is None:
        return False
    return _take(reader, "species", found[0], reader.place, found[1])

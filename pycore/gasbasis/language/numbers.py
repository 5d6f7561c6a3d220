"""Numbers as people type them, and the one home of rounding.

Typed digits are kept as Decimal; a printed number is rounded half away from zero, on a named rule.
"""
from __future__ import annotations

import re
from dataclasses import replace
from decimal import ROUND_DOWN, ROUND_HALF_UP, Decimal

from gasbasis.errors import NotUnderstood
from gasbasis.language.basis import Number, Uncertainty
from gasbasis.language.normalise import normalise

_DIGITS = r"(?:\d{1,3}(?:[ '][0-9]{3})+(?:[.,]\d+)?|\d{1,3}(?:[.,]\d{3}){2,}(?:[.,]\d+)?|\d{1,3}(?:,\d{3})+\.\d+|\d{1,3}(?:\.\d{3})+,\d+|\d+(?:[.,]\d+)?|[.,]\d+)"
# Powers of two digits at most: what lies beyond is no measured number and would leave the floats.
_POWER = r"(?:[eE][+-]?\d{1,2}(?![\dA-Za-z])|\s?[x·*]\s?10\s?\^?\s?\(?[+⁺⁻-]?\d{1,2}\)?)"
PLAIN = rf"[+-]?(?:10(?:\^[+-]?|⁻)\d{{1,2}}|{_DIGITS}{_POWER}?)(?![\d])"
_BELOW = r"(?:<=?|≤|less than\s)"
NUMBER = re.compile(rf"(?P<below>{_BELOW}\s*)?(?P<plain>{PLAIN})", re.IGNORECASE)
PLUS_MINUS = re.compile(rf"(?:±|\+\s?/\s?-|\+-)\s*(?P<amount>{PLAIN})(?P<percent>\s*%)?")
_PLAINEST, _LARGEST = -4, 6            # powers of ten printed without a power


def read_number(text: str) -> Number:
    """The number a text holds, the whole text. Raises NotUnderstood.

    "8,3", "1 234,5", "1.2e-3", "1·10⁻³", "−2", "<0.5", "35.2 ± 1.1", "50 ± 5 %".
    """
    plain = normalise(text).strip()
    found = NUMBER.match(plain)
    number = number_at(found, text.strip()) if found else None
    if number is not None and found.end() < len(plain):
        spread = PLUS_MINUS.fullmatch(plain[found.end():].strip())
        number = replace(number, uncertainty=uncertainty_at(spread), text=text.strip()) if spread else None
    if number is None:
        raise NotUnderstood(f"'{text.strip()[:40]}' is not a number.",
                            hint="Type it as 8.3 or 8,3, 1.2e-3, < 0.5, or 35.2 ± 1.1.")
    return number


def number_at(found: re.Match, text: str) -> Number:
    """The number of a NUMBER match; `text` is how it was typed."""
    value, thousands = _decimal(found["plain"])
    return Number(value, text, below=found["below"] is not None, thousands=thousands)


_LEAD = re.compile(r"(?:(?:the\s)?(?:mean|average)\sof|readings?|runs?)\s?[:=]?\s?", re.IGNORECASE)
_NEXT = {True: re.compile(r"\s?(?:;|,(?=\s)|\sand(?=\s))\s?"), False: re.compile(r"\s?;\s?")}   # a bare comma parts readings only behind "mean of"


def numbers_at(text: str, original: str, place: int) -> tuple[Number, int] | None:
    """A number at a place, or a list of repeated readings ("141; 143; 142", "mean of 141, 143 and 142"), and where it ends."""
    lead = _LEAD.match(text, place)
    found = NUMBER.match(text, lead.end() if lead else place)
    if found is None:
        return None
    first = number_at(found, original[found.start():found.end()].strip())
    readings, end = [first], found.end()
    while (sign := _NEXT[lead is not None].match(text, end)) and (found := NUMBER.match(text, sign.end())) and not found["below"]:
        readings.append(number_at(found, original[found.start():found.end()].strip()))
        end = found.end()
    return (first if len(readings) == 1 else _repeated(readings), end)


def _repeated(readings: list[Number]) -> Number:
    """The mean of repeated readings, which keeps them."""
    values = tuple(number.decimal for number in readings)
    mean = sum(values) / len(values)
    decimals = max(0, *(-value.as_tuple().exponent for value in values))
    grouped = [number.thousands for number in readings]
    return Number(mean, format(round_decimals(mean, decimals + 1).normalize(), "f"), readings=values,
                  thousands=sum(grouped) / len(grouped) if all(grouped) else None)


def uncertainty_at(found: re.Match) -> Uncertainty:
    """The uncertainty of a PLUS_MINUS match; its coverage factor is read elsewhere."""
    amount, _ = _decimal(found["amount"])
    return Uncertainty(amount, relative=found["percent"] is not None)


def _decimal(plain: str) -> tuple[Decimal, Decimal | None]:
    """The value, and the other value it has when its only separator may group thousands."""
    head, power = _split_power(plain)
    digits = re.sub("[ ']", "", head)
    grouped = digits != head
    separators = [character for character in digits if character in ".,"]
    scale = Decimal(10) ** power
    if len(set(separators)) == 2:      # the last one is the decimal sign
        decimal_sign = separators[-1]
        digits = digits.replace("." if decimal_sign == "," else ",", "").replace(",", ".")
        return Decimal(digits) * scale, None
    if len(separators) > 1:
        return Decimal(re.sub("[.,]", "", digits)) * scale, None
    value = Decimal(digits.replace(",", ".")) * scale
    undecided = not grouped and not power and re.fullmatch(r"[+-]?[1-9]\d{0,2}[.,]\d{3}", digits)
    return value, Decimal(re.sub("[.,]", "", digits)) if undecided else None


def _split_power(plain: str) -> tuple[str, int]:
    plain = plain.replace("⁻", "-" if re.search(r"[x·*]", plain) else "^-").replace("⁺", "")
    found = re.search(r"(?:[eE]|\s?[x·*]\s?10\s?\^?\s?\(?)([+-]?\d+)\)?$", plain)
    if re.fullmatch(r"[+-]?10\^[+-]?\d+", plain):
        sign = "-" if plain.startswith("-") else ""
        return f"{sign}1", int(plain.partition("^")[2])
    return (plain[:found.start()], int(found[1])) if found else (plain, 0)


# --- printing ---

def significant(value: float | Decimal, digits: int) -> str:
    """The value rounded to so many significant digits, trailing zeros kept."""
    return _printed(round_significant(value, digits))


def round_significant(value: float | Decimal, digits: int) -> Decimal:
    exact = _exact(value)
    if not exact:
        return Decimal(0)
    return exact.quantize(Decimal(1).scaleb(exact.adjusted() - digits + 1), ROUND_HALF_UP).quantize(
        _step_after_carry(exact, digits), ROUND_HALF_UP)


def _step_after_carry(exact: Decimal, digits: int) -> Decimal:
    """9.9996 rounds to 10.00, not 10.000: the carry moves the last digit."""
    rounded = exact.quantize(Decimal(1).scaleb(exact.adjusted() - digits + 1), ROUND_HALF_UP)
    return Decimal(1).scaleb(rounded.adjusted() - digits + 1)


def round_decimals(value: float | Decimal, decimals: int) -> Decimal:
    """Half away from zero."""
    return _exact(value).quantize(Decimal(1).scaleb(-decimals), ROUND_HALF_UP)


def truncate_decimals(value: float | Decimal, decimals: int) -> Decimal:
    """Digits behind the last kept one are dropped."""
    return _exact(value).quantize(Decimal(1).scaleb(-decimals), ROUND_DOWN)


def with_uncertainty(value: float, expanded: float) -> tuple[str, str]:
    """U to two digits and the value to match (JCGM 100:2008, 7.2.6). U = 0: the value whole."""
    if expanded == 0:
        return format(_exact(value).normalize(), "f"), "0"
    rounded = round_significant(expanded, 2)
    return _printed(_exact(value).quantize(rounded, ROUND_HALF_UP)), _printed(rounded)


def half_last_digit(text: str) -> float:
    """Half the last digit a printed number shows."""
    return float(Decimal(1).scaleb(Decimal(_from_print(text)).as_tuple().exponent)) / 2


def _from_print(text: str) -> str:
    head, times, power = text.partition("×10")
    plain = head.translate(str.maketrans("−", "-"))
    return f"{plain}e{power.translate(_FROM_SUPERSCRIPT)}" if times else plain


def _exact(value: float | Decimal) -> Decimal:
    return value if isinstance(value, Decimal) else Decimal(repr(float(value)))


_TO_SUPERSCRIPT = str.maketrans("0123456789-", "⁰¹²³⁴⁵⁶⁷⁸⁹⁻")
_FROM_SUPERSCRIPT = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")


def _printed(rounded: Decimal) -> str:
    """Plain from 0.0001 to below a million, else with a power of ten; a true minus sign."""
    if not rounded:
        return "0"
    power = rounded.adjusted()
    if _PLAINEST <= power < _LARGEST:
        text = format(rounded, "f")
    else:
        mantissa = rounded.scaleb(-power)
        text = f"{format(mantissa, 'f')}×10{str(power).translate(_TO_SUPERSCRIPT)}"
    return text.replace("-", "−")

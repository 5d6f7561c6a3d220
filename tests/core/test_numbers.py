"""Numbers as typed, and rounding. Expected values are read off by hand; GUM clauses are named where one decides."""
from __future__ import annotations

from decimal import Decimal

import pytest

from gasbasis.errors import NotUnderstood
from gasbasis.language.numbers import (half_last_digit, read_number, round_decimals, significant, truncate_decimals,
                                       with_uncertainty)

TYPED = [
    ("8,3", "8.3"), ("8.3", "8.3"), ("8", "8"), (".5", "0.5"), (",5", "0.5"), ("0,05", "0.05"), ("-2", "-2"), ("−2", "-2"), ("–2", "-2"), ("+3", "3"),
    ("1 234,5", "1234.5"), ("1 234.5", "1234.5"), ("1\u00a0234,5", "1234.5"), ("1\u202f234,5", "1234.5"), ("1'234.5", "1234.5"), ("1’234,5", "1234.5"),
    ("1,234.5", "1234.5"), ("1.234,5", "1234.5"), ("12,345,678", "12345678"), ("12.345.678", "12345678"), ("1,234,567.8", "1234567.8"),
    ("1.2e-3", "0.0012"), ("1.2E-3", "0.0012"), ("1,2e3", "1200"), ("1e6", "1000000"), ("1·10⁻³", "0.001"), ("1×10⁻³", "0.001"), ("1x10-3", "0.001"),
    ("1 × 10^-3", "0.001"), ("2.5·10^4", "25000"), ("10^-6", "0.000001"), ("10⁻⁶", "0.000001"), ("1.5 x 10^(-3)", "0.0015"), ("0.000", "0"), ("142.0", "142.0"),
    ("1013", "1013"), ("1 013", "1013"), ("101325", "101325"), ("0.123", "0.123"), ("0,123", "0.123"), ("12.3456", "12.3456"), ("１2".replace("１", "1"), "12"),
]


@pytest.mark.parametrize(("text", "value"), TYPED)
def test_number_as_typed(text: str, value: str) -> None:
    number = read_number(text)
    assert number.decimal == Decimal(value)
    assert not number.below and number.thousands is None and number.uncertainty is None


@pytest.mark.parametrize(("text", "decimal", "thousands"), [
    ("1,234", "1.234", "1234"), ("1.234", "1.234", "1234"), ("12.345", "12.345", "12345"), ("101,325", "101.325", "101325"), ("-1,234", "-1.234", "-1234")])
def test_one_separator_and_three_digits_have_two_readings(text: str, decimal: str, thousands: str) -> None:
    number = read_number(text)
    assert (number.decimal, number.thousands) == (Decimal(decimal), Decimal(thousands))


@pytest.mark.parametrize("text", ["<0.5", "< 0.5", "<0,5", "≤ 0.5", "less than 0.5"])
def test_below_a_detection_limit(text: str) -> None:
    number = read_number(text)
    assert number.below and number.decimal == Decimal("0.5")


@pytest.mark.parametrize(("text", "amount", "relative"), [
    ("35.2 ± 1.1", "1.1", False), ("35,2 ± 1,1", "1.1", False), ("35.2 +/- 1.1", "1.1", False), ("35.2+-1.1", "1.1", False), ("50 ± 5 %", "5", True)])
def test_plus_minus(text: str, amount: str, relative: bool) -> None:
    uncertainty = read_number(text).uncertainty
    assert (uncertainty.amount, uncertainty.relative) == (Decimal(amount), relative)


@pytest.mark.parametrize("text", ["", " ", "abc", "1.2.3", "1,2,3", "--2", "1e", "±", "< ", "1 2 3", "12a", "∞"])
def test_what_is_no_number_is_refused_with_a_cure(text: str) -> None:
    with pytest.raises(NotUnderstood) as caught:
        read_number(text)
    assert caught.value.hint


@pytest.mark.parametrize(("value", "digits", "text"), [
    (8.33868, 4, "8.339"), (142, 4, "142.0"), (999.96, 4, "1000"), (9.9996, 4, "10.00"), (0.000123456, 4, "0.0001235"), (-3.14159, 4, "−3.142"), (0, 4, "0"),
    (1.2e-9, 4, "1.200×10⁻⁹"), (1234567, 4, "1.235×10⁶"), (2.5, 1, "3"), (0.15, 1, "0.2"), (2.675, 3, "2.68")])
def test_significant_digits_half_away_from_zero(value: float, digits: int, text: str) -> None:
    assert significant(value, digits) == text


@pytest.mark.parametrize(("value", "expanded", "texts"), [
    (724.2, 26.4, ("724", "26")), (8.33868, 0.4236, ("8.34", "0.42")), (1.2345, 0.0996, ("1.23", "0.10")), (123.0, 0.0, ("123", "0"))])
def test_uncertainty_to_two_digits_and_the_value_to_match(value: float, expanded: float, texts: tuple[str, str]) -> None:
    # JCGM 100:2008, 7.2.6; U = 0 prints the value whole
    assert with_uncertainty(value, expanded) == texts


def test_rounding_and_truncation_are_different_rules() -> None:
    assert str(round_decimals(0.7573, 3)) == "0.757" and str(truncate_decimals(0.7579, 3)) == "0.757"
    assert str(round_decimals(-0.5, 0)) == "-1" and str(truncate_decimals(-0.59, 1)) == "-0.5"


@pytest.mark.parametrize(("text", "half"), [("8.339", 0.0005), ("142.0", 0.05), ("1.235×10⁶", 500.0), ("1.200×10⁻⁹", 5e-13), ("−3.142", 0.0005)])
def test_half_the_last_digit_of_a_print(text: str, half: float) -> None:
    assert half_last_digit(text) == pytest.approx(half)

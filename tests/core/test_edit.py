"""Editing one piece changes the text there and nowhere else."""
from __future__ import annotations

import pytest

from gasbasis.errors import NotUnderstood
from gasbasis.language.edit import edit
from gasbasis.language.statement import read_statement


@pytest.mark.parametrize(("text", "side", "field", "to", "expected"), [
    ("NOx 142 ppm", "hold", "water", "dry", "NOx 142 ppm, dry"),
    ("NOx 142 ppm, dry", "hold", "water", "wet", "NOx 142 ppm, wet"),
    ("NOx 142 ppm, dry", "hold", "water", "", "NOx 142 ppm"),
    ("NOx 142 ppm (dry) as NO2", "hold", "water", "", "NOx 142 ppm as NO2"),
    ("NOx 142 ppmvd as NO2", "hold", "water", "wet", "NOx 142 ppmv as NO2, wet"),
    ("NOx 142 ppm at 9,2 % O2", "hold", "oxygen", "8,1 % O2", "NOx 142 ppm at 8,1 % O2"),
    ("NOx 142 ppm at 9,2 % O2", "hold", "oxygen", "", "NOx 142 ppm"),
    ("NOx: 142 ppm  (as NO2)", "hold", "value", "88 ppm", "NOx: 88 ppm  (as NO2)"),
    ("mg/m3 at 20 °C", "owe", "temperature", "25 °C", "mg/m3 at 25 °C"),
    ("mg/m3 at 20 °C", "owe", "pressure", "101.3 kPa", "mg/m3 at 20 °C, 101.3 kPa"),
    ("ppb", "owe", "parts_by", "by volume", "ppb, by volume"),
    ("", "gas", "water_content", "12 % H2O", "12 % H2O"),
    ("12 % H2O, 9 % O2 dry", "gas", "water_content", "14 % H2O", "14 % H2O, 9 % O2 dry"),
])
def test_edit(text: str, side: str, field: str, to: str, expected: str) -> None:
    assert edit(text, side, field, to) == expected


def test_an_edit_that_would_not_read_so_is_refused() -> None:
    with pytest.raises(NotUnderstood) as caught:
        edit("NOx 142 ppm", "hold", "water", "soggy")
    assert caught.value.field == "hold.water" and caught.value.hint


@pytest.mark.parametrize(("field", "to", "back"), [("water", "wet", "dry"), ("oxygen", "8 % O2", "9,2 % O2"), ("value", "1 ppm", "142 ppm"), ("reported_as", "as NO", "as NO2")])
def test_there_and_back_leaves_the_text_as_it_was(field: str, to: str, back: str) -> None:
    text = "NOx 142 ppm, dry as NO2 at 9,2 % O2"
    there = edit(text, "hold", field, to)
    assert there != text and edit(there, "hold", field, back) == text
    assert not read_statement(there, "hold")[1]

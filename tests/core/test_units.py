"""Units against factors typed by hand (NIST SP 811 and the SI Brochure, from memory; exact by definition unless noted)."""
from __future__ import annotations

import pytest

from gasbasis.errors import NotUnderstood
from gasbasis.language.units import GROUPS, unit

FACTORS = [
    ("kg/m3", "mass_concentration", 1), ("g/m3", "mass_concentration", 1e-3), ("mg/m3", "mass_concentration", 1e-6), ("ug/m3", "mass_concentration", 1e-9),
    ("ng/m3", "mass_concentration", 1e-12), ("pg/m3", "mass_concentration", 1e-15), ("mg/dm3", "mass_concentration", 1e-3), ("ng/L", "mass_concentration", 1e-9),
    ("pg/L", "mass_concentration", 1e-12), ("ng/mL", "mass_concentration", 1e-6), ("ug/cm3", "mass_concentration", 1e-3),
    ("gr/ft3", "mass_concentration", 64.79891e-6 / 0.3048**3), ("gr/100 ft3", "mass_concentration", 64.79891e-8 / 0.3048**3),
    ("lb/ft3", "mass_concentration", 0.45359237 / 0.3048**3), ("lb/million ft3", "mass_concentration", 0.45359237e-6 / 0.3048**3),
    ("ug/ft3", "mass_concentration", 1e-9 / 0.3048**3),
    ("mol/m3", "amount_concentration", 1), ("mmol/m3", "amount_concentration", 1e-3), ("umol/m3", "amount_concentration", 1e-6),
    ("%", "parts", 1e-2), ("‰", "parts", 1e-3), ("ppm", "parts", 1e-6), ("ppb", "parts", 1e-9), ("ppt", "parts", 1e-12), ("pphm", "parts", 1e-8),
    ("umol/mol", "amount_fraction", 1e-6), ("nmol/mol", "amount_fraction", 1e-9), ("mL/m3", "amount_fraction", 1e-6), ("uL/L", "amount_fraction", 1e-6),
    ("mg/kg", "mass_fraction", 1e-6), ("ug/kg", "mass_fraction", 1e-9), ("ng/g", "mass_fraction", 1e-9),
    ("Pa", "pressure", 1), ("hPa", "pressure", 100), ("kPa", "pressure", 1e3), ("MPa", "pressure", 1e6), ("mbar", "pressure", 100), ("bar", "pressure", 1e5),
    ("atm", "pressure", 101325), ("torr", "pressure", 101325 / 760), ("mmHg", "pressure", 133.322387415), ("inHg", "pressure", 3386.388640341),
    ("psi", "pressure", 6894.757293168361), ("mmH2O", "pressure", 9.80665), ("inH2O", "pressure", 249.08891), ("at", "pressure", 98066.5),
]


@pytest.mark.parametrize(("text", "kind", "factor"), FACTORS)
def test_factor(text: str, kind: str, factor: float) -> None:
    found = unit(text)
    assert found.kind == kind
    assert found.factor == pytest.approx(factor, rel=1e-12)


@pytest.mark.parametrize(("text", "typed", "kelvin"), [
    ("K", 273.15, 273.15), ("°C", 20, 293.15), ("C", -40, 233.15), ("°F", 68, 293.15), ("F", 60, 288.7055555555556), ("°F", -40, 233.15), ("°R", 520, 288.8888888888889)])
def test_temperature(text: str, typed: float, kelvin: float) -> None:
    found = unit(text)
    assert typed * found.factor + found.offset == pytest.approx(kelvin, rel=1e-13)


def test_a_temperature_difference_scales_only() -> None:
    # ±1 K = ±1 degC = ±1.8 degF
    assert unit("°C").factor == 1.0 and 1.8 * unit("°F").factor == pytest.approx(1.0, rel=1e-14)


@pytest.mark.parametrize("text", ["µg/m³", "μg/m3", "ug/m^3", "mcg/m3", "ug per m3", " µg / m³ ", "ug/m³"])
def test_many_spellings_are_one_unit_with_one_print(text: str) -> None:
    assert unit(text).text == "µg/m³" and unit(text).id == "ug/m3"


@pytest.mark.parametrize("text", ["", "xyz", "mg/", "mg/xx", "/m3", "mg/m3/h", "m3/kg/s"])
def test_an_unknown_unit_is_refused_with_examples(text: str) -> None:
    with pytest.raises(NotUnderstood) as caught:
        unit(text)
    assert "mg/m3" in caught.value.hint


@pytest.mark.parametrize("text", [text for texts in GROUPS.values() for text in texts])
def test_every_offered_unit_reads_back_from_its_print(text: str) -> None:
    found = unit(text)
    printed = unit(found.text) if "(" not in found.text else found
    assert printed.factor == pytest.approx(found.factor, rel=1e-14) and printed.kind == found.kind

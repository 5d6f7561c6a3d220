"""Three whole jobs as their users do them, at a phone's size, with invented data; the figures worked out here by hand.

A stack test, a mercury survey of a natural gas line, and the calibration of an analyser.
"""
from __future__ import annotations

import math

import pytest
from playwright.sync_api import expect

R = 8.31446261815324


def add(sheet, way: str, text: str) -> None:
    """Open "how it came about", choose a part, and type its line."""
    sheet.page.get_by_role("button", name="how it came about").click()
    sheet.page.get_by_role("button", name=way).click()
    side = sheet.focused("id").removesuffix("-text")
    sheet.line(side).fill(text)


def number(sheet) -> float:
    return float(sheet.value.inner_text().split(" ")[0].replace("−", "-"))


def test_a_stack_test(sheet):
    """NOx read wet and hot, a pitot traverse: kg/h, and mg/m3 at 11 % oxygen against the limit of the permit."""
    sheet.write(hold="NOx 125 ppm by volume, wet, as NO2", owe="kg/h",
                gas="12 % H2O, 9.2 % O2 dry, 10.1 % CO2 dry, in combustion gas, ambient O2 21 %, 182 °C, static -12 mmH2O, barometer 1008 hPa",
                limit="not more than 200 mg/m3 at 273.15 K, 101.3 kPa, dry, 11 % O2")
    expect(sheet.problems("emission")).to_have_count(0)
    add(sheet, "A rate is owed", "duct 1.8 m diameter, pitot Cp 0.84, dp 12.1, 13.0, 14.2 mmH2O")
    M = (0.320 * 9.2 + 0.440 * 10.1 + 0.280 * 80.7) * 0.88 + 18.015 * 0.12
    p = 100800 - 12 * 9.80665
    v = 0.84 * sum(math.sqrt(dp * 9.80665) for dp in (12.1, 13.0, 14.2)) / 3 * math.sqrt(2 * R * 455.15 / (p * M * 1e-3))
    rate = v * math.pi / 4 * 1.8 ** 2 * p / (R * 455.15) * 125e-6 * 46.005e-3 * 3600
    expect(sheet.value).to_contain_text("kg/h")
    assert number(sheet) == pytest.approx(rate, abs=0.005)
    expect(sheet.basis).to_contain_text("flow by pitot traverse, wet, as it flowed")
    corrected = 125e-6 * 101300 * 46.005 / (R * 273.15) / 0.88 * (21 - 11) / (21 - 9.2) * 1e3
    expect(sheet.page.locator("#verdict")).to_contain_text(f"{corrected:.1f}")
    expect(sheet.page.locator("#verdict")).to_contain_text("above")
    expect(sheet.page.locator("#working")).to_contain_text("The roots are averaged, never the pressures.")
    assert sheet.width_needed() <= 390


SURVEY = ("Hg, dry, meter 24 °C, barometer 98.2 kPa, trap A: 12.4 ± 0.6 ng (k=2), 120.1 L, trap B: 12.9 ± 0.6 ng (k=2), 118.8 L, Y 0.998")
GAS = {"methane": 0.933, "ethane": 0.026, "nitrogen": 0.031, "carbon_dioxide": 0.010}


def compression_factor(kelvin: float, pascal: float) -> float:
    """By an implementation of AGA8 that is not ours."""
    import pyaga8
    composition = pyaga8.Composition()
    for name, share in GAS.items():
        setattr(composition, name, share)
    state = pyaga8.Detail()
    state.set_composition(composition)
    state.temperature, state.pressure = kelvin, pascal / 1e3
    state.calc_density()
    state.calc_properties()
    return state.z


def test_a_mercury_survey(sheet):
    """Two paired traps on a natural gas line at 62 bar: per cubic metre at 15 °C as a real gas, then by mass and by volume, against a plant's specification."""
    sheet.write(gas="CH4 93.3, C2H6 2.6, N2 3.1, CO2 1.0, 12 °C, 62 bar absolute, real gas", owe="ug/m3 at 15 °C, 101.325 kPa, dry",
                limit="not more than 0.15 ug/m3 at 15 °C, 101.325 kPa, dry")
    add(sheet, "A collected sample", SURVEY)
    held = (12.4 / 120.1 + 12.9 / (118.8 * 0.998)) / 2                             # ng/L at the meter
    moles = 98200 / (compression_factor(297.15, 98200) * R * 297.15)                 # of gas in a cubic metre there
    s = 0.933 * 0.04452 + 0.026 * 0.0919 + 0.031 * 0.0170 + 0.010 * 0.0752           # ISO 6976, 15 °C
    per_cubic_metre = held / moles * 101325 / ((1 - s ** 2) * R * 288.15)
    expect(sheet.value).to_contain_text(f"{per_cubic_metre:.4f}")
    expect(sheet.basis).to_contain_text("real gas by AGA8 DETAIL and ISO 6976")
    expect(sheet.page.locator("#verdict")).to_contain_text("within")
    expect(sheet.page.locator("#working")).to_contain_text("The two trains agree")
    expect(sheet.line("hold")).to_be_hidden()
    M = 0.933 * 16.043 + 0.026 * 30.07 + 0.031 * 28.014 + 0.010 * 44.009
    sheet.line("owe").fill("ppb by mass, dry")
    expect(sheet.value).to_contain_text(f"{held * 1e-6 / moles / (M * 1e-3) * 1e6:.4f}")
    sheet.line("owe").fill("ppb by volume, dry")
    expect(sheet.value).to_contain_text(f"{held * 1e-6 / moles / 200.59e-3 * 1e6:.5f}")


def test_the_calibration_of_an_analyser(sheet):
    """A permeation source in a carrier flow: what the display should read in the analyser's own unit and basis."""
    sheet.write(owe="ug/m3 at 20 °C, 101.325 kPa")
    add(sheet, "A prepared gas", "permeation Hg 120 ± 3 ng/min (k=2) in 1.50 L/min nitrogen")
    expect(sheet.doubt("hold.conditions")).to_contain_text("273.15 K")             # what the controller counts at is not stated
    sheet.line("prepared").fill("permeation Hg 120 ± 3 ng/min (k=2) in 1.50 L/min at 0 °C, 101.325 kPa nitrogen")
    expect(sheet.value).to_contain_text(f"{120 / 1.50 * 273.15 / 293.15:.1f} ± {3 / 1.50 * 273.15 / 293.15:.1f}")


def test_a_part_comes_and_goes(sheet):
    """Who only restates sees none of this; a part that is taken out leaves nothing behind."""
    for side in ("sample", "prepared", "emission"):
        expect(sheet.page.locator(f"#{side}")).to_be_hidden()
    add(sheet, "A collected sample", "")
    expect(sheet.page.locator("#sample")).to_be_visible()
    expect(sheet.line("hold")).to_be_hidden()
    sheet.page.locator("#sample").get_by_role("button", name="piece by piece").click()
    sheet.page.locator('#sample .piece.add[data-field="mass"]').click()
    sheet.entry.fill("Hg 12.4 ng")
    sheet.page.get_by_role("button", name="Set").click()
    expect(sheet.line("sample")).to_have_value("Hg 12.4 ng")
    sheet.line("owe").fill("ug/m3 at 20 °C, 1 atm")
    expect(sheet.problems("sample").first).to_contain_text("volume")
    sheet.page.locator("#sample").get_by_role("button", name="Take it out").click()
    expect(sheet.page.locator("#sample")).to_be_hidden()
    expect(sheet.line("hold")).to_be_visible()
    sheet.write(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
    expect(sheet.value).to_have_text("8.339 µg/m³")


def test_parts_travel_by_link_and_stay_after_a_reload(sheet):
    sheet.write(hold="CO 30 mg/m3 at 0 °C, 101.325 kPa, dry", owe="kg/h")
    add(sheet, "A rate is owed", "flow 42000 m3/h at 0 °C, 101.325 kPa, dry")
    expect(sheet.value).to_have_text("1.260 kg/h")
    sheet.page.reload()
    sheet.ready()
    expect(sheet.line("emission")).to_have_value("flow 42000 m3/h at 0 °C, 101.325 kPa, dry")
    expect(sheet.value).to_have_text("1.260 kg/h")

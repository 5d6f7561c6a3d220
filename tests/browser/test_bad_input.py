"""Bad input: a message by its field, the page goes on, nothing typed is lost."""
from __future__ import annotations

import pytest
from playwright.sync_api import expect

GOOD = dict(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")


@pytest.mark.parametrize(("side", "sheet_text", "message"), [
    ("hold", dict(hold="CO 3 ppm foo", owe="ppb"), "'foo' is not understood"),
    ("hold", dict(hold="Xx2 3 ppm", owe="ppb"), "'Xx' is not an element"),
    ("hold", dict(hold="3 mg/m2", owe="ppb"), ""),
    ("owe", dict(hold="CO 3 ppmv", owe="mg/m3 at 0 K, 1 atm"), "absolute zero"),
    ("owe", dict(hold="CO 3 ppmv", owe="mg/m3 at 20 °C, -5 kPa"), "above zero"),
    ("gas", dict(hold="CO 3 ppmv wet", owe="ppm by volume, dry", gas="100 % H2O"), "not including, 100 %"),
    ("gas", dict(hold="CO 3 ppmv dry", owe="ppm by volume, dry, 3 % O2", gas="21 % O2 dry, ambient O2 20.9 %"), "below the ambient oxygen"),
    ("gas", dict(hold="Hg 1 ppbw", owe="ug/m3 at 20 °C, 1 atm", gas="CH4 60, N2 10"), "adds up to 70 %"),
    ("gas", dict(hold="CO 3 ppmv wet", owe="ppm by volume, dry"), "Water content is needed"),
    ("hold", dict(hold="<script>alert(1)</script> 3 ppm", owe="ppb"), "is not understood"),
])
def test_a_message_by_its_field_and_the_page_goes_on(sheet, side: str, sheet_text: dict, message: str) -> None:
    sheet.write(**sheet_text)
    if side == "gas" and not sheet_text.get("gas"):
        expect(sheet.basis).to_contain_text(message)       # nothing typed there yet: said at the figure
    else:
        expect(sheet.problems(side).first).to_contain_text(message)
    for name, text in sheet_text.items():
        assert sheet.line(name).input_value() == text
    sheet.write(**GOOD)
    expect(sheet.value).to_have_text("8.339 µg/m³")
    expect(sheet.problems(side)).to_have_count(0)


def test_the_place_that_is_not_understood_is_marked(sheet):
    sheet.write(hold="CO 3 ppm foo dry", owe="ppb")
    expect(sheet.page.locator("#hold mark")).to_have_text("foo")
    expect(sheet.line("hold")).to_have_attribute("aria-invalid", "true")


def test_an_empty_sheet_shows_no_error(sheet):
    expect(sheet.basis).to_have_text("Type what you hold and what you owe.")
    expect(sheet.page.locator(".problems li:visible")).to_have_count(0)


def test_a_huge_paste_is_refused_and_the_page_lives(sheet):
    sheet.page.evaluate("""() => { const line = document.getElementById("hold-text"); line.removeAttribute("maxlength");
        line.value = "x".repeat(10_000_000); line.dispatchEvent(new Event("input", { bubbles: true })); }""")
    expect(sheet.page.locator("#hold .problems li, #notice").first).to_contain_text("characters")
    sheet.write(**GOOD)
    expect(sheet.value).to_have_text("8.339 µg/m³")


def test_a_name_with_a_script_in_it_stays_text(sheet):
    sheet.write(hold="<img src=x onerror=alert(1)> 3 ppm", owe="ppb")
    expect(sheet.problems("hold").first).to_contain_text("<img")
    assert sheet.page.locator("main img").count() == 0

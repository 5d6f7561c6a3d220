"""States beside the main job: a core that does not start, rule-books in force, species by search, focus, print."""
from __future__ import annotations

import re

import pytest
from playwright.sync_api import expect

STACK = dict(hold="NOx 142 ppm as NO2, dry", gas="9,2 % O2 dry, ambient O2 21 %", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2")
PHONE = {"width": 390, "height": 844}


def test_a_core_that_cannot_start_says_so_and_can_be_tried_again(open_page, server):
    from browser.page import Sheet
    page = open_page(quiet=False, viewport=PHONE)          # the browser itself logs the missing file
    page.route("**/runtime/gasbasis-*.whl", lambda route: route.fulfill(status=404, body="gone"))
    sheet = Sheet(page, server).open()
    sheet.write(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
    expect(page.locator("#notice")).to_contain_text("The core could not start")
    expect(sheet.basis).to_contain_text("could not start")
    expect(sheet.line("hold")).to_have_value("Hg 1 ppb v/v")
    page.unroute("**/runtime/gasbasis-*.whl")
    page.get_by_role("button", name="Try again").click()
    expect(sheet.value).to_have_text("8.339 µg/m³")
    expect(page.locator("#notice")).to_be_hidden()


def test_without_webassembly_the_page_says_what_to_do(open_page, server):
    page = open_page(viewport=PHONE)
    page.add_init_script("delete globalThis.WebAssembly")
    page.goto(server)
    expect(page.locator("#notice")).to_contain_text("allow this site in the browser's settings")
    page.locator("#hold-text").fill("Hg 1 ppb")
    expect(page.locator("#hold-text")).to_have_value("Hg 1 ppb")


def test_a_rule_book_is_shown_in_force_and_can_be_left(sheet):
    page = sheet.write(hold="CO 50 ppmv dry").page
    page.get_by_role("button", name="by rule-book").click()
    page.get_by_label("Search rule-books").fill("waste incin")
    page.locator("#rule-books .reading").first.click()
    expect(page.locator(".in-force")).to_contain_text("check the current text")
    owed = sheet.line("owe").input_value()
    page.get_by_role("button", name="Leave it").click()
    expect(page.locator(".in-force")).to_be_hidden()
    expect(sheet.line("owe")).to_have_value(owed)
    expect(page.get_by_role("button", name="by rule-book")).to_be_focused()


def test_a_species_is_found_by_typing(sheet):
    page = sheet.write(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm").page
    sheet.piece("hold", "species").click()
    sheet.entry.fill("benz")
    page.locator(".editor").get_by_role("button", name="benzene", exact=True).click()
    expect(sheet.line("hold")).to_have_value(re.compile("benzene|C6H6", re.IGNORECASE))
    expect(sheet.piece("hold", "species")).to_be_focused()


def test_settling_moves_the_focus_nowhere_far(sheet):
    page = sheet.write(**STACK).page
    reading = sheet.doubt("hold.parts_by").locator(".reading", has_text="by volume")
    reading.focus()
    page.keyboard.press("Enter")
    expect(sheet.value).to_have_text("444.5 mg/m³")
    expect(sheet.doubt("hold.parts_by")).to_be_focused()


def test_the_editor_stands_under_its_piece(sheet):
    sheet.write(**STACK)
    sheet.piece("hold", "species").click()
    piece, form = sheet.piece("hold", "species").bounding_box(), sheet.page.locator(".editor").bounding_box()
    assert 0 <= form["y"] - (piece["y"] + piece["height"]) <= 16


@pytest.mark.parametrize(("key", "text"), [("±", "142 ± "), ("×10ⁿ", "142×10^"), ("µ", "142µ"), ("³", "142³")])
def test_own_keys_write_where_the_caret_is(sheet, key, text):
    sheet.line("hold").fill("142")
    sheet.page.locator("#keys").get_by_role("button", name=key, exact=True).click()
    expect(sheet.line("hold")).to_have_value(text)
    expect(sheet.line("hold")).to_be_focused()


def test_a_plain_sheet_prints_on_one_page(sheet):
    page = sheet.write(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm").page
    expect(page.locator("#working .work")).to_have_count(1)
    assert len(re.findall(rb"/Type\s*/Page\b", page.pdf(prefer_css_page_size=True))) == 1

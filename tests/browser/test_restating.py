"""The main job on the page: hold, owe, figure, doubts, pieces, working."""
from __future__ import annotations

import re

from playwright.sync_api import expect

STACK = dict(hold="NOx 142 ppm as NO2, dry", gas="9,2 % O2 dry, ambient O2 21 %", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2")


def test_a_figure_with_its_whole_basis_and_working(sheet):
    sheet.write(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
    expect(sheet.value).to_have_text("8.339 µg/m³")
    expect(sheet.basis).to_have_text("at 293.15 K, 1 atm, water: not stated, as held, ideal gas")
    work = sheet.page.locator("#working .work")
    expect(work).to_have_count(1)
    expect(work.locator("math").first).to_be_visible()
    expect(work).to_contain_text("CODATA")
    assert sheet.page.locator("#working mfrac").count() == 2
    expect(sheet.page.locator("#steps li")).to_have_count(1)


def test_doubts_settle_unsettle_and_the_usual(sheet):
    page = sheet.write(**STACK).page
    expect(sheet.sentence).to_have_text("depends on: parts by")
    expect(sheet.value).to_contain_text("to")
    page.get_by_role("button", name="Take the usual").click()
    expect(sheet.value).to_have_text("444.5 mg/m³")
    expect(sheet.sentence).to_be_hidden()
    expect(sheet.doubt("hold.parts_by")).to_contain_text("by volume")
    sheet.doubt("hold.parts_by").get_by_role("button", name="Un-settle").click()
    expect(sheet.sentence).to_have_text("depends on: parts by")
    page.locator("#doubts .reading", has_text="by mass").click()
    expect(sheet.doubt("hold.parts_by").locator(".settled-row")).to_contain_text("by mass")


def test_a_note_on_a_settled_doubt_stays(sheet):
    page = sheet.write(**STACK).page
    page.get_by_role("button", name="Take the usual").click()
    note = page.locator("#doubts .note input")
    note.fill("per the contract, clause 4")
    note.press("Tab")
    page.reload()
    sheet.ready()
    expect(page.locator("#doubts .note input")).to_have_value("per the contract, clause 4")


def test_a_piece_changes_the_text_and_the_text_changes_the_pieces(sheet):
    page = sheet.write(hold="NOx 142 ppmv as NO2, dry", owe="ppb by volume, dry").page
    expect(sheet.piece("hold", "water")).to_contain_text("dry")
    sheet.piece("hold", "value").click()
    sheet.entry.fill("88 ppm")
    page.get_by_role("button", name="Set").click()
    expect(sheet.line("hold")).to_have_value("NOx 88 ppm as NO2, dry")
    sheet.line("hold").fill("NOx 88 ppm as NO2, wet")
    expect(sheet.piece("hold", "water")).to_contain_text("wet")


def test_a_piece_is_added_and_taken_out(sheet):
    page = sheet.write(hold="SO2 35 mg/m3", owe="ug/m3").page
    page.get_by_role("button", name="+ more about what you hold").click()
    sheet.piece("hold", "water").click()
    page.locator(".editor").get_by_role("button", name="dry", exact=True).click()
    expect(sheet.line("hold")).to_have_value("SO2 35 mg/m3, dry")
    sheet.piece("hold", "water").click()
    page.get_by_role("button", name="Take it out of the text").click()
    expect(sheet.line("hold")).to_have_value("SO2 35 mg/m3")


def test_an_open_piece_settles_where_it_stands(sheet):
    page = sheet.write(hold="Hg 1 ppb", owe="ug/m3 at 20 °C, 1 atm").page
    sheet.piece("hold", "parts_by").click()
    page.locator(".editor .reading", has_text="by volume").click()
    expect(sheet.value).to_have_text("8.339 µg/m³")
    expect(sheet.piece("hold", "parts_by")).to_have_attribute("data-state", "settled")


def test_every_reading_on_one_line_with_its_table(sheet):
    page = sheet.write(hold="SO2 35 mg/Nm3", owe="ppm by volume").page
    page.locator("#doubts summary", has_text="as a table").click()
    readings = page.locator("#doubts .readings .reading")
    expect(page.locator("#doubts .strip circle")).to_have_count(readings.count())
    expect(page.locator("#doubts table tbody tr")).to_have_count(readings.count())


def test_the_examples_are_one_tap_away(sheet):
    page = sheet.page
    page.get_by_role("button", name=re.compile("Stack")).click()
    expect(sheet.line("hold")).to_have_value(re.compile("NOx"))
    expect(sheet.value).to_contain_text("mg/m³")
    page.get_by_role("button", name="More", exact=True).click()
    page.get_by_role("button", name="Start a new sheet").click()
    page.get_by_role("button", name=re.compile("Pipeline")).click()
    expect(sheet.value).to_contain_text("ppb")


def test_a_rule_book_is_found_by_typing_and_stays_editable(sheet):
    page = sheet.write(hold="CO 50 ppmv dry").page
    page.get_by_role("button", name="by rule-book").click()
    page.get_by_label("Search rule-books").fill("2010/75 waste incin")
    page.locator("#owe .books .reading").first.click()
    expect(sheet.line("owe")).to_have_value(re.compile(r"11 % O2"))
    sheet.line("owe").fill("ppm by volume, dry")
    expect(sheet.value).to_have_text("50.00 ppm by volume")


def sent_link(sheet) -> str:
    sheet.page.get_by_role("button", name="Pass on").click()
    link = sheet.page.get_by_label("The link", exact=True)
    expect(link).to_have_value(re.compile(r"^http\S+#\S+$"))
    return link.input_value()


def test_a_link_opens_the_same_figure(sheet, open_page, server):
    from browser.page import Sheet
    sheet.write(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
    expect(sheet.value).to_have_text("8.339 µg/m³")
    link = sent_link(sheet)
    assert len(link.partition("#")[2]) <= 120
    other = Sheet(open_page(viewport={"width": 390, "height": 844}), link).open().ready()
    expect(other.line("hold")).to_have_value("Hg 1 ppb v/v")
    expect(other.value).to_have_text("8.339 µg/m³")
    expect(other.page.locator("#figure-title")).to_contain_text("same as sent")


def test_a_cut_link_says_so_and_changes_nothing(sheet, open_page, server):
    from browser.page import Sheet
    sheet.write(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
    expect(sheet.value).to_have_text("8.339 µg/m³")
    link = sent_link(sheet)
    other = Sheet(open_page(viewport={"width": 390, "height": 844}), link[:-4]).open().ready()
    expect(other.page.locator("#notice")).to_contain_text("cut off or altered")
    expect(other.line("hold")).to_have_value("")


LIMIT = dict(hold="NOx 142 ± 5 ppmv as NO2, dry", gas="9,2 ± 0.3 % O2 dry, ambient O2 21 %", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2")


def test_uncertainty_budget_and_verdict(sheet):
    page = sheet.write(**LIMIT).page
    expect(sheet.value).to_have_text("444 ± 19 mg/m³")
    expect(page.locator("#budget tbody tr")).to_have_count(2)
    sheet.line("limit").fill("460 mg/m3")
    verdict = page.locator('#figure [data-part="verdict"]')
    expect(verdict).to_contain_text("depends on: decision rule")
    page.locator("#verdict .reading", has_text="simple acceptance").click()
    expect(verdict).to_contain_text("within the limit")
    expect(verdict).to_have_attribute("data-shape", "within")
    page.locator("#verdict .reading[aria-pressed=true]").click()
    page.locator("#verdict .reading", has_text="guarded acceptance, w = U").click()
    expect(verdict).to_contain_text("not shown within")
    expect(page.locator('#verdict [data-part="turned"]')).to_contain_text("147.0 ppm by volume")


def test_a_rule_that_needs_a_number_asks_for_it(sheet):
    page = sheet.write(**LIMIT).page
    sheet.line("limit").fill("400 mg/m3")
    page.locator("#verdict summary", has_text="need more").click()
    page.locator("#verdict .reading", has_text="subtract a percentage of the limit").click()
    number = page.locator('#verdict input[data-part="number"]')
    number.fill("20")
    number.press("Tab")
    expect(page.locator('#figure [data-part="verdict"]')).to_contain_text("within the limit")


def test_a_clause_alone_is_challenged(sheet):
    page = sheet.page
    sheet.line("limit").fill("not more than 10 ppb mercury")
    sheet.line("owe").fill("ug/m3 at 20 °C, 1 atm")
    expect(page.locator("#figure-title")).to_contain_text("What the clause could mean")
    expect(sheet.sentence).to_contain_text("parts by")
    page.locator("#doubts .reading", has_text="by volume").click()
    expect(sheet.value).to_have_text("83.39 µg/m³")


def test_the_distribution_is_drawn_and_can_be_stopped(sheet):
    page = sheet.write(**LIMIT).page
    page.get_by_role("button", name="Check by drawing").click()
    page.get_by_role("button", name="Stop").click()
    expect(sheet.value).to_have_text("444 ± 19 mg/m³")
    page.get_by_role("button", name="Check by drawing").click()
    expect(page.locator('#budget [data-part="drawn-text"]')).to_contain_text("200000 draws")
    assert page.locator("#budget .histogram rect").count() == 40

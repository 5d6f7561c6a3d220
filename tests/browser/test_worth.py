"""What the figure is worth, on the page: composition rows, named choices at the limit, doubts of the limit, a varied input."""
from __future__ import annotations

import re

from playwright.sync_api import expect


def test_a_component_is_added_row_by_row(sheet) -> None:
    sheet.write(hold="Hg 100 ppb by mass", gas="CH4 93.2, N2 4", owe="ug/m3 at 20 °C, 1 atm")
    expect(sheet.problems("gas")).to_contain_text("adds up to 97.2 %")
    sheet.line("gas").fill("CH4 93.2, N2 6.8")
    expect(sheet.page.locator("#gas .about")).to_contain_text("molar mass, dry")
    sheet.piece("gas", "matrix_gas").click()
    rows = sheet.page.locator(".components .component")
    expect(rows).to_have_count(3)
    rows.nth(1).get_by_label("share of N2 in percent").fill("4.3")
    rows.nth(2).get_by_label("component", exact=True).fill("C2H6")
    expect(rows).to_have_count(4)
    rows.nth(2).get_by_label("share of C2H6 in percent").fill("2.5")
    sheet.page.locator(".editor").get_by_role("button", name="Set", exact=True).click()
    expect(sheet.line("gas")).to_have_value("CH4 93.2, N2 4.3, C2H6 2.5")


def test_rounding_is_a_named_choice_at_the_limit(sheet) -> None:
    sheet.write(hold="SO2 200.4 mg/m3 at 20 °C, 1 atm", owe="mg/m3 at 20 °C, 1 atm", limit="200 mg/m3")
    sheet.page.locator("#verdict .reading").filter(has_text="simple acceptance").click()
    verdict = sheet.page.locator('#figure [data-part="verdict"]')
    expect(verdict).to_contain_text("above the limit")
    sheet.page.get_by_label(re.compile("For the comparison, rounding")).select_option("decimals")
    expect(verdict).to_contain_text("within the limit")
    expect(sheet.page.locator('#verdict [data-part="detail"]')).to_contain_text("raw 200.4, counted as 200.4, compared 200")


def test_a_doubt_of_the_limit_is_settled_at_the_limit(sheet) -> None:
    sheet.write(hold="H2S 9.9 ppmv", owe="mg/m3 at 20 °C, 1 atm", limit="10 ppm (15 mg/m3)")
    sheet.page.locator("#verdict .reading").filter(has_text="simple acceptance").click()
    expect(sheet.page.locator('#verdict [data-part="second"]')).to_contain_text("depends on the open doubts")
    limit = sheet.page.locator("#verdict .at-limit")
    expect(limit).to_contain_text("This decides.")
    limit.get_by_role("button", name=re.compile("by volume")).click()
    expect(sheet.page.locator('#verdict [data-part="second"]')).to_contain_text("10 ppm by volume binds")
    expect(sheet.page.locator('#figure [data-part="verdict"]')).to_contain_text("within the limit")


def test_one_input_is_varied_and_the_crossing_named(sheet) -> None:
    sheet.write(hold="CO 100 ppmv dry", gas="O2 9 % dry, ambient O2 21 %", owe="ppm by volume, dry, 11 % O2", limit="100 ppmv")
    sheet.page.locator("#vary summary").first.click()
    sheet.page.locator("#vary select").select_option("gas.oxygen")
    sheet.page.get_by_label("from", exact=True).fill("14")
    sheet.page.get_by_label("to", exact=True).fill("2")
    sheet.page.get_by_role("button", name="Draw the curve").click()
    expect(sheet.page.locator("#vary .problem")).to_contain_text("lower end first")
    sheet.page.get_by_label("from", exact=True).fill("2")
    sheet.page.get_by_label("to", exact=True).fill("14")
    sheet.page.get_by_role("button", name="Draw the curve").click()
    expect(sheet.page.locator('#vary [data-part="words"]')).to_contain_text("crossed at 11.00 %")       # 100 (21 - 11)/(21 - O2) = 100
    expect(sheet.page.locator("#vary svg circle")).to_have_count(1)
    sheet.page.get_by_text("The curve as a table").click()
    expect(sheet.page.locator("#vary tbody tr").first).to_contain_text("52.63")                          # 1000/19
    sheet.line("hold").fill("CO 50 ppmv dry")
    expect(sheet.page.locator("#vary svg")).to_be_hidden()


def test_both_orders_of_averaging_are_in_view(sheet) -> None:
    sheet.write(hold="CO 100; 20 ppmv dry", gas="O2 5; 17 % dry, ambient O2 21 %", owe="ppm by volume, dry, 11 % O2")
    expect(sheet.value).to_contain_text("56.25 to 60.00")
    sheet.doubt("hold.averaging_order").get_by_role("button", name=re.compile("each is corrected")).click()
    expect(sheet.value).to_contain_text("56 ± 87")
    expect(sheet.basis).to_contain_text("mean of 2 corrected readings")

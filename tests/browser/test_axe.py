"""axe-core on every state of the page, with no violation; sizes, targets and contrast of the panels; help; keys alone; the media a person may have set.

axe-core is evaluated as source: the page's policy lets no script tag in.
"""
from __future__ import annotations

import json
import re
from pathlib import Path

import pytest
from playwright.sync_api import expect

from browser.page import Sheet
from browser.test_kept import FILL, HG, panel
from browser.test_passing_on import LIMIT

AXE = Path(__file__).resolve().parents[2] / ".build" / "node" / "node_modules" / "axe-core" / "axe.min.js"
RUN = """() => axe.run(document, { resultTypes: ["violations"], runOnly: ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa", "best-practice"] })
  .then((found) => found.violations.map((one) => [one.id, one.help, ...one.nodes.slice(0, 3).map((node) => node.html.slice(0, 140))]))"""
PHONE, DESK = {"width": 390, "height": 844}, {"width": 1280, "height": 800}
OPEN = dict(hold="NOx 142 ppm as NO2 at 9,2 % O2", gas="14 % H2O", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 11 % O2")
WRONG = dict(hold="NOx 142 ppm foo", gas="CH4 60 %, N2 10 %", owe="mg/m3 at 0 K, 1 atm")


def start(open_page, server, **options) -> Sheet:
    sheet = Sheet(open_page(**{"viewport": PHONE, **options}), server).open().ready()
    sheet.page.evaluate(AXE.read_text("utf-8"))
    return sheet


def rested(sheet: Sheet) -> None:
    expect(sheet.page.locator("#figure")).to_have_attribute("data-busy", "false")
    sheet.page.evaluate("() => Promise.all(document.getAnimations().map((one) => one.finished))")


def clean(sheet: Sheet, state: str) -> None:
    rested(sheet)
    assert sheet.page.evaluate(RUN) == [], state
    width = sheet.page.viewport_size["width"]
    assert sheet.width_needed() <= width, (state, sheet.width_needed())
    small = sheet.page.evaluate("""() => [...document.querySelectorAll("button, input, textarea, summary, a.plain, select")]
        .filter((node) => node.checkVisibility() && (node.closest(".tick") ?? node).getBoundingClientRect().height < 47.5).map((node) => node.outerHTML.slice(0, 90))""")
    assert small == [], state


def states_of_the_sheet(sheet: Sheet):
    page = sheet.page
    yield "empty"
    sheet.write(**OPEN)
    expect(sheet.sentence).to_be_visible()
    yield "doubts open"
    for part in ("hold", "doubts"):
        page.locator(f"#{part} .asks").click()
    expect(page.locator("#hold-help")).to_contain_text("as it stands on the certificate")
    yield "help"
    sheet.piece("hold", "parts_by").click()
    yield "editor of a doubt"
    page.keyboard.press("Escape")
    page.locator('#gas [data-part="more"]').click()
    page.locator("#gas .piece.add").first.click()
    yield "editor of an addition"
    page.keyboard.press("Escape")
    page.locator('#doubts [data-part="strip-title"]').click()
    yield "table of readings"
    page.get_by_role("button", name="by rule-book").click()
    yield "rule-books"
    page.keyboard.press("Escape")
    sheet.write(**WRONG)
    expect(page.locator("#hold .problems li")).to_be_visible()
    yield "problems"
    sheet.write(**LIMIT)
    expect(sheet.value).to_have_text("444 ± 19 mg/m³")
    yield "figure, verdict, budget, working"
    page.get_by_role("button", name="More", exact=True).click()
    yield "more"
    page.get_by_role("button", name="More", exact=True).click()


def states_of_the_panels(sheet: Sheet):
    page = sheet.page
    sheet.write(**LIMIT)
    expect(sheet.value).to_have_text("444 ± 19 mg/m³")
    page.get_by_role("button", name="Pass on").click()
    expect(page.locator("#pass-on .qr")).to_be_visible()
    link = page.get_by_label("The link", exact=True).input_value()
    yield "pass on"
    page.locator("#pass-on .asks").click()
    kept = panel(sheet, "Kept sheets")
    expect(kept).to_contain_text("Nothing is kept yet")
    yield "nothing kept"
    page.evaluate(FILL, 40)
    kept.get_by_role("button", name="Keep this sheet").click()
    expect(kept.locator(".rows > li")).to_have_count(30)
    kept.get_by_role("button", name="More about").first.click()
    yield "kept sheets"
    kept.get_by_role("button", name="Delete").click()
    expect(page.locator("#aside")).to_contain_text("is deleted")
    yield "deleted"
    record = panel(sheet, "Record")
    yield "record asked for"
    record.get_by_role("button", name="Make the record").click()
    expect(record.locator(".paper")).to_contain_text("sha256:")
    yield "record"
    box = panel(sheet, "Open a link or file")
    box.locator("textarea").fill("NOx 142 ppm")
    box.get_by_role("button", name="Open it").click()
    expect(box.locator(".problem")).to_be_visible()
    yield "nothing of ours"
    sheet.line("hold").fill("NOx 142 ± 5 ppmv as NO, dry")
    expect(sheet.value).to_have_text("290 ± 13 mg/m³")
    compare = panel(sheet, "Compare")
    compare.locator("textarea").fill(link)
    compare.get_by_role("button", name="Compare", exact=True).click()
    expect(compare.locator(".differences > li")).to_have_count(1)
    yield "compared"


@pytest.mark.parametrize(("viewport", "scheme"), [(PHONE, "light"), (DESK, "dark")], ids=["phone, light", "desk, dark"])
@pytest.mark.parametrize("states", [states_of_the_sheet, states_of_the_panels], ids=["sheet", "panels"])
def test_every_state_is_free_of_violations(open_page, server, states, viewport, scheme):
    sheet = start(open_page, server, viewport=viewport, color_scheme=scheme)
    for state in states(sheet):
        clean(sheet, state)


POOR = """() => {
  const channel = (c) => (c /= 255) <= 0.03928 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  const light = ([r, g, b]) => 0.2126 * channel(r) + 0.7152 * channel(g) + 0.0722 * channel(b);
  const parse = (text) => text.match(/[\\d.]+/g).map(Number);
  const behind = (node) => { for (let at = node; at; at = at.parentElement) { const c = parse(getComputedStyle(at).backgroundColor); if (c.length < 4 || c[3] > 0) return c; } return [255, 255, 255]; };
  return [...document.querySelectorAll("body *")].filter((node) => node.checkVisibility() && [...node.childNodes].some((child) => child.nodeType === 3 && child.textContent.trim()))
    .map((node) => { const a = light(parse(getComputedStyle(node).color)), b = light(behind(node)); return [(Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05), node.outerHTML.slice(0, 80)]; })
    .filter(([ratio]) => ratio < 7);
}"""


def test_panels_are_readable_in_every_theme_at_every_size(open_page, server):
    """Contrast 7:1 (WCAG 2.2, 1.4.6) in light, dark and sunlight; 320 px and 200 % text reflow (1.4.10, 1.4.4); landscape."""
    sheet = start(open_page, server)
    for state in states_of_the_panels(sheet):
        rested(sheet)
        for theme in ("light", "dark", "sun"):
            sheet.page.evaluate("(theme) => { document.documentElement.dataset.theme = theme; }", theme)
            rested(sheet)
            assert sheet.page.evaluate(POOR) == [], (state, theme)
        for width, height, size in ((320, 640, "100%"), (844, 390, "100%"), (390, 844, "200%")):
            sheet.page.set_viewport_size({"width": width, "height": height})
            sheet.page.evaluate("(size) => document.documentElement.style.setProperty('font-size', size)", size)
            assert sheet.width_needed() <= width, (state, width, size)
        sheet.page.evaluate("document.documentElement.style.removeProperty('font-size')")
        sheet.page.set_viewport_size(PHONE)


def test_forced_colours_and_reduced_motion(open_page, server):
    sheet = start(open_page, server, forced_colors="active", reduced_motion="reduce")
    page = sheet.write(**LIMIT).page
    expect(sheet.value).to_have_text("444 ± 19 mg/m³")
    assert page.evaluate("getComputedStyle(document.documentElement).scrollBehavior") == "auto"
    page.get_by_role("button", name="Pass on").click()
    expect(page.locator("#pass-on .qr")).to_be_visible()
    fills = page.evaluate("() => ['rect', 'path'].map((name) => getComputedStyle(document.querySelector(`#pass-on .qr ${name}`)).fill)")
    assert fills == ["rgb(255, 255, 255)", "rgb(0, 0, 0)"]
    borders = page.evaluate("""() => [...document.querySelectorAll("#pass-on button, #pass-on input")].filter((node) => node.checkVisibility() && !node.matches(".bare, .asks, [type=checkbox]"))
        .map((node) => getComputedStyle(node).borderTopStyle)""")
    assert borders and set(borders) == {"solid"}


def test_the_tools_by_keyboard_alone(sheet):
    """Keep, record, close: in with Enter, out with Escape, the focus where it was looked for."""
    page, keyboard = sheet.write(**HG).page, sheet.page.keyboard
    expect(sheet.value).to_have_text("8.339 µg/m³")
    page.locator('.top [data-action="more"]').focus()
    keyboard.press("Enter")
    sheet.tab_to("at.dataset.panel === 'kept'")
    keyboard.press("Enter")
    assert sheet.focused("id") == "kept"
    sheet.tab_to("at.dataset.part === 'name'")
    keyboard.type("By hand")
    keyboard.press("Enter")
    expect(page.locator("#kept .rows > li")).to_have_count(1)
    keyboard.press("Escape")
    expect(page.locator("#kept")).to_be_hidden()
    assert page.evaluate("document.activeElement.dataset.action") == "more"
    keyboard.press("Enter")
    sheet.tab_to("at.dataset.panel === 'record'")
    keyboard.press("Space")
    sheet.tab_to("at.type === 'submit'")
    keyboard.press("Enter")
    expect(page.locator("#record .paper")).to_contain_text("sha256:")
    sheet.tab_to("at.dataset.action === 'amend'")
    keyboard.press("Escape")
    expect(page.locator("#record")).to_be_hidden()


def test_every_part_has_its_words(sheet):
    page = sheet.write(**LIMIT).page
    expect(sheet.value).to_have_text("444 ± 19 mg/m³")
    for asks in page.locator("main .asks:visible").all():
        words = page.locator(f"#{asks.get_attribute('aria-controls')}")
        expect(words).to_be_hidden()
        asks.click()
        expect(words).to_be_visible()
        assert len(words.inner_text()) > 40 and asks.get_attribute("aria-expanded") == "true"
        asks.click()
    assert page.locator("main .asks:visible").count() >= 6
    assert len(re.findall(r"no clearance to enter", page.locator("body").inner_text())) == 1        # the cautions, once

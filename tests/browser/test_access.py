"""Phone and desk: sizes, keyboard alone, big text, before the core is up, a reload."""
from __future__ import annotations

import pytest
from playwright.sync_api import expect

STACK = dict(hold="NOx 142 ppm as NO2 at 9,2 % O2", gas="14 % H2O", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 11 % O2")


@pytest.mark.parametrize("size", [(390, 844), (320, 640), (1280, 800), (844, 390)])
@pytest.mark.parametrize("text", [STACK, dict(hold="CO 3 ppm foo", owe="mg/m3", gas="CH4 60, N2 10"), dict(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")],
                         ids=["doubts", "problems", "figure"])
def test_nothing_runs_over_the_edge(open_page, server, size, text):
    from browser.page import Sheet
    width, height = size
    sheet = Sheet(open_page(viewport={"width": width, "height": height}), server).open().ready().write(**text)
    expect(sheet.piece("hold", "value")).to_be_visible()
    assert sheet.width_needed() <= width


def test_the_figure_takes_no_more_than_a_quarter(sheet):
    sheet.write(**STACK)
    expect(sheet.sentence).to_be_visible()
    box = sheet.page.locator("#figure").bounding_box()
    assert box["height"] <= 0.25 * 844 + 1
    assert box["y"] + box["height"] == pytest.approx(844, abs=1)


def test_big_text_still_fits(open_page, server):
    from browser.page import Sheet
    sheet = Sheet(open_page(viewport={"width": 390, "height": 844}), server).open().ready().write(**STACK)
    sheet.page.evaluate("document.documentElement.style.setProperty('font-size', '200%')")
    expect(sheet.sentence).to_be_visible()
    assert sheet.width_needed() <= 390


def test_targets_are_large_enough_for_gloves(sheet):
    sheet.write(**STACK)
    expect(sheet.sentence).to_be_visible()
    small = sheet.page.evaluate("""() => [...document.querySelectorAll("button, input, textarea, summary, a.plain, select")]
        .filter((node) => node.checkVisibility() && node.getBoundingClientRect().height < 47.5).map((node) => node.outerHTML.slice(0, 80))""")
    assert small == []


def test_the_whole_job_by_keyboard(sheet):
    """Hold, gas, owe, a piece corrected, a doubt settled, the working reached: no pointer is used."""
    page, keyboard = sheet.page, sheet.page.keyboard
    sheet.tab_to("at.id === 'hold-text'")
    keyboard.type("NOx 142 ppm as NO2, dry")
    keyboard.press("Enter")                                # on to the next line
    assert sheet.focused("id") == "gas-text"
    keyboard.type("9,2 % O2 dry, ambient O2 21 %")
    sheet.tab_to("at.id === 'owe-text'")
    keyboard.type("mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2")
    expect(sheet.sentence).to_have_text("depends on: parts by")
    sheet.tab_to("at.dataset.action === 'usual'")
    keyboard.press("Enter")
    expect(sheet.value).to_have_text("444.5 mg/m³")
    assert sheet.focused("id") == "figure"                 # the button is gone, its place is not lost
    sheet.tab_to("at.dataset.action === 'unsettle'")
    keyboard.press("Space")
    expect(sheet.sentence).to_have_text("depends on: parts by")
    sheet.tab_to("at.matches('#doubts .reading') && at.textContent.startsWith('by volume')")
    keyboard.press("Enter")
    expect(sheet.value).to_have_text("444.5 mg/m³")
    assert page.evaluate("document.activeElement.closest('#doubts') !== null")
    page.keyboard.press("Shift+Tab")
    page.locator("#hold-text").focus()
    sheet.tab_to("at.dataset.field === 'value'")
    keyboard.press("Enter")
    expect(sheet.entry).to_be_focused()
    keyboard.press("ControlOrMeta+a")
    keyboard.type("71 ppm")
    keyboard.press("Enter")
    expect(sheet.line("hold")).to_have_value("NOx 71 ppm as NO2, dry")
    expect(sheet.value).to_have_text("222.2 mg/m³")
    expect(sheet.piece("hold", "value")).to_be_focused()


def test_escape_closes_the_editor_and_gives_focus_back(sheet):
    sheet.write(**STACK)
    sheet.piece("hold", "value").click()
    expect(sheet.entry).to_be_focused()
    sheet.page.keyboard.press("Escape")
    expect(sheet.page.locator(".editor")).to_have_count(0)
    expect(sheet.piece("hold", "value")).to_be_focused()


def test_focus_stays_while_the_answer_comes(sheet):
    sheet.line("hold").press_sequentially("CO 12 ppm dry")
    sheet.line("owe").press_sequentially("ppb dry")
    expect(sheet.value).to_have_text("12000 ppb")
    expect(sheet.line("owe")).to_be_focused()


def test_fields_take_input_before_the_core_is_up(open_page, server):
    from browser.page import Sheet
    page = open_page(viewport={"width": 390, "height": 844})
    held, holding = [], [True]
    page.route("**/runtime/*.whl", lambda route: held.append(route) if holding[0] else route.continue_())
    sheet = Sheet(page, server).open()
    sheet.write(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
    expect(page.locator("#status")).not_to_contain_text("version")
    page.wait_for_timeout(300)
    holding[0] = False
    for route in held:
        route.continue_()
    expect(sheet.value).to_have_text("8.339 µg/m³")


def test_a_reload_loses_nothing(sheet):
    sheet.write(**STACK)
    expect(sheet.sentence).to_be_visible()
    sheet.page.reload()
    sheet.ready()
    for side, text in STACK.items():
        expect(sheet.line(side)).to_have_value(text)
    expect(sheet.sentence).to_be_visible()


def test_the_figure_is_told_once_it_rests(sheet):
    spoken = sheet.page.locator("#spoken")
    sheet.write(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
    expect(spoken).to_contain_text("8.339 µg/m³")
    expect(spoken).to_have_attribute("aria-live", "polite")


@pytest.mark.parametrize("theme", ["light", "dark", "sun"])
def test_contrast_of_every_text_is_seven_to_one(sheet, theme):
    sheet.write(**STACK)
    page = sheet.page
    expect(sheet.sentence).to_be_visible()
    page.evaluate("(theme) => { document.documentElement.dataset.theme = theme; }", theme)
    poor = page.evaluate("""() => {
      const channel = (c) => (c /= 255) <= 0.03928 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
      const light = ([r, g, b]) => 0.2126 * channel(r) + 0.7152 * channel(g) + 0.0722 * channel(b);
      const parse = (text) => text.match(/[\\d.]+/g).map(Number);
      const behind = (node) => { for (let at = node; at; at = at.parentElement) { const c = parse(getComputedStyle(at).backgroundColor);
        if (c.length < 4 || c[3] > 0) return c; } return [255, 255, 255]; };
      return [...document.querySelectorAll("main *, header *")].filter((node) => node.checkVisibility() && [...node.childNodes].some((child) => child.nodeType === 3 && child.textContent.trim()))
        .map((node) => { const a = light(parse(getComputedStyle(node).color)), b = light(behind(node));
          return [(Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05), node.outerHTML.slice(0, 60)]; }).filter(([ratio]) => ratio < 7);
    }""")
    assert poor == []

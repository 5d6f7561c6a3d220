"""The one-file edition, opened from the file system: no server, no request, the same answers as the served page."""
from __future__ import annotations

import pytest
from playwright.sync_api import expect

from browser.page import Sheet

STACK = dict(hold="NOx 142 ± 5 ppmv dry (k=2) as NO2", gas="9,2 % O2 dry, ambient O2 21 %", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2", limit="450 mg/m3")
PHONE = {"width": 390, "height": 844}
MOST_BYTES = 10_000_000


@pytest.fixture(scope="module")
def address(dist) -> str:
    file = dist / "gasbasis-one-file.html"
    assert file.stat().st_size <= MOST_BYTES
    return file.as_uri()


def answers(sheet: Sheet) -> list[str]:
    expect(sheet.value).to_contain_text("±")
    return [sheet.value.inner_text(), sheet.basis.inner_text(), *sheet.page.locator("#working .result").all_inner_texts(),
            *sheet.page.locator("#budget tbody td").all_inner_texts()]


def test_it_answers_as_the_served_page_does_and_asks_nobody(open_page, address, server):
    asked = []
    page = open_page(viewport=PHONE)
    page.on("request", lambda request: asked.append(request.url))
    alone = Sheet(page, address).open().ready().write(**STACK)
    served = Sheet(open_page(viewport=PHONE), server).open().ready().write(**STACK)
    assert answers(alone) == answers(served)
    assert [url for url in asked if not url.startswith((address, "blob:", "data:"))] == []
    expect(page.locator("#status")).to_contain_text("ready offline")


def test_a_code_opens_in_it_and_the_examples_are_there(open_page, address, server):
    sheet = Sheet(open_page(viewport=PHONE), server).open().ready().write(**STACK)
    code = sheet.page.evaluate("""async (sheet) => { const client = await import(new URL("js/core-client.js", document.baseURI).href);
        return (await client.createCore().ask({ task: "link", sheet: { schema: 1, ...sheet }, figure: "" })).code; }""", STACK)
    opened = Sheet(open_page(viewport=PHONE), f"{address}#{code}").open().ready()
    expect(opened.line("hold")).to_have_value(STACK["hold"])
    expect(opened.value).to_contain_text("±")
    fresh = Sheet(open_page(viewport=PHONE), address).open().ready()
    fresh.page.get_by_role("button", name="Pipeline").first.click()
    expect(fresh.value).to_contain_text("ppb")


def test_what_it_bundles_keeps_its_licences(open_page, address):
    page = Sheet(open_page(), address).open().page
    page.get_by_text("Licences of what is bundled").click()
    expect(page.locator(".licences pre")).to_contain_text("Mozilla Public License")

"""Kept sheets: named, found, duplicated, deleted with undo, as a file and back, in two tabs, with storage that refuses; nothing typed is lost."""
from __future__ import annotations

import json
import re

import pytest
from playwright.sync_api import expect

from browser.page import Sheet

PHONE = {"width": 390, "height": 844}
HG = dict(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
CO = dict(hold="CO 50 ppmv", owe="mg/m3 at 25 °C, 1 atm")
FILL = """async (count) => {
  const open = indexedDB.open("gasbasis", 1);
  const database = await new Promise((done) => { open.onsuccess = () => done(open.result); });
  const change = database.transaction("sheets", "readwrite"), sheets = change.objectStore("sheets");
  for (let n = 0; n < count; n++) sheets.add({ id: `row ${n}`, version: 1, figure: `NOx ${n} mg/m³`, created: "2026-01-01T00:00:00Z", changed: new Date(Date.UTC(2026, 0, 1) + n * 60000).toISOString(),
    sheet: { hold: `NOx ${n} ppmv as NO2, dry`, gas: "", owe: "mg/m3 at 273.15 K, 101.3 kPa, dry", limit: "", rule_book: "", title: `Stack ${n % 7}, run ${n}`, settled: {}, notes: {} } });
  await new Promise((done) => { change.oncomplete = done; });
  database.close();
}"""


def panel(sheet, name: str):
    sheet.page.get_by_role("button", name="More", exact=True).click()
    sheet.page.locator("#more").get_by_role("button", name=name).click()
    return sheet.page.locator(".panel:visible")


def keep(sheet, name: str = ""):
    kept = panel(sheet, "Kept sheets")
    kept.get_by_label("Name of this sheet").fill(name)
    kept.get_by_role("button", name="Keep this sheet").click()
    expect(sheet.page.locator("#aside")).to_contain_text("Kept as")
    return kept


def rows(sheet):
    return sheet.page.locator("#kept .rows > li")


def row_action(sheet, which: int, action: str) -> None:
    row = rows(sheet).nth(which)
    row.get_by_role("button", name="More about").click()
    row.get_by_role("button", name=action, exact=True).click()


def test_a_sheet_is_kept_changed_and_found_again(sheet):
    sheet.write(**HG)
    expect(sheet.value).to_have_text("8.339 µg/m³")
    kept = keep(sheet, "Pipeline, point 4")
    expect(rows(sheet)).to_have_count(1)
    expect(rows(sheet).first).to_contain_text("8.339 µg/m³")
    expect(kept.get_by_text("Kept as it is.")).to_be_visible()
    sheet.line("hold").fill("Hg 2 ppb v/v")
    expect(sheet.value).to_have_text("16.68 µg/m³")
    kept.get_by_role("button", name="Keep the changes").click()
    expect(rows(sheet).first).to_contain_text("16.68 µg/m³")
    sheet.page.reload()
    sheet.ready()
    panel(sheet, "Kept sheets")
    expect(rows(sheet)).to_have_count(1)
    expect(rows(sheet).first).to_contain_text("Pipeline, point 4")
    expect(kept.get_by_text("Kept as it is.")).to_be_visible()


def test_duplicate_delete_and_undo(sheet):
    sheet.write(**HG)
    expect(sheet.value).to_have_text("8.339 µg/m³")
    keep(sheet, "One")
    row_action(sheet, 0, "Duplicate")
    expect(rows(sheet)).to_have_count(2)
    expect(rows(sheet).first).to_contain_text("One (copy)")
    row_action(sheet, 0, "Delete")
    expect(rows(sheet)).to_have_count(1)
    sheet.page.locator("#aside").get_by_role("button", name="Undo").click()
    expect(rows(sheet)).to_have_count(2)
    expect(sheet.page.locator("#aside")).to_contain_text("is back")


def test_opening_another_keeps_what_was_being_done(sheet):
    sheet.write(**HG)
    expect(sheet.value).to_have_text("8.339 µg/m³")
    keep(sheet, "One")
    sheet.write(**CO)
    expect(sheet.value).to_contain_text("57.2")
    rows(sheet).first.locator(".row-opens").click()
    expect(sheet.line("hold")).to_have_value("Hg 1 ppb v/v")
    expect(sheet.page.locator("#aside")).to_contain_text("What was on the page is kept: “One (as left)”")
    sheet.page.locator("#aside").get_by_role("button", name="Back to it").click()
    expect(sheet.line("hold")).to_have_value("CO 50 ppmv")
    panel(sheet, "Kept sheets")
    expect(rows(sheet)).to_have_count(2)                    # the one kept, and what was left once: not again on the way back


def test_a_link_opened_over_unfinished_work_keeps_it_first(sheet):
    sheet.write(**HG)
    expect(sheet.value).to_have_text("8.339 µg/m³")
    sheet.page.get_by_role("button", name="Pass on").click()
    expect(sheet.page.locator("#pass-on .qr")).to_be_visible()
    link = sheet.page.get_by_label("The link", exact=True).input_value()
    sheet.write(**CO)
    expect(sheet.value).to_contain_text("57.2")
    sheet.page.evaluate("(link) => { location.hash = new URL(link).hash; }", link)       # the same tab, only the part behind # changes
    expect(sheet.line("hold")).to_have_value("Hg 1 ppb v/v")
    expect(sheet.page.locator("#figure-title")).to_contain_text("same as sent")
    expect(sheet.page.locator("#aside")).to_contain_text("CO 57.2")
    panel(sheet, "Kept sheets")
    expect(rows(sheet)).to_have_count(1)
    rows(sheet).first.locator(".row-opens").click()
    expect(sheet.line("hold")).to_have_value("CO 50 ppmv")


def test_a_thousand_stay_quick(sheet):
    page = sheet.page
    panel(sheet, "Kept sheets")
    expect(page.locator("#kept")).to_contain_text("Nothing is kept yet")
    page.evaluate(FILL, 1000)
    page.locator("#kept").get_by_role("button", name="Close").click()
    elapsed = page.evaluate("""async () => { const times = [];
        for (let n = 0; n < 3; n++) {                       // the least of three: the machine may be busy
          document.querySelector("#kept .rows").replaceChildren();
          const begun = performance.now();
          document.querySelector('[data-panel="kept"]').click();
          while (document.querySelectorAll("#kept .rows > li").length < 30) await new Promise(requestAnimationFrame);
          times.push(performance.now() - begun);
          document.querySelector('#kept [data-action="close"]').click();
        }
        document.querySelector('[data-panel="kept"]').click();
        return Math.min(...times); }""")
    assert elapsed < 500, elapsed
    expect(page.locator("#kept")).to_contain_text("1000 kept on this device")
    typed = page.evaluate("""() => Math.min(...["stack 3", "run 5", "run 77"].map((text) => { const find = document.querySelector('#kept [data-part="search"]'), begun = performance.now();
        find.value = text; find.dispatchEvent(new Event("input", { bubbles: true })); return performance.now() - begun; }))""")
    assert typed < 100, typed
    expect(page.locator("#kept")).to_contain_text("of 1000 kept on this device")
    found = rows(sheet).locator("b").all_inner_texts()
    assert found and all("run" in text and "77" in text for text in found)
    page.get_by_label("Find").fill("run 777")
    expect(rows(sheet)).to_have_count(1)


def test_all_as_one_file_and_back(open_page, server, tmp_path):
    sheet = Sheet(open_page(viewport={"width": 1280, "height": 800}), server).open().ready().write(**HG)
    expect(sheet.value).to_have_text("8.339 µg/m³")
    kept = keep(sheet, "One")
    row_action(sheet, 0, "Duplicate")
    expect(rows(sheet)).to_have_count(2)
    with sheet.page.expect_download() as waiting:
        kept.get_by_role("button", name="Save all as one file").click()
    file = tmp_path / waiting.value.suggested_filename
    waiting.value.save_as(file)
    assert [row["sheet"]["title"] for row in json.loads(file.read_text("utf-8"))["sheets"]] == ["One (copy)", "One"]
    data = json.loads(file.read_text("utf-8"))
    data["sheets"].append({"sheet": {"hold": 3}, "figure": ""})
    file.write_text(json.dumps(data), "utf-8")
    other = Sheet(open_page(viewport={"width": 1280, "height": 800}), server).open().ready()
    panel(other, "Open a link or file").locator('input[type="file"]').set_input_files(file)
    expect(other.page.locator("#aside")).to_contain_text("2 sheets taken in; 1 could not be read")
    expect(rows(other)).to_have_count(2)
    panel(other, "Open a link or file").locator('input[type="file"]').set_input_files(file)
    expect(other.page.locator("#aside")).to_contain_text("0 sheets taken in; 2 were kept here already")
    expect(rows(other)).to_have_count(2)


def test_two_tabs_lose_no_write(open_page, server):
    one = Sheet(open_page(viewport=PHONE), server).open().ready().write(**HG)
    expect(one.value).to_have_text("8.339 µg/m³")
    keep(one, "Shared")
    two = Sheet(one.page.context.new_page(), server).open().ready()
    two_kept = panel(two, "Kept sheets")
    rows(two).first.locator(".row-opens").click()
    panel(two, "Kept sheets")
    two.line("hold").fill("Hg 2 ppb v/v")
    expect(two.value).to_have_text("16.68 µg/m³")
    two_kept.get_by_role("button", name="Keep the changes").click()
    expect(two.page.locator("#aside")).to_contain_text("Kept as")
    expect(rows(one).first).to_contain_text("16.68 µg/m³")              # the other tab hears of it
    one.line("hold").fill("Hg 3 ppb v/v")
    expect(one.value).to_have_text("25.02 µg/m³")
    one.page.get_by_role("button", name="Keep the changes").click()
    expect(one.page.locator("#aside")).to_contain_text("changed or deleted in another tab")
    expect(rows(one)).to_have_count(2)
    assert sorted(re.search(r"[\d.]+ µg", text).group() for text in rows(one).all_inner_texts()) == ["16.68 µg", "25.02 µg"]
    expect(rows(two)).to_have_count(2)


def test_each_tab_comes_back_to_its_own_work(open_page, server):
    one = Sheet(open_page(viewport=PHONE), server).open().ready().write(**HG)
    two = Sheet(one.page.context.new_page(), server).open().ready().write(**CO)
    expect(two.value).to_contain_text("57.2")
    one.page.reload()
    expect(one.line("hold")).to_have_value("Hg 1 ppb v/v")


@pytest.mark.parametrize(("broken", "said"), [
    ("IDBObjectStore.prototype.add = () => { throw new DOMException('full', 'QuotaExceededError'); }", "storage of this device is full"),
    ("Storage.prototype.setItem = () => { throw new DOMException('full', 'QuotaExceededError'); }; IDBFactory.prototype.open = () => { throw new DOMException('no', 'SecurityError'); }", "does not let the page keep sheets"),
], ids=["full", "switched off"])
def test_storage_that_refuses_is_said_and_nothing_typed_is_lost(open_page, server, broken, said):
    page = open_page(viewport=PHONE)
    page.add_init_script(broken)
    sheet = Sheet(page, server).open().ready().write(**HG)
    expect(sheet.value).to_have_text("8.339 µg/m³")
    kept = panel(sheet, "Kept sheets")
    kept.get_by_role("button", name="Keep this sheet").click()
    expect(page.locator("#aside")).to_contain_text(said)
    expect(sheet.line("hold")).to_have_value("Hg 1 ppb v/v")
    page.get_by_role("button", name="More", exact=True).click()
    page.get_by_role("button", name="Start a new sheet").click()
    expect(page.locator("#aside")).to_contain_text("was not kept")
    page.locator("#aside").get_by_role("button", name="Back to it").click()
    expect(sheet.line("hold")).to_have_value("Hg 1 ppb v/v")
    expect(sheet.value).to_have_text("8.339 µg/m³")

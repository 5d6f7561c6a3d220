"""Passing on and taking in: link, QR code, share sheet, files, the paste box; records and comparing."""
from __future__ import annotations

import json
import re

from playwright.sync_api import expect

from browser.page import Sheet
from browser.test_kept import HG, panel

PHONE = {"width": 390, "height": 844}
LIMIT = dict(hold="NOx 142 ± 5 ppmv as NO2, dry", gas="9,2 ± 0.3 % O2 dry, ambient O2 21 %", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2", limit="460 mg/m3")
SHARING = """const taken = window.taken = [];
  navigator.share = async (what) => { if (!navigator.userActivation.isActive) throw new DOMException("late", "NotAllowedError");
    taken.push({ url: what.url, text: what.text, files: await Promise.all((what.files ?? []).map(async (file) => [file.name, file.type, await file.text()])) }); };
  navigator.canShare = (what) => (what.files ?? []).every((file) => file.type === "text/plain");"""


def read_qr(page) -> list[list[bool]]:
    """The drawn modules, dark or not, from a picture of the page itself: what a camera would see."""
    return page.evaluate("""async () => {
      const drawn = document.querySelector("#pass-on .qr"), size = drawn.viewBox.baseVal.width, copy = drawn.cloneNode(true);
      copy.setAttribute("width", size * 4); copy.setAttribute("height", size * 4); copy.setAttribute("xmlns", "http://www.w3.org/2000/svg");
      const picture = new Image();
      picture.src = "data:image/svg+xml," + encodeURIComponent(copy.outerHTML);
      await picture.decode();
      const canvas = document.createElement("canvas"); canvas.width = canvas.height = size * 4;
      const context = canvas.getContext("2d"); context.drawImage(picture, 0, 0);
      return Array.from({ length: size }, (_, y) => Array.from({ length: size }, (_, x) => context.getImageData(x * 4 + 2, y * 4 + 2, 1, 1).data[0] < 128));
    }""")


def test_link_code_and_file_are_handed_on(open_page, server):
    page = open_page(viewport=PHONE, has_touch=True, is_mobile=True)
    page.add_init_script(SHARING)
    sheet = Sheet(page, server).open().ready().write(**LIMIT)
    expect(sheet.value).to_have_text("444 ± 19 mg/m³")
    page.get_by_role("button", name="Pass on").tap()
    passing = page.locator("#pass-on")
    expect(passing.locator(".qr")).to_be_visible()
    link = passing.get_by_label("The link", exact=True).input_value()
    assert len(link.partition("#")[2]) <= 300
    passing.get_by_role("button", name="Share").tap()
    passing.get_by_role("button", name="Save as a file").tap()
    page.wait_for_function("window.taken.length === 2")
    shared, filed = page.evaluate("window.taken")
    assert shared["url"] == link
    (name, kind, text), = filed["files"]
    assert kind == "text/plain" and name.endswith(".txt") and json.loads(text)["sheet"]["hold"] == LIMIT["hold"]
    sheet.line("hold").fill("NOx 71 ± 5 ppmv as NO2, dry")
    expect(passing.get_by_label("The link", exact=True)).not_to_have_value(link)      # what is shown is what is on the page


def test_the_qr_code_is_drawn_to_the_standard(sheet):
    """ISO/IEC 18004: a quiet zone of four modules, a 7 x 7 finder in three corners, timing rows alternate, the size is 17 + 4 v."""
    sheet.write(**HG)
    expect(sheet.value).to_have_text("8.339 µg/m³")
    sheet.page.emulate_media(color_scheme="dark")
    sheet.page.get_by_role("button", name="Pass on").click()
    expect(sheet.page.locator("#pass-on .qr")).to_be_visible()
    modules = read_qr(sheet.page)
    size = len(modules) - 8
    assert (size - 17) % 4 == 0 and size >= 21
    assert not any(modules[y][x] for y in range(len(modules)) for x in range(len(modules)) if not (4 <= x < size + 4 and 4 <= y < size + 4))
    finder = ["1111111", "1000001", "1011101", "1011101", "1011101", "1000001", "1111111"]
    for top, left in ((0, 0), (0, size - 7), (size - 7, 0)):
        assert ["".join("01"[modules[4 + top + y][4 + left + x]] for x in range(7)) for y in range(7)] == finder
    assert [modules[4 + 6][4 + x] for x in range(8, size - 8)] == [x % 2 == 0 for x in range(8, size - 8)]
    box = sheet.page.locator("#pass-on .qr").bounding_box()
    assert box["width"] / len(modules) >= 3 and box["width"] == box["height"]       # CSS pixels a module


def test_what_is_too_long_for_a_link_goes_as_a_file(open_page, server):
    sheet = Sheet(open_page(viewport=PHONE), server).open().ready()
    noise = " ".join(f"{n * 7919 % 10007}" for n in range(700))
    sheet.write(**HG)
    expect(sheet.value).to_have_text("8.339 µg/m³")
    sheet.line("gas").fill(f"in nitrogen, {noise[:3000]}")
    sheet.page.get_by_role("button", name="Pass on").click()
    expect(sheet.page.locator("#pass-on .problem")).to_contain_text("as a file")
    expect(sheet.page.locator("#pass-on .qr")).to_have_count(0)
    with sheet.page.expect_download() as waiting:
        sheet.page.get_by_role("button", name="Save as a file").click()
    assert json.loads(open(waiting.value.path(), encoding="utf-8").read())["sheet"]["owe"] == HG["owe"]


def test_the_paste_box_takes_what_is_ours_and_says_what_is_not(sheet):
    page = sheet.write(**HG).page
    expect(sheet.value).to_have_text("8.339 µg/m³")
    page.get_by_role("button", name="Pass on").click()
    expect(page.locator("#pass-on .qr")).to_be_visible()
    link = page.get_by_label("The link", exact=True).input_value()
    box = panel(sheet, "Open a link or file")
    paste, problem, opens = box.locator("textarea"), box.locator(".problem"), box.get_by_role("button", name="Open it")
    for text, said in (("", "nothing to open"), ("NOx 142 ppm", "goes into You hold"), ("https://example.org/", "address of another page"), (link[:-3], "cut off or altered"), ("{", "no JSON"), ("{}", "none that gasbasis wrote")):
        paste.fill(text)
        opens.click()
        expect(problem).to_contain_text(said)
        expect(sheet.line("hold")).to_have_value("Hg 1 ppb v/v")
    sheet.write(hold="CO 1 ppm", owe="ppb")
    paste.fill(f"See {link}.")
    opens.click()
    expect(sheet.line("hold")).to_have_value("Hg 1 ppb v/v")
    expect(page.locator("#figure-title")).to_contain_text("same as sent")
    expect(page.locator(".panel:visible")).to_have_count(0)


def test_a_record_is_made_saved_read_back_and_amended(open_page, server, tmp_path):
    page = open_page(viewport={"width": 1280, "height": 800})
    sheet = Sheet(page, server).open().ready().write(**LIMIT)
    expect(sheet.value).to_have_text("444 ± 19 mg/m³")
    record = panel(sheet, "Record")
    record.get_by_label("Made by").fill("A. Tester")
    record.get_by_label("Notes").fill("Probe moved once.")
    record.get_by_role("button", name="Make the record").click()
    paper = record.locator(".paper")
    for text in ("444 ± 19 mg/m³", "A. Tester", "Probe moved once.", LIMIT["gas"], "To the reference oxygen", "ISO 14912", "sha256:", "no clearance to enter"):
        expect(paper).to_contain_text(text)
    assert paper.locator("math").count() == 4 and paper.locator(".qr").count() == 1
    with page.expect_download() as waiting:
        record.get_by_role("button", name="Save as a file").click()
    file = tmp_path / waiting.value.suggested_filename
    waiting.value.save_as(file)
    made = json.loads(file.read_text("utf-8"))
    assert re.fullmatch(r"\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d[+-]\d\d:\d\d", made["made_at"]) and made["checksum"][7:15] in file.name
    with page.expect_download() as waiting:
        record.get_by_role("button", name="Send as text").click()
    assert "Probe moved once." in open(waiting.value.path(), encoding="utf-8").read()

    other = Sheet(open_page(viewport=PHONE), server).open().ready()
    box = panel(other, "Open a link or file")
    box.locator('input[type="file"]').set_input_files(file)
    expect(box).to_contain_text("The checksum holds")
    expect(box).to_contain_text("Recomputed here: the same")
    expect(other.value).to_have_text("444 ± 19 mg/m³")
    box.get_by_role("button", name="Amend it").click()
    amending = other.page.locator(".panel:visible")
    expect(amending.get_by_label("Notes")).to_have_value("Probe moved once.")
    amending.get_by_role("button", name="Make the record").click()
    expect(amending.locator(".problem:visible")).to_contain_text("says why")
    amending.get_by_label("Why it is amended").fill("limit mistyped")
    amending.get_by_role("button", name="Make the record").click()
    expect(amending.locator(".paper")).to_contain_text(f"Amends the record {made['checksum']}: limit mistyped")

    made["figure"]["number_text"] = "404 ± 19"
    file.write_text(json.dumps(made), "utf-8")
    box = panel(other, "Open a link or file")
    box.locator('input[type="file"]').set_input_files(file)
    expect(box).to_contain_text("does not hold")


def pages_of(pdf: bytes) -> int:
    return len(re.findall(rb"/Type\s*/Page\b", pdf))


def test_a_plain_record_prints_on_one_page_and_alone(sheet):
    page = sheet.write(**LIMIT).page
    expect(sheet.value).to_have_text("444 ± 19 mg/m³")
    record = panel(sheet, "Record")
    record.get_by_role("button", name="Make the record").click()
    expect(record.locator(".paper")).to_contain_text("sha256:")
    pdf = page.pdf(prefer_css_page_size=True)
    assert pages_of(pdf) == 1
    assert re.search(rb"/MediaBox\s*\[\s*0 0 59[45]\S* 84[12]\S*\s*\]", pdf)                 # A4 in points
    page.emulate_media(media="print")
    expect(record.locator(".paper")).to_be_visible()
    expect(record.get_by_label("Made by")).to_be_hidden()
    for part in ("#hold", "#figure", ".top", "#cautions"):
        expect(page.locator(part)).to_be_hidden()
    page.emulate_media(media="screen")
    record.get_by_role("button", name="Close").click()
    page.emulate_media(media="print")
    expect(page.locator("#hold")).to_be_visible()                                              # without a record the sheet itself is printed


def test_two_sheets_are_compared(sheet):
    page = sheet.write(**LIMIT).page
    expect(sheet.value).to_have_text("444 ± 19 mg/m³")
    page.get_by_role("button", name="Pass on").click()
    expect(page.locator("#pass-on .qr")).to_be_visible()
    link = page.get_by_label("The link", exact=True).input_value()
    sheet.write(**{**LIMIT, "hold": "NOx 142 ± 5 ppmv as NO, dry", "gas": "9.2 ± 0.3 % O2 dry, ambient O2 20.9 %"})
    expect(sheet.value).to_have_text("291 ± 13 mg/m³")
    compare = panel(sheet, "Compare")
    compare.locator("textarea").fill(link)
    compare.get_by_role("button", name="Compare", exact=True).click()
    expect(compare.locator('[data-part="sentence"]')).to_have_text("What moves the figure most is You hold: reported as.")
    differences = compare.locator(".differences > li")
    expect(differences).to_have_count(2)
    expect(differences.nth(0)).to_contain_text("as NO2")
    expect(differences.nth(0)).to_contain_text("× 1.533 (+53 %)")                                # (14.007 + 2 x 15.999)/(14.007 + 15.999)
    expect(differences.nth(1)).to_contain_text("ambient O2 21 %")
    places = """(one) => [...one.querySelectorAll(".two > p")].map((node) => { const { x, y } = node.getBoundingClientRect(); return { x, y }; })"""
    first, second = differences.nth(0).evaluate(places)                                        # in one look: the page may be scrolling
    assert second["y"] > first["y"]                                                            # stacked on a phone
    page.set_viewport_size({"width": 1280, "height": 800})
    first, second = differences.nth(0).evaluate(places)
    assert second["y"] == first["y"] and second["x"] > first["x"]
    sheet.line("limit").fill("200 mg/m3")
    expect(compare.get_by_text("compare again")).to_be_visible()

"""What goes wrong in the field: a server that dies half way, files damaged in the copy, a full storage, two versions, a wrong clock."""
from __future__ import annotations

import json
import re
import shutil
from functools import partial

import pytest
from playwright.sync_api import expect

from browser.page import Sheet

ALLOWED = {"service_workers": "allow", "viewport": {"width": 390, "height": 844}}
HELD = dict(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 1 atm")
FIGURE = "8.339 µg/m³"                                    # 1e-9 · 101325 Pa · 200.592 g/mol/(R · 293.15 K)
CACHED = """async () => { const found = {}; for (const name of await caches.keys()) found[name] = (await (await caches.open(name)).keys()).length; return found; }"""
SPOIL = """async ([path, how]) => { for (const name of await caches.keys()) { const cache = await caches.open(name), key = new URL(path, document.baseURI).href;
  const bytes = new Uint8Array(await (await cache.match(key)).arrayBuffer());
  if (how === "delete") { await cache.delete(key); continue; }
  if (how === "flip") bytes[1000] ^= 1;
  await cache.put(key, new Response(how === "truncate" ? bytes.slice(0, -1) : bytes, { headers: { "Content-Type": "application/zip" } })); } }"""
DIGEST = """async (path) => { const bytes = await (await fetch(path)).arrayBuffer(); return [...new Uint8Array(await crypto.subtle.digest("SHA-256", bytes))].map((byte) => byte.toString(16).padStart(2, "0")).join(""); }"""


class Mortal:
    """A server of a folder that stops answering after so many files, and can be started again on its port."""

    def __init__(self, folder):
        from making.server import Handler, _Server, in_background
        self.folder, self.left, self.port = folder, None, 0
        outer = self

        class Dying(Handler):
            def do_GET(self):
                if outer.left is not None:
                    outer.left -= 1
                    if outer.left < 0:
                        self.close_connection = True
                        return
                super().do_GET()

        self.running = _Server(("127.0.0.1", 0), partial(Dying, folder=folder, prefix="/", quiet=True))
        in_background(self.running)
        self.address = f"http://127.0.0.1:{self.running.server_address[1]}/"

    def close(self):
        self.running.shutdown()
        self.running.server_close()


@pytest.fixture
def mortal(dist, tmp_path):
    folder = tmp_path / "page"
    shutil.copytree(dist, folder)
    server = Mortal(folder)
    yield server
    server.close()


def newer(folder) -> None:
    """A later version of the page, with the service worker that belongs to it."""
    from making.site import write_service_worker
    page = folder / "index.html"
    page.write_text(page.read_text().replace("<title>gasbasis</title>", "<title>gasbasis, later</title>"))
    for name in ("tokens.css", "layout.css", "components.css"):
        path = folder / "styles" / name
        path.write_text(path.read_text() + "\n/* later */\n")
    write_service_worker(folder)


def opened(open_page, address: str) -> Sheet:
    return Sheet(open_page(quiet=False, **ALLOWED), address).open().ready()


def ready_offline(sheet: Sheet) -> Sheet:
    expect(sheet.page.locator("#status")).to_contain_text("ready offline")
    return sheet


def test_the_whole_job_with_the_server_gone_after_the_first_visit(open_page, mortal):
    sheet = ready_offline(opened(open_page, mortal.address))
    mortal.left = 0
    sheet.page.reload()
    sheet.ready().write(**HELD)
    expect(sheet.value).to_have_text(FIGURE)
    expect(sheet.page.locator("#working math").first).to_be_visible()


def test_killed_in_the_middle_of_the_first_fetch_there_is_no_version_and_never_half_of_one(open_page, mortal):
    page = open_page(quiet=False, **ALLOWED)
    page.add_init_script("""const register = navigator.serviceWorker.register.bind(navigator.serviceWorker);
        navigator.serviceWorker.register = (...given) => globalThis.mayKeep ? register(...given) : new Promise((done) => { globalThis.keepNow = () => { done(register(...given)); }; });""")
    page.goto(mortal.address)
    sheet = Sheet(page, mortal.address).ready()
    mortal.left = 12                                       # fewer than the page has
    page.evaluate("() => { globalThis.keepNow(); }")
    for _ in range(100):
        if mortal.left < 0 and page.evaluate("navigator.serviceWorker.getRegistration().then((found) => !found?.installing)"):
            break
        page.wait_for_timeout(100)
    assert mortal.left < 0 and page.evaluate("navigator.serviceWorker.getRegistration().then((found) => !found?.active)")
    sheet.write(**HELD)
    expect(sheet.value).to_have_text(FIGURE)               # the page in hand works on
    mortal.left = None
    page.add_init_script("globalThis.mayKeep = true;")
    page.reload()
    ready_offline(sheet)


def test_killed_in_the_middle_of_an_update_the_old_version_stays_whole(open_page, mortal):
    sheet = ready_offline(opened(open_page, mortal.address))
    newer(mortal.folder)
    mortal.left = 3                                        # sw.js and two of the four new files
    sheet.page.reload()
    for _ in range(50):
        if mortal.left < 0:
            break
        sheet.page.wait_for_timeout(100)
    assert mortal.left < 0
    mortal.left = 0
    sheet.page.reload()
    assert sheet.page.title() == "gasbasis"
    sheet.ready().write(**HELD)
    expect(sheet.value).to_have_text(FIGURE)
    expect(sheet.page.locator("#notice")).to_be_hidden()


@pytest.mark.parametrize("how", ["delete", "truncate", "flip"])
def test_one_damaged_file_is_repaired(open_page, mortal, how):
    sheet = ready_offline(opened(open_page, mortal.address))
    path = next(f"runtime/{entry.name}" for entry in (mortal.folder / "runtime").iterdir() if entry.name.startswith("gasbasis-"))
    whole = sheet.page.evaluate(DIGEST, path)
    sheet.page.evaluate(SPOIL, [path, how])
    if how != "delete":
        assert sheet.page.evaluate(DIGEST, path) != whole
    sheet.page.reload()
    for _ in range(100):
        if sheet.page.evaluate(DIGEST, path) == whole:
            break
        sheet.page.wait_for_timeout(100)
    assert sheet.page.evaluate(DIGEST, path) == whole
    sheet.page.reload()
    sheet.ready().write(**HELD)
    expect(sheet.value).to_have_text(FIGURE)


def test_a_file_damaged_with_no_network_is_named(open_page, mortal):
    sheet = ready_offline(opened(open_page, mortal.address))
    sheet.page.evaluate(SPOIL, ["licences.txt", "delete"])
    mortal.left = 0
    sheet.page.reload()
    sheet.ready()
    sheet.page.get_by_role("button", name="More", exact=True).click()
    expect(sheet.page.locator('[data-part="offline-detail"]')).to_contain_text("licences.txt")
    sheet.page.get_by_role("button", name="More", exact=True).click()
    sheet.write(**HELD)
    expect(sheet.value).to_have_text(FIGURE)


def test_a_full_storage_is_said_and_the_page_works_on(open_page, mortal):
    page = open_page(quiet=False, **ALLOWED)
    page.goto("about:blank")
    session = page.context.new_cdp_session(page)
    session.send("Storage.overrideQuotaForOrigin", {"origin": mortal.address.rstrip("/"), "quotaSize": 200_000})
    sheet = Sheet(page, mortal.address).open().ready().write(**HELD)
    expect(sheet.value).to_have_text(FIGURE)
    page.get_by_role("button", name="More", exact=True).click()
    expect(page.locator('[data-part="offline-detail"]')).to_contain_text(re.compile("quota|could not be kept|storage", re.IGNORECASE))
    expect(page.locator("#status")).not_to_contain_text("ready offline")


def test_two_tabs_on_two_versions(open_page, mortal):
    first = ready_offline(opened(open_page, mortal.address)).write(**HELD)
    second = Sheet(first.page.context.new_page(), mortal.address).open().ready().write(**HELD)
    newer(mortal.folder)
    second.page.reload()
    expect(second.page.locator("#notice")).to_contain_text("newer version", timeout=30_000)
    second.page.get_by_role("button", name="Change to it").click()
    expect(second.page).to_have_title("gasbasis, later")
    second.ready()
    expect(second.value).to_have_text(FIGURE)              # its inputs survived
    assert first.page.title() == "gasbasis"
    first.line("hold").fill("Hg 2 ppb v/v")
    expect(first.value).to_have_text("16.68 µg/m³")        # the other tab works on with what it has


def test_later_asks_again_at_the_next_start(open_page, mortal):
    sheet = ready_offline(opened(open_page, mortal.address))
    newer(mortal.folder)
    for _ in range(2):
        sheet.page.reload()
        expect(sheet.page.locator("#notice")).to_contain_text("newer version", timeout=30_000)
        sheet.page.get_by_role("button", name="Later").click()
        expect(sheet.page.locator("#notice")).to_be_hidden()
    assert sheet.page.title() == "gasbasis"


def test_the_update_says_whether_numbers_change(open_page, mortal):
    sheet = ready_offline(opened(open_page, mortal.address))
    changes = mortal.folder / "changes.json"
    told = [{"version": "99.0.0", "date": "2027-01-01", "numbers": "no number changed", "text": "a test of the question"}, *json.loads(changes.read_text(encoding="utf-8"))]
    changes.write_text(json.dumps(told), encoding="utf-8")
    newer(mortal.folder)
    sheet.page.reload()
    expect(sheet.page.locator("#notice")).to_contain_text("no number changed", timeout=30_000)
    expect(sheet.page.locator("#notice")).to_contain_text("a test of the question")


@pytest.mark.parametrize("year", [1980, 2100])
def test_a_wrong_clock_changes_nothing(open_page, mortal, year):
    page = open_page(quiet=False, **ALLOWED)
    page.add_init_script(f"{{ const Real = Date, shift = new Real({year}, 0, 1) - Real.now(); globalThis.Date = class extends Real {{ constructor(...a) {{ a.length ? super(...a) : super(Real.now() + shift); }} static now() {{ return Real.now() + shift; }} }}; }}")
    sheet = ready_offline(Sheet(page, mortal.address).open().ready())
    mortal.left = 0
    page.reload()
    sheet.ready().write(**HELD)
    expect(sheet.value).to_have_text(FIGURE)

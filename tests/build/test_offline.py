"""The service worker: a verified copy, a visit without a server, an update that asks, and nobody else's cache touched."""
from __future__ import annotations

import re
import shutil

import pytest

pytestmark = pytest.mark.native

ALLOWED = {"service_workers": "allow"}
CACHES = "() => caches.keys()"
ASK = """async () => { const client = await import(new URL("js/core-client.js", document.baseURI).href);
                       return (await client.createCore().ask({ task: "version" })).version; }"""
REGISTER = """async () => { const offline = await import(new URL("js/offline.js", document.baseURI).href);
  window.offline = offline.startOffline();
  await navigator.serviceWorker.ready; }"""


def version_of(folder) -> str:
    return re.search(r'const VERSION = "([0-9a-f]{16})"', (folder / "sw.js").read_text()).group(1)


def wait_until(page, question: str, wanted=True, tries: int = 150):
    """Ask the page again and again: under the policy a polled function cannot be installed in it."""
    answered = None
    for _ in range(tries):
        answered = page.evaluate(question)
        if answered == wanted:
            return
        page.wait_for_timeout(100)
    raise AssertionError(f"{question} stayed {answered!r}, not {wanted!r}")


def kept(page):
    page.evaluate(REGISTER)
    wait_until(page, "offline.state.phase", "ready")


@pytest.fixture
def copy_of_dist(dist, tmp_path):
    folder = tmp_path / "page"
    shutil.copytree(dist, folder)
    return folder


def new_version(folder):
    """Change a file of the page and write the service worker that belongs to it, as a new build would."""
    from making.site import write_service_worker
    style = folder / "styles" / "tokens.css"
    style.write_text(style.read_text() + "\n/* a later version */\n")
    write_service_worker(folder)


def test_a_second_visit_needs_no_server(served_under, open_page):
    address, stop = served_under("/x/y/")
    page = open_page(quiet=False, **ALLOWED)
    page.goto(address)
    kept(page)
    state = page.evaluate("offline.state")
    assert state["done"] == state["of"] > 15 and state["checkedAt"] and not state["update"]
    stop()
    page.reload()
    assert page.title() == "gasbasis"
    assert page.evaluate(ASK)


def test_the_copy_carries_types_and_policy(served_under, open_page):
    address, stop = served_under()
    page = open_page(quiet=False, **ALLOWED)
    page.goto(address)
    kept(page)
    stop()
    headers = page.evaluate("""async () => { const response = await fetch("runtime/pyodide.asm.wasm");
        return [response.headers.get("content-type"), response.headers.get("content-security-policy")]; }""")
    assert headers[0] == "application/wasm" and headers[1].startswith("default-src 'none'")


def test_a_changed_file_is_never_kept(copy_of_dist, served_under, open_page):
    """One byte differs from what the build wrote down: no copy is offered, and the page still works from the network."""
    about = copy_of_dist / "licences.txt"
    about.write_bytes(about.read_bytes()[:-1] + b"!")
    address, _ = served_under(folder=copy_of_dist)
    page = open_page(quiet=False, **ALLOWED)
    page.goto(address)
    page.evaluate("""async () => { const offline = await import(new URL("js/offline.js", document.baseURI).href);
                                  window.offline = offline.startOffline(); }""")
    wait_until(page, "offline.state.phase", "failed")
    assert "licences.txt" in page.evaluate("offline.state.message")
    assert page.evaluate("navigator.serviceWorker.getRegistration().then((found) => !found?.active)")
    assert page.evaluate(ASK)


def test_an_update_waits_for_a_yes_and_the_old_copy_goes_last(copy_of_dist, served_under, open_page):
    address, _ = served_under(folder=copy_of_dist)
    page = open_page(quiet=False, **ALLOWED)
    page.goto(address)
    page.evaluate("() => caches.open('somebody else')")
    kept(page)
    first = version_of(copy_of_dist)
    new_version(copy_of_dist)
    second = version_of(copy_of_dist)
    assert first != second
    page.reload()
    kept(page)
    wait_until(page, "offline.state.update")
    assert page.evaluate("offline.state.version") == first
    assert "a later version" not in page.evaluate("fetch('styles/tokens.css').then((response) => response.text())")
    assert len(page.evaluate(CACHES)) == 3
    with page.expect_navigation():
        page.evaluate("offline.takeUpdate()")
    kept(page)
    assert page.evaluate("offline.state.version") == second
    wait_until(page, "caches.keys().then((names) => names.length)", 2)
    names = page.evaluate(CACHES)
    assert "somebody else" in names and any(second in name for name in names)
    assert "a later version" in page.evaluate("fetch('styles/tokens.css').then((response) => response.text())")


def test_a_file_that_the_browser_dropped_is_fetched_again(served_under, open_page):
    address, _ = served_under()
    page = open_page(quiet=False, **ALLOWED)
    page.goto(address)
    kept(page)
    page.evaluate("""async () => { for (const name of await caches.keys()) {
        await (await caches.open(name)).delete(new URL("js/main.js", document.baseURI).href); } }""")
    page.evaluate("offline.check()")
    wait_until(page, """(async () => { const [name] = await caches.keys();
        return Boolean(await (await caches.open(name)).match(new URL("js/main.js", document.baseURI).href)); })()""")


def test_a_dropped_page_that_the_host_has_only_newer_still_opens(copy_of_dist, served_under, open_page):
    address, _ = served_under(folder=copy_of_dist)
    page = open_page(quiet=False, **ALLOWED)
    page.goto(address)
    kept(page)
    page.evaluate("""async () => { for (const name of await caches.keys()) {
        await (await caches.open(name)).delete(new URL("index.html", document.baseURI).href); } }""")
    html = copy_of_dist / "index.html"
    html.write_text(html.read_text().replace("<title>gasbasis</title>", "<title>gasbasis, later</title>"))
    page.reload()
    assert page.title() == "gasbasis, later"


def test_two_copies_on_one_origin_keep_apart(served_under, open_page, copy_of_dist, tmp_path):
    """/x/ and /y/ of the same host: deleting older copies of one leaves the other's alone."""
    both = tmp_path / "both"
    shutil.copytree(copy_of_dist, both / "x")
    shutil.copytree(copy_of_dist, both / "y")
    address, _ = served_under(folder=both)
    page = open_page(quiet=False, **ALLOWED)
    for place in ("x/", "y/"):
        page.goto(address + place)
        kept(page)
    assert len(page.evaluate(CACHES)) == 2
    assert {name.split(" ")[1] for name in page.evaluate(CACHES)} == {"/x/", "/y/"}

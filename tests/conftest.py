"""What the tests share: the built page, servers for it, and a browser that must stay quiet.

Nothing of the browser is imported here before a test asks for it, as the core's tests also run inside Pyodide.
"""
from __future__ import annotations

import os
import sys
import urllib.parse
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parents[1]
IN_PYODIDE = sys.platform == "emscripten"
sys.path.append(str(ROOT / "pycore"))            # for `making`; at the end, so that the installed wheel is what is tested
PATIENCE_MS = 30_000


def pytest_collection_modifyitems(config, items):
    """Tests that need a process, a browser or the file tree cannot run inside Pyodide."""
    if not IN_PYODIDE:
        return
    native = [item for item in items if item.get_closest_marker("native")]
    config.hook.pytest_deselected(items=native)
    items[:] = [item for item in items if not item.get_closest_marker("native")]


@pytest.fixture(scope="session")
def dist() -> Path:
    """The built page. Built by `build.py test` before pytest starts."""
    folder = Path(os.environ.get("GASBASIS_DIST", ROOT / "dist"))
    if not (folder / "index.html").exists():
        pytest.fail("There is no built page. Run: python3 build.py build")
    return folder


@pytest.fixture(scope="session")
def server(dist):
    """The address of the page on a loopback server."""
    from making.server import address_of, in_background, open_server
    running = open_server(dist)
    in_background(running)
    yield address_of(running)
    running.shutdown()
    running.server_close()


@pytest.fixture
def served_under(dist):
    """A function that serves the page under a prefix ("/x/y/"), or another folder, and returns (address, stop)."""
    from making.server import address_of, in_background, open_server
    opened = []

    def serve(prefix: str = "/", folder: Path = dist, port: int = 0):
        running = open_server(folder, prefix=prefix, port=port)
        in_background(running)
        opened.append(running)

        def stop():
            if running in opened:
                opened.remove(running)
                running.shutdown()
                running.server_close()
        return address_of(running, prefix), stop

    yield serve
    for running in list(opened):
        running.shutdown()
        running.server_close()


@pytest.fixture(scope="session")
def browser():
    """One headless Chromium for the whole run."""
    from making.browser_find import ARGUMENTS, find
    from playwright.sync_api import sync_playwright
    path = find()
    if not path:
        pytest.fail("No Chromium was found. `python3 build.py test` installs one or names the command.")
    with sync_playwright() as playwright:
        running = playwright.chromium.launch(executable_path=path, args=list(ARGUMENTS))
        yield running
        running.close()


class Watch:
    """Writes down what a page should not do: errors, console errors, requests to another host."""

    def __init__(self):
        self.problems: list[str] = []

    def over(self, page) -> None:
        page.on("pageerror", lambda error: self.problems.append(f"page error: {error}"))
        page.on("console", self._look_at_message)
        page.on("request", self._look_at_host)

    def _look_at_message(self, message) -> None:
        asked_for_icon = message.location["url"].endswith("/favicon.ico")     # only documents without a head ask for it
        if message.type == "error" and not asked_for_icon:
            self.problems.append(f"console: {message.text}")

    def _look_at_host(self, request) -> None:
        address = urllib.parse.urlsplit(request.url)
        if address.scheme in ("http", "https") and address.hostname != "127.0.0.1":
            self.problems.append(f"request to another host: {request.url}")


@pytest.fixture
def open_page(browser):
    """A function that opens a page in a fresh context, with Playwright's context options.

    Service workers are blocked unless `service_workers="allow"` is given. The test fails at its end if
    the page had an error or asked another host, unless `quiet=False` is given.
    """
    contexts, watches = [], []

    def make(quiet: bool = True, **options):
        context = browser.new_context(**{"service_workers": "block", **options})
        context.set_default_timeout(PATIENCE_MS)
        page = context.new_page()
        watch = Watch()
        watch.over(page)
        contexts.append(context)
        if quiet:
            watches.append(watch)
        return page

    yield make
    for context in contexts:
        context.close()
    problems = [problem for watch in watches for problem in watch.problems]
    assert not problems, "\n".join(problems)


@pytest.fixture
def page(open_page):
    """A page of 1280 x 800 in a fresh context. It is blank: go to `server`."""
    return open_page(viewport={"width": 1280, "height": 800})

"""The content security policy holds in the worker too, whether the host sends it as a header or only the page carries it."""
from __future__ import annotations

import threading
from functools import partial
from http.server import BaseHTTPRequestHandler, SimpleHTTPRequestHandler, ThreadingHTTPServer

import pytest

pytestmark = pytest.mark.native
FETCH = "(address) => fetch(address).then((response) => response.text(), (error) => `refused: ${error.message}`)"

# After a turn of the event loop: what a debugger evaluates is itself allowed everything until then.
FROM_TEXT = """async () => { await new Promise((resolve) => setTimeout(resolve, 20));
                             try { return new Function("return 1")(); } catch (error) { return error.name; } }"""


class Open(BaseHTTPRequestHandler):
    """Another origin that would answer anybody."""

    def do_GET(self):
        self.send_response(200)
        self.send_header("Access-Control-Allow-Origin", "*")
        self.send_header("Content-Length", "8")
        self.end_headers()
        self.wfile.write(b"answered")

    def log_message(self, *values):
        pass


class Plain(SimpleHTTPRequestHandler):
    """A host that sends files and no policy."""

    extensions_map = {**SimpleHTTPRequestHandler.extensions_map, ".mjs": "text/javascript", ".js": "text/javascript", ".wasm": "application/wasm"}

    def log_message(self, *values):
        pass


@pytest.fixture
def opened():
    running = []

    def start(handler) -> str:
        host = ThreadingHTTPServer(("127.0.0.1", 0), handler)
        threading.Thread(target=host.serve_forever, daemon=True).start()
        running.append(host)
        return f"http://127.0.0.1:{host.server_address[1]}/"

    yield start
    for host in running:
        host.shutdown()
        host.server_close()


def test_the_other_origin_answers_where_no_policy_holds(open_page, opened):
    """The control: without it the tests below would pass for a wrong reason."""
    page = open_page(quiet=False)
    page.goto(opened(Open))
    assert page.evaluate(FETCH, opened(Open)) == "answered"


@pytest.mark.parametrize("host", ["header and meta", "meta only"])
def test_a_fetch_to_another_origin_is_refused_in_page_and_worker(host, dist, server, open_page, opened):
    other = opened(Open)
    address = server if host == "header and meta" else opened(partial(Plain, directory=str(dist)))
    page = open_page(quiet=False)
    with page.expect_worker() as started:
        page.goto(address)
    assert page.evaluate(FETCH, other).startswith("refused")
    assert started.value.evaluate(FETCH, other).startswith("refused")
    assert started.value.url.startswith("blob:")


def test_code_from_text_is_refused_in_page_and_worker(server, open_page):
    page = open_page(quiet=False)
    with page.expect_worker() as started:
        page.goto(server)
    for place in (page, started.value):
        assert place.evaluate(FROM_TEXT) == "EvalError"


def test_works_below_a_prefix(served_under, open_page, core_page):
    address, _ = served_under("/x/y/")
    asked = []
    page = open_page()
    page.on("response", lambda response: asked.append((response.url, response.status)))
    with page.expect_worker():
        page.goto(address)
    page.wait_for_load_state("networkidle")
    asked = [(url, status) for url, status in asked if not url.startswith("blob:")]
    assert any(url.startswith(address + "runtime/gasbasis-") for url, _ in asked)
    assert [(url, status) for url, status in asked if not url.startswith(address) or status != 200] == []
    assert core_page(address).evaluate("core.ask({ task: 'version' })")["version"]

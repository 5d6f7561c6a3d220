"""For tests of the worker and its client alone: the page's own modules on a document without the page's regions."""
from __future__ import annotations

import pytest

BARE = "licences.txt"                   # a document of the same origin that starts nothing of its own


@pytest.fixture
def bare(open_page, server):
    """A function that opens a bare document with `core-client.js` imported as `window.client`."""
    def make(address: str = server, **options):
        page = open_page(**options)
        page.goto(address + BARE)
        page.evaluate("async (address) => { window.client = await import(address) }", address + "js/core-client.js")
        return page
    return make


@pytest.fixture
def core_page(bare):
    """A function that opens a bare document, starts a core as `window.core` and waits until it is ready."""
    def make(*arguments, **options):
        page = bare(*arguments, **options)
        page.evaluate("""() => new Promise((resolve, reject) => {
            window.states = [];
            window.core = client.createCore({ onState: (state) => {
              states.push(state);
              if (state.phase === "ready") resolve();
              if (state.phase === "failed") reject(new Error(state.message));
            } });
          })""")
        return page
    return make

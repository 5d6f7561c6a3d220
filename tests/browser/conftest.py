"""A page object on the built page; nothing here runs inside Pyodide."""
from __future__ import annotations

import pytest


def pytest_collection_modifyitems(items):
    for item in items:
        item.add_marker(pytest.mark.native)


@pytest.fixture(autouse=True, scope="session")
def patience():
    """A shared machine may take its time to start Python."""
    from playwright.sync_api import expect
    expect.set_options(timeout=30_000)


@pytest.fixture
def sheet(open_page, server):
    """The page at a phone's size, its core ready."""
    from browser.page import Sheet
    return Sheet(open_page(viewport={"width": 390, "height": 844}), server).open().ready()

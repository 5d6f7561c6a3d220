"""The page as a person uses it: by labels, roles and what is written on it."""
from __future__ import annotations

from playwright.sync_api import Page, expect


class Sheet:
    """One open page."""

    def __init__(self, page: Page, address: str):
        self.page = page
        self.address = address

    def open(self) -> "Sheet":
        self.page.goto(self.address)
        return self

    def ready(self) -> "Sheet":
        expect(self.page.locator("#status")).to_contain_text("version")
        return self

    def line(self, side: str):
        return self.page.locator(f"#{side}-text")

    def write(self, hold: str = "", gas: str = "", owe: str = "") -> "Sheet":
        for side, text in (("hold", hold), ("gas", gas), ("owe", owe)):
            self.line(side).fill(text)
        return self

    def piece(self, side: str, field: str):
        return self.page.locator(f'#{side} .piece[data-field="{field}"]')

    @property
    def value(self):
        return self.page.locator('#figure [data-part="value"]')

    @property
    def basis(self):
        return self.page.locator('#figure [data-part="basis"]')

    @property
    def sentence(self):
        return self.page.locator('#figure [data-part="sentence"]')

    def problems(self, side: str):
        return self.page.locator(f"#{side} .problems li")

    def width_needed(self) -> int:
        return self.page.evaluate("document.documentElement.scrollWidth")

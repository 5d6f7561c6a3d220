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

    def write(self, hold: str = "", gas: str = "", owe: str = "", limit: str = "") -> "Sheet":
        """Fill every line, those not given with nothing."""
        for side, text in (("hold", hold), ("gas", gas), ("owe", owe), ("limit", limit)):
            self.line(side).fill(text)
        return self

    def piece(self, side: str, field: str):
        return self.page.locator(f'#{side} .piece[data-field="{field}"]')

    def doubt(self, of: str):
        """A doubt in the list, by its place in the sheet, e.g. "hold.parts_by"."""
        return self.page.locator(f'#doubts .doubt[data-key="{of}"]')

    @property
    def entry(self):
        """The text input of the open piece editor."""
        return self.page.locator('.editor input[data-part="input"]')

    def focused(self, what: str):
        """A property of the element that has the focus: "id", "tagName", "textContent"."""
        return self.page.evaluate("(what) => document.activeElement[what]", what)

    def tab_to(self, condition: str, most: int = 80) -> None:
        """Press Tab until a JavaScript condition on `at`, the focused element, holds. AssertionError after `most` times."""
        for _ in range(most):
            self.page.keyboard.press("Tab")
            if self.page.evaluate(f"(() => {{ const at = document.activeElement; return Boolean({condition}); }})()"):
                return
        raise AssertionError(f"{most} tabs did not lead to {condition}")

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

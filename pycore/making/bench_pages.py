"""The measurements of the page. To add one: write a function `(bench: Bench) -> list[Measured]` and put it into BENCHES."""
from __future__ import annotations

import json
import statistics
import sys
from dataclasses import dataclass
from pathlib import Path

from making.browser_find import ARGUMENTS
from making.server import address_of, in_background, open_server
from making.sizes import wire_sizes

WARM_LOADS = 7                          # of each page, in turn, after two that warm its caches
WARMING_LOADS = 3
CHANGES = 60
PATIENCE_MS = 60_000
VIEW = {"width": 390, "height": 844}

SHEET = {"hold": "NOx 142 ppm by volume dry as NO2", "gas": "9.2 % O2 dry, ambient O2 20.9 %, 12 % H2O",
         "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2", "settled": {}, "notes": {}}

DOUBTS = {**SHEET, "hold": "NOx 142 ppm at 9 % O2", "gas": "12 % H2O", "owe": "mg/m3, 11 % O2"}
JUDGED = {**SHEET, "hold": "NOx 142 ± 5 ppm by volume (k=2) wet as NO2", "gas": "9.2 ± 0.2 % O2 dry (k=2), ambient O2 20.9 %, 12 ± 1 % H2O (k=2)",
          "owe": "mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2", "limit": "450 mg/m3"}

# Put into every document before its own scripts: notes when a figure first stands on the page.
WITNESS = """(sheet) => {
  localStorage.setItem("gasbasis.sheet", sheet);
  window.witness = { figure: 0, shown: "" };
  const shows = () => document.querySelector('#figure [data-part="value"]')?.textContent ?? "";
  addEventListener("DOMContentLoaded", () => {
    new MutationObserver(() => {
      if (/[0-9]/.test(shows())) witness.figure ||= performance.now();
      witness.shown = shows();
    }).observe(document.querySelector("#figure"), { subtree: true, childList: true, characterData: true });
  });
}"""

# Type another number, wait for the figure that belongs to it, and for the frame with the working to be ready to paint.
CHANGE = """async ([number, text]) => {
  const field = document.querySelector("#hold-text"), before = witness.shown;
  const began = performance.now();
  field.value = text;
  field.dispatchEvent(new Event("input", { bubbles: true }));
  while (witness.shown === before) {
    await new Promise((resolve) => { const channel = new MessageChannel(); channel.port1.onmessage = resolve; channel.port2.postMessage(0); });
    if (performance.now() - began > 5000) throw new Error("no new figure for " + text);
  }
  const took = performance.now() - began;
  if (number && !document.querySelector("#working").textContent.includes(number)) throw new Error("the working does not show " + number);
  return took;
}"""


@dataclass(frozen=True)
class Measured:
    """One number with its target. `most` is the largest value that meets it; None for a number given for information."""

    name: str
    value: float
    unit: str
    most: float | None = None

    @property
    def met(self) -> bool:
        return self.most is None or self.value <= self.most

    def line(self) -> str:
        judged = "" if self.most is None else f"   target <= {self.most:g} {self.unit}   {'met' if self.met else 'MISSED'}"
        return f"{self.name:<58} {self.value:10.4g} {self.unit:<6}{judged}"


class Bench:
    """The two pages on loopback servers, and one browser."""

    def __init__(self, playwright, dist: Path, stock: Path, chromium: str):
        self.dist = dist
        self.browser = playwright.chromium.launch(executable_path=chromium, args=list(ARGUMENTS))
        self.pages = {"ours": self._serve(dist), "stock": self._serve(stock)}

    @staticmethod
    def _serve(folder: Path) -> str:
        server = open_server(folder)
        in_background(server)
        return address_of(server)

    def visitor(self, sheet: dict = SHEET):
        """A fresh profile with a sheet kept: nothing cached, service workers allowed."""
        context = self.browser.new_context(viewport=VIEW)
        context.set_default_timeout(PATIENCE_MS)
        context.add_init_script(f"({WITNESS})({json.dumps(json.dumps(sheet))})")
        return context

    @staticmethod
    def figure(page) -> float:
        """Milliseconds from the start of the navigation to the first figure on the page."""
        for _ in range(PATIENCE_MS // 20):
            milliseconds = page.evaluate("witness.figure")
            if milliseconds:
                return milliseconds
            page.wait_for_timeout(20)
        raise SystemExit(f"No figure appeared. The page shows: {page.locator('#figure').inner_text()!r}")


def first_visit(bench: Bench) -> list[Measured]:
    """A cold visit: what is fetched before the first figure, when fields can be seen, when the figure stands."""
    context = bench.visitor()
    page = context.new_page()
    fetched: list[str] = []
    context.on("request", lambda request: fetched.append(request.url))
    address = bench.pages["ours"]
    page.goto(address)
    figure = bench.figure(page)
    wanted = {url.removeprefix(address) or "index.html" for url in fetched if url.startswith(address)}
    paint = page.evaluate("performance.getEntriesByName('first-contentful-paint')[0].startTime")
    usable = page.evaluate("!document.querySelector('#hold-text').disabled && !document.querySelector('#owe-text').disabled")
    context.close()
    if not usable:
        raise SystemExit("The fields could not be used at the first paint.")
    sizes = wire_sizes(bench.dist)
    transfer = sum(size for name, size in sizes.items() if name in wanted or name.startswith("runtime/")) / 1e6
    return [Measured("transfer to the first figure, gzip", transfer, "MB", 6.4),
            Measured("first paint with usable fields, first visit", paint, "ms", 300),
            Measured("first figure, first visit", figure, "ms")]


def warm_load(bench: Bench) -> list[Measured]:
    """First figure after a warm load, ours and stock in turn, so that a busy machine slows both."""
    contexts = {name: bench.visitor() for name in bench.pages}
    pages = {name: context.new_page() for name, context in contexts.items()}
    times: dict[str, list[float]] = {name: [] for name in pages}
    for load in range(WARMING_LOADS + WARM_LOADS):
        for name, page in pages.items():
            page.goto(bench.pages[name])
            milliseconds = bench.figure(page)
            if load < WARMING_LOADS:
                page.evaluate("navigator.serviceWorker.ready.then(() => true)")
                page.wait_for_timeout(1500)
            else:
                times[name].append(milliseconds)
    paint = pages["ours"].evaluate("performance.getEntriesByName('first-contentful-paint')[0].startTime")
    for context in contexts.values():
        context.close()
    ours, stock = statistics.median(times["ours"]), statistics.median(times["stock"])
    return [Measured("first figure, warm load, ours to stock", ours / stock, "ratio", 0.35),
            Measured("first figure, warm load", ours, "ms"), Measured("first figure, warm load, stock set-up", stock, "ms"),
            Measured("first paint with usable fields, warm load", paint, "ms", 300)]


def changed(bench: Bench, sheet: dict, number_shown: bool) -> list[float]:
    """Milliseconds from each changed number to the figure that belongs to it."""
    context = bench.visitor(sheet)
    page = context.new_page()
    page.goto(bench.pages["ours"])
    bench.figure(page)
    page.wait_for_timeout(2000)
    times = []
    for change in range(CHANGES):
        number = str(150 + change)
        times.append(page.evaluate(CHANGE, [number if number_shown else "", sheet["hold"].replace("142", number)]))
        page.wait_for_timeout(30)
    context.close()
    return sorted(times[5:])


def changed_input(bench: Bench) -> list[Measured]:
    """From a changed number to the new figure with its working."""
    settled = changed(bench, SHEET, number_shown=True)
    return [Measured("changed input to new figure with working, median", statistics.median(settled), "ms", 20),
            Measured("changed input to new figure with working, p95", settled[int(len(settled) * 0.95)], "ms", 40)]


def open_doubts(bench: Bench) -> list[Measured]:
    """The same with five doubts open: figure, readings and doubts."""
    return [Measured("five open doubts, changed input to new spread, median", statistics.median(changed(bench, DOUBTS, number_shown=False)), "ms", 60)]


def judged(bench: Bench) -> list[Measured]:
    """The same with uncertainties and a limit: figure, working, budget and verdict."""
    return [Measured("figure, working, budget and verdict, median", statistics.median(changed(bench, JUDGED, number_shown=True)), "ms", 40)]


ASK = """async () => {
  const { createCore } = await import("./js/core-client.js");
  const core = await new Promise((resolve) => { const made = createCore({ onState: (now) => { if (now.phase === "ready") setTimeout(() => resolve(made)); } }); });
  const time = async (request) => { const began = performance.now(); await core.ask(request); return performance.now() - began; };
  const texts = ["merc", "tolu", "formaldehide", "chlor", "so2", "amonia", "butane", "silox", "ethyl", "xylol"], times = [];
  await time({ task: "search", what: "species", text: "warm" });
  for (const text of texts) times.push(await time({ task: "search", what: "species", text }));
  const drawing = await time({ task: "monte_carlo", sheet: SHEET });
  return { search: times.sort((a, b) => a - b)[5], drawing };
}"""


def asked(bench: Bench) -> list[Measured]:
    """Questions put to the core itself: a search in the catalogue, 200,000 draws of a whole restatement."""
    context = bench.visitor()
    page = context.new_page()
    page.goto(bench.pages["ours"])
    bench.figure(page)
    times = page.evaluate(ASK.replace("SHEET", json.dumps(JUDGED)))
    context.close()
    return [Measured("search among the species, median", times["search"], "ms", 10), Measured("200,000 draws of a restatement", times["drawing"] / 1e3, "s", 3)]


BENCHES = [first_visit, warm_load, changed_input, open_doubts, judged, asked]


def main(dist: str, stock: str, chromium: str) -> int:
    """Run every bench, print a line for each number. 1 when a target is missed."""
    from playwright.sync_api import sync_playwright
    measured: list[Measured] = []
    with sync_playwright() as playwright:
        bench = Bench(playwright, Path(dist), Path(stock), chromium)
        for measure in BENCHES:
            for number in measure(bench):
                print(number.line(), flush=True)
                measured.append(number)
        bench.browser.close()
    return 0 if all(number.met for number in measured) else 1


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))

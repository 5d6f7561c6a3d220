"""The same page on the stock set-up, for comparison in the bench: sources instead of bytecode, pint's whole registry."""
from __future__ import annotations

import json
import shutil
import zipfile
from pathlib import Path

from making.places import MAKING, Places
from making.runtime import Runtime
from making.site import write_service_worker
from making.steps import BuildFailed

OWN_REGISTRY, STOCK_REGISTRY = b"UnitRegistry(None, cache_folder=None)", b"UnitRegistry()"
ENGINE = ("pyodide.mjs", "pyodide.asm.mjs", "pyodide.asm.wasm", "pyodide-lock.json", "python_stdlib.zip")


def build_stock(runtime: Runtime, places: Places) -> Path:
    """Write the page with the stock set-up into the work folder and return it."""
    site = places.work / "stock"
    shutil.rmtree(site, ignore_errors=True)
    shutil.copytree(places.dist, site)
    folder = site / "runtime"
    shutil.rmtree(folder)
    folder.mkdir()
    for name in ENGINE:
        shutil.copyfile(places.pyodide / name, folder / name)
    for wheel in runtime.published:
        if wheel.name.startswith("gasbasis-"):
            _with_stock_registry(wheel, folder / wheel.name)
        else:
            shutil.copyfile(wheel, folder / wheel.name)
    names = [wheel.name for wheel in runtime.published]
    (folder / "stock.js").write_text(f"export const WHEELS = {json.dumps(names)};\n")
    shutil.copyfile(MAKING / "stock_worker.js", site / "js" / "core-worker.js")
    write_service_worker(site)
    return site


def _with_stock_registry(wheel: Path, target: Path) -> None:
    """The wheel with pint's default registry under our definitions instead of ours alone."""
    changed = 0
    with zipfile.ZipFile(wheel) as source, zipfile.ZipFile(target, "w", zipfile.ZIP_DEFLATED) as copy:
        for entry in source.infolist():
            content = source.read(entry)
            changed += content.count(OWN_REGISTRY)
            copy.writestr(entry, content.replace(OWN_REGISTRY, STOCK_REGISTRY))
    if changed != 1:
        raise BuildFailed(f"The stock set-up replaces {OWN_REGISTRY.decode()} once in the wheel; it was found {changed} times.")

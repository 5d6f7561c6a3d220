"""The small npm libraries of the page, as their projects publish them: one module each, under libraries/."""
from __future__ import annotations

import json
import shutil
from pathlib import Path

from making.places import Places
from making.steps import BuildFailed

# package: its module for browsers; the page imports ../libraries/<package>.js
LIBRARIES = {"idb": "build/index.js", "uqr": "dist/index.mjs", "uplot": "dist/uPlot.esm.js"}
STYLES = {"uplot": "dist/uPlot.min.css"}


def write_libraries(folder: Path, places: Places) -> None:
    """Copy each module. Raises BuildFailed when one is not where its package says."""
    folder.mkdir()
    for name, module in (*LIBRARIES.items(), *STYLES.items()):
        path = _home(name, places) / module
        if not path.is_file():
            raise BuildFailed(f"{name} does not hold {module}. See LIBRARIES and STYLES in libraries.py.")
        shutil.copyfile(path, folder / f"{name}{path.suffix.replace('.mjs', '.js')}")


def licences_of_libraries(places: Places) -> list[tuple[str, str, str]]:
    """Title, licence and licence text of each."""
    rows = []
    for name in LIBRARIES:
        home = _home(name, places)
        package = json.loads((home / "package.json").read_text(encoding="utf-8"))
        rows.append((f"{name} {package['version']}", package["license"], (home / "LICENSE").read_text(encoding="utf-8")))
    return rows


def _home(name: str, places: Places) -> Path:
    return places.pyodide.parent / name

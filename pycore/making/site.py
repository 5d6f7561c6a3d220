"""dist/: the page, its Python, the list of its files, and the service worker that knows that list."""
from __future__ import annotations

import hashlib
import json
import re
import shutil
from pathlib import Path

from making.libraries import write_libraries
from making.licences import licences_text
from making.media import media_type
from making.one_page import NAME as ONE_FILE, write_one_file
from making.places import DEMO, WEB, Places
from making.policy import POLICY
from making.runtime import Runtime
from making.steps import BuildFailed
from making.toolchain import download_locked

ENGINE = ("pyodide.mjs", "pyodide.asm.mjs", "pyodide.asm.wasm")
HEAD = '<meta charset="utf-8">'
NOT_COPIED = ("sw.js",)
ENTRY = "js/main.js"
IMPORT = re.compile(r"""^\s*(?:import|export)\s(?:[\w*$\s{},]*?\sfrom\s*)?["'](\.{1,2}/[^"']+)["']""", re.MULTILINE)


def build_site(runtime: Runtime, places: Places) -> Path:
    """Write dist/ anew and return it. The same inputs give the same bytes."""
    fresh = places.work / "site"
    shutil.rmtree(fresh, ignore_errors=True)
    shutil.copytree(WEB, fresh, ignore=shutil.ignore_patterns(*NOT_COPIED, ".*", "*.md"))
    write_libraries(fresh / "libraries", places)
    _write_page(fresh)
    _write_examples(fresh / "demo")
    _write_runtime(fresh / "runtime", runtime, places)
    (fresh / "licences.txt").write_text(licences_text(runtime, places), encoding="utf-8")
    write_service_worker(fresh)
    write_one_file(fresh, places)
    shutil.rmtree(places.dist, ignore_errors=True)
    shutil.move(fresh, places.dist)
    return places.dist


def _write_page(site: Path) -> None:
    page = site / "index.html"
    if not page.exists():
        raise BuildFailed("web/index.html is missing.")
    text = page.read_text(encoding="utf-8")
    if text.count(HEAD) != 1:
        raise BuildFailed(f"web/index.html must hold {HEAD} once: the policy is put behind it.")
    policy = f'{HEAD}\n<meta http-equiv="Content-Security-Policy" content="{POLICY}">'
    preloads = "".join(f'<link rel="modulepreload" href="{name}">\n' for name in _modules(site, ENTRY))
    text = text.replace(HEAD, policy).replace("</head>", f"{preloads}</head>")
    page.write_text(text, encoding="utf-8")


def _modules(site: Path, entry: str) -> list[str]:
    """The modules that the entry imports, directly or not: named in the page they are fetched at once, not level by level."""
    found, waiting = set(), [entry]
    while waiting:
        path = site / waiting.pop()
        for address in IMPORT.findall(path.read_text(encoding="utf-8")):
            name = (path.parent / address).resolve().relative_to(site.resolve()).as_posix()
            if name not in found:
                found.add(name)
                waiting.append(name)
    return sorted(found)


def _write_examples(folder: Path) -> None:
    """The invented sheets, for the page to offer."""
    folder.mkdir()
    sheets = [json.loads(path.read_text(encoding="utf-8")) for path in sorted(DEMO.glob("*.json"))]
    (folder / "sheets.json").write_text(json.dumps(sheets, ensure_ascii=False, sort_keys=True), encoding="utf-8")
    shutil.copyfile(DEMO / "logger_day.csv", folder / "logger_day.csv")
    shutil.copyfile(DEMO / "series" / "logger_day.json", folder / "logger_day.json")


def _write_runtime(folder: Path, runtime: Runtime, places: Places) -> None:
    folder.mkdir()
    for name in ENGINE:
        shutil.copyfile(places.pyodide / name, folder / name)
    later = download_locked("later", places)
    for path in (runtime.stdlib, *runtime.wheels, *later):
        shutil.copyfile(path, folder / path.name)
    parts = {"lockInfo": runtime.lock_info, "stdlib": runtime.stdlib.name,
             "wheels": [{"file": wheel.name, "size": wheel.stat().st_size} for wheel in runtime.wheels],
             "later": {wheel.name.partition("-")[0].lower(): {"file": wheel.name, "size": wheel.stat().st_size} for wheel in later},
             "engine": {"file": "pyodide.asm.wasm", "size": (folder / "pyodide.asm.wasm").stat().st_size}}
    (folder / "parts.js").write_text("/** Written by the build: what the worker loads. */\n"
                                     f"export const PARTS = {json.dumps(parts, indent=1, sort_keys=True)};\n", encoding="utf-8")


def assets(site: Path) -> list[dict]:
    """Each file of the page with its size, SHA-256 and media type, sorted by path."""
    rows = []
    for path in sorted(site.rglob("*")):
        if path.is_file() and path.name not in ("sw.js", ONE_FILE):
            content = path.read_bytes()
            rows.append({"path": path.relative_to(site).as_posix(), "size": len(content),
                         "sha256": hashlib.sha256(content).hexdigest(), "type": media_type(path.name)})
    return rows


def write_service_worker(site: Path) -> None:
    """Write sw.js for the files that lie in the folder now."""
    rows = assets(site)
    source = (WEB / "sw.js").read_text(encoding="utf-8")
    total = hashlib.sha256(source.encode() + json.dumps(rows, sort_keys=True).encode() + POLICY.encode()).hexdigest()
    for placeholder, value in (("@VERSION@", total[:16]), ("@POLICY@", POLICY)):
        if source.count(f'"{placeholder}"') != 1:
            raise BuildFailed(f'web/sw.js must hold "{placeholder}" once.')
        source = source.replace(f'"{placeholder}"', json.dumps(value))
    if source.count("/* @ASSETS@ */ []") != 1:
        raise BuildFailed("web/sw.js must hold /* @ASSETS@ */ [] once.")
    source = source.replace("/* @ASSETS@ */ []", json.dumps(rows, indent=1))
    (site / "sw.js").write_text(source, encoding="utf-8")

"""The Python of the page: Pyodide, the trimmed standard library and the compiled wheels."""
from __future__ import annotations

import json
import shutil
import zipfile
from dataclasses import dataclass
from pathlib import Path

from making.places import MAKING, ROOT, Places
from making.steps import Stamp, digest_of, run, say
from making.toolchain import download_locked, node
from making.wheel import WHEN

PACKAGE_NAME = "gasbasis"
INSIDE = MAKING / "inside"

# Of every Python started here. Without column tables in the bytecode the page is half a megabyte smaller on
# the wire; tracebacks keep their lines and lose their carets.
SETTINGS = {"PYTHONHASHSEED": "0", "PYTHONNODEBUGRANGES": "1", "PYTHONDONTWRITEBYTECODE": "1", "SOURCE_DATE_EPOCH": WHEN}

# Parts of published wheels that the page cannot use.
LEAVE_OUT = ["pint/testsuite/", "pint/default_en.txt", "pint/constants_en.txt", "uncertainties/lib1to2/", "uncertainties/unumpy/"]

# Modules of the standard library that must stay although no traced run imports them: they are
# imported inside functions, when something rare happens.
KEEP = ["base64", "datetime", "decimal", "encodings.ascii", "encodings.latin_1", "hashlib", "json", "linecache", "locale",
        "textwrap", "traceback", "unicodedata", "zlib",
        # a series: the file, the workbook (XlsxWriter), the time zones (tzdata, read out of its wheel)
        "csv", "zoneinfo", "importlib.resources", "importlib.readers", "zipfile", "tempfile", "shutil", "xml.parsers", "urllib.parse", "fractions", "struct",
        "encodings.cp1252", "encodings.utf_16", "encodings.utf_16_le", "encodings.utf_8_sig", "warnings", "copy", "uuid", "statistics"]


@dataclass(frozen=True)
class Runtime:
    """What the page's Python consists of. `wheels` are compiled, `published` as they came or were built."""

    stdlib: Path
    whole_stdlib: Path
    wheels: tuple[Path, ...]
    published: tuple[Path, ...]
    lock_info: dict


def build_runtime(wheel: Path, places: Places) -> Runtime:
    """Install the wheel inside Pyodide, compile what was installed, trim the standard library."""
    node_command = node(places)
    published = (*download_locked("page", places), wheel)
    tools = download_locked("install", places)
    whole = _whole_stdlib(node_command, places)
    wheels = _compiled_wheels(node_command, published, tools, places)
    stdlib = _trimmed_stdlib(node_command, whole, wheels, places)
    lock_info = json.loads((places.pyodide / "pyodide-lock.json").read_text())["info"]
    return Runtime(stdlib, whole, tuple(wheels), published, lock_info)


def in_pyodide(node_command: str, places: Places, *, script: str, call: str, argument: dict, why: str, mounts: dict[str, Path],
               path: list[str] = (), stdlib: Path | None = None, show: bool = False) -> object:
    """Call a function of `inside/<script>.py` in Pyodide and return what it answered."""
    folder = places.work / "jobs"
    folder.mkdir(parents=True, exist_ok=True)
    job, result = folder / f"{script}-{call}.json", folder / f"{script}-{call}.result.json"
    result.unlink(missing_ok=True)
    job.write_text(json.dumps({
        "pyodide": str(places.pyodide), "stdlib": str(stdlib or places.pyodide / "python_stdlib.zip"), "script": script, "call": call,
        "argument": argument, "path": [*path, "/inside"], "result": str(result),
        "mounts": {place: str(root) for place, root in {"/inside": INSIDE, **mounts}.items()},
        "env": SETTINGS}))
    run([node_command, MAKING / "pyodide_run.mjs", job], why=why, show=show)
    return json.loads(result.read_text())


def _whole_stdlib(node_command: str, places: Places) -> Path:
    folder = places.work / "stdlib"
    stamp = Stamp(places.work / "stamps" / "stdlib", digest_of([places.pyodide / "python_stdlib.zip", INSIDE / "compiled.py", INSIDE / "install.py"], json.dumps(SETTINGS)))
    if not stamp.fresh(folder / "stdlib.zip"):
        say("compiling the standard library with Pyodide's own Python")
        folder.mkdir(parents=True, exist_ok=True)
        in_pyodide(node_command, places, script="install", call="compile_stdlib", argument={}, why="Compiling the standard library",
                   mounts={"/pyodide": places.pyodide, "/out": folder})
        stamp.set()
    return folder / "stdlib.zip"


def _compiled_wheels(node_command: str, published: tuple[Path, ...], tools: list[Path], places: Places) -> list[Path]:
    staged, made, tool_folder = (places.work / name for name in ("staged", "wheels", "tools"))
    stamp = Stamp(places.work / "stamps" / "wheels",
                  digest_of([*published, *tools, INSIDE / "compiled.py", INSIDE / "install.py"], json.dumps([LEAVE_OUT, SETTINGS])))
    if not stamp.fresh(made):
        say("installing the wheels inside Pyodide with micropip, compiling them")
        for folder, sources in ((staged, published), (tool_folder, tools), (made, ())):
            shutil.rmtree(folder, ignore_errors=True)
            folder.mkdir(parents=True)
            for source in sources:
                shutil.copyfile(source, folder / source.name)
        in_pyodide(node_command, places, script="install", call="install", argument={"package": PACKAGE_NAME, "leave_out": LEAVE_OUT},
                   why="Installing the wheels inside Pyodide", path=[f"/tools/{tool.name}" for tool in tools],
                   mounts={"/wheels": staged, "/tools": tool_folder, "/out": made})
        stamp.set()
    return sorted(made.glob("*.whl"))


def _trimmed_stdlib(node_command: str, whole: Path, wheels: list[Path], places: Places) -> Path:
    trimmed = places.work / "trimmed" / "python314.zip"
    requests = traced_requests()
    stamp = Stamp(places.work / "stamps" / "trimmed", digest_of([whole, *wheels, INSIDE / "trace.py"], json.dumps([requests, KEEP])))
    if not stamp.fresh(trimmed):
        say("trimming the standard library to what the core uses")
        names = in_pyodide(node_command, places, script="trace", call="trace", why="Tracing the core's imports", stdlib=whole,
                           argument={"package": PACKAGE_NAME, "requests": requests, "keep": KEEP},
                           mounts={"/wheels": wheels[0].parent}, path=[f"/wheels/{wheel.name}" for wheel in wheels])
        trimmed.parent.mkdir(parents=True, exist_ok=True)
        with zipfile.ZipFile(whole) as source, zipfile.ZipFile(trimmed, "w", zipfile.ZIP_STORED) as target:
            for name in names:
                target.writestr(source.getinfo(name), source.read(name))
        stamp.set()
    return trimmed


def traced_requests() -> list[dict]:
    """Requests that take the core through its rooms: every demo sheet, each task once, and some that are wrong."""
    sheets = [json.loads(path.read_text(encoding="utf-8")) for path in sorted((ROOT / "demo").glob("*.json"))]
    requests: list[dict] = []
    for content in sheets:
        sheet = content.get("sheet", content)
        requests += [{"task": "restate", "sheet": sheet, "usual": usual} for usual in (False, True)]
    requests += [{"task": "catalogue"}, {"task": "search", "what": "species", "text": "merc"}, {"task": "nothing"}, {},
                 {"task": "restate", "sheet": {"schema": 1, "hold": "0 K of what?", "gas": "", "owe": "furlongs", "settled": {}}},
                 {"task": "edit", "side": "hold", "text": "NO 10 ppm", "field": "water", "to": "dry"}]
    return requests

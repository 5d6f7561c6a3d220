"""Runs inside Pyodide: micropip installs the wheels as published; what it installed is compiled into the page's wheels."""
from __future__ import annotations

import importlib
import importlib.metadata
import json
import os
import zipfile
from pathlib import Path

from compiled import DROP_DOCSTRINGS, KEEP_DOCSTRINGS, as_compiled, pack, record
from rooms import modules_for_the_page

SITE = Path("/lib/python3.14/site-packages")
TAG = "cp314-none-any"
NO_INDEX = "file:///no-index"           # whatever is not among our wheels must be missed, not fetched
NOT_SHIPPED = ("INSTALLER", "REQUESTED", "direct_url.json", "PYODIDE_SOURCE", "PYODIDE_URL", "PYODIDE_SHA256")


class NotLoadable(Exception):
    """The list of what the wheel misses inside Pyodide."""


async def install(argument: str) -> str:
    """Install the wheels in /wheels, prove that they load, write compiled wheels to /out. Returns their list."""
    job = json.loads(argument)
    missing = await _with_micropip(sorted(os.listdir("/wheels")))
    missing += [] if missing else _unmet_requirements(job["package"])
    missing += [] if missing else _unimportable(job["package"])
    if missing:
        raise NotLoadable("The wheel does not load inside Pyodide:\n" + "\n".join(f"  - {line}" for line in missing))
    made = [_write_wheel(distribution, job["leave_out"]) for distribution in _installed()]
    return json.dumps(made)


async def _with_micropip(names: list[str]) -> list[str]:
    import micropip
    try:
        await micropip.install([f"emfs:/wheels/{name}" for name in names], index_urls=[NO_INDEX], keep_going=True)
    except Exception as error:          # micropip reports everything that is missing in one exception
        return str(error).splitlines()
    importlib.invalidate_caches()
    return []


def _unmet_requirements(package: str) -> list[str]:
    """Each requirement, followed from the package down, that no installed distribution meets."""
    from packaging.requirements import Requirement
    unmet, seen, waiting = [], set(), [package]
    while waiting:
        name = waiting.pop()
        if name in seen:
            continue
        seen.add(name)
        for text in importlib.metadata.requires(name) or []:
            requirement = Requirement(text)
            if requirement.marker and not requirement.marker.evaluate({"extra": ""}):
                continue
            try:
                version = importlib.metadata.version(requirement.name)
            except importlib.metadata.PackageNotFoundError:
                unmet.append(f"{name} needs {requirement}: not among the wheels")
                continue
            if not requirement.specifier.contains(version, prereleases=True):
                unmet.append(f"{name} needs {requirement}: version {version} is there")
            waiting.append(requirement.name)
    return unmet


def _unimportable(package: str) -> list[str]:
    """Each module of the package whose import fails, with the reason."""
    failures = []
    for name in modules_for_the_page(package):
        try:
            importlib.import_module(name)
        except Exception as error:      # all failures belong into one list, whatever their kind
            failures.append(f"import {name}: {error!r}")
    return failures


def _installed() -> list[importlib.metadata.Distribution]:
    found = [item for item in importlib.metadata.distributions(path=[str(SITE)])]
    return sorted(found, key=lambda item: item.metadata["Name"].lower())


def _write_wheel(distribution: importlib.metadata.Distribution, leave_out: list[str]) -> dict:
    """Write one compiled wheel: .pyc inside, importable as it lies on sys.path."""
    name = distribution.metadata["Name"].replace("-", "_").lower()
    file_name = f"{name}-{distribution.version}-{TAG}.whl"
    files = {}
    for entry in distribution.files:
        path = entry.as_posix()
        if path.endswith(".pyc") or "__pycache__" in path or Path(path).name in NOT_SHIPPED or path.startswith(("..", "bin/")):
            continue
        if not any(path.startswith(prefix) for prefix in leave_out):
            files[path] = (SITE / path).read_bytes()
    about = next(path for path in files if path.endswith(".dist-info/WHEEL"))
    folder = about.rpartition("/")[0]
    files.pop(f"{folder}/RECORD", None)
    files[about] = f"Wheel-Version: 1.0\nGenerator: gasbasis build\nRoot-Is-Purelib: true\nTag: {TAG}\n".encode()
    entries = as_compiled(files, file_name, lambda path: KEEP_DOCSTRINGS)
    entries[f"{folder}/RECORD"] = record(entries, f"{folder}/RECORD")
    pack(entries, f"/out/{file_name}")
    return {"name": distribution.metadata["Name"], "version": distribution.version, "file": file_name}


def compile_stdlib(argument: str) -> str:
    """Compile the whole standard library as Pyodide ships it (/pyodide/python_stdlib.zip) into /out/stdlib.zip."""
    with zipfile.ZipFile("/pyodide/python_stdlib.zip") as archive:
        files = {name: archive.read(name) for name in archive.namelist() if not name.endswith("/")}
    entries = as_compiled(files, "python314.zip", _level_in_stdlib)
    pack(entries, "/out/stdlib.zip")
    return json.dumps({"files": len(entries)})


def _level_in_stdlib(path: str) -> int:
    """Docstrings are a sixth of the library's size on the wire; Pyodide's own modules read theirs at boot."""
    return KEEP_DOCSTRINGS if path.startswith(("_pyodide/", "pyodide/")) else DROP_DOCSTRINGS

"""Runs inside Pyodide: the core's tests on the trimmed library.

pytest needs more of the standard library than the page carries. The rest is put last on the path for it,
and refused to the core: an import that the core makes, at whatever depth, must be met by what is shipped.
"""
from __future__ import annotations

import builtins
import importlib
import json
import os
import sys
import zipfile

from rooms import modules_for_the_page

TRIMMED = "/lib/python314.zip"


def run_tests(argument: str) -> str:
    """Import everything of the core on the trimmed library alone, then run pytest. Returns its status."""
    job = json.loads(argument)
    _import_all(job["package"])
    _append_rest(job["rest"])
    sys.path.append(job["runner"])
    _guard(job["package"], job["rest"])
    os.chdir("/repository")
    import pytest
    status = pytest.main([*job["tests"], "-p", "no:faulthandler", "-p", "no:cacheprovider", "-W", "ignore::pytest.PytestUnknownMarkWarning"])
    return json.dumps({"status": int(status)})


def _import_all(package: str) -> None:
    for name in modules_for_the_page(package):
        importlib.import_module(name)


def _append_rest(rest: str) -> None:
    """Put the whole library behind the trimmed one, also inside the packages of which the trimmed one has a part."""
    with zipfile.ZipFile(TRIMMED) as archive:
        packages = [name.removesuffix("/__init__.pyc").replace("/", ".") for name in archive.namelist() if name.endswith("/__init__.pyc")]
    for name in packages:
        importlib.import_module(name).__path__.append(f"{rest}/{name.replace('.', '/')}")
    sys.path.append(rest)
    importlib.invalidate_caches()


def _guard(package: str, rest: str) -> None:
    """Refuse the core whatever lies only in the rest of the standard library."""
    plain_import = builtins.__import__

    def guarded(name, globals=None, locals=None, fromlist=(), level=0):
        module = plain_import(name, globals, locals, fromlist, level)
        origin = getattr(sys.modules.get(name, module), "__file__", None) or ""
        if origin.startswith(rest) and _asked_by(package):
            raise ModuleNotFoundError(f"{name} is not in the trimmed library, and {package} imports it. Add it to KEEP in runtime.py.")
        return module

    builtins.__import__ = guarded


def _asked_by(package: str) -> bool:
    """True when a function of the core is among the callers."""
    frame = sys._getframe(2)
    while frame is not None:
        name = frame.f_globals.get("__name__", "")
        if name == package or name.startswith(package + "."):
            return True
        frame = frame.f_back
    return False

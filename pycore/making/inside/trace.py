"""Runs inside Pyodide: works the core hard and reports which modules of the standard library that took."""
from __future__ import annotations

import importlib
import json
import sys

from rooms import modules_for_the_page

STDLIB = "/lib/python314.zip/"


def trace(argument: str) -> str:
    """Import everything of the core, answer the requests, import the kept modules. Returns file names in the zip."""
    job = json.loads(argument)
    package = job["package"]
    for name in modules_for_the_page(package):
        importlib.import_module(name)
    answer = importlib.import_module(f"{package}.answer").answer
    for request in job["requests"]:
        answer(json.dumps(request))
    for name in job["keep"]:
        importlib.import_module(name)
    return json.dumps(sorted(_files()))


def _files() -> set[str]:
    found = set()
    for module in list(sys.modules.values()):
        origin = getattr(getattr(module, "__spec__", None), "origin", None) or getattr(module, "__file__", None) or ""
        if origin.startswith(STDLIB):
            found.add(origin.removeprefix(STDLIB))
    return found

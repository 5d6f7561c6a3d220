"""Every test: first the core's inside Pyodide on the trimmed build, then everything under CPython and in the browser."""
from __future__ import annotations

import shutil
import subprocess
import sys
from pathlib import Path

from making import browser_find
from making.places import ROOT, VENV, VENV_PYTHON, Places
from making.runtime import PACKAGE_NAME, Runtime, in_pyodide
from making.steps import say
from making.toolchain import install_locked, node

IN_PYODIDE = ("tests/core", "tests/published", "tests/contract")
RUNNER = ("pytest", "_pytest", "py.py", "pluggy", "iniconfig", "packaging", "pygments")


def run_tests(runtime: Runtime, places: Places, chosen: list[str]) -> int:
    """Run the tests and return the exit status. With pytest arguments, only what they choose, under CPython."""
    install_locked("test")
    environment = {**browser_find.clean_environment(), browser_find.VARIABLE: browser_find.find_or_install(), "GASBASIS_DIST": str(places.dist),
                   "PYTHONDONTWRITEBYTECODE": "1"}
    inside = 0 if chosen else run_inside_pyodide(runtime, places)
    if inside:
        say("The core's tests FAILED inside Pyodide (above): this run fails, whatever follows.")
    say(f"\n== under CPython {sys.version.split()[0]} and in the browser")
    command = [VENV_PYTHON, "-m", "pytest", *(chosen or ["tests"])]
    outside = subprocess.run([str(word) for word in command], cwd=ROOT, env=environment).returncode
    return inside or outside


def run_inside_pyodide(runtime: Runtime, places: Places) -> int:
    """The core's own tests in the page's Python, on the trimmed library. Returns pytest's exit status."""
    say("== inside Pyodide, on the trimmed build")
    runner = places.work / "runner"
    _gather_runner(runner)
    wheels = runtime.wheels[0].parent
    result = in_pyodide(node(places), places, script="run_tests", call="run_tests", why="The tests inside Pyodide", show=True,
                        stdlib=runtime.stdlib, path=[f"/wheels/{wheel.name}" for wheel in runtime.wheels],
                        mounts={"/wheels": wheels, "/runner": runner, "/repository": ROOT, "/whole": runtime.whole_stdlib.parent},
                        argument={"package": PACKAGE_NAME, "tests": list(IN_PYODIDE), "runner": "/runner", "rest": "/whole/stdlib.zip"})
    return result["status"]


def _gather_runner(folder: Path) -> None:
    """pytest and what it needs, out of .venv: pure Python, so the same files serve inside Pyodide."""
    library = next(VENV.glob("lib/python*/site-packages"), VENV / "Lib" / "site-packages")
    shutil.rmtree(folder, ignore_errors=True)
    folder.mkdir(parents=True)
    for name in RUNNER:
        if name.endswith(".py"):
            shutil.copyfile(library / name, folder / name)
        else:
            shutil.copytree(library / name, folder / name, ignore=shutil.ignore_patterns("__pycache__"))
    for about in library.glob("pytest-*.dist-info"):
        shutil.copytree(about, folder / about.name)

"""The ordinary wheel of gasbasis: built once, run by the page, the tests and the terminal alike."""
from __future__ import annotations

import shutil
from pathlib import Path

from making.places import MAKING, PACKAGE, ROOT, VENV, VENV_PYTHON, Places
from making.steps import BuildFailed, Stamp, digest_of, run, say

WHEN = "1767225600"                     # 2026-01-01, the date of every file in every archive we write


def build_wheel(places: Places) -> Path:
    """Build gasbasis-<version>-py3-none-any.whl into the work folder and return its path."""
    folder = places.work / "wheel"
    sources = [path for path in sorted(PACKAGE.rglob("*")) if path.is_file() and path.name != "facts.json" and "__pycache__" not in path.parts]
    about = [ROOT / name for name in ("pyproject.toml", "LICENSE") if (ROOT / name).exists()]
    names = " ".join(path.relative_to(ROOT).as_posix() for path in sources)
    stamp = Stamp(places.work / "stamps" / "wheel",
                  digest_of([*sources, *about, MAKING / "wheel_hook.py", MAKING / "compile_facts.py"], names))
    if not stamp.fresh(folder):
        say("building the wheel of gasbasis")
        shutil.rmtree(folder, ignore_errors=True)
        folder.mkdir(parents=True)
        run([VENV_PYTHON, "-m", "hatchling", "build", "-t", "wheel", "-d", folder], why="Building the wheel", cwd=ROOT,
            env={"SOURCE_DATE_EPOCH": WHEN})
        stamp.set()
    wheels = list(folder.glob("gasbasis-*.whl"))
    if len(wheels) != 1:
        raise BuildFailed(f"One wheel was expected in {folder}, found {len(wheels)}. Delete the folder and build again.")
    return wheels[0]


def install_wheel(wheel: Path) -> None:
    """Install the wheel into .venv, so that tests and terminal run what the page runs."""
    stamp = Stamp(ROOT / ".build" / "stamps" / "venv-gasbasis", digest_of([wheel], str(VENV.stat().st_ino)))
    if stamp.fresh():
        return
    run([VENV_PYTHON, "-m", "pip", "install", "-q", "--disable-pip-version-check", "--no-deps", "--no-index", "--force-reinstall", wheel],
        why="Installing the wheel into .venv")
    stamp.set()

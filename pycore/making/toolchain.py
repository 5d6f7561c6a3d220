"""The pinned tools: a virtual environment, the wheels of the page, and Pyodide from npm."""
from __future__ import annotations

import json
import os
import shutil
import subprocess
import sys
from pathlib import Path

from making.places import LOCKS, ROOT, VENV, VENV_PYTHON, Places
from making.steps import BuildFailed, Stamp, digest_of, run, say

OLDEST_PYTHON = (3, 11)
PAGE_PYTHON = "3.14"                    # what the pinned Pyodide is built from


def venv() -> Path:
    """The virtual environment's Python, made if it is missing."""
    if sys.version_info < OLDEST_PYTHON:
        raise BuildFailed(f"Python {sys.version.split()[0]} was found; 3.11 or newer is needed.")
    if not _has_pip():
        say("making .venv")
        if not _make_venv():
            install_debian_packages("python3-venv", what="Python's venv module is missing")
            if not _make_venv():
                raise BuildFailed("The virtual environment could not be made. Run: python3 -m venv .venv")
    return VENV_PYTHON


def _has_pip() -> bool:
    if not VENV_PYTHON.exists():
        return False
    return subprocess.run([VENV_PYTHON, "-m", "pip", "--version"], capture_output=True).returncode == 0


def _make_venv() -> bool:
    return subprocess.run([sys.executable, "-m", "venv", VENV], capture_output=True).returncode == 0 and _has_pip()


def install_debian_packages(*packages: str, what: str) -> None:
    """Install Debian packages when that is allowed; otherwise name the one command that does it."""
    command = f"apt-get install -y {' '.join(packages)}"
    root = hasattr(os, "geteuid") and os.geteuid() == 0
    if not root or not shutil.which("apt-get"):
        raise BuildFailed(f"{what}. Run: {'' if root else 'sudo '}{command}")
    say(f"{what}: {command}")
    quiet = {"DEBIAN_FRONTEND": "noninteractive"}
    run(["apt-get", "update", "-q"], why="Reading Debian's package lists", env=quiet)
    run(command.split()[:3] + ["--no-install-recommends", *packages], why=f"Installing {', '.join(packages)}", env=quiet)


def install_locked(name: str) -> None:
    """Install `locks/<name>.lock` into the virtual environment, every file checked by its hash."""
    lock = LOCKS / f"{name}.lock"
    stamp = Stamp(ROOT / ".build" / "stamps" / f"venv-{name}", digest_of([lock], str(VENV.stat().st_ino)))
    if stamp.fresh():
        return
    say(f"installing {lock.relative_to(ROOT)} into .venv")
    run([VENV_PYTHON, "-m", "pip", "install", "-q", "--disable-pip-version-check", "--require-hashes", "--no-deps", "-r", lock],
        why=f"Installing {lock.name}")
    stamp.set()


def download_locked(name: str, places: Places) -> list[Path]:
    """The pure-Python wheels of a lock file as published, for use inside Pyodide."""
    lock, folder = LOCKS / f"{name}.lock", places.downloads / name
    stamp = Stamp(ROOT / ".build" / "stamps" / f"downloads-{name}", digest_of([lock]))
    if not stamp.fresh(folder):
        say(f"fetching the wheels of {lock.relative_to(ROOT)}")
        shutil.rmtree(folder, ignore_errors=True)
        run([VENV_PYTHON, "-m", "pip", "download", "-q", "--disable-pip-version-check", "--require-hashes", "--no-deps",
             "--only-binary=:all:", "--python-version", PAGE_PYTHON, "--implementation", "py", "--abi", "none",
             "--platform", "any", "-d", folder, "-r", lock], why=f"Fetching the wheels of {lock.name}")
        stamp.set()
    return sorted(folder.glob("*.whl"))


def node(places: Places) -> str:
    """The `node` command, with the pinned Pyodide installed beside it."""
    node_command, npm_command = shutil.which("node"), shutil.which("npm")
    if not node_command or not npm_command:
        install_debian_packages("nodejs", "npm", what="Node with npm is missing")
        node_command, npm_command = shutil.which("node"), shutil.which("npm")
    lock = LOCKS / "package-lock.json"
    stamp = Stamp(ROOT / ".build" / "stamps" / "node", digest_of([LOCKS / "package.json", lock]))
    if not stamp.fresh(places.pyodide / "pyodide.asm.wasm"):
        say("installing Pyodide from npm")
        places.node.mkdir(parents=True, exist_ok=True)
        for name in ("package.json", "package-lock.json"):
            shutil.copyfile(LOCKS / name, places.node / name)
        run([npm_command, "ci", "--ignore-scripts", "--no-audit", "--no-fund"], why="npm ci", cwd=places.node)
        stamp.set()
    return node_command


def pyodide_version() -> str:
    return json.loads((LOCKS / "package.json").read_text())["dependencies"]["pyodide"]

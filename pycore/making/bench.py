"""`build.py bench`: builds the page and its stock twin, measures both in one browser, compares with the targets."""
from __future__ import annotations

import subprocess

from making import browser_find
from making.places import ROOT, VENV_PYTHON, Places
from making.runtime import Runtime
from making.steps import say
from making.stock import build_stock
from making.toolchain import install_locked


def run_bench(runtime: Runtime, places: Places) -> int:
    """Run every bench in the virtual environment, which has the browser driver. Exit status 1 when a target is missed."""
    install_locked("test")
    chromium = browser_find.find_or_install()
    say("building the same page on the stock set-up")
    stock = build_stock(runtime, places)
    command = [VENV_PYTHON, "-m", "making.bench_pages", places.dist, stock, chromium]
    environment = {**browser_find.clean_environment(), "PYTHONPATH": str(ROOT / "pycore"), "PYTHONDONTWRITEBYTECODE": "1"}
    return subprocess.run([str(word) for word in command], cwd=ROOT, env=environment).returncode

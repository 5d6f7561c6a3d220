"""Where things lie. Every part of the build takes its folders from here."""
from __future__ import annotations

import os
from dataclasses import dataclass
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]
LOCKS = ROOT / "locks"
WEB = ROOT / "web"
DEMO = ROOT / "demo"
PACKAGE = ROOT / "pycore" / "gasbasis"
MAKING = ROOT / "pycore" / "making"
VENV = ROOT / ".venv"
VENV_PYTHON = VENV / ("Scripts/python.exe" if os.name == "nt" else "bin/python")


@dataclass(frozen=True)
class Places:
    """The folders one build writes to: `work` holds what is made on the way, `dist` the page."""

    work: Path = ROOT / ".build"
    dist: Path = ROOT / "dist"

    @property
    def node(self) -> Path:
        """Where npm installs; shared by every build, since the lock decides what is in it."""
        return ROOT / ".build" / "node"

    @property
    def pyodide(self) -> Path:
        return self.node / "node_modules" / "pyodide"

    @property
    def downloads(self) -> Path:
        """Wheels as published, checked by hash; shared like `node`."""
        return ROOT / ".build" / "downloads"

"""Hatch's hook: compile the tables of facts into the one JSON file that the wheel carries."""
from __future__ import annotations

import subprocess
import sys
from pathlib import Path

from hatchling.builders.hooks.plugin.interface import BuildHookInterface


class FactsHook(BuildHookInterface):
    def initialize(self, version: str, build_data: dict) -> None:
        """Run the compiler of the tables in its own process. A row it refuses fails the build."""
        script = Path(self.root) / "pycore" / "making" / "compile_facts.py"
        result = subprocess.run([sys.executable, script], capture_output=True, text=True)
        if result.returncode:
            raise SystemExit(f"The tables of facts were refused:\n{result.stdout}{result.stderr}")

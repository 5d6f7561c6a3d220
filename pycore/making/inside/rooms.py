"""Which modules of a package the page can use: all but the terminal's doors, which need a command line."""
from __future__ import annotations

import importlib
import pkgutil

_TERMINAL = (".__main__", ".terminal")


def modules_for_the_page(package: str) -> list[str]:
    """The names of the package's modules, without those of the terminal."""
    found = pkgutil.walk_packages(importlib.import_module(package).__path__, package + ".")
    return [module.name for module in found if not module.name.endswith(_TERMINAL)]

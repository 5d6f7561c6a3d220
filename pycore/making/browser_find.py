"""Finding a Chromium to test with."""
from __future__ import annotations

import os
import shutil
from pathlib import Path

from making.steps import BuildFailed, say
from making.toolchain import install_debian_packages

VARIABLE = "GASBASIS_CHROMIUM"          # a path given here is taken before any other
COMMANDS = ("chromium", "chromium-browser", "google-chrome", "google-chrome-stable")
PATHS = ("/usr/bin/chromium", "/usr/lib/chromium/chromium")
MANAGED = ("chromium-*/chrome-linux*/chrome", "chromium-*/chrome-mac*/Chromium.app/Contents/MacOS/Chromium", "chromium-*/chrome-win*/chrome.exe")

# What a Chromium needs to run without a screen, as root, and to talk to nobody of its own accord.
ARGUMENTS = ("--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run", "--disable-background-networking",
             "--disable-component-update", "--disable-sync", "--disable-dev-shm-usage")


def find() -> str | None:
    """The path of a Chromium, or None."""
    given = os.environ.get(VARIABLE)
    if given:
        return given
    for command in COMMANDS:
        if shutil.which(command):
            return shutil.which(command)
    return next((path for path in PATHS if Path(path).exists()), None) or _managed()


def _managed() -> str | None:
    """One that Playwright keeps for itself, the newest first."""
    home = Path(os.environ.get("PLAYWRIGHT_BROWSERS_PATH") or Path.home() / ".cache" / "ms-playwright")
    found = [path for pattern in MANAGED for path in home.glob(pattern)]
    return str(max(found, key=lambda path: path.stat().st_mtime)) if found else None


def find_or_install() -> str:
    """The path of a Chromium. On Debian as root it is installed when there is none; else BuildFailed names the command."""
    found = find()
    if not found:
        install_debian_packages("chromium", what="No Chromium was found")
        found = find()
    if not found:
        raise BuildFailed(f"No Chromium was found. Install one, or set {VARIABLE} to the path of one.")
    say(f"browser: {found}")
    return found


def clean_environment() -> dict[str, str]:
    """The environment without what would put other sources before the installed wheel."""
    return {name: value for name, value in os.environ.items() if name != "PYTHONPATH"}

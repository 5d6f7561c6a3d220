"""dist/licences.txt: the licence of the project and of everything bundled, from the packages' own files."""
from __future__ import annotations

import json
import zipfile
from email.parser import Parser
from pathlib import Path

from making.libraries import licences_of_libraries
from making.places import ROOT, Places
from making.runtime import Runtime
from making.steps import BuildFailed

RULE = "=" * 78
LINKED_IN = """The WebAssembly file of Pyodide is linked by its project with parts of Emscripten (MIT or NCSA) and with C
libraries under permissive licences. Source and full list: the Pyodide project, at the version named above."""


def licences_text(runtime: Runtime, places: Places) -> str:
    """One text: a section for each bundled part. Raises BuildFailed when a wheel carries no licence."""
    sections = [("gasbasis", "MIT", (ROOT / "LICENSE").read_text(encoding="utf-8"))]
    for wheel in runtime.published:
        if not wheel.name.startswith("gasbasis-"):
            sections.append(_of_wheel(wheel))
    sections += [_of_wheel(wheel) for wheel in sorted((places.downloads / "later").glob("*.whl"))]
    sections += _of_engine(places) + licences_of_libraries(places)
    return "\n".join(f"{RULE}\n{title}\nLicence: {licence}\n{RULE}\n\n{text.strip()}\n" for title, licence, text in sections)


def _of_wheel(wheel: Path) -> tuple[str, str, str]:
    with zipfile.ZipFile(wheel) as archive:
        names = archive.namelist()
        about = next(name for name in names if name.endswith(".dist-info/METADATA"))
        metadata = Parser().parsestr(archive.read(about).decode("utf-8"))
        folder = about.rpartition("/")[0] + "/"
        files = [name for name in sorted(names) if name.startswith(folder) and
                 any(word in name.rpartition("/")[2].upper() for word in ("LICENSE", "LICENCE", "COPYING", "AUTHORS", "NOTICE"))]
        texts = [archive.read(name).decode("utf-8") for name in files]
    if not texts:
        raise BuildFailed(f"{wheel.name} carries no licence file. It cannot be bundled before that is settled.")
    named = metadata["License-Expression"] or _classified(metadata) or (metadata["License"] or "").split("\n")[0] or "see the text"
    return f"{metadata['Name']} {metadata['Version']}", named, "\n\n".join(texts)


def _classified(metadata) -> str:
    found = [line.rpartition(" :: ")[2] for line in metadata.get_all("Classifier", []) if line.startswith("License ::")]
    return ", ".join(found)


def _of_engine(places: Places) -> list[tuple[str, str, str]]:
    """Pyodide and the Python inside it.

    Their npm package names the licence and prints no text. The texts are those of the wheels of the
    same two projects: micropip (Pyodide, MPL-2.0) and typing_extensions (Python, PSF-2.0).
    """
    package = json.loads((places.pyodide / "package.json").read_text(encoding="utf-8"))
    pyodide_text = _of_wheel(_one(places.downloads / "install", "micropip"))[2]
    python_text = _of_wheel(_one(places.downloads / "page", "typing_extensions"))[2]
    if "Mozilla Public License Version 2.0" not in pyodide_text or "PYTHON SOFTWARE FOUNDATION LICENSE" not in python_text:
        raise BuildFailed("The licence texts of Pyodide and Python are no longer where the build takes them from. See licences.py.")
    python = (places.pyodide / "pyodide-lock.json").read_text(encoding="utf-8")
    version = json.loads(python)["info"]["python"]
    return [(f"Pyodide {package['version']}", package["license"], f"{LINKED_IN}\n\n{pyodide_text}"),
            (f"Python {version}: its interpreter and standard library, compiled and trimmed", "PSF-2.0", python_text)]


def _one(folder: Path, name: str) -> Path:
    return next(folder.glob(f"{name}-*.whl"))

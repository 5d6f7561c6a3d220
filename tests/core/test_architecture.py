"""The house stays as it was drawn: imports run downwards, pint has one door, physics knows no tables, the page no science."""
from __future__ import annotations

import ast
import sys
from pathlib import Path

import pytest

pytestmark = pytest.mark.native         # reads the sources, which the page does not carry

ROOT = Path(__file__).resolve().parents[2]
PACKAGE = ROOT / "pycore" / "gasbasis"
FLOORS = {"facts": 1, "physics": 1, "relations": 2, "language": 2, "calculation": 3, "records": 4, "series": 4}
DOORS = ("answer.py", "__main__.py")
DOOR_FLOOR = 5
ANYWHERE = ("errors", "__version__")
LONGEST_FILE = 500                      # lines; 400 is the aim
LONGEST_WEB_FILE = 500
SCIENCE = ("273.15", "8.314", "22.4")

MODULES = sorted(PACKAGE.rglob("*.py"))
OTHER_CODE = sorted((ROOT / "pycore" / "making").rglob("*.py")) + [ROOT / "build.py"]
WEB_FILES = sorted(path for path in (ROOT / "web").rglob("*") if path.suffix in (".js", ".html", ".css"))


def name_of(path: Path) -> str:
    return path.relative_to(ROOT).as_posix()


def imports_of(path: Path) -> list[tuple[str, int]]:
    """Every imported module of a file as an absolute dotted name, with its line. `from a import b` gives a.b."""
    found = []
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.Import):
            found += [(alias.name, node.lineno) for alias in node.names]
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, f"{name_of(path)}:{node.lineno}: imports are written in full here"
            found += [(f"{node.module}.{alias.name}", node.lineno) for alias in node.names]
    return found


def room_of(path: Path) -> str:
    """The room (folder) of a module inside the package; "" for files at the top."""
    parts = path.relative_to(PACKAGE).parts
    return parts[0] if len(parts) > 1 else ""


def wrong_way(path: Path) -> list[str]:
    """The imports of a module that do not run downwards."""
    own_room = room_of(path)
    own_floor = FLOORS.get(own_room, DOOR_FLOOR if path.name in DOORS else 0)
    wrong = []
    for name, line in imports_of(path):
        parts = name.split(".")
        if parts[0] != "gasbasis" or len(parts) == 1 or parts[1] in ANYWHERE:
            continue
        room = parts[1]
        if room != own_room and not FLOORS.get(room, DOOR_FLOOR) < own_floor:
            if not (path.name == "__main__.py" and room == "answer"):
                wrong.append(f"{name_of(path)}:{line} imports {name}")
    return wrong


def test_every_room_stands_on_a_floor():
    rooms = {path.name for path in PACKAGE.iterdir() if path.is_dir() and path.name != "__pycache__"}
    assert rooms == set(FLOORS)


@pytest.mark.parametrize("path", MODULES, ids=name_of)
def test_imports_run_downwards(path):
    assert wrong_way(path) == []


@pytest.mark.parametrize("room, text", [("relations", "from gasbasis.calculation.restate import restate"),
                                         ("language", "import gasbasis.relations"), ("records", "from gasbasis import answer")])
def test_an_import_that_runs_upwards_is_seen(room, text, tmp_path, monkeypatch):
    """The check itself, on a file that breaks the rule."""
    monkeypatch.setattr(sys.modules[__name__], "PACKAGE", tmp_path)
    monkeypatch.setattr(sys.modules[__name__], "ROOT", tmp_path)
    (tmp_path / room).mkdir()
    (tmp_path / room / "breach.py").write_text(text + "\n")
    assert len(wrong_way(tmp_path / room / "breach.py")) == 1


@pytest.mark.parametrize("path", [path for path in MODULES if room_of(path) == "physics"], ids=name_of)
def test_physics_imports_only_the_elementary_functions(path):
    allowed = ("math", "__future__", "typing") if path.name == "elementary.py" else ("gasbasis.physics.elementary", "__future__", "typing")
    assert [name for name, _ in imports_of(path) if not name.startswith(allowed)] == []


def test_pint_has_one_door():
    importers = {name_of(path) for path in MODULES if any(name.split(".")[0] == "pint" for name, _ in imports_of(path))}
    assert importers == {"pycore/gasbasis/language/units.py"}


# Loaded only when somebody asks for a workbook or for whole columns; the wheel names them as extras.
EXTRAS = {"pycore/gasbasis/series/workbook.py": {"xlsxwriter"}, "pycore/gasbasis/series/columns.py": {"polars"}}


def test_the_core_needs_nothing_but_what_the_wheel_names():
    allowed = {"gasbasis", "pint", "uncertainties", *sys.stdlib_module_names}
    foreign = [f"{name_of(path)}:{line} imports {name}" for path in MODULES for name, line in imports_of(path)
               if name.split(".")[0] not in allowed | EXTRAS.get(name_of(path), set())]
    assert foreign == []


@pytest.mark.parametrize("path", MODULES + OTHER_CODE, ids=name_of)
def test_files_stay_short(path):
    assert len(path.read_text(encoding="utf-8").splitlines()) <= LONGEST_FILE


@pytest.mark.parametrize("path", WEB_FILES, ids=name_of)
def test_web_files_stay_short(path):
    assert len(path.read_text(encoding="utf-8").splitlines()) <= LONGEST_WEB_FILE


@pytest.mark.parametrize("path", WEB_FILES, ids=name_of)
def test_the_page_holds_no_science(path):
    text = path.read_text(encoding="utf-8")
    assert [number for number in SCIENCE if number in text] == []


@pytest.mark.parametrize("path", [path for path in WEB_FILES if path.suffix == ".js"], ids=name_of)
def test_the_page_holds_no_python_and_writes_no_markup(path):
    text = path.read_text(encoding="utf-8")
    assert [word for word in ("innerHTML", "outerHTML", "insertAdjacentHTML", "document.write", "runPython", "eval(") if word in text] == []


def test_build_door_is_thin():
    assert len((ROOT / "build.py").read_text(encoding="utf-8").splitlines()) < 200

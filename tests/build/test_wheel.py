"""The wheel: what is in it, what it says of itself, and that it is what the tests and the terminal run."""
from __future__ import annotations

import importlib.metadata
import json
import subprocess
import sys
import tomllib
import zipfile
from email.parser import Parser
from pathlib import Path

import gasbasis
import pytest

pytestmark = pytest.mark.native
ROOT = Path(__file__).resolve().parents[2]


@pytest.fixture(scope="module")
def wheel() -> zipfile.ZipFile:
    (path,) = (ROOT / ".build" / "wheel").glob("gasbasis-*.whl")
    with zipfile.ZipFile(path) as archive:
        yield archive


@pytest.fixture(scope="module")
def metadata(wheel):
    (name,) = [name for name in wheel.namelist() if name.endswith(".dist-info/METADATA")]
    return Parser().parsestr(wheel.read(name).decode())


def test_metadata_names_version_python_and_requirements(metadata):
    assert metadata["Name"] == "gasbasis"
    assert metadata["Version"] == gasbasis.__version__
    assert metadata["Requires-Python"] == ">=3.11"
    required = metadata.get_all("Requires-Dist")
    assert sorted(name for name in required if "extra ==" not in name) == ["pint==0.25.3", "uncertainties==3.2.3"]
    assert {name.partition(" ")[0].partition("=")[0].partition(">")[0].partition(";")[0] for name in required if "extra ==" in name} == {"tzdata", "polars", "xlsxwriter"}
    assert metadata["License-Expression"] == "MIT"


def test_the_version_has_one_home():
    project = tomllib.loads((ROOT / "pyproject.toml").read_text())["project"]
    assert project["dynamic"] == ["version"] and "version" not in project


def test_facts_go_in_as_one_json_and_no_toml(wheel):
    names = wheel.namelist()
    assert [name for name in names if name.endswith((".toml", ".pyc"))] == []
    facts = json.loads(wheel.read("gasbasis/facts/facts.json"))
    assert len(facts) > 3
    assert "gasbasis/language/units.txt" in names


def test_nothing_of_the_build_goes_in(wheel):
    outside = [name for name in wheel.namelist() if not name.startswith(("gasbasis/", f"gasbasis-{gasbasis.__version__}.dist-info/"))]
    assert outside == []


def test_every_module_of_the_sources_goes_in(wheel):
    package = ROOT / "pycore" / "gasbasis"
    modules = {f"gasbasis/{path.relative_to(package).as_posix()}" for path in package.rglob("*.py")}
    assert modules == {name for name in wheel.namelist() if name.endswith(".py")}


def test_the_tests_run_the_wheel():
    """Not the sources: page, tests and terminal run the same thing. Set off by PYTHONPATH, for work on the core."""
    if str(ROOT / "pycore") in sys.path[:2]:
        pytest.skip("PYTHONPATH puts the sources first")
    assert Path(gasbasis.__file__).parent.parent.name == "site-packages"
    assert importlib.metadata.version("gasbasis") == gasbasis.__version__


def test_the_terminal_command_answers():
    command = [sys.executable, "-m", "gasbasis", "restate", "--hold", "Hg 1 ppb v/v", "--owe", "ug/m3 at 20 °C, 101.325 kPa", "--json"]
    result = subprocess.run(command, capture_output=True, text=True, cwd="/")
    assert result.returncode == 0, result.stderr
    # IUPAC atomic weight of Hg 200.59 g/mol over the ideal molar volume at 20 °C, 1 atm (24.055 L/mol): common practice, 8.3
    assert round(json.loads(result.stdout)["figure"]["value"], 1) == 8.3

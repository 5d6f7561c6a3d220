"""Setting up on a machine that lacks something: it is installed where that is allowed, else the one command is named."""
from __future__ import annotations

import re
from pathlib import Path

import pytest

pytestmark = pytest.mark.native
ROOT = Path(__file__).resolve().parents[2]
LOCKS = sorted((ROOT / "locks").glob("*.lock"))


@pytest.fixture
def toolchain(monkeypatch):
    """The toolchain as an ordinary user sees it: nothing may be installed, and nothing is."""
    from making import toolchain
    monkeypatch.setattr(toolchain.os, "geteuid", lambda: 1000)
    monkeypatch.setattr(toolchain, "run", lambda *words, **more: pytest.fail(f"ran {words}"))
    return toolchain


def failure_of(call, *arguments) -> str:
    from making.steps import BuildFailed
    with pytest.raises(BuildFailed) as failed:
        call(*arguments)
    return str(failed.value)


def test_a_missing_venv_module_names_the_command(toolchain, monkeypatch):
    monkeypatch.setattr(toolchain, "_has_pip", lambda: False)
    monkeypatch.setattr(toolchain, "_make_venv", lambda: False)
    assert "sudo apt-get install -y python3-venv" in failure_of(toolchain.venv)


def test_a_missing_node_names_the_command(toolchain, monkeypatch):
    from making.places import Places
    monkeypatch.setattr(toolchain.shutil, "which", lambda command: None)
    assert "apt-get install -y nodejs npm" in failure_of(toolchain.node, Places())


def test_a_missing_browser_names_the_command(toolchain, monkeypatch):
    from making import browser_find
    monkeypatch.setattr(browser_find, "find", lambda: None)
    assert "apt-get install -y chromium" in failure_of(browser_find.find_or_install)


def test_as_root_on_debian_the_packages_are_installed(toolchain, monkeypatch):
    commands = []
    monkeypatch.setattr(toolchain.os, "geteuid", lambda: 0)
    monkeypatch.setattr(toolchain.shutil, "which", lambda command: f"/usr/bin/{command}")
    monkeypatch.setattr(toolchain, "run", lambda words, **more: commands.append(" ".join(words)))
    toolchain.install_debian_packages("chromium", what="No Chromium was found")
    assert commands == ["apt-get update -q", "apt-get install -y --no-install-recommends chromium"]


def test_an_old_python_is_refused(toolchain, monkeypatch):
    monkeypatch.setattr(toolchain, "OLDEST_PYTHON", (99, 0))
    assert "is needed" in failure_of(toolchain.venv)


def test_the_browser_that_is_named_is_taken_first(monkeypatch):
    from making import browser_find
    monkeypatch.setenv(browser_find.VARIABLE, "/somewhere/chromium")
    assert browser_find.find() == "/somewhere/chromium"


@pytest.mark.parametrize("lock", LOCKS, ids=lambda path: path.name)
def test_every_package_is_pinned_with_its_hash_and_no_host(lock):
    text = lock.read_text()
    packages = re.split(r"\n(?=[a-z])", text)
    assert [package for package in packages if not re.match(r"[a-z0-9._-]+==[0-9][^ ]* \\\n\s+--hash=sha256:[0-9a-f]{64}", package)] == []
    assert "//" not in text


def test_npm_lock_pins_by_integrity_and_names_no_host():
    import json
    text = (ROOT / "locks" / "package-lock.json").read_text()
    packages = {name: row for name, row in json.loads(text)["packages"].items() if name}
    assert packages["node_modules/pyodide"]["version"] == json.loads((ROOT / "locks" / "package.json").read_text())["dependencies"]["pyodide"]
    assert [name for name, row in packages.items() if not row["integrity"].startswith("sha512-")] == []
    assert "resolved" not in text and "//" not in re.sub(r'"sha512-[^"]*"', "", text)


def test_a_finished_step_is_not_done_again_until_its_input_changes(tmp_path):
    from making.steps import Stamp, digest_of
    source, output = tmp_path / "source.txt", tmp_path / "output"
    source.write_text("one")
    stamp = Stamp(tmp_path / "stamps" / "step", digest_of([source]))
    assert not stamp.fresh()
    stamp.set()
    assert stamp.fresh() and not stamp.fresh(output)
    source.write_text("two")
    assert not Stamp(tmp_path / "stamps" / "step", digest_of([source])).fresh()

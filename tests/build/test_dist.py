"""What is in dist/: relative addresses only, compiled and trimmed Python, every file listed, licences, size."""
from __future__ import annotations

import hashlib
import json
import re
import zipfile
from html.parser import HTMLParser

import pytest

pytestmark = pytest.mark.native
NAMESPACES = ("http://www.w3.org/1998/Math/MathML", "http://www.w3.org/2000/svg", "http://www.w3.org/1999/xlink")
ADDRESS = re.compile(r"""https?:(?://|\\/\\/)[^\s"'`)<>\\]+""")
ONE_FILE = "gasbasis-one-file.html"      # holds the licences' texts, with their addresses; tests/browser/test_one_file.py opens it
OWN_ENDINGS = (".html", ".js", ".css", ".svg", ".webmanifest", ".json")
OUTSIDE_ADDRESSES = ("//", "http:", "https:", "/")


def own_files(dist):
    return [path for path in sorted(dist.rglob("*")) if path.suffix in OWN_ENDINGS and not {"runtime", "libraries"} & set(path.relative_to(dist).parts)
            and path.name != ONE_FILE]


class Addresses(HTMLParser):
    def __init__(self):
        super().__init__()
        self.found: list[str] = []
        self.policies: list[str] = []
        self.preloaded: list[str] = []
        self.order: list[str] = []

    def handle_starttag(self, tag, attributes):
        values = dict(attributes)
        self.order.append(tag)
        self.found += [values[name] for name in ("src", "href", "action") if values.get(name)]
        if values.get("rel") == "modulepreload":
            self.preloaded.append(values["href"])
        if values.get("http-equiv") == "Content-Security-Policy":
            self.policies.append(values["content"])
            assert "script" not in self.order and "link" not in self.order, "the policy must come before what it governs"


@pytest.fixture(scope="module")
def html(dist) -> Addresses:
    parser = Addresses()
    parser.feed((dist / "index.html").read_text(encoding="utf-8"))
    return parser


def test_no_address_of_another_host(dist):
    files = own_files(dist)
    assert len(files) > 8
    found = {path.name: [address for address in ADDRESS.findall(path.read_text(encoding="utf-8")) if not address.startswith(NAMESPACES)]
             for path in files}
    assert {name: addresses for name, addresses in found.items() if addresses} == {}


def test_addresses_in_the_page_are_relative_and_there(dist, html):
    files = [address for address in html.found if not address.startswith("#")]
    assert "js/main.js" in files
    assert [address for address in files if address.startswith(OUTSIDE_ADDRESSES)] == []
    assert [address for address in files if not (dist / address).is_file()] == []


def test_the_bundled_libraries_ask_nobody(dist):
    """They are as their projects publish them, comments and all; what counts is that they reach for nothing."""
    texts = {path.name: path.read_text(encoding="utf-8") for path in (dist / "libraries").iterdir()}
    assert set(texts) == {"idb.js", "uqr.js", "uplot.js", "uplot.css"}
    reaching = re.compile(r"\b(?:fetch|XMLHttpRequest|WebSocket|EventSource|sendBeacon|importScripts|eval)\s*\(|\bimport\s*\(|new\s+Function\b|^\s*(?:import|export)\b[^;\n]*\bfrom\s*[\"']", re.MULTILINE)
    assert {name: reaching.findall(text) for name, text in texts.items() if reaching.search(text)} == {}
    licences = (dist / "licences.txt").read_text(encoding="utf-8")
    assert all(f"{name} " in licences for name in ("idb", "uqr", "uplot"))


def test_modules_and_styles_import_by_relative_address(dist):
    pattern = re.compile(r"""(?:^|\n)\s*(?:import|export)\s[^;'"]*?from\s*["']([^"']+)["']|@import\s*(?:url\()?["']?([^"')]+)""")
    imports = [(path, match.group(1) or match.group(2)) for path in own_files(dist) if path.suffix in (".js", ".css")
               for match in pattern.finditer(path.read_text(encoding="utf-8"))]
    assert len(imports) > 2
    assert [address for _, address in imports if not address.startswith(("./", "../"))] == []
    assert [(path.name, address) for path, address in imports if not (path.parent / address).is_file()] == []


def test_every_module_of_the_page_is_fetched_at_once(dist, html):
    """Named in the head, not found level by level; a module that nothing imports would be missing here. The worker's own, and the series, come when asked."""
    modules = {path.relative_to(dist).as_posix() for folder in ("js", "libraries") for path in dist.glob(f"{folder}/**/*.js")} 
    later = {"js/main.js", "js/core-worker.js", "js/engine.js", "js/series-tasks.js", "js/regions/series.js", "js/regions/series-plot.js", "js/regions/series-results.js",
             "libraries/uplot.js"}
    assert set(html.preloaded) == modules - later and later <= modules and len(modules) > 10


def test_policy_in_the_page_is_that_of_the_server(html):
    from making.policy import POLICY
    assert html.policies == [POLICY]


def test_service_worker_lists_every_file(dist):
    source = (dist / "sw.js").read_text(encoding="utf-8")
    listed = json.loads(re.search(r"const ASSETS = (\[.*?\n\]);", source, re.DOTALL).group(1))
    there = sorted(path.relative_to(dist).as_posix() for path in dist.rglob("*") if path.is_file() and path.name not in ("sw.js", ONE_FILE))
    assert [asset["path"] for asset in listed] == there
    for asset in listed:
        content = (dist / asset["path"]).read_bytes()
        assert (asset["size"], asset["sha256"]) == (len(content), hashlib.sha256(content).hexdigest()), asset["path"]
    assert '"@' not in source


def archives(dist):
    """Those that the build writes; what a series asks for lies there as it was published."""
    return sorted([*dist.glob("runtime/*-cp314-*.whl"), *dist.glob("runtime/*.zip")])


def test_wheels_are_compiled_for_the_page(dist):
    published = {path.name.split("-")[0] for path in dist.glob("runtime/*.whl") if "-cp314-" not in path.name}
    assert published == {"tzdata", "xlsxwriter"}           # a series asks for them, as they were published
    wheels = {path.name.split("-")[0]: path for path in dist.glob("runtime/*-cp314-*.whl")}
    assert set(wheels) == {"gasbasis", "pint", "uncertainties", "flexcache", "flexparser", "platformdirs", "typing_extensions"}
    for path in wheels.values():
        assert path.name.endswith("-cp314-none-any.whl")
        with zipfile.ZipFile(path) as archive:
            assert [name for name in archive.namelist() if name.endswith(".py")] == []
            assert any(name.endswith(".pyc") for name in archive.namelist())
            (about,) = [name for name in archive.namelist() if name.endswith(".dist-info/WHEEL")]
            assert "Tag: cp314-none-any" in archive.read(about).decode()


def test_archives_know_no_time_and_no_order_of_their_own(dist):
    for path in archives(dist):
        with zipfile.ZipFile(path) as archive:
            entries = archive.infolist()
            assert {entry.date_time for entry in entries} == {(2026, 1, 1, 0, 0, 0)}, path.name
            assert {entry.compress_type for entry in entries} == {zipfile.ZIP_STORED}, path.name
            names = [entry.filename for entry in entries]
            assert names == sorted(names), path.name


def test_bytecode_is_checked_by_hash_and_never_against_a_source(dist):
    """PEP 552: flags 0b01 = hash-based, unchecked. A timestamp would change the bytes, a check would look for a source."""
    for path in archives(dist):
        with zipfile.ZipFile(path) as archive:
            flags = {int.from_bytes(archive.read(name)[4:8], "little") for name in archive.namelist() if name.endswith(".pyc")}
            assert flags == {1}, path.name


def test_library_is_trimmed_but_keeps_what_is_imported_late(dist):
    from making.runtime import KEEP
    with zipfile.ZipFile(dist / "runtime" / "python314.zip") as archive:
        names = set(archive.namelist())
    assert 100 < len(names) < 300
    assert names.isdisjoint({"argparse.pyc", "unittest/__init__.pyc", "http/server.pyc", "sqlite3/__init__.pyc"})
    built_in = {"unicodedata", "zlib"}
    kept = [name.replace(".", "/") for name in KEEP if name not in built_in]
    assert [name for name in kept if f"{name}.pyc" not in names and f"{name}/__init__.pyc" not in names] == []


def test_licences_name_everything_bundled(dist):
    text = (dist / "licences.txt").read_text(encoding="utf-8")
    for name in ("gasbasis", "pint", "uncertainties", "flexcache", "flexparser", "platformdirs", "typing_extensions", "Pyodide 314.", "Python 3.14"):
        assert re.search(rf"^{re.escape(name)}", text, re.MULTILINE | re.IGNORECASE), name
    assert "Permission is hereby granted, free of charge" in text and "Mozilla Public License Version 2.0" in text


def test_transfer_to_the_first_figure_is_within_the_budget(dist):
    """The issue's number: 6.4 MB gzip."""
    from making.sizes import wire_sizes
    assert sum(wire_sizes(dist).values()) / 1e6 <= 6.4


def test_the_change_log_begins_with_this_version_and_says_whether_numbers_change(dist):
    from gasbasis import __version__
    changes = json.loads((dist / "changes.json").read_text(encoding="utf-8"))
    assert changes[0]["version"] == __version__ and all(entry["numbers"].strip() and entry["date"] for entry in changes)

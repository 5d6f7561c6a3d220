"""The one-file edition: the whole of dist/ in a single .html that opens from a file manager, without a server.

The same sources as the served page, bundled by esbuild; only three modules that say where things come from are its own
(making/one_file/*.js). Files are gzip in base64 and unpacked by the page.
"""
from __future__ import annotations

import base64
import gzip
import hashlib
import html
import re
import shutil
from pathlib import Path

from making.media import media_type
from making.places import MAKING, Places
from making.steps import BuildFailed, run

NAME = "gasbasis-one-file.html"
LARGEST_MB = 10.0
_OWN = MAKING / "one_file"
_REPLACED = ("worker-source.js", "engine.js", "offline.js")
_BASE = "one-file:///js/main.js"                # stands for the address a module was loaded from


def write_one_file(site: Path, places: Places) -> Path:
    """Write the edition into the built site and return it. Raises BuildFailed above 10 MB."""
    work = places.work / "one_file"
    shutil.rmtree(work, ignore_errors=True)
    shutil.copytree(site, work, ignore=shutil.ignore_patterns("sw.js", NAME))
    for name in _REPLACED:
        shutil.copyfile(_OWN / name, work / "js" / name)
    page = (_OWN / "page-head.js").read_text(encoding="utf-8") + _bundled("js/main.js", work, places, "unpackAll().then(() => {", "});")
    worker = (_OWN / "worker-head.js").read_text(encoding="utf-8") + _bundled("js/core-worker.js", work, places)
    text = _page(work, page, {"worker": (worker.encode(), "text/javascript"), **_files(work)})
    target = site / NAME
    target.write_text(text, encoding="utf-8")
    size = target.stat().st_size / 1e6
    if size > LARGEST_MB:
        raise BuildFailed(f"The one-file edition has {size:.2f} MB; {LARGEST_MB} MB are allowed.")
    return target


def _bundled(entry: str, work: Path, places: Places, before: str = "", behind: str = "") -> str:
    """One script from a module and all it imports. Run from its folder: the bundler writes paths into the text."""
    text = run([_esbuild(places), entry, "--bundle", "--format=iife", "--platform=browser", "--target=es2022", "--minify-whitespace", "--charset=utf8",
                f'--define:import.meta.url="{_BASE}"', "--external:node:*", "--external:ws", "--log-level=error"], why="bundling the one-file edition", cwd=work)
    return f"{before}{text}{behind}\n"


def _esbuild(places: Places) -> Path:
    """The bundler's program for this machine; npm takes the one package that fits."""
    found = sorted((places.node / "node_modules" / "@esbuild").glob("*/bin/esbuild")) + sorted((places.node / "node_modules" / "@esbuild").glob("*/esbuild.exe"))
    if not found:
        raise BuildFailed("npm installed no esbuild for this machine.\n  Delete .build/node and build again.")
    return found[0]


def _files(work: Path) -> dict[str, tuple[bytes, str]]:
    """What the page and the worker fetch while they run: the engine, the library, the wheels, the examples."""
    paths = [path for path in sorted((work / "runtime").iterdir()) if path.suffix in (".wasm", ".zip", ".whl")]
    paths += sorted((work / "demo").glob("*"))
    return {path.relative_to(work).as_posix(): (path.read_bytes(), media_type(path.name)) for path in paths}


def _page(work: Path, script: str, files: dict[str, tuple[bytes, str]]) -> str:
    text = (work / "index.html").read_text(encoding="utf-8")
    styles: list[str] = []

    def styled(found: re.Match) -> str:
        styles.append((work / found["href"]).read_text(encoding="utf-8"))
        media = f' media="{found["media"]}"' if found["media"] else ""
        return f"<style{media}>{styles[-1]}</style>"

    text = re.sub(r'<link rel="stylesheet" href="(?P<href>[^"]+)"(?: media="(?P<media>[^"]+)")?>', styled, text)
    text = re.sub(r'<meta http-equiv="Content-Security-Policy"[^>]*>\n?|<link rel="(?:modulepreload|manifest|apple-touch-icon)"[^>]*>\n?|<script type="module"[^>]*></script>\n?', "", text)
    icon = base64.b64encode((work / "icons" / "icon.svg").read_bytes()).decode()
    text = text.replace('href="icons/icon.svg"', f'href="data:image/svg+xml;base64,{icon}"')
    text = re.sub(r'<p [^>]*data-part="one-file"[^>]*>.*?</p>\n?', "", text)
    licences = html.escape((work / "licences.txt").read_text(encoding="utf-8"))
    text = re.sub(r'<a href="licences.txt">([^<]*)</a>', lambda found: f"<details><summary>{found[1]}</summary><pre>{licences}</pre></details>", text)
    text = re.sub(r'<p (class="quiet licences")>(<details>.*?</details>)</p>', r"<div \1>\2</div>", text, flags=re.DOTALL)
    script = script.replace("</script", "<\\/script")
    policy = (f"default-src 'none'; script-src {_hash(script)} blob: 'wasm-unsafe-eval'; worker-src blob:; style-src {' '.join(map(_hash, styles))}; "
              "img-src data: blob:; base-uri 'none'; form-action 'none'")
    packed = "".join(f'<script type="application/octet-stream" data-file="{name}" data-type="{kind}">{_packed(content)}</script>\n'
                     for name, (content, kind) in files.items())
    text = text.replace('<meta charset="utf-8">', f'<meta charset="utf-8">\n<meta http-equiv="Content-Security-Policy" content="{policy}">', 1)
    return text.replace("</body>", f"{packed}<script>{script}</script>\n</body>")


def _hash(text: str) -> str:
    return f"'sha256-{base64.b64encode(hashlib.sha256(text.encode()).digest()).decode()}'"


def _packed(content: bytes) -> str:
    return base64.b64encode(gzip.compress(content, 9, mtime=0)).decode()

"""Runs inside Pyodide: compiles Python files with the page's own Python and packs them, always to the same bytes."""
from __future__ import annotations

import base64
import hashlib
import importlib._bootstrap_external as bootstrap
import importlib.util
import zipfile
from typing import Callable

DATE = (2026, 1, 1, 0, 0, 0)            # of every entry: an archive must not know when it was made


KEEP_DOCSTRINGS, DROP_DOCSTRINGS = 0, 2  # compile()'s optimisation levels; the second drops assert as well


def compiled(source: bytes, name: str, level: int) -> bytes:
    """The .pyc of a module: checked by hash and never against a source, as there is none beside it."""
    code = compile(source, name, "exec", dont_inherit=True, optimize=level)
    return bytes(bootstrap._code_to_hash_pyc(code, importlib.util.source_hash(source), checked=False))


def pack(entries: dict[str, bytes], path: str) -> None:
    """Write a zip with sorted names, one date and nothing deflated: the host compresses it better, and it opens faster."""
    with zipfile.ZipFile(path, "w", zipfile.ZIP_STORED) as archive:
        for name in sorted(entries):
            info = zipfile.ZipInfo(name, DATE)
            info.external_attr = 0o644 << 16
            archive.writestr(info, entries[name])


def as_compiled(files: dict[str, bytes], place: str, level_of: Callable[[str], int]) -> dict[str, bytes]:
    """The same files with each .py replaced by its .pyc. `place` is the name that tracebacks show."""
    entries = {}
    for name, content in files.items():
        if name.endswith(".py"):
            entries[name + "c"] = compiled(content, f"{place}/{name}", level_of(name))
        else:
            entries[name] = content
    return entries


def record(entries: dict[str, bytes], record_name: str) -> bytes:
    """The RECORD of a wheel (binary distribution format): name, SHA-256, size of each file."""
    lines = []
    for name in sorted(entries):
        digest = base64.urlsafe_b64encode(hashlib.sha256(entries[name]).digest()).rstrip(b"=").decode()
        lines.append(f"{name},sha256={digest},{len(entries[name])}")
    lines.append(f"{record_name},,")
    return ("\n".join(lines) + "\n").encode()

"""Running commands, and not running them again while their inputs are the same."""
from __future__ import annotations

import contextlib
import hashlib
import os
import subprocess
import sys
from pathlib import Path
from typing import Iterable, Iterator, Sequence

try:
    import fcntl
except ImportError:                     # not on Windows; builds there are not guarded against each other
    fcntl = None


class BuildFailed(Exception):
    """The build cannot go on. The message says why and what to do."""


def say(text: str) -> None:
    print(text, flush=True)


def run(command: Sequence[object], *, why: str, cwd: Path | None = None, env: dict[str, str] | None = None, show: bool = False) -> str:
    """Run a command and return what it printed. Raises BuildFailed, with its last lines, when it fails."""
    words = [str(word) for word in command]
    environment = {**os.environ, **(env or {})}
    result = subprocess.run(words, cwd=cwd, env=environment, text=True, encoding="utf-8", errors="replace",
                            stdout=None if show else subprocess.PIPE, stderr=None if show else subprocess.STDOUT)
    if result.returncode:
        tail = "\n".join(line[:400] for line in (result.stdout or "").splitlines()[-40:])
        raise BuildFailed(f"{why} failed (exit {result.returncode}).\n  {' '.join(words)[:400]}\n{tail}")
    return result.stdout or ""


def digest_of(paths: Iterable[Path], *more: str) -> str:
    """One SHA-256 over the names and contents of files and folders, and over further texts."""
    total = hashlib.sha256()
    for text in (sys.version, *more):
        total.update(text.encode() + b"\0")
    for path in paths:
        for file in sorted(files_under(path)):
            total.update(file.relative_to(path.parent).as_posix().encode() + b"\0")
            total.update(hashlib.sha256(file.read_bytes()).digest())
    return total.hexdigest()


def files_under(path: Path) -> list[Path]:
    """The files at or below a path, without what Python leaves behind."""
    if path.is_file():
        return [path]
    return [file for file in path.rglob("*") if file.is_file() and "__pycache__" not in file.parts]


@contextlib.contextmanager
def one_at_a_time(folder: Path) -> Iterator[None]:
    """Hold the folder's lock: a second build waits for the first instead of writing into its files."""
    folder.mkdir(parents=True, exist_ok=True)
    with open(folder / "lock", "w") as lock:
        if fcntl:
            fcntl.flock(lock, fcntl.LOCK_EX)
        yield


class Stamp:
    """Remembers the digest of the inputs that a step was last finished with."""

    def __init__(self, path: Path, digest: str):
        self.path = path
        self.digest = digest

    def fresh(self, *outputs: Path) -> bool:
        """True when the step was finished with these inputs and its outputs are still there."""
        return (self.path.is_file() and self.path.read_text() == self.digest
                and all(output.exists() for output in outputs))

    def set(self) -> None:
        self.path.parent.mkdir(parents=True, exist_ok=True)
        self.path.write_text(self.digest)

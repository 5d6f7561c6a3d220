"""Same input, same bytes: a second build from nothing, in other folders, gives the same page."""
from __future__ import annotations

import hashlib

import pytest

pytestmark = pytest.mark.native


def bytes_of(folder) -> dict[str, str]:
    return {path.relative_to(folder).as_posix(): hashlib.sha256(path.read_bytes()).hexdigest()
            for path in sorted(folder.rglob("*")) if path.is_file()}


def test_two_builds_give_the_same_bytes(dist, tmp_path):
    from making.places import Places
    from making.runtime import build_runtime
    from making.site import build_site
    from making.wheel import build_wheel
    places = Places(work=tmp_path / "elsewhere" / "work", dist=tmp_path / "elsewhere" / "page")
    again = build_site(build_runtime(build_wheel(places), places), places)
    first, second = bytes_of(dist), bytes_of(again)
    assert len(first) > 15
    assert {name: (first.get(name), second.get(name)) for name in {*first, *second} if first.get(name) != second.get(name)} == {}

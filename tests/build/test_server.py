"""The server of `build.py serve`: types, policy, prefix, what it refuses, and a port that is taken."""
from __future__ import annotations

import http.client
import urllib.error
import urllib.request

import pytest

pytestmark = pytest.mark.native


@pytest.fixture
def making():
    """The parts of the build, imported when a test runs and not when tests are collected."""
    import making.server
    return making


def get(address: str, **headers):
    return urllib.request.urlopen(urllib.request.Request(address, headers=headers))


@pytest.mark.parametrize("name, kind", [
    ("", "text/html"), ("js/core-worker.js", "text/javascript"), ("runtime/pyodide.mjs", "text/javascript"),
    ("runtime/pyodide.asm.wasm", "application/wasm"), ("sw.js", "text/javascript"), ("licences.txt", "text/plain"),
])
def test_media_types(server, name, kind):
    assert get(server + name).headers.get_content_type() == kind


def test_every_answer_carries_the_policy(server):
    policy = get(server).headers["Content-Security-Policy"]
    assert "default-src 'none'" in policy and "unsafe-eval'" in policy and "'unsafe-eval'" not in policy
    with pytest.raises(urllib.error.HTTPError) as refused:
        get(server + "not-there.js")
    assert refused.value.code == 404 and refused.value.headers["Content-Security-Policy"] == policy


@pytest.mark.parametrize("path", ["/../build.py", "/%2e%2e/build.py", "/..%2fbuild.py", "/js/../../build.py", "//etc/passwd"])
def test_nothing_outside_the_folder(server, path):
    host = server.split("/")[2]
    connection = http.client.HTTPConnection(host)
    connection.request("GET", path)
    assert connection.getresponse().status == 404
    connection.close()


def test_a_file_the_browser_has_is_not_sent_again(server):
    tag = get(server + "js/core-worker.js").headers["ETag"]
    with pytest.raises(urllib.error.HTTPError) as unchanged:
        get(server + "js/core-worker.js", **{"If-None-Match": tag})
    assert unchanged.value.code == 304


def test_below_a_prefix_only(served_under):
    address, _ = served_under("/x/y/")
    assert get(address).status == 200
    with pytest.raises(urllib.error.HTTPError):
        get(address.replace("/x/y/", "/"))


def test_a_taken_port_is_named_and_the_next_taken(dist, making, capsys):
    held = making.server.open_server(dist)
    port = held.server_address[1]
    other = making.server.first_free(dist, port)
    try:
        assert other.server_address[1] > port
        assert f"port {port} is taken" in capsys.readouterr().out
    finally:
        held.server_close()
        other.server_close()


def test_when_every_port_is_taken_it_says_so(dist, making, monkeypatch):
    monkeypatch.setattr(making.server, "PORTS_TRIED", 1)
    held = making.server.open_server(dist)
    try:
        with pytest.raises(making.steps.BuildFailed, match="--port"):
            making.server.first_free(dist, held.server_address[1])
    finally:
        held.server_close()

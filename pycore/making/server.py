"""A small loopback server for dist/: right media types, the policy as a header, any prefix."""
from __future__ import annotations

import errno
import hashlib
import threading
import urllib.parse
from functools import partial
from http import HTTPStatus
from http.server import BaseHTTPRequestHandler, ThreadingHTTPServer
from pathlib import Path

from making.media import TYPES, media_type
from making.policy import POLICY
from making.steps import BuildFailed, say

HOST, FIRST_PORT, PORTS_TRIED = "127.0.0.1", 8060, 20


class Handler(BaseHTTPRequestHandler):
    """Answers GET and HEAD below `prefix` with the files of `folder`."""

    protocol_version = "HTTP/1.1"
    server_version, sys_version = "gasbasis", ""

    def __init__(self, *arguments, folder: Path, prefix: str, quiet: bool, **more):
        self.folder, self.prefix, self.quiet = folder, prefix, quiet
        super().__init__(*arguments, **more)

    def do_GET(self) -> None:
        file = self._file()
        if file is None:
            self._send(HTTPStatus.NOT_FOUND, b"not found\n", "text/plain; charset=utf-8")
            return
        content = file.read_bytes()
        tag = f'"{hashlib.sha256(content).hexdigest()[:32]}"'
        if self.headers.get("If-None-Match") == tag:
            self._send(HTTPStatus.NOT_MODIFIED, b"", media_type(file.name), tag)
        else:
            self._send(HTTPStatus.OK, content, media_type(file.name), tag)

    do_HEAD = do_GET

    def _file(self) -> Path | None:
        """The file that the address names; None when there is none, or it lies outside the folder."""
        path = urllib.parse.unquote(urllib.parse.urlsplit(self.path).path)
        if not path.startswith(self.prefix):
            return None
        name = path.removeprefix(self.prefix)
        file = (self.folder / (name + "index.html" if name == "" or name.endswith("/") else name)).resolve()
        inside = file.is_relative_to(self.folder.resolve()) and file.is_file() and file.suffix in TYPES
        return file if inside else None

    def _send(self, status: HTTPStatus, content: bytes, kind: str, tag: str = "") -> None:
        self.send_response(status)
        self.send_header("Content-Type", kind)
        self.send_header("Content-Security-Policy", POLICY)
        self.send_header("X-Content-Type-Options", "nosniff")
        self.send_header("Cache-Control", "no-cache")
        if tag:
            self.send_header("ETag", tag)
        if status != HTTPStatus.NOT_MODIFIED:
            self.send_header("Content-Length", str(len(content)))
        self.end_headers()
        if self.command == "GET" and content:
            self.wfile.write(content)

    def log_message(self, form: str, *values) -> None:
        if not self.quiet:
            super().log_message(form, *values)


class _Server(ThreadingHTTPServer):
    daemon_threads = True
    allow_reuse_address = False          # a port that another server holds must be refused, not shared

    def handle_error(self, request, client_address) -> None:
        """A browser that goes away in the middle of an answer is no error."""


def open_server(folder: Path, *, prefix: str = "/", port: int = 0, quiet: bool = True) -> ThreadingHTTPServer:
    """A server bound to the port (0: any free one), not yet serving. OSError when the port is taken."""
    return _Server((HOST, port), partial(Handler, folder=folder, prefix=prefix, quiet=quiet))


def address_of(server: ThreadingHTTPServer, prefix: str = "/") -> str:
    return f"http://{HOST}:{server.server_address[1]}{prefix}"


def in_background(server: ThreadingHTTPServer) -> threading.Thread:
    thread = threading.Thread(target=server.serve_forever, kwargs={"poll_interval": 0.05}, daemon=True)
    thread.start()
    return thread


def serve(folder: Path, *, first_port: int = FIRST_PORT) -> None:
    """Serve the folder until interrupted, on the first free port from `first_port` on."""
    server = first_free(folder, first_port)
    say(f"gasbasis is at {address_of(server)}   (stop with Ctrl-C)")
    try:
        server.serve_forever()
    except KeyboardInterrupt:
        say("stopped")
    finally:
        server.server_close()


def first_free(folder: Path, first_port: int) -> ThreadingHTTPServer:
    """A server on the first free port. Says which ports are taken; BuildFailed when all that are tried are."""
    for port in range(first_port, first_port + PORTS_TRIED):
        try:
            return open_server(folder, port=port)
        except OSError as error:
            if error.errno not in (errno.EADDRINUSE, errno.EACCES):
                raise
            say(f"port {port} is taken, trying {port + 1}")
    raise BuildFailed(f"Ports {first_port} to {first_port + PORTS_TRIED - 1} are all taken. Give another: build.py serve --port N")

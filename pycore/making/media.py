"""Media types by file ending: its one home for server and service worker. Modules are refused by browsers under a wrong one."""

TYPES = {
    ".html": "text/html; charset=utf-8",
    ".css": "text/css; charset=utf-8",
    ".js": "text/javascript; charset=utf-8",
    ".mjs": "text/javascript; charset=utf-8",
    ".json": "application/json",
    ".webmanifest": "application/manifest+json",
    ".svg": "image/svg+xml",
    ".png": "image/png",
    ".csv": "text/csv; charset=utf-8",
    ".txt": "text/plain; charset=utf-8",
    ".wasm": "application/wasm",
    ".zip": "application/zip",
    ".whl": "application/zip",
}


def media_type(name: str) -> str:
    """The media type of a file name. KeyError for an ending that is not in the table: add it there."""
    return TYPES["." + name.rpartition(".")[2]]

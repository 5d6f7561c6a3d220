"""Compiles the tables of facts into the JSON the wheel ships: python pycore/making/compile_facts.py

Same tables, same bytes. Raises FactsError, naming the row, when a table is incomplete or contradicts another.
"""
from __future__ import annotations

import json
import re
import sys
import tomllib
from pathlib import Path
from typing import Any

PACKAGE = Path(__file__).resolve().parents[1] / "gasbasis"
sys.path.insert(0, str(PACKAGE.parent))

from gasbasis.errors import FactsError  # noqa: E402  (the package need not be installed to compile its tables)
from gasbasis.facts import check  # noqa: E402
from gasbasis.facts.load import COMPILED  # noqa: E402


def read_tables(folder: Path) -> tuple[dict[str, list[dict[str, Any]]], dict[str, dict[str, Any]]]:
    """The collections and the raw tables of every TOML and JSON file of the folder.

    `common` at the top of a file holds fields that all its rows share. Raises FactsError.
    """
    collections: dict[str, list[dict[str, Any]]] = {name: [] for name in check.FIELDS}
    tables: dict[str, dict[str, Any]] = {}
    for path in sorted(folder.rglob("*.toml")) + sorted(folder.rglob("*.json")):
        content = tomllib.loads(path.read_text("utf-8")) if path.suffix == ".toml" else json.loads(path.read_text("utf-8"))
        common = content.pop("common", {})
        for name, inner in content.pop(check.TABLE, {}).items():
            if name in tables:
                raise FactsError(f"table {name}: the id is given twice.")
            tables[name] = inner
        for collection, rows in content.items():
            if collection not in collections:
                raise FactsError(f"{path.name}: '{collection}' is no table we know.", hint=f"Known: {', '.join(collections)}.")
            collections[collection].extend(check.complete(collection, row, common) for row in rows)
    return collections, tables


def cited_in_code(package: Path) -> set[str]:
    """Every quoted word in the package's code: the source ids among them are cited there."""
    texts = (path.read_text("utf-8") for path in package.rglob("*.py"))
    return {word for text in texts for word in re.findall(r'"([a-z0-9][a-z0-9.-]*)"', text)}


def compiled(folder: Path, cited_elsewhere: set[str]) -> str:
    """The JSON text of the folder's tables. Raises FactsError."""
    collections, tables = read_tables(folder)
    check.check(collections, tables, cited_elsewhere)
    content: dict[str, Any] = {
        collection: {"fields": list(fields), "rows": [[row[field] for field in fields] for row in collections[collection]]}
        for collection, fields in check.FIELDS.items()}
    content["tables"] = tables
    return json.dumps(content, ensure_ascii=False, sort_keys=True, separators=(",", ":"))


def compile_facts(folder: Path = PACKAGE / "facts" / "tables", into: Path = PACKAGE / "facts") -> Path:
    """Write the JSON file and return its path. Raises FactsError."""
    path = into / COMPILED
    path.write_text(compiled(folder, cited_in_code(PACKAGE)), "utf-8")
    return path


if __name__ == "__main__":
    try:
        made = compile_facts()
        print(f"{made.name}: {made.stat().st_size} bytes")
    except FactsError as error:
        sys.exit(f"{error.message} {error.hint}".strip())

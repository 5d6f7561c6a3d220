"""Many files on many workers: the same run, one file a task, sums put together without losing digits.

    python demo/series/on_dask.py SETTINGS.json OUT_FOLDER FILE [FILE ...]

Needs `pip install "dask[distributed]"`. With DASK_SCHEDULER_ADDRESS set, that cluster is used, else the cores of this machine.
"""
from __future__ import annotations

import json
import math
import sys
from pathlib import Path


def restate_one(path: str, settings: dict, out: str) -> dict:
    """One file, on whichever worker takes it."""
    from gasbasis.series.run import restate_file
    record = restate_file(path, settings, out)
    masses = {entry["species"]: entry["kg"] for entry in (record["means"] or {}).get("mass") or []}
    return {"file": path, "rows": record["rows"], "good": record["good"], "bad": record["bad"], "mass_kg": masses}


def restate_many(client, paths: list[str], settings: dict, folder: str) -> dict:
    """Every file restated on the client's workers; counts and masses of all of them together."""
    outs = [str(Path(folder) / f"{Path(path).stem}.restated.csv") for path in paths]
    parts = client.gather(client.map(restate_one, paths, [settings] * len(paths), outs, pure=False))
    species = sorted({name for part in parts for name in part["mass_kg"]})
    return {"files": parts, **{name: sum(part[name] for part in parts) for name in ("rows", "good", "bad")},
            "mass_kg": {name: math.fsum(part["mass_kg"].get(name, 0.0) for part in parts) for name in species}}


if __name__ == "__main__":
    from dask.distributed import Client
    with Client() as client:
        print(json.dumps(restate_many(client, sys.argv[3:], json.loads(Path(sys.argv[1]).read_text("utf-8")), sys.argv[2]), indent=1))

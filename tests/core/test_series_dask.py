"""The example for many files: on a local cluster it gives what one process gives, file by file and in the sums."""
from __future__ import annotations

import importlib.util
import json
import math
from pathlib import Path

import pytest

pytestmark = pytest.mark.native
distributed = pytest.importorskip("distributed")

ROOT = Path(__file__).resolve().parents[2]


@pytest.mark.parametrize("workers", [1, 2])
def test_a_cluster_gives_what_one_process_gives(tmp_path, workers):
    spec = importlib.util.spec_from_file_location("on_dask", ROOT / "demo" / "series" / "on_dask.py")
    example = importlib.util.module_from_spec(spec)
    spec.loader.exec_module(example)
    settings = json.loads((ROOT / "demo" / "series" / "logger_day.json").read_text("utf-8")) | {"digits": 17}
    lines = (ROOT / "demo" / "logger_day.csv").read_text("utf-8").splitlines()
    head, body = lines[:3], lines[3:]
    paths = []
    for place in range(4):
        path = tmp_path / f"part{place}.csv"
        path.write_text("\n".join(head + body[place * 300:(place + 1) * 300]) + "\n", encoding="utf-8")
        paths.append(str(path))
    (tmp_path / "alone").mkdir()
    (tmp_path / "cluster").mkdir()
    alone = [example.restate_one(path, settings, str(tmp_path / "alone" / f"{Path(path).stem}.restated.csv")) for path in paths]
    with distributed.LocalCluster(n_workers=workers, threads_per_worker=1, processes=False, dashboard_address=None) as cluster, distributed.Client(cluster) as client:
        together = example.restate_many(client, paths, settings, str(tmp_path / "cluster"))
    assert together["files"] == alone and together["rows"] == sum(part["rows"] for part in alone)
    assert together["mass_kg"]["NOx"] == pytest.approx(math.fsum(part["mass_kg"]["NOx"] for part in alone), rel=1e-12)
    for place in range(4):
        name = f"part{place}.restated.csv"
        assert (tmp_path / "cluster" / name).read_bytes() == (tmp_path / "alone" / name).read_bytes()

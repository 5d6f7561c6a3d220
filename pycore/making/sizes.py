"""How many bytes go over the wire before the first figure, and the budget for it."""
from __future__ import annotations

import gzip
from pathlib import Path

from making.one_page import NAME as ONE_FILE
from making.steps import BuildFailed, say

BUDGET_MB = 6.4                         # gzip, everything fetched up to the first figure
NOT_FOR_THE_FIGURE = ("licences.txt", "sw.js", ONE_FILE)
# Fetched when a series is first opened, a workbook or a time zone asked for (beginnings of paths).
LATER = ("runtime/tzdata-", "runtime/xlsxwriter-", "libraries/uplot.js", "js/regions/series.js", "js/regions/series-results.js", "js/regions/series-plot.js", "demo/logger_day")
LISTED = 6


def wire_sizes(site: Path) -> dict[str, int]:
    """The gzip size in bytes of each file that a first visit fetches before its figure."""
    return {path.relative_to(site).as_posix(): len(gzip.compress(path.read_bytes(), 6, mtime=0))
            for path in sorted(site.rglob("*")) if path.is_file() and path.name not in NOT_FOR_THE_FIGURE
            and not path.relative_to(site).as_posix().startswith(LATER)}


def report(site: Path) -> float:
    """Print the sizes, largest first, and return the sum in MB. Raises BuildFailed above the budget."""
    sizes = wire_sizes(site)
    total = sum(sizes.values()) / 1e6
    say(f"transfer to the first figure, gzip: {total:.2f} MB of {BUDGET_MB} MB")
    largest = sorted(sizes.items(), key=lambda item: -item[1])
    for name, size in largest[:LISTED]:
        say(f"  {size / 1e6:6.2f} MB  {name}")
    say(f"  {sum(size for _, size in largest[LISTED:]) / 1e6:6.2f} MB  {len(largest) - LISTED} more")
    if total > BUDGET_MB:
        raise BuildFailed(f"The page needs {total:.2f} MB to its first figure; the budget is {BUDGET_MB} MB.")
    return total

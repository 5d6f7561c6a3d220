"""A whole file through: look, restate, write, take means, and a record of all that was found. In constant memory."""
from __future__ import annotations

import json
import os
from contextlib import ExitStack
from pathlib import Path
from typing import Callable, Iterator, Mapping

from gasbasis import __version__
from gasbasis.errors import Missing, NotUnderstood
from gasbasis.language.numbers import significant
from gasbasis.series.layout import SAMPLE, Layout, look
from gasbasis.series.means import Mean, Means
from gasbasis.series.rows import Block, Lines, Rows
from gasbasis.series.settings import Settings, read_settings
from gasbasis.series.times import clock_text
from gasbasis.series.workbook import Workbook
from gasbasis.series.writing import MeansFile, RowsFile, bases

CHUNK = 1 << 20                         # bytes read at a time
DIGITS = 4                              # of a printed figure without uncertainty

Progress = Callable[[int, int], object]


def layout_of(path: str | os.PathLike, said: Mapping[str, object] | None = None) -> Layout:
    """The layout of a file. Raises CoreError."""
    with _opened(path) as source:
        return look(source.read(SAMPLE), said)


def restate_file(path: str | os.PathLike, given: Mapping, out: str | None = None, means_out: str | None = None,
                 progress: Progress = lambda done, of: None, watch: Callable[[Rows, Means | None, Block], None] | None = None,
                 listener: Callable[[Means, Mean], None] | None = None) -> dict:
    """Restate a file row by row; write rows and means where asked; return the record. Raises CoreError.

    `progress(bytes done, bytes of)` is called after each block, `watch` sees each block and `listener` each mean (the page draws from them).
    """
    settings = read_settings(given)
    layout = layout_of(path, settings.file)
    rows = Rows(layout, settings)
    with ExitStack() as stack:
        sinks, close = _sinks(out, rows, given, stack)
        means = _means(rows, settings, means_out, sinks, given, stack, listener)
        size = os.path.getsize(path)
        source = stack.enter_context(_opened(path))
        for block in rows.blocks(Lines(_chunks(source), layout.encoding)):
            for sink in sinks:
                sink.take(block)
            if means is not None:
                means.take(block)
            if watch is not None:
                watch(rows, means, block)
            progress(source.tell(), size)
        if means is not None:
            means.finish()
        if rows.tally.rows == 0:
            raise Missing("No row of the file was read.", hint="Check time.from and time.to, and that readings stand below the header.", field="file")
        for sink in close:
            sink.close(rows.tally)
    return record(rows, means, given)


def _opened(path):
    try:
        return open(path, "rb")
    except OSError as error:
        raise NotUnderstood(f"'{path}' cannot be opened: {error.strerror}.", hint="Check the name of the file.", field="file") from None


def _chunks(source) -> Iterator[bytes]:
    while chunk := source.read(CHUNK):
        yield chunk


def _sinks(out: str | None, rows: Rows, given: Mapping, stack: ExitStack):
    if out is None:
        return [], []
    if Path(out).suffix.lower() == ".xlsx":
        book = Workbook(out, rows, given)
        return [book], [book]
    try:
        target = stack.enter_context(open(out, "w", encoding="utf-8", newline=""))
    except OSError as error:
        raise NotUnderstood(f"'{out}' cannot be written: {error.strerror}.", hint="Choose another place.", field="out") from None
    return [RowsFile(target, rows, given)], []


def _means(rows: Rows, settings: Settings, means_out: str | None, sinks, given: Mapping, stack: ExitStack, further) -> Means | None:
    if not settings.windows and settings.flow is None:
        return None
    takers = [sink.take_mean for sink in sinks if isinstance(sink, Workbook)] + ([further] if further else [])
    if means_out is not None:
        takers.append(MeansFile(stack.enter_context(open(means_out, "w", encoding="utf-8", newline="")), rows, given).take)

    def listener(mean: Mean) -> None:
        for take in takers:
            take(means, mean)

    means = Means(rows, settings, listener)
    return means


def record(rows: Rows, means: Means | None, given: Mapping) -> dict:
    """All that was found, as one JSON record."""
    tally, settings = rows.tally, rows.settings
    return {
        "version": __version__, "title": settings.title, "understood": rows.layout.understood(),
        "species": [{"name": species.name, "text": name, "unit_text": unit_text, "basis": basis, "row_by_row": restating.row_by_row,
                     "choices": sorted({choice.title for path in restating.paths for choice in path.choices})}
                    for species, restating, (name, unit_text, basis) in zip(settings.species, rows.restatings, bases(rows))],
        "rows": tally.rows, "good": tally.good, "bad": tally.bad, "blank": tally.blank, "put_aside": tally.marked, "outside": tally.outside, "below": tally.below,
        "reasons": [{"reason": reason, "rows": count} for reason, count in tally.reasons.most_common()],
        "bad_rows": [{"line": entry.line, "column": entry.column, "reason": entry.reason} for entry in tally.listed],
        "bad_rows_not_listed": tally.bad - len(tally.listed),
        "means": None if means is None else _means_record(rows, means), "settings": dict(given)}


def _means_record(rows: Rows, means: Means) -> dict:
    clock = rows.clock

    def moment(seconds: float) -> str:
        return clock_text(seconds, clock.offset_at(seconds), clock.zone is not None)

    return {
        "interval_s": means.interval, "gaps": means.gap_count, "gap_hours": means.gap_seconds / 3600.0, "left_out_by_rule": means.ruled_out,
        "gaps_listed": [{"from": moment(before), "to": moment(after)} for before, after in means.gaps],
        "windows": [{"window": window.title, "species": [_statistics_record(rows, means, index, species, moment) for species in range(means.count)]}
                    for index, window in enumerate(means.windows)],
        "mass": None if means.flow_factor is None else
        [{"species": species.name, "kg": total.total, "text": f"{significant(total.total, DIGITS)} kg", "hours": count * (means.interval or 0.0) / 3600.0}
         for species, total, count in zip(rows.settings.species, means.total_mass, means.measured)]}


def _statistics_record(rows: Rows, means: Means, index: int, species: int, moment) -> dict:
    found, limits = means.statistics[index][species], means.limits[species]
    highest = found.highest
    upper = limits.upper if limits is not None else None
    return {"name": rows.settings.species[species].name, "means": len(found.values), "lacking": found.lacking,
            "highest": None if highest is None else {"value": highest.value, "text": significant(highest.value, DIGITS), "from": moment(highest.start), "to": moment(highest.end),
                                                     "percent_of_limit": 100.0 * highest.value / upper if upper else None},
            "percentiles": [{"percent": percent, "value": _or_none(found.percentile(percent))} for percent in rows.settings.percentiles],
            "upper_limit": upper, "exceedances": found.exceedances if limits is not None else None,
            "listed": [{"from": moment(mean.start), "to": moment(mean.end), "text": significant(mean.value, DIGITS), "verdict": mean.words} for mean in found.listed]}


def _or_none(value: float) -> float | None:
    return value if value == value else None


def read_settings_file(path: str) -> dict:
    """The JSON of a settings file. Raises NotUnderstood."""
    try:
        return json.loads(Path(path).read_text(encoding="utf-8-sig"))
    except OSError as error:
        raise NotUnderstood(f"'{path}' cannot be opened: {error.strerror}.", hint="Give the settings as a JSON file; demo/series/logger_day.json is one.", field="settings") from None
    except ValueError as error:
        raise NotUnderstood(f"'{path}' is not JSON: {error}.", hint="demo/series/logger_day.json is an example.", field="settings") from None

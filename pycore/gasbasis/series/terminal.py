"""`python3 -m gasbasis series FILE --settings S.json --out OUT`: a file of any length, streamed."""
from __future__ import annotations

import argparse
import json
import sys

from gasbasis.errors import CoreError
from gasbasis.series.run import layout_of, read_settings_file, restate_file

RESTATED, NOT_UNDERSTOOD = 0, 2
_EVERY = 50                             # blocks between two lines of progress


def add_command(commands) -> None:
    series = commands.add_parser("series", help="restate a logger's file row by row")
    series.add_argument("file", help="CSV, TSV or semicolon-separated readings")
    series.add_argument("--settings", help="a JSON file; without it the file is only looked at")
    series.add_argument("--out", help="where the restated rows go: a .csv, or a .xlsx with means and bad rows")
    series.add_argument("--means", help="where the means go, as .csv")
    series.add_argument("--columns", action="store_true", help="with polars, whole columns at once (rows only)")
    series.add_argument("--json", action="store_true", help="print the whole record as JSON")
    series.add_argument("--quiet", action="store_true", help="no progress")
    series.set_defaults(run=run)


def run(options: argparse.Namespace) -> int:
    """Exit status 0: restated; 2: not understood."""
    try:
        if options.settings is None:
            layout = layout_of(options.file)
            print("\n".join([*layout.understood(), *(_column(column) for column in layout.columns), *(f"open: {question.question}" for question in layout.questions)]))
            return RESTATED
        given = read_settings_file(options.settings)
        if options.columns:
            from gasbasis.series.columns import restate_columns
            found = restate_columns(options.file, given, options.out)
        else:
            found = restate_file(options.file, given, options.out, options.means, _nothing if options.quiet or not sys.stderr.isatty() else _Progress())
    except CoreError as error:
        where = f"{error.field}: " if error.field else ""
        print(f"{where}{error.message} {error.hint}".strip(), file=sys.stderr)
        return NOT_UNDERSTOOD
    print(json.dumps(found, ensure_ascii=False, indent=1) if options.json else "\n".join([*found["understood"], "", *text_of(found)]))
    return RESTATED


def _nothing(done: int, of: int) -> None:
    pass


class _Progress:
    def __init__(self) -> None:
        self.calls = 0

    def __call__(self, done: int, of: int) -> None:
        self.calls += 1
        if self.calls % _EVERY == 0 or done >= of:
            print(f"\r{100 * done // max(of, 1)} %", end="\n" if done >= of else "", file=sys.stderr, flush=True)


def _column(column) -> str:
    words = f"; other cells: {', '.join(column.texts)}" if column.texts else ""
    return f"  {{{column.name}}}  {column.kind}{', in ' + column.unit_text if column.unit_text else ''}, e.g. {column.example!r}{words}"


def text_of(found: dict, with_means: bool = True) -> list[str]:
    """The record in lines."""
    lines = [f"{species['text']} in {species['unit_text']} {species['basis']}" for species in found["species"]]
    lines.append(f"{found['rows']} rows: {found['good']} restated, {found['bad']} without all their figures, of which {found['put_aside']} put aside by their status"
                 + (f"; {found['outside']} outside the span" if found["outside"] else ""))
    if not with_means:
        return lines + _spans(found["means"])
    lines += [f"  {entry['rows']} × {entry['reason']}" for entry in found["reasons"]]
    lines += [f"  line {entry['line']}: {entry['column']} {entry['reason']}".replace("  ", " ") for entry in found["bad_rows"][:10]]
    if found["means"]:
        lines += _spans(found["means"]) + _means_lines(found["means"])
    return lines


def _means_lines(means: dict) -> list[str]:
    lines = []
    for window in means["windows"]:
        for species in window["species"]:
            highest = species["highest"]
            of_limit = f", {highest['percent_of_limit']:.3g} % of the limit" if highest and highest["percent_of_limit"] is not None else ""
            top = f"; highest {highest['text']} from {highest['from']}{of_limit}" if highest else ""
            over = f"; {species['exceedances']} not within the limit" if species["exceedances"] is not None else ""
            centiles = "".join(f"; {entry['percent']:g}th percentile {entry['value']:.4g}" for entry in species["percentiles"] if entry["value"] is not None)
            lines.append(f"{window['window']}, {species['name']}: {species['means']} means, {species['lacking']} with too little data{top}{centiles}{over}")
    return lines


def _spans(means: dict | None) -> list[str]:
    """Interval, gaps and mass."""
    if means is None:
        return []
    return [f"interval {means['interval_s']:g} s; gaps: {means['gaps']}, {means['gap_hours']:.3g} h missing",
            *(f"mass of {entry['species']}: {entry['text']} in {entry['hours']:.4g} h measured" for entry in means["mass"] or ())]


def statistics_table(found: dict) -> list[list[str]]:
    """The means of each window in one row of words, the header first; none without means."""
    if found["means"] is None or not found["means"]["windows"]:
        return []
    rows = [["means", "of", "with enough data", "with too little", "highest", "its start", "% of the limit", "percentiles", "not within the limit"]]
    for window in found["means"]["windows"]:
        for species in window["species"]:
            highest = species["highest"] or {"text": "", "from": "", "percent_of_limit": None}
            percent = "" if highest["percent_of_limit"] is None else f"{highest['percent_of_limit']:.3g}"
            centiles = ", ".join(f"{entry['percent']:g}th: {entry['value']:.4g}" for entry in species["percentiles"] if entry["value"] is not None)
            over = "" if species["exceedances"] is None else str(species["exceedances"])
            rows.append([window["window"], species["name"], str(species["means"]), str(species["lacking"]), highest["text"], highest["from"], percent, centiles, over])
    return rows

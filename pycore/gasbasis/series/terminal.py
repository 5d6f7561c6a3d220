"""`python3 -m gasbasis series FILE --settings S.json --out OUT`: a file of any length, streamed."""
from __future__ import annotations

import json
import sys

from gasbasis.errors import CoreError
from gasbasis.series.report import text_of
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


def run(options) -> int:
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
            print(json.dumps(found, ensure_ascii=False, indent=1))
            return RESTATED
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

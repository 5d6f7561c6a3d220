"""Rows restated with polars, lazily and whole columns at once: the same relations, called with polars expressions.

Rows only. A row that none of the paths met at the file's beginning holds for has no figure here and is counted; means, reasons and
unusual files are for `run.restate_file`.
"""
from __future__ import annotations

from itertools import islice
from typing import Mapping, Sequence

from gasbasis.calculation.path import Path, evaluate
from gasbasis.errors import Missing, NotUnderstood
from gasbasis.language.basis import Quantity
from gasbasis.series.layout import Layout
from gasbasis.series.restating import Restating, fed_leaves
from gasbasis.series.rows import LARGEST, Lines, Rows
from gasbasis.series.run import layout_of
from gasbasis.series.settings import read_settings
from gasbasis.series.template import Row
from gasbasis.series.writing import bases, row_names

_MET = 40                              # blocks read row by row to meet the paths that the file needs


def restate_columns(path: str, given: Mapping, out: str | None) -> dict:
    """Write the restated rows as CSV and return what was counted. Raises CoreError."""
    pl = _polars()
    if out is None or not str(out).endswith(".csv"):
        raise NotUnderstood("Whole columns are written as .csv.", hint="Give --out OUT.csv.", field="out")
    settings = read_settings(given)
    layout = layout_of(path, settings.file)
    rows = Rows(layout, settings)
    with open(path, "rb") as source:
        for _ in islice(rows.blocks(Lines([source.read(1 << 20)], layout.encoding)), _MET):
            pass
    figures = [_figure(pl, restating, layout).alias(name) for restating, name in zip(rows.restatings[:len(settings.species)], row_names(rows)[1:])]
    stamps = [pl.concat_str([pl.col(name) for name in layout.time_columns], separator=" ").alias("time")] if layout.time_columns else []
    frame = _scanned(pl, path, layout, rows.names)
    if rows.status is not None:
        valid = pl.col(settings.status_column).str.strip_chars().is_in(list(settings.status_valid))
        figures = [pl.when(valid).then(figure).otherwise(None).alias(figure.meta.output_name()) for figure in figures]
    frame.select(*stamps, *figures).sink_csv(out, separator=layout.delimiter, decimal_comma=layout.decimal == ",")
    counted = pl.scan_csv(out, separator=layout.delimiter, infer_schema=False).select(pl.len().alias("rows"), *(
        pl.col(figure.meta.output_name()).is_null().sum().alias(f"without {species.name}") for figure, species in zip(figures, settings.species))).collect()
    return {"understood": layout.understood(), "species": [{"text": text, "unit_text": unit_text, "basis": basis} for text, unit_text, basis in bases(rows)],
            **counted.row(0, named=True)}


def _polars():
    try:
        import polars
    except ImportError:
        raise Missing("polars is needed for whole columns.", hint="Install it (pip install polars), or leave out --columns.", field="columns") from None
    return polars


def _scanned(pl, path: str, layout: Layout, numbers: Sequence[str]):
    """The file as a lazy frame of texts; numbers with a decimal point are read as such at once, other cells among them becoming null."""
    if layout.encoding not in ("utf-8", "utf-8-sig"):
        raise NotUnderstood(f"The file is in {layout.encoding}; whole columns are read from UTF-8.", hint="Leave out --columns.", field="columns")
    schema = {column.name: pl.Float64 if layout.decimal == "." and column.name in numbers else pl.String for column in layout.columns}
    return pl.scan_csv(path, separator=layout.delimiter, skip_lines=layout.first_line - 1, has_header=False, schema=schema, ignore_errors=True)


def _figure(pl, restating: Restating, layout: Layout):
    """One species' figure as an expression: the first path that holds; null where none does."""
    if restating.row_by_row or not restating.laid:
        raise NotUnderstood("These texts are restated row by row only.", hint="Leave out --columns.", field="columns")
    columns = [_number(pl, name, layout) for name in restating.template.columns]
    figure = pl.lit(None, dtype=pl.Float64)
    for path, row in reversed(restating.laid):
        known = _known(restating, columns, path, row)
        figure = pl.when(_holds(pl, path, row, known, columns)).then(known[path.figure] / path.shown.factor).otherwise(figure)
    return figure


def _number(pl, name: str, layout: Layout):
    text = pl.col(name)
    if layout.decimal == ".":
        return text
    text = pl.when(text.str.contains(".", literal=True)).then(None).otherwise(text.str.replace(",", ".", literal=True))
    return text.cast(pl.Float64, strict=False)


def _known(restating: Restating, columns, path: Path, row: Row) -> dict[str, object]:
    fed = fed_leaves(path, restating.template, row)
    return evaluate(path, {name: columns[index] * factor + offset for name, (index, factor, offset) in fed.items()})


def _holds(pl, path: Path, row: Row, known: Mapping[str, object], columns):
    """Whether every bound of the relations and every decision of the path holds, as an expression."""
    tests = [column.is_between(-LARGEST, LARGEST) for column in columns]
    for step in path.steps:
        for bound in step.relation.validity:
            low, value, high = (known[step.arguments[end]] if isinstance(end, str) else end for end in (bound.low, bound.argument, bound.high))
            tests += [value >= low if bound.low_allowed else value > low, value <= high if bound.high_allowed else value < high]
    for decision in path.decisions:
        left, right = (_side(side, row, known, columns) for side in (decision.left, decision.right))
        above = left >= right if decision.or_equal else left > right
        tests.append(above if decision.above else (left < right if decision.or_equal else left <= right))
    kept = [test for test in tests if not isinstance(test, bool)]
    return pl.all_horizontal(kept) if kept else pl.lit(True)


def _side(side, row: Row, known: Mapping[str, object], columns):
    if isinstance(side, Quantity):
        return next((columns[index] * each.unit.factor + each.unit.offset for index, each in enumerate(row.quantities) if each is side), side.si)
    return known[side] if isinstance(side, str) else side

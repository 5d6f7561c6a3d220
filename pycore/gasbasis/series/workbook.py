"""The same tables as an XLSX workbook, written row by row in constant memory. XlsxWriter is loaded only when a workbook is asked for."""
from __future__ import annotations

import math
from typing import Mapping

from gasbasis.errors import Missing
from gasbasis.series.means import Mean, Means
from gasbasis.series.rows import Block, Rows, Tally
from gasbasis.series.writing import MEAN_NAMES, about, mean_cells, row_names

_MOST_ROWS = 1_048_576                  # of a sheet (ISO/IEC 29500 workbooks in common use)


class Workbook:
    """Sheets: About, Rows (more of them where one is full), Means, Bad rows."""

    def __init__(self, path: str, rows: Rows, given: Mapping):
        try:
            import xlsxwriter
        except ImportError:
            raise Missing("XlsxWriter is needed for a workbook.", hint="Install it (pip install xlsxwriter), or write a .csv.", field="out") from None
        self.rows, self.given = rows, given
        self.book = xlsxwriter.Workbook(path, {"constant_memory": True, "strings_to_numbers": False, "strings_to_formulas": False, "strings_to_urls": False, "in_memory": False})
        self.about = self.book.add_worksheet("About")
        self.sheets = 0
        self.means_row, self.means_sheet = 0, None
        self.count = len(rows.settings.species)
        self.sheet = None

    def _next_sheet(self) -> None:
        self.sheets += 1
        self.sheet, self.row = self.book.add_worksheet("Rows" if self.sheets == 1 else f"Rows {self.sheets}"), 1
        self.sheet.set_column(0, 0, 22)
        self.sheet.write_row(0, 0, row_names(self.rows))

    def take(self, block: Block) -> None:
        for place, (stamp, *figures) in enumerate(zip(block.stamps, *block.figures[:self.count])):
            if self.sheet is None or self.row >= _MOST_ROWS:
                self._next_sheet()
            self.sheet.write_string(self.row, 0, stamp)
            for column, figure in enumerate(figures, start=1):
                if figure != figure:
                    continue
                if place in block.below[column - 1]:
                    self.sheet.write_string(self.row, column, f"<{figure:#.{self.rows.settings.digits}g}")
                else:
                    self.sheet.write_number(self.row, column, figure)
            problem = block.problems.get(place)
            if problem:
                self.sheet.write_string(self.row, self.count + 1, problem)
            self.row += 1

    def take_mean(self, means: Means, mean: Mean) -> None:
        if self.means_sheet is None:
            self.means_sheet = self.book.add_worksheet("Means")
            self.means_sheet.write_row(0, 0, MEAN_NAMES)
        self.means_row += 1
        for column, entry in enumerate(mean_cells(self.rows, means, mean)):
            if isinstance(entry, str):
                self.means_sheet.write_string(self.means_row, column, entry)
            elif math.isfinite(entry):
                self.means_sheet.write_number(self.means_row, column, entry)

    def close(self, tally: Tally) -> None:
        for row, line in enumerate(about(self.rows, self.given)):
            self.about.write_string(row, 0, line)
        bad = self.book.add_worksheet("Bad rows")
        bad.write_row(0, 0, ("line", "column", "reason"))
        for row, entry in enumerate(tally.listed, start=1):
            bad.write_number(row, 0, entry.line)
            bad.write_string(row, 1, entry.column)
            bad.write_string(row, 2, entry.reason)
        self.book.close()

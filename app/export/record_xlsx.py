"""Gauge records as a workbook: real numbers on one sheet, the particulars on another."""

from __future__ import annotations

import io

import xlsxwriter

from app.export.columns import one_line
from app.export.record_choices import RecordChoices
from app.export.record_table import RecordTable

#: What a sheet of the format can hold (ECMA-376).
MOST_ROWS, MOST_COLUMNS = 1_048_576, 16_384


def record_xlsx(table: RecordTable, choices: RecordChoices) -> bytes:
    """The file. Numbers are written whole; `digits` only sets how many are shown. Raises `ValueError` where the
    table is larger than a sheet can be."""
    count = len(table.columns[0].values)
    if count + 1 > MOST_ROWS or len(table.columns) > MOST_COLUMNS:
        raise ValueError(
            f"{count} rows and {len(table.columns)} columns are more than a sheet holds ({MOST_ROWS} and "
            f"{MOST_COLUMNS}): choose a sampling rate, a time window, or fewer gauges."
        )
    stream = io.BytesIO()
    options = {"in_memory": True, "strings_to_formulas": False, "strings_to_urls": False}
    book = xlsxwriter.Workbook(stream, options)
    book.set_properties({"title": "Gauge records", "created": table.date.replace(tzinfo=None)})
    head = book.add_format({"bold": True, "bottom": 1})
    bold = book.add_format({"bold": True})
    number = book.add_format({"num_format": "General" if choices.digits is None else _shown(choices.digits)})
    sheet = book.add_worksheet("Records")
    sheet.freeze_panes(1, 1)
    for index, column in enumerate(table.columns):
        sheet.set_column(index, index, max(12, min(len(column.heading) + 2, 60)), number)
        sheet.write_string(0, index, column.heading[:32_000], head)
        sheet.write_column(1, index, column.values.tolist())
    about = book.add_worksheet("Particulars")
    about.set_column(0, 0, 28)
    about.set_column(1, 1, 110)
    for row, (word, text) in enumerate(table.particulars):
        about.write_string(row, 0, word, bold)
        about.write_string(row, 1, one_line(text)[:32_000])
    book.close()
    return stream.getvalue()


def _shown(digits: int) -> str:
    return "0." + "0" * (digits - 1) + "E+00" if digits > 1 else "0E+00"

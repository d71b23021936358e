"""Gauge records as CSV (RFC 4180): comment lines with the particulars, one header row, numbers."""

from __future__ import annotations

import csv
import io
from collections.abc import Callable, Iterable, Iterator

import numpy as np

from app.export.plain_text import harmless, harmless_comment
from app.export.record_choices import RecordChoices
from app.export.record_table import RecordTable
from solver.answer.result import Array

BYTE_ORDER_MARK = b"\xef\xbb\xbf"


def record_csv(table: RecordTable, choices: RecordChoices) -> bytes:
    """The file: lines end in CR LF as RFC 4180 says; with a decimal comma the separator is a semicolon."""
    text = "".join(comment_lines(table)) + "".join(rows(table, choices))
    mark = BYTE_ORDER_MARK if choices.byte_order_mark else b""
    return mark + text.encode("utf-8", "backslashreplace")


def comment_lines(table: RecordTable) -> Iterator[str]:
    """Particulars, a line each, beginning with "#"."""
    for word, text in table.particulars:
        yield f"# {harmless_comment(f'{word}: {text}')}\r\n"


def rows(table: RecordTable, choices: RecordChoices, most: int | None = None) -> Iterator[str]:
    """The header row and the rows of numbers, at most so many of them."""
    separator = ";" if choices.decimal_comma else ","
    stream = io.StringIO()
    writer = csv.writer(stream, delimiter=separator, lineterminator="\r\n")
    writer.writerow([harmless(column.heading) for column in table.columns])
    yield stream.getvalue()
    time, *others = (column.values[:most] for column in table.columns)
    written = [_numbers(time, choices, _digits_of_time(time, choices.digits))]
    written += [_numbers(values, choices, choices.digits) for values in others]
    for row in zip(*written, strict=True):
        yield separator.join(row) + "\r\n"


def _digits_of_time(time: Array, digits: int | None) -> int | None:
    """As many as tell two samples apart to a thousandth of a step, however few are asked for."""
    if digits is None or len(time) < 2:
        return digits
    steps = float(np.max(np.abs(time))) / float(time[1] - time[0])
    return max(digits, int(np.ceil(np.log10(steps))) + 3)


def _numbers(values: Array, choices: RecordChoices, digits: int | None) -> Iterable[str]:
    write: Callable[[float], str] = repr
    if digits is not None:
        write = f"%.{digits}g".__mod__
    texts = map(write, values.tolist())
    return (text.replace(".", ",") for text in texts) if choices.decimal_comma else texts

"""CSV text: one header row and columns of numbers that read back the same."""

from __future__ import annotations

import csv
import io
from collections.abc import Sequence

import numpy as np
from numpy.typing import NDArray


def csv_text(header: Sequence[str], columns: Sequence[NDArray[np.float64]]) -> str:
    """Header row and rows of the columns, all of one length. `repr` of a double reads back as the same double."""
    stream = io.StringIO()
    csv.writer(stream, lineterminator="\n").writerow(header)
    written = [map(repr, (np.asarray(column, dtype=float) + 0.0).tolist()) for column in columns]
    stream.writelines(",".join(row) + "\n" for row in zip(*written, strict=True))
    return stream.getvalue()


def one_line(text: str) -> str:
    """Text without line breaks or other control characters, whatever it held before."""
    return " ".join("".join(c if c.isprintable() else " " for c in text).split())

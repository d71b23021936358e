"""Time histories of a load: points in time from the project or from a CSV file."""

from __future__ import annotations

import csv
from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Self

import numpy as np
from numpy.typing import NDArray


@dataclass(frozen=True, eq=False)
class Samples:
    """Points of a history: `times` (s, rising) and `values` (N or m/s), both of shape (n,), read-only."""

    times: NDArray[np.float64]
    values: NDArray[np.float64]

    @classmethod
    def checked(cls, times: Sequence[float], values: Sequence[float]) -> Self:
        """Raises `ValueError` with a sentence unless there are two points or more and time rises."""
        if len(times) != len(values):
            raise ValueError(
                f"'times' has {len(times)} points and 'values' {len(values)}: they must be equally many"
            )
        if len(times) < 2:
            raise ValueError("a history needs at least two points")
        t, v = np.array(times, dtype=float), np.array(values, dtype=float)
        if not (np.isfinite(t).all() and np.isfinite(v).all()):
            raise ValueError("every time and value must be finite")
        if t[0] < 0:
            raise ValueError("a history must not begin before time 0")
        steps = np.diff(t)
        if (steps < 0).any():
            bad = int(np.argmax(steps < 0)) + 1
            raise ValueError(
                f"time must not run backwards: point {bad + 1} ({t[bad]:g} s) comes after {t[bad - 1]:g} s"
            )
        if t[-1] == t[0]:
            raise ValueError("a history must last longer than no time at all")
        t.flags.writeable = v.flags.writeable = False
        return cls(t, v)

    def __eq__(self, other: object) -> bool:
        if not isinstance(other, Samples):
            return NotImplemented
        return np.array_equal(self.times, other.times) and np.array_equal(self.values, other.values)

    __hash__ = None  # type: ignore[assignment]


def read_history(name: str, folder: Path | None) -> Samples:
    """Read a CSV file with one header row, then time in s and value; `name` is relative to the project's folder.

    Raises `ValueError` with a sentence that names the file and the line.
    """
    path = Path(name)
    if not path.is_absolute():
        if folder is None:
            raise ValueError(
                f"the history file '{name}' is relative to the project's folder: save the project first"
            )
        path = Path(folder) / path
    times, values = [], []
    try:
        with path.open(newline="", encoding="utf-8-sig") as stream:
            for number, row in enumerate(csv.reader(stream), start=1):
                if number == 1 and _numbers(row):
                    raise ValueError(
                        f"line 1 of the history file '{name}' is taken for the header, but holds numbers: "
                        "put a header row above them"
                    )
                if number == 1 or not any(cell.strip() for cell in row):
                    continue
                point = _numbers(row)
                if len(point) != 2:
                    raise ValueError(
                        f"line {number} of the history file '{name}' needs two numbers, time in s and value, with a "
                        "comma between them and a point before decimals"
                    )
                times.append(point[0])
                values.append(point[1])
    except UnicodeDecodeError:
        raise ValueError(f"the history file '{name}' is not UTF-8 text: save it in UTF-8") from None
    except (OSError, csv.Error) as error:
        reason = getattr(error, "strerror", None) or str(error)
        raise ValueError(f"the history file '{name}' cannot be read: {reason}") from None
    try:
        return Samples.checked(times, values)
    except ValueError as error:
        raise ValueError(f"in the history file '{name}': {error}") from None


def _numbers(row: Sequence[str]) -> list[float]:
    """The numbers of a row, empty cells at its end left out; none where one of the cells is no number."""
    cells = [cell.strip() for cell in row]
    while cells and not cells[-1]:
        cells.pop()
    try:
        return [float(cell) for cell in cells]
    except ValueError:
        return []

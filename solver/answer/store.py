"""Room for records of every step: in memory, or in a temporary file where they would crowd it."""

from __future__ import annotations

import tempfile
from typing import IO

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

#: Values (of 8 bytes) above which records go to a file: 160 MB.
MOST_IN_MEMORY = 20_000_000


class Store:
    """Rows of values that grow step by step up to `columns`; shape (rows, columns).

    In a file, blocks are written and mapped back only where somebody looks, so that memory does not grow with the run.
    The file has no name of its own and is gone with the last reader.
    """

    def __init__(self, rows: int, columns: int, most_in_memory: int = MOST_IN_MEMORY) -> None:
        self.rows, self.columns, self.filled = rows, columns, 0
        self._file: IO[bytes] | None = None
        self._array: Array | None = None
        self._block = np.empty((rows, 0))
        if rows * columns > most_in_memory:
            self._file = tempfile.TemporaryFile(prefix="striketrace-")  # noqa: SIM115 - lives as long as its readers
            self._file.truncate(rows * columns * 8)
        else:
            self._array = np.empty((rows, columns))

    def close(self) -> None:
        """Give the file up; what was read of it stays."""
        if self._file is not None:
            self._file.close()

    __del__ = close

    def room(self, n: int) -> tuple[Array, int]:
        """Where the next `n` columns are to be written: an array of all rows, and the first of its columns."""
        if self._array is not None:
            return self._array, self.filled
        self._block = np.empty((self.rows, n))
        return self._block, 0

    def take(self, n: int) -> None:
        """Keep `n` columns that were written into the room given last."""
        if self._file is not None:
            for row, values in enumerate(self._block[:, :n]):
                self._file.seek((row * self.columns + self.filled) * 8)
                self._file.write(values.data)
            self._file.flush()
        self.filled += n

    def read(self) -> Array:
        """What is filled so far, shape (rows, filled), read-only; later additions do not change it."""
        if self._array is None:
            assert self._file is not None
            shape = (self.rows, self.columns)
            return np.memmap(self._file, dtype=np.float64, mode="r", shape=shape)[:, : self.filled]
        view = self._array[:, : self.filled]
        view.flags.writeable = False
        return view

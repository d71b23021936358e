"""Long records as curves that a screen can show: nothing that stands out is lost, and nothing is drawn twice."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray
from PySide6.QtGui import QPolygonF
from shiboken6 import VoidPtr

from app.bench.pictures.axes import Axis

Array = NDArray[np.float64]


def thinned(x: Array, y: Array, axis: Axis, ratio: float = 1.0) -> tuple[Array, Array]:
    """A record cut to the axis and thinned to first, lowest, highest and last value in each pixel.

    `x` (rising, in the axis' unit) and `y` have shape (n,). Gives pixels along the axis and values, both of shape (m,),
    m at most about four times the axis' pixels. Records with fewer points than that come through as they are.
    `ratio`: pixels of the screen in one of the axis, at 200 % two.
    """
    first = max(int(np.searchsorted(x, axis.low)) - 1, 0)
    last = min(int(np.searchsorted(x, axis.high, side="right")) + 1, len(x))
    x, y = x[first:last], y[first:last]
    pixels = np.asarray(axis.pixel(x), dtype=float)
    if len(x) <= 4 * axis.length * ratio:
        return pixels, np.asarray(y, dtype=float)
    columns = np.floor(pixels * ratio).astype(np.int64)
    starts = np.concatenate(([0], np.flatnonzero(np.diff(columns)) + 1))
    ends = np.concatenate((starts[1:], [len(x)])) - 1
    values = np.stack(
        (y[starts], np.minimum.reduceat(y, starts), np.maximum.reduceat(y, starts), y[ends]), axis=1
    )
    return np.repeat((columns[starts] + 0.5) / ratio, 4), values.ravel().astype(float)


def polygon(x: Array, y: Array) -> QPolygonF:
    """Points as Qt wants them, without a Python loop."""
    shape = QPolygonF()
    count = min(len(x), len(y))
    if count == 0:
        return shape
    shape.resize(count)
    # a QPolygonF lies in memory as pairs of doubles; the stubs know neither this constructor nor its buffer
    memory = VoidPtr(shape.data(), 16 * count, True)  # type: ignore[call-arg, arg-type]
    points = np.frombuffer(memory, dtype=np.float64).reshape(count, 2)  # type: ignore[call-overload]
    points[:, 0] = x[:count]
    points[:, 1] = y[:count]
    return shape

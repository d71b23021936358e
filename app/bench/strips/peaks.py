"""Peaks of curves, found and labelled at will."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from PySide6.QtCore import QRectF

Array = NDArray[np.float64]

#: A turn of a curve counts as a peak where the curve comes back from it by this share of its whole range.
LEAST_RETURN = 0.08
#: Labels at most on one curve: the largest.
MOST = 8


@dataclass(frozen=True)
class PeakAt:
    """A turn of a curve: the number of its sample, and whether it is a top or a bottom."""

    index: int
    top: bool


def peaks_of(values: Array) -> list[PeakAt]:
    """Tops and bottoms in turn, each left by at least `LEAST_RETURN` of the range of `values`, shape (n,); at most
    `MOST`, the largest in magnitude, in their order."""
    if len(values) < 3 or np.ptp(values) == 0:
        return []
    least = LEAST_RETURN * float(np.ptp(values))
    slope = np.sign(np.diff(values))
    slope = slope[np.flatnonzero(slope)] if not slope.all() else slope
    steps = np.flatnonzero(np.diff(values))
    turns = steps[:-1][slope[1:] != slope[:-1]] + 1
    found: list[PeakAt] = []
    high = low = 0
    rising: bool | None = None
    for index in (*turns.tolist(), len(values) - 1):
        value = values[index]
        if value > values[high]:
            high = index
        if value < values[low]:
            low = index
        if rising is not False and values[high] - value >= least:
            if 0 < high:
                found.append(PeakAt(high, True))
            rising, low = False, index
            high = index
        elif rising is not True and value - values[low] >= least:
            if 0 < low:
                found.append(PeakAt(low, False))
            rising, high = True, index
            low = index
    # a curve that only leaves its rest has its bottom there, which says nothing
    largest = sorted(found, key=lambda p: -abs(float(values[p.index])))[:MOST]
    return sorted((p for p in largest if abs(values[p.index]) > 0.02 * np.ptp(values)), key=lambda p: p.index)


def place_label(
    x: float, y: float, top: bool, width: float, height: float, plot: QRectF, taken: list[QRectF]
) -> QRectF | None:
    """A free box beside a peak: beyond it first, then to its right and left; `None` where all are taken."""
    beyond = y - height - 3 if top else y + 3
    places = (
        (x - width / 2, beyond),
        (x + 6, beyond + height / 2 * (1 if top else -1)),
        (x - width - 6, beyond + height / 2 * (1 if top else -1)),
        (x + 6, y - height / 2),
        (x - width - 6, y - height / 2),
    )
    for left, upper in places:
        box = QRectF(left, upper, width, height)
        if plot.contains(box) and not any(box.intersects(other) for other in taken):
            taken.append(box)
            return box
    return None

"""Where names stand on their curves: near their own, off the others, off each other."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.lib.stride_tricks import sliding_window_view
from numpy.typing import NDArray
from PySide6.QtCore import QRectF

Array = NDArray[np.float64]

#: Pixels between the places that are tried.
STEP = 4.0
#: Further away than any pixel: where a curve is not.
FAR = 1e9


@dataclass(frozen=True, eq=False)
class Drawn:
    """A curve on the screen: pixels, both of shape (n,), x rising."""

    x: Array
    y: Array


@dataclass(frozen=True)
class Wanted:
    """A name of so many pixels that belongs to the curve at an index."""

    curve: int
    width: float


class Heights:
    """Curves on one grid of pixels across a plot: what a box would cover is looked up for all of them at once."""

    def __init__(self, curves: Sequence[Drawn], plot: QRectF) -> None:
        self.grid = np.arange(plot.left() + 4, plot.right() - 4, STEP)
        self.rows = np.array([_row(c, self.grid) for c in curves]).reshape(len(curves), len(self.grid))
        self.there = np.isfinite(self.rows)
        self.least = np.where(self.there, self.rows, FAR)
        self.most = np.where(self.there, self.rows, -FAR)

    def through(self, box: QRectF) -> int:
        """How many curves run through a box."""
        first, last = self._columns(box)
        if last <= first:
            return 0
        least, most = self.least[:, first:last].min(axis=1), self.most[:, first:last].max(axis=1)
        return int(np.count_nonzero((least < box.bottom()) & (most > box.top())))

    def reaches(self, curve: int, box: QRectF, away: float) -> bool:
        """Whether a curve comes nearer than that to a box, above or below it."""
        first, last = self._columns(box)
        if last <= first:
            return False
        least, most = self.least[curve, first:last].min(), self.most[curve, first:last].max()
        return bool(least < box.bottom() + away and most > box.top() - away)

    def _columns(self, box: QRectF) -> tuple[int, int]:
        first, last = np.searchsorted(self.grid, (box.left(), box.right()))
        return int(first), int(last)


def place_labels(
    heights: Heights, wanted: Sequence[Wanted], plot: QRectF, height: float, off: Sequence[QRectF] = ()
) -> list[QRectF | None]:
    """A box for each name; `None` where none is free. In turn each takes the cheapest place left: off all curves and
    off the boxes `off`, where its own curve lies away from the others."""
    taken: list[QRectF] = list(off)
    placed: list[QRectF | None] = []
    for name in wanted:
        box = _cheapest(heights, name, plot, height, taken)
        placed.append(box)
        if box is not None:
            taken.append(box)
    return placed


def crosses(curve: Drawn, box: QRectF) -> bool:
    """Whether a curve runs through a box, wherever its points lie."""
    inside = (curve.x >= box.left()) & (curve.x <= box.right())
    ends = np.interp((box.left(), box.right()), curve.x, curve.y) if len(curve.x) else np.zeros(0)
    heights = np.concatenate((curve.y[inside], ends))
    return bool(len(heights) and heights.min() < box.bottom() and heights.max() > box.top())


def _row(curve: Drawn, grid: Array) -> Array:
    """Pixel heights on the grid; not a number where the curve does not reach."""
    if not len(curve.x):
        return np.full(len(grid), np.nan)
    return np.interp(grid, curve.x, curve.y, left=np.nan, right=np.nan)


def _cheapest(
    heights: Heights, name: Wanted, plot: QRectF, height: float, taken: Sequence[QRectF]
) -> QRectF | None:
    rows, grid, there = heights.rows, heights.grid, heights.there
    span = int(np.ceil(name.width / STEP)) + 1
    if len(grid) < span:
        return None
    # the lowest and the highest of each curve over the width of the name, shape (curves, places)
    tops = sliding_window_view(heights.least, span, axis=1).min(axis=2)
    bottoms = sliding_window_view(heights.most, span, axis=1).max(axis=2)
    middles = rows[:, span // 2 : span // 2 + tops.shape[1]]
    own = middles[name.curve]
    others = np.arange(len(rows)) != name.curve
    gaps = np.where(there[:, span // 2 : span // 2 + tops.shape[1]], np.abs(middles - own), 60.0)[others]
    apart = np.nan_to_num(np.min(gaps, axis=0, initial=60.0), nan=60.0)
    best: tuple[float, QRectF] | None = None
    lefts = grid[: len(own)]
    for above in (True, False):
        edge = tops[name.curve] - height - 1 if above else bottoms[name.curve] + 1
        cost = -1.0 * apart + 0.01 * (lefts - plot.left())
        # how far the words stand from the middle of what they name
        cost += 0.5 * np.abs(edge + height / 2 - own)
        meets = (tops[others] < edge + height + 1) & (bottoms[others] > edge - 1)
        cost += 400.0 * np.count_nonzero(meets, axis=0)
        for box in taken:
            covers = (lefts < box.right() + 6) & (lefts + name.width > box.left() - 6)
            covers &= (edge < box.bottom() + 1) & (edge + height > box.top() - 1)
            cost += np.where(covers, 2000.0, 0.0)
        outside = (edge < plot.top()) | (edge + height > plot.bottom()) | ~np.isfinite(own)
        cost += np.where(outside, 1e6, 0.0)
        cost = np.nan_to_num(cost, nan=1e6)
        pick = int(np.argmin(cost))
        if cost[pick] < 1500 and (best is None or cost[pick] < best[0]):
            best = float(cost[pick]), QRectF(float(lefts[pick]), float(edge[pick]), name.width, height)
    return best[1] if best else None

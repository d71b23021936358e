"""The two axes of the Bench, and the margins that make them one: every picture maps a distance or a time through these.

Distance runs downwards and is shared by the pictures side by side; time runs to the right and is shared by the
pictures one under the other. Pictures in one row have equal heights and equal margins above and below, pictures in one
column equal widths and equal margins left and right, so equal values lie on equal pixels.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from itertools import pairwise
from math import ceil, floor, log10

import numpy as np
from PySide6.QtCore import QRectF
from PySide6.QtGui import QFont, QFontMetricsF

from solver.model.project import Case

#: Room above the struck end for what strikes, and below the far end for what holds it, in lengths of the member.
ROOM_ABOVE = {"drop": 0.2, "pulse": 0.17, "history": 0.17, "none": 0.04}
ROOM_BELOW = 0.07


@dataclass(frozen=True)
class Axis:
    """A linear axis: `low` lies at pixel `start`, `high` at `start + length`."""

    low: float
    high: float
    start: float
    length: float

    def pixel(self, value: float | np.ndarray) -> float | np.ndarray:
        """Pixel at which a value lies; arrays go through as arrays."""
        return self.start + (value - self.low) * (self.length / (self.high - self.low))

    def at(self, value: float) -> float:
        """Pixel of one value."""
        return self.start + (value - self.low) * (self.length / (self.high - self.low))

    def value(self, pixel: float) -> float:
        """Value that lies at a pixel."""
        return self.low + (pixel - self.start) * ((self.high - self.low) / self.length)

    def clipped(self, value: float) -> float:
        return min(max(value, self.low), self.high)

    def zoomed(self, about: float, factor: float) -> tuple[float, float]:
        """Bounds after a zoom that leaves the value `about` where it is."""
        return about + (self.low - about) * factor, about + (self.high - about) * factor


@dataclass(frozen=True)
class Margins:
    """Pixels around a plot: `header` above it, `bottom` below, `gutter` left of it for numbers, `right` of it."""

    header: float
    bottom: float
    gutter: float
    right: float

    def plot(self, width: float, height: float) -> QRectF:
        """Rectangle that is left for the plot, never empty."""
        return QRectF(
            self.gutter,
            self.header,
            max(width - self.gutter - self.right, 10.0),
            max(height - self.header - self.bottom, 10.0),
        )


@lru_cache(maxsize=16)
def margins_of(font: QFont) -> Margins:
    """Margins of every picture, in whole pixels, from the height of its letters."""
    metrics = QFontMetricsF(font)
    line = metrics.height()
    return Margins(
        header=float(round(1.9 * line)),
        bottom=float(round(1.6 * line)),
        gutter=float(round(metrics.horizontalAdvance("−0 000") + 1.5 * line)),
        right=float(round(0.8 * line)),
    )


def whole_distance(case: Case) -> tuple[float, float]:
    """Distances from the top of what strikes to below the far end, m."""
    length = case.member.length
    striking = sum(s.length for s in case.ram_segments)
    above = 1.06 * striking if striking else ROOM_ABOVE.get(case.load.kind, 0.1) * length
    return -above, length * (1 + ROOM_BELOW)


def inside(wanted: tuple[float, float] | None, whole: tuple[float, float]) -> tuple[float, float]:
    """The bounds wanted, moved and cut so that they lie inside the whole; the whole where none are wanted."""
    if wanted is None:
        return whole
    low, high = wanted
    span = min(high - low, whole[1] - whole[0])
    if span <= 0:
        return whole
    low = min(max(low, whole[0]), whole[1] - span)
    return low, low + span


def tidy_step(span: float, most: int) -> float:
    """Smallest of 1, 2, 5 times a power of ten that divides a span into at most so many parts."""
    if span <= 0 or most < 1:
        return 1.0
    rough = span / most
    power = 10.0 ** floor(log10(rough))
    return next((m * power for m in (1, 2, 5) if m * power >= rough * (1 - 1e-9)), 10 * power)


def ticks(low: float, high: float, most: int) -> list[float]:
    """Tidy numbers between two bounds, at most about so many of them."""
    step = tidy_step(high - low, most)
    first, last = ceil(low / step - 1e-9), floor(high / step + 1e-9)
    return [n * step for n in range(first, last + 1)]


def tick_texts(values: list[float]) -> list[str]:
    """Ticks in words, all with the decimals that their step needs."""
    if not values:
        return []
    step = min((b - a for a, b in pairwise(values)), default=abs(values[0]) or 1.0)
    decimals = max(0, -floor(log10(step) + 1e-9))
    texts = []
    for value in values:
        text = f"{value:,.{decimals}f}" if abs(value) >= 1e4 else f"{value:.{decimals}f}"
        negative = text.startswith("-") and any(c not in "-0.," for c in text)
        texts.append(("−" if negative else "") + text.lstrip("-").replace(",", "\u202f"))
    return texts


def rounded_up(value: float) -> float:
    """The next tidy number above (1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8 times a power of ten), for scales; 1 for 0."""
    if value <= 0 or not np.isfinite(value):
        return 1.0
    power = 10.0 ** floor(log10(value))
    tidy = (1, 1.2, 1.5, 1.7, 2, 2.5, 3, 3.5, 4, 5, 6, 7, 8, 10)
    return next(m * power for m in tidy if m * power >= value * (1 - 1e-9))

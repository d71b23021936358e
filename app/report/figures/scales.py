"""Axes of a figure: tidy ticks, numbers beside them, curves thinned to what print can show."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise
from math import ceil, floor, isfinite, log10

import numpy as np
from numpy.typing import NDArray

from app.units import MINUS, NARROW_SPACE

Array = NDArray[np.float64]
#: Points of a curve in print: two to a point of width.
MOST_POINTS = 900


@dataclass(frozen=True)
class Scale:
    """A linear axis: `low` lies at `start` (points), `high` at `end`."""

    low: float
    high: float
    start: float
    end: float

    def at(self, value: float) -> float:
        return self.start + (value - self.low) / (self.high - self.low) * (self.end - self.start)

    def of(self, values: Array) -> Array:
        """Places of many values, shape as given."""
        return self.start + (values - self.low) / (self.high - self.low) * (self.end - self.start)

    def ticks(self, most: int = 8) -> list[float]:
        """Tidy numbers between the bounds, at most about so many."""
        step = tidy_step(self.high - self.low, most)
        first, last = ceil(self.low / step - 1e-9), floor(self.high / step + 1e-9)
        return [n * step for n in range(first, last + 1)]


def tidy_step(span: float, most: int) -> float:
    """Smallest of 1, 2, 5 times a power of ten that divides a span into at most so many parts."""
    rough = span / most
    power = 10.0 ** floor(log10(rough))
    return next((m * power for m in (1, 2, 5) if m * power >= rough * (1 - 1e-9)), 10 * power)


def tick_texts(values: list[float]) -> list[str]:
    """Ticks in words, all with the decimals that their step needs."""
    step = abs(values[1] - values[0]) if len(values) > 1 else abs(values[0]) or 1.0 if values else 1.0
    decimals = max(0, -floor(log10(step) + 1e-9))
    return [
        f"{v + 0.0:,.{decimals}f}".replace(",", NARROW_SPACE if abs(v) >= 1e4 else "").replace("-", MINUS)
        for v in values
    ]


def bounds_of(*series: Array, zero: bool = True) -> tuple[float, float]:
    """Bounds around all finite values with a little room, never equal."""
    finite = [s[np.isfinite(s)] for s in series]
    full = [s for s in finite if s.size]
    low = min((float(s.min()) for s in full), default=0.0)
    high = max((float(s.max()) for s in full), default=0.0)
    if zero:
        low, high = min(low, 0.0), max(high, 0.0)
    if not (isfinite(low) and isfinite(high)) or high - low <= 1e-300:
        return low - 1.0, high + 1.0
    room = 0.06 * (high - low)
    return low - (room if low < 0 or not zero else 0.0), high + (room if high > 0 or not zero else 0.0)


def thinned(x: Array, y: Array, most: int = MOST_POINTS) -> tuple[Array, Array]:
    """A curve with fewer points that looks the same: of each stretch its first, lowest, highest and last."""
    count = len(x)
    if count <= most:
        return x, y
    edges = np.linspace(0, count, most // 4 + 1).astype(int)
    kept = set()
    for begin, end in pairwise(edges):
        part = y[begin:end]
        kept |= {begin, begin + int(part.argmin()), begin + int(part.argmax()), end - 1}
    index = np.array(sorted(kept))
    return x[index], y[index]

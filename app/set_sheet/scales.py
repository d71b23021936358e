"""Scales of the chart: where a value lies, and its tidy ticks."""

from __future__ import annotations

from dataclasses import dataclass
from math import ceil, floor, log10, sqrt


@dataclass(frozen=True)
class Scale:
    """Values from `low` to `high` onto pixels from `start` to `stop`; `root` spreads small values by square roots."""

    low: float
    high: float
    start: float
    stop: float
    root: bool = False

    def at(self, value: float) -> float:
        span = self.high - self.low or 1.0
        share = (value - self.low) / span
        if self.root:
            share = sqrt(max(share, 0.0))
        return self.start + share * (self.stop - self.start)

    def value(self, pixel: float) -> float:
        share = (pixel - self.start) / ((self.stop - self.start) or 1.0)
        if self.root:
            share = max(share, 0.0) ** 2
        return self.low + share * (self.high - self.low)


def tidy(rough: float) -> float:
    """Smallest of 1, 2, 5 times a power of ten that is at least `rough`."""
    if rough <= 0:
        return 1.0
    power = 10.0 ** floor(log10(rough))
    return next(m * power for m in (1, 2, 5, 10) if m * power >= rough * (1 - 1e-9))


def ticks(low: float, high: float, most: int) -> list[float]:
    """Tidy values between two bounds, about `most` of them at most."""
    step = tidy((high - low) / max(1, most))
    return [n * step for n in range(ceil(low / step - 1e-9), floor(high / step + 1e-9) + 1)]


def root_ticks(high: float) -> list[float]:
    """Tidy values from 0 for a scale of square roots: 0 1 2 5 10 20 50."""
    found, power = [], 10.0 ** (floor(log10(high)) - 2) if high > 0 else 1.0
    while power <= high:
        found += [m * power for m in (1, 2, 5) if m * power <= high * (1 + 1e-9)]
        power *= 10
    return [0.0, *[v for v in found if v >= high / 130]]


def number(value: float) -> str:
    """A tick in words, without digits that say nothing."""
    text = f"{value:.6g}" if abs(value) < 1e6 else f"{value:.0f}"
    if abs(value) >= 1e4 and "e" not in text:
        text = f"{value:,.0f}".replace(",", "\u202f")
    return text.replace("-", "\u2212")

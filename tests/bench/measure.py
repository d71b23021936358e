"""Measuring side by side: what is compared takes turns; a fixed loop in between tells how restless the machine is."""

from __future__ import annotations

import time
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field
from typing import Any

import numpy as np

Clock = Callable[[], float]

#: Spread of the calibration loop (half the distance of its quartiles over its median) above which nothing is judged.
TOO_NOISY = 0.08


@dataclass
class Row:
    """One line of the answer: what was compared, how often, and what came of it. `reach`: least ratio (or with
    `at_most` the largest). Where there is no ratio but a time or a rate, `ratio` holds it, and `unit` says of what."""

    name: str
    compared: str
    ratio: float | None = None
    reach: float | None = None
    at_most: bool = False
    at_least: float | None = None
    unit: str = ""
    spread: float | None = None
    repetitions: int = 0
    noise: float | None = None
    skipped: str = ""
    more: dict[str, Any] = field(default_factory=dict)

    @property
    def verdict(self) -> str:
        """met, short, not judged (with the reason), skipped (with the reason), or stated where nothing is asked."""
        if self.skipped:
            return f"skipped: {self.skipped}"
        if self.noise is not None and self.noise > TOO_NOISY:
            return f"not judged: the machine is too noisy (calibration spreads by {self.noise:.0%})"
        if self.reach is None or self.ratio is None:
            return "stated"
        met = self.ratio <= self.reach if self.at_most else self.ratio >= self.reach
        met = met and self.ratio >= (self.at_least or -np.inf)
        return "met" if met else "short"

    def told(self) -> dict[str, Any]:
        """As it is printed: plain values, rounded to what can be read from a spread."""
        row = {
            "name": self.name,
            **(
                {"value": _rounded(self.ratio), "unit": self.unit}
                if self.unit
                else {"ratio": _rounded(self.ratio)}
            ),
            "compared": self.compared,
            "reach": self.reach,
            "reach_is": "at most" if self.at_most else "at least",
            "repetitions": self.repetitions,
            "spread": _rounded(self.spread),
            "calibration_spread": _rounded(self.noise),
            "verdict": self.verdict,
        }
        return {**row, **{k: _rounded(v) for k, v in self.more.items()}}


def _rounded(value: Any) -> Any:
    return float(f"{value:.4g}") if isinstance(value, float) else value


def spread_of(values: Sequence[float]) -> float:
    """Half the distance between the quartiles, over the median."""
    low, middle, high = np.percentile(values, (25, 50, 75))
    return float((high - low) / 2 / middle)


def calibration(clock: Clock = time.perf_counter) -> float:
    """Seconds of a fixed loop of Python and of numpy that has nothing to do with the program."""
    began = clock()
    total = 0
    for i in range(60_000):
        total += i * i % 7
    values = np.arange(20_000.0)
    for _ in range(40):
        values = np.sqrt(values + 1.0)
    return clock() - began


@dataclass
class Pairs:
    """Times (s) of each contestant, one a repetition, and how restless the machine was meanwhile."""

    times: dict[str, list[float]]
    noise: float

    def ratio(self, upper: str, lower: str) -> float:
        """Median of the ratios of times that were measured side by side."""
        return float(np.median(self._ratios(upper, lower)))

    def spread(self, upper: str, lower: str) -> float:
        return spread_of(self._ratios(upper, lower))

    def median(self, name: str) -> float:
        return float(np.median(self.times[name]))

    def _ratios(self, upper: str, lower: str) -> np.ndarray:
        return np.array(self.times[upper]) / np.array(self.times[lower])


def paired(
    contestants: dict[str, Callable[[], float]],
    repetitions: int,
    clock: Clock = time.perf_counter,
    settle_in: bool = True,
) -> Pairs:
    """Let the contestants take turns. Each measures itself and returns seconds, so that preparing costs it nothing.

    Every repetition turns the order round: what runs second finds caches and clock rates as the first left them.
    """
    times: dict[str, list[float]] = {name: [] for name in contestants}
    if settle_in:
        for run in contestants.values():
            run()
    calibration(clock)
    beats = []
    for turn in range(repetitions):
        beats.append(calibration(clock))
        order = list(contestants) if turn % 2 == 0 else list(contestants)[::-1]
        for name in order:
            times[name].append(contestants[name]())
        beats.append(calibration(clock))
    return Pairs(times, spread_of(beats))

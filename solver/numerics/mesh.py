"""The mesh: elements that a wave crosses in one time step each, and the step itself.

On piecewise-uniform linear rods central differences are exact where every element has Courant number 1. So one step
is chosen and each segment gets the whole number of elements nearest to its travel time in steps; travel times
without a common divisor leave Courant numbers a little under 1, and the search keeps the worst of them close to 1.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

#: Fewest elements along a member that the program chooses by itself.
FEWEST = 400
#: Most elements that it chooses by itself; a person may ask for more.
MOST = 20_000
#: Worst mismatch of Courant numbers that is accepted without looking for a finer mesh.
MISMATCH = 0.005


@dataclass(frozen=True)
class SegmentSteps:
    """What the mesh must know of one segment: its travel time (s) and how its law shortens the step.

    `viscous_time` is eta/E (s) of a Kelvin-Voigt segment, 0 for others; `stiffening` the largest ratio of the tangent
    stiffness to the initial one that the law may reach.
    """

    travel_time: float
    viscous_time: float = 0.0
    stiffening: float = 1.0

    def most_elements(self, dt: NDArray[np.float64]) -> NDArray[np.float64]:
        """Largest number of elements (not rounded) at which a step `dt` (s) is stable.

        Undamped: dt <= dx/c. Kelvin-Voigt, lagged: dt <= (2/w)(sqrt(1 + xi^2) - xi) with w = 2c/dx and
        xi = eta c/(E dx) (Belytschko, Liu and Moran 2000, from memory), solved for dx/c.
        """
        transit = np.sqrt(dt**2 + 2 * dt * self.viscous_time) * np.sqrt(self.stiffening)
        return self.travel_time / transit

    def longest_step(self, count: NDArray[np.float64]) -> NDArray[np.float64]:
        """Largest stable step (s) with `count` elements; the inverse of `most_elements`."""
        transit = self.travel_time / count / np.sqrt(self.stiffening)
        # hypot(transit, viscous) - viscous without the difference of nearly equal numbers
        return np.asarray(transit * (transit / (np.hypot(transit, self.viscous_time) + self.viscous_time)))

    @property
    def plain(self) -> bool:
        """Whether Courant number 1 can be had."""
        return self.viscous_time == 0.0 and self.stiffening == 1.0


@dataclass(frozen=True)
class Steps:
    """The outcome: step (s), elements per segment, and the smallest Courant number of the plain segments."""

    dt: float
    counts: tuple[int, ...]
    courant_worst: float


def choose_steps(
    segments: Sequence[SegmentSteps], member: slice, wanted: int, exactly: bool, marks: Sequence[float] = ()
) -> Steps:
    """Choose the step for all segments in the chain.

    `member` picks the segments of the member itself, along which about `wanted` elements are laid (at least that many
    where the program chooses; close to it where a person did: `exactly`). `marks` are travel times (s) from the
    struck end to gauges: where several meshes are equally good, one with nodes at the gauges is taken.
    """
    total = sum(s.travel_time for s in segments[member])
    window = np.arange(wanted, max(int(wanted * (1.05 if exactly else 2)), wanted + 1) + 1)
    best = _best(segments, total, window, marks)
    while not exactly and 1 - best.courant_worst > MISMATCH and window[-1] < MOST:
        window = np.arange(window[-1], min(window[-1] * 2, MOST + 1) + 1)
        finer = _best(segments, total, window, marks)
        if finer.courant_worst > best.courant_worst:
            best = finer
    return best


def _best(
    segments: Sequence[SegmentSteps], total: float, window: NDArray[np.int64], marks: Sequence[float]
) -> Steps:
    wanted_dt = total / window
    counts, limits = [], []
    for s in segments:
        ideal = s.most_elements(wanted_dt)
        count = np.maximum(np.rint(ideal) if s.plain else np.floor(ideal * (1 + 1e-9)), 1)
        counts.append(count)
        limits.append(s.longest_step(count))
    dt = np.min(limits, axis=0)
    courants = [dt * n / s.travel_time for s, n in zip(segments, counts, strict=True) if s.plain]
    mismatch = 1 - (np.min(courants, axis=0) if courants else np.ones_like(dt))
    mismatch[mismatch < 1e-9] = 0.0
    off_node = sum((np.abs(m / dt - np.rint(m / dt)) > 1e-6).astype(float) for m in marks) + np.zeros_like(dt)
    # the coarsest among equally good meshes; a node at every gauge only decides between exact ones
    order = np.lexsort((window, off_node * (mismatch == 0), mismatch))
    i = int(order[0])
    return Steps(float(dt[i]), tuple(int(n[i]) for n in counts), float(1 - mismatch[i]))

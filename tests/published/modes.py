"""One mode of a rod set going, and its frequency read to many digits."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from solver.numerics.chain import Chain
from solver.run import solve_chain

Array = NDArray[np.float64]


def started(chain: Chain, shape: Array, dt: float | None = None) -> Chain:
    """The same chain with a velocity `shape` (m/s, one per node) at the start, and another step if wanted (s)."""
    return replace(chain, velocity=np.asarray(shape, float), dt=chain.dt if dt is None else dt)


def angular_frequency(chain: Chain, gauge: str, expected: float, steady: float = 0.0) -> float:
    """Angular frequency of the one mode that swings, 1/s, from the displacement at a gauge; `steady` (m/s) is a motion
    of the whole rod that is taken off.

    A harmonic record obeys u(t + s) + u(t - s) = 2 cos(w s) u(t) for any shift s; the shift taken is near a
    quarter of the expected period, where cos(w s) tells w best and periods cannot be mistaken.
    """
    run = solve_chain(chain)
    record = run.gauges[gauge].displacement - steady * run.gauges[gauge].time
    shift = max(1, round(np.pi / 2 / expected / run.time_step))
    middle = record[shift:-shift]
    both = record[2 * shift :] + record[: -2 * shift]
    cosine = float(both @ middle / (2 * middle @ middle))
    return float(np.arccos(cosine) / (shift * run.time_step))

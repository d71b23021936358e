"""Layered rods solved by their waves alone: each layer is a pair of delay lines, each boundary a scattering of
four waves.

Method of characteristics (d'Alembert in each layer; coefficients at a step from equal force and velocity on both
sides, Kolsky 1963). Travel times are rounded to a lattice so fine that this is the only error. No elements, no
time stepping of masses: nothing in common with the solver but the physics. Forces here are compression positive,
velocities towards the far end.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Layer:
    """A uniform piece of rod: travel time (s) and impedance (N s/m)."""

    travel_time: float
    impedance: float


@dataclass(frozen=True)
class Waves:
    """Force waves just below the upper boundary of each layer (`down`) and just above its lower one (`up`),
    shape (layers, n).
    """

    step: float
    delays: tuple[int, ...]
    impedances: tuple[float, ...]
    down: Array
    up: Array

    def force_and_velocity(self, layer: int, share: float, time: Array) -> tuple[Array, Array]:
        """Compression (N) and velocity (m/s) in a layer, `share` (0 to 1) of its travel time below its
        top, at `time` (s).
        """
        grid = np.arange(self.down.shape[1]) * self.step
        passed = share * self.delays[layer] * self.step
        left = self.delays[layer] * self.step - passed
        down = np.interp(time - passed, grid, self.down[layer], left=0.0)
        up = np.interp(time - left, grid, self.up[layer], left=0.0)
        return down + up, (down - up) / self.impedances[layer]


def waves(
    layers: Sequence[Layer],
    force: Callable[[Array], Array],
    reflection: float,
    until: float,
    cells: int = 200_000,
) -> Waves:
    """Waves in a rod at rest, pushed by `force(t)` (N) at its top, until a time (s).

    `reflection` of force waves at the far end: -1 free, 1 fixed, 0 matched, (C - Z)/(C + Z) for a dashpot C.
    `cells` is the number of lattice steps in one passage of the whole rod.
    """
    step = sum(layer.travel_time for layer in layers) / cells
    delays = tuple(max(1, round(layer.travel_time / step)) for layer in layers)
    z = [layer.impedance for layer in layers]
    count = int(np.ceil(until / step)) + 2
    down, up = np.zeros((len(layers), count)), np.zeros((len(layers), count))
    pushed = force(np.arange(count) * step)
    block = min(delays)
    for start in range(0, count, block):
        stop = min(start + block, count)
        arriving_down = [_delayed(down[i], delays[i], start, stop) for i in range(len(layers))]
        arriving_up = [_delayed(up[i], delays[i], start, stop) for i in range(len(layers))]
        down[0, start:stop] = pushed[start:stop] - arriving_up[0]
        for i in range(len(layers) - 1):
            r = (z[i + 1] - z[i]) / (z[i + 1] + z[i])
            up[i, start:stop] = r * arriving_down[i] + (1 - r) * arriving_up[i + 1]
            down[i + 1, start:stop] = (1 + r) * arriving_down[i] - r * arriving_up[i + 1]
        up[-1, start:stop] = reflection * arriving_down[-1]
    return Waves(step, delays, tuple(z), down, up)


def _delayed(wave: Array, delay: int, start: int, stop: int) -> Array:
    """What left `delay` steps ago; nothing before time 0."""
    found = np.zeros(stop - start)
    first = start - delay
    if stop - delay > 0:
        found[max(0, -first) :] = wave[max(0, first) : stop - delay]
    return found

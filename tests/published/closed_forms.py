"""Closed forms that several checks share, written anew: pulses, d'Alembert by images, the lattice of a layered rod.

Compression is positive here, as in the literature on impact; the solver takes tension positive.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Impulse = Callable[[Array], Array]


def impulse(shape: str, duration: float, **more: float) -> Impulse:
    """Integral from 0 to t of a pulse with peak 1 that begins at t = 0, s."""
    if shape == "rectangle":
        return polygon([0.0, duration], [1.0, 1.0])
    if shape == "triangle":
        return polygon([0.0, duration / 2, duration], [0.0, 1.0, 0.0])
    if shape == "trapezoid":
        rise, fall = more["rise"], more["fall"]
        return polygon([0.0, rise, duration - fall, duration], [0.0, 1.0, 1.0, 0.0])
    if shape == "half_sine":
        return lambda t: duration / np.pi * (1 - np.cos(np.pi * np.clip(t / duration, 0, 1)))
    if shape == "haversine":
        return lambda t: _haversine(np.clip(t / duration, 0, 1)) * duration
    if shape == "decay":
        return lambda t: duration * (1 - np.exp(-np.clip(t, 0, None) / duration))
    raise ValueError(shape)


def _haversine(s: Array) -> Array:
    return s / 2 - np.sin(2 * np.pi * s) / (4 * np.pi)


def polygon(times: Sequence[float], values: Sequence[float]) -> Impulse:
    """Integral of straight lines between points, zero outside; equal times make a jump."""
    t, f = np.array(times, float), np.array(values, float)
    areas = np.concatenate(([0.0], np.cumsum(np.diff(t) * (f[1:] + f[:-1]) / 2)))

    def integral(at: Array) -> Array:
        at = np.clip(at, t[0], t[-1])
        i = np.clip(np.searchsorted(t, at, side="right"), 1, len(t) - 1)
        width = np.where(t[i] > t[i - 1], t[i] - t[i - 1], np.inf)
        since = at - t[i - 1]
        return areas[i - 1] + since * (f[i - 1] + (f[i] - f[i - 1]) * since / width / 2)

    return integral


def displacement(
    x: float, t: Array, entering: Impulse, length: float, c: float, near: int, far: int
) -> Array:
    """Displacement of a uniform rod by images (d'Alembert); `entering`: that of the struck end before any echo.

    `near`, `far`: what an end sends back of a displacement wave: +1 free (or under a force), -1 held, 0 nothing.
    """
    total, travel, m = np.zeros_like(t, dtype=float), 2 * length / c, 0
    while m == 0 or (m * travel <= t[-1] + travel and near * far):
        share = float(near * far) ** m
        total += share * entering(t - m * travel - x / c)
        total += share * far * entering(t - (m + 1) * travel + x / c)
        m += 1
    return total


def at_gauge(
    shape: Impulse,
    x: float,
    t: Array,
    dt: float,
    *,
    stiffness: float,
    length: float,
    c: float,
    near: int,
    far: int,
) -> tuple[Array, Array, Array]:
    """Force (compression positive), velocity and displacement as a mesh of Courant number 1 can know them.

    Displacements are those of the point itself. A velocity is its mean over the two steps around a time, a force the
    mean over the two elements around a place: exact means of the exact wave, so that jumps need no special word.
    """
    dx = c * dt
    u = [displacement(x, t + k * dt, shape, length, c, near, far) for k in (-1, 0, 1)]
    left, right = (displacement(x + k * dx, t, shape, length, c, near, far) for k in (-1, 1))
    return -stiffness * (right - left) / (2 * dx), (u[2] - u[0]) / (2 * dt), u[1]


def lattice(
    impedances: Sequence[float], cells: Sequence[int], steps: int, *, held: bool, far: int
) -> list[Array]:
    """Velocity at the struck end, every interface and the far end, per unit impulse in one step (Goupillaud 1961).

    Layer i has impedance `impedances[i]` and takes `cells[i]` steps to cross. `held`: the impulse is one of velocity on
    a held end; otherwise of force on a free one. `far`: velocity sent back by the far end, +1 free, -1 fixed, 0 none.
    Returns shape (steps,) each; at the ends the value is that of the end itself.
    """
    z = np.repeat(np.array(impedances, float), cells)
    edges = np.concatenate(([0], np.cumsum(cells)))
    down, up = np.zeros(len(z)), np.zeros(len(z))
    found = [np.zeros(steps) for _ in edges]
    before, after = z[:-1], z[1:]
    for n in range(steps):
        start = 0.0 if n else (1.0 if held else 1.0 / z[0])
        new_down, new_up = np.empty_like(down), np.empty_like(up)
        new_down[0] = start + (-up[0] if held else up[0])
        new_down[1:] = (2 * before * down[:-1] + (after - before) * up[1:]) / (before + after)
        new_up[:-1] = ((before - after) * down[:-1] + 2 * after * up[1:]) / (before + after)
        new_up[-1] = far * down[-1]
        found[0][n] = new_down[0] + up[0]
        for j, edge in enumerate(edges[1:-1], 1):
            found[j][n] = new_down[edge] + up[edge]
        found[-1][n] = down[-1] + new_up[-1]
        down, up = new_down, new_up
    return found


def convolved(weights: Array, entering: Impulse, t: Array, dt: float) -> Array:
    """Displacement from the lattice's weights: sum of w_k P(t - k dt)."""
    total = np.zeros_like(t, dtype=float)
    for k in np.flatnonzero(weights):
        total += weights[k] * entering(t - k * dt)
    return total

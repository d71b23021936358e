"""Loads as closed-form integrals over time, so that a step takes up exactly the impulse that falls into it."""

from __future__ import annotations

from typing import assert_never

import numpy as np
from numpy.typing import NDArray

from solver.model.load import History, Pulse

Array = NDArray[np.float64]


def integral(load: Pulse | History, time: Array) -> Array:
    """Integral of the load from 0 to `time` (s, any shape, negative times give 0): N·s for a force, m for a
    velocity."""
    if isinstance(load, History):
        return _history_integral(load, time)
    since = np.clip(time - load.start, 0.0, None)
    return load.peak * _unit_integral(load, since)


def _unit_integral(pulse: Pulse, t: Array) -> Array:
    """Integral of the pulse of peak 1 that begins at t = 0."""
    length = pulse.duration
    within = np.minimum(t, length)
    match pulse.shape:
        case "rectangle":
            return within
        case "half_sine":
            # 1 - cos written as a product, exact also for small angles
            return 2 * length / np.pi * np.sin(np.pi * within / (2 * length)) ** 2
        case "haversine":
            return within / 2 - length / (4 * np.pi) * np.sin(2 * np.pi * within / length)
        case "triangle":
            return _trapezoid(within, length / 2, length / 2, length)
        case "trapezoid":
            assert pulse.rise is not None
            assert pulse.fall is not None
            return _trapezoid(within, pulse.rise, pulse.fall, length)
        case "decay":
            return -length * np.expm1(-t / length)
        case _:
            assert_never(pulse.shape)


def _trapezoid(t: Array, rise: float, fall: float, length: float) -> Array:
    up = np.minimum(t, rise)
    area = up**2 / (2 * rise) if rise > 0 else np.zeros_like(t)
    plateau = np.clip(t - rise, 0.0, length - rise - fall)
    down = np.clip(t - (length - fall), 0.0, fall)
    area = area + plateau + down
    return area - down**2 / (2 * fall) if fall > 0 else area


def _history_integral(load: History, time: Array) -> Array:
    t, v = load.samples.times, load.samples.values
    sums = np.concatenate(([0.0], np.cumsum(np.diff(t) * (v[1:] + v[:-1]) / 2)))
    at = np.clip(time, t[0], t[-1])
    i = np.clip(np.searchsorted(t, at, side="right") - 1, 0, len(t) - 2)
    step = t[i + 1] - t[i]
    part = at - t[i]
    slope = np.divide(v[i + 1] - v[i], step, out=np.zeros_like(part), where=step > 0)
    return sums[i] + v[i] * part + slope * part**2 / 2


def end_time(load: Pulse | History) -> float:
    """Time after which the load is zero (s); infinite for a decay."""
    if isinstance(load, History):
        return float(load.samples.times[-1])
    return np.inf if load.shape == "decay" else load.start + load.duration


def step_forces(load: Pulse | History, first: int, count: int, dt: float) -> Array:
    """Mean force over [t - dt, t + dt] for steps `first` ... `first + count - 1`, N, shape (count,)."""
    edges = integral(load, (np.arange(first - 1, first + count + 1, dtype=np.float64)) * dt)
    return (edges[2:] - edges[:-2]) / (2 * dt)


def step_velocities(load: Pulse | History, first: int, count: int, dt: float) -> Array:
    """Mean velocity over [t, t + dt] for steps `first` ... `first + count - 1`, m/s, shape (count,)."""
    edges = integral(load, (np.arange(first, first + count + 1, dtype=np.float64)) * dt)
    return np.diff(edges) / dt

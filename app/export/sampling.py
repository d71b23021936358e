"""Fewer samples than the solver has steps, without letting what is too fast for them fold back into them."""

from __future__ import annotations

import numpy as np
from scipy.interpolate import make_interp_spline
from scipy.signal import cheby2, sosfiltfilt

from solver.answer.result import Array

#: Order of the filter, and how far it is down (dB) from half the sampling rate on; run forwards and backwards, twice.
ORDER, DOWN = 8, 40


def filter_words(rate: float) -> str:
    """The filter by name, for the particulars of a record."""
    return (
        f"anti-alias filter: Chebyshev type II, order {ORDER}, run forwards and backwards (no delay), "
        f"at least {2 * DOWN} dB down from {rate / 2:g} Hz on; cubic interpolation between the filtered steps"
    )


def sample_times(count: int, time_step: float, rate: float) -> Array:
    """Times of the samples, s, from 0 to the last step; `count` steps of `time_step` s.

    Raises `ValueError` with a sentence for a rate that the steps cannot carry.
    """
    most = 0.5 / time_step
    if not 0 < rate <= most:
        raise ValueError(
            f"The sampling rate must be above 0 and at most {most:.6g} Hz, half of the solver's own "
            f"{1 / time_step:.6g} Hz: choose a lower one, or every step."
        )
    return np.arange(int((count - 1) * time_step * rate * (1 + 1e-12)) + 1) / rate


def resampled(values: Array, time_step: float, times: Array, rate: float) -> Array:
    """Values at `times` (s), shape (len(times),), of a series of shape (n,) with a step of `time_step` s."""
    if len(values) < 4:
        return np.interp(times, np.arange(len(values)) * time_step, values)
    sections = cheby2(ORDER, DOWN, rate / 2, fs=1 / time_step, output="sos")
    # the filter rings for a few periods of its edge: so much of the record, turned about its ends, is put before it
    before = min(len(values) - 1, int(10 / (rate * time_step)) + 3)
    smooth = sosfiltfilt(sections, values, padlen=before)
    return np.asarray(make_interp_spline(np.arange(len(values)) * time_step, smooth, k=3)(times))

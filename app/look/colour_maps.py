"""Diverging maps with zero at the colour of the paper, as tables for images."""

from __future__ import annotations

from functools import lru_cache
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from app.look.colours import Palette

SIZE = 511  # odd, so that one entry is exactly zero


def stress_map(palette: Palette) -> NDArray[np.uint8]:
    """Shape (511, 3): from full compression (blue) over the paper to full tension (orange), in the sign of the
    solver: entry 0 is the lowest number, most compressive."""
    return _between(
        (palette.compression_deep, palette.compression),
        palette.paper,
        (palette.tension, palette.tension_deep),
    )


def motion_map(palette: Palette) -> NDArray[np.uint8]:
    """Shape (511, 3): from motion towards the struck end over the paper to motion towards the far end."""
    return _between((palette.backward,), palette.paper, (palette.forward,))


def map_of(
    quantity: Literal["stress", "force", "velocity", "displacement"], palette: Palette
) -> NDArray[np.uint8]:
    """The table for a quantity."""
    return stress_map(palette) if quantity in ("stress", "force") else motion_map(palette)


def rgb(colour: str) -> NDArray[np.float64]:
    """Red, green and blue of "#rrggbb", 0 to 255."""
    return np.array([int(colour[i : i + 2], 16) for i in (1, 3, 5)], dtype=float)


@lru_cache(maxsize=16)
def _between(low: tuple[str, ...], middle: str, high: tuple[str, ...]) -> NDArray[np.uint8]:
    stops = [*low, middle, *high]
    ends = len(low), len(high)
    # the deep end takes the last third of its side, so that small values are told apart by lightness first
    below = [-1.0, -0.62][: ends[0]]
    above = [0.62, 1.0][-ends[1] :]
    at = np.array([*below, 0.0, *above])
    colours = np.array([_linear(rgb(stop)) for stop in stops])
    x = np.linspace(-1, 1, SIZE)
    table = np.stack([np.interp(x, at, colours[:, i]) for i in range(3)], axis=1)
    table = np.rint(_coded(table)).astype(np.uint8)
    table.flags.writeable = False
    return table


def _linear(value: NDArray[np.float64]) -> NDArray[np.float64]:
    """Interpolating light with a gamma of 1.5, between that of the code and of light itself, looks even."""
    return (value / 255) ** 1.5


def _coded(value: NDArray[np.float64]) -> NDArray[np.float64]:
    return 255 * value ** (1 / 1.5)

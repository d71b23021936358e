"""A figure as plain marks on a sheet: lines, areas, text, pictures. Drawn as SVG or PDF by two small writers.

Lengths are points (1/72 inch), x to the right, y downwards from the upper left corner.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

Anchor = Literal["start", "middle", "end"]


@dataclass(frozen=True, eq=False)
class Path:
    """A line through points, shape (n, 2), or an area where it has a fill. `dash` in points, empty = whole."""

    points: NDArray[np.float64]
    stroke: str | None = None
    width: float = 0.8
    fill: str | None = None
    dash: tuple[float, ...] = ()
    opacity: float = 1.0
    closed: bool = False


@dataclass(frozen=True)
class Text:
    """Text on its base line at a point; `turned`: reading upwards."""

    x: float
    y: float
    text: str
    colour: str
    size: float = 7.0
    anchor: Anchor = "start"
    bold: bool = False
    turned: bool = False


@dataclass(frozen=True, eq=False)
class Raster:
    """A picture of colours, shape (rows, columns, 3), over a rectangle; each pixel shown as it is."""

    x: float
    y: float
    width: float
    height: float
    colours: NDArray[np.uint8]


Mark = Path | Text | Raster


@dataclass(frozen=True, eq=False)
class Figure:
    """Marks in the order of drawing; `name` says in short what is seen, also to those who cannot see it."""

    name: str
    width: float
    height: float
    marks: tuple[Mark, ...]


def line(points: Sequence[tuple[float, float]], stroke: str, width: float = 0.8, **how: object) -> Path:
    """A line through a few points."""
    return Path(np.array(points, dtype=float), stroke, width, **how)  # type: ignore[arg-type]


def box(
    x: float,
    y: float,
    width: float,
    height: float,
    fill: str | None,
    stroke: str | None = None,
    line_width: float = 0.8,
) -> Path:
    """A rectangle."""
    corners = np.array([(x, y), (x + width, y), (x + width, y + height), (x, y + height)], dtype=float)
    return Path(corners, stroke, line_width, fill, closed=True)

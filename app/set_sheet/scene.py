"""A drawing as plain data, so that the screen and the printed page show the same picture. No Qt, no colour: an ink is
the name of a colour of the palette. Positions in points (screen: device-independent pixels), y downwards."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Literal

Point = tuple[float, float]
Level = Literal["small", "body", "strong"]
Anchor = Literal["left", "middle", "right"]
#: Width of a text at a level.
Measure = Callable[[str, Level], float]


@dataclass(frozen=True)
class Line:
    points: tuple[Point, ...]
    ink: str
    width: float = 1.0
    dash: tuple[float, ...] = ()


@dataclass(frozen=True)
class Area:
    points: tuple[Point, ...]
    ink: str
    strength: float = 1.0


@dataclass(frozen=True)
class Words:
    """`anchor` says which end of the text stands at `at`, on its base line; `turned`: read from below upwards."""

    at: Point
    text: str
    ink: str = "ink"
    level: Level = "small"
    anchor: Anchor = "left"
    turned: bool = False


@dataclass(frozen=True)
class Mark:
    """A point of a line; `shape` counts: circle, square, triangle, diamond."""

    at: Point
    shape: int
    ink: str
    filled: bool = True
    size: float = 3.6


Item = Line | Area | Words | Mark
Scene = list[Item]


def outline_of(mark: Mark) -> tuple[Point, ...] | None:
    """Corners of a mark, `None` for a circle."""
    (x, y), s = mark.at, mark.size
    corners: tuple[tuple[Point, ...] | None, ...] = (
        None,
        ((-0.9, -0.9), (0.9, -0.9), (0.9, 0.9), (-0.9, 0.9)),
        ((0, -1.2), (1.1, 0.8), (-1.1, 0.8)),
        ((0, -1.25), (1.25, 0), (0, 1.25), (-1.25, 0)),
    )
    chosen = corners[mark.shape % len(corners)]
    return None if chosen is None else tuple((x + s * dx, y + s * dy) for dx, dy in chosen)

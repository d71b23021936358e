"""A drawing as plain data, so that the screen and the printed page show the same picture. No Qt, no colour: an ink is
the name of a colour of the palette. Positions in points (screen: device-independent pixels), y downwards."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Literal

Point = tuple[float, float]
Level = Literal["small", "body", "strong"]
Anchor = Literal["left", "middle", "right"]
#: Width of a text at a level.
Measure = Callable[[str, Level], float]


@dataclass(frozen=True)
class Letters:
    """The letters of whoever draws: `width` of a text at a level, and the height of a `line` of small print."""

    width: Measure
    line: float


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


#: Left, top, right and bottom.
Box = tuple[float, float, float, float]
#: Height of a level in lines of small print.
HEIGHTS: dict[Level, float] = {"small": 1.0, "body": 1.1, "strong": 1.1}


def box_of(words: Words, letters: Letters) -> Box:
    """Where a text stands."""
    width, height = letters.width(words.text, words.level), letters.line * HEIGHTS[words.level]
    x, y = words.at
    before = {"left": 0.0, "middle": width / 2, "right": width}[words.anchor]
    if words.turned:
        return x - height / 2, y + before - width, x + height / 2, y + before
    return x - before, y - 0.78 * height, x - before + width, y + 0.22 * height


def touches(box: Box, line: Line) -> bool:
    """Whether a line runs through a box (Liang and Barsky's clipping)."""
    return any(_crosses(box, a, b) for a, b in pairwise(line.points))


def overlap(one: Box, other: Box) -> bool:
    return one[0] < other[2] and other[0] < one[2] and one[1] < other[3] and other[1] < one[3]


def _crosses(box: Box, start: Point, stop: Point) -> bool:
    enter, leave = 0.0, 1.0
    for low, high, origin, step in (
        (box[0], box[2], start[0], stop[0] - start[0]),
        (box[1], box[3], start[1], stop[1] - start[1]),
    ):
        if step == 0:
            if not low < origin < high:
                return False
            continue
        first, last = sorted(((low - origin) / step, (high - origin) / step))
        enter, leave = max(enter, first), min(leave, last)
    return enter < leave


def fitted(texts: Sequence[str], room: float, letters: Letters, level: Level = "small") -> str:
    """The first of some texts that fits into a width; the last one cut where none does."""
    for text in texts:
        if letters.width(text, level) <= room:
            return text
    cut = texts[-1]
    while cut and letters.width(cut + "…", level) > room:
        cut = cut[:-1]
    return cut.rstrip() + "…"


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

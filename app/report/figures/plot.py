"""A plot: a frame with two axes, and what is drawn in it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field, replace

import numpy as np

from app.look.colours import PRINT
from app.report.figures.marks import Anchor, Mark, Path, Text, box, line
from app.report.figures.scales import Array, Scale, thinned, tick_texts
from app.report.lettering import text_width

SMALL, WIDTH = 7.0, 480.0
LEFT, RIGHT, TOP, BOTTOM = 46.0, 10.0, 16.0, 30.0


@dataclass
class Plot:
    """Marks are gathered in `marks`; `x` and `y` are the scales. Made by `plot_in`."""

    x: Scale
    y: Scale
    marks: list[Mark] = field(default_factory=list)
    _named: list[tuple[float, float]] = field(default_factory=list)

    def curve(
        self, x: Array, y: Array, colour: str, width: float = 0.9, dash: tuple[float, ...] = ()
    ) -> None:
        """A curve, thinned to what print can show."""
        x, y = thinned(np.asarray(x, dtype=float), np.asarray(y, dtype=float))
        self.marks.append(Path(np.column_stack((self.x.of(x), self.y.of(y))), colour, width, dash=dash))

    def area(self, x: Array, first: Array, second: Array, colour: str, opacity: float = 0.15) -> None:
        """The area between two curves over the same x."""
        there = np.column_stack((self.x.of(x), self.y.of(first)))
        back = np.column_stack((self.x.of(x), self.y.of(second)))[::-1]
        whole = np.vstack((there, back))
        self.marks.append(Path(whole, fill=colour, opacity=opacity, closed=True))

    def level(self, y: float, colour: str, dash: tuple[float, ...] = (4, 2), width: float = 0.9) -> None:
        """A line across at a value."""
        at = self.y.at(y)
        self.marks.append(line([(self.x.start, at), (self.x.end, at)], colour, width, dash=dash))

    def upright(self, x: float, colour: str, dash: tuple[float, ...] = (2, 2), width: float = 0.6) -> None:
        """A line from top to bottom at a value."""
        at = self.x.at(x)
        self.marks.append(line([(at, self.y.start), (at, self.y.end)], colour, width, dash=dash))

    def say(
        self, x: float, y: float, text: str, colour: str, anchor: Anchor = "start", cleared: bool = False
    ) -> None:
        """Text at a place in points, moved down where another text stands already; `cleared`: what lies under it is
        nearly covered."""
        for _ in range(12):
            if all(abs(y - other) > SMALL + 1 or abs(x - at) > 110 for at, other in self._named):
                break
            y += SMALL + 2
        self._named.append((x, y))
        if cleared:
            self.marks.append(clearing(x, y, text, anchor))
        self.marks.append(Text(x, y, text, colour, SMALL, anchor))


def clearing(x: float, y: float, text: str, anchor: Anchor) -> Path:
    """A nearly covering patch of paper for under a text."""
    wide = text_width(text, SMALL) + 3
    left = x - 1.5 if anchor == "start" else x - wide + 1.5 if anchor == "end" else x - wide / 2
    patch = box(left, y - SMALL + 0.5, wide, SMALL + 2, PRINT.paper)
    return replace(patch, opacity=0.85)


def plot_in(
    x: tuple[float, float],
    y: tuple[float, float],
    width: float,
    top: float,
    height: float,
    labels: tuple[str, str],
    downwards: bool = False,
    left: float = 0.0,
) -> Plot:
    """A framed plot whose outer rectangle begins at (`left`, `top`); `downwards`: y grows towards the bottom."""
    inner_top, inner_bottom = top + TOP, top + height - BOTTOM
    y_scale = Scale(*y, *((inner_top, inner_bottom) if downwards else (inner_bottom, inner_top)))
    plot = Plot(Scale(*x, left + LEFT, left + width - RIGHT), y_scale)
    _axes(plot, labels, inner_top, inner_bottom)
    return plot


def _axes(plot: Plot, labels: tuple[str, str], top: float, bottom: float) -> None:
    look, marks = PRINT, plot.marks
    left, right = plot.x.start, plot.x.end
    across, up = (
        plot.x.ticks(max(3, int((right - left) / 55))),
        plot.y.ticks(max(3, int((bottom - top) / 22))),
    )
    for value, text in zip(across, tick_texts(across), strict=True):
        at = plot.x.at(value)
        marks.append(line([(at, top), (at, bottom)], look.grid, 0.4))
        marks.append(Text(at, bottom + SMALL + 3, text, look.soft_ink, SMALL, "middle"))
    for value, text in zip(up, tick_texts(up), strict=True):
        at = plot.y.at(value)
        marks.append(line([(left, at), (right, at)], look.grid, 0.4))
        marks.append(Text(left - 4, at + SMALL * 0.36, text, look.soft_ink, SMALL, "end"))
    for scale, ends in ((plot.y, (left, right)), (plot.x, (top, bottom))):
        if scale.low < 0 < scale.high:
            at = scale.at(0.0)
            points = [(ends[0], at), (ends[1], at)] if scale is plot.y else [(at, ends[0]), (at, ends[1])]
            marks.append(line(points, look.line, 0.6))
    marks.append(line([(left, top), (left, bottom), (right, bottom)], look.line, 0.8))
    marks.append(Text(right, bottom + 2 * SMALL + 8, labels[0], look.ink, SMALL, "end"))
    marks.append(Text(left - LEFT + 2, top - 6, labels[1], look.ink, SMALL))


def legend(
    entries: Sequence[tuple[str, str, tuple[float, ...]]], x: float, y: float, room: float
) -> tuple[list[Mark], float]:
    """Names (text, colour, dash) with a piece of their line, in rows; the marks and the height they take."""
    marks: list[Mark] = []
    at, row = x, y
    for text, colour, dash in entries:
        wide = 26 + text_width(text, SMALL)
        if at > x and at + wide > x + room:
            at, row = x, row + SMALL + 4
        marks.append(line([(at, row - 2.5), (at + 16, row - 2.5)], colour, 1.3, dash=dash))
        marks.append(Text(at + 19, row, text, PRINT.ink, SMALL))
        at += wide + 6
    return marks, row - y + SMALL + 4

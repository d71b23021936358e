"""Limits of stress along the member, drawn on the profile: as lines where they lie inside it, in words where beyond."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from itertools import pairwise
from math import isclose

import numpy as np
from PySide6.QtCore import QLineF, QRectF, Qt
from PySide6.QtGui import QFontMetricsF, QPainter

from app.bench.field_values import area_at, limit_lines
from app.bench.member.glyphs import pen
from app.bench.pictures.axes import Axis
from app.bench.pictures.lettering import put_on, width_of
from app.look.palette import palette
from app.sight import ShownQuantity
from app.units import rounded
from solver import Case, Result

#: Rows below the upper end of a limit in which its name may stand.
ROWS = 8


@dataclass(frozen=True)
class Limit:
    """From `start` to `end` (m): a stress (Pa), or a force (N), with tension positive."""

    sign: str
    start: float
    end: float
    value: float


def limits_of(case: Case, result: Result, quantity: ShownQuantity) -> list[Limit]:
    """Limits of stress, or of force at its area; none of other quantities."""
    lines = limit_lines(case) if quantity in ("stress", "force") else []
    if quantity == "stress":
        return [Limit(line.sign, line.start, line.end, line.stress) for line in lines]
    found: list[Limit] = []
    for line in lines:
        for top, bottom in pairwise(result.fields.edges):
            start, end = max(top, line.start), min(bottom, line.end)
            if end > start:
                area = float(area_at(result, np.array([(start + end) / 2]))[0])
                before = found[-1] if found else None
                value = line.stress * area
                if (
                    before
                    and before.sign == line.sign
                    and before.end == start
                    and isclose(before.value, value)
                ):
                    start = before.start
                    found.pop()
                found.append(Limit(line.sign, float(start), float(end), value))
    return found


def draw_limits(
    painter: QPainter,
    plot: QRectF,
    distance: Axis,
    values: Axis,
    limits: list[tuple[Limit, float]],
    quantity: ShownQuantity,
    free: Callable[[QRectF], bool],
) -> list[QRectF]:
    """Each limit with its value as shown: stepped lines, and the numbers where they lie `free` of the curves. Gives the
    boxes of the numbers."""
    before: dict[str, float] = {}
    named: dict[tuple[str, float], _Label] = {}
    painter.setPen(pen(palette().ink, 1.0, Qt.PenStyle.DashLine))
    for limit, shown in limits:
        x, top, bottom = values.at(shown), distance.at(limit.start), distance.at(limit.end)
        inside = values.low <= shown <= values.high
        if inside:
            painter.drawLine(QLineF(x, top, x, bottom))
            if limit.sign in before:
                painter.drawLine(QLineF(before[limit.sign], top, x, top))
            before[limit.sign] = x
        # along a taper the limit of a force changes at every column: its first value is named
        key = (limit.sign, 0.0 if quantity == "force" else limit.value)
        label = _Label(
            f"limit {rounded(abs(shown))}", x if inside else None, top, shown > 0, limit.start <= 0
        )
        named.setdefault(key, label)
    taken: list[QRectF] = []
    for label in named.values():
        box = _place(label, plot, painter, free, taken)
        if box is not None:
            taken.append(box)
            put_on(painter, box.left(), box.center().y(), label.text, palette().ink, palette().paper)
    return taken


@dataclass(frozen=True)
class _Label:
    """`x`: pixel of its line, `None` where that lies beyond the plot; `rightwards`: the side that it is on;
    `at_top`: it begins at the struck end, above which there is room."""

    words: str
    x: float | None
    top: float
    rightwards: bool
    at_top: bool

    @property
    def text(self) -> str:
        if self.x is not None:
            return self.words
        return f"{self.words} →" if self.rightwards else f"← {self.words}"


def _place(
    label: _Label, plot: QRectF, painter: QPainter, free: Callable[[QRectF], bool], taken: list[QRectF]
) -> QRectF | None:
    """Its box: above the struck end, else beside its line off all curves, else beside it wherever no other is."""
    boxes = [box for box in _boxes(label, plot, painter) if plot.contains(box)]
    alone = [box for box in boxes if not any(box.intersects(other) for other in taken)]
    return next((box for box in alone if free(box)), next(iter(alone), None))


def _boxes(label: _Label, plot: QRectF, painter: QPainter) -> Iterator[QRectF]:
    width, line = width_of(label.text, painter.font()), QFontMetricsF(painter.font()).height()
    at_edge = plot.right() - 2 - width if label.rightwards else plot.left() + 8
    if label.at_top:
        x = at_edge + width / 2 if label.x is None else label.x
        for left in (x - width / 2, x - width + 4, x - 4):
            left = min(max(left, plot.left() + 2), plot.right() - width - 1)
            yield QRectF(left, label.top - line - 4, width, line)
    if label.x is None:
        sides = [at_edge]
    else:
        inwards, outwards = label.x - 4 - width, label.x + 4
        sides = [inwards, outwards] if label.rightwards else [outwards, inwards]
    for row in range(ROWS):
        for left in sides:
            yield QRectF(left, max(label.top, plot.top()) + (0.25 + row) * line, width, line)

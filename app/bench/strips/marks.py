"""Marks on the curves of a strip: times at which the blow comes back from the far end, the area between a pair, and
labelled peaks."""

from __future__ import annotations

from collections.abc import Callable, Sequence

import numpy as np
from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QPainter, QPolygonF

from app.bench.member.glyphs import pen
from app.bench.pictures.axes import Axis
from app.bench.pictures.curve_labels import Drawn
from app.bench.pictures.curves import polygon
from app.bench.pictures.lettering import put, put_on, width_of
from app.bench.strips.contents import Content, Curve
from app.bench.strips.peaks import peaks_of, place_label
from app.look.palette import palette


def draw_returns(painter: QPainter, content: Content, plot: QRectF, time: Axis) -> None:
    """Small ticks from the top, the first two joined by a measure with its name; none stands where the name does."""
    if len(content.ticks) < 2:
        return
    marks = [time.at(tick) for tick in content.ticks]
    height = QFontMetricsF(painter.font()).height()
    y = plot.top() + height / 2
    left, words = _name_of_returns(content, marks, plot, painter.font())
    right = left + width_of(words, painter.font())
    painter.setPen(pen(palette().soft_ink))
    for x in marks:
        if not left - 5 < x < right + 5:
            painter.drawLine(QLineF(x, y - 4, x, y + 4))
    start, end = marks[:2]
    for begins, ends in _without(start, end, left - 4, right + 4):
        painter.drawLine(QLineF(begins, y, ends, y))
    for tip, back in ((start, 5.0), (end, -5.0)):
        painter.drawPolyline(
            QPolygonF([QPointF(tip + back, y - 2.5), QPointF(tip, y), QPointF(tip + back, y + 2.5)])
        )
    put(painter, left, y, words, palette().soft_ink)


def _name_of_returns(content: Content, marks: list[float], plot: QRectF, font: QFont) -> tuple[float, str]:
    """Its left end and its words: behind the second tick, or before the first one, or between them, where there is
    room; cut to the time alone where it would cover a later tick."""
    words = content.ticks_named
    first, second = marks[:2]
    end = next((m for m in marks[2:] if m > second), plot.right())
    if second + 8 + width_of(words, font) > min(end - 4, plot.right()):
        words = words.partition(",")[0]
    width = width_of(words, font)
    if second + 8 + width <= plot.right():
        return second + 8, words
    if first - 8 - width > plot.left():
        return first - 8 - width, words
    return (max(first, plot.left()) + min(second, plot.right()) - width) / 2, words


def _without(start: float, end: float, left: float, right: float) -> list[tuple[float, float]]:
    """What is left of a line from `start` to `end` without what lies between `left` and `right`."""
    parts = ((start, min(end, left)), (max(start, right), end))
    return [(begins, ends) for begins, ends in parts if ends > begins]


def fill_between(painter: QPainter, first: Drawn, second: Drawn, plot: QRectF, hue: str) -> None:
    """A point a pixel and no smoothing: thousands of points filled smoothly took longer than all the rest."""
    # of a record that runs far beyond the plot, only what lies in it
    left, right = max(first.x[0], second.x[0], plot.left()), min(first.x[-1], second.x[-1], plot.right())
    x = np.arange(left, right, 1.0)
    upper, lower = np.interp(x, first.x, first.y), np.interp(x, second.x, second.y)
    colour = QColor(hue)
    colour.setAlphaF(0.16)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(colour)
    shape = polygon(np.concatenate((x, x[::-1])), np.concatenate((upper, lower[::-1])))
    painter.drawPolygon(shape, Qt.FillRule.WindingFill)


def draw_peaks(
    painter: QPainter,
    curve: Curve,
    axes: tuple[Axis, Axis],
    plot: QRectF,
    factor: float,
    tells: Callable[[float, float], str],
    off: Sequence[QRectF],
) -> list[QRectF]:
    """Rings on the peaks within the times shown, each with what `tells` says of its value (SI) and time (s), off the
    boxes `off`. Gives the boxes of the labels."""
    time, values = axes
    first, last = np.searchsorted(curve.time, (time.low, time.high))
    shown = curve.values[first : last + 1]
    metrics = QFontMetricsF(painter.font())
    taken = list(off)
    for peak in peaks_of(shown):
        moment, value = float(curve.time[first + peak.index]), float(shown[peak.index])
        x, y = time.at(moment), values.at(value * factor)
        painter.setPen(pen(curve.hue, 1.4))
        painter.setBrush(QColor(palette().paper))
        painter.drawEllipse(QPointF(x, y), 2.8, 2.8)
        words = tells(value, moment)
        box = place_label(x, y, peak.top, metrics.horizontalAdvance(words), metrics.height(), plot, taken)
        if box is not None:
            put_on(painter, box.left(), box.center().y(), words, curve.hue, palette().paper)
    painter.setBrush(Qt.BrushStyle.NoBrush)
    return taken[len(off) :]

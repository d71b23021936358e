"""Axes drawn: a line, small ticks for parts, longer ones with their numbers. Numbers are in the units of the screen."""

from __future__ import annotations

from PySide6.QtCore import QLineF, QRectF
from PySide6.QtGui import QFontMetricsF, QPainter

from app.bench.member.glyphs import pen
from app.bench.pictures.axes import Axis, tick_texts, ticks, tidy_step
from app.bench.pictures.lettering import CENTRE, RIGHT, put
from app.look.palette import palette

LONG, SHORT = 6.0, 3.0


def in_units(axis: Axis, factor: float) -> Axis:
    """The same pixels with values multiplied by a factor (units, sign)."""
    return Axis(axis.low * factor, axis.high * factor, axis.start, axis.length)


def distance_ticks(painter: QPainter, axis: Axis, x: float, numbered: bool, least: float = 0.0) -> None:
    """Ticks along a vertical line at `x`; the axis is in the units shown, and nothing stands above `least`."""
    metrics = QFontMetricsF(painter.font())
    most = max(int(axis.length / (2.6 * metrics.height())), 2)
    step = tidy_step(axis.high - axis.low, most)
    values = [v for v in ticks(axis.low, axis.high, most) if v >= least - 1e-9 * step]
    painter.setPen(pen(palette().line))
    top = max(axis.at(least), axis.start)
    painter.drawLine(QLineF(x, top, x, axis.start + axis.length))
    parts = [v for v in ticks(axis.low, axis.high, 5 * most) if v >= least - 1e-9 * step]
    painter.drawLines([QLineF(x, axis.at(v), x + SHORT, axis.at(v)) for v in parts])
    painter.drawLines([QLineF(x, axis.at(v), x + LONG, axis.at(v)) for v in values])
    for value, text in zip(values, tick_texts(values), strict=True) if numbered else ():
        put(painter, x - 6, axis.at(value), text, palette().soft_ink, RIGHT)


def horizontal_ticks(
    painter: QPainter, axis: Axis, y: float, numbered: bool, most: int | None = None, inwards: bool = True
) -> None:
    """Ticks along a horizontal line at `y`, with numbers under it; the axis is in the units shown."""
    metrics = QFontMetricsF(painter.font())
    if most is None:
        most = max(int(axis.length / (metrics.horizontalAdvance("−000") + 0.9 * metrics.height())), 2)
    values = ticks(min(axis.low, axis.high), max(axis.low, axis.high), most)
    if len(values) < 3:  # a narrow plot whose tidy step is too large by chance
        values = ticks(min(axis.low, axis.high), max(axis.low, axis.high), most + 2)
    up = -1 if inwards else 1
    painter.setPen(pen(palette().line))
    painter.drawLine(QLineF(axis.start, y, axis.start + axis.length, y))
    for size, marks in (
        (SHORT, ticks(min(axis.low, axis.high), max(axis.low, axis.high), 5 * most)),
        (LONG, values),
    ):
        painter.drawLines([QLineF(axis.at(v), y, axis.at(v), y + up * size) for v in marks])
    below = y + 0.75 * metrics.height()
    for value, text in zip(values, tick_texts(values), strict=True) if numbered else ():
        put(painter, axis.at(value), below, text, palette().soft_ink, CENTRE)


def value_ticks(painter: QPainter, axis: Axis, plot: QRectF) -> None:
    """Ticks and numbers left of a strip; the axis runs upwards, in the units shown. A faint line marks zero."""
    metrics = QFontMetricsF(painter.font())
    most = max(int(plot.height() / (1.15 * metrics.height())), 2)
    values = ticks(axis.low, axis.high, most)
    for value, text in zip(values, tick_texts(values), strict=True):
        y = axis.at(value)
        painter.setPen(pen(palette().line))
        painter.drawLine(QLineF(plot.left(), y, plot.left() + SHORT, y))
        put(painter, plot.left() - 6, y, text, palette().soft_ink, RIGHT)
        if abs(value) < 1e-9 * (axis.high - axis.low):
            painter.setPen(pen(palette().grid))
            painter.drawLine(QLineF(plot.left(), y, plot.right(), y))
    painter.setPen(pen(palette().line))
    painter.drawLine(QLineF(plot.left(), plot.top(), plot.left(), plot.bottom()))


def crisp(value: float) -> float:
    """The middle of the pixel in which a value lies: a 1 px line there is sharp."""
    return float(int(value)) + 0.5

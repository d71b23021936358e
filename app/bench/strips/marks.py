"""Marks on the curves of a strip: times at which the blow comes back from the far end, and labelled peaks."""

from __future__ import annotations

from collections.abc import Callable, Sequence

import numpy as np
from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QPainter, QPolygonF

from app.bench.member.glyphs import pen
from app.bench.pictures.axes import Axis
from app.bench.pictures.lettering import put_on
from app.bench.strips.contents import Content, Curve
from app.bench.strips.peaks import peaks_of, place_label
from app.look.palette import palette


def draw_returns(painter: QPainter, content: Content, plot: QRectF, time: Axis) -> None:
    """Small ticks from the top, the first two joined."""
    if len(content.ticks) < 2:
        return
    painter.setPen(pen(palette().soft_ink))
    y = plot.top() + 4
    for moment in content.ticks:
        x = time.at(moment)
        painter.drawLine(QLineF(x, y - 4, x, y + 4))
    start, end = time.at(content.ticks[0]), time.at(content.ticks[1])
    painter.drawLine(QLineF(start, y, end, y))
    for tip, back in ((start, 5.0), (end, -5.0)):
        painter.drawPolyline(
            QPolygonF([QPointF(tip + back, y - 2.5), QPointF(tip, y), QPointF(tip + back, y + 2.5)])
        )


def name_returns(painter: QPainter, content: Content, plot: QRectF, time: Axis, y: float) -> None:
    """Behind the second tick, or before the first one, or between them: where there is room, off the later ticks."""
    metrics = QFontMetricsF(painter.font())
    words = content.ticks_named
    marks = [time.at(tick) for tick in content.ticks]
    first, second = marks[:2]
    end = next((m for m in marks[2:] if m > second), plot.right())
    if second + 8 + metrics.horizontalAdvance(words) > min(end - 4, plot.right()):
        words = words.partition(",")[0]
    width = metrics.horizontalAdvance(words)
    x = second + 8
    if x + width > plot.right():
        x = first - 8 - width if first - 8 - width > plot.left() else (first + second - width) / 2
    put_on(painter, x, y, words, palette().soft_ink, palette().paper)


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

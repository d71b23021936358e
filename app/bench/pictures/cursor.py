"""The cursor of the Bench, a time and a place, drawn across every picture; and the second, pinned one, with what lies
between the two."""

from __future__ import annotations

from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QFontMetricsF, QPainter, QPolygonF

from app.bench.member.glyphs import pen
from app.bench.pictures.axes import Axis
from app.bench.pictures.axis_drawing import crisp
from app.bench.pictures.lettering import put_on
from app.look.palette import palette
from app.units import Units

#: Dashes of the pinned cursor, in widths of its line.
PINNED = (7.0, 3.0, 1.5, 3.0)


def draw_cursor(painter: QPainter, plot: QRectF, time: Axis, moment: float) -> None:
    """The moment of the cursor as a line from top to bottom of a plot."""
    if time.low <= moment <= time.high:
        x = crisp(time.at(moment))
        painter.setPen(pen(palette().ink, 1.0))
        painter.drawLine(QLineF(x, plot.top(), x, plot.bottom()))


def draw_place(painter: QPainter, plot: QRectF, distance: Axis, place: float | None) -> None:
    """The place of the cursor as a dotted line across a plot."""
    if place is not None and distance.low <= place <= distance.high:
        y = crisp(distance.at(place))
        painter.setPen(pen(palette().ink, 1.0, Qt.PenStyle.DotLine))
        painter.drawLine(QLineF(plot.left(), y, plot.right(), y))


def draw_pinned_moment(painter: QPainter, plot: QRectF, time: Axis, moment: float) -> None:
    """The moment of the pinned cursor: as the other's, dashed, with a pin's head on top."""
    if time.low <= moment <= time.high:
        x = crisp(time.at(moment))
        _pinned_pen(painter)
        painter.drawLine(QLineF(x, plot.top(), x, plot.bottom()))
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(pen(palette().ink).color())
        painter.drawEllipse(QPointF(x, plot.top() + 3), 3.0, 3.0)


def draw_pinned_place(painter: QPainter, plot: QRectF, distance: Axis, place: float | None) -> None:
    """The place of the pinned cursor."""
    if place is not None and distance.low <= place <= distance.high:
        y = crisp(distance.at(place))
        _pinned_pen(painter)
        painter.drawLine(QLineF(plot.left(), y, plot.right(), y))


def between(
    units: Units, time: float, place: float | None, pinned: tuple[float, float | None]
) -> tuple[str, ...]:
    """What lies between the two cursors: time, and with two places the distance and the speed that goes with both."""
    apart = time - pinned[0]
    words = [units.show(abs(apart), "time")]
    if place is not None and pinned[1] is not None:
        way = place - pinned[1]
        words.append(units.show(abs(way), "length"))
        if apart and way:
            words.append(f"{units.show(abs(way / apart), 'velocity')} {'↓' if way * apart > 0 else '↑'}")
    return tuple(words)


def draw_between(
    painter: QPainter, plot: QRectF, start: QPointF, end: QPointF, words: tuple[str, ...], joined: bool
) -> None:
    """The words beside the middle of what they measure, `joined` by a line, inside the plot."""
    if joined:
        for made in (pen(palette().paper, 3.4), pen(palette().ink, 1.4)):  # with a rim, over dark and light
            painter.setPen(made)
            painter.drawPolyline(QPolygonF([start, end]))
    text = " · ".join(words)
    metrics = QFontMetricsF(painter.font())
    width, half = metrics.horizontalAdvance(text), metrics.height() / 2
    middle = (start + end) / 2
    x = middle.x() + 8 if joined else middle.x() - width / 2
    x = min(max(x, plot.left() + 4), plot.right() - width - 4)
    y = min(max(middle.y(), plot.top() + half), plot.bottom() - half)
    put_on(painter, x, y, text, palette().ink, palette().paper)


def _pinned_pen(painter: QPainter) -> None:
    made = pen(palette().ink, 1.0)
    made.setDashPattern(PINNED)
    painter.setPen(made)

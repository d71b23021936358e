"""The one cursor of the Bench, a time and a place, drawn across every picture."""

from __future__ import annotations

from PySide6.QtCore import QLineF, QRectF, Qt
from PySide6.QtGui import QPainter

from app.bench.axes import Axis
from app.bench.axis_drawing import crisp
from app.bench.glyphs import pen
from app.look.palette import palette


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

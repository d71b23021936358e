"""Small drawings of parts that have no length of their own: springs, dashpots, walls, masses, cushions, arrows."""

from __future__ import annotations

import math

from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QPainter, QPainterPath, QPen, QPolygonF


def pen(
    colour: str, width: float = 1.0, style: Qt.PenStyle = Qt.PenStyle.SolidLine, opacity: float = 1.0
) -> QPen:
    shade = QColor(colour)
    shade.setAlphaF(opacity)
    made = QPen(shade, width, style)
    made.setCapStyle(Qt.PenCapStyle.FlatCap)
    return made


def hatched_wall(painter: QPainter, left: float, right: float, y: float, size: float, colour: str) -> None:
    """A fixed face at `y`, hatched below."""
    painter.setPen(pen(colour, 1.5))
    painter.drawLine(QLineF(left, y, right, y))
    painter.setPen(pen(colour))
    count = max(int((right - left) / size), 2)
    step = (right - left) / count
    painter.drawLines([QLineF(left + (n + 1) * step, y, left + n * step, y + size) for n in range(count)])


def hatched_side(painter: QPainter, x: float, top: float, bottom: float, size: float, colour: str) -> None:
    """A fixed face at `x`, hatched on its right."""
    painter.setPen(pen(colour))
    painter.drawLine(QLineF(x, top, x, bottom))
    count = max(int((bottom - top) / size), 2)
    step = (bottom - top) / count
    painter.drawLines([QLineF(x, top + (n + 1) * step, x + size, top + n * step) for n in range(count)])


def spring(painter: QPainter, start: QPointF, end: QPointF, half: float, colour: str, turns: int = 3) -> None:
    """A zigzag from one point to another."""
    line = QLineF(start, end)
    along = QPointF(line.dx(), line.dy())
    across = QPointF(-line.dy(), line.dx()) * (half / max(line.length(), 1e-9))
    points = [start]
    for n in range(2 * turns):
        share = (n + 1) / (2 * turns + 1)
        points.append(start + along * share + across * (1 if n % 2 else -1))
    points.append(end)
    painter.setBrush(Qt.BrushStyle.NoBrush)
    painter.setPen(pen(colour, 1.2))
    painter.drawPolyline(QPolygonF(points))


def dashpot(painter: QPainter, start: QPointF, end: QPointF, half: float, colour: str) -> None:
    """A cup that holds a piston."""
    line = QLineF(start, end)
    along = QPointF(line.dx(), line.dy())
    across = QPointF(-line.dy(), line.dx()) * (half / max(line.length(), 1e-9))
    cup, piston, rim = start + along * 0.75, start + along * 0.5, start + along * 0.3
    painter.setPen(pen(colour, 1.2))
    painter.drawLines(
        [
            QLineF(start, piston),
            QLineF(piston - across * 0.8, piston + across * 0.8),
            QLineF(cup - across, cup + across),
            QLineF(cup - across, rim - across),
            QLineF(cup + across, rim + across),
            QLineF(cup, end),
        ]
    )


def arrow_down(painter: QPainter, x: float, top: float, bottom: float, head: float, colour: str) -> None:
    painter.setPen(pen(colour, 1.5))
    painter.drawLine(QLineF(x, top, x, bottom - head))
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(QColor(colour))
    painter.drawPolygon(
        QPolygonF(
            [
                QPointF(x - head * 0.6, bottom - head),
                QPointF(x + head * 0.6, bottom - head),
                QPointF(x, bottom),
            ]
        )
    )


def pointer_right(painter: QPainter, x: float, y: float, size: float, colour: str) -> None:
    """A small filled triangle whose tip is at (x, y)."""
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(QColor(colour))
    painter.drawPolygon(
        QPolygonF([QPointF(x - size, y - 0.6 * size), QPointF(x - size, y + 0.6 * size), QPointF(x, y)])
    )


def pulse_shape(shape: str, rise: float, fall: float) -> list[tuple[float, float]]:
    """Outline of a pulse as (share of its length, share of its peak); `rise` and `fall` as shares of its length."""
    grid = [n / 24 for n in range(25)]
    if shape == "half_sine":
        return [(t, math.sin(math.pi * t)) for t in grid]
    if shape == "haversine":
        return [(t, math.sin(math.pi * t) ** 2) for t in grid]
    if shape == "decay":
        return [(0, 0), *((t, math.exp(-4 * t)) for t in grid)]
    if shape == "triangle":
        return [(0, 0), (0.5, 1), (1, 0)]
    if shape == "trapezoid":
        return [(0, 0), (rise, 1), (1 - fall, 1), (1, 0)]
    return [(0, 0), (0, 1), (1, 1), (1, 0)]


def outline(points: list[tuple[float, float]], box: QRectF) -> QPainterPath:
    """Points in shares of a box, from its lower left corner, as a path."""
    path = QPainterPath()
    for n, (x, y) in enumerate(points):
        point = QPointF(box.left() + x * box.width(), box.bottom() - y * box.height())
        if n:
            path.lineTo(point)
        else:
            path.moveTo(point)
    return path

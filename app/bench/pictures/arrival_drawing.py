"""Predicted arrivals drawn: lines with arrowheads that point the way the wave runs, and ticks at a gauge."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np
from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QFontMetricsF, QPainter, QPolygonF

from app.bench.member.glyphs import pen
from app.bench.pictures.arrival_lines import Leg, Line
from app.bench.pictures.axes import Axis
from app.bench.pictures.curves import polygon
from app.bench.pictures.lettering import put_on
from app.look.palette import palette

#: Pixels within which the mouse is on a line, and on a tick; height of a tick.
NEAR, NEAR_TICK, TICK = 5.0, 4.0, 8.0
#: Height of an arrow of `draw_ticks` with its tip, pixels.
ARROW = TICK + 3.0


def draw_lines(painter: QPainter, lines: Sequence[Line], time: Axis, distance: Axis) -> None:
    """All of them, thin; what comes back a second time is dotted."""
    for line in lines:
        for leg in line.own:
            style = Qt.PenStyle.SolidLine if line.arrival.passage == 1 else Qt.PenStyle.DotLine
            _draw_leg(painter, leg, time, distance, 1.0, style)


def draw_pointed(painter: QPainter, line: Line, time: Axis, distance: Axis) -> None:
    """One of them, so that it stands out."""
    for leg in line.legs:
        _draw_leg(painter, leg, time, distance, 2.0, Qt.PenStyle.SolidLine)


def lines_near(lines: Sequence[Line], at: QPointF, time: Axis, distance: Axis) -> tuple[int, ...]:
    """Numbers of the lines that the mouse is on: the nearest, and those that lie on it there."""
    apart = [min((_away(leg, at, time, distance) for leg in line.own), default=np.inf) for line in lines]
    nearest = min(apart, default=np.inf)
    if nearest > NEAR:
        return ()
    return tuple(n for n, away in enumerate(apart) if away <= nearest + 1.0)


def draw_ticks(painter: QPainter, lines: Sequence[Line], place: float, time: Axis, plot: QRectF) -> None:
    """Where arrivals come back past a gauge: small arrows up from the foot of a strip."""
    painter.setPen(pen(palette().soft_ink, 1.0))
    painter.setBrush(pen(palette().soft_ink).color())
    for line in lines:
        moment = line.passes(place)
        if moment is not None and time.low <= moment <= time.high:
            x = time.at(moment)
            painter.drawLine(QLineF(x, plot.bottom(), x, plot.bottom() - TICK))
            tip = plot.bottom() - ARROW
            painter.drawPolygon(
                QPolygonF([QPointF(x, tip), QPointF(x - 2.5, tip + 5), QPointF(x + 2.5, tip + 5)])
            )
    painter.setBrush(Qt.BrushStyle.NoBrush)


def ticks_near(lines: Sequence[Line], place: float, at: QPointF, time: Axis, plot: QRectF) -> tuple[int, ...]:
    """Numbers of the ticks that the mouse is on."""
    if not plot.bottom() - 2 * TICK <= at.y() <= plot.bottom() + TICK:
        return ()
    moments = [line.passes(place) for line in lines]
    apart = [np.inf if m is None else abs(time.at(m) - at.x()) for m in moments]
    nearest = min(apart, default=np.inf)
    if nearest > NEAR_TICK:
        return ()
    return tuple(n for n, away in enumerate(apart) if away <= nearest + 0.5)


def draw_tick_pointed(painter: QPainter, moment: float, time: Axis, plot: QRectF, hue: str) -> None:
    """The tick of an arrival that is pointed at, from the foot of the strip to its top."""
    if time.low <= moment <= time.high:
        x = time.at(moment)
        painter.setPen(pen(hue, 1.0, Qt.PenStyle.DashLine))
        painter.drawLine(QLineF(x, plot.top(), x, plot.bottom()))
        painter.setPen(pen(hue, 3.0))
        painter.drawLine(QLineF(x, plot.bottom() - TICK, x, plot.bottom()))


def write_name(painter: QPainter, x: float, y: float, words: str, plot: QRectF) -> None:
    """A name beside a point, on the side that has room; cut where none has."""
    metrics = QFontMetricsF(painter.font())
    words = metrics.elidedText(words, Qt.TextElideMode.ElideRight, plot.width() - 12)
    width, half = metrics.horizontalAdvance(words), metrics.height() / 2
    left = x + 10 if x + 10 + width <= plot.right() - 2 else x - 10 - width
    left = min(max(left, plot.left() + 4), plot.right() - width - 2)
    y = min(max(y, plot.top() + half), plot.bottom() - half)
    put_on(painter, left, y, words, palette().ink, palette().paper)


def _draw_leg(
    painter: QPainter, leg: Leg, time: Axis, distance: Axis, width: float, style: Qt.PenStyle
) -> None:
    x, y = np.asarray(time.pixel(leg.times)), np.asarray(distance.pixel(leg.places))
    shape, colours = polygon(x, y), palette()
    painter.setBrush(Qt.BrushStyle.NoBrush)
    # a rim in the paper's colour: the line is seen over dark and over light parts of the field
    painter.setPen(pen(colours.paper, width + 1.6, Qt.PenStyle.SolidLine, 0.55))
    painter.drawPolyline(shape)
    painter.setPen(pen(colours.ink, width, style))
    painter.drawPolyline(shape)
    _draw_head(painter, x, y)


def _draw_head(painter: QPainter, x: np.ndarray, y: np.ndarray) -> None:
    """An arrowhead at 0.6 of the leg's height, pointing the way of the wave."""
    tip_y = y[0] + 0.6 * (y[-1] - y[0])
    order = slice(None) if y[-1] > y[0] else slice(None, None, -1)
    tip_x = float(np.interp(tip_y, y[order], x[order]))
    along = np.array([x[-1] - x[0], y[-1] - y[0]])
    length = float(np.hypot(*along))
    if length < 30:
        return
    along = along / length
    across = np.array([-along[1], along[0]])
    tip = np.array([tip_x, tip_y])
    corners = [tip, tip - 8 * along + 3.2 * across, tip - 8 * along - 3.2 * across]
    painter.setPen(pen(palette().paper, 0.8))
    painter.setBrush(pen(palette().ink).color())
    painter.drawPolygon(QPolygonF([QPointF(*map(float, corner)) for corner in corners]))


def _away(leg: Leg, at: QPointF, time: Axis, distance: Axis) -> float:
    """Pixels from a point to a leg."""
    points = np.stack((np.asarray(time.pixel(leg.times)), np.asarray(distance.pixel(leg.places))), axis=1)
    start, along = points[:-1], np.diff(points, axis=0)
    there = np.array([at.x(), at.y()])
    squared = np.maximum(np.sum(along**2, axis=1), 1e-12)
    share = np.clip(np.sum((there - start) * along, axis=1) / squared, 0.0, 1.0)
    return float(np.min(np.hypot(*(start + share[:, None] * along - there).T)))

"""The force that repeated blows leave in the member, as a profile of its own."""

from __future__ import annotations

import numpy as np
from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QPainter

from app.bench.member.glyphs import pen
from app.bench.pictures.axes import Axis
from app.bench.pictures.axis_drawing import horizontal_ticks
from app.bench.pictures.curves import polygon
from app.bench.pictures.lettering import CENTRE, put_on
from app.bench.pictures.picture import Table
from app.look.palette import palette
from app.units import Units
from solver.answer.result import Residual


def factor_of(residual: Residual, units: Units) -> float:
    """From N with tension positive to what is shown."""
    return float(units.number(1.0, "force", _largest(residual))) * units.sign


def unit_of(residual: Residual, units: Units) -> str:
    return units.unit("force", _largest(residual))


def axis_of(residual: Residual, units: Units, plot: QRectF) -> Axis:
    shown = np.append(residual.force * factor_of(residual, units), 0.0)
    low, high = float(shown.min()), float(shown.max())
    span = (high - low) or 1.0
    return Axis(low - 0.12 * span, high + 0.12 * span, plot.left(), plot.width())


def draw_locked_in(painter: QPainter, plot: QRectF, distance: Axis, residual: Residual, units: Units) -> None:
    """The force as an area from zero on: blue where it presses, orange where it pulls; its largest is named."""
    values, colours = axis_of(residual, units, plot), palette()
    factor = factor_of(residual, units)
    painter.save()
    painter.setClipRect(plot)
    y = np.asarray(distance.pixel(residual.position))
    for part, hue in (
        (np.minimum(residual.force, 0.0), colours.compression),
        (np.maximum(residual.force, 0.0), colours.tension),
    ):
        x = np.asarray(values.pixel(part * factor))
        fill = QColor(hue)
        fill.setAlphaF(0.25)
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(fill)
        zero = np.full(2, values.at(0.0))
        painter.drawPolygon(polygon(np.concatenate((x, zero)), np.concatenate((y, y[[-1, 0]]))))
    painter.setBrush(Qt.BrushStyle.NoBrush)
    painter.setPen(pen(colours.grid))
    painter.drawLine(QLineF(values.at(0.0), plot.top(), values.at(0.0), plot.bottom()))
    painter.setPen(pen(colours.ink, 1.6))
    painter.drawPolyline(polygon(np.asarray(values.pixel(residual.force * factor)), y))
    index = int(np.argmax(np.abs(residual.force)))
    if residual.force[index]:
        _name_largest(
            painter, plot, values.at(float(residual.force[index]) * factor), float(y[index]), residual, units
        )
    painter.restore()
    horizontal_ticks(painter, values, plot.bottom(), True)


def table_of(residual: Residual, units: Units) -> Table:
    unit = unit_of(residual, units)
    return Table(
        [f"distance {units.unit('length')}", f"locked-in force {unit}"],
        [np.asarray(units.number(residual.position, "length")), residual.force * factor_of(residual, units)],
    )


def _name_largest(
    painter: QPainter, plot: QRectF, x: float, y: float, residual: Residual, units: Units
) -> None:
    force = float(residual.force[int(np.argmax(np.abs(residual.force)))])
    colours = palette()
    hue = colours.compression if force < 0 else colours.tension
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(QColor(hue))
    painter.drawEllipse(QPointF(x, y), 3.2, 3.2)
    words = units.show(units.sign * force, "force")
    metrics = QFontMetricsF(painter.font())
    half = metrics.horizontalAdvance(words) / 2 + 2
    x = min(max(x, plot.left() + half), plot.right() - half)
    above = y - metrics.height() > plot.top()
    put_on(painter, x, y + (-0.8 if above else 0.8) * metrics.height(), words, hue, colours.paper, CENTRE)


def _largest(residual: Residual) -> float:
    return float(np.max(np.abs(residual.force), initial=0.0))

"""Elevations between the member and its x-t diagram, where the level of the struck end is given: a scale upwards."""

from __future__ import annotations

from PySide6.QtCore import QLineF, QRectF
from PySide6.QtGui import QFontMetricsF, QPainter

from app.bench.member.glyphs import pen
from app.bench.pictures.axes import Axis, tick_texts, ticks
from app.bench.pictures.axis_drawing import LONG, in_units
from app.bench.pictures.lettering import RIGHT, put
from app.look.palette import palette
from app.units import Units
from solver import Case


def level_of(case: Case) -> float | None:
    """Elevation of the struck end (m), `None` where it is not given."""
    return case.ground.level_of_struck_end if case.ground else None


def draw_levels(painter: QPainter, case: Case, units: Units, axis: Axis, plot: QRectF) -> None:
    """Ticks at tidy elevations left of the plot, with numbers that tell on which side of zero they are."""
    level = level_of(case)
    if level is None:
        return
    upwards = in_units(
        Axis(level - axis.low, level - axis.high, axis.start, axis.length), float(units.number(1.0, "length"))
    )
    metrics = QFontMetricsF(painter.font())
    most = max(int(axis.length / (2.6 * metrics.height())), 2)
    values = [v for v in ticks(upwards.high, upwards.low, most) if upwards.at(v) >= axis.at(0.0) - 0.5]
    for value, text in zip(values, tick_texts(values), strict=True):
        y = upwards.at(value)
        painter.setPen(pen(palette().line))
        painter.drawLine(QLineF(plot.left() - LONG, y, plot.left(), y))
        signed = text if value <= 0 else f"+{text}"
        put(painter, plot.left() - LONG - 3, y, signed, palette().soft_ink, RIGHT)
    top = max(plot.top(), axis.at(0.0))
    words = f"Level, {units.unit('length')}"
    put(painter, plot.left() - LONG - 3, top - 1.1 * metrics.height(), words, palette().soft_ink, RIGHT)

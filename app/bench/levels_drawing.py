"""Elevations beside the member, where the level of its struck end is given: a second scale, upwards."""

from __future__ import annotations

from PySide6.QtCore import QLineF, QRectF
from PySide6.QtGui import QFontMetricsF, QPainter

from app.bench.axes import Axis, tick_texts, ticks
from app.bench.axis_drawing import LONG, in_units
from app.bench.glyphs import pen
from app.bench.lettering import RIGHT, put
from app.look.palette import palette
from app.units import MINUS, Units
from solver import Case


def level_of(case: Case) -> float | None:
    """Elevation of the struck end (m), `None` where it is not given."""
    return case.ground.level_of_struck_end if case.ground else None


def room_for_levels(case: Case, metrics: QFontMetricsF) -> float:
    """Pixels right of the plot that the numbers need, 0 where there are none."""
    return 0.0 if level_of(case) is None else round(metrics.horizontalAdvance(f"{MINUS}00") + LONG + 2)


def draw_levels(painter: QPainter, case: Case, units: Units, axis: Axis, plot: QRectF, right: float) -> None:
    """Ticks at tidy elevations on the right edge of the plot, with numbers that tell on which side of zero they are."""
    level = level_of(case)
    if level is None:
        return
    upwards = in_units(
        Axis(level - axis.low, level - axis.high, axis.start, axis.length), float(units.number(1.0, "length"))
    )
    metrics = QFontMetricsF(painter.font())
    most = max(int(axis.length / (2.6 * metrics.height())), 2)
    values = ticks(upwards.high, upwards.low, most)
    for value, text in zip(values, tick_texts(values), strict=True):
        y = upwards.at(value)
        painter.setPen(pen(palette().line))
        painter.drawLine(QLineF(plot.right(), y, plot.right() + LONG, y))
        signed = text if value <= 0 else f"+{text}"
        put(painter, right, y, signed, palette().soft_ink, RIGHT)
    painter.setPen(pen(palette().line))
    painter.drawLine(QLineF(plot.right(), plot.top(), plot.right(), plot.bottom()))
    put(painter, right, plot.top() - 0.8 * metrics.height(), "level", palette().soft_ink, RIGHT)

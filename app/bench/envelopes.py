"""Extremes of the whole run along the member, drawn on the profile: this case's, and those of cases laid over it."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QPainter

from app.bench.field_values import Extremes
from app.bench.member.glyphs import pen
from app.bench.pictures.axes import Axis
from app.bench.pictures.curves import polygon
from app.bench.pictures.lettering import fitted, put_on, width_of
from app.bench.pictures.line_styles import over_pen
from app.look.palette import palette
from app.sight import ShownQuantity

#: Places along the member where the name of a case laid over is tried.
PLACES = 12


@dataclass(frozen=True)
class Scale:
    """Where values lie on the profile: its plot, both axes, the factor from SI to what is shown, and the colours of the
    lowest and of the highest."""

    plot: QRectF
    distance: Axis
    values: Axis
    factor: float
    hues: tuple[str, str]

    def x(self, values_si: np.ndarray) -> np.ndarray:
        return np.asarray(self.values.pixel(values_si * self.factor))

    def y(self, places: np.ndarray) -> np.ndarray:
        return np.asarray(self.distance.pixel(places))


def hues_of(quantity: ShownQuantity) -> tuple[str, str]:
    """Colours of the lowest and of the highest."""
    colours = palette()
    if quantity in ("stress", "force"):
        return colours.compression, colours.tension
    return colours.backward, colours.forward


def draw_extremes(painter: QPainter, scale: Scale, found: Extremes) -> None:
    """Both curves, and a dot at the peak of each."""
    if not len(found.position):
        return
    y = scale.y(found.position)
    for ends, hue, pick in zip(
        (found.lowest, found.highest), scale.hues, (np.argmin, np.argmax), strict=True
    ):
        x = scale.x(ends)
        painter.setPen(pen(hue, 1.2))
        painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.drawPolyline(polygon(x, y))
        peak = int(pick(ends))
        if abs(ends[peak]) > 0:
            painter.setPen(Qt.PenStyle.NoPen)
            painter.setBrush(QColor(hue))
            painter.drawEllipse(QPointF(x[peak], y[peak]), 3.2, 3.2)
    painter.setBrush(Qt.BrushStyle.NoBrush)


def draw_striking(painter: QPainter, scale: Scale, found: Extremes) -> None:
    """Those of a rod that strikes, above the member's."""
    for ends, hue in zip((found.lowest, found.highest), scale.hues, strict=True):
        painter.setPen(pen(hue, 1.2))
        painter.drawPolyline(polygon(scale.x(ends), scale.y(found.position)))


def name_extremes(painter: QPainter, scale: Scale, found: Extremes) -> None:
    """ "whole run" at the foot of the larger curve."""
    if not len(found.position):
        return
    y = scale.y(found.position[-1:])
    ends, hue = _larger(found, scale)
    width, line = width_of("whole run", painter.font()), QFontMetricsF(painter.font()).height()
    left = _between(float(scale.x(ends[-1:])[0]) - width / 2, width, scale.plot)
    below = min(float(y[-1]) + 0.7 * line, scale.plot.bottom() - 0.6 * line)
    put_on(painter, left, below, "whole run", hue, palette().paper)


def draw_over(
    painter: QPainter, scale: Scale, found: Extremes, name: str, number: int, all_of_them: list[Extremes]
) -> None:
    """Those of a case laid over, with its name beside the larger curve where no curve of any runs through it."""
    y = scale.y(found.position)
    for ends, hue in zip((found.lowest, found.highest), scale.hues, strict=True):
        painter.setPen(over_pen(hue, number))
        painter.drawPolyline(polygon(scale.x(ends), y))
    ends, hue = _larger(found, scale)
    name = fitted(name, painter.font(), scale.plot.width() * 0.6)
    width, line = width_of(name, painter.font()), QFontMetricsF(painter.font()).height()
    curves = [(scale.y(e.position), scale.x(ends)) for e in all_of_them for ends in (e.lowest, e.highest)]
    boxes = [
        QRectF(left, float(y[row]) - line / 2, width, line)
        for row in np.linspace(0, len(ends) - 1, PLACES + 2).astype(int)[1:-1]
        for left in (float(scale.x(ends)[row]) + 6, float(scale.x(ends)[row]) - 6 - width)
    ]
    usual = boxes[2 * (3 + 2 * number)]
    inside = [box for box in boxes if scale.plot.contains(box)]
    inside.sort(key=lambda box: abs(box.top() - usual.top()))
    box = next((box for box in inside if not _crossed(box, curves)), usual)
    put_on(painter, box.left(), box.center().y(), name, hue, palette().paper)


def is_free(box: QRectF, scale: Scale, envelopes: list[Extremes]) -> bool:
    """Whether no curve of any of them, and nothing between its lowest and its highest, comes into a box."""
    for found in envelopes:
        y = scale.y(found.position)
        first, last = np.searchsorted(y, (box.top() - 1, box.bottom() + 1))
        if last <= first:
            continue
        x = np.concatenate((scale.x(found.lowest[first:last]), scale.x(found.highest[first:last])))
        if x.min() < box.right() + 3 and x.max() > box.left() - 3:
            return False
    return True


def _crossed(box: QRectF, curves: list[tuple[np.ndarray, np.ndarray]]) -> bool:
    """Whether any of the curves, as heights and places across, runs through a box."""
    rows = np.linspace(box.top() - 1, box.bottom() + 1, 5)
    across = (np.interp(rows, y, x) for y, x in curves)
    return any(x.min() < box.right() + 2 and x.max() > box.left() - 2 for x in across)


def _larger(found: Extremes, scale: Scale) -> tuple[np.ndarray, str]:
    compressive = -np.min(found.lowest, initial=0) >= np.max(found.highest, initial=0)
    return (found.lowest, scale.hues[0]) if compressive else (found.highest, scale.hues[1])


def _between(left: float, width: float, plot: QRectF) -> float:
    return min(max(left, plot.left() + 8), plot.right() - width - 2)

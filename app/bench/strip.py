"""One strip: curves over the time of the x-t diagram above it, named on the curve."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import numpy as np
from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QPainter, QPolygonF, QRegion
from PySide6.QtWidgets import QWidget

from app.bench.axes import Axis, Margins, margins_of
from app.bench.axis_drawing import horizontal_ticks, in_units, value_ticks
from app.bench.cursor import draw_cursor
from app.bench.curve_labels import Drawn, Wanted, place_labels
from app.bench.curves import polygon, thinned
from app.bench.glyphs import pen
from app.bench.lettering import CENTRE, put, put_on
from app.bench.picture import Picture, Table
from app.bench.strip_contents import CHIPS, Content, Curve, content_of, gauge_of
from app.document import Document
from app.look.palette import palette
from app.sight import Sight
from app.solving import Solution

#: Opacity of the second curve of a pair.
FAINT = 0.6


class Strip(Picture):
    """`name` as in `Sight.strips`, with ":Gauge" behind it where it is about one gauge; the last strip carries the
    numbers of the time axis."""

    has_time = True

    def __init__(
        self,
        name: str,
        last: bool,
        document: Document,
        sight: Sight,
        solution: Solution,
        parent: QWidget | None = None,
    ) -> None:
        super().__init__(document, sight, solution, parent)
        self.name, self.last = name, last
        self.setAccessibleName(f"{CHIPS[self.kind]} through time")
        self.setCursor(Qt.CursorShape.CrossCursor)

    @property
    def kind(self) -> str:
        return self.name.partition(":")[0]

    def described(self) -> tuple[Any, ...]:
        return (*super().described(), self.case.load.kind)

    def margins(self) -> Margins:
        """Left and right as the x-t diagram has them; little above, and below only what the numbers need."""
        shared = margins_of(self.font())
        line = QFontMetricsF(self.font()).height()
        return replace(shared, header=6.0, bottom=float(round(2.7 * line)) if self.last else 5.0)

    def content(self) -> Content:
        result = self.result
        if result is None:
            return Content("force", ())
        return content_of(self.kind, result, gauge_of(self.name, result.case), self.units)

    def value_axis(self, content: Content) -> Axis:
        """Upwards, in the unit shown, with room for all that lies within the times shown."""
        plot, time = self.plot(), self.time_axis()
        low, high = 0.0, 0.0
        for curve in content.curves:
            inside = _within(curve, time)
            if inside.size:
                low, high = min(low, float(inside.min())), max(high, float(inside.max()))
        factor = self._factor(content, max(-low, high))
        span = (high - low) or 1.0 / factor
        low, high = (low - 0.08 * span) * factor, (high + 0.08 * span) * factor
        return Axis(low, high, plot.bottom(), -plot.height())

    def _factor(self, content: Content, near: float) -> float:
        return float(self.units.number(1.0, content.dimension, near))

    def _near(self, content: Content) -> float:
        """Largest magnitude shown, in SI, by which the unit is chosen."""
        time = self.time_axis()
        parts = [np.abs(_within(c, time)).max(initial=0.0) for c in content.curves]
        return float(max(parts, default=0.0))

    # Drawing ----------------------------------------------------------------------------------------------------

    def draw_resting(self, painter: QPainter) -> None:
        plot, time, content = self.plot(), self.time_axis(), self.content()
        near = self._near(content)
        values, factor = self.value_axis(content), self._factor(content, near)
        if content.curves:
            value_ticks(painter, values, plot)
            self._draw_unit(painter, plot, self.units.unit(content.dimension, near))
        span = time.high - time.low
        shown_time = in_units(time, float(self.units.number(1.0, "time", span)))
        horizontal_ticks(painter, shown_time, plot.bottom(), self.last)
        if self.last:
            line = QFontMetricsF(painter.font()).height()
            since = "impact" if self.case.load.kind in ("drop", "striker") else "the start of the blow"
            words = f"Time since {since}, {self.units.unit('time', span)}"
            put(painter, plot.center().x(), plot.bottom() + 2.0 * line, words, palette().soft_ink, CENTRE)
        if not content.curves:
            if self.result is not None:
                put(painter, plot.center().x(), plot.center().y(), "no gauge", palette().soft_ink, CENTRE)
            return
        painter.save()
        painter.setClipRect(plot)
        drawn = [self._drawn(c, time, values, factor) for c in content.curves]
        if content.filled and len(drawn) == 2:
            self._fill_between(painter, drawn, content.curves[0].hue)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setBrush(Qt.BrushStyle.NoBrush)
        for curve, shape in zip(content.curves, drawn, strict=True):
            painter.setPen(pen(curve.hue, 1.0, curve.style, FAINT if curve.faint else 1.0))
            painter.drawPolyline(polygon(shape.x, shape.y))
        self._draw_ticks(painter, content, plot, time)
        self._draw_names(painter, content, drawn, plot)
        painter.restore()

    def moving_region(self) -> QRegion:
        plot = self.plot().toAlignedRect()
        x = round(self.time_axis().at(self.sight.time))
        return QRegion(x - 2, plot.top(), 5, plot.height() + 1)

    def moving_key(self) -> tuple[Any, ...]:
        return (self.sight.time,)

    def draw_moving(self, painter: QPainter) -> None:
        draw_cursor(painter, self.plot(), self.time_axis(), self.sight.time)

    def _drawn(self, curve: Curve, time: Axis, values: Axis, factor: float) -> Drawn:
        x, y = thinned(curve.time, curve.values, time, self.devicePixelRatioF())
        return Drawn(x, np.asarray(values.pixel(y * factor)))

    def _draw_unit(self, painter: QPainter, plot: QRectF, unit: str) -> None:
        painter.save()
        painter.translate(0.75 * QFontMetricsF(painter.font()).height(), plot.center().y())
        painter.rotate(-90)
        put(painter, 0, 0, unit, palette().soft_ink, CENTRE)
        painter.restore()

    def _fill_between(self, painter: QPainter, drawn: list[Drawn], hue: str) -> None:
        """A point a pixel and no smoothing: thousands of points filled smoothly took longer than all the rest."""
        first, second = drawn
        left, right = max(first.x[0], second.x[0]), min(first.x[-1], second.x[-1])
        x = np.arange(left, right, 1.0)
        upper, lower = np.interp(x, first.x, first.y), np.interp(x, second.x, second.y)
        colour = QColor(hue)
        colour.setAlphaF(0.16)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(colour)
        shape = polygon(np.concatenate((x, x[::-1])), np.concatenate((upper, lower[::-1])))
        painter.drawPolygon(shape, Qt.FillRule.WindingFill)

    def _draw_ticks(self, painter: QPainter, content: Content, plot: QRectF, time: Axis) -> None:
        """Small ticks from the top, the first two joined and named."""
        if len(content.ticks) < 2:
            return
        ink = palette().soft_ink
        painter.setPen(pen(ink))
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

    def _draw_names(self, painter: QPainter, content: Content, drawn: list[Drawn], plot: QRectF) -> None:
        colours, metrics = palette(), QFontMetricsF(painter.font())
        height = metrics.height()
        names = [(i, c.name, c.hue) for i, c in enumerate(content.curves)]
        room = plot
        if len(content.ticks) >= 2:
            self._name_ticks(painter, content, plot, plot.top() + 4 + 0.1 * height)
            room = plot.adjusted(0, height * 0.8, 0, 0)
        wanted = [Wanted(i, metrics.horizontalAdvance(name)) for i, name, _ in names]
        if content.filled and len(drawn) == 2:
            middle = Drawn(drawn[0].x, (drawn[0].y + np.interp(drawn[0].x, drawn[1].x, drawn[1].y)) / 2)
            apart = np.abs(drawn[0].y - middle.y)
            wide = Drawn(middle.x[apart > 3], np.maximum(drawn[0].y, 2 * middle.y - drawn[0].y)[apart > 3])
            drawn = [*drawn, wide]
            names.append((2, content.filled, colours.soft_ink))
            wanted.append(Wanted(2, metrics.horizontalAdvance(content.filled)))
        boxes = place_labels(drawn, wanted, room, height)
        for (_, name, hue), box in zip(names, boxes, strict=True):
            if box is not None:
                put_on(painter, box.left(), box.center().y(), name, hue, colours.paper)

    def _name_ticks(self, painter: QPainter, content: Content, plot: QRectF, y: float) -> None:
        """Behind the second tick, or before the first one, or between them: where there is room."""
        width = QFontMetricsF(painter.font()).horizontalAdvance(content.ticks_named)
        first, second = (self.time_axis().at(tick) for tick in content.ticks[:2])
        x = second + 8
        if x + width > plot.right():
            x = first - 8 - width if first - 8 - width > plot.left() else (first + second - width) / 2
        put_on(painter, x, y, content.ticks_named, palette().soft_ink, palette().paper)

    def table(self) -> Table | None:
        """Time and every curve, in the units and sign of the screen; all steps, nothing thinned."""
        content = self.content()
        if not content.curves:
            return None
        near, units = self._near(content), self.units
        unit = units.unit(content.dimension, near)
        headings, columns = [], []
        for curve in content.curves:
            headings += [f"time {units.unit('time')}", f"{curve.name} {unit}"]
            columns += [
                np.asarray(units.number(curve.time, "time")),
                np.asarray(units.number(curve.values, content.dimension, near)),
            ]
        return Table(headings, columns)


def _within(curve: Curve, time: Axis) -> np.ndarray:
    first, last = np.searchsorted(curve.time, (time.low, time.high))
    return curve.values[first : last + 1]

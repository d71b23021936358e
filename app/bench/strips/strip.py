"""One strip: curves over the time of the x-t diagram above it, named on the curve."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import numpy as np
from PySide6.QtCore import QEvent, QPointF, QRectF, Qt
from PySide6.QtGui import QFontMetricsF, QMouseEvent, QPainter, QRegion
from PySide6.QtWidgets import QMenu, QWidget

from app.bench.member.glyphs import pen
from app.bench.pictures.arrival_drawing import (
    ARROW,
    TICK,
    draw_tick_pointed,
    draw_ticks,
    ticks_near,
    write_name,
)
from app.bench.pictures.arrival_lines import Line, all_named, arrivals_shown, lines_of
from app.bench.pictures.axes import Axis, Margins, margins_of
from app.bench.pictures.axis_drawing import horizontal_ticks, in_units, value_ticks
from app.bench.pictures.cursor import between, draw_between, draw_cursor, draw_pinned_moment
from app.bench.pictures.curve_labels import Drawn
from app.bench.pictures.curves import polygon, thinned
from app.bench.pictures.lettering import CENTRE, put
from app.bench.pictures.line_styles import over_pen
from app.bench.pictures.picture import Picture, Table
from app.bench.strips.contents import CHIPS, OF_ONE_GAUGE, Content, Curve, content_of, content_over, gauge_of
from app.bench.strips.marks import draw_peaks, draw_returns, fill_between
from app.bench.strips.naming import Names
from app.document import Document
from app.laid_over import LaidOver
from app.look.palette import palette
from app.sight import Sight
from app.solving import Solution
from app.units import rounded

#: Opacity of the second curve of a pair.
FAINT = 0.6


class Strip(Picture):
    """`name` as in `Sight.strips`, with ":Gauge" behind it where it is about one gauge; the last strip carries the
    numbers of the time axis."""

    has_time = True
    turn = 1

    def __init__(
        self,
        name: str,
        last: bool,
        document: Document,
        sight: Sight,
        solution: Solution,
        parent: QWidget | None = None,
        laid_over: LaidOver | None = None,
    ) -> None:
        super().__init__(document, sight, solution, parent)
        self.name, self.last, self._laid_over = name, last, laid_over
        self.numbers = "time" if last else ""
        self.setAccessibleName(f"{CHIPS[self.kind]} through time")
        self.setCursor(Qt.CursorShape.CrossCursor)
        self.setMouseTracking(True)
        self._names = Names()
        if laid_over is not None:
            laid_over.changed.connect(self.look_again)

    @property
    def kind(self) -> str:
        return self.name.partition(":")[0]

    def described(self) -> tuple[Any, ...]:
        return (*super().described(), self.case.load.kind)

    def resting_key(self) -> tuple[Any, ...]:
        over = () if self._laid_over is None else self._laid_over.results()
        return (over, self._own_peaks(), arrivals_shown(self.sight, self.result))

    def margins(self) -> Margins:
        """Left and right as the x-t diagram has them; little above, and below only what the numbers need."""
        shared = margins_of(self.font())
        line = QFontMetricsF(self.font()).height()
        return replace(shared, header=6.0, bottom=float(round(2.7 * line)) if self.last else 5.0)

    def content(self) -> Content:
        result = self.result
        if result is None:
            return Content("force", ())
        content = content_of(self.kind, result, gauge_of(self.name, result.case), self.units)
        over = () if self._laid_over is None else self._laid_over.results()
        return content_over(content, self.name, over, self.units) if over else content

    def gauge_shown(self) -> int | None:
        """Number of the gauge on the member that the strip is about; `None` where it is about all."""
        if self.kind not in OF_ONE_GAUGE or self.result is None:
            return None
        name = gauge_of(self.name, self.result.case)
        gauges = self.result.case.gauges
        return next((i for i, g in enumerate(gauges) if g.name == name and g.on == "member"), None)

    def lines(self) -> tuple[Line, ...]:
        """Predicted arrivals, where they are shown."""
        shown = arrivals_shown(self.sight, self.result)
        return lines_of(self.result) if shown and self.result is not None else ()

    # Choosing ---------------------------------------------------------------------------------------------------

    def fill_menu(self, menu: QMenu) -> None:
        curve = self.curve_at(self.menu_at)
        if curve is not None:
            key = f"{self.name}/{curve.name}"
            on = key in self.sight.peaks
            action = menu.addAction(f"Label the peaks of {curve.name}", lambda: self._turn_peaks(key))
            action.setCheckable(True)
            action.setChecked(on)
        forget = menu.addAction("Label no peaks", lambda: self.sight.set(peaks=()))
        forget.setEnabled(bool(self.sight.peaks))
        menu.addSeparator()

    def curve_at(self, where: QPointF) -> Curve | None:
        """The curve nearest to a point, above or below it."""
        content, time = self.content(), self.time_axis()
        values, factor = self.value_axis(content), self._factor(content, self._near(content))
        moment = time.value(where.x())
        there = [c for c in content.curves if len(c.time) and c.time[0] <= moment <= c.time[-1]]

        def away(curve: Curve) -> float:
            return abs(values.at(float(np.interp(moment, curve.time, curve.values)) * factor) - where.y())

        return min(there, key=away, default=None)

    def _turn_peaks(self, key: str) -> None:
        peaks = self.sight.peaks
        self.sight.set(peaks=tuple(k for k in peaks if k != key) if key in peaks else (*peaks, key))

    def _own_peaks(self) -> tuple[str, ...]:
        start = f"{self.name}/"
        return tuple(k.removeprefix(start) for k in self.sight.peaks if k.startswith(start))

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        super().mouseMoveEvent(event)
        gauge = self.gauge_shown()
        if not event.buttons() and gauge is not None and self.result is not None:
            place = self.result.case.gauges[gauge].position
            near = ticks_near(self.lines(), place, event.position(), self.time_axis(), self.plot())
            self.sight.set(pointed=near)

    def leaveEvent(self, event: QEvent) -> None:
        self.sight.set(pointed=())

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
        return Axis(low, high, plot.bottom(), self._band(content) - plot.height())

    def _band(self, content: Content) -> float:
        """Pixels at the top that are kept for the marks of 2L/c, so that no curve runs through them."""
        return QFontMetricsF(self.font()).height() if len(content.ticks) > 1 else 0.0

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
        if content.filled and len(drawn) >= 2:
            fill_between(painter, drawn[0], drawn[1], plot, content.curves[0].hue)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setBrush(Qt.BrushStyle.NoBrush)
        for curve, shape in zip(content.curves, drawn, strict=True):
            opacity = FAINT if curve.faint else 1.0
            own = pen(curve.hue, 1.0, curve.style, opacity)
            painter.setPen(own if curve.over is None else over_pen(curve.hue, curve.over, opacity, thin=True))
            painter.drawPolyline(polygon(shape.x, shape.y))
        draw_returns(painter, content, plot, time)
        gauge = self.gauge_shown()
        if gauge is not None and self.result is not None:
            draw_ticks(painter, self.lines(), self.result.case.gauges[gauge].position, time, plot)
        room = plot.adjusted(0, self._band(content), 0, -ARROW - 1 if self.lines() else 0)
        taken = self._draw_peaks(painter, content, time, values, factor)
        self._names.draw(painter, content, drawn, room, taken)
        painter.restore()

    def _draw_peaks(
        self, painter: QPainter, content: Content, time: Axis, values: Axis, factor: float
    ) -> list[QRectF]:
        """Peaks of the curves chosen for it; the boxes of their labels."""
        taken: list[QRectF] = []
        chosen = self._own_peaks()
        near = self._near(content)
        for curve in content.curves:
            if curve.name in chosen:
                taken += draw_peaks(
                    painter,
                    curve,
                    (time, values),
                    self.plot(),
                    factor,
                    lambda v, t: self._peak_words(v, t, content.dimension, near),
                    taken,
                )
        return taken

    def _peak_words(self, value: float, time: float, dimension: str, near: float) -> str:
        return f"{rounded(float(self.units.number(value, dimension, near)))}, {self.units.show(time, 'time')}"

    def moving_region(self) -> QRegion:
        plot = self.plot().toAlignedRect()
        if self.sight.pinned is not None or self.sight.pointed:
            return QRegion(plot.adjusted(-2, -2, 2, 2))
        time = self.time_axis()
        x = round(time.at(time.clipped(self.sight.time)))  # a pixel far away is more than Qt can count
        return QRegion(x - 2, plot.top(), 5, plot.height() + 1)

    def moving_key(self) -> tuple[Any, ...]:
        return (self.sight.time, self.sight.pinned, self.sight.pointed)

    def draw_moving(self, painter: QPainter) -> None:
        plot, time = self.plot(), self.time_axis()
        draw_cursor(painter, plot, time, self.sight.time)
        pinned = self.sight.pinned
        if pinned is not None:
            draw_pinned_moment(painter, plot, time, pinned[0])
            y = plot.bottom() - 0.7 * QFontMetricsF(painter.font()).height()
            ends = [
                QPointF(min(max(time.at(t), plot.left()), plot.right()), y)
                for t in (self.sight.time, pinned[0])
            ]
            draw_between(
                painter, plot, ends[0], ends[1], between(self.units, self.sight.time, None, pinned), False
            )
        self._draw_pointed(painter, plot, time)

    def _draw_pointed(self, painter: QPainter, plot: QRectF, time: Axis) -> None:
        """When the arrivals that are pointed at come past the gauge shown, or past each gauge."""
        lines = self.lines()
        pointed = [lines[n] for n in self.sight.pointed if n < len(lines)]
        if not pointed or self.result is None:
            return
        only = self.gauge_shown()
        for index, gauge in enumerate(self.result.case.gauges):
            moments = [line.passes(gauge.position) for line in pointed]
            if gauge.on != "member" or (only is not None and index != only) or self.kind == "energy":
                continue
            for moment in moments:
                if moment is not None:
                    draw_tick_pointed(painter, moment, time, plot, palette().gauge(index))
            if only is not None and self.underMouse() and moments[0] is not None:
                name = all_named(lines, self.sight.pointed, self.units)
                y = plot.bottom() - TICK - 0.6 * QFontMetricsF(painter.font()).height()
                write_name(painter, time.at(moments[0]), y, f"↑ {name}", plot)

    def _drawn(self, curve: Curve, time: Axis, values: Axis, factor: float) -> Drawn:
        x, y = thinned(curve.time, curve.values, time, self.devicePixelRatioF())
        return Drawn(x, np.asarray(values.pixel(y * factor)))

    def _draw_unit(self, painter: QPainter, plot: QRectF, unit: str) -> None:
        painter.save()
        painter.translate(0.75 * QFontMetricsF(painter.font()).height(), plot.center().y())
        painter.rotate(-90)
        put(painter, 0, 0, unit, palette().soft_ink, CENTRE)
        painter.restore()

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

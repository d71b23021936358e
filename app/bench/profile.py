"""The quantity along the member: at the cursor's time, over the extremes of the whole run, with the limits of each
segment's material. The limits and the peaks are those of the findings."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace
from itertools import pairwise
from typing import Any

import numpy as np
from PySide6.QtCore import QLineF, QRectF, Qt
from PySide6.QtGui import QFontMetricsF, QPainter, QPainterPath, QPen, QRegion
from PySide6.QtWidgets import QMenu

from app.bench.envelopes import (
    Scale,
    draw_extremes,
    draw_over,
    draw_striking,
    hues_of,
    is_free,
    name_extremes,
)
from app.bench.field_values import (
    DIMENSIONS,
    along_member,
    extremes_of,
    limit_lines,
    screen_sign,
    striking_extremes,
)
from app.bench.limits import Limit, draw_limits, limits_of
from app.bench.member.glyphs import pen
from app.bench.member.locked_in import draw_locked_in, table_of, unit_of
from app.bench.pictures.axes import Axis, Margins, margins_of
from app.bench.pictures.axis_drawing import distance_ticks, horizontal_ticks, in_units
from app.bench.pictures.cursor import draw_pinned_place, draw_place
from app.bench.pictures.curves import polygon
from app.bench.pictures.lettering import put
from app.bench.pictures.line_styles import over_pen
from app.bench.pictures.picture import Picture, Table
from app.laid_over import LaidOver, Over
from app.look.fonts import font
from app.look.palette import palette
from solver import Result
from solver.answer.result import Residual

#: A limit this many times larger than all stresses is told in words at the edge, so that it does not flatten them.
FAR_LIMIT = 2.5
TITLE, LOCKED_IN = "Along the member", "Locked-in force"


class Profile(Picture):
    has_distance = True

    def __init__(self, *args: Any, laid_over: LaidOver | None = None, **named: Any) -> None:
        super().__init__(*args, **named)
        self.setAccessibleName("Along the member")
        self._laid_over = laid_over
        if laid_over is not None:
            laid_over.changed.connect(self.look_again)

    def margins(self) -> Margins:
        shared = margins_of(self.font())
        return replace(shared, gutter=shared.gutter if self.lacks_numbers("distance") else 14.0, right=14.0)

    def described(self) -> tuple[Any, ...]:
        return (*super().described(), tuple(limit_lines(self.case)))

    def resting_key(self) -> tuple[Any, ...]:
        return (self.sight.quantity, self._others(), self.residual())

    def residual(self) -> Residual | None:
        """The force left by the blows, where it is to be shown and there is one."""
        return self.result.residual if self.sight.locked_in and self.result is not None else None

    def fill_menu(self, menu: QMenu) -> None:
        if self.result is not None and self.result.residual is not None:
            on = self.sight.locked_in
            action = menu.addAction(LOCKED_IN, lambda: self.sight.set(locked_in=not on))
            action.setCheckable(True)
            action.setChecked(on)
            menu.addSeparator()

    def _others(self) -> tuple[Over, ...]:
        return () if self._laid_over is None else self._laid_over.results()

    # Values in the units and sign of the screen -----------------------------------------------------------------

    @property
    def dimension(self) -> str:
        return DIMENSIONS[self.sight.quantity]

    def _largest(self) -> float:
        """Largest magnitude of the whole run in SI, by which the unit is chosen."""
        if self.result is None:
            return 0.0
        found = [extremes_of(result, self.sight.quantity) for result in self._all_results()]
        return float(max(max(np.max(-f.lowest, initial=0), np.max(f.highest, initial=0)) for f in found))

    def _all_results(self) -> list[Result]:
        """The one looked at, and those laid over it."""
        over = [one.result for one in self._others() if one.result is not None]
        return over if self.result is None else [self.result, *over]

    def factor(self) -> float:
        """From SI with tension positive to what is shown."""
        one = float(self.units.number(1.0, self.dimension, self._largest()))
        return one * screen_sign(self.sight.quantity, self.units)

    def limits(self) -> list[tuple[Limit, float]]:
        """Limits of each segment's material, each with its value as shown."""
        if self.result is None:
            return []
        factor = self.factor()
        return [
            (limit, limit.value * factor) for limit in limits_of(self.case, self.result, self.sight.quantity)
        ]

    def value_axis(self) -> Axis:
        """Values to the right, in the unit shown; room for the whole run and for limits that are not far off."""
        plot, factor = self.plot(), self.factor()
        reach = self._largest() * abs(factor)
        values = [shown for _, shown in self.limits() if abs(shown) <= FAR_LIMIT * reach]
        for result in self._all_results() if self.result is not None else ():
            quantity = self.sight.quantity
            for found in (extremes_of(result, quantity), striking_extremes(result, quantity)):
                for ends in () if found is None else (found.lowest, found.highest):
                    values += [
                        float(np.min(ends, initial=0)) * factor,
                        float(np.max(ends, initial=0)) * factor,
                    ]
        low, high = min([*values, 0.0]), max([*values, 0.0])
        span = (high - low) or 1.0
        return Axis(low - 0.08 * span, high + 0.08 * span, plot.left(), plot.width())

    # Drawing ----------------------------------------------------------------------------------------------------

    def draw_resting(self, painter: QPainter) -> None:
        plot, distance, values = self.plot(), self.distance_axis(), self.value_axis()
        self._draw_heading(painter)
        least = -sum(s.length for s in self.case.ram_segments)
        metres = float(self.units.number(1.0, "length"))
        bare = self.lacks_numbers("distance")
        distance_ticks(painter, in_units(distance, metres), plot.left(), bare, least * metres)
        self.name_axes(painter)
        residual = self.residual()
        if residual is not None:
            draw_locked_in(painter, plot, distance, residual, self.units)
            return
        painter.save()
        painter.setClipRect(plot)
        if values.low < 0 < values.high:
            painter.setPen(pen(palette().grid))
            painter.drawLine(QLineF(values.at(0), plot.top(), values.at(0), plot.bottom()))
        if self.result is not None:
            self._draw_whole_run(painter, plot, distance, values)
        painter.restore()
        horizontal_ticks(painter, values, plot.bottom(), self.result is not None)

    def moving_region(self) -> QRegion:
        return QRegion(0, 0, self.width(), int(self.plot().bottom() + 2))

    def draw_moving(self, painter: QPainter) -> None:
        plot, distance = self.plot(), self.distance_axis()
        self._draw_moment(painter)
        painter.save()
        painter.setClipRect(plot)
        draw_place(painter, plot, distance, self.sight.place)
        if self.sight.pinned is not None:
            draw_pinned_place(painter, plot, distance, self.sight.pinned[1])
        if self.result is not None and len(self.result.fields.position) and self.residual() is None:
            self._draw_now(painter, distance)
        painter.restore()

    def _draw_heading(self, painter: QPainter) -> None:
        y = 0.5 * self.margins().header
        painter.setFont(font("strong"))
        put(painter, 8, y, self._title(), palette().ink)
        painter.setFont(self.font())

    def _title(self) -> str:
        return TITLE if self.residual() is None else LOCKED_IN

    def _draw_moment(self, painter: QPainter) -> None:
        """The unit and the moment behind the heading, as much of it as there is room for."""
        x = 14 + QFontMetricsF(font("strong")).horizontalAdvance(self._title())
        residual = self.residual()
        if residual is not None:
            blows = f"{unit_of(residual, self.units)} after {len(residual.set_per_blow)} blows"
            put(painter, x, 0.5 * self.margins().header, blows, palette().soft_ink)
            return
        unit = self.units.unit(self.dimension, self._largest())
        moment = self.units.show(self.sight.time, "time")
        painter.setFont(self.font())
        metrics, room = QFontMetricsF(self.font()), self.width() - x - 6
        choices = (f"{unit} at {moment}", f"{unit}, {moment}", unit)
        words = next((w for w in choices if metrics.horizontalAdvance(w) <= room), "")
        put(painter, x, 0.5 * self.margins().header, words, palette().soft_ink)

    def _draw_now(self, painter: QPainter, distance: Axis) -> None:
        """The quantity at the cursor's time; thinner at the pinned cursor's; and that of the cases laid over it."""
        assert self.result is not None
        values, ink = self.value_axis(), palette().ink
        pinned = self.sight.pinned
        if pinned is not None:
            self._draw_at(painter, self.result, pinned[0], values, distance, pen(palette().soft_ink, 1.0))
        for one in self._others():
            assert one.result is not None
            self._draw_at(painter, one.result, self.sight.time, values, distance, over_pen(ink, one.number))
        self._draw_at(painter, self.result, self.sight.time, values, distance, pen(ink, 1.8))

    def _draw_at(
        self, painter: QPainter, result: Result, time: float, values: Axis, distance: Axis, with_pen: QPen
    ) -> None:
        now = along_member(result, self.sight.quantity, time) * self.factor()
        painter.setPen(with_pen)
        painter.setBrush(Qt.BrushStyle.NoBrush)
        path, fields = QPainterPath(), result.fields
        for start, end in _runs(result):
            # one run of columns without a joint in it, carried on level to both of its faces
            places = np.concatenate(([fields.edges[start]], fields.position[start:end], [fields.edges[end]]))
            ends = np.concatenate(([now[start]], now[start:end], [now[end - 1]]))
            path.addPolygon(polygon(np.asarray(values.pixel(ends)), np.asarray(distance.pixel(places))))
        painter.drawPath(path)

    def _draw_whole_run(self, painter: QPainter, plot: QRectF, distance: Axis, values: Axis) -> None:
        """Extremes of this case and of those laid over it, and the limits off all of them."""
        quantity = self.sight.quantity
        scale = Scale(plot, distance, values, self.factor(), hues_of(quantity))
        found = [extremes_of(result, quantity) for result in self._all_results()]
        draw_extremes(painter, scale, found[0])
        rod = None if self.result is None else striking_extremes(self.result, quantity)
        if rod is not None:
            draw_striking(painter, scale, rod)
        for one, extremes in zip(self._others(), found[1:], strict=True):
            draw_over(painter, scale, extremes, one.name, one.number, found)

        def free(box: QRectF) -> bool:
            return is_free(box, scale, found if rod is None else [*found, rod])

        draw_limits(painter, plot, distance, values, self.limits(), quantity, free)
        # over the lines of limits, where there is no room beside them
        name_extremes(painter, scale, found[0])

    def table(self) -> Table | None:
        """Distance, the extremes of the whole run, and the quantity now, in the units and sign of the screen."""
        if self.result is None:
            return None
        residual = self.residual()
        if residual is not None:
            return table_of(residual, self.units)
        units, factor, quantity = self.units, self.factor(), self.sight.quantity
        found = extremes_of(self.result, quantity)
        fields = self.result.fields
        now = along_member(self.result, quantity, self.sight.time) * factor
        unit, metres = units.unit(self.dimension, self._largest()), units.unit("length")
        return Table(
            [
                f"distance {metres}",
                f"lowest {quantity} {unit} (towards compression, or the struck end)",
                f"highest {quantity} {unit} (towards tension, or the far end)",
                f"distance of the values now {metres}",
                f"{quantity} {unit} at {units.show(self.sight.time, 'time')}",
            ],
            [
                np.asarray(units.number(found.position, "length")),
                found.lowest * factor,
                found.highest * factor,
                np.asarray(units.number(fields.position, "length")),
                now,
            ],
        )


def _runs(result: Result) -> Iterator[tuple[int, int]]:
    """Ranges of columns that belong to one segment: stress jumps from one to the next."""
    case, fields = result.case, result.fields
    joints = np.cumsum([0.0] + [s.length for s in case.member.segments])
    above = -np.cumsum([0.0] + [s.length for s in reversed(case.ram_segments)])[::-1]
    bounds = np.unique(np.concatenate((above, joints)))
    cuts = np.searchsorted(fields.position, bounds)
    for start, end in pairwise(cuts):
        if end > start:
            yield int(start), int(end)

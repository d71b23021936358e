"""The run as one picture: the quantity over time (to the right) and distance (downwards), as colour."""

from __future__ import annotations

from functools import partial
from typing import Any

import numpy as np
from PySide6.QtCore import QEvent, QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QFontMetricsF, QImage, QMouseEvent, QPainter, QRegion, QResizeEvent
from PySide6.QtWidgets import QMenu, QToolButton

from app.bench.field_values import DIMENSIONS, field_of
from app.bench.member.glyphs import pen
from app.bench.member.levels import draw_levels, level_of
from app.bench.pictures.arrival_drawing import draw_lines, draw_pointed, lines_near, write_name
from app.bench.pictures.arrival_lines import Line, all_named, arrivals_shown, lines_of
from app.bench.pictures.axes import Axis
from app.bench.pictures.axis_drawing import crisp, distance_ticks, horizontal_ticks, in_units
from app.bench.pictures.colour_scale import draw_scale
from app.bench.pictures.colouring import columns_under, entries_of, image_of, scale_top, table_of
from app.bench.pictures.cursor import (
    between,
    draw_between,
    draw_cursor,
    draw_pinned_moment,
    draw_pinned_place,
    draw_place,
)
from app.bench.pictures.lettering import WRITTEN, put
from app.bench.pictures.picture import Picture, Table
from app.look.fonts import font
from app.look.palette import palette
from solver.model.derived import place_of

HEADINGS = {
    "stress": "Stress through time",
    "force": "Force through time",
    "velocity": "Velocity through time",
    "displacement": "Displacement through time",
}
ARRIVALS_TIP = (
    "Where the front of the blow is expected, from lengths and wave speeds alone: straight lines down the member and, "
    "where it meets a step, a joint, the ground or the far end, back up. Point at a line to read its name."
)
#: Pixels of the field in a file with text as text, for each pixel of the screen: about 300 to an inch on paper.
FINER = 3.0


class XtDiagram(Picture):
    has_time = True
    has_distance = True
    turn = 0

    def __init__(self, *args: Any, **named: Any) -> None:
        super().__init__(*args, **named)
        self.setAccessibleName("Through time and along the member")
        self.setCursor(Qt.CursorShape.CrossCursor)
        self.setMouseTracking(True)
        self._mouse = QPointF()
        self._choice = self._button("▾", "Quantity shown", "quiet")
        self._choice.setToolTip("What the x-t diagram, the member and the profile show.")
        self._choice.setPopupMode(QToolButton.ToolButtonPopupMode.InstantPopup)
        menu = QMenu(self._choice)
        self._add_quantities(menu)
        self._choice.setMenu(menu)
        self.switch = self._button("Arrivals", "Predicted arrivals", "chip")
        self.switch.setCheckable(True)
        self.switch.setToolTip(ARRIVALS_TIP)
        self.switch.clicked.connect(lambda on: self.sight.set(arrivals=on))

    def _button(self, text: str, name: str, role: str) -> QToolButton:
        button = QToolButton(self)
        button.setText(text)
        button.setAccessibleName(name)
        button.setProperty("role", role)
        button.setStyleSheet("QToolButton { padding: 0px; min-height: 0px; }")
        button.setCursor(Qt.CursorShape.ArrowCursor)
        return button

    def fill_menu(self, menu: QMenu) -> None:
        self._add_quantities(menu)
        shown = menu.addAction("Predicted arrivals", lambda: self.sight.set(arrivals=not self.has_lines()))
        shown.setCheckable(True)
        shown.setChecked(self.has_lines())
        menu.addSeparator()

    def _add_quantities(self, menu: QMenu) -> None:
        for quantity, heading in HEADINGS.items():
            menu.addAction(heading, partial(self.sight.set, quantity=quantity))
        menu.addSeparator()

    def look_again(self) -> None:
        self._place_choice()
        super().look_again()

    def resizeEvent(self, event: QResizeEvent) -> None:
        self._place_choice()

    # Predicted arrivals -----------------------------------------------------------------------------------------

    def has_lines(self) -> bool:
        """Whether the predicted arrivals are drawn: as chosen, and where nothing is, unless they are many."""
        return arrivals_shown(self.sight, self.result)

    def lines(self) -> tuple[Line, ...]:
        return lines_of(self.result) if self.has_lines() and self.result is not None else ()

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        super().mouseMoveEvent(event)
        self._mouse = event.position()
        if not event.buttons():
            over = self.plot().contains(self._mouse)
            near = lines_near(self.lines(), self._mouse, self.time_axis(), self.distance_axis())
            self.sight.set(pointed=near if over else ())

    def leaveEvent(self, event: QEvent) -> None:
        self.sight.set(pointed=())

    def _heading_end(self) -> float:
        """Where the heading ends, in pixels."""
        width = QFontMetricsF(font("strong")).horizontalAdvance(HEADINGS[self.sight.quantity])
        return self.plot().left() + width

    def _place_choice(self) -> None:
        line = QFontMetricsF(self.font()).height()
        left, top = round(self._heading_end()) + 3, round(0.5 * self.margins().header - 0.6 * line)
        self._choice.setGeometry(left, top, round(1.2 * line), round(1.2 * line))
        width = QFontMetricsF(self.font()).horizontalAdvance(self.switch.text()) + 12
        self.switch.setGeometry(left + round(1.2 * line) + 6, top, round(width), round(1.25 * line))
        self.switch.setChecked(self.has_lines())
        self.switch.setVisible(self._least_scale() + self.switch.geometry().right() < self.plot().right())

    def _least_scale(self) -> float:
        """Pixels that the scale needs with numbers alone."""
        return QFontMetricsF(self.font()).horizontalAdvance("− 0000   0000 MPa") + 60

    def resting_key(self) -> tuple[Any, ...]:
        return (self.sight.quantity, self.has_lines(), level_of(self.case))

    def moving_key(self) -> tuple[Any, ...]:
        return (*super().moving_key(), self.sight.pointed, self._mouse if self.sight.pointed else None)

    def draw_resting(self, painter: QPainter) -> None:
        plot, distance, time = self.plot(), self.distance_axis(), self.time_axis()
        self._draw_heading(painter, plot)
        if self.result is not None and len(self.result.fields.time) > 1:
            self._draw_field(painter, plot, distance, time)
        painter.setPen(pen(palette().grid))
        for place in (0.0, self.case.member.length):
            if distance.low < place < distance.high:
                painter.drawLine(QLineF(plot.left(), distance.at(place), plot.right(), distance.at(place)))
        self._draw_gauge_lines(painter, plot, distance)
        painter.save()
        painter.setClipRect(plot)
        draw_lines(painter, self.lines(), time, distance)
        painter.restore()
        least = -sum(s.length for s in self.case.ram_segments)
        metres = float(self.units.number(1.0, "length"))
        bare = self.lacks_numbers("distance") and level_of(self.case) is None
        distance_ticks(painter, in_units(distance, metres), plot.left(), bare, least * metres)
        draw_levels(painter, self.case, self.units, distance, plot)
        near, bare = time.high - time.low, self.lacks_numbers("time")
        seconds = float(self.units.number(1.0, "time", near))
        horizontal_ticks(painter, in_units(time, seconds), plot.bottom(), bare)
        self.name_axes(painter, self.units.unit("time", near))

    def moving_region(self) -> QRegion:
        """The two lines of the cursor, each a few pixels wide; everywhere while there is more to show."""
        plot = self.plot().toAlignedRect()
        if self.sight.pinned is not None or self.sight.pointed:
            return QRegion(plot.adjusted(-2, -2, 2, 2))
        time = self.time_axis()
        x = round(time.at(time.clipped(self.sight.time)))  # a pixel far away is more than Qt can count
        region = QRegion(x - 2, plot.top(), 5, plot.height() + 1)
        if self.sight.place is not None:
            distance = self.distance_axis()
            y = round(distance.at(distance.clipped(self.sight.place)))
            region = region.united(QRegion(plot.left(), y - 2, plot.width() + 1, 5))
        return region

    def draw_moving(self, painter: QPainter) -> None:
        plot, time, distance = self.plot(), self.time_axis(), self.distance_axis()
        draw_cursor(painter, plot, time, self.sight.time)
        draw_place(painter, plot, distance, self.sight.place)
        painter.save()
        painter.setClipRect(plot)
        self._draw_pinned(painter, plot, time, distance)
        self._draw_pointed(painter, plot, time, distance)
        painter.restore()

    def _draw_pinned(self, painter: QPainter, plot: QRectF, time: Axis, distance: Axis) -> None:
        pinned, place = self.sight.pinned, self.sight.place
        if pinned is None:
            return
        draw_pinned_moment(painter, plot, time, pinned[0])
        draw_pinned_place(painter, plot, distance, pinned[1])
        joined = place is not None and pinned[1] is not None
        heights = (place, pinned[1]) if place is not None and pinned[1] is not None else (0.0, 0.0)
        start, end = (
            QPointF(time.at(t), distance.at(p))
            for t, p in zip((self.sight.time, pinned[0]), heights, strict=True)
        )
        words = between(self.units, self.sight.time, place, pinned)
        draw_between(painter, plot, start, end, words, joined)

    def _draw_pointed(self, painter: QPainter, plot: QRectF, time: Axis, distance: Axis) -> None:
        """The arrivals that are pointed at here, or by their ticks on a strip, with their names."""
        lines = self.lines()
        pointed = [lines[n] for n in self.sight.pointed if n < len(lines)]
        for line in pointed:
            draw_pointed(painter, line, time, distance)
        if pointed:
            back = pointed[0].legs[-1]
            here = QPointF(time.at(float(back.times.mean())), distance.at(float(back.places.mean())))
            here = self._mouse if self.underMouse() else here
            words = all_named(lines, self.sight.pointed, self.units)
            write_name(painter, here.x(), here.y() - 12, f"↑ {words}", plot)

    def table(self) -> Table | None:
        """Time down, a column for each stretch of member, in the units and sign of the screen."""
        if self.result is None:
            return None
        fields, quantity, units = self.result.fields, self.sight.quantity, self.units
        dimension = DIMENSIONS[quantity]
        sign = units.sign if quantity in ("stress", "force") else 1
        values = sign * np.asarray(units.number(field_of(self.result, quantity).astype(float), dimension))
        unit, metres = units.unit(dimension), units.unit("length")
        places = np.asarray(units.number(fields.position, "length"))
        headings = [f"time {units.unit('time')}", *(f"{quantity} {unit} at {p:.6g} {metres}" for p in places)]
        return Table(headings, [np.asarray(units.number(fields.time, "time")), *values.T])

    def _draw_field(self, painter: QPainter, plot: QRectF, distance: Axis, time: Axis) -> None:
        assert self.result is not None
        fields = self.result.fields
        last = min(time.high, float(fields.time[-1]))
        box = QRectF(plot.left(), plot.top(), time.at(last) - plot.left(), plot.height())
        if box.width() < 1:
            return
        in_file = painter.paintEngine().type() in WRITTEN  # a file is looked at more closely than a screen
        ratio = FINER if in_file else painter.device().devicePixelRatioF()
        image = self._field_image(
            Axis(time.low, last, 0, round(box.width() * ratio)),
            Axis(distance.low, distance.high, 0, round(box.height() * ratio)),
        )
        painter.drawImage(box, image)

    def _field_image(self, time: Axis, distance: Axis) -> QImage:
        """A colour for each pixel of the screen: of the column it lies in, and of the time in its middle."""
        assert self.result is not None
        fields, quantity = self.result.fields, self.sight.quantity
        width, height = max(int(time.length), 1), max(int(distance.length), 1)
        times = time.low + (np.arange(width) + 0.5) / width * (time.high - time.low)
        places = distance.low + (np.arange(height) + 0.5) / height * (distance.high - distance.low)
        top = scale_top(self.result, quantity, self.units)
        columns = columns_under(fields.edges, places)
        shown = np.flatnonzero(columns >= 0)
        values = field_of(self.result, quantity)[:, columns[shown]]
        frames = np.interp(times, fields.time, np.arange(len(fields.time)))
        first = np.minimum(frames.astype(np.int64), len(fields.time) - 2)
        share = (frames - first).astype(np.float32)[:, None]
        before, after = values[first], values[first + 1]
        entries = np.full((height, width), 255, dtype=np.uint16)
        entries[shown] = entries_of(before + (after - before) * share, top).T
        return image_of(table_of(quantity, palette())[entries])

    def _draw_gauge_lines(self, painter: QPainter, plot: QRectF, distance: Axis) -> None:
        for index, gauge in enumerate(self.case.gauges):
            y = crisp(distance.at(place_of(self.case, gauge)))
            if plot.top() <= y <= plot.bottom():
                painter.setPen(pen(palette().gauge(index), 1.0, Qt.PenStyle.DashLine))
                painter.drawLine(QLineF(plot.left(), y, plot.right(), y))

    def _draw_heading(self, painter: QPainter, plot: QRectF) -> None:
        quantity, y = self.sight.quantity, 0.5 * self.margins().header
        painter.setFont(font("strong"))
        put(painter, plot.left(), y, HEADINGS[quantity], palette().ink)
        last = self._choice if self.switch.isHidden() else self.switch
        end = float(last.geometry().right())
        painter.setFont(self.font())
        word = self.greyed() or {"solving": "", "stopped": "stopped early"}.get(self.solution.state, "")
        if word:
            painter.save()
            painter.setOpacity(1.0)
            end = put(painter, end + 6, y, word, palette().ink).right()
            painter.restore()
        if self.result is not None:
            draw_scale(painter, end + 12, plot.right(), y, self.result, quantity, self.units)

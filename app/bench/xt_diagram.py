"""The run as one picture: the quantity over time (to the right) and distance (downwards), as colour."""

from __future__ import annotations

from functools import partial
from typing import Any

import numpy as np
from PySide6.QtCore import QLineF, QRectF, Qt
from PySide6.QtGui import QFontMetricsF, QImage, QPainter, QRegion, QResizeEvent
from PySide6.QtWidgets import QMenu, QToolButton

from app.bench.axes import Axis
from app.bench.axis_drawing import crisp, distance_ticks, horizontal_ticks, in_units
from app.bench.colouring import columns_under, entries_of, image_of, scale_top, table_of
from app.bench.cursor import draw_cursor, draw_place
from app.bench.field_values import DIMENSIONS, field_of
from app.bench.glyphs import pen
from app.bench.lettering import RIGHT, put
from app.bench.picture import Picture, Table
from app.look.fonts import font
from app.look.palette import palette
from app.units import rounded

HEADINGS = {
    "stress": "Stress through time",
    "force": "Force through time",
    "velocity": "Velocity through time",
    "displacement": "Displacement through time",
}
#: What the two ends of the scale mean, most negative in the solver's sign first.
ENDS = {
    "stress": ("compression", "tension"),
    "force": ("compression", "tension"),
    "velocity": ("↑ to the struck end", "↓ to the far end"),
    "displacement": ("↑ to the struck end", "↓ to the far end"),
}


class XtDiagram(Picture):
    has_time = True
    has_distance = True

    def __init__(self, *args: Any, **named: Any) -> None:
        super().__init__(*args, **named)
        self.setAccessibleName("Through time and along the member")
        self.setCursor(Qt.CursorShape.CrossCursor)
        self._choice = QToolButton(self)
        self._choice.setText("▾")
        self._choice.setProperty("role", "quiet")
        self._choice.setStyleSheet("QToolButton { padding: 0px; min-height: 0px; }")
        self._choice.setCursor(Qt.CursorShape.ArrowCursor)
        self._choice.setAccessibleName("Quantity shown")
        self._choice.setToolTip("What the x-t diagram, the member and the profile show.")
        self._choice.setPopupMode(QToolButton.ToolButtonPopupMode.InstantPopup)
        menu = QMenu(self._choice)
        self.fill_menu(menu)
        self._choice.setMenu(menu)

    def fill_menu(self, menu: QMenu) -> None:
        for quantity, heading in HEADINGS.items():
            menu.addAction(heading, partial(self.sight.set, quantity=quantity))
        menu.addSeparator()

    def look_again(self) -> None:
        self._place_choice()
        super().look_again()

    def resizeEvent(self, event: QResizeEvent) -> None:
        self._place_choice()

    def _heading_end(self) -> float:
        """Where the heading ends, in pixels."""
        width = QFontMetricsF(font("strong")).horizontalAdvance(HEADINGS[self.sight.quantity])
        return self.plot().left() + width

    def _place_choice(self) -> None:
        line = QFontMetricsF(self.font()).height()
        left, top = round(self._heading_end()) + 3, round(0.5 * self.margins().header - 0.6 * line)
        self._choice.setGeometry(left, top, round(1.2 * line), round(1.2 * line))

    def resting_key(self) -> tuple[Any, ...]:
        return (self.sight.quantity,)

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
        least = -sum(s.length for s in self.case.ram_segments)
        metres = float(self.units.number(1.0, "length"))
        distance_ticks(painter, in_units(distance, metres), plot.left(), False, least * metres)
        near = time.high - time.low
        seconds = float(self.units.number(1.0, "time", near))
        horizontal_ticks(painter, in_units(time, seconds), plot.bottom(), False)

    def moving_region(self) -> QRegion:
        """The two lines of the cursor, each a few pixels wide."""
        plot = self.plot().toAlignedRect()
        x = round(self.time_axis().at(self.sight.time))
        region = QRegion(x - 2, plot.top(), 5, plot.height() + 1)
        if self.sight.place is not None:
            y = round(self.distance_axis().at(self.sight.place))
            region = region.united(QRegion(plot.left(), y - 2, plot.width() + 1, 5))
        return region

    def draw_moving(self, painter: QPainter) -> None:
        draw_cursor(painter, self.plot(), self.time_axis(), self.sight.time)
        draw_place(painter, self.plot(), self.distance_axis(), self.sight.place)

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
        ratio = painter.device().devicePixelRatioF()
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
            y = crisp(distance.at(gauge.position if gauge.on == "member" else -gauge.position))
            if plot.top() <= y <= plot.bottom():
                painter.setPen(pen(palette().gauge(index), 1.0, Qt.PenStyle.DashLine))
                painter.drawLine(QLineF(plot.left(), y, plot.right(), y))

    def _draw_heading(self, painter: QPainter, plot: QRectF) -> None:
        colours, quantity, units = palette(), self.sight.quantity, self.units
        y = 0.5 * self.margins().header
        painter.setFont(font("strong"))
        put(painter, plot.left(), y, HEADINGS[quantity], colours.ink)
        end = self._heading_end() + 6 + 1.2 * y
        painter.setFont(self.font())
        metrics = QFontMetricsF(painter.font())
        word = self.greyed() or {"solving": "", "stopped": "stopped early"}.get(self.solution.state, "")
        if word:
            painter.save()
            painter.setOpacity(1.0)
            end = put(painter, end + 6, y, word, colours.ink).right()
            painter.restore()
        if self.result is None:
            return
        top, dimension = scale_top(self.result, quantity, units), DIMENSIONS[quantity]
        signed = quantity in ("stress", "force")
        # The end that the project calls positive stands on the right, as it does in the profile.
        flip = signed and units.sign < 0
        names = ENDS[quantity][::-1] if flip else ENDS[quantity]
        number = rounded(float(units.number(top, dimension, top)))
        right_text = f"{number} {units.unit(dimension, top)} {names[1]}"
        x = plot.right()
        room = x - end - 16
        bar = min(max(room * 0.22, 40.0), 8 * metrics.height())
        wanted = metrics.horizontalAdvance(right_text + names[0] + number) + bar + 24
        if wanted > room:  # a narrow picture keeps the numbers and lets the words go
            names = ("−", "") if signed else ("↑", "↓")
            right_text = f"{number} {units.unit(dimension, top)} {names[1]}".strip()
        x = put(painter, x, y, right_text, colours.soft_ink, RIGHT).left() - 6
        height = 0.55 * metrics.height()
        table = table_of(quantity, colours)[None, :: -1 if flip else 1]
        painter.drawImage(QRectF(x - bar, y - height / 2, bar, height), image_of(table))
        put(painter, x - bar - 6, y, f"{names[0]} {number}".strip(), colours.soft_ink, RIGHT)

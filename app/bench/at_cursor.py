"""What every gauge reads at the cursor's time, the quantity at its place, and what lies between the two cursors."""

from __future__ import annotations

from math import floor, log10
from typing import Any

from PySide6.QtCore import QRectF, QSize, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QMouseEvent, QPainter, QResizeEvent
from PySide6.QtWidgets import QScrollArea, QWidget

from app.bench.field_values import DIMENSIONS, gauge_value, largest_of, largest_read, screen_sign, value_at
from app.bench.pictures.cursor import between
from app.bench.pictures.lettering import LEFT, RIGHT, fitted, put, width_of
from app.bench.pictures.picture import Picture, Table
from app.document import Document
from app.look.fonts import font
from app.look.palette import palette
from app.look.spacing import GAP, SPACE
from app.sight import Sight
from app.solving import Solution
from app.units import MINUS, NARROW_SPACE, NO_BREAK, Units
from solver.model.derived import place_of
from solver.model.project import Gauge

#: What is read at a gauge, two in a line, and the dimension of each: the units tell them apart.
READ = (("stress", "stress"), ("force", "force"), ("velocity", "velocity"), ("displacement", "small_length"))
LEFT_EDGE = 8.0
#: Digits of the largest value of a run that are shown, and decimals at most.
DIGITS, DECIMALS = 4, 4


def reading(units: Units, value: float, dimension: str, largest: float) -> str:
    """A value (SI) in the unit and with the decimals that suit the largest of the run (SI): while time runs on the
    digits keep their places, and what is nothing beside the largest reads as 0."""
    unit = units.unit(dimension, largest)
    top = abs(float(units.number(largest, dimension, largest)))
    decimals = min(max(DIGITS - 1 - floor(log10(top)), 0), DECIMALS) if top > 0 else 0
    text = f"{float(units.number(value, dimension, largest)):,.{decimals}f}"
    if not text.strip("-0.,"):
        text = "0"
    elif abs(top) < 1e4:
        text = text.replace(",", "")
    return f"{text.replace('-', MINUS).replace(',', NARROW_SPACE)}{NO_BREAK}{unit}"


class AtCursor(QScrollArea):
    """Scrolls where there are more gauges than fit."""

    def __init__(
        self, document: Document, sight: Sight, solution: Solution, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self.setWidgetResizable(True)
        self.setAccessibleName("At the cursor")
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.readings = _Readings(document, sight, solution)
        self.setWidget(self.readings)
        self.setMinimumWidth(150)


class _Readings(Picture):
    def __init__(self, document: Document, sight: Sight, solution: Solution) -> None:
        super().__init__(document, sight, solution)
        self.setAccessibleName("At the cursor")
        document.changed.connect(self._fit)
        sight.changed.connect(self._fit)
        self._fit()

    def line(self) -> float:
        return QFontMetricsF(self.font()).height()

    def block(self) -> float:
        """Height of one gauge with its readings."""
        return (3 if self.two_columns() else 5) * self.line() + SPACE

    def two_columns(self) -> bool:
        """Whether two readings have room side by side: in large type on a small screen they have not."""
        return width_of("−0000 MPa −0000 kN ", self.font()) <= self.right() - LEFT_EDGE

    def right(self) -> float:
        """Where the second column of readings ends: not far from the first, however wide the panel."""
        return min(self.width() - 12.0, 13 * self.line())

    def top(self) -> float:
        """Where the first gauge begins: under the heading, the reading at the cursor's place, and the second cursor."""
        pinned = self.sight.pinned
        rows = 0 if pinned is None else 4 + (pinned[1] is not None) + (self.speed() != "")
        return (3.9 + rows) * self.line() + (SPACE if pinned is not None else 0)

    def sizeHint(self) -> QSize:
        return QSize(120, round(self.top() + len(self.case.gauges) * self.block()))

    def minimumSizeHint(self) -> QSize:
        return self.sizeHint()

    def resizeEvent(self, event: QResizeEvent) -> None:
        super().resizeEvent(event)
        self._fit()

    def _fit(self) -> None:
        height = self.sizeHint().height()
        if self.minimumHeight() != height:
            self.setMinimumHeight(height)

    def moving_key(self) -> tuple[Any, ...]:
        return (*super().moving_key(), self.sight.quantity, self.sight.selection)

    def draw_resting(self, painter: QPainter) -> None:
        painter.setFont(font("strong"))
        put(painter, LEFT_EDGE, 0.8 * self.line(), "At the cursor", palette().ink)
        painter.setFont(self.font())

    def draw_moving(self, painter: QPainter) -> None:
        sight, y = self.sight, 2.1 * self.line()
        painter.setFont(self.font())
        self._draw_reading(painter, y, sight.time, sight.place)
        if sight.pinned is not None:
            self._draw_second(painter, y + 1.9 * self.line() + GAP / 2, *sight.pinned)
        for index, gauge in enumerate(self.case.gauges):
            self._draw_gauge(painter, index, gauge)

    def _draw_reading(self, painter: QPainter, y: float, time: float, place: float | None) -> float:
        """The moment; and the place with the quantity there, where there is one. Gives the middle of the next row."""
        colours, units, quantity = palette(), self.units, self.sight.quantity
        self._row(painter, y, units.show(time, "time"), "" if place is None else units.show(place, "length"))
        value = value_at(self.result, quantity, time, place) if self.result and place is not None else None
        if self.result is not None and value is not None:
            value *= screen_sign(quantity, units)
            shown = reading(units, value, DIMENSIONS[quantity], largest_of(self.result, quantity))
            self._row(painter, y + self.line(), quantity, shown, colours.ink)
        return y + (1 if place is None else 2) * self.line()

    def _draw_second(self, painter: QPainter, y: float, time: float, place: float | None) -> None:
        """The pinned cursor, and what lies between the two."""
        units, sight, line = self.units, self.sight, self.line()
        self._heading(painter, y, "Second cursor")
        y = self._draw_reading(painter, y + line, time, place)
        self._heading(painter, y, "Between them")
        apart, *way = between(units, sight.time, sight.place, (time, place))
        self._row(painter, y + line, apart, way[0] if way else "", palette().ink, palette().ink)
        if self.speed():
            self._row(painter, y + 2 * line, "speed", self.speed(), palette().ink)

    def speed(self) -> str:
        """What goes with the time and the way between the two cursors, "" where they have not both."""
        pinned = self.sight.pinned
        words = () if pinned is None else between(self.units, self.sight.time, self.sight.place, pinned)
        return words[2] if len(words) > 2 else ""

    def _heading(self, painter: QPainter, y: float, words: str) -> None:
        painter.setFont(font("strong"))
        put(painter, LEFT_EDGE, y, words, palette().soft_ink)
        painter.setFont(self.font())

    def _row(
        self, painter: QPainter, y: float, first: str, second: str, hue: str = "", first_hue: str = ""
    ) -> None:
        soft = palette().soft_ink
        put(painter, LEFT_EDGE, y, first, first_hue or soft)
        put(painter, self.right(), y, second, hue or soft, RIGHT)

    def _draw_gauge(self, painter: QPainter, index: int, gauge: Gauge) -> None:
        colours, units, line, right = palette(), self.units, self.line(), self.right()
        top = self.top() + index * self.block()
        if f"gauges/{index}" in (self.sight.selection, *self.sight.also):
            box = QRectF(4, top - GAP / 2, self.width() - 8, self.block() - GAP)
            painter.fillRect(box, QColor(colours.accent_soft))
        y, place = top + line / 2, units.show(gauge.position, "length")
        painter.setFont(font("strong"))
        room = right - width_of(place, self.font()) - 16
        put(painter, LEFT_EDGE, y, fitted(gauge.name, painter.font(), room), colours.gauge(index))
        painter.setFont(self.font())
        put(painter, right, y, place, colours.soft_ink, RIGHT)
        record = self.result.gauges.get(gauge.name) if self.result is not None else None
        if self.result is None or record is None:
            return
        for number, (quantity, dimension) in enumerate(READ):
            value = screen_sign(quantity, units) * gauge_value(record, quantity, self.sight.time)
            beside = number % 2 == 1 and self.two_columns()
            at, align = (right, RIGHT) if beside else (LEFT_EDGE, LEFT)
            y += 0 if beside else line
            text = reading(units, value, dimension, largest_read(self.result, quantity))
            put(painter, at, y, text, colours.ink, align)

    def mousePressEvent(self, event: QMouseEvent) -> None:
        index = int((event.position().y() - self.top()) // self.block())
        gauges = self.case.gauges
        if event.position().y() >= self.top() and 0 <= index < len(gauges):
            gauge = gauges[index]
            self.sight.set(selection=f"gauges/{index}", place=place_of(self.case, gauge))

    def table(self) -> Table | None:
        """The readings at the cursor have no curve to save; the strips' numbers do."""
        return None

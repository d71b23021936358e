"""What every gauge reads at the cursor's time, and the quantity at the cursor's place."""

from __future__ import annotations

from typing import Any

from PySide6.QtCore import QRectF, QSize, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QMouseEvent, QPainter, QResizeEvent
from PySide6.QtWidgets import QScrollArea, QWidget

from app.bench.field_values import DIMENSIONS, gauge_value, screen_sign, value_at
from app.bench.pictures.lettering import LEFT, RIGHT, fitted, put
from app.bench.pictures.picture import Picture, Table
from app.document import Document
from app.look.fonts import font
from app.look.palette import palette
from app.look.spacing import GAP, SPACE
from app.sight import Sight
from app.solving import Solution

#: What is read at a gauge, two in a line, and the dimension of each: the units tell them apart.
READ = (("stress", "stress"), ("force", "force"), ("velocity", "velocity"), ("displacement", "small_length"))


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
        self._fit()

    def line(self) -> float:
        return QFontMetricsF(self.font()).height()

    def block(self) -> float:
        """Height of one gauge with its readings."""
        return (3 if self.two_columns() else 5) * self.line() + SPACE

    def two_columns(self) -> bool:
        """Whether two readings have room side by side: in large type on a small screen they have not."""
        metrics = QFontMetricsF(self.font())
        return metrics.horizontalAdvance("−0000 MPa −0000 kN ") <= self.right() - 8

    def right(self) -> float:
        """Where the second column of readings ends: not far from the first, however wide the panel."""
        return min(self.width() - 12.0, 13 * self.line())

    def top(self) -> float:
        """Where the first gauge begins: under the heading and the reading at the cursor's place."""
        return 3.9 * self.line()

    def sizeHint(self) -> QSize:
        return QSize(120, round(self.top() + len(self.case.gauges) * self.block()))

    def minimumSizeHint(self) -> QSize:
        return self.sizeHint()

    def resizeEvent(self, event: QResizeEvent) -> None:
        super().resizeEvent(event)
        self._fit()

    def _fit(self) -> None:
        self.setMinimumHeight(self.sizeHint().height())

    def moving_key(self) -> tuple[Any, ...]:
        return (self.sight.time, self.sight.place, self.sight.quantity, self.sight.selection)

    def draw_resting(self, painter: QPainter) -> None:
        painter.setFont(font("strong"))
        put(painter, 8, 0.8 * self.line(), "At the cursor", palette().ink)
        painter.setFont(self.font())

    def draw_moving(self, painter: QPainter) -> None:
        colours, units, sight = palette(), self.units, self.sight
        line, right = self.line(), self.right()
        painter.setFont(self.font())
        self._draw_place(painter, 2.1 * line, right)
        result = self.result
        for index, gauge in enumerate(self.case.gauges):
            top = self.top() + index * self.block()
            if sight.selection == f"gauges/{index}":
                box = QRectF(4, top - GAP / 2, self.width() - 8, self.block() - GAP)
                painter.fillRect(box, QColor(colours.accent_soft))
            y = top + line / 2
            place = units.show(gauge.position, "length")
            place_width = QFontMetricsF(painter.font()).horizontalAdvance(place)
            painter.setFont(font("strong"))
            put(
                painter,
                8,
                y,
                fitted(gauge.name, painter.font(), right - place_width - 16),
                colours.gauge(index),
            )
            painter.setFont(self.font())
            put(painter, right, y, place, colours.soft_ink, RIGHT)
            record = result.gauges.get(gauge.name) if result is not None else None
            if record is None:
                continue
            for number, (quantity, dimension) in enumerate(READ):
                value = screen_sign(quantity, units) * gauge_value(record, quantity, sight.time)
                beside = number % 2 == 1 and self.two_columns()
                at, align = (right, RIGHT) if beside else (8.0, LEFT)
                y += 0 if beside else line
                put(painter, at, y, units.show(value, dimension), colours.ink, align)

    def _draw_place(self, painter: QPainter, y: float, right: float) -> None:
        """The moment; and the place with the quantity there, where the cursor has one."""
        colours, units, sight = palette(), self.units, self.sight
        put(painter, 8, y, units.show(sight.time, "time"), colours.soft_ink)
        if sight.place is None:
            return
        put(painter, right, y, units.show(sight.place, "length"), colours.soft_ink, RIGHT)
        value = value_at(self.result, sight.quantity, sight.time, sight.place) if self.result else None
        if value is not None:
            shown = units.show(screen_sign(sight.quantity, units) * value, DIMENSIONS[sight.quantity])
            put(painter, 8, y + self.line(), sight.quantity, colours.soft_ink)
            put(painter, right, y + self.line(), shown, colours.ink, RIGHT)

    def mousePressEvent(self, event: QMouseEvent) -> None:
        index = int((event.position().y() - self.top()) // self.block())
        gauges = self.case.gauges
        if event.position().y() >= self.top() and 0 <= index < len(gauges):
            gauge = gauges[index]
            place = gauge.position if gauge.on == "member" else -gauge.position
            self.sight.set(selection=f"gauges/{index}", place=place)

    def table(self) -> Table | None:
        """The readings at the cursor have no curve to save; the strips' numbers do."""
        return None

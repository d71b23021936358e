"""The slider of the time bar: all of the run, with a bracket around the part of it that the pictures show."""

from __future__ import annotations

from PySide6.QtCore import QLineF, Qt
from PySide6.QtGui import QPainter, QPaintEvent
from PySide6.QtWidgets import QSlider

from app.bench.member.glyphs import pen
from app.look.palette import palette

#: Width of the knob (as in the stylesheet), and height of the bracket's ends, pixels.
KNOB, RISE = 14, 4


class TimeSlider(QSlider):
    def __init__(self) -> None:
        super().__init__(Qt.Orientation.Horizontal)
        self.setMinimumHeight(KNOB + 2 * RISE)
        self._shown = (0.0, 1.0)

    def show_part(self, low: float, high: float) -> None:
        """Mark the part of the run between two shares of it (0 to 1); all of it gets no mark."""
        if (low, high) != self._shown:
            self._shown = (low, high)
            self.update()

    def part(self) -> tuple[float, float]:
        return self._shown

    def paintEvent(self, event: QPaintEvent) -> None:
        super().paintEvent(event)
        if self._shown == (0.0, 1.0):
            return
        room = self.width() - KNOB
        left, right = (KNOB / 2 + share * room for share in self._shown)
        y = self.height() - 1.5
        painter = QPainter(self)
        painter.setPen(pen(palette().accent, 2.0))
        painter.drawLine(QLineF(left, y, right, y))
        painter.drawLines([QLineF(x, y - RISE, x, y + 1) for x in (left, right)])

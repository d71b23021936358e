"""Down to depth on the screen: paints the picture, and reads out the depth nearest to the pointer."""

from __future__ import annotations

from PySide6.QtCore import QPointF, QSize, Signal
from PySide6.QtGui import QColor, QMouseEvent, QPainter, QPaintEvent, QPen
from PySide6.QtWidgets import QWidget

from app.look.palette import palette
from app.set_sheet.chart_view import letters_here, paint
from app.set_sheet.depth_chart import DepthFrame, depth_chart, depth_frame
from app.set_sheet.depth_solution import DepthSolution
from app.set_sheet.scene import Scene
from app.units import Units
from solver.studies.depth import DepthPoint


class DepthView(QWidget):
    """`pointed` tells the point of the study that is pointed at, or `None`."""

    pointed = Signal(object)

    def __init__(self, solution: DepthSolution, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._solution, self._units = solution, Units()
        self._point: DepthPoint | None = None
        self.setMouseTracking(True)
        self.setMinimumSize(QSize(560, 320))
        self.setAccessibleName("Resistance, set, stresses and driving time over the penetration")

    def follow(self, units: Units) -> None:
        self._units = units
        self.update()

    def scene(self) -> Scene:
        """What is painted at the present size."""
        depths = self._solution.depths
        if depths is None:
            return []
        return depth_chart(depths, self._solution.case, self._units, *self._size(), letters_here())

    def frame(self) -> DepthFrame | None:
        depths = self._solution.depths
        if depths is None:
            return None
        return depth_frame(depths, self._solution.case, self._units, *self._size(), letters_here())

    def _size(self) -> tuple[float, float]:
        return float(self.width()), float(self.height())

    def paintEvent(self, event: QPaintEvent) -> None:
        colours = palette()
        painter = QPainter(self)
        painter.fillRect(event.rect(), QColor(colours.paper))
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        paint(painter, self.scene(), colours)
        frame = self.frame()
        if self._point is not None and frame is not None:
            y = frame.down.at(self._point.penetration)
            painter.setPen(QPen(QColor(colours.accent), 1.0))
            painter.drawLine(QPointF(frame.spans[0][0], y), QPointF(frame.spans[-1][1], y))

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        depths, frame = self._solution.depths, self.frame()
        if depths is not None and frame is not None:
            y = event.position().y()
            self._tell(min(depths.points, key=lambda p: abs(frame.down.at(p.penetration) - y)))

    def leaveEvent(self, event: object) -> None:
        self._tell(None)

    def _tell(self, point: DepthPoint | None) -> None:
        if point is not self._point:
            self._point = point
            self.pointed.emit(point)
            self.update()

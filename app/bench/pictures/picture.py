"""What all pictures of the Bench do with mouse and keys: point, pin, zoom, move, and offer a menu."""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtCore import QPointF, Qt
from PySide6.QtGui import QContextMenuEvent, QKeyEvent, QMouseEvent, QWheelEvent
from PySide6.QtWidgets import QMenu, QWidget

from app.bench.pictures.axes import Axis, inside, whole_distance
from app.bench.pictures.layers import Layered, Table
from app.bench.pictures.plot_export import add_export_actions
from app.bench.pictures.time_shown import all_of_it, all_or_opening, whole_time
from app.document import Document
from app.explaining import explain
from app.sight import Sight
from app.solving import Solution

__all__ = ["Picture", "Table"]

#: What one notch of the wheel does to a span.
ZOOM_PER_NOTCH = 0.8
#: Smallest share of the whole that can be zoomed to.
DEEPEST = 1e-3
#: Pixels within which a press and its release are a click.
CLICK = 4
#: Pixels at the top of a picture that are its title.
TITLE = 24.0


class Picture(Layered):
    """Base of the pictures."""

    def __init__(
        self, document: Document, sight: Sight, solution: Solution, parent: QWidget | None = None
    ) -> None:
        super().__init__(document, sight, solution, parent)
        self._dragged_from: QPointF | None = None
        self._pressed_at = QPointF()
        self.menu_at = QPointF()

    def point_at(self, position: QPointF) -> None:
        """The mouse was pressed or dragged there: the cursor goes along."""
        self.sight.set(**self._moment_and_place(position))

    def pin_at(self, position: QPointF) -> None:
        """Put the second cursor there: at the time and the place, or what the picture has of the two."""
        there = self._moment_and_place(position)
        self.sight.set(pinned=(there.get("time", self.sight.time), there.get("place")))

    def _moment_and_place(self, position: QPointF) -> dict[str, float]:
        what: dict[str, float] = {}
        plot = self.plot()
        if self.has_time:
            what["time"] = max(self.time_axis().value(min(max(position.x(), plot.left()), plot.right())), 0.0)
        if self.has_distance:
            case_end = self.document.case.member.length
            place = self.distance_axis().value(position.y())
            what["place"] = min(max(place, whole_distance(self.document.case)[0]), case_end)
        return what

    # Pointing, zooming, moving ----------------------------------------------------------------------------------

    def mousePressEvent(self, event: QMouseEvent) -> None:
        if self._moves(event):
            self._dragged_from = self._pressed_at = event.position()
        elif event.button() == Qt.MouseButton.LeftButton and not self.on_title(event.position()):
            self.point_at(event.position())

    def on_title(self, position: QPointF) -> bool:
        """Whether a point lies on the heading above the plot."""
        return position.y() < min(self.margins().header, TITLE) and self.margins().header > CLICK * 2

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        if self._dragged_from is not None:
            self._pan(self._dragged_from, event.position())
            self._dragged_from = event.position()
        elif event.buttons() & Qt.MouseButton.LeftButton:
            self.point_at(event.position())

    def mouseReleaseEvent(self, event: QMouseEvent) -> None:
        moved = (event.position() - self._pressed_at).manhattanLength()
        pins = event.button() == Qt.MouseButton.LeftButton and (self.has_time or self.has_distance)
        if self._dragged_from is not None and pins and moved < CLICK:
            self.pin_at(event.position())
        self._dragged_from = None

    def mouseDoubleClickEvent(self, event: QMouseEvent) -> None:
        if self.on_title(event.position()):
            event.ignore()  # what the panels lie in gives this one all the room, or takes it back
        elif self.has_time or self.has_distance:
            self.show_all()

    def wheelEvent(self, event: QWheelEvent) -> None:
        """Zoom about the pointer: both axes, with Control time only, with Shift distance only."""
        if not (self.has_time or self.has_distance):
            event.ignore()  # what lies around it may scroll
            return
        delta = event.angleDelta()
        notches = (delta.y() or delta.x()) / 120
        factor = ZOOM_PER_NOTCH**notches
        keys = event.modifiers()
        where = event.position()
        what: dict[str, tuple[float, float] | None] = {}
        if self.has_time and not keys & Qt.KeyboardModifier.ShiftModifier:
            zoomed = _zoomed(self.time_axis(), where.x(), factor, self._whole_time())
            what["time_range"] = zoomed or all_of_it(self.case, self.result)
        if self.has_distance and not (keys & Qt.KeyboardModifier.ControlModifier and self.has_time):
            what["distance_range"] = _zoomed(self.distance_axis(), where.y(), factor, self._whole_distance())
        self.sight.set(**what)
        event.accept()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.key() == Qt.Key.Key_Home:
            self.show_all()
        else:
            super().keyPressEvent(event)

    def show_all(self) -> None:
        """All of both axes, and the first passages of a long run where all of it is shown."""
        self.sight.set(**all_or_opening(self.sight, self.case, self.result))

    def contextMenuEvent(self, event: QContextMenuEvent) -> None:
        menu = QMenu(self)
        self.menu_at = QPointF(event.pos())
        self.fill_menu(menu)
        if self.has_time or self.has_distance:
            menu.addAction("Pin a second cursor here (Shift+click)", lambda: self.pin_at(self.menu_at))
            remove = menu.addAction("Remove the second cursor (Esc)", lambda: self.sight.set(pinned=None))
            remove.setEnabled(self.sight.pinned is not None)
            menu.addAction("Show all of both axes (Home)", self.show_all)
            menu.addSeparator()
        add_export_actions(menu, self)
        menu.addSeparator()
        menu.addAction("What is this?", lambda: explain(self))
        menu.exec(event.globalPos())

    def fill_menu(self, menu: QMenu) -> None:
        """Actions of one picture alone, above those that all have."""

    def _moves(self, event: QMouseEvent) -> bool:
        shifted = event.modifiers() & Qt.KeyboardModifier.ShiftModifier
        left = event.button() == Qt.MouseButton.LeftButton
        return event.button() == Qt.MouseButton.MiddleButton or bool(left and shifted)

    def _pan(self, before: QPointF, now: QPointF) -> None:
        what: dict[str, tuple[float, float]] = {}
        moves: list[tuple[bool, str, Callable[[], Axis], float, tuple[float, float]]] = [
            (self.has_time, "time_range", self.time_axis, before.x() - now.x(), self._whole_time()),
            (
                self.has_distance,
                "distance_range",
                self.distance_axis,
                before.y() - now.y(),
                self._whole_distance(),
            ),
        ]
        for has, name, axis_of, pixels, whole in moves:
            axis = axis_of()
            if has and axis.high - axis.low < whole[1] - whole[0]:
                by = pixels * (axis.high - axis.low) / axis.length
                what[name] = inside((axis.low + by, axis.high + by), whole)
        self.sight.set(**what)

    def _whole_time(self) -> tuple[float, float]:
        return whole_time(self.case, self.result)

    def _whole_distance(self) -> tuple[float, float]:
        return whole_distance(self.case)


def _zoomed(
    axis: Axis, pixel: float, factor: float, whole: tuple[float, float]
) -> tuple[float, float] | None:
    about = axis.clipped(axis.value(pixel))
    low, high = axis.zoomed(about, factor)
    if high - low >= whole[1] - whole[0]:
        return None
    if high - low < DEEPEST * (whole[1] - whole[0]):
        return axis.low, axis.high
    return inside((low, high), whole)

"""What all pictures of the Bench have in common: the shared axes, the resting part painted once, and pointing.

A picture is painted in two layers. The resting layer (fields, curves, axes) is kept as a pixmap and painted anew only
where something it shows has changed; the moving layer (cursor, what holds at its time) is painted over it each time.
That is what lets play-back run at the screen's pace.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np
from PySide6.QtCore import QEvent, QPointF, QRectF, Qt
from PySide6.QtGui import (
    QColor,
    QContextMenuEvent,
    QFocusEvent,
    QKeyEvent,
    QMouseEvent,
    QPainter,
    QPaintEvent,
    QPen,
    QPixmap,
    QRegion,
    QWheelEvent,
)
from PySide6.QtWidgets import QMenu, QWidget

from app.bench.pictures.axes import Axis, Margins, inside, margins_of, whole_distance, whole_time
from app.bench.pictures.plot_export import add_export_actions
from app.document import Document
from app.explaining import explain
from app.look.palette import palette
from app.look.spacing import RADIUS
from app.sight import Sight
from app.solving import Solution
from app.units import Units, units_of
from solver import Case, Result

#: What one notch of the wheel does to a span.
ZOOM_PER_NOTCH = 0.8
#: Smallest share of the whole that can be zoomed to.
DEEPEST = 1e-3
GREYED = 0.3
#: Ways in which a picture gets the focus without the mouse.
BY_KEYS = (
    Qt.FocusReason.TabFocusReason,
    Qt.FocusReason.BacktabFocusReason,
    Qt.FocusReason.ShortcutFocusReason,
)
#: Pixels within which a press and its release are a click.
CLICK = 4
#: Pixels at the top of a picture that are its title.
TITLE = 24.0


@dataclass(frozen=True)
class Table:
    """What a plot shows, as columns for a file: headings with units, and arrays of shape (n,) of one length."""

    headings: Sequence[str]
    columns: Sequence[np.ndarray]


class Picture(QWidget):
    """Base of the pictures. Each one says which axes it has, what its resting layer depends on, and how to draw."""

    has_time = False
    has_distance = False

    def __init__(
        self, document: Document, sight: Sight, solution: Solution, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self.document, self.sight, self.solution = document, sight, solution
        self._kept = QPixmap()
        self._kept_key: tuple[Any, ...] | None = None
        self._shown_moving: tuple[Any, ...] | None = None
        self._shown_region = QRegion()
        self._dragged_from: QPointF | None = None
        self._pressed_at = QPointF()
        self.menu_at = QPointF()
        self.setAttribute(Qt.WidgetAttribute.WA_OpaquePaintEvent)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self._framed = False
        for source in (document, sight, solution):
            source.changed.connect(self.look_again)

    # What each picture gives ------------------------------------------------------------------------------------

    def resting_key(self) -> tuple[Any, ...]:
        """Everything besides size, colours, axes and result that the resting layer depends on."""
        return ()

    def described(self) -> tuple[Any, ...]:
        """What the resting layer takes from the case at hand, and not from the result: no more than it shows, so that
        an edit is not painted twice, once for the edit and once for its result."""
        has = (self._whole_time(),) if self.has_time else ()
        return (*has, whole_distance(self.case), self.case.gauges) if self.has_distance else has

    def moving_key(self) -> tuple[Any, ...]:
        """Everything that the moving layer depends on."""
        return (self.sight.time, self.sight.place, self.sight.pinned)

    def draw_resting(self, painter: QPainter) -> None:
        raise NotImplementedError

    def draw_moving(self, painter: QPainter) -> None:
        """Nothing moves unless a picture says so."""

    def moving_region(self) -> QRegion:
        """Pixels that the moving layer touches."""
        return QRegion(self.rect())

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

    def table(self) -> Table | None:
        """What the picture shows, as numbers; `None` where there are none."""
        return None

    def margins(self) -> Margins:
        return margins_of(self.font())

    # What pictures share ----------------------------------------------------------------------------------------

    @property
    def case(self) -> Case:
        return self.document.case

    @property
    def result(self) -> Result | None:
        return self.solution.result

    @property
    def units(self) -> Units:
        return units_of(self.document.project)

    def plot(self) -> QRectF:
        return self.margins().plot(self.width(), self.height())

    def distance_axis(self) -> Axis:
        low, high = inside(self.sight.distance_range, whole_distance(self.case))
        plot = self.plot()
        return Axis(low, high, plot.top(), plot.height())

    def time_axis(self) -> Axis:
        low, high = inside(self.sight.time_range, whole_time(self.case, self.result))
        plot = self.plot()
        return Axis(low, high, plot.left(), plot.width())

    def greyed(self) -> str:
        """Why the picture does not belong to what is entered, in a few words; empty where it does."""
        if self.document.rejected:
            return "an entry is not valid"
        return {"stale": "not solved", "refused": "cannot be solved"}.get(self.solution.state, "")

    # Painting ---------------------------------------------------------------------------------------------------

    def look_again(self) -> None:
        """Something changed somewhere: repaint what looks different now, and nothing else."""
        if not self.isVisible():
            return
        if self._whole_key() != self._kept_key:
            self.update()
        elif self.moving_key() != self._shown_moving:
            self.update(self._shown_region.united(self.moving_region()))

    def paintEvent(self, event: QPaintEvent) -> None:
        key = self._whole_key()
        if key != self._kept_key:
            self._kept, self._kept_key = self._painted_resting(), key
        painter = QPainter(self)
        painter.drawPixmap(0, 0, self._kept)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        if self.greyed():
            painter.setOpacity(GREYED)
        self.draw_moving(painter)
        if self._framed:
            painter.setOpacity(1.0)
            painter.setPen(QPen(QColor(palette().accent), 2))
            painter.setBrush(Qt.BrushStyle.NoBrush)
            painter.drawRoundedRect(QRectF(self.rect()).adjusted(1, 1, -1, -1), RADIUS, RADIUS)
        self._shown_moving, self._shown_region = self.moving_key(), self.moving_region()

    def paint_whole(self, painter: QPainter) -> None:
        """Both layers onto any painter, for export."""
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setFont(self.font())
        painter.fillRect(self.rect(), QColor(palette().paper))
        self.draw_resting(painter)
        self.draw_moving(painter)

    def _painted_resting(self) -> QPixmap:
        ratio = self.devicePixelRatioF()
        kept = QPixmap(round(self.width() * ratio), round(self.height() * ratio))
        kept.setDevicePixelRatio(ratio)
        kept.fill(QColor(palette().paper))
        painter = QPainter(kept)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setFont(self.font())
        if self.greyed():
            painter.setOpacity(GREYED)
        self.draw_resting(painter)
        painter.end()
        return kept

    def _whole_key(self) -> tuple[Any, ...]:
        sight, ratio = self.sight, self.devicePixelRatioF()
        looks = (self.size(), ratio, self.font(), palette(), self.units, self.greyed())
        shared = (self.result, sight.time_range, sight.distance_range, self.described())
        return (*looks, *shared, *self.resting_key())

    def changeEvent(self, event: QEvent) -> None:
        super().changeEvent(event)
        self.update()

    def focusInEvent(self, event: QFocusEvent) -> None:
        """A frame for who comes by the keyboard; the mouse shows by itself where it is."""
        self._framed = event.reason() in BY_KEYS
        self.update()

    def focusOutEvent(self, event: QFocusEvent) -> None:
        self._framed = False
        self.update()

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
            what["time_range"] = _zoomed(self.time_axis(), where.x(), factor, self._whole_time())
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
        self.sight.set(time_range=None, distance_range=None)

    def contextMenuEvent(self, event: QContextMenuEvent) -> None:
        menu = QMenu(self)
        self.menu_at = QPointF(event.pos())
        self.fill_menu(menu)
        if self.has_time or self.has_distance:
            menu.addAction("Pin a second cursor here (Shift+click)", lambda: self.pin_at(self.menu_at))
            remove = menu.addAction("Remove the second cursor (Esc)", lambda: self.sight.set(pinned=None))
            remove.setEnabled(self.sight.pinned is not None)
            menu.addAction("Show all of both axes", self.show_all)
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
            if has and getattr(self.sight, name) is not None:
                axis = axis_of()
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

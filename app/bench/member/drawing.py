"""The member as it stands: what strikes it, its segments coloured with the quantity at the cursor's time, its gauges,
the ground. Distances are those of the x-t diagram and of the profile, to the pixel. A click selects a part, a drag
changes it."""

from __future__ import annotations

from dataclasses import replace
from time import monotonic
from typing import Any

from PySide6.QtCore import QEvent, QPointF, QSize, Qt, QTimer
from PySide6.QtGui import (
    QContextMenuEvent,
    QEnterEvent,
    QFontMetricsF,
    QKeyEvent,
    QMouseEvent,
    QPainter,
    QRegion,
)
from PySide6.QtWidgets import QMenu

from app.bench.member.body import (
    colours_along,
    draw_body,
    draw_gauges,
    draw_grips,
    draw_handle,
    draw_joints,
    draw_selected,
)
from app.bench.member.drag import MemberDrag, nudge
from app.bench.member.handles import Handle
from app.bench.member.load_train import draw_drop, draw_pulse
from app.bench.member.menu import MemberMenu
from app.bench.member.scene import Scene, scene_of, width_for_names
from app.bench.member.surroundings import draw_attachments, draw_far_end, draw_ground
from app.bench.outline.several import toggled
from app.bench.pictures.axes import Margins, margins_of, tidy_step
from app.bench.pictures.axis_drawing import distance_ticks, in_units
from app.bench.pictures.cursor import draw_pinned_place, draw_place
from app.bench.pictures.lettering import put
from app.bench.pictures.picture import Picture
from app.bench.pictures.turns import turns
from app.look.fonts import font
from app.look.palette import palette
from solver.model.load import Drop, History, Pulse

DRAG_TIP = (
    "Drag it, in tidy steps or with Control freely. Esc takes it back. "
    "By keyboard: Control with an arrow key moves what is selected."
)
#: A drag waits so long, ms, for the pictures of its last step before it takes the next: edits that nobody gets to see
#: would only slow the pictures down.
PATIENCE = 250
#: Width up to which names make the drawing wider, in heights of a line.
WIDEST_LINES = 14


class MemberDrawing(Picture):
    has_distance = True
    numbers = "distance"

    def __init__(self, *args: Any, **named: Any) -> None:
        super().__init__(*args, **named)
        self.setAccessibleName("Member")
        self.setMouseTracking(True)
        self._drag: MemberDrag | None = None
        self._wanted: tuple[QPointF, bool] | None = None
        self._edited_at = 0.0
        self._pointed_at: Handle | None = None
        self._toggles: str | None = None
        self._menu_by_keys = False
        self._menu = MemberMenu(self.document, self.sight)
        self._later = QTimer(self)
        self._later.setSingleShot(True)
        self._later.timeout.connect(self._follow)
        self._wide = 0
        self.document.changed.connect(self._fit)
        self.solution.changed.connect(self._follow)
        turns().done.connect(self._follow)

    def margins(self) -> Margins:
        """Left only what the numbers of the distance need; above and below as all pictures in the row."""
        shared = margins_of(self.font())
        metrics = QFontMetricsF(self.font())
        return replace(shared, gutter=float(round(metrics.horizontalAdvance("−000") + 8)), right=4.0)

    def minimumSizeHint(self) -> QSize:
        """So wide that no name is cut, within reason."""
        margins = self.margins()
        wide = margins.gutter + margins.right + width_for_names(self.case, self.font())
        return QSize(round(min(wide, WIDEST_LINES * QFontMetricsF(self.font()).height())), 0)

    def _fit(self) -> None:
        wide = self.minimumSizeHint().width()
        if wide != self._wide:
            self._wide = wide
            self.updateGeometry()

    def described(self) -> tuple[Any, ...]:
        return (self.case,)

    def moving_key(self) -> tuple[Any, ...]:
        sight, told = self.sight, self._drag.told if self._drag else ""
        chosen = (sight.selection, sight.also)
        return (*super().moving_key(), *chosen, sight.quantity, told, self._pointed_at, self._looked_at())

    def scene(self) -> Scene:
        return scene_of(self.case, self.plot(), self.distance_axis(), self.font())

    # Resting layer ----------------------------------------------------------------------------------------------

    def draw_resting(self, painter: QPainter) -> None:
        scene = self.scene()
        plot, axis, case, pieces = scene.plot, scene.axis, scene.case, scene.pieces
        self._draw_heading(painter)
        painter.save()
        painter.setClipRect(plot.adjusted(-1, 0, 4, 1))
        draw_ground(painter, list(scene.bands), axis, plot, scene.names_begin)
        foot = axis.at(case.member.length)
        draw_far_end(painter, case, scene.centre, pieces.member[-1].half_bottom, foot, plot.bottom() - foot)
        halves = [pieces.half_width_at(a.position) for a in case.member.attachments]
        draw_attachments(painter, case, axis, scene.centre, halves)
        painter.restore()
        painter.save()
        painter.setClipRect(plot.adjusted(-plot.left(), 0, 4, 1))
        self._draw_load(painter, scene)
        painter.restore()
        least = -sum(s.length for s in case.ram_segments)
        factor = float(self.units.number(1.0, "length"))
        distance_ticks(painter, in_units(axis, factor), plot.left(), True, least * factor)

    def _draw_heading(self, painter: QPainter) -> None:
        y = 0.5 * self.margins().header
        painter.setFont(font("strong"))
        box = put(painter, 8, y, "Member", palette().ink)
        painter.setFont(self.font())
        put(painter, box.right() + 6, y, self.units.unit("length"), palette().soft_ink)

    def _draw_load(self, painter: QPainter, scene: Scene) -> None:
        struck, plot = scene.axis.at(0.0), scene.plot
        if isinstance(self.case.load, Drop):
            draw_drop(painter, self.case, self.units, list(scene.blocks), plot, struck)
        elif isinstance(self.case.load, Pulse | History):
            draw_pulse(painter, self.case, self.units, scene.centre, struck, plot.top(), plot.right())

    # Moving layer -----------------------------------------------------------------------------------------------

    def moving_region(self) -> QRegion:
        return QRegion(self.plot().toAlignedRect().adjusted(-2, -2, 5, 2))

    def draw_moving(self, painter: QPainter) -> None:
        scene, sight = self.scene(), self.sight
        plot, axis = scene.plot, scene.axis
        painter.save()
        painter.setClipRect(plot.adjusted(0, 0, 4, 1))
        painter.setFont(self.font())
        count = max(round(plot.height() * self.devicePixelRatioF()), 1)
        draw_body(
            painter, scene, colours_along(self.result, sight.quantity, sight.time, self.units, axis, count)
        )
        draw_joints(painter, scene)
        draw_gauges(painter, scene)
        draw_selected(painter, scene, (sight.selection, *sight.also))
        across = plot.adjusted(0, 0, 4, 0)
        draw_place(painter, across, axis, sight.place)
        if sight.pinned is not None:
            draw_pinned_place(painter, across, axis, sight.pinned[1])
        if self._looked_at():
            draw_grips(painter, scene)
        handle = self._drag.handle if self._drag and self._drag.told else self._pointed_at
        if handle is not None:
            draw_handle(painter, scene, handle, self._drag.told if self._drag else "")
        painter.restore()

    def _looked_at(self) -> bool:
        """Whether the mouse is over the drawing, or keys go to it."""
        return self.underMouse() or self.hasFocus()

    # Selecting and dragging -------------------------------------------------------------------------------------

    def mousePressEvent(self, event: QMouseEvent) -> None:
        left = event.button() == Qt.MouseButton.LeftButton
        scene = self.scene()
        handle = scene.handle_at(event.position()) if left else None
        part = handle.pointer if handle else scene.part_at(event.position()) if left else None
        one_more = left and bool(event.modifiers() & Qt.KeyboardModifier.ControlModifier)
        self._toggles = part if one_more else None
        together = handle is not None and part in (self.sight.selection, *self.sight.also)
        if part is not None and not one_more and not together:
            self.sight.set(selection=part)
        if part is not None:
            self.setFocus()
        if handle is not None:
            chosen = (self.sight.selection, *self.sight.also) if together else ()
            self._drag = MemberDrag(self.document, handle, scene.axis, event.position(), chosen)
        elif not one_more:
            super().mousePressEvent(event)

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        if self._drag is not None:
            frees = Qt.KeyboardModifier.AltModifier | Qt.KeyboardModifier.ControlModifier
            self._wanted = event.position(), bool(event.modifiers() & frees)
            self._follow()
        elif event.buttons():
            super().mouseMoveEvent(event)
        else:
            self._pointed_at = self.scene().handle_at(event.position())
            shape = Qt.CursorShape.SizeVerCursor if self._pointed_at else Qt.CursorShape.ArrowCursor
            if self.cursor().shape() != shape:
                self.setCursor(shape)
                self.setToolTip(DRAG_TIP if self._pointed_at else "")
        self.look_again()

    def _follow(self) -> None:
        """Take the drag to where the mouse is, once the pictures of the step before are there."""
        since = (monotonic() - self._edited_at) * 1e3
        if self._drag is None or self._wanted is None:
            return
        if (self.solution.state == "solving" or turns().busy) and since < PATIENCE:
            self._later.start(PATIENCE)
        else:
            self._take_wanted()

    def _take_wanted(self) -> None:
        if self._drag is None or self._wanted is None:
            return
        (to, free), self._wanted = self._wanted, None
        self._edited_at = monotonic()
        if self._drag.move(to, free) and self._toggles:
            self.sight.set(selection=self._toggles)
            self._toggles = None  # a drag with Control held is a free one, and no choice of one part more
        self.look_again()

    def mouseReleaseEvent(self, event: QMouseEvent) -> None:
        if self._drag is not None:
            self._take_wanted()
            self._drag.end()
            if not self._drag.told and self._toggles is None:
                # a click on one of several leaves it alone
                self.sight.set(selection=self._drag.handle.pointer)
            self._drag = None
            self.look_again()
        if self._toggles is not None:
            self.sight.set(**toggled(self.sight, self._toggles))
            self._toggles = None
        super().mouseReleaseEvent(event)

    def contextMenuEvent(self, event: QContextMenuEvent) -> None:
        """By the keyboard for the part that is selected, at the cursor's place; by the mouse for what lies under it."""
        self._menu_by_keys = event.reason() == QContextMenuEvent.Reason.Keyboard
        super().contextMenuEvent(event)

    def fill_menu(self, menu: QMenu) -> None:
        if self._menu_by_keys:
            place = self.sight.place if self.sight.place is not None else self.case.member.length / 2
            self._menu.fill(menu, self.sight.selection, place)
            return
        part, axis = self.scene().part_at(self.menu_at), self.distance_axis()
        if part is not None and part not in (self.sight.selection, *self.sight.also):
            self.sight.set(selection=part)
        step = tidy_step(axis.high - axis.low, int(axis.length))
        self._menu.fill(menu, part, round(axis.value(self.menu_at.y()) / step) * step)

    def enterEvent(self, event: QEnterEvent) -> None:
        self.look_again()

    def leaveEvent(self, event: QEvent) -> None:
        self._pointed_at = None
        self.look_again()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.key() == Qt.Key.Key_Escape and self._drag is not None:
            self._drag.take_back()
            self._drag = self._wanted = None
            self.look_again()
        elif not self._menu.key(event) and not self._nudge(event):
            super().keyPressEvent(event)

    def _nudge(self, event: QKeyEvent) -> bool:
        """Control with an arrow key moves what is selected by one tidy step, as a drag would; held down, one step of
        undo."""
        way = {Qt.Key.Key_Up: -1, Qt.Key.Key_Down: 1}.get(Qt.Key(event.key()), 0)
        if not way or not event.modifiers() & Qt.KeyboardModifier.ControlModifier:
            return False
        chosen = (self.sight.selection, *self.sight.also)
        return nudge(self.document, chosen, way, self.distance_axis())

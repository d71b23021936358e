"""The member as it stands: what strikes it, its segments coloured with the quantity at the cursor's time, its gauges,
the ground. Distances are those of the x-t diagram and of the profile, to the pixel. A click selects a part."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import numpy as np
from PySide6.QtCore import QEvent, QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QContextMenuEvent, QFontMetricsF, QKeyEvent, QMouseEvent, QPainter, QRegion
from PySide6.QtWidgets import QMenu

from app.bench.field_values import along_member
from app.bench.member.drag import MemberDrag
from app.bench.member.glyphs import pen, pointer_right
from app.bench.member.handles import Handle, handles_of
from app.bench.member.load_train import blocks_of, draw_drop, draw_pulse
from app.bench.member.menu import MemberMenu
from app.bench.member.shapes import Piece, Pieces, pieces_of
from app.bench.member.surroundings import draw_attachments, draw_far_end, draw_ground, ground_bands
from app.bench.outline.several import toggled
from app.bench.pictures.axes import Axis, Margins, margins_of, tidy_step
from app.bench.pictures.axis_drawing import crisp, distance_ticks, in_units
from app.bench.pictures.colouring import columns_under, entries_of, image_of, scale_top, table_of
from app.bench.pictures.lettering import RIGHT, fitted, in_lines, put, put_on, spread
from app.bench.pictures.picture import Picture
from app.look.fonts import font
from app.look.palette import palette
from solver.model.load import Drop, History, Pulse

#: Where the member's middle stands, as a share of the plot's width: gauges' names left of it, layers' names right.
CENTRE_SHARE = 0.54
#: Pixels from a boundary within which it can be taken hold of.
REACH = 5.0
DRAG_TIP = "Drag it, in tidy steps or with Control freely. Esc takes it back."


class MemberDrawing(Picture):
    has_distance = True

    def __init__(self, *args: Any, **named: Any) -> None:
        super().__init__(*args, **named)
        self.setAccessibleName("Member")
        self.setMouseTracking(True)
        self._drag: MemberDrag | None = None
        self._pointed_at: Handle | None = None
        self._toggles: str | None = None
        self._menu_by_keys = False
        self._menu = MemberMenu(self.document, self.sight)

    def margins(self) -> Margins:
        """Left only what the numbers of the distance need; above and below as all pictures in the row."""
        shared = margins_of(self.font())
        metrics = QFontMetricsF(self.font())
        return replace(shared, gutter=float(round(metrics.horizontalAdvance("−000") + 8)), right=4.0)

    def described(self) -> tuple[Any, ...]:
        return (self.case,)

    def moving_key(self) -> tuple[Any, ...]:
        told = self._drag.told if self._drag else ""
        return (
            self.sight.time,
            self.sight.place,
            self.sight.selection,
            self.sight.also,
            self.sight.quantity,
            told,
            self._pointed_at,
        )

    def centre(self) -> float:
        plot = self.plot()
        return crisp(plot.left() + CENTRE_SHARE * plot.width()) - 0.5

    def pieces(self) -> Pieces:
        return pieces_of(self.case, self.plot().width(), QFontMetricsF(self.font()).height() / 16)

    # Resting layer ----------------------------------------------------------------------------------------------

    def draw_resting(self, painter: QPainter) -> None:
        plot, axis, case = self.plot(), self.distance_axis(), self.case
        unit = self.units.unit("length")
        self._heading(painter, unit)
        painter.save()
        painter.setClipRect(plot.adjusted(-1, 0, 4, 1))
        pieces, centre = self.pieces(), self.centre()
        words_left = centre + pieces.widest / 2 + 7
        draw_ground(painter, ground_bands(case, axis.high), axis, plot, words_left)
        self._draw_load(painter, plot, axis, pieces)
        foot = axis.at(case.member.length)
        draw_far_end(painter, case, centre, pieces.member[-1].half_bottom, foot, plot.bottom() - foot)
        halves = [pieces.half_width_at(a.position) for a in case.member.attachments]
        draw_attachments(painter, case, axis, centre, halves)
        painter.restore()
        least = -sum(s.length for s in case.ram_segments)
        factor = float(self.units.number(1.0, "length"))
        distance_ticks(painter, in_units(axis, factor), plot.left(), True, least * factor)

    def _heading(self, painter: QPainter, unit: str) -> None:
        y = 0.5 * self.margins().header
        painter.setFont(font("strong"))
        box = put(painter, 8, y, "Member", palette().ink)
        painter.setFont(self.font())
        put(painter, box.right() + 6, y, unit, palette().soft_ink)

    def _draw_load(self, painter: QPainter, plot: QRectF, axis: Axis, pieces: Pieces) -> None:
        case, struck = self.case, axis.at(0.0)
        if isinstance(case.load, Drop):
            draw_drop(painter, case, self.units, self._blocks(pieces), plot.right(), struck)
        elif isinstance(case.load, Pulse | History):
            draw_pulse(painter, case, self.units, self.centre(), struck, plot.top(), plot.right())

    def _blocks(self, pieces: Pieces) -> list[Any]:
        axis, load = self.distance_axis(), self.case.load
        if not isinstance(load, Drop):
            return []
        top, struck = axis.at(-0.2 * self.case.member.length) + 2, axis.at(0.0)
        return blocks_of(load, self.centre(), struck, top, pieces.widest / 2, bool(pieces.striking))

    # Moving layer -----------------------------------------------------------------------------------------------

    def moving_region(self) -> QRegion:
        return QRegion(self.plot().toAlignedRect().adjusted(-2, -2, 5, 2))

    def draw_moving(self, painter: QPainter) -> None:
        plot, axis = self.plot(), self.distance_axis()
        painter.save()
        painter.setClipRect(plot.adjusted(0, 0, 4, 1))
        pieces = self.pieces()
        self._draw_body(painter, plot, axis, pieces)
        self._draw_joints(painter, axis, pieces)
        self._draw_gauges(painter, plot, axis, pieces)
        self._draw_selected(painter, axis, pieces)
        if self.sight.place is not None:
            y = crisp(axis.at(self.sight.place))
            painter.setPen(pen(palette().ink, 1.0, Qt.PenStyle.DotLine))
            painter.drawLine(QLineF(plot.left(), y, plot.right() + 4, y))
        self._draw_handle(painter, plot, axis)
        painter.restore()

    def _draw_body(self, painter: QPainter, plot: QRectF, axis: Axis, pieces: Pieces) -> None:
        """Each piece filled with a strip of colours one pixel wide, stretched over it and cut to its outline."""
        colours, centre, result = palette(), self.centre(), self.result
        ratio = self.devicePixelRatioF()
        count = max(round(plot.height() * ratio), 1)
        strip = None
        if result is not None and len(result.fields.edges) > 1:
            quantity = self.sight.quantity
            places = axis.low + (np.arange(count) + 0.5) / count * (axis.high - axis.low)
            columns = columns_under(result.fields.edges, places)
            values = along_member(result, quantity, self.sight.time)
            entries = entries_of(values, scale_top(result, quantity, self.units))[columns]
            entries[columns < 0] = 255
            strip = image_of(table_of(quantity, colours)[entries][:, None])
        wide = QRectF(centre - pieces.widest, plot.top(), 2 * pieces.widest, plot.height())
        for piece in (*pieces.striking, *pieces.member):
            path = piece.path(centre, axis)
            painter.save()
            painter.setClipPath(path, Qt.ClipOperation.IntersectClip)
            if strip is None:
                painter.fillRect(wide, QColor(colours.paper))
            else:
                painter.drawImage(wide, strip)
            painter.restore()
            painter.setPen(pen(colours.bars[2], 1.2))
            painter.setBrush(Qt.BrushStyle.NoBrush)
            painter.drawPath(path)

    def _draw_joints(self, painter: QPainter, axis: Axis, pieces: Pieces) -> None:
        """A joint that can open is a slot between the faces; a splice with slack has its sleeve beside the slot."""
        colours, centre = palette(), self.centre()
        for piece in (*pieces.striking, *pieces.member):
            kind = piece.segment.joint_above.kind
            if kind == "bonded":
                continue
            y, half = axis.at(piece.start), piece.half_top + 2
            painter.fillRect(QRectF(centre - half, y - 1.5, 2 * half, 3), QColor(colours.paper))
            painter.setPen(pen(colours.bars[2], 1.2))
            painter.drawLines([QLineF(centre - half, y + d, centre + half, y + d) for d in (-1.5, 1.5)])
            if kind == "slack_splice":
                painter.drawLines(
                    [QLineF(centre + s * half, y - 6, centre + s * half, y + 6) for s in (-1, 1)]
                )

    def _draw_gauges(self, painter: QPainter, plot: QRectF, axis: Axis, pieces: Pieces) -> None:
        colours, centre = palette(), self.centre()
        painter.setFont(self.font())
        for index, (place, y) in enumerate(self._gauge_labels(plot, axis)):
            hue, at = colours.gauge(index), axis.at(place)
            edge = centre - pieces.half_width_at(place) - 1
            pointer_right(painter, edge, at, 6, hue)
            right = centre - pieces.widest / 2 - 14
            name = fitted(self.case.gauges[index].name, painter.font(), right - plot.left() - 4)
            put_on(painter, right, y, name, hue, colours.paper, RIGHT)
            painter.setPen(pen(hue))
            painter.drawLine(QLineF(right + 2, y, edge - 6, at))

    def _gauge_labels(self, plot: QRectF, axis: Axis) -> list[tuple[float, float]]:
        """Distance (m) of each gauge and the pixel at which its name stands."""
        places = [g.position if g.on == "member" else -g.position for g in self.case.gauges]
        height = QFontMetricsF(self.font()).height()
        rows = spread([axis.at(p) for p in places], height, plot.top(), plot.bottom())
        return list(zip(places, rows, strict=True))

    def _draw_selected(self, painter: QPainter, axis: Axis, pieces: Pieces) -> None:
        colours, chosen = palette(), (self.sight.selection, *self.sight.also)
        painter.setPen(pen(colours.accent, 2.0))
        painter.setBrush(Qt.BrushStyle.NoBrush)
        for piece in (*pieces.striking, *pieces.member):
            if piece.pointer in chosen:
                painter.drawPath(piece.path(self.centre(), axis))
        for block in self._blocks(pieces):
            if block.pointer in chosen:
                painter.drawRect(block.box.adjusted(-1, -1, 1, 1))

    def _draw_handle(self, painter: QPainter, plot: QRectF, axis: Axis) -> None:
        """The line that is pointed at or dragged, and what the drag does."""
        handle = self._drag.handle if self._drag and self._drag.told else self._pointed_at
        if handle is None:
            return
        current = next(
            (h for h in handles_of(self.case) if (h.kind, h.index) == (handle.kind, handle.index)), handle
        )
        accent = QColor(palette().accent)
        y = axis.at(current.place) if current.kind != "drop" else plot.top() + 2
        if current.kind != "drop":
            painter.setPen(pen(palette().accent, 2.0))
            painter.drawLine(QLineF(plot.left() + 2, y, plot.right(), y))
            painter.setBrush(accent)
            painter.drawRoundedRect(QRectF(plot.right() - 18, y - 3, 14, 6), 3, 3)
        if self._drag and self._drag.told:
            line = QFontMetricsF(painter.font()).height()
            words = self._drag.told
            lines = in_lines(words, painter.font(), plot.width() - 8, 3)
            top = (
                y - (len(lines) + 0.4) * line
                if y - (len(lines) + 0.4) * line > plot.top()
                else y + 0.4 * line
            )
            for row, text in enumerate(lines):
                put_on(
                    painter,
                    plot.left() + 4,
                    top + (row + 0.5) * line,
                    text,
                    palette().accent,
                    palette().paper,
                )

    # Selecting --------------------------------------------------------------------------------------------------

    def part_at(self, position: QPointF) -> str | None:
        """Pointer of the part that lies there, relative to the case."""
        axis, plot, pieces = self.distance_axis(), self.plot(), self.pieces()
        place = axis.value(position.y())
        for index, (where, row) in enumerate(self._gauge_labels(plot, axis)):
            reach = QFontMetricsF(self.font()).height() / 2
            near_name = position.x() < self.centre() - pieces.widest / 2 and abs(position.y() - row) < reach
            near_mark = (
                abs(position.x() - self.centre()) < pieces.widest and abs(position.y() - axis.at(where)) < 4
            )
            if near_name or near_mark:
                return f"gauges/{index}"
        for block in self._blocks(pieces):
            if block.box.adjusted(-3, -1, 3, 1).contains(position):
                return block.pointer
        across = abs(position.x() - self.centre())
        found: Piece | None = next(
            (p for p in (*pieces.striking, *pieces.member) if p.start <= place <= p.end), None
        )
        if found and across <= pieces.half_width_at(place) + 4:
            return found.pointer
        if place > self.case.member.length and across < 2 * pieces.widest:
            return "far_end"
        if place < 0:
            return "load"
        bands = ground_bands(self.case, axis.high)
        return next((b.pointer for b in bands if b.top <= place <= b.bottom), None)

    def mousePressEvent(self, event: QMouseEvent) -> None:
        left = event.button() == Qt.MouseButton.LeftButton
        handle = self.handle_at(event.position()) if left else None
        part = handle.pointer if handle else self.part_at(event.position()) if left else None
        one_more = left and bool(event.modifiers() & Qt.KeyboardModifier.ControlModifier)
        self._toggles = part if one_more else None
        if part is not None and not one_more:
            self.sight.set(selection=part)
        if part is not None:
            self.setFocus()
        if handle is not None:
            self._drag = MemberDrag(self.document, handle, self.distance_axis(), event.position())
        elif not one_more:
            super().mousePressEvent(event)

    # Dragging ---------------------------------------------------------------------------------------------------

    def handle_at(self, position: QPointF) -> Handle | None:
        """What can be dragged from there."""
        axis, part = self.distance_axis(), self.part_at(position)
        beside = abs(position.x() - self.centre()) > self.pieces().widest
        for handle in handles_of(self.case):
            if handle.kind in ("gauge", "drop"):
                hit = part == handle.pointer and (handle.kind == "gauge" or position.y() < axis.at(0.0))
            else:
                near = abs(position.y() - axis.at(handle.place)) <= REACH
                hit = near and beside == (handle.kind in ("surface", "layer"))
            if hit:
                return handle
        return None

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        if self._drag is not None:
            free = bool(
                event.modifiers() & (Qt.KeyboardModifier.AltModifier | Qt.KeyboardModifier.ControlModifier)
            )
            if self._drag.move(event.position(), free) and self._toggles:
                self.sight.set(selection=self._toggles)
                self._toggles = None  # a drag with Control held is a free one, and no choice of one part more
        elif event.buttons():
            super().mouseMoveEvent(event)
        else:
            self._pointed_at = self.handle_at(event.position())
            shape = Qt.CursorShape.SizeVerCursor if self._pointed_at else Qt.CursorShape.ArrowCursor
            if self.cursor().shape() != shape:
                self.setCursor(shape)
                self.setToolTip(DRAG_TIP if self._pointed_at else "")
        self.look_again()

    def mouseReleaseEvent(self, event: QMouseEvent) -> None:
        if self._drag is not None:
            self._drag.end()
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
        part, axis = self.part_at(self.menu_at), self.distance_axis()
        if part is not None and part not in (self.sight.selection, *self.sight.also):
            self.sight.set(selection=part)
        step = tidy_step(axis.high - axis.low, int(axis.length))
        self._menu.fill(menu, part, round(axis.value(self.menu_at.y()) / step) * step)

    def leaveEvent(self, event: QEvent) -> None:
        self._pointed_at = None
        self.look_again()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.key() == Qt.Key.Key_Escape and self._drag is not None:
            self._drag.take_back()
            self._drag = None
            self.look_again()
        elif not self._menu.key(event):
            super().keyPressEvent(event)

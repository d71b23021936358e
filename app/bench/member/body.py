"""The member itself in its drawing: coloured pieces, joints, gauges, what is selected, what can be dragged."""

from __future__ import annotations

from collections.abc import Collection

import numpy as np
from PySide6.QtCore import QLineF, QRectF, Qt
from PySide6.QtGui import QColor, QImage, QPainter

from app.bench.field_values import along_member
from app.bench.member.glyphs import pen, pointer_right
from app.bench.member.handles import Handle, handles_of
from app.bench.member.scene import Scene
from app.bench.pictures.axes import Axis
from app.bench.pictures.colouring import columns_under, entries_of, image_of, scale_top, table_of
from app.bench.pictures.lettering import RIGHT, fitted, in_lines, put_on
from app.look.palette import palette
from app.sight import ShownQuantity
from app.units import Units
from solver import Result

#: Width and height of a grip, pixels.
GRIP, THICK = 14.0, 6.0


def colours_along(
    result: Result | None, quantity: ShownQuantity, time: float, units: Units, axis: Axis, count: int
) -> QImage | None:
    """The quantity at a time (s) as a strip of colours, one pixel wide and `count` high; `None` without a result."""
    if result is None or len(result.fields.edges) < 2:
        return None
    places = axis.low + (np.arange(count) + 0.5) / count * (axis.high - axis.low)
    columns = columns_under(result.fields.edges, places)
    values = along_member(result, quantity, time)
    entries = entries_of(values, scale_top(result, quantity, units))[columns]
    entries[columns < 0] = 255
    return image_of(table_of(quantity, palette())[entries][:, None])


def draw_body(painter: QPainter, scene: Scene, strip: QImage | None) -> None:
    """Each piece filled with the strip of colours, stretched over it and cut to its outline."""
    colours, pieces, plot = palette(), scene.pieces, scene.plot
    wide = QRectF(scene.centre - pieces.widest, plot.top(), 2 * pieces.widest, plot.height())
    for piece in (*pieces.striking, *pieces.member):
        path = piece.path(scene.centre, scene.axis)
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


def draw_joints(painter: QPainter, scene: Scene) -> None:
    """A joint that can open is a slot between the faces; a splice with slack has its sleeve beside the slot."""
    colours, centre = palette(), scene.centre
    for piece in (*scene.pieces.striking, *scene.pieces.member):
        kind = piece.segment.joint_above.kind
        if kind == "bonded":
            continue
        y, half = scene.axis.at(piece.start), piece.half_top + 2
        painter.fillRect(QRectF(centre - half, y - 1.5, 2 * half, 3), QColor(colours.paper))
        painter.setPen(pen(colours.bars[2], 1.2))
        painter.drawLines([QLineF(centre - half, y + d, centre + half, y + d) for d in (-1.5, 1.5)])
        if kind == "slack_splice":
            painter.drawLines([QLineF(centre + s * half, y - 6, centre + s * half, y + 6) for s in (-1, 1)])


def draw_gauges(painter: QPainter, scene: Scene) -> None:
    """An arrowhead at each place, and its name left of the member, joined where names had to give way."""
    colours, right = palette(), scene.names_end
    for index, (place, y) in enumerate(scene.gauges):
        hue, at = colours.gauge(index), scene.axis.at(place)
        edge = scene.centre - scene.pieces.half_width_at(place) - 1
        pointer_right(painter, edge, at, 6, hue)
        name = fitted(scene.case.gauges[index].name, painter.font(), right - scene.plot.left() - 2)
        put_on(painter, right, y, name, hue, colours.paper, RIGHT)
        painter.setPen(pen(hue))
        painter.drawLine(QLineF(right + 2, y, edge - 6, at))


def draw_selected(painter: QPainter, scene: Scene, chosen: Collection[str]) -> None:
    painter.setPen(pen(palette().accent, 2.0))
    painter.setBrush(Qt.BrushStyle.NoBrush)
    for piece in (*scene.pieces.striking, *scene.pieces.member):
        if piece.pointer in chosen:
            painter.drawPath(piece.path(scene.centre, scene.axis))
    for block in scene.blocks:
        if block.pointer in chosen:
            painter.drawRect(block.box.adjusted(-1, -1, 1, 1))
    for index, (_place, y) in enumerate(scene.gauges):
        if f"gauges/{index}" in chosen:
            below = y + scene.line / 2 - 1
            painter.drawLine(QLineF(scene.plot.left() + 2, below, scene.names_end, below))


def draw_grips(painter: QPainter, scene: Scene) -> None:
    """A faint grip at each boundary that can be dragged, at the edge for the ground and beside the member for segments,
    while the mouse is over the drawing or keys go to it."""
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(QColor(palette().line))
    for handle in handles_of(scene.case):
        if handle.kind in ("surface", "layer", "segment"):
            painter.drawRoundedRect(_grip(handle, scene), THICK / 4, THICK / 4)
    painter.setBrush(Qt.BrushStyle.NoBrush)


def draw_handle(painter: QPainter, scene: Scene, handle: Handle, words: str) -> None:
    """The line that is pointed at or dragged, and in words what the drag does."""
    same = (h for h in handles_of(scene.case) if (h.kind, h.index) == (handle.kind, handle.index))
    current, plot, line = next(same, handle), scene.plot, scene.line
    y = plot.top() + 2
    if current.kind != "drop":
        y = scene.axis.at(current.place)
        painter.setPen(pen(palette().accent, 2.0))
        painter.drawLine(QLineF(plot.left() + 2, y, plot.right(), y))
        painter.setBrush(QColor(palette().accent))
        painter.drawRoundedRect(_grip(current, scene).adjusted(-1, -1.5, 1, 1.5), 3, 3)
        painter.setBrush(Qt.BrushStyle.NoBrush)
    lines = in_lines(words, painter.font(), plot.width() - 8, 3)
    above = y - (len(lines) + 0.4) * line
    top = above if above > plot.top() else y + 0.4 * line
    for row, text in enumerate(lines):
        put_on(
            painter,
            plot.left() + 4,
            top + (row + 0.5) * line,
            text,
            palette().accent,
            palette().paper,
        )


def _grip(handle: Handle, scene: Scene) -> QRectF:
    y = scene.axis.at(handle.place)
    if handle.kind == "segment":
        left = scene.centre + scene.pieces.half_width_at(handle.place) + 2
        return QRectF(left, y - THICK / 4, GRIP / 2, THICK / 2)
    return QRectF(scene.plot.right() - GRIP - 2, y - THICK / 4, GRIP, THICK / 2)

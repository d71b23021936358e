"""What holds the member, drawn: the ground in layers, its far end, and what is attached along it."""

from __future__ import annotations

from dataclasses import dataclass

from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QPainter, QPolygonF

from app.bench.member.glyphs import dashpot, hatched_side, hatched_wall, pen, spring
from app.bench.pictures.axes import Axis
from app.bench.pictures.lettering import in_lines, put
from app.look.palette import palette
from solver import Case


@dataclass(frozen=True)
class GroundBand:
    """A layer of the ground on the screen: its name, the pointer that selects it, its distances (m)."""

    name: str
    pointer: str
    top: float
    bottom: float


def ground_bands(case: Case, deepest: float) -> list[GroundBand]:
    """Layers from the surface downwards, the last one reaching as deep as the picture does."""
    ground = case.ground
    if ground is None:
        return []
    if not ground.layers:
        name = "Ground" if ground.shaft_total is not None else ""
        pointer = "ground/shaft_total" if ground.shaft_total is not None else "ground"
        return [GroundBand(name, pointer, ground.surface, deepest)]
    bands, top = [], ground.surface
    for index, layer in enumerate(ground.layers):
        bands.append(GroundBand(layer.name, f"ground/layers/{index}", top, top + layer.thickness))
        top += layer.thickness
    return bands


def draw_ground(
    painter: QPainter, bands: list[GroundBand], axis: Axis, plot: QRectF, words_left: float
) -> None:
    """Bands across the plot with their names right of the member, and the surface as a line."""
    colours = palette()
    metrics = QFontMetricsF(painter.font())
    end = plot.bottom()
    for index, band in enumerate(bands):
        top, bottom = max(axis.at(band.top), plot.top()), min(axis.at(band.bottom), end)
        if bottom <= top:
            continue
        box = QRectF(QPointF(plot.left(), top), QPointF(plot.right(), bottom))
        painter.fillRect(box, QColor(colours.ground[index % len(colours.ground)]))
        room = int((bottom - top - 4) / metrics.height())
        lines = in_lines(band.name, painter.font(), plot.right() - words_left, min(room, 3)) if room else []
        for row, line in enumerate(lines):
            put(painter, words_left, top + 4 + (row + 0.5) * metrics.height(), line, colours.ground_line)
    if bands and plot.top() <= axis.at(bands[0].top) <= end:
        y = axis.at(bands[0].top)
        painter.setPen(pen(colours.ground_line, 1.6))
        painter.drawLine(QLineF(plot.left(), y, plot.right(), y))


def draw_far_end(painter: QPainter, case: Case, centre: float, half: float, y: float, room: float) -> QRectF:
    """The far end below the member's last face at `y`, in so many pixels of room. Gives the box that selects it."""
    colours, kind = palette(), case.far_end.kind
    ink, wide = colours.ink, max(1.6 * half, 9.0)
    deep = min(room, 16.0)
    if kind in ("fixed", "wall"):
        gap = 4.0 if kind == "wall" else 0.0
        hatched_wall(painter, centre - wide, centre + wide, y + gap, min(deep - gap, 6.0), ink)
    elif kind in ("spring", "dashpot"):
        foot = y + deep - 4
        draw = spring if kind == "spring" else dashpot
        draw(painter, QPointF(centre, y), QPointF(centre, foot), min(half, 6.0), ink)
        hatched_wall(painter, centre - wide, centre + wide, foot, 4.0, ink)
    elif kind == "matched":
        painter.setPen(pen(ink, 1.0, Qt.PenStyle.DotLine))
        sides = [QLineF(centre + s * half, y, centre + s * half, y + deep) for s in (-1, 1)]
        painter.drawLines(sides)
    elif kind == "ground":
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(QColor(colours.bars[2]))
        tip = min(deep, 7.0)
        shoe = [QPointF(centre - half, y), QPointF(centre + half, y), QPointF(centre + 0.4 * half, y + tip)]
        painter.drawPolygon(QPolygonF([*shoe, QPointF(centre - 0.4 * half, y + tip)]))
    return QRectF(centre - wide, y - 2, 2 * wide, deep + 2)


def draw_attachments(painter: QPainter, case: Case, axis: Axis, centre: float, halves: list[float]) -> None:
    """Masses beside the member, springs and dashpots from it to a fixed face; `halves`: half width at each (pixels)."""
    ink = palette().ink
    for attachment, half in zip(case.member.attachments, halves, strict=True):
        y, x = axis.at(attachment.position), centre + half
        if attachment.kind == "mass":
            painter.setPen(Qt.PenStyle.NoPen)
            painter.setBrush(QColor(palette().bars[0]))
            painter.drawRect(QRectF(x, y - 5, 7, 10))
            painter.drawRect(QRectF(centre - half - 7, y - 5, 7, 10))
            continue
        draw = spring if attachment.kind == "spring" else dashpot
        draw(painter, QPointF(x, y), QPointF(x + 18, y), 4.0, ink)
        hatched_side(painter, x + 18, y - 6, y + 6, 4.0, ink)

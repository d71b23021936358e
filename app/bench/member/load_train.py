"""What strikes, drawn above the struck end: ram, cushions and cap; a pulse; or nothing. Rods that strike are to scale
and are drawn with the member."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QPainter, QPolygonF

from app.bench.member.glyphs import arrow_down, outline, pen, pulse_shape
from app.bench.pictures.lettering import RIGHT, put, width_of
from app.look.palette import palette
from app.units import Units
from solver import Case
from solver.model.load import Drop, History, Load, Pulse

#: Pixels below which the shape of a pulse cannot be seen.
LEAST_SHAPE = 14.0


@dataclass(frozen=True)
class Block:
    """A part of the load train: what it is, and the pointer that selects it."""

    kind: str
    pointer: str
    box: QRectF


def blocks_of(
    load: Drop, centre: float, struck: float, top: float, half: float, has_rod: bool
) -> list[Block]:
    """Blocks from the struck end upwards in the room between `top` and `struck` (pixels); the ram is lifted."""
    room = max(struck - top, 12.0)
    thin = min(max(room * 0.1, 3.0), 8.0)
    found: list[Block] = []
    bottom = struck

    def add(kind: str, pointer: str, height: float, wide: float) -> None:
        nonlocal bottom
        found.append(
            Block(kind, pointer, QRectF(centre - wide * half, bottom - height, 2 * wide * half, height))
        )
        bottom -= height

    if load.pile_cushion is not None:
        add("cushion", "load/pile_cushion", thin, 0.9)
    if load.cap_mass > 0:
        add("cap", "load/cap_mass", thin, 1.5)
    if load.cushion is not None:
        add("cushion", "load/cushion", thin, 0.8)
    if not has_rod:
        bottom -= room * 0.16
        add("ram", "load", max(min(room * 0.42, bottom - top - 2), 6.0), 1.1)
    return found


def draw_drop(
    painter: QPainter, case: Case, units: Units, blocks: list[Block], plot: QRectF, struck: float
) -> None:
    """The blocks, the arrow of the fall, and the ram's mass and height in words where there is room: right of the
    arrow, else left of the ram out to the panel's edge; of the two, the height."""
    colours, load = palette(), case.load
    assert isinstance(load, Drop)
    fills = {"ram": colours.bars[0], "cap": colours.bars[1], "cushion": colours.cushion}
    for block in blocks:
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(QColor(fills[block.kind]))
        painter.drawRect(block.box)
    ram = next((b.box for b in blocks if b.kind == "ram"), None)
    if ram is None or load.ram_mass is None:
        return
    landing = min((b.box.top() for b in blocks if b.kind != "ram"), default=struck)
    x = ram.right() + 6
    arrow_down(painter, x, ram.top() + 2, landing, 5, colours.soft_ink)
    metrics = QFontMetricsF(painter.font())
    lines = [units.show(load.ram_mass, "mass"), strength_text(load, units)]
    needed = max(width_of(text, painter.font()) for text in lines)
    beside = x + 5 + needed <= plot.right() + 4
    if not beside:
        # the number of the struck end stands left of it
        room = struck - 0.5 * metrics.height() - plot.top()
        lines = lines[-max(int(room / metrics.height()), 1) :]
        needed = max(width_of(text, painter.font()) for text in lines)
    if not beside and needed > ram.left() - 8:
        return
    for row, text in enumerate(lines):
        if beside:
            put(painter, x + 5, ram.top() + (row + 0.5) * metrics.height(), text, colours.soft_ink)
        else:
            y = max(ram.top(), plot.top()) + (row + 0.5) * metrics.height()
            put(painter, ram.left() - 6, y, text, colours.soft_ink, RIGHT)


def strength_text(load: Drop, units: Units) -> str:
    """How hard it strikes: its drop height, energy or velocity, whichever is given."""
    if load.drop_height is not None:
        return units.show(load.drop_height, "length")
    if load.energy is not None:
        return units.show(load.energy, "energy")
    return units.show(load.impact_velocity or 0.0, "velocity")


def draw_pulse(
    painter: QPainter, case: Case, units: Units, centre: float, struck: float, top: float, right: float
) -> None:
    """An arrow onto the struck end, with the shape of the pulse beside it where it is high enough to be seen, and its
    peak."""
    colours, load = palette(), case.load
    line = QFontMetricsF(painter.font()).height()
    height = min(struck - top - line, 2.4 * line)
    shaped = height >= LEAST_SHAPE
    height = height if shaped else max(struck - top - 2, 8.0)
    arrow_down(painter, centre, struck - height, struck - 1, 7, colours.ink)
    box = QRectF(centre + 10, struck - height, max(min(right - centre - 16, 3 * line), 8.0), height - 4)
    if shaped:
        _draw_shape(painter, load, box)
    if isinstance(load, Pulse):
        text = units.show(abs(load.peak), load.quantity)
        left = min(box.left(), right - width_of(text, painter.font()))
        y = box.top() - 0.55 * line if shaped else struck - height / 2 - 2
        put(painter, left, y, text, colours.soft_ink)


def _draw_shape(painter: QPainter, load: Load, box: QRectF) -> None:
    colours = palette()
    painter.setBrush(Qt.BrushStyle.NoBrush)
    painter.setPen(pen(colours.ink, 1.2))
    if isinstance(load, Pulse):
        painter.drawPath(outline(pulse_shape(load.shape, *_ends(load)), box))
    elif isinstance(load, History):
        painter.drawPolyline(QPolygonF(list(_history(load, box))))
    painter.setPen(pen(colours.line))
    painter.drawLine(QLineF(box.bottomLeft(), box.bottomRight()))


def _ends(load: Pulse) -> tuple[float, float]:
    return (load.rise or 0.0) / load.duration, (load.fall or 0.0) / load.duration


def _history(load: History, box: QRectF) -> Iterator[QPointF]:
    times, values = load.samples.times, load.samples.values
    step = max(len(times) // 60, 1)
    span = (times[-1] - times[0]) or 1.0
    low, high = min(float(values.min()), 0.0), max(float(values.max()), 0.0)
    for time, value in zip(times[::step], values[::step], strict=True):
        x = box.left() + (time - times[0]) / span * box.width()
        yield QPointF(x, box.bottom() - (value - low) / ((high - low) or 1.0) * box.height())

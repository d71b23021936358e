"""Where everything in the member drawing lies on the screen, and so what lies under the mouse."""

from __future__ import annotations

from dataclasses import dataclass

from PySide6.QtCore import QPointF, QRectF
from PySide6.QtGui import QFont, QFontMetricsF

from app.bench.member.handles import Handle, handles_of
from app.bench.member.load_train import Block, blocks_of
from app.bench.member.shapes import WIDEST, WIDEST_SHARE, Pieces, pieces_of
from app.bench.member.surroundings import GroundBand, ground_bands
from app.bench.pictures.axes import Axis
from app.bench.pictures.axis_drawing import crisp
from app.bench.pictures.lettering import spread, width_of
from solver import Case
from solver.model.derived import place_of
from solver.model.load import Drop

#: Where the member's middle stands where there is room, as a share of the plot's width: gauges' names left of it,
#: layers' names right.
CENTRE_SHARE = 0.54
#: Pixels between a gauge's name and the member, and between the member and a layer's name.
BEFORE, BEHIND = 14.0, 7.0
#: Pixels from a boundary within which it can be taken hold of.
REACH = 6.0


@dataclass(frozen=True)
class Scene:
    """One case in one plot. `gauges`: the distance (m) of each and the pixel at which its name stands; `line`: height
    of a line of text."""

    case: Case
    plot: QRectF
    axis: Axis
    pieces: Pieces
    centre: float
    blocks: tuple[Block, ...]
    gauges: tuple[tuple[float, float], ...]
    bands: tuple[GroundBand, ...]
    line: float

    @property
    def names_end(self) -> float:
        """Pixel at which the names of gauges end."""
        return self.centre - self.pieces.widest / 2 - BEFORE

    @property
    def names_begin(self) -> float:
        """Pixel at which the names of layers begin."""
        return self.centre + self.pieces.widest / 2 + BEHIND

    def part_at(self, position: QPointF) -> str | None:
        """Pointer of the part that lies there, relative to the case."""
        return self._gauge_at(position) or self._block_at(position) or self._piece_at(position)

    def handle_at(self, position: QPointF) -> Handle | None:
        """What can be dragged from there."""
        part = self.part_at(position)
        beside = abs(position.x() - self.centre) > self.pieces.widest
        for handle in handles_of(self.case):
            if handle.kind in ("gauge", "drop"):
                hit = part == handle.pointer
                hit &= handle.kind == "gauge" or position.y() < self.axis.at(0.0)
            else:
                near = abs(position.y() - self.axis.at(handle.place)) <= REACH
                hit = near and beside == (handle.kind in ("surface", "layer"))
            if hit:
                return handle
        return None

    def _gauge_at(self, position: QPointF) -> str | None:
        across = abs(position.x() - self.centre)
        for index, (where, row) in enumerate(self.gauges):
            near_name = position.x() < self.centre - self.pieces.widest / 2
            near_name &= abs(position.y() - row) < self.line / 2
            near_mark = across < self.pieces.widest and abs(position.y() - self.axis.at(where)) < 4
            if near_name or near_mark:
                return f"gauges/{index}"
        return None

    def _block_at(self, position: QPointF) -> str | None:
        found = (b.pointer for b in self.blocks if b.box.adjusted(-3, -1, 3, 1).contains(position))
        return next(found, None)

    def _piece_at(self, position: QPointF) -> str | None:
        """A segment, or what holds it or strikes it."""
        place, across = self.axis.value(position.y()), abs(position.x() - self.centre)
        pieces = (*self.pieces.striking, *self.pieces.member)
        found = next((p for p in pieces if p.start <= place <= p.end), None)
        if found and across <= self.pieces.half_width_at(place) + 4:
            return found.pointer
        if place > self.case.member.length and across < 2 * self.pieces.widest:
            return "far_end"
        if place < 0:
            return "load"
        return next((b.pointer for b in self.bands if b.top <= place <= b.bottom), None)


def scene_of(case: Case, plot: QRectF, axis: Axis, font: QFont) -> Scene:
    line = QFontMetricsF(font).height()
    pieces = pieces_of(case, plot.width(), line / 16)
    bands = tuple(ground_bands(case, axis.high))
    centre = _centre(case, bands, plot, pieces.widest, font)
    places = [place_of(case, g) for g in case.gauges]
    rows = spread([axis.at(p) for p in places], line, plot.top(), plot.bottom())
    blocks: list[Block] = []
    if isinstance(case.load, Drop):
        top, struck = axis.at(-0.2 * case.member.length) + 2, axis.at(0.0)
        blocks = blocks_of(case.load, centre, struck, top, pieces.widest / 2, bool(pieces.striking))
    gauges = tuple(zip(places, rows, strict=True))
    return Scene(case, plot, axis, pieces, centre, tuple(blocks), gauges, bands, line)


def _centre(case: Case, bands: tuple[GroundBand, ...], plot: QRectF, widest: float, font: QFont) -> float:
    """Where the member stands: off its usual place where names on one side need more room and the other has it."""
    left, right = _rooms(case, bands, font)
    least, most = plot.left() + left + widest / 2, plot.right() - right - widest / 2
    usual = plot.left() + CENTRE_SHARE * plot.width()
    middle = min(max(usual, least), most) if least <= most else (least + most) / 2
    return crisp(middle) - 0.5


def _rooms(case: Case, bands: tuple[GroundBand, ...], font: QFont) -> tuple[float, float]:
    """Pixels that the names of gauges need left of the member, and the longest word of a layer's name right of it."""
    left = max((width_of(g.name, font) for g in case.gauges), default=0.0) + BEFORE + 4
    words = [word for band in bands for word in band.name.split()]
    return left, max((width_of(word, font) for word in words), default=0.0) + BEHIND + 2


def width_for_names(case: Case, font: QFont) -> float:
    """Width of a plot, in pixels, in which no name is cut."""
    names = sum(_rooms(case, tuple(ground_bands(case, case.member.length)), font))
    return min(names / (1 - WIDEST_SHARE), names + WIDEST * QFontMetricsF(font).height() / 16) + 1

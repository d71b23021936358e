"""The member as shapes on the screen: to scale in length, widths exaggerated evenly."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from PySide6.QtCore import QPointF, QRectF
from PySide6.QtGui import QPainterPath, QPolygonF

from app.bench.pictures.axes import Axis
from solver import Case
from solver.model.member import Segment

#: Share of the picture's width that the widest part takes, and the most and least pixels for it at 100 %.
WIDEST_SHARE, WIDEST, NARROWEST = 0.16, 34.0, 2.0


@dataclass(frozen=True)
class Piece:
    """One segment on the screen: `pointer` relative to the case, its distances (m), its half widths (pixels)."""

    pointer: str
    segment: Segment
    start: float
    end: float
    half_top: float
    half_bottom: float

    def path(self, centre: float, axis: Axis) -> QPainterPath:
        top, bottom = axis.at(self.start), axis.at(self.end)
        path = QPainterPath()
        path.addPolygon(
            QPolygonF(
                [
                    QPointF(centre - self.half_top, top),
                    QPointF(centre + self.half_top, top),
                    QPointF(centre + self.half_bottom, bottom),
                    QPointF(centre - self.half_bottom, bottom),
                ]
            )
        )
        path.closeSubpath()
        return path


@dataclass(frozen=True)
class Pieces:
    """All that is drawn to scale: the member, and a rod that strikes above it. `widest` is in pixels."""

    member: tuple[Piece, ...]
    striking: tuple[Piece, ...]
    widest: float

    def half_width_at(self, place: float) -> float:
        """Half the width (pixels) at a distance (m), of the nearest piece."""
        pieces = self.member if place >= 0 or not self.striking else self.striking
        piece = next((p for p in pieces if p.start <= place <= p.end), pieces[-1])
        span = piece.end - piece.start
        share = min(max((place - piece.start) / span, 0.0), 1.0) if span else 0.0
        return piece.half_top + share * (piece.half_bottom - piece.half_top)


def pieces_of(case: Case, width: float, scale: float) -> Pieces:
    """Shapes for a picture so many pixels wide, `scale` being the size of its letters against 100 %."""
    widest_real = max(
        _width(segment, at_end)
        for segment in (*case.member.segments, *case.ram_segments)
        for at_end in (False, True)
    )
    widest = min(WIDEST_SHARE * width, WIDEST * scale)
    per_metre = widest / widest_real
    above = -sum(segment.length for segment in case.ram_segments)
    base = "load/segments" if case.load.kind == "striker" else "load/ram/segments"
    return Pieces(
        tuple(_pieces("member/segments", case.member.segments, 0.0, per_metre)),
        tuple(_pieces(base, case.ram_segments, above, per_metre)),
        widest,
    )


def band(axis: Axis, start: float, end: float, left: float, right: float) -> QRectF:
    """Rectangle between two distances."""
    return QRectF(QPointF(left, axis.at(start)), QPointF(right, axis.at(end)))


def _pieces(base: str, segments: tuple[Segment, ...], start: float, per_metre: float) -> Iterator[Piece]:
    for index, segment in enumerate(segments):
        end = start + segment.length
        halves = [max(_width(segment, at_end) * per_metre, NARROWEST) / 2 for at_end in (False, True)]
        yield Piece(f"{base}/{index}", segment, start, end, *halves)
        start = end


def _width(segment: Segment, at_end: bool) -> float:
    section = segment.end_section if at_end and segment.end_section is not None else segment.section
    return section.round_width

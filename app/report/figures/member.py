"""The member with what strikes it and what holds it: to scale in length, widths exaggerated evenly."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from app.look.colours import PRINT
from app.report.figures.marks import Anchor, Figure, Mark, Path, Text, box, line
from app.report.figures.plot import SMALL, WIDTH
from app.report.figures.scales import Scale, tick_texts
from app.report.lettering import fitted
from app.units import Units
from solver import Case
from solver.model.load import Drop
from solver.model.member import Segment

HEIGHT, TOP, BOTTOM = 330.0, 78.0, 312.0
CENTRE, WIDEST = 215.0, 26.0
#: Names stand so far apart at least; where there are more, they are left out and the tables tell them.
APART = SMALL + 2.0
#: From a distance (m) to its place on the sheet (points).
Place = Callable[[float], float]


class _Column:
    """Names on one side, each not nearer than `APART` to the one above it."""

    def __init__(self, x: float, room: float, anchor: Anchor) -> None:
        self.x, self.room, self.anchor, self.last = x, room, anchor, -1e9

    def name(self, y: float, text: str, colour: str, marks: list[Mark]) -> None:
        if y - self.last < APART:
            return
        self.last = y
        marks.append(Text(self.x, y + 2.5, fitted(text, SMALL, self.room), colour, SMALL, self.anchor))


def member_figure(case: Case, units: Units) -> Figure:
    """Segments and gauges, the ground with its layers, and the load on top."""
    length = case.member.length
    marks: list[Mark] = []

    def at(distance: float) -> float:
        return TOP + (BOTTOM - TOP) * distance / length

    widest = max(
        part.round_width
        for s in (*case.member.segments, *case.ram_segments)
        for part in (s.section, s.end_section or s.section)
    )
    _ground(case, units, at, marks)
    start, names = 0.0, _Column(CENTRE + WIDEST + 62, 190, "start")
    for segment in case.member.segments:
        end = start + segment.length
        marks.append(_piece(segment, at(start), at(end), WIDEST / widest))
        joint = segment.joint_above
        if joint.kind != "bonded":
            y = at(start)
            marks.append(line([(CENTRE - WIDEST, y), (CENTRE + WIDEST, y)], PRINT.over, 1.4))
            gap = joint.gap if joint.kind == "contact" else joint.slack
            told = f"{joint.kind.replace('_', ' ')}, {units.show(gap, 'small_length')}"
            names.name(y, told, PRINT.over, marks)
        told = f"{segment.name}: {units.show(segment.length, 'length')}, {segment.material}"
        names.name((at(start) + at(end)) / 2, told, PRINT.ink, marks)
        start = end
    _load(case, units, marks)
    _gauges(case, units, at, marks)
    _far_end(case, marks)
    _distances(length, units, marks)
    return Figure("The member, what strikes it and what holds it", WIDTH, HEIGHT, tuple(marks))


def _piece(segment: Segment, top: float, bottom: float, scale: float) -> Path:
    first = max(segment.section.round_width * scale, 3.0)
    last = max((segment.end_section or segment.section).round_width * scale, 3.0)
    corners = [
        (CENTRE - first / 2, top),
        (CENTRE + first / 2, top),
        (CENTRE + last / 2, bottom),
        (CENTRE - last / 2, bottom),
    ]
    return Path(np.array(corners), PRINT.ink, 0.8, PRINT.pressed, closed=True)


def _ground(case: Case, units: Units, at: Place, marks: list[Mark]) -> None:
    ground = case.ground
    if ground is None:
        return
    left, wide, length = 30.0, CENTRE + 60 - 30, case.member.length
    surface = min(ground.surface, length)
    if ground.layers:
        bands, top = [], ground.surface
        for layer in ground.layers:
            bands.append((layer.name, top, top + layer.thickness))
            top += layer.thickness
    else:
        bands = [("shaft resistance" if ground.shaft_total else "ground", surface, length)]
    names = _Column(left + 4, CENTRE - WIDEST - 60, "start")
    for number, (name, top, bottom) in enumerate(bands):
        top, bottom = at(min(top, length)), min(at(bottom), BOTTOM + 12)
        if bottom <= top:
            continue
        marks.append(box(left, top, wide, bottom - top, PRINT.ground[number % len(PRINT.ground)]))
        names.name(min(top + 8, (top + bottom) / 2), name, PRINT.soft_ink, marks)
    y = at(surface)
    marks.append(line([(left, y), (left + wide, y)], PRINT.ground_line, 1.2))
    marks.append(
        Text(left, y - 3, f"ground, {units.show(ground.surface, 'length')}", PRINT.ground_line, SMALL)
    )


def _load(case: Case, units: Units, marks: list[Mark]) -> None:
    load, y = case.load, TOP
    told: list[str] = []
    if isinstance(load, Drop):
        for part, height, fill, there in (
            ("pile cushion", 6.0, PRINT.cushion, load.pile_cushion is not None),
            ("cap", 9.0, PRINT.bars[1], load.cap_mass > 0),
            ("cushion", 6.0, PRINT.cushion, load.cushion is not None),
            ("ram", 20.0, PRINT.bars[0], True),
        ):
            if there:
                y -= height
                marks.append(box(CENTRE - WIDEST / 2, y, WIDEST, height, fill, PRINT.ink, 0.6))
                told.append(part)
        words = ", ".join(reversed(told))
    elif load.kind == "striker":
        marks.append(box(CENTRE - WIDEST / 3, TOP - 40, WIDEST / 1.5, 36, PRINT.bars[0], PRINT.ink, 0.6))
        words = f"striker, {units.show(load.velocity, 'velocity')}"
        y = TOP - 40
    elif load.kind == "none":
        words = "no load; the member moves at the start"
    else:
        marks.append(line([(CENTRE, TOP - 34), (CENTRE, TOP - 3)], PRINT.ink, 1.6))
        head = [(CENTRE - 4, TOP - 9), (CENTRE, TOP - 2), (CENTRE + 4, TOP - 9)]
        marks.append(Path(np.array(head, dtype=float), fill=PRINT.ink, closed=True))
        words = f"{load.quantity} at the struck end"
        y = TOP - 34
    marks.append(Text(CENTRE + WIDEST, min(y + 8, TOP - 8), words, PRINT.ink, SMALL))


def _gauges(case: Case, units: Units, at: Place, marks: list[Mark]) -> None:
    names = _Column(CENTRE - WIDEST / 2 - 14, 120, "end")
    for number, gauge in sorted(enumerate(case.gauges), key=lambda pair: pair[1].position):
        if gauge.on != "member":
            continue
        y, hue = at(gauge.position), PRINT.gauge(number)
        for side in (-1, 1):
            x = CENTRE + side * (WIDEST / 2 + 3)
            triangle = [(x, y), (x + side * 6, y - 3.5), (x + side * 6, y + 3.5)]
            marks.append(Path(np.array(triangle), fill=hue, closed=True))
        names.name(y, f"{gauge.name}, {units.show(gauge.position, 'length')}", hue, marks)


def _far_end(case: Case, marks: list[Mark]) -> None:
    kind = case.far_end.kind
    words = {
        "free": "free end",
        "fixed": "fixed end",
        "spring": "spring at the far end",
        "dashpot": "dashpot at the far end",
        "matched": "goes on unchanged for ever",
        "wall": "rigid wall",
        "ground": "toe in the ground",
    }[kind]
    if kind in ("fixed", "wall", "spring", "dashpot"):
        marks.append(line([(CENTRE - 24, BOTTOM + 2), (CENTRE + 24, BOTTOM + 2)], PRINT.ink, 2.0))
    marks.append(Text(CENTRE, BOTTOM + 13, words, PRINT.ink, SMALL, "middle"))


def _distances(length: float, units: Units, marks: list[Mark]) -> None:
    scale = Scale(0.0, float(units.number(length, "length")), TOP, BOTTOM)
    x, ticks = CENTRE + WIDEST + 34, scale.ticks(10)
    marks.append(line([(x, TOP), (x, BOTTOM)], PRINT.line, 0.6))
    for value, text in zip(ticks, tick_texts(ticks), strict=True):
        y = scale.at(value)
        marks.append(line([(x, y), (x + 3, y)], PRINT.line, 0.6))
        marks.append(Text(x + 5, y + 2.5, text, PRINT.soft_ink, SMALL))
    marks.append(Text(x, TOP - 6, units.unit("length"), PRINT.soft_ink, SMALL))

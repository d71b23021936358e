"""The picture of a study of depths: the member in its ground, and on the same axis what a blow does at each depth."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from itertools import pairwise

from app.set_sheet.chart import BROKEN, DOTTED, limit_words
from app.set_sheet.frame import Rows, case_limits, numbers_below, panel, rows_of, spans_of
from app.set_sheet.scales import Scale, number, root_ticks, ticks
from app.set_sheet.scene import (
    Anchor,
    Area,
    Letters,
    Line,
    Mark,
    Scene,
    Words,
    box_of,
    fitted,
    overlap,
    touches,
)
from app.units import NO_BREAK, Units
from solver import Case
from solver.studies.depth import REFUSAL, DepthPoint, Depths

#: Panels: the member, resistances, set, stresses, time.
SHARES = (0.17, 0.23, 0.2, 0.24, 0.16)
#: Of what stands above the ground so much is drawn, as a share of the deepest penetration.
ABOVE = 0.22
#: Half of the member's width in the drawing.
HALF = 6.0

Across = Callable[[DepthPoint], float | None]


@dataclass(frozen=True)
class DepthFrame:
    """Where the panels lie; `down` holds depths below the surface of the ground (m)."""

    down: Scale
    spans: list[tuple[float, float]]
    rows: Rows
    letters: Letters


def depth_frame(
    depths: Depths, case: Case, units: Units, width: float, height: float, letters: Letters
) -> DepthFrame:
    rows = rows_of(height, letters)
    surface = case.ground.surface if case.ground else 0.0
    deepest = max([p.penetration for p in depths.points] + [case.member.length - surface])
    above = min(surface, ABOVE * deepest) + 0.02 * deepest
    widest = max(letters.width(number(v), "small") for v in (units.number(deepest, "length") // 1, 88))
    left = 1.2 * letters.line + 16 + widest
    return DepthFrame(
        Scale(-above, deepest * 1.04, rows.top, rows.foot), spans_of(left, width, SHARES), rows, letters
    )


def depth_chart(
    depths: Depths, case: Case, units: Units, width: float, height: float, letters: Letters
) -> Scene:
    """Everything to draw, back to front."""
    frame = depth_frame(depths, case, units, width, height, letters)
    points = [p for p in depths.points if p.cell.set is not None]
    scene: Scene = []
    _ground(scene, frame, case)
    _axis(scene, frame, units)
    at_surface = frame.down.at(0.0)
    scene.append(
        Line(((frame.spans[0][0], at_surface), (frame.spans[-1][1], at_surface)), "ground_line", 1.2)
    )
    _member(scene, frame, case)
    if points:
        _resistance(scene, frame, points, units)
        _set(scene, frame, points, units)
        _stress(scene, frame, points, case, units)
        _time(scene, frame, depths)
        _named(scene, frame, depths, units)
    return scene


def _axis(scene: Scene, frame: DepthFrame, units: Units) -> None:
    down, rows = frame.down, frame.rows
    one = 1 / units.number(1.0, "length")
    most = max(2, int((rows.foot - rows.top) / (1.8 * frame.letters.line)))
    for value in ticks(0.0, down.high / one, min(most, 9)):
        y = down.at(value * one)
        for start, stop in frame.spans[1:]:
            scene.append(Line(((start, y), (stop, y)), "grid"))
        at = (frame.spans[0][0] - 7, y + 0.28 * frame.letters.line)
        scene.append(Words(at, number(value), "soft_ink", anchor="right"))
    at = (0.6 * frame.letters.line + 2, (rows.top + rows.foot) / 2)
    words = f"Below the ground surface, {units.unit('length')}"
    scene.append(Words(at, words, "ink", "small", "middle", turned=True))


def _ground(scene: Scene, frame: DepthFrame, case: Case) -> None:
    """Layers behind all panels, their names beside the member."""
    down, letters = frame.down, frame.letters
    left, right = frame.spans[0][0], frame.spans[-1][1]
    name_at = left + 2 * HALF + 15
    for index, (name, top, bottom) in enumerate(layers_of(case)):
        if top >= down.high:
            break
        y0, y1 = down.at(top), down.at(min(bottom, down.high))
        if index % 2 == 0:
            scene.append(Area(((left, y0), (right, y0), (right, y1), (left, y1)), "grid", 0.28))
        for number_of_line, text in enumerate(_wrapped(name, frame.spans[0][1] - name_at, letters), start=1):
            y = y0 + number_of_line * letters.line
            if y + 0.25 * letters.line < y1:
                scene.append(Words((name_at, y), text, "ground_line"))


def _wrapped(name: str, room: float, letters: Letters) -> list[str]:
    """A name in lines that fit, cut only within a word that is too long."""
    lines: list[str] = []
    for word in name.split():
        longer = f"{lines[-1]} {word}" if lines else word
        if lines and letters.width(longer, "small") <= room:
            lines[-1] = longer
        else:
            lines.append(word)
    return [fitted((line,), room, letters) for line in lines]


def _member(scene: Scene, frame: DepthFrame, case: Case) -> None:
    """As deep as the case has it; what stands far above the ground is cut off, with a sign that it goes on."""
    down, start = frame.down, frame.spans[0][0]
    surface = case.ground.surface if case.ground else 0.0
    x, y = start + HALF + 10, -surface
    for segment in case.member.segments:
        top, bottom = max(y, down.low), y + segment.length
        if bottom > down.low:
            corners = [(x - HALF, down.at(top)), (x + HALF, down.at(top))]
            corners += [(x + HALF, down.at(bottom)), (x - HALF, down.at(bottom))]
            scene.append(Area(tuple(corners), "line", 0.45))
            scene.append(Line((*corners, corners[0]), "soft_ink"))
        y = bottom
    if -surface < down.low:
        cut = down.at(down.low)
        scene.append(Line(((x - HALF - 4, cut + 5), (x + HALF + 4, cut - 1)), "soft_ink", 1.4))
        scene.append(Line(((x - HALF - 4, cut + 9), (x + HALF + 4, cut + 3)), "soft_ink", 1.4))
    title = fitted(("Member",), frame.spans[0][1] - start + 20, frame.letters, "strong")
    scene.append(Words((start, frame.rows.title), title, "ink", "strong"))


def layers_of(case: Case) -> tuple[tuple[str, float, float], ...]:
    """Name, top and bottom of each layer as depths below the surface of the ground, m."""
    found, top = [], 0.0
    for layer in case.ground.layers if case.ground else ():
        found.append((layer.name, top, top + layer.thickness))
        top += layer.thickness
    return tuple(found)


def _curve(
    scene: Scene, frame: DepthFrame, points: Sequence[DepthPoint], across: Across, ink: str, shape: int = 0
) -> None:
    placed = [(p, (x, frame.down.at(p.penetration))) for p in points if (x := across(p)) is not None]
    for (a, first), (b, second) in pairwise(placed):
        scene.append(Line((first, second), ink, 1.6, BROKEN if a.cell.over or b.cell.over else ()))
    for point, at in placed:
        scene.append(Mark(at, shape, ink, filled=point.cell.moves, size=3.0))


def _resistance(scene: Scene, frame: DepthFrame, points: Sequence[DepthPoint], units: Units) -> None:
    scale = Scale(0.0, max(p.shaft + p.toe for p in points) * 1.1, *frame.spans[1])
    panel(
        scene,
        frame.rows,
        scale,
        ("Resistance",),
        (f"{units.unit('force')} while driving", units.unit("force")),
        frame.letters,
    )
    one = 1 / units.number(1.0, "force")
    numbers_below(scene, frame.rows, scale, ticks(0.0, scale.high / one, 4), one, frame.letters)
    parts: tuple[tuple[str, Across, str], ...] = (
        ("shaft", lambda p: scale.at(p.shaft), "soft_ink"),
        ("toe", lambda p: scale.at(p.toe), "soft_ink"),
        ("together", lambda p: scale.at(p.shaft + p.toe), "ink"),
    )
    x, y = scale.start, frame.rows.first
    for index, (name, across, ink) in enumerate(parts):
        shape = (1, 2, 0)[index]
        _curve(scene, frame, points, across, ink, shape)
        width = frame.letters.width(name, "small") + 14
        if x + width > scale.stop + 8 and x > scale.start:
            x, y = scale.start, frame.rows.second
        scene.append(Mark((x + 4, y - 0.28 * frame.letters.line), shape, ink, size=3.0))
        scene.append(Words((x + 11, y), name, ink))
        x += width + 8


def _set(scene: Scene, frame: DepthFrame, points: Sequence[DepthPoint], units: Units) -> None:
    largest = max([p.cell.set or 0.0 for p in points] + [0.002])
    scale = Scale(0.0, largest * 1.08, *frame.spans[2], root=True)
    unit, one = units.unit("small_length"), 1 / units.number(1.0, "small_length")
    captions = (f"{unit} (scale of square roots)", f"{unit}, square roots", unit)
    panel(scene, frame.rows, scale, ("Set per blow", "Set"), captions, frame.letters)
    numbers_below(scene, frame.rows, scale, root_ticks(scale.high / one), one, frame.letters)
    x = scale.at(REFUSAL)
    if x < scale.stop:
        scene.append(Line(((x, frame.rows.foot), (x, frame.rows.top)), "ink", 1.0, DOTTED))
    words = f"refusal below {units.show(REFUSAL, 'small_length', 2)}"
    text = fitted((words, "refusal"), scale.stop - scale.start + 12, frame.letters)
    scene.append(Words((scale.start, frame.rows.second), text, "soft_ink"))

    def at_set(point: DepthPoint) -> float:
        return scale.at(point.cell.set if point.cell.set and point.cell.moves else 0.0)

    _curve(scene, frame, points, at_set, "ink")


def _stress(scene: Scene, frame: DepthFrame, points: Sequence[DepthPoint], case: Case, units: Units) -> None:
    push, limits = (1 if units.compression_positive else -1), case_limits(case)
    most = {
        "compression": max(p.cell.compression.peak.value for p in points if p.cell.compression),
        "tension": max(p.cell.tension.peak.value for p in points if p.cell.tension),
    }
    most["tension"] = max(most["tension"], 0.12 * most["compression"])
    reach = {s: max([v, *(x for x in limits[s] if x < 1.8 * v)]) * 1.1 for s, v in most.items()}
    first, second = ("tension", "compression") if push > 0 else ("compression", "tension")
    scale = Scale(-reach[first], reach[second], *frame.spans[3])
    unit, one = units.unit("stress"), 1 / units.number(1.0, "stress")
    panel(
        scene,
        frame.rows,
        scale,
        ("Peak stresses", "Stresses"),
        (f"{unit}, {second} positive", f"{unit}, {second} +", unit),
        frame.letters,
    )
    numbers_below(scene, frame.rows, scale, ticks(scale.low / one, scale.high / one, 5), one, frame.letters)
    for sign, side, y in (("compression", push, frame.rows.first), ("tension", -push, frame.rows.second)):
        limit_words(scene, scale, sign, limits[sign], side, y, frame.letters, units)
        for value in limits[sign]:
            if scale.low <= side * value <= scale.high:
                x = scale.at(side * value)
                scene.append(Line(((x, frame.rows.foot), (x, frame.rows.top)), sign, 1.0, DOTTED))
        _curve(scene, frame, points, _peak(sign, scale, side), sign)


def _peak(sign: str, scale: Scale, side: int) -> Across:
    def across(point: DepthPoint) -> float | None:
        finding = point.cell.compression if sign == "compression" else point.cell.tension
        return None if finding is None else scale.at(side * finding.peak.value)

    return across


def _time(scene: Scene, frame: DepthFrame, depths: Depths) -> None:
    known = {
        p.penetration: s / 60 for p, s in zip(depths.points, depths.seconds, strict=True) if s < float("inf")
    }
    scale = Scale(0.0, max([*known.values(), 0.1]) * 1.1, *frame.spans[4])
    panel(
        scene,
        frame.rows,
        scale,
        ("Driving time", "Time"),
        ("minutes from the first depth", "minutes"),
        frame.letters,
    )
    numbers_below(scene, frame.rows, scale, ticks(0.0, scale.high, 3), 1.0, frame.letters)
    points = [p for p in depths.points if p.penetration in known and p.cell.set is not None]
    _curve(scene, frame, points, lambda p: scale.at(known[p.penetration]), "ink")


def _named(scene: Scene, frame: DepthFrame, depths: Depths, units: Units) -> None:
    """The first depth where the member refuses, and where a limit is passed, written where no curve runs."""
    for point, (start, stop), words in (
        (depths.first_refusal, frame.spans[2], "refuses from"),
        (depths.first_over, frame.spans[3], "✕ limit passed from"),
    ):
        if point is None:
            continue
        y = frame.down.at(point.penetration)
        scene.append(Line(((start, y), (stop, y)), "over", 1.2))
        depth = units.show(point.penetration, "length")
        below = y + 0.9 * frame.letters.line
        sides: tuple[tuple[float, Anchor], ...] = ((stop - 3, "right"), (start + 3, "left"))
        candidates = [
            Words((x, at), text, "over", "small", anchor)
            for text in (f"{words} {depth}", f"✕ {depth}", f"✕ {depth.split(NO_BREAK)[0]}")
            for x, anchor in sides
            for at in (y - 4, below)
        ]
        inside = [w for w in candidates if frame.letters.width(w.text, "small") < stop - start - 6]
        scene.append(
            next((w for w in inside if _clear(scene, w, frame)), inside[-1] if inside else candidates[-1])
        )


def _clear(scene: Scene, words: Words, frame: DepthFrame) -> bool:
    box = box_of(words, frame.letters)
    curves = [i for i in scene if isinstance(i, Line) and (i.width == 1.6 or i.dash == DOTTED)]
    others = [box_of(i, frame.letters) for i in scene if isinstance(i, Words)]
    return not any(touches(box, one) for one in curves) and not any(overlap(box, one) for one in others)

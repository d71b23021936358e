"""The picture of a study of depths: depth downwards as on the member drawing, layers behind, a panel for each thing."""

from __future__ import annotations

from collections.abc import Callable
from itertools import pairwise

from app.set_sheet.scales import Scale, number, root_ticks, ticks
from app.set_sheet.scene import Anchor, Area, Line, Mark, Measure, Scene, Words
from app.set_sheet.words import force_text
from app.units import Units
from solver.studies.depth import REFUSAL, DepthPoint, Depths

LEFT, RIGHT, GAP = 62.0, 16.0, 26.0
TOP, BOTTOM = 62.0, 46.0
BROKEN = (5.0, 3.5)
SHARES = (0.28, 0.24, 0.28, 0.20)

Across = Callable[[DepthPoint], float | None]


def depth_chart(
    depths: Depths,
    layers: tuple[tuple[str, float, float], ...],
    limits: dict[str, list[float]],
    units: Units,
    width: float,
    height: float,
    measure: Measure,
) -> Scene:
    """Everything to draw. `layers`: name, top and bottom as depths below the surface of the ground (m)."""
    points = [p for p in depths.points if p.cell.set is not None]
    deepest = max(p.penetration for p in depths.points)
    down = Scale(0.0, deepest * 1.04, TOP, height - BOTTOM)
    room = width - LEFT - RIGHT - 3 * GAP
    starts = [LEFT + room * sum(SHARES[:i]) + GAP * i for i in range(4)]
    spans = [(start, start + room * share) for start, share in zip(starts, SHARES, strict=True)]
    scene: Scene = []
    _ground(scene, down, spans, layers, units, measure)
    if not points:
        return scene
    _resistance(scene, down, spans[0], points, units)
    _set(scene, down, spans[1], points, units)
    _stress(scene, down, spans[2], points, limits, units)
    _time(scene, down, spans[3], depths, units)
    _named(scene, down, spans, depths, units)
    return scene


def _ground(
    scene: Scene,
    down: Scale,
    spans: list[tuple[float, float]],
    layers: tuple[tuple[str, float, float], ...],
    units: Units,
    measure: Measure,
) -> None:
    left, right = spans[0][0], spans[-1][1]
    for index, (_name, top, bottom) in enumerate(layers):
        y0, y1 = down.at(top), down.at(min(bottom, down.high))
        if top < down.high and index % 2 == 0:
            scene.append(Area(((left, y0), (right, y0), (right, y1), (left, y1)), "grid", 0.28))
    one = 1 / units.number(1.0, "length")
    for value in ticks(0.0, down.high / one, 9):
        y = down.at(value * one)
        for start, stop in spans:
            scene.append(Line(((start, y), (stop, y)), "grid"))
        scene.append(Words((LEFT - 7, y + 4), number(value), "soft_ink", anchor="right"))
    middle = (down.start + down.stop) / 2
    scene.append(
        Words((14, middle), f"Penetration, {units.unit('length')}", "ink", "small", "middle", turned=True)
    )
    for name, top, bottom in layers:
        if top < down.high:
            room = down.at(min(bottom, down.high)) - down.at(top)
            if room > 14:
                x = spans[0][1] - 4
                scene.append(Words((x, down.at(top) + 13), name, "ground_line", "small", "right"))


def _panel(scene: Scene, down: Scale, scale: Scale, title: str, below: str) -> None:
    scene.append(Line(((scale.start, down.stop), (scale.stop, down.stop)), "line"))
    scene.append(Line(((scale.start, down.start), (scale.start, down.stop)), "line"))
    scene.append(Words((scale.start, 16), title, "ink", "strong"))
    middle = (scale.start + scale.stop) / 2
    scene.append(Words((middle, down.stop + 38), below, "soft_ink", "small", "middle"))


def _grid(scene: Scene, down: Scale, scale: Scale, values: list[float], one: float) -> None:
    taken = -1e9
    for value in values:
        x = scale.at(value * one)
        scene.append(Line(((x, down.start), (x, down.stop)), "grid"))
        if x - taken > 24:
            scene.append(Words((x, down.stop + 16), number(value), "soft_ink", anchor="middle"))
            taken = x


def _curve(scene: Scene, down: Scale, points: list[DepthPoint], across: Across, ink: str, shape: int) -> None:
    placed = [(p, (x, down.at(p.penetration))) for p in points if (x := across(p)) is not None]
    for (a, first), (b, second) in pairwise(placed):
        scene.append(Line((first, second), ink, 1.6, BROKEN if a.cell.over or b.cell.over else ()))
    for point, at in placed:
        scene.append(Mark(at, shape, ink, filled=point.cell.moves, size=3.0))


def _resistance(
    scene: Scene, down: Scale, span: tuple[float, float], points: list[DepthPoint], units: Units
) -> None:
    scale = Scale(0.0, max(p.shaft + p.toe for p in points) * 1.1, *span)
    _panel(scene, down, scale, "Resistance while driving", units.unit("force"))
    one = 1 / units.number(1.0, "force")
    _grid(scene, down, scale, ticks(0.0, scale.high / one, 4), one)
    _curve(scene, down, points, lambda p: scale.at(p.shaft), "soft_ink", 1)
    _curve(scene, down, points, lambda p: scale.at(p.shaft + p.toe), "ink", 0)
    first = points[0]
    y = down.start - 8
    scene.append(Words((scale.at(first.shaft), y), "shaft", "soft_ink", "small", "left"))
    scene.append(Words((span[1], y), "with the toe", "ink", "small", "right"))


def _set(
    scene: Scene, down: Scale, span: tuple[float, float], points: list[DepthPoint], units: Units
) -> None:
    largest = max([p.cell.set or 0.0 for p in points] + [0.002])
    scale = Scale(0.0, largest * 1.08, *span, root=True)
    unit = units.unit("small_length")
    _panel(scene, down, scale, "Set per blow", f"{unit} (scale of square roots)")
    one = 1 / units.number(1.0, "small_length")
    _grid(scene, down, scale, root_ticks(scale.high / one), one)
    x = scale.at(REFUSAL)
    scene.append(Line(((x, down.start), (x, down.stop)), "ink", 1.0, (1.5, 2.5)))
    scene.append(Words((x, down.start - 8), "refusal", "ink", "small"))
    _curve(
        scene, down, points, lambda p: scale.at(p.cell.set if p.cell.set and p.cell.moves else 0.0), "ink", 0
    )


def _stress(
    scene: Scene,
    down: Scale,
    span: tuple[float, float],
    points: list[DepthPoint],
    limits: dict[str, list[float]],
    units: Units,
) -> None:
    push = 1.0 if units.compression_positive else -1.0
    most = {
        "compression": max(p.cell.compression.peak.value for p in points if p.cell.compression),
        "tension": max(p.cell.tension.peak.value for p in points if p.cell.tension),
    }
    most["tension"] = max(most["tension"], 0.12 * most["compression"])
    reach = {s: max([v, *(x for x in limits[s] if x < 1.8 * v)]) * 1.1 for s, v in most.items()}
    low, high = (
        (-reach["tension"], reach["compression"]) if push > 0 else (-reach["compression"], reach["tension"])
    )
    scale = Scale(low, high, *span)
    positive = "compression" if push > 0 else "tension"
    _panel(scene, down, scale, "Peak stresses", f"{units.unit('stress')}, {positive} positive")
    one = 1 / units.number(1.0, "stress")
    _grid(scene, down, scale, ticks(low / one, high / one, 5), one)
    for sign, side in (("compression", push), ("tension", -push)):
        anchor: Anchor = "right" if side > 0 else "left"
        edge = scale.stop if side > 0 else scale.start
        beyond = [v for v in limits[sign] if not low <= side * v <= high]
        words = f"{sign}, limit {units.show(beyond[0], 'stress')}" if beyond else sign
        words = words if limits[sign] else f"{sign}, no limit"
        scene.append(Words((edge, down.start - 24), words, sign, "small", anchor))
        for value in limits[sign]:
            if value not in beyond:
                x = scale.at(side * value)
                scene.append(Line(((x, down.start), (x, down.stop)), sign, 1.0, (1.5, 2.5)))
                scene.append(
                    Words((x, down.start - 8), f"limit {units.show(value, 'stress')}", sign, "small", anchor)
                )
    _curve(scene, down, points, lambda p: _peak(p, "compression", scale, push), "compression", 0)
    _curve(scene, down, points, lambda p: _peak(p, "tension", scale, -push), "tension", 0)


def _peak(point: DepthPoint, sign: str, scale: Scale, side: float) -> float | None:
    finding = point.cell.compression if sign == "compression" else point.cell.tension
    return None if finding is None else scale.at(side * finding.peak.value)


def _time(scene: Scene, down: Scale, span: tuple[float, float], depths: Depths, units: Units) -> None:
    known = [(p, s) for p, s in zip(depths.points, depths.seconds, strict=True) if s < float("inf")]
    scale = Scale(0.0, max([s / 60 for _p, s in known] + [0.1]) * 1.1, *span)
    _panel(scene, down, scale, "Driving time", "minutes from the first depth")
    _grid(scene, down, scale, ticks(0.0, scale.high, 3), 1.0)
    at = {p.penetration: scale.at(s / 60) for p, s in known}
    _curve(scene, down, [p for p, _s in known], lambda p: at[p.penetration], "ink", 0)


def _named(scene: Scene, down: Scale, spans: list[tuple[float, float]], depths: Depths, units: Units) -> None:
    """The first depth where the member refuses, and where a limit is passed."""
    for point, span, words in (
        (depths.first_refusal, spans[1], "refuses from"),
        (depths.first_over, spans[2], "✕ limit passed from"),
    ):
        if point is not None:
            y = down.at(point.penetration)
            scene.append(Line(((span[0], y), (span[1], y)), "over", 1.2))
            text = f"{words} {units.show(point.penetration, 'length')}"
            scene.append(Words((span[1] - 4, y - 5), text, "over", "small", "right"))


def depth_summary(depths: Depths, units: Units) -> str:
    """One line below the picture."""
    last = depths.points[-1]
    parts = [f"At {units.show(last.penetration, 'length')}: {force_text(last.shaft + last.toe, units)}"]
    blows, seconds = depths.blows[-1], depths.seconds[-1]
    first = units.show(depths.points[0].penetration, "length")
    if blows < float("inf"):
        parts.append(f"{blows:.0f} blows and {seconds / 60:.0f} minutes from {first} on")
    refusal, over = depths.first_refusal, depths.first_over
    if refusal is None:
        parts.append("the member does not refuse on the way")
    else:
        parts.append(
            f"refuses at {units.show(refusal.penetration, 'length')} (set below {units.show(REFUSAL, 'small_length')})"
        )
    if over is not None and over.cell.worst is not None:
        sign, stress = over.cell.worst
        place = f"{stress.segment} at {units.show(stress.position, 'length')}"
        parts.append(f"✕ {sign} limit passed from {units.show(over.penetration, 'length')} on, in {place}")
    elif any(p.cell.share is not None for p in depths.points):
        parts.append("✓ within limits all the way")
    else:
        parts.append("no limit given")
    failed = [p for p in depths.points if p.cell.problem]
    if failed:
        parts.append(f"not solved at {units.show(failed[0].penetration, 'length')}: {failed[0].cell.problem}")
    return " · ".join(parts)

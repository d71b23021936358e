"""The picture of a set sheet: set across, resistance up; beside it, on the same axis, stresses and energy.

A line is solid where the member is within its limits and broken where one is passed; there the place is named.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from itertools import pairwise

from app.set_sheet.scales import Scale, number, root_ticks, ticks
from app.set_sheet.scene import Anchor, Area, Level, Line, Mark, Measure, Scene, Words
from app.set_sheet.words import PER, level_text, over_lines
from app.units import Units
from solver import Case
from solver.studies import Cell, Sheet
from solver.studies.uncertainty import Bands

LEFT, RIGHT, GAP = 62.0, 14.0, 26.0
TOP, BOTTOM = 62.0, 46.0
BROKEN = (5.0, 3.5)
WIDTHS = (2.0, 1.5, 1.5, 1.5)
LINE = 14.0


@dataclass(frozen=True)
class Frame:
    """Where the three panels lie, and their scales."""

    resistance: Scale
    set: Scale
    stress: Scale
    energy: Scale


def frame_of(sheet: Sheet, units: Units, width: float, height: float, bands: Bands | None = None) -> Frame:
    """Scales in SI that hold everything of the sheet."""
    cells = [c for c in sheet.cells if c.set is not None]
    plan = sheet.plan
    low, high = min(plan.resistances), max(plan.resistances)
    room = width - LEFT - RIGHT - 2 * GAP
    edges = [
        LEFT,
        LEFT + 0.5 * room,
        LEFT + 0.5 * room + GAP,
        LEFT + 0.81 * room + GAP,
        LEFT + 0.81 * room + 2 * GAP,
    ]
    most_set = max(
        [c.set or 0.0 for c in cells] + ([float(bands.set[:, 2].max())] if bands else []), default=0.01
    )
    comp = max((c.compression.peak.value for c in cells if c.compression), default=1e6)
    tens = max((c.tension.peak.value for c in cells if c.tension), default=0.0)
    limits = case_limits(sheet.plan.case)
    # a limit far beyond what occurs is told, but does not squeeze the lines
    comp = max([comp, *(v for v in limits["compression"] if v < 1.8 * comp)]) * 1.08
    tens = max([tens, 0.12 * comp, *(v for v in limits["tension"] if v < max(4 * tens, 0.5 * comp))]) * 1.08
    sides = (-tens, comp) if units.compression_positive else (-comp, tens)
    energy = max((c.energy.value for c in cells if c.energy), default=1e3) * 1.12
    foot = 0.1 * (high - low)
    return Frame(
        Scale(low - foot, high + 0.06 * (high - low), height - BOTTOM, TOP),
        Scale(0.0, max(most_set, 0.002) * 1.06, edges[0], edges[1], root=True),
        Scale(*sides, edges[2], edges[3]),
        Scale(0.0, energy, edges[4], width - RIGHT),
    )


def case_limits(case: Case) -> dict[str, list[float]]:
    """The limits of the member's materials, Pa, each once."""
    found: dict[str, list[float]] = {}
    for sign in ("compression", "tension"):
        values = {case.material(s.material).limits.value(sign) for s in case.member.segments}
        found[sign] = sorted(v for v in values if v is not None)
    return found


def chart(
    sheet: Sheet,
    units: Units,
    per: str,
    width: float,
    height: float,
    measure: Measure,
    bands: Bands | None = None,
) -> Scene:
    """Everything to draw, back to front."""
    frame = frame_of(sheet, units, width, height, bands)
    scene: Scene = []
    _resistance_axis(scene, frame, units)
    _set_axis(scene, frame, units, per, measure)
    _stress_axis(scene, frame, sheet, units)
    _energy_axis(scene, frame, sheet, units)
    if bands is not None:
        _bands(scene, frame, bands)
    for index in range(len(sheet.plan.levels)):
        cells = [c for c in sheet.line(index) if c.set is not None]
        for where, ink in _places(frame, units):
            _line(scene, frame, cells, index, where, ink)
    _names(scene, frame, sheet, units, measure)
    return scene


def _places(frame: Frame, units: Units) -> Iterator[tuple[Callable[[Cell], float | None], str]]:
    """For each kind of line where a cell lies across, and its ink."""
    push = 1.0 if units.compression_positive else -1.0
    yield lambda c: frame.set.at(c.set) if c.set is not None and c.moves else frame.set.at(0.0), "ink"
    yield lambda c: frame.stress.at(push * c.compression.peak.value) if c.compression else None, "compression"
    yield lambda c: frame.stress.at(-push * c.tension.peak.value) if c.tension else None, "tension"
    yield lambda c: frame.energy.at(c.energy.value) if c.energy else None, "ink"


def _line(
    scene: Scene, frame: Frame, cells: list[Cell], index: int, where: Callable[[Cell], float | None], ink: str
) -> None:
    points = [(c, (x, frame.resistance.at(c.resistance))) for c in cells if (x := where(c)) is not None]
    width = WIDTHS[index % len(WIDTHS)]
    for (a, first), (b, second) in pairwise(points):
        scene.append(Line((first, second), ink, width, BROKEN if a.over or b.over else ()))
    for cell, at in points:
        scene.append(Mark(at, index, ink, filled=cell.moves))


def _resistance_axis(scene: Scene, frame: Frame, units: Units) -> None:
    scale = frame.resistance
    unit = units.unit("force")
    one = 1 / units.number(1.0, "force")
    panels = ((frame.set.start, frame.set.stop), (frame.stress.start, frame.stress.stop))
    for value in ticks(max(scale.low, 0.0) / one, scale.high / one, 9):
        y = scale.at(value * one)
        for start, stop in (*panels, (frame.energy.start, frame.energy.stop)):
            scene.append(Line(((start, y), (stop, y)), "grid"))
        scene.append(Words((LEFT - 7, y + 4), number(value), "soft_ink", anchor="right"))
    middle = (scale.start + scale.stop) / 2
    scene.append(Words((14, middle), f"Total resistance, {unit}", "ink", "small", "middle", turned=True))


def _panel(scene: Scene, scale: Scale, frame: Frame, title: str, below: str) -> None:
    y0, y1 = frame.resistance.start, frame.resistance.stop
    scene.append(Line(((scale.start, y0), (scale.stop, y0)), "line"))
    scene.append(Words((scale.start, 16), title, "ink", "strong"))
    scene.append(Words(((scale.start + scale.stop) / 2, y0 + 38), below, "soft_ink", "small", "middle"))
    scene.append(Line(((scale.start, y0), (scale.start, y1)), "line"))


def _set_axis(scene: Scene, frame: Frame, units: Units, per: str, measure: Measure) -> None:
    scale, unit = frame.set, units.unit("small_length")
    y0, y1 = frame.resistance.start, frame.resistance.stop
    one = 1 / units.number(1.0, "small_length")
    _panel(scene, scale, frame, "Set per blow", f"set per blow, {unit} (scale of square roots)")
    taken = -1e9
    for value in root_ticks(scale.high / one):
        x = scale.at(value * one)
        scene.append(Line(((x, y0), (x, y1)), "grid"))
        if x - taken > 22:
            scene.append(Words((x, y0 + 16), number(value), "soft_ink", anchor="middle"))
            taken = x
    scene.append(Line(((scale.start, y1), (scale.stop, y1)), "line"))
    length = PER[per]
    scene.append(Words((scale.stop, y1 - 24), f"blows per {per}", "soft_ink", "small", "right"))
    taken = 1e9
    for blows in (1, 2, 5, 10, 20, 30, 50, 100, 200, 500, 1000):
        x = scale.at(length / blows)
        half = measure(str(blows), "small") / 2
        if scale.start + 2 < x - half and x + half < scale.stop and x + half < taken - 8:
            scene.append(Line(((x, y1), (x, y1 - 4)), "line"))
            scene.append(Words((x, y1 - 8), str(blows), "soft_ink", anchor="middle"))
            taken = x - half


def _stress_axis(scene: Scene, frame: Frame, sheet: Sheet, units: Units) -> None:
    scale, unit = frame.stress, units.unit("stress")
    y0, y1 = frame.resistance.start, frame.resistance.stop
    one = 1 / units.number(1.0, "stress")
    positive = "compression" if units.compression_positive else "tension"
    _panel(scene, scale, frame, "Peak stresses", f"{unit}, {positive} positive")
    for value in ticks(scale.low / one, scale.high / one, 6):
        x = scale.at(value * one)
        scene.append(Line(((x, y0), (x, y1)), "line" if value == 0 else "grid"))
        scene.append(Words((x, y0 + 16), number(value), "soft_ink", anchor="middle"))
    given = case_limits(sheet.plan.case)
    push = 1 if units.compression_positive else -1
    missing = []
    for sign, side in (("compression", push), ("tension", -push)):
        ink = "compression" if sign == "compression" else "tension"
        scene.append(
            Words((scale.at(0) + side * 5, y1 - 24), sign, ink, "small", "left" if side > 0 else "right")
        )
        if not given[sign]:
            missing.append(sign)
        anchor: Anchor = "right" if side > 0 else "left"
        for value in given[sign]:
            if scale.low <= side * value <= scale.high:
                x = scale.at(side * value)
                scene.append(Line(((x, y0), (x, y1)), ink, 1.0, (1.5, 2.5)))
                scene.append(Words((x, y1 - 8), f"limit {units.show(value, 'stress')}", ink, "small", anchor))
            else:
                at = scale.stop if side > 0 else scale.start
                scene.append(
                    Words((at, y1 - 8), f"limit {units.show(value, 'stress')} beyond", ink, "small", anchor)
                )
    if missing:
        which = "either" if len(missing) == 2 else missing[0]
        scene.append(Words((scale.start, y1 - 8), f"no limit given for {which}", "soft_ink", "small"))


def _energy_axis(scene: Scene, frame: Frame, sheet: Sheet, units: Units) -> None:
    scale, unit = frame.energy, units.unit("energy")
    y0, y1 = frame.resistance.start, frame.resistance.stop
    one = 1 / units.number(1.0, "energy")
    gauge = next((c.energy.gauge for c in sheet.cells if c.energy), None)
    known = f"past gauge {gauge}" if gauge else ("no gauge on the member" if sheet.cells else "")
    _panel(scene, scale, frame, "Energy", unit)
    scene.append(Words((scale.start, y1 - 24), known, "soft_ink", "small"))
    for value in ticks(scale.low / one, scale.high / one, 3):
        x = scale.at(value * one)
        scene.append(Line(((x, y0), (x, y1)), "grid"))
        scene.append(Words((x, y0 + 16), number(value), "soft_ink", anchor="middle"))


def _bands(scene: Scene, frame: Frame, bands: Bands) -> None:
    """From 10 to 90 % of the samples, and their middle as a pale line."""
    lower = [
        (frame.set.at(max(s, 0.0)), frame.resistance.at(r))
        for r, s in zip(bands.resistances, bands.set[:, 0], strict=True)
    ]
    upper = [
        (frame.set.at(max(s, 0.0)), frame.resistance.at(r))
        for r, s in zip(bands.resistances, bands.set[:, 2], strict=True)
    ]
    middle = [
        (frame.set.at(max(s, 0.0)), frame.resistance.at(r))
        for r, s in zip(bands.resistances, bands.set[:, 1], strict=True)
    ]
    scene.append(Area((*lower, *reversed(upper)), "line", 0.28))
    scene.append(Line(tuple(middle), "line", 3.0))


def _names(scene: Scene, frame: Frame, sheet: Sheet, units: Units, measure: Measure) -> None:
    """The name of each line at its lower end, and where a limit is passed first."""
    told = 0
    ends: list[tuple[float, str, Level]] = []
    for index, level in enumerate(sheet.plan.levels):
        cells = [c for c in sheet.line(index) if c.set is not None]
        if not cells:
            continue
        text = level_text(level, units)
        ends.append((frame.set.at(max(cells[0].set or 0.0, 0.0)), text, "strong" if index == 0 else "small"))
        for line, words in enumerate(over_lines(cells, units) or ()):
            at = (frame.set.stop - 4, frame.resistance.stop + 16 + LINE * told)
            told += 1
            scene.append(Words(at, f"✕ {text}: {words}" if line == 0 else words, "over", "small", "right"))
    right = frame.set.stop + 4
    weight: Level
    for x, text, weight in sorted(ends, reverse=True):
        half = measure(text, weight) / 2
        x = min(x, right - half)
        right = x - half - 8
        scene.append(Words((x, frame.resistance.start - 6), text, "ink", weight, "middle"))
    still = [c for c in sheet.cells if c.set is not None and not c.moves]
    if still:
        lowest = min(still, key=lambda c: c.resistance)
        at = (frame.set.start + 8, frame.resistance.at(lowest.resistance) + 18)
        scene.append(Words(at, "practically no set", "soft_ink", "small"))

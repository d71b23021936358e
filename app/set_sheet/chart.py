"""The picture of a set sheet: set across, resistance up; beside it, on the same axis, stresses and energy.

A line is solid where the member is within its limits and broken where one is passed; there the place is named.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from itertools import pairwise

import numpy as np
from numpy.typing import NDArray

from app.names import with_kind
from app.set_sheet.frame import Frame, case_limits, frame_of, numbers_below, panel, resistance_axis
from app.set_sheet.labels import label_lines
from app.set_sheet.scales import Scale, root_ticks, ticks
from app.set_sheet.scene import Anchor, Area, Letters, Line, Mark, Scene, Words, fitted
from app.set_sheet.words import PER
from app.units import Units
from solver.studies import NO_SET, Cell, Sheet
from solver.studies.uncertainty import Bands, Sampled

#: Strokes and gaps, and widths of the lines of a sheet, in pixels or points.
BROKEN = (5.0, 3.5)
DOTTED = (1.5, 2.5)
WIDTHS = (2.0, 1.5, 1.5, 1.5)


def chart(
    sheet: Sheet,
    units: Units,
    per: str,
    width: float,
    height: float,
    letters: Letters,
    sampled: Sampled | None = None,
    line: int = 0,
) -> Scene:
    """Everything to draw, back to front; `line` is the one whose bands are shown."""
    frame = frame_of(sheet, units, width, height, letters, sampled)
    scene: Scene = []
    resistance_axis(scene, frame, units)
    _set_axis(scene, frame, units, per)
    _stress_axis(scene, frame, sheet, units)
    _energy_axis(scene, frame, sheet, units)
    bands = sampled.of(sheet.plan.levels[line]) if sampled else None
    if bands is not None:
        _bands(scene, frame, bands, units)
    for index in range(len(sheet.plan.levels)):
        cells = [c for c in sheet.line(index) if c.set is not None]
        for where, ink in _places(frame, units):
            _line(scene, frame, cells, index, where, ink)
    label_lines(scene, frame, sheet, units)
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


def _set_axis(scene: Scene, frame: Frame, units: Units, per: str) -> None:
    scale, rows, letters, unit = frame.set, frame.rows, frame.letters, units.unit("small_length")
    one = 1 / units.number(1.0, "small_length")
    captions = (f"{unit} (scale of square roots)", f"{unit}, square roots", unit)
    panel(scene, rows, scale, ("Set per blow", "Set"), captions, letters)
    numbers_below(scene, rows, scale, root_ticks(scale.high / one), one, letters)
    scene.append(Line(((scale.start, rows.top), (scale.stop, rows.top)), "line"))
    scene.append(Words((scale.stop, rows.first), f"blows per {per}", "soft_ink", "small", "right"))
    taken = 1e9
    for blows in (1, 2, 5, 10, 20, 30, 50, 100, 200, 500, 1000):
        x = scale.at(PER[per] / blows)
        half = letters.width(str(blows), "small") / 2
        if scale.start + 2 < x - half and x + half < scale.stop and x + half < taken - 8:
            scene.append(Line(((x, rows.top), (x, rows.top - 4)), "line"))
            scene.append(Words((x, rows.second), str(blows), "soft_ink", anchor="middle"))
            taken = x - half


def _stress_axis(scene: Scene, frame: Frame, sheet: Sheet, units: Units) -> None:
    scale, rows, letters, unit = frame.stress, frame.rows, frame.letters, units.unit("stress")
    one = 1 / units.number(1.0, "stress")
    positive = "compression" if units.compression_positive else "tension"
    panel(
        scene,
        rows,
        scale,
        ("Peak stresses", "Stresses"),
        (f"{unit}, {positive} positive", f"{unit}, {positive} +", unit),
        letters,
    )
    numbers_below(scene, rows, scale, ticks(scale.low / one, scale.high / one, 6), one, letters)
    given = case_limits(sheet.plan.case)
    push = 1 if units.compression_positive else -1
    for sign, side, y in (("compression", push, rows.first), ("tension", -push, rows.second)):
        limit_words(scene, scale, sign, given[sign], side, y, letters, units)
        for value in given[sign]:
            if scale.low <= side * value <= scale.high:
                x = scale.at(side * value)
                scene.append(Line(((x, rows.foot), (x, rows.top)), sign, 1.0, DOTTED))


def limit_words(
    scene: Scene,
    scale: Scale,
    sign: str,
    limits: list[float],
    side: int,
    y: float,
    letters: Letters,
    units: Units,
) -> None:
    """Name and limit of one sign of stress in a row of its own, at the side of the panel where it is drawn."""
    told = [units.show(value, "stress") for value in limits]
    beyond = [not scale.low <= side * value <= scale.high for value in limits]
    words = " and ".join(
        f"{text} (off the scale)" if out else text for text, out in zip(told, beyond, strict=True)
    )
    plain = " and ".join(told)
    texts = [f"{sign}, limit {words}", f"{sign}, limit {plain}", f"{sign}, {plain}", f"limit {plain}"]
    texts = texts if told else [f"{sign}, no limit given", f"{sign}, no limit", sign]
    anchor: Anchor = "right" if side > 0 else "left"
    at = (scale.stop if side > 0 else scale.start, y)
    scene.append(Words(at, fitted(texts, scale.stop - scale.start, letters), sign, "small", anchor))


def _energy_axis(scene: Scene, frame: Frame, sheet: Sheet, units: Units) -> None:
    scale, rows, letters = frame.energy, frame.rows, frame.letters
    one = 1 / units.number(1.0, "energy")
    gauge = next((c.energy.gauge for c in sheet.cells if c.energy), None)
    panel(scene, rows, scale, ("Energy",), (units.unit("energy"),), letters)
    if sheet.cells:
        words = (
            (f"past {with_kind('gauge', gauge)}", f"past {gauge}")
            if gauge
            else ("no gauge on the member", "no gauge")
        )
        text = fitted(words, scale.stop - scale.start + 10, letters)
        scene.append(Words((scale.start, rows.first), text, "soft_ink"))
    numbers_below(scene, rows, scale, ticks(scale.low / one, scale.high / one, 4), one, letters)


def _bands(scene: Scene, frame: Frame, bands: Bands, units: Units) -> None:
    """From 10 to 90 % of the samples, and their middle as a pale line, in each panel that is sampled."""
    push = 1.0 if units.compression_positive else -1.0
    for scale, values, ink in (
        (frame.set, np.where(bands.set < NO_SET, 0.0, bands.set), "line"),
        (frame.stress, push * bands.compression, "compression"),
        (frame.stress, -push * bands.tension, "tension"),
    ):
        low, middle, high = (_points(frame, scale, bands, values[:, i]) for i in range(3))
        if len(low) > 1:
            scene.append(Area((*low, *reversed(high)), ink, 0.22))
            scene.append(Line(tuple(middle), ink, 0.8, DOTTED))


def _points(
    frame: Frame, scale: Scale, bands: Bands, values: NDArray[np.float64]
) -> list[tuple[float, float]]:
    return [
        (scale.at(float(value)), frame.resistance.at(float(resistance)))
        for resistance, value in zip(bands.resistances, values, strict=True)
        if value == value  # no band where no sample could be solved
    ]

"""Where the panels of a picture lie: room for the letters at hand first, the rest for the panels."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from app.set_sheet.scales import Scale, number, ticks
from app.set_sheet.scene import Letters, Line, Scene, Words, fitted
from app.units import Units
from solver import Case
from solver.studies import Sheet
from solver.studies.uncertainty import Sampled

RIGHT, GAP = 14.0, 26.0
#: Widths of the panels as shares of their room: set, stresses, energy.
SHARES = (0.5, 0.31, 0.19)


@dataclass(frozen=True)
class Rows:
    """Heights in a picture: the base lines of the title and of two rows of small print, the `top` and `foot` of the
    panels, and the base lines of their numbers and captions below."""

    title: float
    first: float
    second: float
    top: float
    foot: float
    numbers: float
    caption: float


def rows_of(height: float, letters: Letters) -> Rows:
    line = letters.line
    title, foot = 1.1 * line + 2, height - 2.5 * line - 8
    first = title + 1.3 * line
    second = first + 1.15 * line
    return Rows(title, first, second, second + 0.4 * line + 2, foot, foot + line + 2, foot + 2.2 * line + 3)


def spans_of(left: float, width: float, shares: Sequence[float]) -> list[tuple[float, float]]:
    """Left and right of panels that stand side by side."""
    room = width - left - RIGHT - (len(shares) - 1) * GAP
    starts = [left + room * sum(shares[:i]) + GAP * i for i in range(len(shares))]
    return [(start, start + room * share) for start, share in zip(starts, shares, strict=True)]


@dataclass(frozen=True)
class Frame:
    """Where the three panels lie, and their scales."""

    resistance: Scale
    set: Scale
    stress: Scale
    energy: Scale
    rows: Rows
    letters: Letters


def frame_of(
    sheet: Sheet, units: Units, width: float, height: float, letters: Letters, sampled: Sampled | None = None
) -> Frame:
    """Scales in SI that hold everything of the sheet."""
    cells = [c for c in sheet.cells if c.set is not None]
    low, high = min(sheet.plan.resistances), max(sheet.plan.resistances)
    rows, line = rows_of(height, letters), letters.line
    resistance = Scale(low, high, rows.foot - 1.9 * line - 6, rows.top + 0.9 * line + 4)
    left = (
        1.2 * line
        + 16
        + max(letters.width(text, "small") for _v, text in _heights(resistance, rows, units, line))
    )
    spans = spans_of(left, width, SHARES)
    bands = sampled.lines if sampled else ()
    most_set = max([c.set or 0.0 for c in cells] + [float(b.set[:, 2].max()) for b in bands], default=0.01)
    energy = max((c.energy.value for c in cells if c.energy), default=1e3) * 1.12
    return Frame(
        resistance,
        Scale(0.0, max(most_set, 0.002) * 1.06, *spans[0], root=True),
        Scale(*_stresses(sheet, units, sampled), *spans[1]),
        Scale(0.0, energy, *spans[2]),
        rows,
        letters,
    )


def _stresses(sheet: Sheet, units: Units, sampled: Sampled | None) -> tuple[float, float]:
    bands = sampled.lines if sampled else ()
    most = [c.compression.peak.value for c in sheet.cells if c.compression]
    comp = max(most + [float(b.compression[:, 2].max()) for b in bands], default=1e6)
    most = [c.tension.peak.value for c in sheet.cells if c.tension]
    tens = max(most + [float(b.tension[:, 2].max()) for b in bands], default=0.0)
    limits = case_limits(sheet.plan.case)
    # a limit far beyond what occurs is told, but does not squeeze the lines
    comp = max([comp, *(v for v in limits["compression"] if v < 1.8 * comp)]) * 1.08
    tens = max([tens, 0.12 * comp, *(v for v in limits["tension"] if v < max(4 * tens, 0.5 * comp))]) * 1.08
    return (-tens, comp) if units.compression_positive else (-comp, tens)


def case_limits(case: Case) -> dict[str, list[float]]:
    """The limits of the member's materials, Pa, each once."""
    found: dict[str, list[float]] = {}
    for sign in ("compression", "tension"):
        values = {case.material(s.material).limits.value(sign) for s in case.member.segments}
        found[sign] = sorted(v for v in values if v is not None)
    return found


def _heights(scale: Scale, rows: Rows, units: Units, line: float) -> list[tuple[float, str]]:
    """Values beside the axis of resistance, and their texts."""
    one = 1 / units.number(1.0, "force")
    bottom, top = scale.value(rows.foot), scale.value(rows.top)
    most = min(9, max(2, int((rows.foot - rows.top) / (1.6 * line))))
    return [(v * one, number(v)) for v in ticks(max(bottom, 0.0) / one, top / one, most)]


def resistance_axis(scene: Scene, frame: Frame, units: Units) -> None:
    """Numbers left of the panels, and lines through all of them."""
    scale, rows = frame.resistance, frame.rows
    panels = (frame.set, frame.stress, frame.energy)
    for value, text in _heights(scale, rows, units, frame.letters.line):
        y = scale.at(value)
        for panel in panels:
            scene.append(Line(((panel.start, y), (panel.stop, y)), "grid"))
        scene.append(
            Words((frame.set.start - 7, y + 0.28 * frame.letters.line), text, "soft_ink", anchor="right")
        )
    middle = (rows.foot + rows.top) / 2
    at = (0.6 * frame.letters.line + 2, middle)
    scene.append(Words(at, f"Total resistance, {units.unit('force')}", "ink", "small", "middle", turned=True))


def panel(
    scene: Scene, rows: Rows, scale: Scale, titles: Sequence[str], captions: Sequence[str], letters: Letters
) -> None:
    """Frame, title and caption of one panel; of each the first that fits."""
    room = scale.stop - scale.start
    for x, y in ((scale.stop, rows.foot), (scale.start, rows.top)):
        scene.append(Line(((scale.start, rows.foot), (x, y)), "line"))
    title = fitted(titles, room + RIGHT - 2, letters, "strong")
    scene.append(Words((scale.start, rows.title), title, "ink", "strong"))
    text = fitted(captions, room + GAP - 4, letters)
    scene.append(Words(((scale.start + scale.stop) / 2, rows.caption), text, "soft_ink", "small", "middle"))


def numbers_below(
    scene: Scene, rows: Rows, scale: Scale, values: Sequence[float], one: float, letters: Letters
) -> None:
    """A line for each value (in units of `one`), and its number where there is room; zero before all others."""
    taken: list[tuple[float, float]] = []
    for value in sorted(values, key=lambda v: (v != 0, v)):
        x, half = scale.at(value * one), letters.width(number(value), "small") / 2
        scene.append(Line(((x, rows.foot), (x, rows.top)), "line" if value == 0 else "grid"))
        left, right = x - half, x + half
        if right <= scale.stop + GAP / 2 and all(right + 5 < a or b + 5 < left for a, b in taken):
            scene.append(Words((x, rows.numbers), number(value), "soft_ink", anchor="middle"))
            taken.append((left, right))

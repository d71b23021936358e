"""What is written between the lines of a set sheet, each word only where no line runs through it."""

from __future__ import annotations

from collections.abc import Iterable

from app.set_sheet.frame import Frame
from app.set_sheet.scene import Box, Level, Line, Mark, Scene, Words, box_of, overlap, touches
from app.set_sheet.words import level_text
from app.units import Units
from solver.studies import Cell, Sheet


def label_lines(scene: Scene, frame: Frame, sheet: Sheet, units: Units) -> None:
    """The name of each line at its lower end, where on the member a limit is passed, and where nothing moves."""
    taken: list[Box] = []
    for words in _names(frame, sheet, units):
        scene.append(words)
        taken.append(box_of(words, frame.letters))
    lines = [i for i in scene if isinstance(i, Line) and (i.ink == "ink" or i.dash)]
    marks = [i for i in scene if isinstance(i, Mark)]
    for candidates in (*_breaches(frame, sheet, units), _still(frame, sheet)):
        for words in candidates:
            box = box_of(words, frame.letters)
            if _free(box, frame, lines, marks, taken):
                scene.append(words)
                taken.append(box)
                break


def _free(box: Box, frame: Frame, lines: list[Line], marks: list[Mark], taken: list[Box]) -> bool:
    inside = (
        frame.set.start < box[0]
        and box[2] < frame.set.stop
        and frame.rows.top + 2 < box[1] < box[3] < frame.rows.foot
    )
    return (
        inside
        and not any(touches(box, line) for line in lines)
        and not any(_on(box, mark) for mark in marks)
        and not any(overlap(box, other) for other in taken)
    )


def _on(box: Box, mark: Mark) -> bool:
    (x, y), size = mark.at, mark.size + 1
    return overlap(box, (x - size, y - size, x + size, y + size))


def _names(frame: Frame, sheet: Sheet, units: Units) -> Iterable[Words]:
    ends: list[tuple[float, str, Level]] = []
    for index, level in enumerate(sheet.plan.levels):
        cells = [c for c in sheet.line(index) if c.set is not None]
        if cells:
            x = frame.set.at(max(cells[0].set or 0.0, 0.0))
            ends.append((x, level_text(level, units), "strong" if index == 0 else "small"))
    right = frame.set.stop + 4
    for x, text, weight in sorted(ends, reverse=True):
        half = frame.letters.width(text, weight) / 2
        middle = min(x, right - half)
        right = middle - half - 8
        yield Words((middle, frame.rows.foot - 5), text, "ink", weight, "middle")


def _breaches(frame: Frame, sheet: Sheet, units: Units) -> Iterable[list[Words]]:
    """For each line on which a limit is passed, candidates: right of the lines, from its highest such point down."""
    for index in range(len(sheet.plan.levels)):
        over = [c for c in sheet.line(index) if c.over and c.worst is not None]
        if not over:
            continue
        _sign, stress = max(
            (c.worst for c in over if c.worst is not None), key=lambda pair: pair[1].share or 0.0
        )
        name = level_text(sheet.plan.levels[index], units)
        text = f"✕ {name}: {stress.segment}, {units.show(stress.position, 'length')}"
        yield [
            _beside(frame, sheet, cell, text, 0.28 + step)
            for cell in reversed(over)
            for step in (0.0, -1.1, 1.1)
        ]


def _beside(frame: Frame, sheet: Sheet, cell: Cell, text: str, lines_down: float) -> Words:
    same = [c for c in sheet.cells if c.resistance == cell.resistance and c.set is not None]
    x = max(frame.set.at(c.set if c.set is not None and c.moves else 0.0) for c in same)
    y = frame.resistance.at(cell.resistance) + lines_down * frame.letters.line
    return Words((x + 12, y), text, "over", "small")


def _still(frame: Frame, sheet: Sheet) -> list[Words]:
    """Candidates for the word on members that do not move: at the points on the axis, from the top down."""
    still = sorted({c.resistance for c in sheet.cells if c.set is not None and not c.moves}, reverse=True)
    heights = [
        frame.resistance.at(r) + step * frame.letters.line for r in still for step in (-0.4, 0.28, 1.0)
    ]
    return [Words((frame.set.start + 9, y), "practically no set", "soft_ink") for y in heights]

"""What a set sheet says, in sentences and units of the reader. No Qt."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from contextlib import contextmanager
from math import floor, log10

from app.units import NO_BREAK, Units, rounded
from app.words import percent
from solver.studies import Cell, Level, Sheet, StudyError
from solver.studies.depth import REFUSAL

#: What blows are counted for, m.
PER = {"0.25 m": 0.25, "m": 1.0, "ft": 0.3048}


def unit_of(units: Units) -> Callable[[str], float]:
    """SI value of the unit that the reader sees, by its dimension."""
    return lambda dimension: 1 / float(units.number(1.0, dimension))


@contextmanager
def told_in(units: Units) -> Iterator[None]:
    """Tells why a study cannot be made in the units of the reader."""
    try:
        yield
    except StudyError as error:
        raise StudyError(error.told(units.show)) from None


def per_of(units: Units, chosen: str | None) -> str:
    """For how much penetration blows are counted: as chosen, or as is usual in the units of the screen."""
    return chosen or ("ft" if units.system == "us" else "0.25 m")


def level_text(level: Level, units: Units) -> str:
    """The value that a line stands for, with four digits at most: "1.25 m"."""
    number = float(units.number(level.value, level.dimension, level.value))
    unit = units.unit(level.dimension, level.value)
    return f"{number:.4g}{NO_BREAK}{unit}".strip()


def level_below(level: Level, units: Units) -> str:
    """The value that a line stands for, rounded down to three digits: what is allowed must not be told larger."""
    number = float(units.number(level.value, level.dimension, level.value))
    size = 10.0 ** (floor(log10(number)) - 2) if number > 0 else 1.0
    down = floor(number / size + 1e-9) * size
    return f"{down:.3g}{NO_BREAK}{units.unit(level.dimension, level.value)}".strip()


def force_text(value: float, units: Units) -> str:
    """A resistance with three digits that count: more would claim what no study knows."""
    return units.show(float(f"{value:.3g}"), "force")


def varied_text(level: Level) -> str:
    """What the lines differ in, in small letters: "drop height"."""
    return level.label[:1].lower() + level.label[1:]


def set_text(cell: Cell, units: Units) -> str:
    if cell.set is None:
        return "not solved"
    return units.show(cell.set, "small_length") if cell.moves else "practically no set"


def blows_text(cell: Cell, per: str) -> str:
    blows = cell.blows_per_metre
    return "–" if blows is None else rounded(blows * PER[per], 2 if blows * PER[per] < 10 else 3)


def over_lines(cells: tuple[Cell, ...] | list[Cell], units: Units) -> tuple[str, str] | None:
    """Which limit is passed where on one line, and at which resistances; `None` where none is."""
    over = [c for c in cells if c.over]
    if not over:
        return None
    sign, stress = max((c.worst for c in over if c.worst is not None), key=lambda pair: pair[1].share or 0.0)
    low, high = over[0].resistance, over[-1].resistance
    later = " after the ram struck again" if all(c.again_only for c in over) else ""
    top = force_text(high, units)
    at = top if low == high else f"{force_text(low, units).split(NO_BREAK)[0]} to {top}"
    return (
        f"{sign} limit passed{later} at",
        f"{at}, in {stress.segment} {units.show(stress.position, 'length')}",
    )


def reading(cell: Cell, per: str, units: Units) -> str:
    """One point of the sheet in one line."""
    lead = f"{level_text(cell.level, units)}, {units.show(cell.resistance, 'force')}"
    if cell.set is None:
        return f"{lead}: {cell.problem}"
    parts = [f"{lead}: {'set ' if cell.moves else ''}{set_text(cell, units)}"]
    if cell.blows_per_metre is not None:
        parts.append(f"{blows_text(cell, per)} blows per {per}")
    for finding in (cell.compression, cell.tension):
        if finding is None:
            continue
        share = (
            f" ({percent(finding.worst.share)} of the limit)" if finding.worst and finding.worst.share else ""
        )
        place = units.show(finding.peak.position, "length")
        parts.append(f"{finding.sign} {units.show(finding.peak.value, 'stress')} at {place}{share}")
    if cell.energy is not None:
        parts.append(f"energy {units.show(cell.energy.value, 'energy')}")
    if not cell.at_rest:
        parts.append("not at rest by itself: the set was settled statically")
    return " · ".join(parts)


def criterion(cell: Cell, units: Units) -> str:
    """When to stop, for the person at the rig."""
    blow = f"{varied_text(cell.level)} of {level_text(cell.level, units)}"
    resistance = force_text(cell.resistance, units)
    if not cell.moves:
        return f"With a {blow} the member practically does not move at {resistance}: no set shows it."
    measured = units.show(cell.set or 0.0, "small_length", 2)
    if cell.over and cell.again_only:
        return (
            f"Judge before driving with a {blow}: at {resistance} a limit is passed, but only after the ram has struck "
            f"again (the set would be {measured})."
        )
    if cell.over:
        return f"Do not drive with a {blow}: a limit is passed at {resistance} (the set would be {measured})."
    return f"Stop when the mean set of the last 10 blows is {measured} or less with a {blow}: that shows {resistance}."


def beside_criterion(cell: Cell, units: Units) -> str:
    """What the person at the rig needs with the criterion; "" where there is nothing to stop at."""
    if cell.set is None or not cell.moves or cell.over:
        return ""
    ten = f"10 blows then move the member by {units.show(10 * cell.set, 'small_length', 2)} or less."
    if cell.set >= REFUSAL:
        return ten
    least = units.show(REFUSAL, "small_length", 2)
    return f"{ten} Less than {least} a blow is usually called refusal: check it by other means."


def on_the_way(sheet: Sheet, cell: Cell, units: Units) -> str:
    """Where the blow that is driven with passes a limit before the resistance is reached; "" where it does not."""
    lines = [index for index, level in enumerate(sheet.plan.levels) if level == cell.level]
    before = [c for index in lines for c in sheet.line(index) if c.resistance < cell.resistance]
    over = over_lines(before, units)
    if over is None or cell.over:
        return ""
    return f"On the way there this blow passes a limit: {over[0]} {over[1]}. Drive with less there."


def summary(sheet: Sheet, units: Units) -> str:
    """One line on the lines of the sheet: which keep within the limits."""
    if sheet.complete and not any(c.over for c in sheet.cells):
        known = any(c.share is not None for c in sheet.cells)
        return "✓ within limits on all lines" if known else "no limit given"
    parts = []
    for index, level in enumerate(sheet.plan.levels):
        cells = sheet.line(index)
        if not cells:
            continue  # nothing is known of it yet
        over = over_lines(cells, units)
        known = any(c.share is not None for c in cells)
        state = "no limit given" if not known else "✓ within limits"
        if over is not None:
            state = f"✕ {over[0]} {over[1]}"
        parts.append(f"{level_text(level, units)}: {state}")
    return " · ".join(parts)

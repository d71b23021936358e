"""The table for the rig: what set is read, and what resistance it then shows under each blow."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from app.set_sheet.scales import root_ticks
from solver.studies import Sheet


@dataclass(frozen=True)
class Shown:
    """Resistance (N) that a set shows; `over`: a limit is passed there. `None` outside of the sheet."""

    resistance: float | None
    over: bool = False


def sets_to_read(sheet: Sheet, unit: float, most: int = 9) -> list[float]:
    """Tidy sets (m) in the unit of the reader (m per unit) that the sheet covers."""
    largest = max((c.set or 0.0 for c in sheet.cells), default=0.0)
    tidy = [v for v in _finer(largest / unit) if v > 0 and any_shown(sheet, v * unit)]
    return [v * unit for v in (tidy if len(tidy) <= most else tidy[:most])]


def _finer(high: float) -> list[float]:
    """1 2 3 5 7 10 and so on, down to a hundredth of the largest."""
    steps = root_ticks(high)
    extra = [1.5 * v for v in steps if f"{v:e}"[0] == "2"] + [1.4 * v for v in steps if f"{v:e}"[0] == "5"]
    return sorted(v for v in {*steps, *extra} if v <= high)


def any_shown(sheet: Sheet, measured: float) -> bool:
    return any(
        shown_at(sheet, index, measured).resistance is not None for index in range(len(sheet.plan.levels))
    )


def shown_at(sheet: Sheet, line: int, measured: float) -> Shown:
    """The resistance that a set (m) shows on one line: between two points linear in the logarithm of the set."""
    cells = [c for c in sheet.line(line) if c.set is not None and c.moves]
    for weak, strong in pairwise(cells):
        assert weak.set is not None
        assert strong.set is not None
        if weak.set >= measured >= strong.set and weak.set > strong.set:
            share = np.log(weak.set / measured) / np.log(weak.set / strong.set)
            resistance = weak.resistance + float(share) * (strong.resistance - weak.resistance)
            return Shown(resistance, weak.over or strong.over)
    return Shown(None)

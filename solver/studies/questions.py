"""Questions answered by finding a root on the solver itself: which blow is safe, what set to stop at, what a set shows.

Every answer, put back into the solver, gives what was asked for within the tolerance that it states.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from itertools import pairwise
from typing import Literal

import numpy as np

from solver.model.project import Case
from solver.run import solve
from solver.studies.plan import Level, Plan, at_value
from solver.studies.sheet import Cell, solved_cell

#: How near an answer is to what was asked: share of the value that is looked for.
TOLERANCE = 1e-3
#: The largest blow is looked for between these shares of the case's own, and bracketed at so many points.
SMALLEST, LARGEST, POINTS = 0.1, 4.0, 8

Why = Literal["found", "all within", "none within", "no limit"]
Cancel = Callable[[], bool] | None


class Cancelled(Exception):
    """The person has stopped it, or asked something else."""


@dataclass(frozen=True)
class SafeBlow:
    """The largest value of the plan's number that keeps every stress within its limit at `resistance` (N).

    `why` "found": `level` is it, within `tolerance` of its value, and `cell` what it gives; "all within": even the
    largest looked at (`high`) is; "none within": not even the smallest (`low`) is; "no limit": no material has one.
    """

    resistance: float
    why: Why
    level: Level | None
    cell: Cell | None
    low: float
    high: float
    tolerance: float = TOLERANCE


@dataclass(frozen=True)
class ShownResistance:
    """What a measured set shows: a band of total resistance (N) for the set with its reading error (m).

    `None` for an end that lies outside of the range looked at, `lowest` to `highest` (N)."""

    level: Level
    measured: float
    error: float
    at_least: float | None
    middle: float | None
    at_most: float | None
    lowest: float
    highest: float
    tolerance: float = TOLERANCE


def point(plan: Plan, resistance: float, level: Level, cancel: Cancel = None) -> Cell:
    """One solve at a total resistance (N) and level. Raises `Cancelled`, and `SolveError` of the solver."""
    case: Case = plan.variant(resistance, level)
    result = solve(case, cancel=cancel)
    if not result.finished:
        raise Cancelled
    return solved_cell(resistance, level, result)


def safe_blow(plan: Plan, resistance: float, *, cancel: Cancel = None) -> SafeBlow:
    """Which blow keeps every stress inside its limit at this resistance?

    Looks upwards from the smallest until a limit is passed, then halves in on that crossing (Brent), so that all that
    was looked at below the answer is within. Raises `SolveError`, `StudyError`, `Cancelled`.
    """
    own = plan.levels[0]
    most = LARGEST if own.pointer != "load/efficiency" else 1.0 / own.value
    values = own.value * np.geomspace(SMALLEST, most, POINTS)

    seen: dict[float, Cell] = {}

    def excess(value: float) -> float:
        level = at_value(own, float(value))
        seen[value] = point(plan, resistance, level, cancel)
        share = seen[value].share
        return float("nan") if share is None else share - 1

    from scipy.optimize import brentq  # not at the start of the program, which it would slow down

    low, high = float(values[0]), float(values[-1])
    below = excess(low)
    if np.isnan(below):
        return SafeBlow(resistance, "no limit", None, None, low, high)
    if below > 0:
        return SafeBlow(resistance, "none within", None, None, low, high)
    for first, second in pairwise(float(v) for v in values):
        if excess(second) > 0:
            brentq(excess, first, second, rtol=TOLERANCE / 4, xtol=1e-12)
            best = max(v for v, cell in seen.items() if not cell.over)
            return SafeBlow(resistance, "found", seen[best].level, seen[best], low, high)
    return SafeBlow(resistance, "all within", seen[high].level, seen[high], low, high)


def shown_by(
    plan: Plan, level: Level, measured: float, error: float, *, cancel: Cancel = None
) -> ShownResistance:
    """Which total resistance does a set measured on site show, with its reading error? A band, not one number.

    Looks over the range of the plan and twice beyond it on each side. Raises as `safe_blow`.
    """
    lowest, highest = plan.resistances[0] / 2, plan.resistances[-1] * 2
    if plan.vary == "toe":
        lowest = plan.resistances[0]
    seen: dict[float, float] = {}

    def set_at(log_resistance: float) -> float:
        if log_resistance not in seen:
            cell = point(plan, float(np.exp(log_resistance)), level, cancel)
            seen[log_resistance] = max(cell.set or 0.0, 0.0)
        return seen[log_resistance]

    from scipy.optimize import brentq

    grid = [float(v) for v in np.log(np.geomspace(lowest, highest, POINTS))]

    def resistance_for(wanted: float) -> float | None:
        if wanted <= 0:
            return None
        for first, second in pairwise(grid):
            if set_at(first) >= wanted > set_at(second):
                found = brentq(lambda x: set_at(x) - wanted, first, second, xtol=TOLERANCE / 4, rtol=1e-12)
                return float(np.exp(found))
        return None

    return ShownResistance(
        level,
        measured,
        error,
        resistance_for(measured + error),
        resistance_for(measured),
        resistance_for(measured - error),
        lowest,
        highest,
    )

"""Questions answered by finding a root on the solver itself: what set to stop at, and what a set shows.

Every answer, put back into the solver, gives what was asked for within the tolerance that it states.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from solver.model.project import Case
from solver.run import solve
from solver.studies.plan import Level, Plan
from solver.studies.sheet import Cell, solved_cell

#: How near an answer is to what was asked: share of the value that is looked for.
TOLERANCE = 1e-3
#: Resistances between which a set is looked for.
POINTS = 8

Cancel = Callable[[], bool] | None


class Cancelled(Exception):
    """The person has stopped it, or asked something else."""


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


def shown_by(
    plan: Plan, level: Level, measured: float, error: float, *, cancel: Cancel = None
) -> ShownResistance:
    """Which total resistance does a set measured on site show, with its reading error? A band, not one number.

    Looks over the range of the plan and twice beyond it on each side. Raises `SolveError`, `StudyError`, `Cancelled`.
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

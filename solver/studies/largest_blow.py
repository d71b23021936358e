"""Which blow keeps every stress inside its limit? Found on the solver itself, starting from the blow of the case.

Peak stresses need not grow with the blow: after a small one the ram may fall again on a member that still rings, and
then pass a limit that larger blows keep. So the whole range is looked at in steps, the admissible steps around the
case's own blow (or nearest to it) are taken, and their ends are found as roots (Brent).
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Literal

import numpy as np

from solver.many import solve_many
from solver.studies.plan import Level, Plan, at_value
from solver.studies.questions import TOLERANCE, Cancel, Cancelled, point
from solver.studies.sheet import Cell, Solver, cell_of_outcome
from solver.studies.variation import StudyError

#: The range looked at, as shares of the case's own blow, and how many steps there are below and above it.
SMALLEST, LARGEST = 0.1, 4.0
BELOW, ABOVE = 11, 7

Why = Literal["found", "all within", "none within", "no limit"]


@dataclass(frozen=True)
class LargestBlow:
    """The largest value of the plan's number that keeps every stress within its limit at `resistance` (N).

    `why` "found": `level` is it, within `tolerance` of its value, and `cell` what it gives; "all within": no step above
    the case's own passes a limit, and `level` is `high`; "none within": none of the steps from `low` to `high` is
    admissible; "no limit": no material has one. All steps from `at_least` up to `level` are admissible: it is `low`,
    or above `low` where smaller blows pass a limit, "later" = only after the ram has struck again, or "at once".
    `passed` is the first step above `level` that is not admissible.
    """

    resistance: float
    why: Why
    level: Level | None
    cell: Cell | None
    low: float
    high: float
    steps: int
    at_least: float = 0.0
    smaller_pass: Literal["", "later", "at once"] = ""
    passed: Cell | None = None
    tolerance: float = TOLERANCE


def largest_blow(
    plan: Plan,
    resistance: float,
    *,
    cancel: Cancel = None,
    workers: int | None = None,
    solver: Solver | None = None,
) -> LargestBlow:
    """The admissible blows around the case's own, or nearest to it. Raises `SolveError`, `StudyError`, `Cancelled`."""
    steps = _steps(plan, resistance, cancel, workers, solver)
    answer = LargestBlow(
        resistance, "no limit", None, None, steps[0].level.value, steps[-1].level.value, len(steps)
    )
    if all(cell.share is None for cell in steps):
        return answer
    first, last = _nearest(steps, plan.own_level.value)
    if first is None or last is None:
        return replace(answer, why="none within")
    top, at_least = steps[last], steps[first].level.value
    if last + 1 < len(steps):
        top = _edge(plan, resistance, steps[last], steps[last + 1], cancel)
    if first > 0:
        at_least = _edge(plan, resistance, steps[first], steps[first - 1], cancel).level.value
    smaller = [cell for cell in steps[:first] if cell.over]
    return replace(
        answer,
        why="found" if last + 1 < len(steps) else "all within",
        level=top.level,
        cell=top,
        at_least=at_least,
        smaller_pass="" if not smaller else "later" if all(c.again_only for c in smaller) else "at once",
        passed=steps[last + 1] if last + 1 < len(steps) else None,
    )


def _steps(
    plan: Plan, resistance: float, cancel: Cancel, workers: int | None, solver: Solver | None
) -> list[Cell]:
    """What is looked at, smallest first; values that the model does not take are left out."""
    own = plan.own_level
    levels, cases = [], []
    for value in _values(own.value):
        level = at_value(own, value)
        try:
            cases.append(plan.variant(resistance, level))
        except StudyError:
            continue
        levels.append(level)
    found: dict[int, Cell] = {}
    for outcome in (solver or solve_many)(cases, workers=workers, cancel=cancel):
        if outcome.error is not None:
            raise outcome.error
        found[outcome.index] = cell_of_outcome(outcome, -1, -1, resistance, levels[outcome.index])
    if len(found) < len(cases):
        raise Cancelled
    return [found[index] for index in range(len(cases))]


def _values(own: float) -> list[float]:
    """In even ratios from the smallest over the own value itself to the largest."""
    if own <= 0:
        return [own]
    shares = [*np.geomspace(SMALLEST, 1, BELOW + 1), *np.geomspace(1, LARGEST, ABOVE + 1)[1:]]
    return [own if share == 1 else float(own * share) for share in shares]


def _nearest(steps: Sequence[Cell], own: float) -> tuple[int | None, int | None]:
    """First and last of the admissible steps around the own value; of two runs that lie as near, the smaller blows."""
    within = [index for index, cell in enumerate(steps) if not cell.over]
    if not within:
        return None, None
    start = min(
        within, key=lambda i: (round(abs(np.log(steps[i].level.value / own)), 9) if own > 0 else 0.0, i)
    )
    first = last = start
    while first - 1 in within:
        first -= 1
    while last + 1 in within:
        last += 1
    return first, last


def _edge(plan: Plan, resistance: float, within: Cell, over: Cell, cancel: Cancel) -> Cell:
    """Between an admissible blow and one that is not: the last admissible one, within the tolerance of its value."""
    from scipy.optimize import brentq  # not at the start of the program, which it would slow down

    seen = {cell.level.value: cell for cell in (within, over)}

    def excess(value: float) -> float:
        if value not in seen:
            seen[value] = point(plan, resistance, at_value(within.level, value), cancel)
        return (seen[value].share or 0.0) - 1

    brentq(excess, within.level.value, over.level.value, rtol=TOLERANCE / 4, xtol=1e-12)
    nearest = min if over.level.value < within.level.value else max
    return seen[nearest(value for value, cell in seen.items() if not cell.over)]

"""The set sheet: for each resistance and each level of the blow the set, the peak stresses and the energy."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace

from solver.answer.findings import EnergyFinding, StressAt, StressFinding, findings_of, first_blow
from solver.answer.remark import Remark
from solver.answer.result import Result
from solver.many import Outcome, solve_many
from solver.studies.plan import Level, Plan

#: A set below this (m) is called "practically no set": more than a thousand blows for 0.25 m, and less than can be read
#: on site (a choice of this program).
NO_SET = 2.5e-4

Solver = Callable[..., Iterator[Outcome]]


@dataclass(frozen=True)
class Cell:
    """One point of the sheet: total `resistance` (N) under `level`.

    `set` and `toe_largest` in m, `None` where the case could not be solved: then `problem` says why. The stresses are
    magnitudes in Pa with place and limit; `worst` where the share of a limit is largest. `energy` (J) past the first
    gauge on the member, `None` without one. `again_only`: a limit is passed, but not before the ram has struck again.
    """

    row: int
    line: int
    resistance: float
    level: Level
    set: float | None = None
    toe_largest: float | None = None
    compression: StressFinding | None = None
    tension: StressFinding | None = None
    energy: EnergyFinding | None = None
    at_rest: bool = False
    strikes: int = 0
    lifted: bool = False
    again_only: bool = False
    remarks: tuple[Remark, ...] = ()
    problem: str = ""

    @property
    def moves(self) -> bool:
        """Whether the toe stays down by more than can be read on site."""
        return self.set is not None and self.set >= NO_SET

    @property
    def blows_per_metre(self) -> float | None:
        """1/set; `None` where there is practically no set."""
        return 1 / self.set if self.set is not None and self.moves else None

    @property
    def worst(self) -> tuple[str, StressAt] | None:
        """Where a stress comes nearest to its limit, with "compression" or "tension"; `None` without limits."""
        found = [
            (f.sign, f.worst)
            for f in (self.compression, self.tension)
            if f is not None and f.worst is not None
        ]
        return max(found, key=lambda pair: pair[1].share or 0.0, default=None)

    @property
    def share(self) -> float | None:
        """Largest share of a limit anywhere in the member; `None` without limits."""
        return self.worst[1].share if self.worst else None

    @property
    def over(self) -> bool:
        """Whether a limit is passed anywhere; not where there is none."""
        return self.share is not None and self.share > 1


@dataclass(frozen=True)
class Sheet:
    """All cells that are solved, line after line and resistances rising within a line."""

    plan: Plan
    cells: tuple[Cell, ...]

    @property
    def complete(self) -> bool:
        """Whether every point of the plan is solved."""
        return len(self.cells) == len(self.plan.resistances) * len(self.plan.levels)

    def line(self, index: int) -> tuple[Cell, ...]:
        """The cells of one level that are solved, resistances rising."""
        return tuple(c for c in self.cells if c.line == index)


def solve_sheet(
    plan: Plan,
    *,
    progress: Callable[[int], None] | None = None,
    cancel: Callable[[], bool] | None = None,
    workers: int | None = None,
    solver: Solver | None = None,
) -> Sheet:
    """The whole sheet, or what was solved of it when `cancel` answered True."""
    return gathered(plan, cells_of(plan, progress=progress, cancel=cancel, workers=workers, solver=solver))


def gathered(plan: Plan, cells: Iterator[Cell]) -> Sheet:
    """A sheet from cells in any order."""
    return Sheet(plan, tuple(sorted(cells, key=lambda c: (c.line, c.row))))


def cells_of(
    plan: Plan,
    *,
    progress: Callable[[int], None] | None = None,
    cancel: Callable[[], bool] | None = None,
    workers: int | None = None,
    solver: Solver | None = None,
) -> Iterator[Cell]:
    """Cells as they finish, begun line by line. `solver` has the call of `solver.solve_many` (default: that)."""
    places = [(line, row) for line in range(len(plan.levels)) for row in range(len(plan.resistances))]
    cases = (plan.variant(plan.resistances[row], plan.levels[line]) for line, row in places)
    for outcome in (solver or solve_many)(cases, workers=workers, progress=progress, cancel=cancel):
        line, row = places[outcome.index]
        yield cell_of_outcome(outcome, row, line, plan.resistances[row], plan.levels[line])


def cell_of_outcome(outcome: Outcome, row: int, line: int, resistance: float, level: Level) -> Cell:
    """What one outcome says: the figures, or why there are none."""
    if outcome.result is None:
        return Cell(row, line, resistance, level, problem=str(outcome.error))
    return _cell(outcome.result, row, line, resistance, level)


def solved_cell(resistance: float, level: Level, result: Result) -> Cell:
    """A cell outside the grid, from one result."""
    return _cell(result, -1, -1, resistance, level)


def _cell(result: Result, row: int, line: int, resistance: float, level: Level) -> Cell:
    facts = findings_of(result)
    cell = Cell(
        row,
        line,
        resistance,
        level,
        set=facts.set.value if facts.set else None,
        toe_largest=facts.set.toe_largest if facts.set else None,
        compression=facts.compression,
        tension=facts.tension,
        energy=facts.energy,
        at_rest=result.at_rest,
        strikes=sum(event.kind == "impact" for event in result.events),
        lifted=any(event.kind == "toe_lift" and event.time > 0 for event in result.events),
        remarks=result.remarks,
    )
    return replace(cell, again_only=cell.over and not _over_at_first(result))


def _over_at_first(result: Result) -> bool:
    return any(found.state == "over" for found in first_blow(result))

"""Down to depth: resistance, set, stresses and driving time for a list of penetrations."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from solver.many import solve_many
from solver.model.project import Case
from solver.model.surroundings import Ground
from solver.studies.plan import Level
from solver.studies.sheet import Cell, Solver, cell_of_outcome
from solver.studies.variation import StudyError, checked, resistance_of

#: Most penetrations of one study; each is a case to solve.
MOST = 200
#: Set below which the member is said to refuse, m: 10 blows for 25 mm (common practice).
REFUSAL = 0.0025


@dataclass(frozen=True)
class DepthPoint:
    """One `penetration` (m): static `shaft` and `toe` resistance (N) while driving, and what a blow does there."""

    penetration: float
    shaft: float
    toe: float
    cell: Cell

    @property
    def refuses(self) -> bool:
        """Whether the member practically goes no deeper here."""
        return self.cell.set is not None and self.cell.set < REFUSAL


@dataclass(frozen=True)
class Depths:
    """Points with depths rising. `blows` and `seconds` (shape as the points) count from the first depth, by trapezoids
    of 1/set between depths; infinite from where the member practically does not move."""

    points: tuple[DepthPoint, ...]
    blows: tuple[float, ...]
    seconds: tuple[float, ...]

    @property
    def first_refusal(self) -> DepthPoint | None:
        """The first depth at which it refuses."""
        return next((p for p in self.points if p.refuses), None)

    @property
    def first_over(self) -> DepthPoint | None:
        """The first depth where a limit is passed."""
        return next((p for p in self.points if p.cell.over), None)


def at_penetration(case: Case, penetration: float, factors: Mapping[str, float] | None = None) -> Case:
    """The case with its toe at a depth (m) below the ground's surface: the ground moves along the member.

    `factors` multiply the resistance of layers by their name, "toe" that of the toe, "shaft" that of a total: below 1
    where driving loosens what sets up later, above 1 where ground relaxes. A shaft given as one total keeps its
    resistance per length ("uniform") or its growth with depth ("growing"). Raises `StudyError`.
    """
    ground, length = case.ground, case.member.length
    if ground is None:
        raise StudyError("A study of depths needs ground: the case has none.")
    if not 0 < penetration <= length:
        raise StudyError(
            "A penetration of {depth} must be more than 0 and at most the length, {length}.",
            depth=(penetration, "length"),
            length=(length, "length"),
        )
    factors = factors or {}
    check_factors(case, factors)
    return checked(case.model_copy(update={"ground": _moved(ground, length, penetration, factors)}))


def check_factors(case: Case, names: Iterable[str]) -> None:
    """Raises `StudyError` for a name that neither a layer of the case has, nor "toe" or "shaft"."""
    layers = case.ground.layers if case.ground else ()
    known = {layer.name for layer in layers} | {"toe", "shaft"}
    for name in names:
        if name not in known:
            raise StudyError(f"The ground has no layer named '{name}' (it has: {', '.join(sorted(known))}).")


def _moved(ground: Ground, length: float, penetration: float, factors: Mapping[str, float]) -> Ground:
    total, toe = ground.shaft_total, ground.toe
    if total is not None:
        share = penetration / (length - ground.surface)
        share = share if total.distribution == "uniform" else share**2
        resistance = total.resistance * share * factors.get("shaft", 1.0)
        total = total.model_copy(update={"resistance": resistance})
    layers = tuple(
        layer.model_copy(
            update={
                name: getattr(layer, name) * factors.get(layer.name, 1.0)
                for name in ("unit_resistance", "unit_resistance_bottom")
                if getattr(layer, name) is not None
            }
        )
        for layer in ground.layers
    )
    if toe is not None:
        toe = toe.model_copy(update={"resistance": toe.resistance * factors.get("toe", 1.0)})
    return ground.model_copy(
        update={"surface": length - penetration, "layers": layers, "shaft_total": total, "toe": toe}
    )


def down_to_depth(
    case: Case,
    penetrations: Sequence[float],
    factors: Mapping[str, float] | None = None,
    *,
    toe_at: Sequence[tuple[float, float]] = (),
    blows_per_minute: float = 40.0,
    progress: Callable[[int], None] | None = None,
    cancel: Callable[[], bool] | None = None,
    workers: int | None = None,
    solver: Solver | None = None,
) -> Depths | None:
    """Solve the case at each penetration (m); `None` when `cancel` answered True.

    `toe_at`: pairs of depth (m) and toe resistance (N), linear between them, in place of the one of the case.
    """
    depths = sorted(set(penetrations))
    if not 1 <= len(depths) <= MOST:
        raise StudyError(f"A study of depths takes 1 to {MOST} penetrations, not {len(depths)}.")
    if blows_per_minute <= 0:
        raise StudyError(f"The number of blows a minute must be more than 0, not {blows_per_minute:g}.")
    cases = [_until_rest(_with_toe(at_penetration(case, d, factors), d, toe_at)) for d in depths]
    cells: dict[int, Cell] = {}
    for outcome in (solver or solve_many)(cases, workers=workers, progress=progress, cancel=cancel):
        total = resistance_of(cases[outcome.index]).total
        level = Level("ground/surface", depths[outcome.index], "Penetration", "length")
        cells[outcome.index] = cell_of_outcome(outcome, outcome.index, 0, total, level)
    if len(cells) < len(depths):
        return None
    points = []
    for index, depth in enumerate(depths):
        now = resistance_of(cases[index])
        points.append(DepthPoint(depth, now.shaft, now.toe, cells[index]))
    blows = _blows(points)
    return Depths(tuple(points), blows, tuple(b * 60 / blows_per_minute for b in blows))


def _until_rest(case: Case) -> Case:
    return case.model_copy(update={"run": case.run.model_copy(update={"duration": None})})


def _with_toe(case: Case, depth: float, toe_at: Sequence[tuple[float, float]]) -> Case:
    if not toe_at:
        return case
    if case.ground is None or case.ground.toe is None:
        raise StudyError("A toe resistance over depth needs a toe in the ground of the case.")
    at, values = zip(*sorted(toe_at), strict=True)
    toe = case.ground.toe.model_copy(update={"resistance": float(np.interp(depth, at, values))})
    return case.model_copy(update={"ground": case.ground.model_copy(update={"toe": toe})})


def _blows(points: Sequence[DepthPoint]) -> tuple[float, ...]:
    counted = [0.0]
    for above, below in pairwise(points):
        rates = [p.cell.blows_per_metre for p in (above, below)]
        known = [r for r in rates if r is not None]
        step = below.penetration - above.penetration
        counted.append(counted[-1] + (sum(known) / 2 * step if len(known) == 2 else float("inf")))
    return tuple(counted)

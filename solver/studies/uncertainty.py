"""Many samples of what is not known: bands of the set, the probability that a limit is passed, what matters most.

Seeded Latin hypercubes, one for each resistance and the same on each line (McKay, Beckman and Conover 1979, from
memory), so that answers do not depend on the number of workers or the order in which samples finish.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from solver.answer.result import Result
from solver.many import solve_many
from solver.model.project import Case
from solver.studies.plan import Level, Plan
from solver.studies.sheet import Solver, solved_cell
from solver.studies.unknowns import INPUTS, Unknown
from solver.studies.variation import StudyError

Array = NDArray[np.float64]
FEWEST, MOST = 50, 5000
#: 5 and 95 % of a standard normal distribution lie at so many deviations.
NINE_OF_TEN = 1.6448536269514722


@dataclass(frozen=True)
class Influence:
    """Rank correlation (Spearman, -1 to 1, mean over the resistances) of an input with the set, and with the largest
    share of a limit, or the peak compression where no limit is given."""

    label: str
    on_set: float
    on_stress: float


@dataclass(frozen=True, eq=False)
class Bands:
    """On one line, for each of `resistances` (N) the 10, 50 and 90 % quantiles, shape (n, 3): of the `set` (m), the
    peak `compression` and `tension` (Pa). `over`: share of samples in which a limit is passed, shape (n,), `None`
    without limits. `each`: samples at a resistance."""

    level: Level
    resistances: Array
    set: Array
    compression: Array
    tension: Array
    over: Array | None
    each: int


@dataclass(frozen=True, eq=False)
class Sampled:
    """`lines`: bands of each level of the plan; `asked`: of the single point that was asked for, with more samples.
    `influences` of all points together, the strongest on the set first. `failed` samples could not be solved."""

    lines: tuple[Bands, ...]
    asked: Bands | None
    influences: tuple[Influence, ...]
    samples: int
    failed: int
    seed: int

    def of(self, level: Level) -> Bands | None:
        """The bands of a line."""
        return next((bands for bands in self.lines if bands.level == level), None)


def factors_of(unknowns: Sequence[Unknown], count: int, seed: Sequence[int]) -> Array:
    """Factors, shape (count, unknowns), by a Latin hypercube that follows from `seed` alone."""
    from scipy import stats  # a second: only where it is sampled

    cube = stats.qmc.LatinHypercube(len(unknowns), rng=np.random.default_rng(list(seed))).random(count)
    columns = []
    for unknown, share in zip(unknowns, cube.T, strict=True):
        if unknown.spread == "uniform":
            columns.append(unknown.low + (unknown.high - unknown.low) * share)
        else:
            middle = (np.log(unknown.low) + np.log(unknown.high)) / 2
            deviation = (np.log(unknown.high) - np.log(unknown.low)) / 2 / NINE_OF_TEN
            columns.append(np.exp(middle + deviation * stats.norm.ppf(share)))
    return np.stack(columns, axis=1)


@dataclass(frozen=True)
class _Spot:
    """A point that is sampled; spots with the same `stream` get the same factors, so that lines can be compared."""

    level: Level
    resistance: float
    count: int
    stream: int


def refuse_number_of_samples(samples: int) -> None:
    """Raises `StudyError` for fewer or more samples than a study takes."""
    if not FEWEST <= samples <= MOST:
        raise StudyError(f"A study of what is not known takes {FEWEST} to {MOST} samples, not {samples}.")


def sampled(
    plan: Plan,
    unknowns: Sequence[Unknown],
    *,
    asked: tuple[float, Level] | None = None,
    samples: int = 1000,
    seed: int = 1,
    progress: Callable[[int], None] | None = None,
    cancel: Callable[[], bool] | None = None,
    workers: int | None = None,
    solver: Solver | None = None,
) -> Sampled | None:
    """Solve `samples` variants, evenly over the lines and resistances of the plan; of these a tenth, or up to 50,
    at the resistance (N) and level that are `asked` for.

    `None` when `cancel` answered True. Raises `StudyError` where a range does not fit the case.
    """
    refuse_number_of_samples(samples)
    if not unknowns:
        raise StudyError("Nothing is unknown: give at least one input a range.")
    spots = _spots(plan, asked, samples)
    factors = [factors_of(unknowns, spot.count, (seed, spot.stream)) for spot in spots]
    found = [np.full((spot.count, 4), np.nan) for spot in spots]
    places = [(place, index) for place, spot in enumerate(spots) for index in range(spot.count)]
    done, refusal = 0, ""
    cases = _variants(plan, spots, unknowns, factors)
    for outcome in (solver or solve_many)(cases, workers=workers, progress=progress, cancel=cancel):
        done += 1
        if outcome.result is not None:
            place, index = places[outcome.index]
            found[place][index] = _figures(outcome.result, spots[place])
        else:
            refusal = refusal or str(outcome.error)
    if done < len(places):
        return None
    if all(np.isnan(one[:, 0]).all() for one in found):
        raise StudyError(f"None of the samples could be solved. The first: {refusal}")
    return _together(plan, spots, unknowns, factors, found, seed)


def _spots(plan: Plan, asked: tuple[float, Level] | None, samples: int) -> list[_Spot]:
    extra = 0 if asked is None else max(samples // 10, min(FEWEST, samples // 2))
    rows = len(plan.resistances)
    each = max(1, (samples - extra) // (rows * len(plan.levels)))
    spots = [
        _Spot(level, resistance, each, row)
        for level in plan.levels
        for row, resistance in enumerate(plan.resistances)
    ]
    return spots if asked is None else [*spots, _Spot(asked[1], asked[0], extra, rows)]


def _variants(
    plan: Plan, spots: Sequence[_Spot], unknowns: Sequence[Unknown], factors: Sequence[Array]
) -> Iterator[Case]:
    for spot, rows in zip(spots, factors, strict=True):
        base = plan.variant(spot.resistance, spot.level)
        for sample in rows:
            case = base
            for unknown, factor in zip(unknowns, sample, strict=True):
                case = INPUTS[unknown.what].changed(case, float(factor))
            yield case


def _figures(result: Result, spot: _Spot) -> tuple[float, float, float, float]:
    cell = solved_cell(spot.resistance, spot.level, result)
    assert cell.set is not None
    assert cell.compression is not None
    assert cell.tension is not None
    share = cell.share if cell.share is not None else np.nan
    return cell.set, cell.compression.peak.value, cell.tension.peak.value, share


def _together(
    plan: Plan,
    spots: Sequence[_Spot],
    unknowns: Sequence[Unknown],
    factors: Sequence[Array],
    found: Sequence[Array],
    seed: int,
) -> Sampled:
    failed = sum(int(np.isnan(one[:, 0]).sum()) for one in found)
    total = sum(spot.count for spot in spots)
    rows = len(plan.resistances)
    grid = rows * len(plan.levels)
    lines = [_bands(spots[i : i + rows], found[i : i + rows]) for i in range(0, grid, rows)]
    asked = _bands(spots[grid:], found[grid:]) if len(spots) > grid else None
    limited = not all(np.isnan(one[:, 3]).all() for one in found)
    influences = [
        Influence(
            INPUTS[unknown.what].label,
            _correlation([f[:, i] for f in factors], [one[:, 0] for one in found]),
            _correlation([f[:, i] for f in factors], [one[:, 3 if limited else 1] for one in found]),
        )
        for i, unknown in enumerate(unknowns)
    ]
    influences.sort(key=lambda one: -abs(one.on_set))
    return Sampled(tuple(lines), asked, tuple(influences), total, failed, seed)


def _bands(spots: Sequence[_Spot], found: Sequence[Array]) -> Bands:
    figures = np.stack(found)
    nothing = np.isnan(figures[:, :, 0]).all(axis=1)
    figures[nothing, :, :3] = 0.0  # a resistance at which no sample could be solved has no band
    quantiles = np.nanquantile(figures[:, :, :3], (0.1, 0.5, 0.9), axis=1).transpose(1, 2, 0)
    quantiles[nothing] = np.nan
    shares = figures[:, :, 3]
    known = (~np.isnan(shares)).sum(axis=1)
    over = (shares > 1).sum(axis=1) / np.maximum(known, 1) if known.any() else None
    resistances = np.array([spot.resistance for spot in spots])
    return Bands(
        spots[0].level, resistances, quantiles[:, 0], quantiles[:, 1], quantiles[:, 2], over, spots[0].count
    )


def _correlation(inputs: Sequence[Array], outcome: Sequence[Array]) -> float:
    """Mean over the points of Spearman's rank correlation; rows where nothing varies say nothing."""
    from scipy import stats

    found = []
    for x, y in zip(inputs, outcome, strict=True):
        known = ~np.isnan(y)
        if known.sum() > 2 and np.ptp(y[known]) > 0 and np.ptp(x[known]) > 0:
            found.append(float(stats.spearmanr(x[known], y[known]).statistic))
    return float(np.mean(found)) if found else 0.0

"""Many samples of what is not known: bands of the set, the probability that a limit is passed, what matters most.

Seeded Latin hypercubes, one for each resistance (McKay, Beckman and Conover 1979, from memory), so that answers do not
depend on the number of workers or the order in which samples finish.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

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
    """For each of `resistances` (N) the 10, 50 and 90 % quantiles, shape (n, 3): of the `set` (m), the peak
    `compression` and `tension` (Pa). `over`: share of samples in which a limit is passed, shape (n,), `None` without
    limits. `influences`, the strongest on the set first. `failed` samples could not be solved."""

    level: Level
    resistances: Array
    set: Array
    compression: Array
    tension: Array
    over: Array | None
    influences: tuple[Influence, ...]
    samples: int
    failed: int
    seed: int


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


def sampled(
    plan: Plan,
    unknowns: Sequence[Unknown],
    *,
    level: Level | None = None,
    samples: int = 1000,
    seed: int = 1,
    progress: Callable[[int], None] | None = None,
    cancel: Callable[[], bool] | None = None,
    workers: int | None = None,
    solver: Solver | None = None,
) -> Bands | None:
    """Solve `samples` variants, evenly over the resistances of the plan at one level (default: its first).

    `None` when `cancel` answered True. Raises `StudyError` where a range does not fit the case.
    """
    if not FEWEST <= samples <= MOST:
        raise StudyError(f"A study of what is not known takes {FEWEST} to {MOST} samples, not {samples}.")
    if not unknowns:
        raise StudyError("Nothing is unknown: give at least one input a range.")
    level = level or plan.levels[0]
    rows = len(plan.resistances)
    each = max(1, samples // rows)
    factors = np.stack([factors_of(unknowns, each, (seed, row)) for row in range(rows)])
    found = np.full((rows, each, 4), np.nan)
    cases = _variants(plan, level, unknowns, factors)
    done = 0
    for outcome in (solver or solve_many)(cases, workers=workers, progress=progress, cancel=cancel):
        done += 1
        if outcome.result is None:
            continue
        row, index = divmod(outcome.index, each)
        cell = solved_cell(plan.resistances[row], level, outcome.result)
        assert cell.compression is not None
        assert cell.tension is not None
        share = cell.share if cell.share is not None else np.nan
        found[row, index] = (cell.set, cell.compression.peak.value, cell.tension.peak.value, share)
    if done < rows * each:
        return None
    return _bands(plan, level, unknowns, factors, found, seed)


def _variants(plan: Plan, level: Level, unknowns: Sequence[Unknown], factors: Array) -> Iterator[Case]:
    for resistance, row in zip(plan.resistances, factors, strict=True):
        base = plan.variant(resistance, level)
        for sample in row:
            case = base
            for unknown, factor in zip(unknowns, sample, strict=True):
                case = INPUTS[unknown.what].changed(case, float(factor))
            yield case


def _bands(
    plan: Plan, level: Level, unknowns: Sequence[Unknown], factors: Array, found: Array, seed: int
) -> Bands:
    failed = int(np.isnan(found[:, :, 0]).sum())
    if failed == found[:, :, 0].size:
        raise StudyError("None of the samples could be solved.")
    quantiles = np.nanquantile(found[:, :, :3], (0.1, 0.5, 0.9), axis=1).transpose(1, 2, 0)
    shares = found[:, :, 3]
    limited = not np.isnan(shares).all()
    solved = ~np.isnan(shares)
    over = (shares > 1).sum(axis=1) / np.maximum(solved.sum(axis=1), 1) if limited else None
    stress = shares if limited else found[:, :, 1]
    influences = [
        Influence(
            INPUTS[unknown.what].label,
            _correlation(factors[:, :, i], found[:, :, 0]),
            _correlation(factors[:, :, i], stress),
        )
        for i, unknown in enumerate(unknowns)
    ]
    influences.sort(key=lambda one: -abs(one.on_set))
    return Bands(
        level,
        np.array(plan.resistances),
        quantiles[:, 0],
        quantiles[:, 1],
        quantiles[:, 2],
        over,
        tuple(influences),
        found.shape[0] * found.shape[1],
        failed,
        seed,
    )


def _correlation(inputs: Array, outcome: Array) -> float:
    """Mean over the rows of Spearman's rank correlation; rows where nothing varies say nothing."""
    from scipy import stats

    found = []
    for x, y in zip(inputs, outcome, strict=True):
        known = ~np.isnan(y)
        if known.sum() > 2 and np.ptp(y[known]) > 0 and np.ptp(x[known]) > 0:
            found.append(float(stats.spearmanr(x[known], y[known]).statistic))
    return float(np.mean(found)) if found else 0.0

"""Whole solves: against general solvers, many at once on two threads, and how much memory a long run takes."""

from __future__ import annotations

import subprocess
import sys
import time
from collections.abc import Iterator
from importlib.util import find_spec
from pathlib import Path
from threading import Lock
from typing import Any
from unittest.mock import patch

import numpy as np

import solver.marching
from solver import solve_many
from solver.studies.variation import resistance_of, with_resistance
from tests.bench import cases, ivp
from tests.bench.measure import Row, calibration, spread_of
from tests.bench.twin import NO_COMPILER, library

CHECKOUT = Path(__file__).parents[2]
#: Error that both must keep.
WANTED = 2e-3
#: Lengths of the pulse, s, with the solver of scipy that was quickest at this error among all six, the loosest
#: tolerance and the fewest elements that keep it. The short pulse is a blow as all other cases here have it, and is
#: blurred by the masses and springs of a general solver unless there are many of them. The long one is smooth enough
#: for 400 on both sides; it hardly makes waves, and an implicit method strides over what is left of them.
PULSES = {
    "vs_ivp": (0.001, 1_400, ivp.Attempt("DOP853", 1e-5), 300.0),
    "vs_ivp smooth": (0.003, 400, ivp.Attempt("Radau", 1e-5), None),
}


def vs_ivp(short: bool) -> Iterator[Row]:
    """Ours on 400 elements, scipy's on as many as it needs."""
    for name, (pulse, elements, attempt, reach) in PULSES.items():
        case = cases.layered(400, pulse)
        reference = ivp.program(cases.layered(6_400, pulse))
        theirs, ours, ratios, beats = [], [], [], []
        repetitions = 1 if short else 3
        for _ in range(repetitions):
            beats.append(calibration())
            ours.append([ivp.program(case) for _ in range(5)])
            theirs.append(ivp.scipys(cases.layered(elements, pulse), attempt))
            ratios.append(theirs[-1].seconds / float(np.median([one.seconds for one in ours[-1]])))
            beats.append(calibration())
        row = Row(
            name,
            f"{attempt.method} on {elements} elements / our whole solve on 400, both within {WANTED:g}; "
            f"three layers, haversine of {pulse * 1000:g} ms, 0.1 s",
            float(np.median(ratios)),
            reach,
            spread=spread_of(ratios),
            repetitions=repetitions,
            noise=spread_of(beats),
        )
        errors = {
            "our_error": ivp.error(ours[0][0], reference),
            "their_error": ivp.error(theirs[0], reference),
        }
        seconds = {"our_seconds": min(one.seconds for one in ours[0]), "their_seconds": theirs[0].seconds}
        row.more = {**errors, **seconds}
        if max(errors.values()) > WANTED:
            row.ratio, row.skipped = None, f"the error asked for, {WANTED:g}, was not kept"
        yield row


def threads(short: bool) -> Iterator[Row]:
    """What a second thread gains, held against what a second process of the C twin gains on this machine."""
    row = Row("threads", "", reach=0.95)
    if library() is None:
        row.skipped = NO_COMPILER
        yield row
        return
    repetitions, count = 5, 24
    batch = [cases.pile(drop_height=0.5 + 0.02 * i) for i in range(count)]
    list(solve_many(batch[:2], workers=1))
    ours, c, shares, beats = [], [], [], []
    with _Twins() as twins:
        for _ in range(repetitions):
            beats.append(calibration())
            ours.append(_many(batch, 1) / _many(batch, 2))
            c.append(2 * twins.march(1) / twins.march(2))
            shares.append(ours[-1] / c[-1])
            beats.append(calibration())
    row.compared = (
        "gain of two threads over one (solve_many, default pile) / gain of two processes of the C twin"
    )
    row.ratio, row.spread, row.repetitions = float(np.median(shares)), spread_of(shares), repetitions
    row.noise = spread_of(beats)
    row.more = {"gain_of_two_threads": float(np.median(ours)), "gain_of_two_c_processes": float(np.median(c))}
    yield row


def _many(batch: list[Any], workers: int) -> float:
    began = time.perf_counter()
    for outcome in solve_many(batch, workers=workers):
        assert outcome.result is not None
    return time.perf_counter() - began


class _Twins:
    """Two processes that march the C twin when they are told to."""

    def __enter__(self) -> _Twins:
        command = [sys.executable, "-m", "tests.bench.twin_process"]
        self._processes = [
            subprocess.Popen(command, cwd=CHECKOUT, text=True, stdin=subprocess.PIPE, stdout=subprocess.PIPE)
            for _ in range(2)
        ]
        for process in self._processes:
            assert process.stdout is not None
            process.stdout.readline()
        return self

    def march(self, count: int) -> float:
        began = time.perf_counter()
        for process in self._processes[:count]:
            assert process.stdin is not None
            print("go", file=process.stdin, flush=True)
        for process in self._processes[:count]:
            assert process.stdout is not None
            process.stdout.readline()
        return time.perf_counter() - began

    def __exit__(self, *error: object) -> None:
        for process in self._processes:
            process.communicate()


class _KernelTime:
    """Stands in for the kernel and sums the processor time that its threads spend in it."""

    def __init__(self, kernel: Any) -> None:
        self._kernel, self._lock, self.seconds = kernel, Lock(), 0.0

    def __call__(self, *arguments: Any) -> Any:
        began = time.thread_time()
        answer = self._kernel(*arguments)
        with self._lock:
            self.seconds += time.thread_time() - began
        return answer


def many(short: bool) -> Iterator[Row]:
    """1,000 default pile cases on two threads. They differ in their drop, so that the member is brought to rest once;
    what is left where the ground differs too is told beside it."""
    batch = [cases.pile(None, 0.5 + 0.001 * i) for i in range(1_000)]
    list(solve_many(batch[:1], workers=1))
    beats = [calibration() for _ in range(5)]
    share, solved, seconds = _share_of_kernel(batch)
    beats += [calibration() for _ in range(5)]
    strength = resistance_of(batch[0]).total
    others = [with_resistance(case, (1 + 0.001 * i) * strength) for i, case in enumerate(batch[:200])]
    yield Row(
        "many",
        "processor time in the kernel / in the whole process, 1,000 default pile cases on two threads",
        share,
        0.80,
        repetitions=1,
        noise=spread_of(beats),
        more={
            "solved": solved,
            "seconds": seconds,
            "share_where_ground_differs": _share_of_kernel(others)[0],
        },
    )


def _share_of_kernel(batch: list[Any]) -> tuple[float, int, float]:
    """Processor time in the kernel over that of the process; how many were solved, in how many seconds."""
    timed = _KernelTime(solver.marching.march)
    with patch.object(solver.marching, "march", timed):
        began, spent = time.perf_counter(), time.process_time()
        solved = sum(outcome.result is not None for outcome in solve_many(batch, workers=2))
        seconds, spent = time.perf_counter() - began, time.process_time() - spent
    return timed.seconds / spent, solved, seconds


def memory(short: bool) -> Iterator[Row]:
    """Peak resident memory of two processes, one with a hundred times the steps."""
    row = Row(
        "memory",
        "peak memory of 10^7 steps / of 10^5 steps, three gauges, 50 elements",
        reach=1.2,
        at_most=True,
    )
    if find_spec("resource") is None:
        row.skipped = "peak memory cannot be read here"
        yield row
        return
    row.repetitions = 1
    peaks = {steps: _peak(steps) for steps in (100_000, 10_000_000)}
    row.ratio = peaks[10_000_000] / peaks[100_000]
    row.more = {f"MB_of_{steps:.0e}": peak / 1e6 for steps, peak in peaks.items()}
    yield row


def _peak(steps: int) -> float:
    """Bytes."""
    command = [sys.executable, "-m", "tests.bench.peak_process", str(steps)]
    told = subprocess.run(command, cwd=CHECKOUT, text=True, stdout=subprocess.PIPE, check=True).stdout
    return float(told.split()[-1])

"""Many cases at once, in threads: the kernels let go of Python's lock, so threads march side by side."""

from __future__ import annotations

import os
from collections.abc import Callable, Iterable, Iterator
from concurrent.futures import FIRST_COMPLETED, Future, ThreadPoolExecutor, wait
from dataclasses import dataclass

from solver.answer.result import Result
from solver.errors import SolveError
from solver.model.project import Case
from solver.run import solve


@dataclass(frozen=True)
class Outcome:
    """What became of the case with number `index`: its `result`, or the `error` that says why there is none."""

    index: int
    result: Result | None
    error: SolveError | None = None


def solve_many(
    cases: Iterable[Case],
    workers: int | None = None,
    progress: Callable[[int], None] | None = None,
    cancel: Callable[[], bool] | None = None,
) -> Iterator[Outcome]:
    """Solve cases and yield each `Outcome` as it finishes, whatever the order; results do not depend on the order.

    `workers` threads (default: one a processor) march at the same time, and no more cases are taken from `cases` than
    are at work, so memory does not grow with their number. A case that cannot be solved does not stop the others.
    `progress` is called with the number of finished cases. When `cancel` answers True, no further case is begun, those
    at work are stopped, and nothing more is yielded.
    """
    threads = workers or os.cpu_count() or 1
    queue = enumerate(cases)
    stopped = False

    def hear() -> bool:
        return stopped or (cancel is not None and cancel())

    finished = 0
    pool = ThreadPoolExecutor(threads, thread_name_prefix="solve")
    at_work: set[Future[Outcome]] = set()
    try:
        while not hear():
            while len(at_work) < threads and (following := next(queue, None)) is not None:
                at_work.add(pool.submit(_solve_one, *following, hear))
            if not at_work:
                return
            done, at_work = wait(at_work, timeout=0.1, return_when=FIRST_COMPLETED)
            while done:
                outcome = done.pop().result()
                if outcome.result is not None and not outcome.result.finished:
                    return
                finished += 1
                if progress is not None:
                    progress(finished)
                yield outcome
                # the next case finds the room of this one, unless somebody keeps its result
                del outcome
    finally:
        stopped = True
        pool.shutdown(wait=True, cancel_futures=True)


def _solve_one(index: int, case: Case, cancel: Callable[[], bool]) -> Outcome:
    try:
        return Outcome(index, solve(case, cancel=cancel))
    except SolveError as error:
        return Outcome(index, None, error)

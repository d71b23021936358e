"""The same study on a Dask cluster: an optional way (`striketrace[cluster]`) to solve many cases on other machines.

A worker that dies takes nothing with it: the scheduler gives its cases to another one, and each outcome is handed over
once. What a case gives does not depend on where it is solved, so the files of a study are the same bytes.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator
from contextlib import contextmanager
from dataclasses import replace
from itertools import islice
from typing import TYPE_CHECKING, Any

import numpy as np

from solver.answer.result import Fields, read_only
from solver.errors import SolveError
from solver.many import Outcome
from solver.model.project import Case
from solver.run import solve
from solver.studies.sheet import Solver
from solver.studies.variation import StudyError

if TYPE_CHECKING:
    from distributed import Client

#: Cases handed out at a time for each thread of the cluster, so that none waits and memory does not grow.
AHEAD = 3


@contextmanager
def on_cluster(address: str) -> Iterator[Solver]:
    """While it is open, a solver with the call of `solve_many` on the cluster at an address ("tcp://host:8786").

    Its results carry no pictures over time. Raises `StudyError` where Dask is not installed or nobody answers.
    """
    try:
        from distributed import Client
    except ImportError:
        raise StudyError(
            "A cluster needs Dask, which is not installed: pip install 'striketrace[cluster]'."
        ) from None
    try:
        client = Client(address, timeout=10)
    except (OSError, TimeoutError, ValueError) as error:
        raise StudyError(
            f"No cluster answers at {address} ({type(error).__name__}): start its scheduler there, or give an address "
            "such as tcp://host:8786."
        ) from None

    def solver(
        cases: Iterable[Case],
        workers: int | None = None,
        progress: Callable[[int], None] | None = None,
        cancel: Callable[[], bool] | None = None,
    ) -> Iterator[Outcome]:
        """As `solve_many`; the number of workers is that of the cluster."""
        return _solved(client, cases, progress, cancel)

    with client:
        yield solver


def _solved(
    client: Client,
    cases: Iterable[Case],
    progress: Callable[[int], None] | None,
    cancel: Callable[[], bool] | None,
) -> Iterator[Outcome]:
    from distributed import as_completed

    threads = sum(client.nthreads().values()) or 1
    queue = enumerate(cases)
    handed = [_hand_over(client, *entry) for entry in islice(queue, AHEAD * threads)]
    waiting = as_completed(handed)
    for finished, future in enumerate(waiting, start=1):
        if cancel is not None and cancel():
            client.cancel(list(waiting.futures))
            return
        outcome: Outcome = future.result()
        future.release()
        following = next(queue, None)
        if following is not None:
            waiting.add(_hand_over(client, *following))
        if progress is not None:
            progress(finished)
        yield outcome


def _hand_over(client: Client, index: int, case: Case) -> Any:
    return client.submit(_solve_there, index, case, pure=False, retries=2)


def _solve_there(index: int, case: Case) -> Outcome:
    """On a worker: the result without its pictures, which would be most of what travels."""
    try:
        result = solve(case)
    except SolveError as error:
        return Outcome(index, None, error)
    return Outcome(index, replace(result, fields=_no_pictures(), head_train=None))


def _no_pictures() -> Fields:
    nothing, none = read_only(np.zeros(0)), np.zeros((0, 0), dtype=np.float32)
    return Fields(nothing, nothing, nothing, nothing, nothing, none, none, none)

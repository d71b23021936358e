"""On a cluster of two processes, one of which dies in the middle: nothing lost, nothing twice, the same bytes."""

import os
import signal
import sys

import numpy as np
import pytest

from app.set_sheet.files import sheet_csv
from solver.studies import StudyError, cells_of, gathered, plan_of, solve_sheet
from tests.studies.piles import pile

try:
    import distributed
except ImportError:
    distributed = None

needs_dask = pytest.mark.skipif(
    distributed is None, reason="Dask is optional (striketrace[cluster]) and not installed"
)


@needs_dask
@pytest.mark.skipif(sys.platform == "win32", reason="a process is killed by a signal")
@pytest.mark.filterwarnings("ignore")
def test_worker_that_dies_loses_nothing_and_repeats_nothing() -> None:
    from solver.studies.cluster import on_cluster
    from solver.studies.uncertainty import sampled
    from solver.studies.unknowns import usual_unknowns

    plan = plan_of(pile(elements=60))
    local = sheet_csv(solve_sheet(plan), "Trial")
    found = []
    killed = False
    unknowns = usual_unknowns(plan.case)
    with (
        distributed.LocalCluster(
            n_workers=2, threads_per_worker=1, processes=True, dashboard_address=None
        ) as cluster,
        on_cluster(cluster.scheduler_address) as solver,
    ):
        for cell in cells_of(plan, solver=solver):
            found.append(cell)
            if len(found) == 8 and not killed:
                os.kill(next(iter(cluster.workers.values())).pid, signal.SIGKILL)
                killed = True
        there = sampled(plan, unknowns, samples=50, solver=solver)
    assert killed
    assert sorted((c.line, c.row) for c in found) == [(line, row) for line in range(3) for row in range(10)]
    assert sheet_csv(gathered(plan, iter(found)), "Trial") == local
    here = sampled(plan, unknowns, samples=50)
    assert there is not None
    assert here is not None
    assert np.array_equal(there.lines[0].set, here.lines[0].set)


def test_without_a_cluster_it_is_said_what_is_missing() -> None:
    from solver.studies.cluster import on_cluster

    with (
        pytest.raises(StudyError, match="No cluster answers" if distributed else r"striketrace\[cluster\]"),
        on_cluster("tcp://127.0.0.1:9"),
    ):
        pass

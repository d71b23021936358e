"""Compile all kernels ahead of need: `python -m solver.warm_up`. Kept on disk, they take their seconds once.

Where none is kept yet, a second process compiles from the other end of a step what one process reaches last, and leaves
it on disk; the two meet in the middle.
"""

from __future__ import annotations

import subprocess
import sys

import numba
import numpy as np

from solver.model.file import project_from_tree
from solver.model.project import FORMAT, VERSION, Case
from solver.numerics import contact, records
from solver.numerics import march as stages
from solver.numerics.assemble import bounds_of, extremes_of, gauge_readings, motion_of, records_of, rod_of
from solver.numerics.chain import build_chain
from solver.numerics.compiled import cache_problem, were_kept
from solver.numerics.ground import shaft_of
from solver.run import solve

LAST_PARTS = "last parts"


def warm_up() -> None:
    """Solve the smallest case there is. One kernel marches every case, so that this compiles it for all."""
    beside = begin_beside()
    solve(_smallest())
    if beside is not None:
        beside.wait()


def begin_beside() -> subprocess.Popen[bytes] | None:
    """Begin the second process where it helps; it ends by itself."""
    if were_kept or cache_problem:
        return None
    nowhere = subprocess.DEVNULL
    try:
        return subprocess.Popen(
            [sys.executable, "-m", "solver.warm_up", LAST_PARTS],
            stdin=nowhere,
            stdout=nowhere,
            stderr=nowhere,
            creationflags=getattr(subprocess, "CREATE_NO_WINDOW", 0),
        )
    except OSError:
        return None


def compile_last_parts() -> None:
    """What a march calls late in a step, without marching; the largest parts that it reaches last come first."""
    chain = build_chain(_smallest())
    rod, ground, bounds, motion = rod_of(chain), shaft_of(chain), bounds_of(chain), motion_of(chain)
    ext, sums, push, u, v = extremes_of(chain), np.zeros(8), rod.push, motion.u, motion.v
    flags = np.zeros(1, dtype=np.int64)
    rec = records_of(chain, gauge_readings(chain), 1, np.zeros(1, dtype=np.int64), flags)
    note, force, dt, step = (rec.events, rec.event_count), motion.force, 1.0, 1
    for part, arguments in (
        (stages.train_step, (bounds, push, u, v, v, sums, dt, note, step)),
        (stages.toe_node, (bounds, push, u, v, v, sums, dt, note, step)),
        (stages.shaft_nodes, (ground, push, v, v, sums, dt)),
        (records.keep_first_blow, (ext, bounds, note, step)),
        (records.read_gauges, (rec, u, v, v, force, v, dt, step)),
        (records.read_train, (rec, bounds, v, v, step, step)),
        (records.take_frame, (rec, u, v, v, force, v, step)),
        (contact.joints, (bounds, push, u, v, v, dt, note, step)),
        (contact.wall, (bounds, push, u, v, v, dt, note, step)),
        (stages.driving_force, (rod, u, v, v, force, dt)),
        (stages.dashpot_losses, (rod, v, v, step)),
    ):
        part.compile(tuple(numba.typeof(one) for one in arguments))


def _smallest() -> Case:
    section = {"shape": "custom", "area": 0.01, "perimeter": 0.4}
    segment = {"name": "rod", "length": 1.0, "material": "any", "section": section}
    tree = {
        "format": FORMAT,
        "version": VERSION,
        "title": "warm-up",
        "materials": [{"name": "any", "young_modulus": 2e11, "density": 8000.0}],
        "cases": [
            {
                "name": "warm-up",
                "member": {"segments": [segment]},
                "load": {
                    "kind": "pulse",
                    "quantity": "force",
                    "shape": "rectangle",
                    "peak": 1.0,
                    "duration": 1e-3,
                },
                "far_end": {"kind": "fixed"},
                "run": {"duration": 1e-5, "element_length": 0.5, "gravity": True},
            }
        ],
    }
    return project_from_tree(tree).cases[0]


if __name__ == "__main__":
    compile_last_parts() if LAST_PARTS in sys.argv else warm_up()

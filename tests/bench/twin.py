"""The C twin: compiled by the benchmark, given the same arrays, and compared in its answer before it is in its time."""

from __future__ import annotations

import ctypes
import shutil
import subprocess
import tempfile
import time
from collections.abc import Callable
from functools import cache
from pathlib import Path

import numpy as np

from tests.bench.rig import Rig

SOURCE = Path(__file__).with_name("twin.c")
#: The second line gives C the licence that the kernels have: sums in any order.
FLAGS = (
    "-O3", "-march=native",
    "-fassociative-math", "-fno-signed-zeros", "-fno-trapping-math",
    "-shared", "-fPIC", "-lm",
)  # fmt: skip

WHOLE = ("nodes", "steps", "stride", "head", "columns", "shaft_first", "shaft_nodes", "gauges", "parts")
POINTERS = (
    "u", "v", "w", "pulls", "rest", "stiff", "push", "mass", "weight", "load",
    "low", "low_step", "high", "high_step", "speed", "travel", "ledger", "sums", "column",
    "area", "frame_stress", "frame_velocity", "frame_moved",
    "r", "par", "toe_par", "toe_state", "train_par", "train_state", "train_force", "ram",
    "gauge_node", "gauge_weight", "gauge", "second",
)  # fmt: skip


class _Struct(ctypes.Structure):
    _fields_ = (
        [(name, ctypes.c_int64) for name in WHOLE]
        + [("dt", ctypes.c_double)]
        + [(name, ctypes.c_void_p) for name in POINTERS]
    )


@cache
def library() -> ctypes.CDLL | None:
    """The compiled twin; None where there is no compiler."""
    compiler = shutil.which("gcc") or shutil.which("cc")
    if compiler is None:
        return None
    folder = tempfile.mkdtemp(prefix="striketrace-bench-")
    made = Path(folder) / "twin.so"
    subprocess.run([compiler, str(SOURCE), "-o", str(made), *FLAGS], check=True)
    found = ctypes.CDLL(str(made))
    shutil.rmtree(folder, ignore_errors=True)
    return found


NO_COMPILER = "no C compiler is here"


class Twin:
    """The same march as a rig's, in C. `kind`: "linear" or "pile"."""

    def __init__(self, rig: Rig, kind: str) -> None:
        self.rig = rig
        found = library()
        assert found is not None
        self._march = getattr(found, kind)
        records = rig.records
        # touched once, as those of the rig are: a march that is the first to write on new pages pays for them
        self.ledger = np.zeros(records.ledger.shape)
        self.gauge = np.ones(records.gauges.shape)
        self.ram = np.ones((3, rig.steps))
        self.frames = [np.ones(records.stress.shape, np.float32) for _ in range(3)]
        self.reset()

    def reset(self) -> None:
        rig = self.rig
        rig.reset()
        s, records, steps = rig.state, rig.records, rig.steps
        gauges = len(records.node)
        self.arrays = {
            **{n: getattr(s.motion, n) for n in ("u", "v", "w", "pulls", "rest")},
            **{n: getattr(s.rod, n) for n in ("stiff", "push", "mass", "weight")},
            "load": rig.load,
            **{
                n: getattr(rig.extremes, n)
                for n in ("low", "low_step", "high", "high_step", "speed", "travel")
            },
            "ledger": self.ledger,
            "sums": rig.sums,
            "column": records.columns,
            "area": records.area,
            "frame_stress": self.frames[0],
            "frame_velocity": self.frames[1],
            "frame_moved": self.frames[2],
            "r": s.shaft.r,
            "par": s.shaft.par,
            **{
                n: getattr(s.bounds, n)
                for n in ("toe_par", "toe_state", "train_par", "train_state", "train_force")
            },
            "ram": self.ram,
            "gauge_node": records.node,
            "gauge_weight": records.weights,
            "gauge": self.gauge,
            "second": rig.extremes.second,
        }
        assert all(a.flags.c_contiguous for a in self.arrays.values())
        whole = (rig.chain.nodes, steps, rig.stride, rig.chain.head, len(records.columns))
        whole += (int(s.shaft.first), len(s.shaft.r), gauges, records.ledger.shape[1])
        self.struct = _Struct(*whole, rig.chain.dt, *(self.arrays[n].ctypes.data for n in POINTERS))

    def run(self, clock: Callable[[], float] = time.thread_time) -> float:
        """Seconds of one march from rest."""
        self.reset()
        began = clock()
        self._march(ctypes.byref(self.struct))
        return clock() - began

    def differs(self) -> float:
        """Largest difference of ledger, envelopes and gauges from the kernel's, relative to the largest value."""
        self.run()
        low, gauge, ledger = self.rig.extremes.low.copy(), self.gauge.copy(), self.ledger.copy()
        self.rig.run()
        records = self.rig.records
        pairs = [(self.rig.extremes.low, low), (records.ledger, ledger), (records.stress, self.frames[0])]
        pairs += [*zip(records.gauges, gauge, strict=True)]
        return max(
            float(np.max(np.abs(a - b))) / max(float(np.max(np.abs(a))), 1e-300) for a, b in pairs if a.size
        )

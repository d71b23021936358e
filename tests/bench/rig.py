"""The march of one case taken out of the program: the kernel alone, started again and again from the same state."""

from __future__ import annotations

import time
from collections.abc import Callable

import numpy as np

from solver import Case
from solver.marching import FRAMES, shown_links
from solver.model.load import Pulse
from solver.numerics.arrays import Motion, Rest, aligned
from solver.numerics.assemble import bounds_of, extremes_of, gauge_readings, motion_of, records_of, rod_of
from solver.numerics.chain import build_chain
from solver.numerics.equilibrium import State, bring_to_rest
from solver.numerics.ground import shaft_of
from solver.numerics.march import march
from solver.numerics.pulses import step_forces, step_velocities


class Rig:
    """A case ready to march `steps` steps. `run` measures the kernel and nothing else."""

    def __init__(self, case: Case, steps: int) -> None:
        self.chain, self.steps = build_chain(case), steps
        # as many frames as a run of the whole duration takes, if these steps are a part of it
        planned = max(steps, round((case.run.duration or 0.1) / self.chain.dt))
        self.fresh = State(
            rod_of(self.chain), shaft_of(self.chain), bounds_of(self.chain), motion_of(self.chain)
        )
        bring_to_rest(self.chain, self.fresh)
        self.stride = 2 ** max(0, int(np.floor(np.log2(max(1, planned / FRAMES)))))
        self.flags = np.zeros(len(self.fresh.rod.blocks), dtype=np.int64)
        readings, rows = gauge_readings(self.chain), (steps - 1) // self.stride + 1
        self.records = records_of(self.chain, readings, rows, shown_links(self.chain), self.flags)
        self.records = self.records._replace(
            gauges=np.ones((len(self.records.gauges), steps)), ram=np.ones((len(self.records.ram), steps))
        )
        self.ends = Rest(0, 0.0, False, np.zeros(1, dtype=np.int64), np.zeros(1))
        self.load = self._load()
        self.reset()

    @property
    def elements(self) -> int:
        return self.chain.nodes - 1

    @property
    def work(self) -> float:
        """Elements times steps."""
        return float(self.elements) * self.steps

    def reset(self) -> None:
        """Back to rest before the blow."""
        self.state = _anew(self.fresh)
        self.extremes, self.sums = extremes_of(self.chain), np.zeros(8)
        self.flags[:] = 0
        self.records.event_count[0] = 0

    def run(self, clock: Callable[[], float] = time.thread_time) -> float:
        """Seconds of one march from rest."""
        self.reset()
        s = self.state
        began = clock()
        march(
            s.rod, s.shaft, s.bounds, s.motion, self.extremes, self.records, self.ends, self.sums,
            self.load, 0, self.steps, self.stride, self.chain.dt,
        )  # fmt: skip
        return clock() - began

    def _load(self) -> np.ndarray:
        load = self.chain.case.load
        if not isinstance(load, Pulse):
            return np.zeros(self.steps)
        found = step_forces if load.quantity == "force" else step_velocities
        return found(load, 0, self.steps, self.chain.dt)


def _anew(fresh: State) -> State:
    """A copy whose arrays begin on lines of cache as those of the program do."""
    groups = (fresh.rod, fresh.shaft, fresh.bounds)
    u, v, w, pulls, rest = fresh.motion
    motion = Motion(aligned(u), aligned(v), aligned(w), aligned(pulls, ahead=1), aligned(rest))
    return State(*(group._make(_copied(one) for one in group) for group in groups), motion)


def _copied(one: object) -> object:
    if not isinstance(one, np.ndarray):
        return one
    return aligned(one) if one.dtype == np.float64 else one.copy()

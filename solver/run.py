"""Solve a case: discretise, bring to rest, march in chunks with progress and cancel, gather the answer."""

from __future__ import annotations

import time
from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from solver.answer.gather import Blow, gather
from solver.answer.result import Result
from solver.errors import SolveError
from solver.model.load import History, Pulse
from solver.model.project import Case, RepeatedBlows
from solver.numerics.arrays import Extremes
from solver.numerics.assemble import bounds_of, extremes_of, motion_of, records_of, rod_of
from solver.numerics.balance import LEDGER, SLIP, balance
from solver.numerics.chain import Chain, build_chain
from solver.numerics.equilibrium import State, bring_to_rest
from solver.numerics.ground import shaft_of
from solver.numerics.links import link_forces
from solver.numerics.march import march
from solver.numerics.pulses import end_time, step_forces, step_velocities
from solver.numerics.settle import settle
from solver.watch import refuse_bad_state, refuse_unsupported

Array = NDArray[np.float64]

#: Element-steps in a chunk: some 30 ms, between which progress is told and Stop is heard.
CHUNK = 8_000_000
#: Most element-steps of a run; more would take hours and is refused with a word.
MOST_WORK = 2e12
#: Share of the largest velocity below which the member counts as nearly at rest (and below which it may ring on in
#: ground that slips no more), and for how many chunks of such runs it must: what still moves is settled statically.
STILL = 0.03
RINGING = 0.2
STILL_CHUNKS = 8
#: Frames kept for the pictures; above twice as many every second one is dropped.
FRAMES = 1024
#: Columns of the pictures along the member.
COLUMNS = 800


@dataclass(frozen=True)
class Progress:
    """How far a run is: share done (0 to 1), seconds that are probably left, and what is solved so far."""

    fraction: float
    seconds_left: float
    partial: Callable[[], Result]


def solve(
    case: Case,
    *,
    element_length: float | None = None,
    progress: Callable[[Progress], None] | None = None,
    cancel: Callable[[], bool] | None = None,
) -> Result:
    """Solve one case of a project.

    `element_length` (m) overrides that of the case. `progress` is called between chunks; when `cancel` answers True,
    what is solved so far is returned with `finished` False. Raises `SolveError` with a sentence where the case cannot
    be solved.
    """
    refuse_unsupported(case)
    return solve_chain(build_chain(case, element_length), progress, cancel)


def solve_chain(
    chain: Chain,
    progress: Callable[[Progress], None] | None = None,
    cancel: Callable[[], bool] | None = None,
) -> Result:
    """Solve a case that is discretised already. Same arguments and errors as `solve`."""
    began = time.perf_counter()
    wanted = chain.case.run.blows
    most = wanted.most if isinstance(wanted, RepeatedBlows) else wanted
    tolerance = wanted.tolerance if isinstance(wanted, RepeatedBlows) else 0.0
    state = State(rod_of(chain), shaft_of(chain), bounds_of(chain), motion_of(chain))
    bring_to_rest(chain, state)
    sets: list[float] = []
    for blow in range(most):
        march_of = March(chain, state, began, blow / most, 1 / most, sets)
        stopped = march_of.run(progress, cancel)
        at_end = state.motion.u.copy()
        settled = settle(chain, state) if chain.case.ground is not None and not stopped else False
        rest_before = march_of.rest
        if chain.case.ground is not None:
            sets.append(float(state.motion.u[-1] - rest_before[-1]))
        last = stopped or blow == most - 1
        if len(sets) > 1 and abs(sets[-1] - sets[-2]) <= tolerance:
            last = True
        if last:
            return march_of.result(stopped, settled, at_end)
        state = _next_blow(chain, state)
    raise AssertionError("a run has at least one blow")


def _next_blow(chain: Chain, old: State) -> State:
    """The member as it came to rest, its ram lifted to strike again: new cushions, the ground as it was left."""
    state = State(rod_of(chain), old.shaft, bounds_of(chain), motion_of(chain))
    state.rod.state[:] = old.rod.state
    state.bounds.toe_state[:] = old.bounds.toe_state
    fresh = State(rod_of(chain), shaft_of(chain), bounds_of(chain), motion_of(chain))
    bring_to_rest(chain, fresh)
    u = old.motion.u.copy()
    lift = fresh.motion.u[: chain.head] - fresh.motion.u[chain.head]
    u[: chain.head] = u[chain.head] + lift
    state.bounds.train_state[:] = fresh.bounds.train_state
    state.bounds.train_force[:] = fresh.bounds.train_force
    state.motion.u[:] = u
    state.motion.rest[:] = u
    state.motion.v[:] = fresh.motion.v
    return state


class March:
    """One blow: marches a state through time and keeps what it records."""

    def __init__(
        self, chain: Chain, state: State, began: float, base: float, share: float, sets: list[float]
    ) -> None:
        self.chain, self.state, self.sets = chain, state, sets
        self.began, self.base, self.share = began, base, share
        self.rest = state.motion.rest.copy()
        self.extremes: Extremes = extremes_of(chain)
        self.sums = np.zeros(8)
        self.flags = np.zeros(len(state.rod.blocks), dtype=np.int64)
        self.steps = 0
        self.stride = 1
        links = np.flatnonzero(chain.axial > 0)
        shown = np.unique(np.linspace(0, len(links) - 1, min(COLUMNS, len(links))).round().astype(int))
        self.columns = links[shown]
        self.gauges: list[Array] = []
        self.ram: list[Array] = []
        self.frames: list[tuple[Array, ...]] = []
        self.events: list[Array] = []
        self.start_row = self._start_row()
        self.planned = self._planned_steps()
        self.still = 0
        self.slipped = 0.0

    def _planned_steps(self) -> int:
        """Steps of the run; where it ends by itself, the most that it may take."""
        chain, wanted = self.chain, self.chain.case.run.duration
        duration = wanted if wanted is not None else _longest(chain)
        steps = int(np.ceil(duration / chain.dt - 1e-9)) + 1
        if steps * float(chain.nodes) > MOST_WORK:
            raise SolveError(
                f"This run would take {steps:.3g} steps of {chain.nodes} nodes, more than can be solved in hours. "
                "Shorten the duration, or give longer elements."
            )
        self.stride = 2 ** max(0, int(np.floor(np.log2(max(1, steps / FRAMES)))))
        return steps

    def _start_row(self) -> Array:
        """The ledger just before the first step: the same balance, on the half step before it."""
        row = np.zeros(len(LEDGER))
        motion = self.state.motion
        force = np.zeros_like(motion.force)
        note = (np.zeros((1, 3), dtype=np.int64), np.zeros(1, dtype=np.int64))
        link_forces(self.state.rod, motion.u, motion.v, force, self.chain.dt, self.flags.copy() + 1, note, 0)
        s, dt = self.state, self.chain.dt
        balance(row, s.rod, s.shaft, s.bounds, motion.rest, motion.u, -motion.v, force, self.sums, dt)
        return row

    def run(self, progress: Callable[[Progress], None] | None, cancel: Callable[[], bool] | None) -> bool:
        """March to the end; returns whether it was stopped before."""
        per_chunk = max(64, CHUNK // self.chain.nodes)
        if self.chain.case.run.duration is None:
            # looked at several times while a wave passes once, so that a moment of stillness is not taken for rest
            per_chunk = min(per_chunk, max(64, self.chain.nodes // 2))
        while self.steps < self.planned:
            count = self._aligned(min(per_chunk, self.planned - self.steps))
            self._chunk(count)
            refuse_bad_state(self)
            if self.steps >= self.planned or self._came_to_rest():
                break
            if cancel is not None and cancel():
                return True
            if progress is not None:
                progress(self._progress())
        return False

    def _aligned(self, count: int) -> int:
        """A whole number of frames, but for the last chunk."""
        self._thin()
        whole = max(count // self.stride, 1) * self.stride
        return min(whole, self.planned - self.steps)

    def _thin(self) -> None:
        while sum(len(f[0]) for f in self.frames) > 2 * FRAMES and self.steps % (2 * self.stride) == 0:
            joined = [np.concatenate(parts)[::2] for parts in zip(*self.frames, strict=True)]
            self.frames = [tuple(joined)]
            self.stride *= 2

    def _load(self, count: int) -> Array:
        load, dt = self.chain.case.load, self.chain.dt
        if not isinstance(load, Pulse | History):
            return np.zeros(count)
        if load.quantity == "force":
            return step_forces(load, self.steps, count, dt)
        return step_velocities(load, self.steps, count, dt)

    def _chunk(self, count: int) -> None:
        s = self.state
        records = records_of(self.chain, count, self.stride, self.columns, self.flags)
        load = self._load(count)
        march(
            s.rod, s.shaft, s.bounds, s.motion, self.extremes, records, self.sums, load,
            self.steps, count, self.stride, self.chain.dt, 0.0,
        )  # fmt: skip
        self.gauges.append(
            np.array(
                [records.force, records.velocity, records.displacement, records.acceleration, records.strain]
            )
        )
        self.ram.append(records.ram)
        self.frames.append(
            (records.frame_force, records.frame_velocity, records.frame_displacement, records.ledger)
        )
        self.events.append(records.events[: records.event_count[0]])
        self.steps += count

    def _came_to_rest(self) -> bool:
        """Whether a run without a set duration may end: the member moves no more, and no ram is about to fall on it."""
        if self.chain.case.run.duration is not None or self.steps * self.chain.dt < _load_end(self.chain):
            return False
        head = self.chain.head
        fastest = float(np.max(self.extremes.speed[head:]))
        moving = float(np.max(np.abs(self.state.motion.v[head:])))
        slipped, self.slipped = self.sums[SLIP] - self.slipped, float(self.sums[SLIP])
        # a member that rings in ground which slips no more adds nothing to its set: the rest of it is statics
        ringing = self.chain.case.ground is not None and slipped <= 1e-9 * self.sums[SLIP]
        quiet = moving < STILL * fastest or (ringing and moving < RINGING * fastest)
        self.still = self.still + 1 if quiet else 0
        return self.still >= STILL_CHUNKS

    def _progress(self) -> Progress:
        done = self.base + self.share * self.steps / self.planned
        elapsed = time.perf_counter() - self.began
        return Progress(done, elapsed * (1 - done) / done, lambda: self.result(True, False, None))

    def result(self, stopped: bool, settled: bool, at_end: Array | None) -> Result:
        """The answer so far."""
        blow = Blow(
            chain=self.chain,
            state=self.state,
            extremes=self.extremes,
            columns=self.columns,
            steps=self.steps,
            stride=self.stride,
            gauges=np.concatenate(self.gauges, axis=2),
            ram=np.concatenate(self.ram, axis=1),
            frames=tuple(np.concatenate(parts) for parts in zip(*self.frames, strict=True)),
            events=np.concatenate(self.events),
            start_row=self.start_row,
            rest=self.rest,
            at_end=at_end if at_end is not None else self.state.motion.u.copy(),
            settled=settled,
            sets=tuple(self.sets),
            planned=self.planned,
        )
        return gather(blow, finished=not stopped, seconds=time.perf_counter() - self.began)


def _longest(chain: Chain) -> float:
    """Longest time of a run that ends by itself, s: many passes of the wave, and the load itself."""
    member = chain.axial[chain.head :] > 0
    c = np.sqrt(chain.axial[chain.head :][member] / chain.line_mass[chain.head :][member])
    passage = float(np.sum(chain.length[chain.head :][member] / c))
    return max(40 * passage, 20 * passage + _load_end(chain))


def _load_end(chain: Chain) -> float:
    """Time at which the load is over (of a decay: down to 0.1 % of its peak), s."""
    load = chain.case.load
    if not isinstance(load, Pulse | History):
        return 0.0
    if isinstance(load, Pulse) and load.shape == "decay":
        return load.start + 7 * load.duration
    return end_time(load)

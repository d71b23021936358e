"""One blow: a state marched through time in chunks, and what is recorded on the way."""

from __future__ import annotations

import time
from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from solver.answer.blow import Blow
from solver.answer.gather import gather
from solver.answer.result import Result
from solver.answer.store import Store
from solver.errors import SolveError
from solver.model.derived import shaft_resistance
from solver.model.load import History, Pulse
from solver.numerics.arrays import Frames
from solver.numerics.assemble import extremes_of, gauge_readings, records_of
from solver.numerics.balance import LEDGER, SLIP, balance
from solver.numerics.chain import Chain
from solver.numerics.equilibrium import State
from solver.numerics.links import link_forces
from solver.numerics.march import march
from solver.numerics.pulses import end_time, step_forces, step_velocities
from solver.watch import refuse_bad_state

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


class March:
    """Marches the state of a chain through one blow. `base` and `share` place it in a run of several blows."""

    def __init__(
        self, chain: Chain, state: State, began: float, base: float, share: float, sets: list[float]
    ) -> None:
        self.chain, self.state, self.sets = chain, state, sets
        self.began, self.base, self.share = began, base, share
        self.rest = state.motion.rest.copy()
        self.extremes = extremes_of(chain)
        self.sums = np.zeros(8)
        self.flags = np.zeros(len(state.rod.blocks), dtype=np.int64)
        self.steps, self.stride = 0, 1
        self.still, self.slipped = 0, 0.0
        self.start_row = self._start_row()
        self.planned = self._planned_steps()
        links = np.flatnonzero(chain.axial > 0)
        shown = np.unique(np.linspace(0, len(links) - 1, min(COLUMNS, len(links))).round().astype(int))
        self.columns = links[shown]
        self.readings = gauge_readings(chain)
        self.rest_forces = self._rest_forces()
        self.gauges = Store(5 * len(chain.case.gauges), self.planned)
        self.ram = Store(3 if chain.train else 0, self.planned)
        self.frames: list[Frames] = []
        self.events: list[NDArray[np.int64]] = []

    def run(self, progress: Callable[[Progress], None] | None, cancel: Callable[[], bool] | None) -> bool:
        """March to the end; returns whether it was stopped before."""
        per_chunk = max(64, CHUNK // self.chain.nodes)
        if self.chain.case.run.duration is None:
            # looked at several times while a wave passes once, so that a moment of stillness is not taken for rest
            per_chunk = min(per_chunk, max(64, self.chain.nodes // 2))
        told, checked = time.perf_counter(), 0
        while self.steps < self.planned:
            self._chunk(self._aligned(min(per_chunk, self.planned - self.steps)))
            ended = self.steps >= self.planned or self._came_to_rest()
            stopped = not ended and cancel is not None and cancel()
            tells = progress is not None and time.perf_counter() - told > 0.02
            # short chunks need no check each; nothing is shown or returned without one
            if ended or stopped or tells or (self.steps - checked) * self.chain.nodes >= CHUNK / 4:
                refuse_bad_state(self)
                checked = self.steps
            if ended or stopped:
                return stopped
            if tells and progress is not None:
                told = time.perf_counter()
                progress(self.progress())
        return False

    def result(self, stopped: bool, settled: bool, at_end: Array | None) -> Result:
        """The answer so far; `at_end` are the displacements before the member settled."""
        blow = Blow(
            chain=self.chain,
            state=self.state,
            extremes=self.extremes,
            columns=self.columns,
            steps=self.steps,
            stride=self.stride,
            gauges=self.gauges.read(),
            ram=self.ram.read(),
            frames=self._all_frames(),
            events=np.concatenate(self.events),
            start_row=self.start_row,
            rest=self.rest,
            rest_forces=self.rest_forces,
            at_end=at_end if at_end is not None else self.state.motion.u.copy(),
            settled=settled,
            sets=tuple(self.sets),
            planned=self.planned,
        )
        return gather(blow, finished=not stopped, seconds=time.perf_counter() - self.began)

    def ledger_rows(self) -> Array:
        """Rows of the ledger so far, shape (frames, parts)."""
        return np.concatenate([f.ledger for f in self.frames])

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
        row, s, dt = np.zeros(len(LEDGER) + 1), self.state, self.chain.dt
        motion, force = s.motion, np.zeros_like(s.motion.force)
        rod = s.rod._replace(state=s.rod.state.copy())
        link_forces(rod, motion.u, motion.v, force, dt)
        balance(
            row, rod, s.shaft, s.bounds, motion.rest, motion.u, -motion.v, -motion.v, force, self.sums, dt
        )
        return row

    def _rest_forces(self) -> Array:
        """What each gauge reads of the state of rest, N, shape (gauges,)."""
        rod, force = self.state.rod, np.zeros_like(self.state.motion.force)
        link_forces(
            rod._replace(state=rod.state.copy()), self.rest, np.zeros_like(self.rest), force, self.chain.dt
        )
        node, weights = self.readings
        share, left, right, constant = (weights[:, :, i] for i in (0, 1, 2, 4))
        # a weight of a link that is not there is 0
        last = len(force) - 1
        reading = left * force[np.maximum(node - 1, 0)] + right * force[np.minimum(node, last)] + constant
        return (share * reading).sum(axis=1)

    def _aligned(self, count: int) -> int:
        """A whole number of frames, but for the last chunk."""
        self._thin()
        whole = max(count // self.stride, 1) * self.stride
        return min(whole, self.planned - self.steps)

    def _thin(self) -> None:
        while sum(len(f.ledger) for f in self.frames) > 2 * FRAMES and self.steps % (2 * self.stride) == 0:
            f = self._all_frames()
            self.frames = [Frames(f.force[::2], f.velocity[::2], f.displacement[::2], f.ledger[::2])]
            self.stride *= 2

    def _all_frames(self) -> Frames:
        kept = self.frames
        return Frames(
            np.concatenate([f.force for f in kept]),
            np.concatenate([f.velocity for f in kept]),
            np.concatenate([f.displacement for f in kept]),
            self.ledger_rows(),
        )

    def _load(self, count: int) -> Array:
        load, dt = self.chain.case.load, self.chain.dt
        if not isinstance(load, Pulse | History):
            return np.zeros(count)
        if load.quantity == "force":
            return step_forces(load, self.steps, count, dt)
        return step_velocities(load, self.steps, count, dt)

    def _chunk(self, count: int) -> None:
        s, chain = self.state, self.chain
        records = records_of(chain, self.readings, count, self.stride, self.columns, self.flags)
        march(
            s.rod, s.shaft, s.bounds, s.motion, self.extremes, records, self.sums, self._load(count),
            self.steps, count, self.stride, chain.dt, 0.0,
        )  # fmt: skip
        parts = (records.force, records.velocity, records.displacement, records.acceleration, records.strain)
        self.gauges.append(np.stack(parts, axis=1).reshape(-1, count))
        self.ram.append(records.ram)
        self.frames.append(
            Frames(records.frame_force, records.frame_velocity, records.frame_displacement, records.ledger)
        )
        self.events.append(records.events[: records.event_count[0]].copy())
        self.steps += count

    def _came_to_rest(self) -> bool:
        """Whether a run without a set duration may end: its load is over and the member moves no more."""
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

    def progress(self) -> Progress:
        """How far the run is."""
        done = self.base + self.share * self.steps / self.planned
        elapsed = time.perf_counter() - self.began
        return Progress(done, elapsed * (1 - done) / done, lambda: self.result(True, False, None))


def _longest(chain: Chain) -> float:
    """Longest time of a run that ends by itself, s: many passes of the wave, and the load itself."""
    member = chain.axial[chain.head :] > 0
    c = np.sqrt(chain.axial[chain.head :][member] / chain.line_mass[chain.head :][member])
    passage = float(np.sum(chain.length[chain.head :][member] / c))
    return max(40 * passage, 20 * passage + _load_end(chain), 3 * _braking(chain))


def _braking(chain: Chain) -> float:
    """Time in which the ground's static resistance takes the momentum of what strikes, s."""
    ground = chain.case.ground
    if ground is None:
        return 0.0
    resistance = shaft_resistance(chain.case) + (ground.toe.resistance if ground.toe else 0.0)
    momentum = float(np.sum(chain.mass * np.abs(chain.velocity)))
    return min(momentum / resistance, 1.0) if resistance > 0 else 0.0


def _load_end(chain: Chain) -> float:
    """Time at which the load is over (of a decay: down to 0.1 % of its peak), s."""
    load = chain.case.load
    if not isinstance(load, Pulse | History):
        return 0.0
    if isinstance(load, Pulse) and load.shape == "decay":
        return load.start + 7 * load.duration
    return end_time(load)

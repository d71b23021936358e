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
from solver.numerics.arrays import Frames, Rest
from solver.numerics.assemble import extremes_of, gauge_readings, records_of
from solver.numerics.balance import LEDGER, balance
from solver.numerics.chain import Chain
from solver.numerics.equilibrium import State
from solver.numerics.links import link_forces
from solver.numerics.march import march
from solver.numerics.pulses import end_time, step_forces, step_velocities
from solver.numerics.resting import LOOKS
from solver.watch import refuse_bad_state

Array = NDArray[np.float64]

#: Element-steps in a chunk: some 30 ms, between which progress is told and Stop is heard.
CHUNK = 8_000_000
#: Most element-steps of a run; more would take hours and is refused with a word.
MOST_WORK = 2e12
#: Fewest frames kept for the pictures of a run with so many steps; at most there are twice as many.
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
        self.steps, self.residual = 0, 0.0
        self.start_row = self._start_row()
        self.planned = self._planned_steps()
        self.stride = 2 ** max(0, int(np.floor(np.log2(max(1, self.planned / FRAMES)))))
        self.ends = self._ends()
        self.columns = shown_links(chain)
        rows = (self.planned - 1) // self.stride + 1
        self.records = records_of(chain, gauge_readings(chain), rows, self.columns, self.flags)
        self.rest_forces = self._rest_forces()
        self.gauges = Store(5 * len(chain.case.gauges), self.planned)
        self.ram = Store(3 if chain.train else 0, self.planned)
        self.events: list[NDArray[np.int64]] = []

    def run(self, progress: Callable[[Progress], None] | None, cancel: Callable[[], bool] | None) -> bool:
        """March to the end; returns whether it was stopped before."""
        per_chunk = max(64, CHUNK // self.chain.nodes)
        if self.ends.every:
            per_chunk = max(per_chunk // self.ends.every, 1) * self.ends.every
        told = time.perf_counter()
        while self.steps < self.planned:
            rested = self._chunk(min(per_chunk, self.planned - self.steps))
            # nothing is shown or returned without a look at it
            self.residual = refuse_bad_state(self)
            if rested or self.steps >= self.planned:
                return False
            if cancel is not None and cancel():
                return True
            if progress is not None and time.perf_counter() - told > 0.02:
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
            frames=self.frames(),
            residual=self.residual,
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

    def frames(self) -> Frames:
        """Lines of the pictures and of the ledger so far; later ones do not change them."""
        rows, r = (self.steps - 1) // self.stride + 1, self.records
        return Frames(r.stress[:rows], r.velocity[:rows], r.displacement[:rows], r.ledger[:rows])

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
        return steps

    def _ends(self) -> Rest:
        """Looked at several times while a wave passes once, so that a moment of stillness is not taken for rest."""
        case, nodes = self.chain.case, self.chain.nodes
        looks = min(max(64, CHUNK // nodes), max(64, nodes // 2)) if case.run.duration is None else 0
        return Rest(
            every=max(looks // self.stride, 1) * self.stride if looks else 0,
            load_end=_load_end(self.chain),
            grounded=case.ground is not None,
            still=np.zeros(1, dtype=np.int64),
            slipped=np.zeros(1),
        )

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
        node, weights = self.records.node, self.records.weights
        share, left, right, constant = (weights[:, :, i] for i in (0, 1, 2, 4))
        # a weight of a link that is not there is 0
        last = len(force) - 1
        reading = left * force[np.maximum(node - 1, 0)] + right * force[np.minimum(node, last)] + constant
        return (share * reading).sum(axis=1)

    def _load(self, count: int) -> Array:
        load, dt = self.chain.case.load, self.chain.dt
        if not isinstance(load, Pulse | History):
            return np.zeros(count)
        if load.quantity == "force":
            return step_forces(load, self.steps, count, dt)
        return step_velocities(load, self.steps, count, dt)

    def _chunk(self, count: int) -> bool:
        """March at most so many steps; returns whether the run came to rest."""
        s, chain, first = self.state, self.chain, self.steps
        (gauges, gauge_column), (ram, ram_column) = self.gauges.room(count), self.ram.room(count)
        since = np.array([first - gauge_column, first - ram_column])
        records = self.records._replace(gauges=gauges, ram=ram, since=since)
        records.event_count[0] = 0
        done = march(
            s.rod, s.shaft, s.bounds, s.motion, self.extremes, records, self.ends, self.sums, self._load(count),
            first, count, self.stride, chain.dt,
        )  # fmt: skip
        self.gauges.take(done)
        self.ram.take(done)
        self.events.append(records.events[: records.event_count[0]].copy())
        self.steps += done
        return bool(self.ends.still[0] >= LOOKS)

    def progress(self) -> Progress:
        """How far the run is."""
        done = self.base + self.share * self.steps / self.planned
        elapsed = time.perf_counter() - self.began
        return Progress(done, elapsed * (1 - done) / done, lambda: self.result(True, False, None))


def shown_links(chain: Chain) -> NDArray[np.int64]:
    """Links that the pictures show."""
    links = np.flatnonzero(chain.axial > 0)
    if len(links) <= COLUMNS:
        return links
    return links[np.linspace(0, len(links) - 1, COLUMNS).round().astype(int)]


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

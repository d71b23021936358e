"""From what a march recorded to a `Result`."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from solver.answer.result import (
    Envelope,
    Event,
    EventKind,
    Fields,
    GaugeRecord,
    HeadTrain,
    Ledger,
    Peak,
    Residual,
    Result,
)
from solver.numerics.arrays import Extremes
from solver.numerics.assemble import gauge_link
from solver.numerics.balance import LEDGER, residual_of
from solver.numerics.chain import Chain
from solver.numerics.compiled import cache_problem
from solver.numerics.equilibrium import State
from solver.numerics.ground import bands_of
from solver.numerics.mesh import MISMATCH
from solver.numerics.records import (
    EVENT_IMPACT,
    EVENT_JOINT_CLOSED,
    EVENT_JOINT_OPENED,
    EVENT_LEFT_ELASTIC,
    EVENT_SEPARATION,
    EVENT_TOE_LIFT,
    EVENT_WALL,
)

Array = NDArray[np.float64]

EVENT_NAMES: dict[int, EventKind] = {
    EVENT_IMPACT: "impact",
    EVENT_SEPARATION: "separation",
    EVENT_LEFT_ELASTIC: "first_yield",
    EVENT_JOINT_OPENED: "joint_opened",
    EVENT_JOINT_CLOSED: "joint_closed",
    EVENT_WALL: "wall_contact",
    EVENT_TOE_LIFT: "toe_lift",
}
#: What ends and begins again within so many steps is one contact, not two.
FLICKER = 3
#: Plastic strain above which a law of small strains is said to be left.
SMALL_STRAIN = 0.1
#: Share of the energy that may fail to close before it is told.
TOLD = 0.01


@dataclass(frozen=True, eq=False)
class Blow:
    """Everything one march recorded; see `solver.run.March`."""

    chain: Chain
    state: State
    extremes: Extremes
    columns: NDArray[np.int64]
    steps: int
    stride: int
    gauges: Array
    ram: Array
    frames: tuple[Array, ...]
    events: NDArray[np.int64]
    start_row: Array
    rest: Array
    at_end: Array
    settled: bool
    sets: tuple[float, ...]
    planned: int


def gather(blow: Blow, finished: bool, seconds: float) -> Result:
    """The answer of one blow (the last of several)."""
    chain = blow.chain
    envelope = _envelope(blow)
    residual, _ = residual_of(blow.start_row, blow.frames[3])
    ledger = _ledger(blow, residual)
    at_rest = chain.case.run.duration is None and blow.steps < blow.planned
    has_ground = chain.case.ground is not None
    toe_set = _set(blow) if has_ground else None
    head_set = float(blow.state.motion.u[chain.head] - blow.rest[chain.head]) if has_ground else None
    head_travel = float(blow.extremes.travel[chain.head] - blow.rest[chain.head])
    return Result(
        case=chain.case,
        elements=int((chain.axial[chain.head :] > 0).sum()),
        steps=blow.steps,
        time_step=chain.dt,
        duration=(blow.steps - 1) * chain.dt,
        courant_worst=chain.courant_worst,
        gauges=_gauges(blow),
        envelope=envelope,
        fields=_fields(blow),
        ledger=ledger,
        peak_compression=_peak(-envelope.lowest_stress, envelope.position, envelope.lowest_stress_time),
        peak_tension=_peak(envelope.highest_stress, envelope.position, envelope.highest_stress_time),
        set=toe_set,
        head_set=head_set,
        head_rebound=None if head_set is None else head_travel - head_set,
        max_toe_displacement=float(blow.extremes.travel[-1] - blow.rest[-1]),
        events=_events(blow),
        warnings=_warnings(blow, residual, at_rest, finished),
        solve_seconds=seconds,
        finished=finished,
        at_rest=at_rest,
        head_train=_head_train(blow),
        residual=_residual(blow),
        crack_openings=_crack_openings(blow),
    )


def _read_only(array: Array) -> Array:
    array = np.ascontiguousarray(array)
    array.flags.writeable = False
    return array


def _times(blow: Blow) -> Array:
    return np.arange(blow.steps) * blow.chain.dt


def _gauges(blow: Blow) -> dict[str, GaugeRecord]:
    chain, time = blow.chain, _read_only(_times(blow))
    found = {}
    for g, gauge in enumerate(chain.case.gauges):
        link = gauge_link(chain, gauge)
        force, velocity, displacement, acceleration, strain = (_read_only(part[g]) for part in blow.gauges)
        elastic = next(s for s in chain.stretches if s.start <= link < s.stop).material.law.kind == "elastic"
        found[gauge.name] = GaugeRecord(
            name=gauge.name,
            position=gauge.position,
            on=gauge.on,
            impedance=float(chain.impedance[link]),
            area=float(chain.area[link]),
            rest_force=_rest_force(chain, blow.rest, link),
            time=time,
            force=force,
            stress=_read_only(force / chain.area[link]),
            strain=_read_only(force / chain.axial[link]) if elastic else strain,
            velocity=velocity,
            displacement=displacement,
            acceleration=acceleration,
        )
    return found


def _rest_force(chain: Chain, rest: Array, link: int) -> float:
    return float(chain.axial[link] / chain.length[link] * (rest[link + 1] - rest[link]))


def _member_links(chain: Chain) -> NDArray[np.int64]:
    return np.flatnonzero((chain.axial > 0) & (np.arange(len(chain.axial)) >= chain.head))


def _envelope(blow: Blow) -> Envelope:
    chain, ext = blow.chain, blow.extremes
    links = _member_links(chain)
    area, reach = chain.area[links], _yield_reach(blow)[links]
    moved = ext.travel - blow.rest
    return Envelope(
        position=_read_only((chain.position[links] + chain.position[links + 1]) / 2),
        lowest_stress=_read_only(np.maximum(ext.low[links], -reach) / area),
        lowest_stress_time=_read_only(ext.low_step[links] * chain.dt),
        highest_stress=_read_only(np.minimum(ext.high[links], reach) / area),
        highest_stress_time=_read_only(ext.high_step[links] * chain.dt),
        max_velocity=_read_only(np.maximum(ext.speed[links], ext.speed[links + 1])),
        max_displacement=_read_only(np.maximum(moved[links], moved[links + 1])),
    )


def _yield_reach(blow: Blow) -> Array:
    """Largest force that the law of each link can show, N: infinite but for elastic-plastic links.

    The force that marches is a mean over a step, and where slip sets in at once it lies outside the yield limit once.
    """
    chain, rod = blow.chain, blow.state.rod
    reach = np.full(len(chain.axial), np.inf)
    for stretch in chain.stretches:
        if stretch.material.law.kind == "elastic_plastic":
            at = slice(stretch.start, stretch.stop)
            reach[at] = rod.par[0, at] + rod.par[1, at] * rod.state[1, at]
    return reach


def _fields(blow: Blow) -> Fields:
    chain, links = blow.chain, blow.columns
    force, velocity, displacement, _ = blow.frames
    frames = len(force)
    reach = _yield_reach(blow)[links].astype(np.float32)
    force = np.clip(force, -reach, reach)
    edges = np.append(chain.position[links], chain.position[links[-1] + 1])
    return Fields(
        time=_read_only(np.arange(frames) * blow.stride * chain.dt),
        position=_read_only((chain.position[links] + chain.position[links + 1]) / 2),
        edges=_read_only(edges),
        area=_read_only(chain.area[links]),
        impedance=_read_only(chain.impedance[links]),
        stress=_read_only(force / chain.area[links].astype(np.float32)),
        velocity=_read_only(velocity),
        displacement=_read_only(displacement),
    )


def _ledger(blow: Blow, residual: float) -> Ledger:
    rows = np.vstack([blow.start_row, blow.frames[3]])
    stride, dt = blow.stride, blow.chain.dt
    time = np.concatenate(([-0.5 * dt], (np.arange(len(rows) - 1) * stride + 0.5) * dt))
    parts = {name: _read_only(rows[:, i]) for i, name in enumerate(LEDGER)}
    start = float(blow.start_row[: LEDGER.index("work_of_gravity")].sum())
    parts["initial_energy"] = _read_only(np.full(len(rows), start))
    return Ledger(_read_only(time), parts, residual)


def _peak(values: Array, position: Array, time: Array) -> Peak:
    equal = np.flatnonzero(
        values >= values.max() * (1 - 1e-9) if values.max() > 0 else values == values.max()
    )
    i = int(equal[np.argmin(time[equal])])
    return Peak(max(float(values[i]), 0.0), float(position[i]), float(time[i]))


def _set(blow: Blow) -> float:
    """Permanent movement of the toe: at rest, or its plastic part where no rest was found."""
    if blow.settled or not len(blow.state.bounds.toe_par):
        return float(blow.state.motion.u[-1] - blow.rest[-1])
    toe = blow.chain.case.ground.toe if blow.chain.case.ground else None
    return max(float(blow.state.bounds.toe_state[0] - (toe.gap if toe else 0.0)), 0.0)


def _events(blow: Blow) -> tuple[Event, ...]:
    chain = blow.chain
    kept = _without_flicker(blow.events)
    found = []
    for kind, place, step in kept:
        name = EVENT_NAMES[kind]
        striker = chain.case.load.kind == "striker" and place == chain.head - 1
        if striker and name in ("joint_closed", "joint_opened"):
            name = "impact" if name == "joint_closed" else "separation"
        if name == "first_yield" and _law_at(chain, place) == "brittle_tension":
            name = "crack"
        found.append(Event(name, _event_position(chain, kind, place), step * chain.dt))
    return tuple(sorted(found, key=lambda e: e.time))


def _law_at(chain: Chain, link: int) -> str:
    return next(s for s in chain.stretches if s.start <= link < s.stop).material.law.kind


def _event_position(chain: Chain, kind: int, place: int) -> float:
    if kind == EVENT_LEFT_ELASTIC:
        return float((chain.position[place] + chain.position[place + 1]) / 2)
    return float(chain.position[place])


def _without_flicker(events: NDArray[np.int64]) -> list[tuple[int, int, int]]:
    """Leave out a parting and meeting of the same place that lie a few steps apart."""
    pairs = {
        EVENT_IMPACT: EVENT_SEPARATION,
        EVENT_SEPARATION: EVENT_IMPACT,
        EVENT_JOINT_CLOSED: EVENT_JOINT_OPENED,
        EVENT_JOINT_OPENED: EVENT_JOINT_CLOSED,
    }
    kept: list[tuple[int, int, int]] = []
    for kind, place, step in events.tolist():
        opposite = pairs.get(kind)
        previous = next((i for i in range(len(kept) - 1, -1, -1) if kept[i][1] == place), None)
        if previous is not None and kept[previous][0] == opposite and step - kept[previous][2] <= FLICKER:
            del kept[previous]
        else:
            kept.append((kind, place, step))
    return kept


def _head_train(blow: Blow) -> HeadTrain | None:
    if not blow.chain.train:
        return None
    force, ram, head = (_read_only(row) for row in blow.ram)
    return HeadTrain(_read_only(_times(blow)), force, ram, head)


def _residual(blow: Blow) -> Residual | None:
    if len(blow.sets) < 2:
        return None
    chain, links = blow.chain, _member_links(blow.chain)
    u, state = blow.state.motion.u, blow.state.rod.state
    plastic = np.array([_law_at(chain, int(i)) == "elastic_plastic" for i in links])
    stretch = u[links + 1] - u[links] - np.where(plastic, state[0, links], 0.0)
    sets = np.array(blow.sets)
    wanted = chain.case.run.blows
    tolerance = 0.0 if isinstance(wanted, int) else wanted.tolerance
    return Residual(
        set_per_blow=_read_only(sets),
        repeats=bool(abs(sets[-1] - sets[-2]) <= tolerance),
        position=_read_only((chain.position[links] + chain.position[links + 1]) / 2),
        force=_read_only(chain.axial[links] / chain.length[links] * stretch),
    )


def _crack_openings(blow: Blow) -> dict[str, float]:
    """Largest opening of a crack per brittle segment that cracked, m."""
    openings = {}
    for stretch in blow.chain.member_stretches:
        if stretch.material.law.kind == "brittle_tension":
            at = slice(stretch.start, stretch.stop)
            if blow.state.rod.state[0, at].any():
                openings[stretch.segment.name] = float(blow.state.rod.state[1, at].max())
    return openings


def _ram_returns(blow: Blow) -> float | None:
    """Time at which a rigid ram that gravity brings back will strike again, s; `None` where none is in the air."""
    chain, motion = blow.chain, blow.state.motion
    if not chain.train or chain.gravity == 0.0 or blow.state.bounds.train_state[0, 2] > 0.0:
        return None
    a = chain.train[0].link
    gap = float(blow.at_end[a + 1] - blow.at_end[a])
    rising = float(motion.v[a + 1] - motion.v[a]) if not blow.settled else -float(motion.v[a])
    if gap <= 0.0:
        return None
    flight = (rising + np.sqrt(max(rising**2 + 2 * chain.gravity * gap, 0.0))) / chain.gravity
    return float((blow.steps - 1) * chain.dt + flight)


def _largest_plastic_strain(blow: Blow) -> tuple[float, float]:
    """Largest plastic strain along the chain and its place (m)."""
    largest, place = 0.0, 0.0
    for stretch in blow.chain.stretches:
        if stretch.material.law.kind == "elastic_plastic":
            at = slice(stretch.start, stretch.stop)
            strain = np.abs(blow.state.rod.state[0, at]) / blow.chain.length[at]
            if strain.max() > largest:
                largest, place = float(strain.max()), float(blow.chain.position[at][np.argmax(strain)])
    return largest, place


def _warnings(blow: Blow, residual: float, at_rest: bool, finished: bool) -> tuple[str, ...]:
    chain, case, told = blow.chain, blow.chain.case, []
    if residual > TOLD:
        told.append(f"The energy of this run does not close by {residual:.1%}: judge it with care.")
    if 1 - chain.courant_worst > MISMATCH:
        told.append(
            "The travel times of the segments fit no common step: "
            f"the worst Courant number is {chain.courant_worst:.3f}."
        )
    strain, place = _largest_plastic_strain(blow)
    if strain > SMALL_STRAIN:
        told.append(
            f"The plastic strain reaches {strain:.0%} at {place:.4g} m, beyond a law of small strains: "
            "read the shortening of the whole, not the strain there."
        )
    if not finished:
        told.append("This run was stopped early: it tells what happened so far.")
    elif case.run.duration is None and not at_rest:
        told.append(
            "The member does not come to rest by itself; "
            f"the run was ended after {(blow.steps - 1) * chain.dt * 1000:.4g} ms."
        )
    returns = _ram_returns(blow)
    if finished and returns is not None:
        told.append(
            f"The ram is in the air at the end and falls again at about {returns:.3g} s: "
            "give a longer duration to see that blow too."
        )
    if case.ground is not None:
        bands = list(bands_of(case.ground, case.member.length))
        reach = max((b.bottom for b in bands), default=case.ground.surface)
        if bands and reach < case.member.length * (1 - 1e-9):
            told.append(f"The layers end at {reach:.4g} m: below it no shaft resistance acts.")
        if finished and not blow.settled:
            told.append("No rest after the blow was found: the set is the plastic movement of the toe.")
    if cache_problem:
        told.append(cache_problem)
    return tuple(told)

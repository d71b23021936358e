"""From what a march recorded to a `Result`."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from solver.answer.blow import Blow
from solver.answer.events import events_of
from solver.answer.result import (
    Envelope,
    Fields,
    GaugeRecord,
    HeadTrain,
    Ledger,
    Peak,
    Residual,
    Result,
    Single,
    first_of_largest,
    read_only,
)
from solver.answer.told import in_the_air, remarks_of
from solver.numerics.arrays import Extremes
from solver.numerics.assemble import gauge_link
from solver.numerics.balance import LEDGER

Array = NDArray[np.float64]


def gather(blow: Blow, finished: bool, seconds: float) -> Result:
    """The answer of one blow (the last of several)."""
    chain = blow.chain
    ext = blow.extremes
    envelope = _envelope(blow, ext, blow.member_links)
    striking = np.flatnonzero(chain.axial[: chain.head] > 0)
    again = len(ext.second) > 0 and ext.second[2] > 0
    at_rest = chain.case.run.duration is None and blow.steps < blow.planned and not in_the_air(blow)
    has_ground = chain.case.ground is not None
    toe_set = _set(blow) if has_ground else None
    # where no rest is known, the place of the head is but that of a moment
    settled_head = float(blow.state.motion.u[chain.head] - blow.rest[chain.head])
    head_set = settled_head if has_ground and blow.settled else None
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
        ledger=_ledger(blow),
        peak_compression=_peak(-envelope.lowest_stress, envelope.position, envelope.lowest_stress_time),
        peak_tension=_peak(envelope.highest_stress, envelope.position, envelope.highest_stress_time),
        set=toe_set,
        head_set=head_set,
        head_rebound=None if head_set is None else head_travel - head_set,
        max_toe_displacement=float(blow.extremes.travel[-1] - blow.rest[-1]),
        events=events_of(blow),
        remarks=remarks_of(blow, blow.residual, at_rest, finished),
        solve_seconds=seconds,
        finished=finished,
        at_rest=at_rest,
        head_train=_head_train(blow),
        residual=_residual(blow),
        crack_openings=_crack_openings(blow),
        struck_again=float(ext.second[2] * chain.dt) if again else None,
        first_envelope=_envelope(blow, _of_first_blow(ext), blow.member_links) if again else None,
        striking_envelope=_envelope(blow, ext, striking) if len(striking) else None,
    )


def _gauges(blow: Blow) -> dict[str, GaugeRecord]:
    chain = blow.chain
    found = {}
    for g, gauge in enumerate(chain.case.gauges):
        link = gauge_link(chain, gauge)
        force, velocity, displacement, acceleration, strain = blow.gauges[5 * g : 5 * g + 5]
        # with lateral inertia a section holds more than its strain tells
        elastic = blow.law_at(link) == "elastic" and not chain.case.member.lateral_inertia
        found[gauge.name] = GaugeRecord(
            name=gauge.name,
            position=gauge.position,
            on=gauge.on,
            impedance=float(chain.impedance[link]),
            area=float(chain.area[link]),
            rest_force=float(blow.rest_forces[g]),
            time_step=chain.dt,
            axial_stiffness=float(chain.axial[link]) if elastic else None,
            force=force,
            velocity=velocity,
            displacement=displacement,
            acceleration=acceleration,
            element_strain=strain,
        )
    return found


def _envelope(blow: Blow, ext: Extremes, links: NDArray[np.int64]) -> Envelope:
    chain = blow.chain
    area, reach = chain.area[links], _yield_reach(blow)[links]
    moved = ext.travel - blow.rest
    return Envelope(
        position=read_only((chain.position[links] + chain.position[links + 1]) / 2),
        lowest_stress=read_only(np.maximum(ext.low[links], -reach) / area),
        lowest_stress_time=read_only(ext.low_step[links] * chain.dt),
        highest_stress=read_only(np.minimum(ext.high[links], reach) / area),
        highest_stress_time=read_only(ext.high_step[links] * chain.dt),
        max_velocity=read_only(np.maximum(ext.speed[links], ext.speed[links + 1])),
        max_displacement=read_only(np.maximum(moved[links], moved[links + 1])),
    )


def _of_first_blow(ext: Extremes) -> Extremes:
    low, low_step, high, high_step = ext.first_links
    speed, travel = ext.first_nodes
    return ext._replace(
        low=low, low_step=low_step, high=high, high_step=high_step, speed=speed, travel=travel
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
    stress, velocity, displacement, _ = blow.frames
    reach = _yield_reach(blow)[links].astype(np.float32) / chain.area[links].astype(np.float32)
    if np.isfinite(reach).any():
        stress = np.clip(stress, -reach, reach)
    edges = np.append(chain.position[links], chain.position[links[-1] + 1])
    return Fields(
        time=read_only(np.arange(len(stress)) * blow.stride * chain.dt),
        position=read_only((chain.position[links] + chain.position[links + 1]) / 2),
        edges=read_only(edges),
        area=read_only(chain.area[links]),
        impedance=read_only(chain.impedance[links]),
        stress=_single(stress),
        velocity=_single(velocity),
        displacement=_single(displacement),
    )


def _single(values: Single) -> Single:
    values = values[:]
    values.flags.writeable = False
    return values


def _ledger(blow: Blow) -> Ledger:
    rows = read_only(np.concatenate((blow.start_row[None], blow.frames.ledger)).T)
    stride, dt = blow.stride, blow.chain.dt
    time = np.concatenate(([-0.5 * dt], (np.arange(rows.shape[1] - 1) * stride + 0.5) * dt))
    parts = dict(zip(LEDGER, rows, strict=False))
    start = float(blow.start_row[: LEDGER.index("work_of_gravity")].sum())
    parts["initial_energy"] = read_only(np.full(rows.shape[1], start))
    return Ledger(read_only(time), parts, blow.residual)


def _peak(values: Array, position: Array, time: Array) -> Peak:
    i = first_of_largest(values, time)
    # without the sign of a zero that was turned from tension to compression
    return Peak(max(float(values[i]), 0.0) + 0.0, float(position[i]), float(time[i]))


def _set(blow: Blow) -> float:
    """Permanent movement of the toe: at rest, or its plastic part where no rest was found."""
    if blow.settled or not len(blow.state.bounds.toe_par):
        return float(blow.state.motion.u[-1] - blow.rest[-1])
    toe = blow.chain.case.ground.toe if blow.chain.case.ground else None
    return max(float(blow.state.bounds.toe_state[0] - (toe.gap if toe else 0.0)), 0.0)


def _head_train(blow: Blow) -> HeadTrain | None:
    if not blow.chain.train:
        return None
    force, ram, head = blow.ram
    return HeadTrain(read_only(np.arange(blow.steps) * blow.chain.dt), force, ram, head)


def _residual(blow: Blow) -> Residual | None:
    if len(blow.sets) < 2:
        return None
    chain, links = blow.chain, blow.member_links
    u, state = blow.state.motion.u, blow.state.rod.state
    plastic = np.array([blow.law_at(int(i)) == "elastic_plastic" for i in links])
    stretch = u[links + 1] - u[links] - np.where(plastic, state[0, links], 0.0)
    sets = np.array(blow.sets)
    wanted = chain.case.run.blows
    tolerance = 0.0 if isinstance(wanted, int) else wanted.tolerance
    return Residual(
        set_per_blow=read_only(sets),
        repeats=bool(abs(sets[-1] - sets[-2]) <= tolerance),
        position=read_only((chain.position[links] + chain.position[links + 1]) / 2),
        force=read_only(chain.axial[links] / chain.length[links] * stretch),
    )


def _crack_openings(blow: Blow) -> dict[str, float]:
    """Largest opening of a crack per brittle segment that cracked, m."""
    bond, openings = blow.state.bounds.joint_bond, dict[str, float]()
    for joint, strength, opened in zip(blow.chain.joints, bond[0], bond[1], strict=True):
        if joint.strength and strength <= 0:
            openings[joint.segment] = max(openings.get(joint.segment, 0.0), float(opened))
    return openings

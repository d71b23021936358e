"""What the user must be told about a run, found from what was recorded."""

from __future__ import annotations

import numpy as np

from solver.answer.blow import Blow
from solver.answer.remark import Remark
from solver.answer.waves import travel_time_to
from solver.model.derived import shaft_resistance
from solver.model.load import Pulse
from solver.numerics.balance import LEDGER
from solver.numerics.chain import Chain
from solver.numerics.compiled import cache_problem
from solver.numerics.ground import bands_of
from solver.numerics.mesh import MISMATCH

#: Energy of a ram that falls again, as a share of its first blow's, above which that is told.
SECOND_BLOW = 0.1
#: Time steps of a pulse below which its shape is smeared: with 10 the peak of a half-sine is right to 1 %.
FEW_STEPS = 10.0
#: Elements of a viscous segment below which their number is told.
FEW = 100
#: Plastic strain above which a law of small strains is said to be left.
SMALL_STRAIN = 0.1
#: Share of the ground's loss by slip in the last passage of the wave, and of the set in the toe's largest movement,
#: above which the ground is said to give way still.
STILL_GIVING = 0.1
#: Share of the energy that may fail to close before it is told.
TOLD = 0.01


def remarks_of(blow: Blow, residual: float, at_rest: bool, finished: bool) -> tuple[Remark, ...]:
    """The gravest first."""
    chain, case, told = blow.chain, blow.chain.case, []
    if residual > TOLD:
        told.append(Remark("energy_open", residual))
    if 1 - chain.courant_worst > MISMATCH:
        told.append(Remark("times_unfit", chain.courant_worst))
    steps = _steps_of_pulse(chain)
    if steps < FEW_STEPS:
        told.append(Remark("pulse_in_few_steps", steps))
    few = [s for s in chain.stretches if s.material.law.kind == "viscoelastic" and s.stop - s.start < FEW]
    if few:
        told.append(Remark("few_elements", few[0].stop - few[0].start, name=few[0].segment.name))
    strain, place = _largest_plastic_strain(blow)
    if strain > SMALL_STRAIN:
        told.append(Remark("large_strain", strain, place))
    told += [Remark("mass_at_contact", place=place) for place in _masses_at_contacts(chain)]
    crumbled = _crumbled(blow)
    if crumbled:
        told.append(Remark("crumbled", crumbled[0][0], name=crumbled[0][1]))
    if not finished:
        told.append(Remark("stopped"))
    elif in_the_air(blow):
        told.append(Remark("in_the_air"))
    elif case.run.duration is None and not at_rest:
        told.append(Remark("not_at_rest", (blow.steps - 1) * chain.dt))
    elif _still_giving(blow):
        told.append(Remark("still_giving", (blow.steps - 1) * chain.dt))
    returns = _ram_returns(blow)
    if finished and returns is not None:
        told.append(Remark("ram_returns", returns))
    if case.ground is not None:
        bands = list(bands_of(case.ground, case.member.length))
        reach = max((b.bottom for b in bands), default=case.ground.surface)
        if bands and reach < case.member.length * (1 - 1e-9):
            told.append(Remark("layers_end", place=reach))
        if finished and not blow.settled:
            told.append(Remark("no_rest"))
    if cache_problem:
        told.append(Remark("not_cached", name=cache_problem))
    return tuple(told)


def _crumbled(blow: Blow) -> list[tuple[float, str]]:
    """How many elements of a segment came off alone, between two cracks, and the segment; the most first."""
    count: dict[str, int] = {}
    before = None
    for joint, strength in zip(blow.chain.joints, blow.state.bounds.joint_bond[0], strict=True):
        cracked = joint if joint.strength and strength <= 0 else None
        if cracked and before and cracked.link - before.link == 2:
            count[joint.segment] = count.get(joint.segment, 0) + 1
        before = cracked
    return sorted(((float(n), name) for name, n in count.items()), reverse=True)


def _masses_at_contacts(chain: Chain) -> list[float]:
    """Places (m) of attached masses that meet another face without a cushion between."""
    faces = {node for joint in chain.joints for node in (joint.link, joint.link + 1)}
    faces |= {node for t in chain.train if t.cushion is None for node in (t.link, t.link + 1)}
    if chain.wall_gap < np.inf:
        faces.add(chain.nodes - 1)
    return sorted({float(chain.position[node]) for node in faces.intersection(chain.extra_masses)})


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


def in_the_air(blow: Blow) -> bool:
    """Whether a member that only its toe can hold is above it as the run ends, to fall back on it."""
    chain, ground = blow.chain, blow.chain.case.ground
    if ground is None or chain.gravity == 0.0 or not len(blow.state.bounds.toe_par):
        return False
    held = shaft_resistance(chain.case) > 0 or chain.spring.any() or chain.fixed_end
    return bool(not held and blow.at_end[-1] < blow.state.bounds.toe_state[0])


def _steps_of_pulse(chain: Chain) -> float:
    """How many time steps a pulse lasts (of a decay: its time constant); infinitely many where there is none."""
    load = chain.case.load
    return load.duration / chain.dt if isinstance(load, Pulse) and load.peak else np.inf


def _still_giving(blow: Blow) -> bool:
    """Whether the ground still gave way as a run of given duration ended, so that its set is not the last: within the
    last passage of the wave there and back, or before there was one. Not where the toe springs back all the way."""
    case = blow.chain.case
    if case.ground is None or case.run.duration is None:
        return False
    passage = 2 * travel_time_to(case, case.member.length)
    slipped = blow.frames.ledger[:, LEDGER.index("ground_static_loss")]
    time = np.arange(len(slipped)) * blow.stride * blow.chain.dt
    if time[-1] < passage:
        return True
    late = slipped[-1] - np.interp(time[-1] - passage, time, slipped)
    toe_largest = float(blow.extremes.travel[-1] - blow.rest[-1])
    return bool(late > STILL_GIVING * slipped[-1] and abs(blow.sets[-1]) > STILL_GIVING * toe_largest)


def _ram_returns(blow: Blow) -> float | None:
    """Time at which a ram that gravity brings back, with its cap or without, will strike again, s; `None` where none is
    in the air.

    From the bottom up: what carries no force in the face or cushion below it flies, and falls on the first that stands.
    """
    chain, at, v = blow.chain, blow.at_end, blow.state.motion.v
    if not chain.train or chain.gravity == 0.0:
        return None
    floor, energy, flight = chain.head, 0.0, None
    for number, link in reversed(list(enumerate(chain.train))):
        node = link.link
        if blow.state.bounds.train_state[number, 2] > 0.0:
            floor = node
            continue
        gap = max(float(at[floor] - at[node]), 0.0)
        still = blow.settled and floor == chain.head
        rising = -float(v[node]) if still else float(v[floor] - v[node])
        mass = float(np.sum(chain.mass[: node + 1])) if number == 0 else float(chain.mass[node])
        energy += mass * (rising**2 / 2 + chain.gravity * gap)
        flight = (rising + np.sqrt(rising**2 + 2 * chain.gravity * gap)) / chain.gravity
    first = float(np.sum(chain.mass[: chain.head] * chain.velocity[: chain.head] ** 2)) / 2
    if flight is None or energy < SECOND_BLOW * first:
        return None
    return float((blow.steps - 1) * chain.dt + flight)

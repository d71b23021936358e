"""From the chain of a case to the arrays that the kernels march with."""

from __future__ import annotations

from itertools import pairwise

import numpy as np
from numpy.typing import NDArray

from solver.model.load import History, Pulse
from solver.model.project import Gauge
from solver.numerics.arrays import Bounds, Extremes, Motion, Records, Rod, aligned
from solver.numerics.balance import LEDGER
from solver.numerics.chain import Chain
from solver.numerics.ground import toe_of
from solver.numerics.laying import Stretch
from solver.numerics.links import ELASTIC, ELASTIC_PLASTIC, LARGE_STRAIN, VISCOELASTIC
from solver.numerics.pulses import end_time

Array = NDArray[np.float64]
#: A step number that no run reaches.
NEVER = 2**62
LAW_NUMBERS = {
    "elastic": ELASTIC,
    "viscoelastic": VISCOELASTIC,
    "elastic_plastic": ELASTIC_PLASTIC,
    # what cracks are the joints between its elements
    "brittle_tension": ELASTIC,
    "large_strain": LARGE_STRAIN,
}


def rod_of(chain: Chain) -> Rod:
    """Links, masses and what acts implicitly on nodes."""
    dt, links = chain.dt, len(chain.axial)
    par, state = np.zeros((3, links)), np.zeros((4, links))
    for stretch in chain.stretches:
        _law_parameters(chain, stretch, par)
    special = np.flatnonzero((chain.damping > 0) | (chain.spring > 0))
    effective = chain.mass + chain.damping * dt / 2 + chain.spring * dt**2 / 4
    inertia, pivot, carry = _lateral_inertia(chain, effective)
    weight = chain.mass * chain.gravity
    return Rod(
        blocks=_blocks(chain),
        stiff=aligned(chain.axial / chain.length),
        par=par,
        state=state,
        push=aligned(dt / effective),
        mass=aligned(chain.mass),
        weight=aligned(weight),
        special=special,
        spring=chain.spring[special],
        dashpot=chain.damping[special],
        inertia=inertia,
        pivot=pivot,
        carry=carry,
        fixed_end=chain.fixed_end,
        driven=np.array([chain.head, _driven_until(chain)]),
        opening=np.zeros(0),
    )


def _driven_until(chain: Chain) -> int:
    """Number of the first step on which the struck end is not driven: 0 without a velocity load."""
    load = chain.case.load
    if not isinstance(load, Pulse | History) or load.quantity == "force":
        return 0
    if not load.release:
        return NEVER
    return int(np.ceil(end_time(load) / chain.dt - 1e-9)) if np.isfinite(end_time(load)) else NEVER


def _blocks(chain: Chain) -> NDArray[np.int64]:
    """Runs of links with one law; links without an element are elastic with no stiffness."""
    laws = np.full(len(chain.axial), ELASTIC)
    for stretch in chain.stretches:
        laws[stretch.start : stretch.stop] = LAW_NUMBERS[stretch.material.law.kind]
    edges = {0, len(laws), *(np.flatnonzero(np.diff(laws)) + 1).tolist()}
    # the first yield of each segment is told, so such segments are blocks of their own
    for stretch in chain.stretches:
        if stretch.material.law.kind == "elastic_plastic":
            edges |= {stretch.start, stretch.stop}
    return np.array([(laws[a], a, b) for a, b in pairwise(sorted(edges))], dtype=np.int64)


def _law_parameters(chain: Chain, stretch: Stretch, par: Array) -> None:
    at = slice(stretch.start, stretch.stop)
    law, material = stretch.material.law, stretch.material
    area, length = chain.area[at], chain.length[at]
    if law.kind == "viscoelastic":
        par[0, at] = law.viscosity * area / length
    elif law.kind == "elastic_plastic":
        slope = law.hardening_modulus
        plastic = material.young_modulus * slope / (material.young_modulus - slope)
        par[0, at] = law.yield_stress * area
        par[1, at] = plastic * area / length
        par[2, at] = 1.0 if law.hardening == "kinematic" else 0.0
    elif law.kind == "large_strain":
        par[0, at] = material.young_modulus / 3 * area
        par[1, at] = length


def _lateral_inertia(chain: Chain, effective: Array) -> tuple[Array, Array, Array]:
    """Love's rod: rho A ((nu r_p)^2 u_xtt)_x adds (nu r_p)^2 rho A/dx between neighbours; factors of M/dt = L D L'.

    A. E. H. Love, *Mathematical Theory of Elasticity* (from memory). Empty where the member has none.
    """
    if not chain.case.member.lateral_inertia:
        return np.zeros(0), np.zeros(0), np.zeros(0)
    inertia = np.zeros(len(chain.axial))
    for stretch in chain.stretches:
        at = slice(stretch.start, stretch.stop)
        radius_squared = stretch.segment.section.polar_radius_squared
        poisson = stretch.material.poisson_ratio
        assert radius_squared is not None
        assert poisson is not None
        inertia[at] = poisson**2 * radius_squared * chain.line_mass[at] / chain.length[at]
    diagonal, beside = effective.copy(), -inertia / chain.dt
    diagonal[:-1] += inertia
    diagonal[1:] += inertia
    diagonal /= chain.dt
    if chain.fixed_end:
        beside[-1] = 0.0
    if getattr(chain.case.load, "quantity", "") == "velocity":
        beside[0] = 0.0
    pivot, carry = diagonal.copy(), np.zeros(len(inertia))
    for i in range(len(inertia)):
        carry[i] = beside[i] / pivot[i]
        pivot[i + 1] = diagonal[i + 1] - carry[i] * beside[i]
    return inertia, pivot, carry


def bounds_of(chain: Chain) -> Bounds:
    """Toe, joints, wall and train at rest before the blow."""
    par, state = toe_of(chain)
    train_par, train_state = np.zeros((2, 3)), np.zeros((2, 4))
    kinds = np.zeros(len(chain.train), dtype=np.int64)
    for i, link in enumerate(chain.train):
        if link.cushion is not None:
            kinds[i] = 1
            e = link.cushion.restitution
            k = min(link.cushion.loading_stiffness, stiffest_cushion(chain, link.link))
            train_par[i] = k, k / e**2, e
    return Bounds(
        toe_par=par,
        toe_state=state,
        joints=np.array([j.link for j in chain.joints], dtype=np.int64),
        joint_par=np.array([(j.gap, j.slack, 0.0) for j in chain.joints], dtype=float).reshape(-1, 3),
        joint_bond=_bonds_of(chain),
        faces=np.array([i for i, j in enumerate(chain.joints) if not j.strength], dtype=np.int64),
        bonds=_runs_of_bonds(chain),
        joint_trial=np.zeros(len(chain.joints)),
        joint_force=np.zeros(len(chain.joints)),
        wall=np.array([chain.wall_gap, 0.0, chain.wall_gap]),
        train_links=np.array([t.link for t in chain.train], dtype=np.int64),
        train_kinds=kinds,
        train_par=train_par,
        train_state=train_state,
        train_force=np.zeros(2),
    )


def _bonds_of(chain: Chain) -> Array:
    """Rows of `Bounds.joint_bond` of bonds that hold; their `ease` closes a gap at the next step, N/m."""
    rows = np.zeros((5, len(chain.joints)))
    rows[3] = -1.0
    if not any(j.strength for j in chain.joints):
        return rows
    links = np.array([j.link for j in chain.joints], dtype=np.int64)
    push = rod_of(chain).push
    rows[0] = [j.strength for j in chain.joints]
    rows[4] = 1 / (chain.dt * (push[links] + push[links + 1]))
    return rows


def _runs_of_bonds(chain: Chain) -> NDArray[np.int64]:
    """Bonds that follow each other every second node: first joint, stop, first node of each run, shape (runs, 3)."""
    runs: list[list[int]] = []
    for i, joint in enumerate(chain.joints):
        if not joint.strength:
            continue
        if runs and runs[-1][1] == i and runs[-1][2] + 2 * (i - runs[-1][0]) == joint.link:
            runs[-1][1] = i + 1
        else:
            runs.append([i, i + 1, joint.link])
    return np.array(runs, dtype=np.int64).reshape(-1, 3)


def stiffest_cushion(chain: Chain, link: int) -> float:
    """Stiffest cushion between the nodes of a link that a step resolves, N/m; a stiffer one is marched as this one.

    Its swing between the two masses, w^2 = k (1/m1 + 1/m2), then has w dt = 2: against an element, k dt = 2 Z. What is
    stiffer rises within one step all the same, and would make single elements ring about the mean of their neighbours.
    """
    above, below = chain.mass[link], chain.mass[link + 1]
    return float(4 * above * below / (above + below) / chain.dt**2)


def motion_of(chain: Chain) -> Motion:
    """At rest but for what strikes. A free fall has half a step to go before the first half-step velocity."""
    n = chain.nodes
    velocity = chain.velocity
    still, pulls = np.zeros(n), aligned(np.zeros(n + 1), ahead=1)
    return Motion(aligned(still), aligned(velocity), aligned(velocity), pulls, aligned(still))


def extremes_of(chain: Chain) -> Extremes:
    """Envelopes before the first step."""
    links, nodes = chain.nodes - 1, chain.nodes
    values = (
        np.full(links, 1e300),
        np.zeros(links),
        np.full(links, -1e300),
        np.zeros(links),
        np.full(nodes, -np.inf),
        np.full(nodes, -np.inf),
    )
    second = _second_blow(chain)
    first = len(second) > 0
    low, low_step, high, high_step, speed, travel = (aligned(a) for a in values)
    at_links, at_nodes = np.zeros((4, links if first else 0)), np.zeros((2, nodes if first else 0))
    return Extremes(low, low_step, high, high_step, speed, travel, at_links, at_nodes, second)


def _second_blow(chain: Chain) -> NDArray[np.int64]:
    """What the march needs to know a second blow: see `Extremes`.

    What strikes may leave and touch again many times while waves run through the member; it strikes again when it was
    away for longer than a wave takes to the far end and back (a choice of this program).
    """
    joint = next((k for k, j in enumerate(chain.joints) if j.link == chain.head - 1), -1)
    if joint < 0 and not chain.train:
        return np.zeros(0, dtype=np.int64)
    rods = np.flatnonzero(chain.axial > 0)
    rods = rods[rods >= chain.head]
    there_and_back = 2 * float(
        np.sum(chain.length[rods] * np.sqrt(chain.line_mass[rods] / chain.axial[rods]))
    )
    return np.array([0, int(np.ceil(there_and_back / chain.dt)), 0, joint, 0], dtype=np.int64)


def gauge_readings(chain: Chain) -> tuple[NDArray[np.int64], Array]:
    """Nodes and weights of all gauges, shapes (g, 2) and (g, 2, 7): see `Records`."""
    gauges = chain.case.gauges
    nodes, weights = np.zeros((len(gauges), 2), dtype=np.int64), np.zeros((len(gauges), 2, 7))
    for g, gauge in enumerate(gauges):
        for r, (node, share, side) in enumerate(_places(chain, gauge)):
            nodes[g, r] = node
            weights[g, r] = share, *_reading(chain, side, node)
    return nodes, weights


def _places(chain: Chain, gauge: Gauge) -> list[tuple[int, float, str]]:
    """One or two nodes, each with its share and the side that is read there.

    At a joint or step the side is the gauge's own, towards the struck end unless told otherwise; a gauge between two
    nodes reads the element that it sits on.
    """
    on_member = gauge.on == "member"
    rods = [s.stop for s in chain.stretches if s.start < chain.head]
    low, high = (chain.head, chain.nodes) if on_member else (0, max(rods) + 1)
    # the distance of a gauge on a rod that strikes runs from that rod's own far face
    x = gauge.position if on_member else chain.position[0] + gauge.position
    place = chain.position[low:high]
    tolerance = 1e-6 * float(chain.length[low])
    near = np.flatnonzero(np.abs(place - x) <= tolerance)
    if len(near):
        return [(low + int(near[0] if gauge.side == "near" else near[-1]), 1.0, gauge.side)]
    right = int(np.searchsorted(place, x))
    share = (x - place[right - 1]) / (place[right] - place[right - 1])
    return [(low + right - 1, float(1 - share), "far"), (low + right, float(share), "near")]


def gauge_link(chain: Chain, gauge: Gauge) -> int:
    """The link whose section and material a gauge reads."""
    node, _, side = _places(chain, gauge)[0]
    left = node > 0 and chain.axial[node - 1] > 0
    right = node < chain.nodes - 1 and chain.axial[node] > 0
    return node - 1 if left and (side == "near" or not right) else node


def _reading(chain: Chain, side: str, node: int) -> tuple[float, ...]:
    """Weights of the left and right link's force, of the acceleration and a constant; 1/length of both links.

    Within a uniform stretch the mean of both neighbours (exact for waves at Courant number 1); on an end, joint or
    step the force on the side asked for, from the momentum of that half element.
    """
    half = chain.half_mass
    left = node > 0 and chain.axial[node - 1] > 0
    right = node < chain.nodes - 1 and chain.axial[node] > 0
    lengths = (
        1 / chain.length[node - 1] if left else 0.0,
        1 / chain.length[node] if right else 0.0,
    )
    lumped = node in chain.extra_masses or chain.damping[node] > 0 or chain.spring[node] > 0
    smooth = left and right and not lumped and abs(half[node] / half[node - 1] - 1) < 1e-9
    if smooth:
        return 0.5, 0.5, 0.0, 0.0, *lengths
    if left and (side == "near" or not right):
        return 1.0, 0.0, half[node - 1], -half[node - 1] * chain.gravity, *lengths
    return 0.0, 1.0, -half[node], half[node] * chain.gravity, *lengths


def records_of(
    chain: Chain,
    readings: tuple[NDArray[np.int64], Array],
    rows: int,
    columns: NDArray[np.int64],
    flags: NDArray[np.int64],
) -> Records:
    """Room for what a march records in `rows` frames, and for the events of a chunk; gauges and ram get theirs chunk by
    chunk. `readings` as `gauge_readings` gives them."""
    nodes, weights = readings
    # in one piece: the system's store of free memory then keeps it for the next case, whose pages are not new again
    stress, velocity, displacement = np.empty((3, rows, len(columns)), dtype=np.float32)
    return Records(
        node=nodes,
        weights=weights,
        gauges=np.empty((5 * len(nodes), 0)),
        ram=np.empty((3 if chain.train else 0, 0)),
        since=np.zeros(2, dtype=np.int64),
        columns=columns,
        area=chain.area[columns].astype(np.float32),
        stress=stress,
        velocity=velocity,
        displacement=displacement,
        ledger=np.empty((rows, len(LEDGER) + 1)),
        events=np.empty((4096, 3), dtype=np.int64),
        event_count=np.zeros(1, dtype=np.int64),
        flags=flags,
    )

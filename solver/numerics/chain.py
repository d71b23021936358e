"""A case as plain arrays: the chain of nodes from the rod that strikes down to the far end.

Order of nodes: a rod that strikes (its far face first), or a rigid ram; a drive cap; the member. Between two
neighbours there is a link: an element of a rod, or nothing (stiffness 0) where a cushion or a joint acts.
"""

from __future__ import annotations

from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from solver.errors import SolveError
from solver.model.derived import travel_time
from solver.model.load import GRAVITY, Cushion, Drop, Striker
from solver.model.material import Material
from solver.model.member import Segment
from solver.model.project import Case
from solver.numerics.along import profile_along
from solver.numerics.laying import JointLink, Laid, Stretch
from solver.numerics.mesh import FEWEST, MOST, SegmentSteps, Steps, choose_steps
from solver.numerics.stability import stiffening_of

Array = NDArray[np.float64]

#: Most elements that a stiff cushion or spring asks for; a stiffer cushion is nearly none: see
#: `assemble.stiffest_cushion`, a stiffer spring nearly a fixed end.
MOST_FOR_CUSHION = 4000
#: Fewest elements of a rod that strikes.
FEWEST_IN_STRIKER = 10
#: Most elements along the member that a person may ask for; a mistyped length must not fill the memory.
MOST_ASKED = 1_000_000
#: Courant number below which a segment is too short for the mesh of the others.
WORST_COURANT = 0.2


@dataclass(frozen=True)
class TrainLink:
    """A link of ram, cap and head: through a cushion, or face to face (`None`)."""

    link: int
    cushion: Cushion | None


@dataclass(frozen=True, eq=False)
class Chain:
    """The discrete case. Shapes: nodes (n,), links (n - 1,). SI units.

    `mass_left` and `mass_right` are the half masses that elements give to their first and last node; `mass` adds
    lumped masses. `axial` is EA of each link (0 where no element is), `length` its length, `area` such that stress
    = force/area.
    `damping` and `spring` act from a node to fixed ground.
    """

    case: Case
    dt: float
    courant_worst: float
    position: Array
    mass: Array
    damping: Array
    spring: Array
    axial: Array
    length: Array
    area: Array
    line_mass: Array
    stretches: tuple[Stretch, ...]
    joints: tuple[JointLink, ...]
    train: tuple[TrainLink, ...]
    head: int
    velocity: Array
    fixed_end: bool
    wall_gap: float
    gravity: float
    extra_masses: dict[int, float] = field(default_factory=dict)

    @property
    def nodes(self) -> int:
        return len(self.position)

    @property
    def half_mass(self) -> Array:
        """Half of each link's mass, kg."""
        return self.line_mass * self.length / 2

    @property
    def impedance(self) -> Array:
        """Z = sqrt(EA rho A) of each link, N·s/m; 0 where no element is."""
        return np.sqrt(self.axial * self.line_mass)

    @property
    def member_stretches(self) -> tuple[Stretch, ...]:
        """Stretches of the member itself."""
        return tuple(s for s in self.stretches if s.start >= self.head)


def segments_of(case: Case) -> tuple[tuple[Segment, ...], slice]:
    """All segments in the chain, rod that strikes first, and which of them are the member's."""
    rod = case.ram_segments
    return rod + case.member.segments, slice(len(rod), None)


def steps_of(case: Case, element_length: float | None) -> Steps:
    """The mesh of a case: chosen by the program, or close to `element_length` (m).

    Raises `SolveError` where that makes more than `MOST_ASKED` elements.
    """
    segments, member = segments_of(case)
    materials = case.materials
    times = []
    for s in segments:
        law = materials[s.material].law
        viscous = law.viscosity / materials[s.material].young_modulus if law.kind == "viscoelastic" else 0.0
        times.append(SegmentSteps(travel_time(s, materials), viscous, stiffening_of(law)))
    total = sum(t.travel_time for t in times[member])
    marks = [_time_to(case, times[member], g.position) for g in case.gauges if g.on == "member"]
    if element_length is not None:
        speeds = [s.length / t.travel_time for s, t in zip(segments, times, strict=True)][member]
        if total * max(speeds) > MOST_ASKED * element_length:
            raise SolveError(
                f"Elements of {element_length:.3g} m are more than {MOST_ASKED} along the member: give a longer one, "
                "or leave its choice to the program."
            )
        wanted = max(2, round(total * max(speeds) / element_length))
        return choose_steps(times, member, wanted, True, marks)
    return choose_steps(times, member, _wanted(case, total), False, marks)


def _time_to(case: Case, times: list[SegmentSteps], position: float) -> float:
    passed, elapsed = 0.0, 0.0
    for segment, t in zip(case.member.segments, times, strict=True):
        part = min(max((position - passed) / segment.length, 0.0), 1.0)
        elapsed += part * t.travel_time
        passed += segment.length
    return elapsed


def _wanted(case: Case, total: float) -> int:
    """Elements along the member: fine enough for the pulse, for what strikes, and for stiff springs in its way."""
    load = case.load
    yields = any(case.material(s.material).law.kind == "elastic_plastic" for s in segments_of(case)[0])
    # the energy of a yield that sets in at once closes in proportion to the step
    wanted = 1000 if yields else FEWEST
    if load.kind == "pulse" and load.shape != "decay":
        wanted = max(wanted, int(np.ceil(40 * total / load.duration)))
    finest = max(_finest_for_ram(case, total), _finest_for_springs(case, total))
    wanted = max(wanted, int(np.ceil(finest)))
    strikes = [travel_time(s, case.materials) for s in case.ram_segments]
    if strikes:
        wanted = max(wanted, int(np.ceil(FEWEST_IN_STRIKER * total / sum(strikes))))
    return min(wanted, MOST)


def _finest_for_ram(case: Case, total: float) -> float:
    """Elements that a rigid ram asks for.

    Z dt under 0.1 % of a mass without a cushion, whose front is smeared over the first node; a cushion either rises
    over some steps, k dt <= 0.3 Z, or under a mass like that within one, k dt <= 2 Z.
    """
    load = case.load
    if not isinstance(load, Drop) or load.ram_mass is None:
        return 0.0
    impedance = _least_impedance(case.member.segments[:1], case.materials)
    finest = 1000 * impedance * total / load.ram_mass
    bare = _finest_for_cap(load, impedance * total)
    stiff = [c.loading_stiffness for c in (load.cushion, load.pile_cushion) if c is not None]
    if not stiff:
        return max(finest, bare)
    steps = max(stiff) * total / impedance
    return min(max(steps / 2, min(steps / 0.3, finest), bare), MOST_FOR_CUSHION)


def _finest_for_cap(load: Drop, mass: float) -> float:
    """Elements that a cap asks for which lies on the head without a cushion: Z dt under 2.5 % of it. What it strikes is
    the first node, which must be small beside it as it falls back; `mass`: Z L/c, kg.
    """
    return mass / (0.025 * load.cap_mass) if load.cap_mass > 0 and load.pile_cushion is None else 0.0


def _finest_for_springs(case: Case, total: float) -> float:
    """Elements that springs to fixed ground ask for: where a front meets one, k dt <= 2 Z, or single elements ring."""
    load, fronts = case.load, ("rectangle", "trapezoid", "decay")
    smooth = load.kind == "drop" or (load.kind == "pulse" and load.shape not in fronts)
    if smooth and not case.run.initial_velocity:
        return 0.0
    stiff = [a.value for a in case.member.attachments if a.kind == "spring"]
    stiff += [case.far_end.stiffness] if case.far_end.kind == "spring" else []
    impedance = _least_impedance(case.member.segments, case.materials)
    return min(max(stiff, default=0.0) * total / (2 * impedance), MOST_FOR_CUSHION)


def _least_impedance(segments: tuple[Segment, ...], materials: dict[str, Material]) -> float:
    """Smallest impedance at the ends of segments, N·s/m."""
    found = []
    for segment in segments:
        axial, mass, _ = profile_along(segment, materials, np.array([0.0, 1.0]))
        found.append(float(np.sqrt(axial * mass).min()))
    return min(found)


def build_chain(case: Case, element_length: float | None = None) -> Chain:
    """Discretise a case; `element_length` (m) overrides the program's choice."""
    given = element_length or case.run.element_length
    steps = steps_of(case, given)
    _refuse_tiny(case, steps, given is not None)
    load, rod = case.load, case.ram_segments
    laid = Laid(case.materials)
    joints: list[JointLink] = []
    if rod:
        joints += laid.rod(rod, steps.counts[: len(rod)], -sum(s.length for s in rod))
    elif isinstance(load, Drop):
        assert load.ram_mass is not None
        laid.lump(load.ram_mass, 0.0)
    train: list[TrainLink] = []
    if isinstance(load, Drop):
        train.append(TrainLink(laid.count - 1, load.cushion))
        if load.cap_mass > _negligible(case, steps.counts[len(rod)]):
            laid.lump(load.cap_mass, 0.0)
            train.append(TrainLink(laid.count - 1, load.pile_cushion))
        elif load.pile_cushion is not None:
            train = [TrainLink(laid.count - 1, _in_series(load.cushion, load.pile_cushion))]
    if isinstance(load, Striker):
        joints.append(JointLink(laid.count - 1, 0.0, np.inf, 0.0))
    head = laid.count
    joints += laid.rod(case.member.segments, steps.counts[len(rod) :], 0.0)
    return _finished(case, steps, laid, tuple(joints), tuple(train), head)


def _refuse_tiny(case: Case, steps: Steps, given: bool) -> None:
    """Raise `SolveError` where one segment is so short that it would make all others slow and blurred."""
    if steps.courant_worst >= WORST_COURANT:
        return
    by_time = sorted(segments_of(case)[0], key=lambda s: travel_time(s, case.materials))
    shortest, longest = by_time[0], by_time[-1]
    raise SolveError(
        f"Segment '{shortest.name}' ({shortest.length:.3g} m) is too short to be solved beside '{longest.name}' "
        f"({longest.length:.3g} m): join it to its neighbour, give it as an attached mass, or give "
        f"{'a shorter' if given else 'an'} element length."
    )


def _negligible(case: Case, count: int) -> float:
    """A cap lighter than a thousandth of the first element is taken as none, kg."""
    first = case.member.segments[0]
    line_mass = profile_along(first, case.materials, np.zeros(1))[1]
    return float(line_mass[0]) * first.length / count / 1000


def _in_series(first: Cushion | None, second: Cushion) -> Cushion:
    """Two cushions without a cap between them act as one: flexibilities add, and so do the energies lost."""
    if first is None:
        return second
    k1, k2 = first.loading_stiffness, second.loading_stiffness
    u1, u2 = first.unloading_stiffness, second.unloading_stiffness
    loading, unloading = k1 * k2 / (k1 + k2), u1 * u2 / (u1 + u2)
    return Cushion(stiffness=loading, restitution=min(1.0, float(np.sqrt(loading / unloading))))


def _finished(
    case: Case,
    steps: Steps,
    laid: Laid,
    joints: tuple[JointLink, ...],
    train: tuple[TrainLink, ...],
    head: int,
) -> Chain:
    position, mass = np.concatenate(laid.position), np.concatenate(laid.mass)
    axial, length, area, line_mass = (np.concatenate(parts) for parts in zip(*laid.links, strict=True))
    damping, spring = np.zeros_like(mass), np.zeros_like(mass)
    extra = _attach(case, position, head, (mass, spring, damping))
    end = case.far_end
    if end.kind == "spring":
        spring[-1] += end.stiffness
    elif end.kind == "dashpot":
        damping[-1] += end.coefficient
    elif end.kind == "matched":
        damping[-1] += np.sqrt(axial[-1] * line_mass[-1])
    rods = axial > 0
    # transit times of a taper are those of its middles: hold the step to the quickest element
    quickest = float(np.min(length[rods] * np.sqrt(line_mass[rods] / axial[rods])))
    return Chain(
        case=case,
        dt=quickest if quickest < steps.dt * (1 - 1e-9) else steps.dt,
        courant_worst=steps.courant_worst,
        position=position,
        mass=mass,
        damping=damping,
        spring=spring,
        axial=axial,
        length=length,
        area=area,
        line_mass=line_mass,
        stretches=tuple(laid.stretches),
        joints=joints,
        train=train,
        head=head,
        velocity=first_velocities(case, mass, head, len(train) == 2),
        fixed_end=end.kind == "fixed",
        wall_gap=end.gap if end.kind == "wall" else np.inf,
        gravity=GRAVITY if case.run.gravity else 0.0,
        extra_masses=extra,
    )


def _attach(case: Case, position: Array, head: int, nodes: tuple[Array, Array, Array]) -> dict[int, float]:
    """Add what is attached to the `nodes`' masses, springs and dashpots; returns the lumped masses (kg) by node."""
    mass, spring, damping = nodes
    extra: dict[int, float] = {}
    for attachment in case.member.attachments:
        for node, share in _lever(position, head, attachment.position):
            if attachment.kind == "mass":
                mass[node] += share * attachment.value
                extra[node] = extra.get(node, 0.0) + share * attachment.value
            else:
                (spring if attachment.kind == "spring" else damping)[node] += share * attachment.value
    return extra


def first_velocities(case: Case, mass: Array, head: int, capped: bool) -> Array:
    """Velocity of every node before the first step, m/s, shape (n,): what strikes moves, its cap is at rest."""
    velocity = np.zeros_like(mass)
    if isinstance(case.load, Drop | Striker):
        velocity[: head - (1 if capped else 0)] = impact_velocity(case.load, mass, head)
    velocity[head:] = case.run.initial_velocity or 0.0
    if case.far_end.kind == "fixed":
        velocity[-1] = 0.0
    if getattr(case.load, "quantity", "") == "velocity":
        velocity[head] = 0.0
    return velocity


def _lever(position: Array, head: int, x: float) -> list[tuple[int, float]]:
    """The node at `x` (m), or the two beside it with their shares by the lever rule."""
    right = min(head + int(np.searchsorted(position[head:], x)), len(position) - 1)
    if right == head or abs(position[right] - x) < 1e-9 * position[-1]:
        return [(right, 1.0)]
    share = (x - position[right - 1]) / (position[right] - position[right - 1])
    return [(right, float(share)), (right - 1, float(1 - share))] if share < 1 - 1e-6 else [(right, 1.0)]


def impact_velocity(load: Drop | Striker, mass: Array, head: int) -> float:
    """Velocity of the ram or striker as it strikes, m/s: v = sqrt(2 g h efficiency), or sqrt(2 E/m)."""
    if isinstance(load, Striker):
        return load.velocity
    if load.impact_velocity is not None:
        return load.impact_velocity
    if load.drop_height is not None:
        return float(np.sqrt(2 * GRAVITY * load.drop_height * (load.efficiency or 1.0)))
    assert load.energy is not None
    ram = load.ram_mass or float(np.sum(mass[: head - (1 if load.cap_mass > 0 else 0)]))
    return float(np.sqrt(2 * load.energy / ram))

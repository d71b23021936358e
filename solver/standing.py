"""A member as it stands ready to be struck: mesh, ground and rest, found once for cases that differ in how fast alone.

Studies strike one member from many heights. What does not depend on the speed takes a tenth of a case, and a copy of it
next to nothing.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, field, replace
from threading import Lock
from typing import Any, NamedTuple

import numpy as np

from solver.beyond import LEAST, MOST, refuse_beyond_measure
from solver.model.load import Drop
from solver.model.material import Material
from solver.model.member import Member
from solver.model.project import Case, Gauge, Run
from solver.model.surroundings import FarEnd, Ground
from solver.numerics.arrays import Bounds, Shaft
from solver.numerics.assemble import bounds_of, motion_of, rod_of
from solver.numerics.chain import Chain, build_chain, first_velocities
from solver.numerics.equilibrium import State, bring_to_rest, lay_at_rest, step_back_half
from solver.numerics.ground import shaft_of
from solver.watch import refuse_unsupported

#: Members that are kept, and nodes above which one is not: some 20 MB in all.
KEPT, MOST_NODES = 16, 5000
#: What of a drop sets nothing but its speed.
SPEED = {"drop_height": None, "efficiency": None, "energy": None, "impact_velocity": None}


@dataclass(frozen=True)
class _Shape:
    """All of a case but how fast its ram falls."""

    member: Member
    drop: Drop
    far_end: FarEnd
    ground: Ground | None
    gauges: tuple[Gauge, ...]
    run: Run
    materials: tuple[Material, ...]
    element_length: float | None
    case: Case = field(compare=False)


class _Standing(NamedTuple):
    chain: Chain
    state: State


_kept: dict[_Shape, _Standing] = {}
_lock = Lock()


def standing(case: Case, element_length: float | None) -> tuple[Chain, State]:
    """The chain of a case, and its state before the first step. Raises `SolveError` where the case is refused, or as
    `build_chain` and `bring_to_rest` do."""
    if not isinstance(case.load, Drop):
        _refuse(case)
        chain = build_chain(case, element_length)
        return chain, at_rest(chain)
    shape = _Shape(
        case.member,
        case.load.model_copy(update=SPEED),
        case.far_end,
        case.ground,
        case.gauges,
        case.run,
        tuple(case.materials.values()),
        element_length,
        case,
    )
    found = _kept.get(shape)
    if found is None or not all(LEAST <= speed <= MOST for speed in _speeds(case.load)):
        _refuse(case)
    found = found or _keep(shape)
    chain, capped = found.chain, len(found.chain.train) == 2
    chain = replace(chain, case=case, velocity=first_velocities(case, chain.mass, chain.head, capped))
    state = _copy(chain, found.state)
    step_back_half(chain, state)
    return chain, state


def _refuse(case: Case) -> None:
    refuse_beyond_measure(case)
    refuse_unsupported(case)


def _speeds(load: Drop) -> Iterator[float]:
    """What is given of a drop's speed."""
    return (value for key in SPEED if (value := getattr(load, key)) is not None)


def at_rest(chain: Chain) -> State:
    """The state of a chain before the first step. Raises `SolveError` where nothing holds it."""
    state = _unloaded(chain)
    bring_to_rest(chain, state)
    return state


def _unloaded(chain: Chain) -> State:
    return State(rod_of(chain), shaft_of(chain), bounds_of(chain), motion_of(chain))


def _keep(shape: _Shape) -> _Standing:
    chain = build_chain(shape.case, shape.element_length)
    state = _unloaded(chain)
    lay_at_rest(chain, state)
    made = _Standing(chain, state)
    if chain.nodes <= MOST_NODES:
        with _lock:
            while len(_kept) >= KEPT:
                del _kept[next(iter(_kept))]
            _kept[shape] = made
    return made


def _copy(chain: Chain, old: State) -> State:
    """A state of its own; what a march only reads of the rod is shared."""
    motion = motion_of(chain)
    motion.u[:], motion.rest[:], motion.pulls[:] = old.motion.u, old.motion.rest, old.motion.pulls
    rod = old.rod._replace(state=old.rod.state.copy())
    return State(rod, Shaft(*map(_own, old.shaft)), Bounds(*map(_own, old.bounds)), motion)


def _own(part: Any) -> Any:
    return part.copy() if isinstance(part, np.ndarray) and part.flags.writeable else part

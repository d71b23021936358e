"""What the kernels march with: groups of plain arrays, handed in whole and changed in place."""

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Ints = NDArray[np.int64]
Singles = NDArray[np.float32]


#: Bytes of the widest vector registers, and of a line of cache.
LINE = 64


def aligned(values: Array, ahead: int = 0) -> Array:
    """A copy that begins on a line of cache, after `ahead` values (0 or 1): elsewhere every wide vector straddles two
    lines, which takes half as long again."""
    room = np.empty(values.size + 2 * LINE // 8)
    first = -room.ctypes.data % LINE // 8 + ahead * (LINE // 8 - 1)
    copy = room[first : first + values.size].reshape(values.shape)
    copy[:] = values
    return copy


class Rod(NamedTuple):
    """Links and nodes. `blocks`: law, first link, stop, shape (blocks, 3). `push` = dt/m of each node, with what acts
    implicitly on it. `special`: nodes with a spring or dashpot to ground, their `spring` (N/m) and `dashpot` (N·s/m).
    `inertia`: Love's coupling mass per link (kg), empty where there is none; `pivot` and `carry` factorise its
    matrix. `driven`: the struck end's node, and the first step on which it is not driven. `opening`: forces of the
    first step (N) on nodes that move already at time 0, or empty."""

    blocks: Ints
    stiff: Array
    par: Array
    state: Array
    push: Array
    mass: Array
    weight: Array
    special: Ints
    spring: Array
    dashpot: Array
    inertia: Array
    pivot: Array
    carry: Array
    fixed_end: bool
    driven: Ints
    opening: Array


class Shaft(NamedTuple):
    """Shaft arrays: plain laws from node `first` on; power law and radiation on listed nodes.

    Columns of `power`: static resistance and strength (N), stiffness (N/m), its inverse, J Ru, exponent, damping at the
    last half step (N); scales of the root with and without spring, and two inverses (`ready_power`). `pieces`:
    polynomials of that root, for one exponent after the other; `kept_at`: the piece with which a node's begin, -1 where
    they are not kept.
    """

    first: int
    r: Array
    par: Array
    power_nodes: Ints
    power: Array
    kept_at: Ints
    pieces: Array
    radiation_nodes: Ints
    radiation: Array


class Bounds(NamedTuple):
    """Toe, joints, wall, train. `joints`: link per joint; `joint_par`: gap, slack, and the gap at which what
    touches was stopped; `joint_force`: force of the last half step; `joint_trial`: see `contact.touch_ahead`; `wall`:
    see `contact.wall`. `faces`: the joints that only touch, `bonds`: runs of those that may crack; `joint_bond` of
    these, shape (5, joints): strength (N; 0: cracked), largest opening (m), force of the last step (N), the step in
    which it cracked (-1: not in this blow), `ease` (N/m)."""

    toe_par: Array
    toe_state: Array
    joints: Ints
    joint_par: Array
    joint_trial: Array
    joint_bond: Array
    faces: Ints
    bonds: Ints
    joint_force: Array
    wall: Array
    train_links: Ints
    train_kinds: Ints
    train_par: Array
    train_state: Array
    train_force: Array


class Motion(NamedTuple):
    """State of all nodes: displacement, velocity of the last half step, of the coming one. `pulls`: force of each link,
    and a 0 before the first and after the last, so that every node lies between two."""

    u: Array
    v: Array
    w: Array
    pulls: Array
    rest: Array

    @property
    def force(self) -> Array:
        """Force of each link, N."""
        return self.pulls[1:-1]


class Extremes(NamedTuple):
    """Envelopes, shape (links,) and (nodes,); times as step numbers.

    `second`: the last step on which what strikes touched, the most steps that it may be away within one blow, the step
    of the second blow (0: none), its joint (-1: it is a ram on the train), the last step on which a cap touched;
    empty where nothing strikes. `first_links` (4, links) and `first_nodes` (2, nodes) are the envelopes as they stood
    before a second blow."""

    low: Array
    low_step: Array
    high: Array
    high_step: Array
    speed: Array
    travel: Array
    first_links: Array
    first_nodes: Array
    second: Ints


class Frames(NamedTuple):
    """Lines of the pictures, shape (frames, columns), and of the ledger, shape (frames, parts)."""

    stress: Singles
    velocity: Singles
    displacement: Singles
    ledger: Array


class Records(NamedTuple):
    """What a march records. Gauges: two readings each, `node` shape (g, 2), `weights` (g, 2, 7) = share, left, right,
    mass, constant, 1/length of the left and right link. `gauges` (5 g, steps): force, velocity, displacement,
    acceleration, strain of each in turn; `ram` (3, steps); `since`: the steps that their first columns are for.
    Frames of the whole run: `columns` (links) with their `area`, every `stride` steps."""

    node: Ints
    weights: Array
    gauges: Array
    ram: Array
    since: Ints
    columns: Ints
    area: Singles
    stress: Singles
    velocity: Singles
    displacement: Singles
    ledger: Array
    events: Ints
    event_count: Ints
    flags: Ints


class Rest(NamedTuple):
    """When a run that ends by itself may end, looked at every so many steps (`every`, 0: never). `load_end`: time (s)
    after which the load is over; `grounded`: whether ground holds the member; `still` and `slipped`: looks in a row at
    which it was nearly at rest, and the energy (J) that slip had taken at the last look."""

    every: int
    load_end: float
    grounded: bool
    still: Ints
    slipped: Array

"""Rest after the blow: the member alone, damped until nothing moves, its ground without its dynamic part."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from solver.numerics.arrays import Bounds, Motion, Shaft
from solver.numerics.assemble import extremes_of, records_of, rod_of
from solver.numerics.chain import Chain
from solver.numerics.equilibrium import State
from solver.numerics.march import march

#: Movement (m) still to come at which the member counts as at rest.
STILL = 1e-8


def settle(chain: Chain, state: State) -> bool:
    """Let the member come to rest in place, its ram gone and its cap still on it; the rest is written into `state`.

    Dynamic relaxation with the damping critical for the slowest motion, so that the ground is not loaded anew by an
    overshoot. Returns whether rest was found.
    """
    s = state.shaft
    held = s.par[0].sum() + s.power[1].sum() + s.radiation[1].sum() + chain.spring.sum() > 0
    if chain.gravity == 0.0 and not held and not chain.fixed_end:
        # a toe alone pushes the member off and leaves it anywhere
        return False
    pace = _slowest(chain, state)
    if pace == 0.0:
        return False
    drag = 2 * pace
    # at Courant number 1 the sharpest mode of the mesh would swing for ever, whatever the damping
    chain = replace(chain, dt=0.9 * chain.dt)
    rod = rod_of(chain, drag)
    rod.state[:] = state.rod.state
    # viscous stresses have no part in a state of rest
    rod.par[:] = state.rod.par
    cap = chain.head - 1 if len(chain.train) == 2 else None
    weight = rod.weight
    if cap is not None:
        weight[chain.head] += weight[cap]
    weight[: chain.head] = 0.0
    shaft, bounds = _static_ground(state, chain)
    u = state.motion.u
    motion = Motion(u, np.zeros_like(u), np.zeros_like(u), state.motion.force, state.motion.rest)
    still = replace(chain, case=chain.case.model_copy(update={"gauges": ()}), train=())
    steps = max(64, int(np.ceil(4 / (drag * chain.dt))))
    flags = np.ones(len(rod.blocks), dtype=np.int64)
    records = records_of(still, steps, steps, np.zeros(0, dtype=np.int64), flags)
    extremes, sums, load = extremes_of(chain), np.zeros(8), np.zeros(steps)
    for _ in range(60):
        march(rod, shaft, bounds, motion, extremes, records, sums, load, 0, steps, steps, chain.dt, drag)
        if np.max(np.abs(motion.v[chain.head :])) < STILL * pace:
            state.rod.state[:] = rod.state
            return True
    return False


def _slowest(chain: Chain, state: State) -> float:
    """Lowest angular frequency (1/s): of the member on its ground as a rigid body, or of its own stretching."""
    s = state.shaft
    stiff = s.par[1].sum() + s.power[2].sum() + s.radiation[2].sum() + chain.spring.sum()
    if len(state.bounds.toe_par):
        stiff += state.bounds.toe_par[2]
    member = chain.axial[chain.head :] > 0
    c = np.sqrt(chain.axial[chain.head :][member] / chain.line_mass[chain.head :][member])
    stretching = np.pi / (2 * np.sum(chain.length[chain.head :][member] / c))
    if chain.fixed_end or chain.wall_gap < np.inf:
        return float(stretching)
    return float(min(np.sqrt(stiff / chain.mass[chain.head - 1 if chain.train else 0 :].sum()), stretching))


def _static_ground(state: State, chain: Chain) -> tuple[Shaft, Bounds]:
    """The same ground and bounds without damping, joints to the ram and the ram itself; states are shared."""
    s = state.shaft
    power, radiation = s.power.copy(), s.radiation.copy()
    power[4] = 0.0
    radiation[3] = 0.0
    plain = s.par.copy()
    plain[3:] = 0.0
    shaft = s._replace(par=plain, power=power, radiation=radiation)
    b = state.bounds
    toe = b.toe_par.copy()
    if len(toe):
        toe[3] = 0.0
    kept = b.joints >= chain.head
    bounds = b._replace(
        toe_par=toe,
        joints=b.joints[kept],
        joint_par=b.joint_par[kept],
        joint_force=b.joint_force[kept].copy(),
        train_links=np.zeros(0, dtype=np.int64),
        train_kinds=np.zeros(0, dtype=np.int64),
    )
    return shaft, bounds

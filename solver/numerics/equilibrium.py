"""Rest before the blow: the member under its own weight, held by its ground; and rest after it."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from scipy.linalg.lapack import dptsv

from solver.errors import SolveError
from solver.numerics.arrays import Bounds, Motion, Rod, Shaft
from solver.numerics.chain import Chain
from solver.numerics.links import link_forces
from solver.numerics.toe import RADIATION

Array = NDArray[np.float64]


@dataclass
class State:
    """All that changes while a case marches."""

    rod: Rod
    shaft: Shaft
    bounds: Bounds
    motion: Motion


@dataclass
class _Soil:
    """Nodal springs with a strength on either side: shaft of any law, and the toe with the gap below it, m."""

    stiff: Array
    low: Array
    high: Array
    gap: float

    def force_and_slope(self, u: Array) -> tuple[Array, Array]:
        """Static resistance of a first loading from rest, N, and its slope, N/m."""
        trial = self.stiff * u
        if self.gap > 0:
            trial[-1] = self.stiff[-1] * max(u[-1] - self.gap, 0.0)
        slope = np.where((trial > self.low) & (trial < self.high) | (trial == 0), self.stiff, 0.0)
        if self.gap > 0 and not u[-1] > self.gap:
            slope[-1] = 0.0
        return np.minimum(np.maximum(trial, self.low), self.high), slope


def _soil_of(chain: Chain, state: State) -> _Soil:
    n = chain.nodes
    stiff, strength, gap = np.zeros(n), np.zeros(n), 0.0
    s = state.shaft
    at = slice(s.first, s.first + len(s.r))
    stiff[at] += s.par[1]
    strength[at] += s.par[0]
    stiff[s.power_nodes] += s.power[:, 2]
    strength[s.power_nodes] += s.power[:, 1]
    stiff[s.radiation_nodes] += s.radiation[2]
    strength[s.radiation_nodes] += s.radiation[1]
    low = -strength
    if len(state.bounds.toe_par):
        stiff[-1] += state.bounds.toe_par[2]
        strength[-1] += state.bounds.toe_par[1]
        gap = float(state.bounds.toe_state[0])
    return _Soil(stiff, low, strength, gap)


def bring_to_rest(chain: Chain, state: State) -> None:
    """Put the member into static equilibrium under gravity, with its ram just touching. Changes `state` in place.

    Raises `SolveError` where nothing holds it.
    """
    lay_at_rest(chain, state)
    step_back_half(chain, state)


def lay_at_rest(chain: Chain, state: State) -> None:
    """The part of it that does not depend on how fast the ram falls."""
    if chain.gravity == 0.0:
        return
    cap = sum(link.link + 1 < chain.head for link in chain.train)
    cap_weight = float(state.rod.weight[chain.head - 1]) if cap else 0.0
    weight = state.rod.weight.copy()
    weight[: chain.head] = 0.0
    weight[chain.head] += cap_weight
    soil = _soil_of(chain, state)
    _refuse_unheld(chain, float(weight.sum()), soil)
    u = _static_displacements(chain, state, weight, soil)
    _lay_train(chain, state, u, cap_weight)
    motion = state.motion
    motion.u[:] = u
    motion.rest[:] = u
    # the gap is the distance to the wall at rest, before the blow
    state.bounds.wall[::2] += u[-1]
    s, r = state.shaft, soil.force_and_slope(u)[0]
    _press_joints(chain, state, weight - r - chain.spring * u)
    s.r[:] = np.minimum(np.maximum(s.par[1] * u[s.first : s.first + len(s.r)], -s.par[0]), s.par[0])
    s.power[:, 0] = np.clip(s.power[:, 2] * u[s.power_nodes], -s.power[:, 1], s.power[:, 1])
    q = s.radiation
    q[0] = np.clip(u[s.radiation_nodes], -q[1] / q[2], q[1] / q[2])
    _lay_toe(state.bounds, float(u[-1]), float(r[-1]))


def step_back_half(chain: Chain, state: State) -> None:
    """The other part: cushion and shaft live on half steps, and half a step before the blow what moves was not yet
    where it is at 0."""
    # a free fall has half a step to go before its first half-step velocity
    striking = state.motion.v[: chain.head]
    striking[striking != 0] -= chain.gravity * chain.dt / 2
    back = state.motion.v * chain.dt / 2
    if len(state.bounds.train_links):
        a = int(state.bounds.train_links[0])
        state.bounds.train_state[0, 0] -= back[a] - back[a + 1]
    step_ground_back(chain, state)


def step_ground_back(chain: Chain, state: State) -> None:
    """The ground's part of it: shaft and toe half a step before a member that moves already at time 0.

    What acts on half steps began to act at time 0, not before: the first step, which takes the mean of both, is given
    the difference as a force of its own (`Rod.opening`), for the ground and for springs.
    """
    back = state.motion.v * chain.dt / 2
    opening = -chain.spring * back / 2
    par, toe = state.bounds.toe_par, state.bounds.toe_state
    if len(par) and toe[3] > 0:
        before = toe[1]
        toe[1] = min(max(toe[1] - par[2] * float(back[-1]), 0.0), par[1])
        toe[4] = toe[1]
        if par[0] == RADIATION:
            toe[2] -= float(back[-1])
        opening[-1] -= (before - toe[1]) / 2
    s = state.shaft
    plain = slice(s.first, s.first + len(s.r))
    before = s.r.copy()
    s.r[:] = np.minimum(np.maximum(s.r - s.par[1] * back[plain], -s.par[0]), s.par[0])
    opening[plain] -= (before - s.r) / 2
    before = s.power[:, 0].copy()
    s.power[:, 0] = np.clip(
        s.power[:, 0] - s.power[:, 2] * back[s.power_nodes], -s.power[:, 1], s.power[:, 1]
    )
    np.subtract.at(opening, s.power_nodes, (before - s.power[:, 0]) / 2)
    s.radiation[0] -= back[s.radiation_nodes]
    np.subtract.at(opening, s.radiation_nodes, s.radiation[2] * back[s.radiation_nodes] / 2)
    if opening.any():
        state.rod = state.rod._replace(opening=opening)


def _refuse_unheld(chain: Chain, weight: float, soil: _Soil) -> None:
    kind = chain.case.far_end.kind
    if any(j.gap > 0 for j in chain.joints if j.link >= chain.head):
        raise SolveError(
            "With gravity on, a joint with a gap is not at rest before the blow: the part above it would fall through "
            "the gap. Set the gap to 0, or turn gravity off."
        )
    if kind in ("fixed", "spring") or (kind == "wall" and chain.wall_gap == 0) or (chain.spring > 0).any():
        return
    holding = float(soil.high.sum())
    if holding <= weight:
        what = f"can hold {holding / 1000:,.0f} kN" if holding else "is not there"
        raise SolveError(
            f"With gravity on, the member (with its cap {weight / 1000:,.0f} kN) does not come to rest "
            f"before the blow: its ground {what}. Give the ground more resistance, hold the far end, "
            "or turn gravity off."
        )


class _Hanging:
    """The balance under gravity: nodes that closed joints hold together move as one, a wall at the far end holds."""

    def __init__(self, chain: Chain, state: State, weight: Array, soil: _Soil) -> None:
        self.chain, self.rod, self.weight, self.soil = chain, state.rod, weight, soil
        head, n = chain.head, chain.nodes
        # the first node of each group that moves as one, and which group each node is of
        opened = np.ones(n - head, dtype=bool)
        opened[[j.link + 1 - head for j in chain.joints if j.link >= head]] = False
        self.first, self.group = opened.nonzero()[0], opened.cumsum() - 1
        self.held = chain.fixed_end or chain.wall_gap == 0
        self.still, self.force = np.zeros(n), np.zeros(n - 1)
        # trials may lie far beyond the balance, and leave no trace
        self.trial = state.rod._replace(state=state.rod.state.copy())

    def pull_at(self, u: Array) -> tuple[Array, Array]:
        """Force left over on each group (N), and the ground's slope at every node (N/m), at displacements `u`."""
        self.trial.state[:] = self.rod.state
        link_forces(self.trial, u, self.still, self.force, self.chain.dt)
        resist, slope = self.soil.force_and_slope(u)
        pull = self.weight - resist - self.chain.spring * u
        pull[:-1] += self.force
        pull[1:] -= self.force
        total = np.add.reduceat(pull[self.chain.head :], self.first)
        if self.held:
            total[-1] = 0.0
        return total, slope

    def tangent(self, slope: Array) -> tuple[Array, Array]:
        """Its diagonal and what stands beside it, N/m."""
        head, stiff = self.chain.head, self.rod.stiff
        between = stiff[head + self.first[1:] - 1]
        diagonal = np.add.reduceat((slope + self.chain.spring)[head:], self.first)
        diagonal[:-1] += between
        diagonal[1:] += between
        if self.held:
            diagonal[-1] += 1e6 * float(stiff.max())
        # a slope of nearly nothing keeps a wholly slipping trial solvable; the balance itself stays exact
        diagonal += 1e-12 * float(stiff.max())
        return diagonal, -between


def _static_displacements(chain: Chain, state: State, weight: Array, soil: _Soil) -> Array:
    """Newton's method on the nodes below the struck end. Raises `SolveError` where there is no balance."""
    at, u = _Hanging(chain, state, weight, soil), np.zeros(chain.nodes)
    total, slope = at.pull_at(u)
    for _ in range(200):
        change, singular = dptsv(*at.tangent(slope), total)[2:]
        if singular:
            break
        step = np.concatenate((at.still[: chain.head], change[at.group]))
        drive = float(total @ change)
        total, slope = at.pull_at(u + step)
        if float(total @ change) < -drive / 2:
            # far beyond the balance, as where ground that gives way meets ground that does not
            step *= _turning_share(at.pull_at, u, step, change)
            total, slope = at.pull_at(u + step)
        u += step
        if np.max(np.abs(change)) <= 1e-15 + 1e-13 * np.max(np.abs(u)):
            if link_forces(state.rod, u, at.still, at.force, chain.dt) >= 0:
                raise SolveError(
                    "With gravity on, the member leaves its elastic range under its own weight before the blow: give "
                    "its material a higher strength, its segments more area, or turn gravity off."
                )
            return u
    raise SolveError(
        "With gravity on, no rest of the member before the blow was found: its ground gives way under its weight. Give "
        "the ground more resistance, hold the far end, or turn gravity off."
    )


def _turning_share(
    pull_at: Callable[[Array], tuple[Array, Array]], u: Array, step: Array, change: Array
) -> float:
    """Share of a step, below 1, at which what drives it changes its sign; it only falls along the step."""
    low, high = 0.0, 1.0
    for _ in range(100):
        middle = (low + high) / 2
        drives = float(pull_at(u + middle * step)[0] @ change) > 0
        low, high = (middle, high) if drives else (low, middle)
    return high


def _lay_train(chain: Chain, state: State, u: Array, cap_weight: float) -> None:
    """Cap on its cushion, ram just touching: displacements and the cushion's state."""
    above = u[chain.head]
    if len(chain.train) == 2:
        state.bounds.train_force[1] = cap_weight
        if chain.train[1].cushion is None:
            state.bounds.train_state[1, 2] = cap_weight
        else:
            pressed = cap_weight / float(state.bounds.train_par[1, 0])
            state.bounds.train_state[1, :3] = pressed, pressed, cap_weight
            above += pressed
        u[chain.head - 1] = above
    u[: chain.head - (len(chain.train) == 2)] = above


def _press_joints(chain: Chain, state: State, pull: Array) -> None:
    """Forces in joints and on a wall at rest. `pull`: all forces on the nodes but those of the links, N.

    Raises `SolveError` where a joint would have to hold what hangs on it.
    """
    bounds, force = state.bounds, state.motion.force
    link_forces(state.rod, state.motion.u, np.zeros_like(state.motion.u), force, chain.dt)
    for j, joint in enumerate(chain.joints):
        if joint.link < chain.head:
            continue
        above = force[joint.link - 1] if joint.link > chain.head else 0.0
        pressed = float(pull[joint.link] - above)
        if pressed < -joint.strength - 1e-9 * max(1.0, float(np.abs(pull).sum())):
            raise SolveError(
                f"With gravity on, the joint at {joint.position:.4g} m would hang in tension before the blow, which it "
                "does not carry. Give the ground below it more resistance, bond the joint, or turn gravity off."
                if not joint.strength
                else f"With gravity on, the member would crack at {joint.position:.4g} m under its own weight: see its "
                "material's strength, or turn gravity off."
            )
        bounds.joint_force[j] = bounds.joint_bond[2, j] = max(pressed, -joint.strength)
    if chain.wall_gap == 0:
        bounds.wall[1] = max(float(pull[-1] - force[-1]), 0.0)


def _lay_toe(bounds: Bounds, u: float, resistance: float) -> None:
    if not len(bounds.toe_par):
        return
    par, toe = bounds.toe_par, bounds.toe_state
    spring = resistance / par[2] if par[2] > 0 else 0.0
    if u > toe[0]:
        toe[0] = u - spring
        toe[3] = 1.0
    if par[0] == RADIATION:
        toe[2] = spring
    toe[1] = toe[4] = resistance

"""Rest after the blow: the member alone in static balance with its ground as the blow left it, its ram gone.

Elastic springs with sliders, links and closed joints all resist the more the more they are moved, so the balance is the
only one; Newton's method finds it, with a part of a step that would lead far beyond it.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray
from scipy.linalg.lapack import dptsv

from solver.numerics.chain import Chain
from solver.numerics.equilibrium import State
from solver.numerics.laying import JointLink
from solver.numerics.links import link_forces
from solver.numerics.toe import RADIATION

Array = NDArray[np.float64]

#: Movement (m) of a last step at which the balance counts as found.
STILL = 1e-11
#: Stiffness of closed faces, of the stiffest link: they overlap by a thousandth of its elongation.
FACES = 1e3


def settle(chain: Chain, state: State) -> bool:
    """Move the member to its rest and bring ground, joints and materials up to date. Returns whether there is one."""
    if not _held(chain, state):
        return False
    rest = _Rest(chain, state)
    u = state.motion.u.copy()
    at = rest.unbalanced(u)
    for _ in range(200):
        change, singular = dptsv(*rest.tangent(at), at.out)[2:]
        if singular or not np.isfinite(change).all():
            return False
        if np.max(np.abs(change)) < STILL:
            rest.take(u, at)
            return True
        before = u
        u, at = rest.nearer(u, change, at)
        if np.max(np.abs(u - before)) > float(chain.position[-1]):
            return False
    return False


def _held(chain: Chain, state: State) -> bool:
    """Whether anything holds the member: a toe alone, without gravity, pushes it off and leaves it anywhere."""
    s = state.shaft
    sides = s.par[0].sum() + s.power[:, 1].sum() + s.radiation[1].sum() + chain.spring.sum()
    return bool(sides > 0 or chain.gravity > 0 or chain.fixed_end)


class _Springs(NamedTuple):
    """Springs with sliders on nodes: resistance `at` displacements `origin` (N), stiffness, and bounds either side."""

    node: NDArray[np.int64]
    origin: Array
    at: Array
    stiff: Array
    low: Array
    high: Array

    def resist(self, u: Array) -> tuple[Array, Array]:
        """Resistance (N) and slope (N/m) at displacements of all nodes."""
        trial = self.at + self.stiff * (u[self.node] - self.origin)
        held = np.minimum(np.maximum(trial, self.low), self.high)
        return held, np.where(held == trial, self.stiff, 0.0)


class _Balance(NamedTuple):
    """Force left over on every node and on every group of nodes that move as one (N), slopes (N/m) of nodes to ground
    and of links, resistance of every spring (N)."""

    nodes: Array
    out: Array
    grounded: Array
    links: Array
    resist: Array


class _Rest:
    """The balance of one state: forces on nodes at given displacements."""

    def __init__(self, chain: Chain, state: State) -> None:
        self.chain, self.state = chain, state
        self.weight = state.rod.weight.copy()
        if len(chain.train) == 2:
            self.weight[chain.head] += self.weight[chain.head - 1]
        self.weight[: chain.head] = 0.0
        self.groups = _springs_of(chain, state)
        self.springs = _Springs(*(np.concatenate(parts) for parts in zip(*self.groups, strict=True)))
        self.still = np.zeros(chain.nodes)
        self.faces = FACES * float(state.rod.stiff.max())
        self.joints = [(j, link) for j, link in enumerate(chain.joints) if link.link >= chain.head]
        # nodes that a bond holds together move as one; the first of each such group, and the group of every node
        self.bonds = [j for j, _ in self.joints if state.bounds.joint_bond[0, j] > 0]
        begins = np.ones(chain.nodes - chain.head, dtype=bool)
        begins[[chain.joints[j].link + 1 - chain.head for j in self.bonds]] = False
        self.first, self.group = np.flatnonzero(begins), np.cumsum(begins) - 1

    def unbalanced(self, u: Array) -> _Balance:
        """The balance at displacements `u`."""
        chain, rod = self.chain, self.state.rod._replace(state=self.state.rod.state.copy())
        force = np.zeros_like(self.state.motion.force)
        link_forces(rod, u, self.still, force, chain.dt)
        grounded, links = chain.spring.copy(), rod.stiff.copy()
        for j, joint in self.joints:
            over = self.over(u, j, joint)
            force[joint.link] = self.faces * over
            links[joint.link] = self.faces if over != 0.0 else 0.0
        out = self.weight - chain.spring * u
        out[:-1] += force
        out[1:] -= force
        resist, slope = self.springs.resist(u)
        np.subtract.at(out, self.springs.node, resist)
        np.add.at(grounded, self.springs.node, slope)
        if chain.wall_gap < np.inf:
            over = max(u[-1] - self.state.bounds.wall[0], 0.0)
            out[-1] -= self.faces * over
            grounded[-1] += self.faces if over > 0 else 0.0
        if chain.fixed_end:
            out[-1] = 0.0
            grounded[-1] += self.faces
        return _Balance(out, self.grouped(out), grounded, links, resist)

    def grouped(self, nodes: Array) -> Array:
        """Sums over the nodes of each group."""
        return (
            np.add.reduceat(nodes[self.chain.head :], self.first)
            if self.bonds
            else nodes[self.chain.head :].copy()
        )

    def over(self, u: Array, j: int, joint: JointLink) -> float:
        """How far joint number `j` is pressed together (below 0) or pulled beyond its slack, m."""
        gap = float(u[joint.link + 1] - u[joint.link]) + joint.gap
        if self.state.bounds.joint_bond[0, j] > 0:
            return 0.0
        return min(gap, 0.0) + max(gap - joint.slack, 0.0)

    def tangent(self, at: _Balance) -> tuple[Array, Array]:
        """Its diagonal and what stands beside it, with next to nothing added so that a wholly slipping trial can be
        solved."""
        head = self.chain.head
        links = at.links[head + self.first[1:] - 1] if self.bonds else at.links[head:]
        diagonal = self.grouped(at.grounded)
        diagonal += 1e-9 * float(self.state.rod.stiff.max()) / len(diagonal)
        diagonal[:-1] += links
        diagonal[1:] += links
        return diagonal, -links

    def nearer(self, u: Array, change: Array, at: _Balance) -> tuple[Array, _Balance]:
        """The whole step; or, where it goes far beyond the balance, the part at whose end nothing drives it on."""
        step = np.concatenate((self.still[: self.chain.head], change[self.group]))
        drive, low, middle, high = float(at.out @ change), 0.0, 1.0, 1.0
        at = self.unbalanced(u + step)
        if float(at.out @ change) >= -drive / 2:
            return u + step, at
        for _ in range(60):
            middle = (low + high) / 2
            at = self.unbalanced(u + middle * step)
            ahead = float(at.out @ change)
            if abs(ahead) <= drive / 2:
                break
            low, high = (middle, high) if ahead > 0 else (low, middle)
        return u + middle * step, at

    def take(self, u: Array, at: _Balance) -> None:
        """Write the rest, whose balance is `at`, into the state: displacements, materials, ground, joints."""
        chain, state = self.chain, self.state
        link_forces(state.rod, u, self.still, state.motion.force, chain.dt)
        state.motion.u[:] = u
        s, bounds = state.shaft, state.bounds
        ends = np.cumsum([len(spring.node) for spring in self.groups])
        plain, power, radiation, toe = np.split(at.resist, ends[:3])
        s.r[:] = plain
        s.power[:, 0] = power
        s.radiation[0] = np.divide(
            radiation, s.radiation[2], out=np.zeros_like(radiation), where=s.radiation[2] > 0
        )
        if len(bounds.toe_par):
            _take_toe(bounds.toe_par, bounds.toe_state, float(u[-1]), float(toe[0]))
        for j, joint in self.joints:
            bounds.joint_force[j] = -self.faces * self.over(u, j, joint)
        for j in self.bonds:
            bounds.joint_force[j] = bounds.joint_bond[2, j] = at.nodes[chain.joints[j].link]


def _springs_of(chain: Chain, state: State) -> list[_Springs]:
    """Shaft by its three kinds of law, then the toe; resistance lives half a step back, so it is carried on."""
    s, u, ahead = state.shaft, state.motion.u, state.motion.v * chain.dt / 2
    plain = np.arange(s.first, s.first + len(s.r))
    found = []
    for node, r, stiff, strength in (
        (plain, s.r, s.par[1], s.par[0]),
        (s.power_nodes, s.power[:, 0], s.power[:, 2], s.power[:, 1]),
        (s.radiation_nodes, s.radiation[0] * s.radiation[2], s.radiation[2], s.radiation[1]),
    ):
        now = np.minimum(np.maximum(r + stiff * ahead[node], -strength), strength)
        found.append(_Springs(node, u[node], now, stiff, -strength, strength))
    par, toe = state.bounds.toe_par, state.bounds.toe_state
    if len(par):
        last = np.array([chain.nodes - 1])
        found.append(_Springs(last, np.array([toe[0]]), np.zeros(1), par[2:3], np.zeros(1), par[1:2]))
    return found


def _take_toe(par: Array, toe: Array, u: float, resistance: float) -> None:
    """The toe at rest: what it slipped, and what presses it."""
    spring = resistance / par[2] if par[2] > 0 else 0.0
    if resistance >= par[1] > 0:
        toe[0] = u - spring
    toe[1] = toe[4] = resistance
    toe[3] = 1.0 if resistance > 0 else 0.0
    if par[0] == RADIATION:
        toe[2] = spring

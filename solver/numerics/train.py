"""Ram, cap and struck end: solved together, one or two forces a step, by trying each branch of their laws.

A cushion acts with the mean of its law at the half steps before and after; faces that touch without a cushion
exchange the force that closes their gap, never tension. Every branch is linear, so a step is one or two linear
equations.
"""

import numpy as np

from solver.numerics.compiled import kernel

OPEN, LOADING, UNLOADING, CLOSED = 0, 1, 2, 3


@kernel
def cushion_force(d, k, unloading, largest, restitution):
    """Force of a cushion compressed by `d` whose largest compression so far is `largest` (E. A. L. Smith 1960).

    Loads along k d, unloads along k/e^2 to a residual compression (1 - e^2) `largest`, reloads on that line.
    """
    residual = largest * (1.0 - restitution * restitution)
    return max(min(k * d, unloading * (d - residual)), 0.0)


@kernel
def branch(which, par, state, gap, dt):
    """Coefficients (alpha, beta, gamma) of alpha F + beta rel = gamma, `rel` the closing velocity of the coming
    half step.

    `par`: k, k/e^2, e; `state`: compression at the last half step, largest so far, force then, closing velocity then.
    """
    if which == CLOSED:
        return 0.0, 1.0, gap / dt
    if which == OPEN:
        return 1.0, 0.0, 0.5 * state[2]
    k, start = par[0], 0.0
    if which == UNLOADING:
        k, start = par[1], state[1] * (1.0 - par[2] * par[2])
    ahead = state[0] + 0.5 * dt * state[3] - start
    return 1.0, -0.25 * k * dt, 0.5 * state[2] + 0.5 * k * ahead


@kernel
def misfit(which, force, rel, kind, par, state, gap, dt):
    """How far a solution of a branch is from the law, N: 0 where it holds, endlessly far where faces overlap."""
    if kind == 0:
        if which == CLOSED:
            return max(0.5 * state[2] - force, 0.0)
        return 1e300 if dt * rel > gap else 0.0
    new = cushion_force(state[0] + 0.5 * dt * (state[3] + rel), par[0], par[1], state[1], par[2])
    return abs(force - 0.5 * (state[2] + new))


@kernel
def choices(kind):
    return (OPEN, CLOSED, CLOSED) if kind == 0 else (LOADING, UNLOADING, OPEN)


@kernel
def solve_one(rel, yielding, kind, par, state, gap, dt):
    """Force between two bodies; `rel` = closing velocity without it, `yielding` = sum of their dt/m."""
    best, least = 0.0, np.inf
    for which in choices(kind):
        a, b, c = branch(which, par, state, gap, dt)
        force = (c - b * rel) / (a - b * yielding)
        wrong = misfit(which, force, rel - yielding * force, kind, par, state, gap, dt)
        if wrong < least:
            best, least = force, wrong
    return best


@kernel
def solve_two(rel1, rel2, p0, p1, p2, kinds, pars, states, gaps, dt):
    """Forces between ram and cap, and cap and struck end. `p` = dt/m of the three bodies."""
    best1, best2, least = 0.0, 0.0, np.inf
    for first in choices(kinds[0]):
        a1, b1, c1 = branch(first, pars[0], states[0], gaps[0], dt)
        for second in choices(kinds[1]):
            a2, b2, c2 = branch(second, pars[1], states[1], gaps[1], dt)
            m11, m12 = a1 - b1 * (p0 + p1), b1 * p1
            m21, m22 = b2 * p1, a2 - b2 * (p1 + p2)
            r1, r2 = c1 - b1 * rel1, c2 - b2 * rel2
            det = m11 * m22 - m12 * m21
            if det == 0.0:
                continue
            f1 = (r1 * m22 - m12 * r2) / det
            f2 = (m11 * r2 - r1 * m21) / det
            new1 = rel1 - (p0 + p1) * f1 + p1 * f2
            new2 = rel2 + p1 * f1 - (p1 + p2) * f2
            wrong = misfit(first, f1, new1, kinds[0], pars[0], states[0], gaps[0], dt)
            wrong += misfit(second, f2, new2, kinds[1], pars[1], states[1], gaps[1], dt)
            if wrong < least:
                best1, best2, least = f1, f2, wrong
            if least < 1e-9 * (abs(f1) + abs(f2)):
                return best1, best2
    return best1, best2


@kernel
def advance(links, kinds, pars, states, forces, u, v, w, push, dt):
    """One step of the train: corrects the new velocities `w` in place and returns the energy lost in impacts, J.

    `links[t]` is the node above link t, the node below is the next one. `forces` gets the force of each link, N.
    """
    count = len(links)
    a = links[0]
    rel1 = w[a] - w[a + 1]
    for t in range(count):
        states[t, 3] = v[a + t] - v[a + t + 1]
    gaps = (u[a + 1] - u[a], u[a + 2] - u[a + 1] if count == 2 else 0.0)
    if count == 1:
        forces[0] = solve_one(rel1, push[a] + push[a + 1], kinds[0], pars[0], states[0], gaps[0], dt)
    else:
        rel2 = w[a + 1] - w[a + 2]
        forces[0], forces[1] = solve_two(
            rel1, rel2, push[a], push[a + 1], push[a + 2], kinds, pars, states, gaps, dt
        )
    lost = 0.0
    for t in range(count):
        a = links[t]
        w[a] -= push[a] * forces[t]
        w[a + 1] += push[a + 1] * forces[t]
    for t in range(count):
        a = links[t]
        rel = w[a] - w[a + 1]
        if kinds[t] == 0:
            lost += 0.5 * dt * forces[t] * (states[t, 3] + rel)
            # the force of the coming half step, as in the joints
            states[t, 2] = max(2.0 * forces[t] - states[t, 2], 0.0)
        else:
            states[t, 0] += 0.5 * dt * (states[t, 3] + rel)
            states[t, 2] = cushion_force(states[t, 0], pars[t, 0], pars[t, 1], states[t, 1], pars[t, 2])
            states[t, 1] = max(states[t, 1], states[t, 0])
    return lost

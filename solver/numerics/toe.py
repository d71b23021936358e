"""Resistance under the toe: compression only; lost and found again where it was left.

`state`: [0] plastic displacement D' at which contact begins (m; the gap to begin with), [1] static resistance at
the last half step (N), [2] soil displacement of the radiation model at the last half step (m), [3] 1 while in
contact, [4] whole resistance of the last half step, damping with it (N).
`par`: [0] law (0 Smith, 1 viscous, 2 power, 3 radiation), [1] strength Ru (N), [2] stiffness (N/m), [3] damping (J
in s/m; for radiation the dashpot in N·s/m), [4] exponent. Law numbers are internal; a file knows them by their words.
"""

import numpy as np

from solver.numerics.compiled import kernel
from solver.numerics.power_root import power_speed

SMITH, VISCOUS, POWER, RADIATION = 0, 1, 2, 3


@kernel
def quasi_static(par, state, free, push, u, v, dt):
    """Smith's spring and slider (1960, from memory) with a damping law, as one law of the half step, never a pull.

    `free`: velocity of the coming half step without the toe, `push` = dt/m, `u` and `v`: displacement now and velocity
    of the last half step. The mean of the law at both half steps acts; `state[4]` keeps its last value. Returns the new
    velocity, the energies lost by slip and by damping, and what a change of contact within the step exchanges, J.
    """
    top, k, plastic, old, before = par[1], par[2], state[0], state[1], state[4]
    half = 0.5 * push
    goal = free - half * before
    start, slope = k * (u - plastic), 0.5 * k * dt
    w, new, acts = goal, 0.0, 0.0
    if start + slope * goal > 0.0:
        w, new, acts = _in_contact(par, goal, half, start, slope)
    slipped = u + 0.5 * dt * w - new / k - plastic if k > 0.0 and new >= top else 0.0
    if slipped > 0.0:
        state[0] = plastic + slipped
    state[1], state[4] = new, acts
    state[3] = 1.0 if acts > 0.0 else 0.0
    damped = 0.25 * dt * ((before - old) + (acts - new)) * (v + w)
    return w, top * max(slipped, 0.0), max(damped, 0.0), min(damped, 0.0)


@kernel
def _in_contact(par, goal, half, start, slope):
    """Velocity, static and whole resistance of a half step on which the toe touches: elastic branch, else yielding."""
    law, top = par[0], par[1]
    j = par[3] if law == SMITH else 0.0
    c = par[3] * top if law == VISCOUS else 0.0
    b = par[3] * top if law == POWER else 0.0
    # w + half (start + slope w)(1 + j w) + half (c w + b |w|^N) = goal
    linear = 1.0 + half * (slope + j * start + c)
    if j > 0.0 and slope > 0.0:
        square = half * j * slope
        rest = goal - half * start
        w = 2.0 * rest / (linear + np.sqrt(max(linear * linear + 4.0 * square * rest, 0.0)))
    else:
        w = _speed(linear, half * b, par[4], goal - half * start)
    new = start + slope * w
    if new > top:
        new = top
        w = _speed(1.0 + half * (j * top + c), half * b, par[4], goal - half * top)
    acts = new * (1.0 + j * w) + c * w
    if b > 0.0:
        acts += b * abs(w) ** par[4] * (1.0 if w > 0.0 else -1.0)
    if new <= 0.0 or acts <= 0.0:
        # it parts on this half step: nothing pulls it back
        return goal, max(min(start + slope * goal, top), 0.0), 0.0
    return w, new, acts


@kernel
def _speed(a, b, exponent, rest):
    return power_speed(a, b, exponent, rest) if b > 0.0 else rest / a


@kernel
def radiating(par, state, free, push, u, v, dt):
    """Spring and dashpot of a half-space (Lysmer and Richart 1966, from memory) with a slider of strength Ru, no
    tension; a law of the half step, taken and returned as `quasi_static` does.

    The soil goes with the toe that touches it; under a toe that slips it bears Ru, under none it comes back free.
    """
    top, k, c, s, plastic, before = par[1], par[2], par[3], state[2], state[0], state[4]
    half = 0.5 * push
    goal = free - half * before
    w, acts, slip = goal, 0.0, 0.0
    moved = -k * s / (0.5 * k + c / dt)
    if u + 0.5 * dt * goal - plastic > s + moved:
        w = (goal - half * k * (u - plastic)) / (1.0 + half * (0.5 * k * dt + c))
        there = u + 0.5 * dt * w - plastic
        acts, moved = k * there + c * w, there - s
        if acts > top:
            acts, w = top, goal - half * top
            moved = (top - k * s) / (0.5 * k + c / dt)
            slip = max(u + 0.5 * dt * w - plastic - s - moved, 0.0)
            state[0] = plastic + slip
        elif acts <= 0.0:
            acts, w = 0.0, goal
            moved = -k * s / (0.5 * k + c / dt)
    state[2], state[1], state[4] = s + moved, acts, acts
    state[3] = 1.0 if acts > 0.0 else 0.0
    damped = c * moved * moved / dt
    work = 0.25 * dt * (before + acts) * (v + w)
    exchanged = work - top * slip - damped - k * (s + 0.5 * moved) * moved
    return w, top * slip, damped, exchanged

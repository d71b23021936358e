"""Resistance under the toe: compression only; lost and found again where it was left.

`state`: [0] plastic displacement D' at which contact begins (m; the gap to begin with), [1] static resistance at
the last half step (N), [2] soil displacement of the radiation model at the last half step (m), [3] 1 while in
contact.
`par`: [0] law (0 Smith, 1 viscous, 2 power, 3 radiation), [1] strength Ru (N), [2] stiffness (N/m), [3] damping (J
in s/m; for radiation the dashpot in N·s/m), [4] exponent. Law numbers are internal; a file knows them by their words.
"""

from solver.numerics.compiled import kernel
from solver.numerics.shaft import power_speed

SMITH, VISCOUS, POWER, RADIATION = 0, 1, 2, 3


@kernel
def quasi_static(par, state, free, half, u, v, dt):
    """Smith's spring and slider (1960, from memory) with a damping law: new mean velocity, energies lost by slip
    and damping.

    `free`: mean velocity without the toe, `half` = dt/(2 m), `u` and `v`: displacement now, velocity of the last
    half step.
    """
    top, k, old, plastic = par[1], par[2], state[1], state[0]
    before = u - 0.5 * dt * v
    now = min(max(k * (u - plastic), 0.0), top)
    touching = u >= plastic
    law = par[0]
    factor = par[3] * top if touching else 0.0
    c = par[3] * now if law == SMITH else (factor if law == VISCOUS else 0.0)
    b = half * factor if law == POWER else 0.0
    # branches of the static law at the coming half step: elastic, yielding, lifted
    base = 0.5 * (old + k * (before - plastic))
    mean = _speed(1.0 + half * (0.5 * k * dt + c), b, par[4], free - half * base)
    new = k * (before + dt * mean - plastic)
    if new > top or new < 0.0:
        new = top if new > top else 0.0
        mean = _speed(1.0 + half * c, b, par[4], free - half * 0.5 * (old + new))
    damped = c * mean * mean + (factor * abs(mean) ** (par[4] + 1.0) if law == POWER else 0.0)
    slipped = before + dt * mean - new / k - plastic if k > 0.0 and new >= top else 0.0
    if slipped > 0.0:
        state[0] = plastic + slipped
    state[1] = new
    state[3] = 1.0 if new > 0.0 or touching else 0.0
    return mean, top * max(slipped, 0.0), damped * dt


@kernel
def _speed(a, b, exponent, rest):
    return power_speed(a, b, exponent, rest) if b > 0.0 else rest / a


@kernel
def radiating(par, state, free, half, u, v, dt):
    """Spring and dashpot of a half-space (Lysmer and Richart 1966, from memory), a slider of strength Ru, no
    tension."""
    top, k, c, s, plastic = par[1], par[2], par[3], state[2], state[0]
    before = u - 0.5 * dt * v
    gap = before - plastic - s
    lifted = gap < -1e-12
    mean = free
    if not lifted:
        mean = (free - half * k * s) / (1.0 + half * (0.5 * k * dt + c))
    resist = k * (s + 0.5 * dt * mean) + c * mean if not lifted else 0.0
    slip = 0.0
    if lifted or resist < 0.0:
        resist = 0.0
        mean = free
        moved = -k * s / (0.5 * k + c / dt)
        if before + dt * mean - plastic > s + moved:
            # the toe has caught up with the soil within this step: it lies on it at its end
            moved = before + dt * mean - plastic - s
    elif resist > top:
        resist = top
        mean = free - half * top
        moved = (top - k * s) / (0.5 * k + c / dt)
        slip = dt * mean - moved
        state[0] = plastic + slip
    else:
        moved = dt * mean
    state[2] = s + moved
    state[1] = resist
    state[3] = 1.0 if resist > 0.0 else 0.0
    return mean, top * slip, c * moved * moved / dt

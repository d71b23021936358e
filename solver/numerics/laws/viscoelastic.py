"""Kelvin-Voigt: N = (EA/L) d + (eta A/L) d', with d' of the last half step. `par[0]` is eta A/L in N·s/m.

`state[0]` sums the energy that the dashpot has taken, per link (J); it has no other state to be read from.
`state[1]` is its force of the step before (N), `state[2]` what it gives back where the rate turns within a step (J).
"""

from solver.numerics.compiled import kernel


@kernel
def force(u, v, stiff, par, state, force, start, stop, dt):
    for i in range(start, stop):
        rate = v[i + 1] - v[i]
        viscous = par[0, i] * rate
        # the mean of both forces acts over the half step between them
        taken = 0.5 * (state[1, i] + viscous) * rate * dt
        state[0, i] += max(taken, 0.0)
        state[2, i] += min(taken, 0.0)
        state[1, i] = viscous
        force[i] = stiff[i] * (u[i + 1] - u[i]) + viscous
    return -1


@kernel
def stored_and_lost(u, v, stiff, par, state, force, start, stop, dt):
    stored = 0.0
    lost = 0.0
    for i in range(start, stop):
        d = u[i + 1] - u[i]
        stored += 0.5 * stiff[i] * d * d + state[2, i]
        lost += state[0, i]
    return stored, lost

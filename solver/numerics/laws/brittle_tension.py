"""Brittle in tension: elastic to the strength, then a crack that carries compression only.

The opening of a crack lives on half steps, found at the elongation carried on by half a step, and acts with the mean of
before and after, as yielding does: a crack puts nothing into the wave of two elements' length.

`par[0]` tensile strength as a force (N). `state[0]` opening of the coming half step (m), `state[1]` largest opening (m,
more than 0 where the element has cracked), `state[2]` the energy that the crack set free (J), `state[3]` what its
closing and opening owe to the balance (J). The last two are the work of cracked elements beyond what they store.
"""

from solver.numerics.compiled import kernel


@kernel
def force(u, v, stiff, par, state, force, start, stop, dt):
    first = -1
    for i in range(start, stop):
        d = u[i + 1] - u[i]
        change = dt * (v[i + 1] - v[i])
        n = stiff[i] * d
        cracked = state[1, i] > 0.0
        if not cracked and n >= par[0, i]:
            cracked = True
            if first < 0:
                first = i
        if cracked:
            opening = max(d + 0.5 * change, 0.0)
            n = stiff[i] * (d - 0.5 * (state[0, i] + opening))
            before = force[i]
            beyond = 0.5 * (before + n) * change - 0.5 * (n * n - before * before) / stiff[i]
            state[0, i] = opening
            state[1, i] = max(state[1, i], d, opening)
            state[2, i] += max(beyond, 0.0)
            state[3, i] += min(beyond, 0.0)
        force[i] = n
    return first


@kernel
def stored_and_lost(u, v, stiff, par, state, force, start, stop, dt):
    stored = 0.0
    lost = 0.0
    for i in range(start, stop):
        stored += 0.5 * force[i] * force[i] / stiff[i] + state[3, i]
        lost += state[2, i]
    return stored, lost

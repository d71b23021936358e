"""Brittle in tension: elastic to the strength, then a crack that carries compression only.

`par[0]` tensile strength as a force (N). `state[0]` 1 once cracked, `state[1]` largest opening (m), `state[2]` the
energy that the crack set free (J), `state[3]` what its closing and opening within a step owe to the balance (J).
"""

from solver.numerics.compiled import kernel


@kernel
def force(u, v, stiff, par, state, force, start, stop, dt):
    first = -1
    for i in range(start, stop):
        d = u[i + 1] - u[i]
        n = stiff[i] * d
        if state[0, i] > 0.0:
            before = d - dt * (v[i + 1] - v[i])
            if before * d < 0.0:
                # met or parted within the step, where the force acts as if it were linear over it
                state[3, i] += 0.5 * stiff[i] * before * d * (1.0 if d > 0.0 else -1.0)
            if d > 0.0:
                state[1, i] = max(state[1, i], d)
                n = 0.0
        elif n >= par[0, i]:
            state[0, i] = 1.0
            state[1, i] = d
            # work up to the step before, plus the half step on which the force still acted
            released = 0.5 * stiff[i] * (d - dt * (v[i + 1] - v[i])) * d
            state[2, i] = max(released, 0.0)
            state[3, i] = min(released, 0.0)
            n = 0.0
            if first < 0:
                first = i
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

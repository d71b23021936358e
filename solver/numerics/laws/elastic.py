"""Linear elastic: N = (EA/L) (u2 - u1). Hooke's law."""

from solver.numerics.compiled import kernel


@kernel
def force(u, v, stiff, par, state, force, start, stop, dt):
    for i in range(start, stop):
        force[i] = stiff[i] * (u[i + 1] - u[i])
    return -1


@kernel
def stored_and_lost(u, v, stiff, par, state, force, start, stop, dt):
    stored = 0.0
    for i in range(start, stop):
        d = u[i + 1] - u[i]
        stored += 0.5 * stiff[i] * d * d
    return stored, 0.0

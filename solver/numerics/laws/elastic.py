"""Linear elastic: N = (EA/L) (u2 - u1). Hooke's law."""

from solver.numerics.compiled import apart, kernel


@apart
def force(u, v, stiff, par, state, force, start, stop, dt):
    # slices let the compiler see that no index can wrap around, and so use vector instructions
    near, far, k, out = u[start:stop], u[start + 1 : stop + 1], stiff[start:stop], force[start:stop]
    for i in range(len(out)):
        out[i] = k[i] * (far[i] - near[i])
    return -1


@kernel
def stored_and_lost(u, v, stiff, par, state, force, start, stop, dt):
    stored = 0.0
    for i in range(start, stop):
        d = u[i + 1] - u[i]
        stored += 0.5 * stiff[i] * d * d
    return stored, 0.0

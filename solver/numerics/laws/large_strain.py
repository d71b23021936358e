"""Incompressible neo-Hookean rod: P = G (s - 1/s^2), s = 1 + d/L (textbook; Ogden 1984, from memory).

`par[0]` is G A (N), `par[1]` the element's length (m). The stretch is watched by the run.
"""

from solver.numerics.compiled import kernel


@kernel
def force(u, v, stiff, par, state, force, start, stop, dt):
    for i in range(start, stop):
        s = 1.0 + (u[i + 1] - u[i]) / par[1, i]
        force[i] = par[0, i] * (s - 1.0 / (s * s))
    return -1


@kernel
def stored_and_lost(u, v, stiff, par, state, force, start, stop, dt):
    stored = 0.0
    for i in range(start, stop):
        s = 1.0 + (u[i + 1] - u[i]) / par[1, i]
        stored += par[0, i] * par[1, i] * (0.5 * s * s + 1.0 / s - 1.5)
    return stored, 0.0

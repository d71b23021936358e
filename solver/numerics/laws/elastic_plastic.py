"""Bilinear elastic-plastic rod, isotropic or kinematic hardening; return mapping in one dimension (Simo and Hughes
1998, *Computational Inelasticity*, ch. 1, from memory).

Plastic elongation lives on half steps, found at the elongation carried on by half a step, and acts with the mean of
before and after. So yielding puts nothing into the wave of two steps' length, which would grow at Courant number 1.
Where slip sets in at once, that mean exceeds the yield limit for one step.

`par[0]` yield force (N), `par[1]` plastic modulus H' = E Et/(E - Et) as a stiffness H'A/L (N/m), `par[2]` 1 for
kinematic hardening and 0 for isotropic. `state[0]` plastic elongation of the coming half step (m), `state[1]` its
accumulated magnitude (m); `state[2]` and `state[3]` the same at the time of the force.
"""

from solver.numerics.compiled import kernel


@kernel
def force(u, v, stiff, par, state, force, start, stop, dt):
    first = -1
    for i in range(start, stop):
        hard = par[1, i]
        plastic = state[0, i]
        reached = state[1, i]
        back = par[2, i] * hard * plastic
        reach = par[0, i] + (1.0 - par[2, i]) * hard * reached
        now = u[i + 1] - u[i]
        trial = stiff[i] * (now - plastic)
        slip = 0.0
        sign = 1.0
        if abs(trial - back) > reach * (1.0 + 1e-9):
            sign = 1.0 if trial > back else -1.0
            ahead = trial + 0.5 * stiff[i] * dt * (v[i + 1] - v[i])
            slip = max(sign * (ahead - back) - reach, 0.0) / (stiff[i] + hard)
            if first < 0:
                first = i
        state[0, i] = plastic + sign * slip
        state[1, i] = reached + slip
        state[2, i] = plastic + 0.5 * sign * slip
        state[3, i] = reached + 0.5 * slip
        force[i] = stiff[i] * (now - state[2, i])
    return first


@kernel
def stored_and_lost(u, v, stiff, par, state, force, start, stop, dt):
    stored = 0.0
    lost = 0.0
    for i in range(start, stop):
        # what kinematic hardening holds comes back on the way back, what isotropic hardening took does not
        held = 0.5 * par[1, i] * par[2, i] * state[2, i] ** 2
        stored += 0.5 * force[i] * force[i] / stiff[i] + held
        lost += par[0, i] * state[3, i] + 0.5 * par[1, i] * (1.0 - par[2, i]) * state[3, i] ** 2
    return stored, lost

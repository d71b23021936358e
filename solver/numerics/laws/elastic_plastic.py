"""Bilinear elastic-plastic rod, isotropic or kinematic hardening; return mapping in one dimension (Simo and Hughes
1998, *Computational Inelasticity*, ch. 1, from memory).

`par[0]` yield force (N), `par[1]` plastic modulus H' = E Et/(E - Et) as a stiffness H'A/L (N/m), `par[2]` 1 for
kinematic hardening and 0 for isotropic. `state[0]` plastic elongation (m), `state[1]` its accumulated magnitude (m).
"""

from solver.numerics.compiled import kernel


@kernel
def force(u, v, stiff, par, state, force, start, stop, dt):
    first = -1
    for i in range(start, stop):
        hard = par[1, i]
        plastic = state[0, i]
        back = par[2, i] * hard * plastic
        reach = par[0, i] + (1.0 - par[2, i]) * hard * state[1, i]
        trial = stiff[i] * (u[i + 1] - u[i] - plastic)
        over = abs(trial - back) - reach
        if over > 0.0:
            slip = over / (stiff[i] + hard)
            sign = 1.0 if trial > back else -1.0
            state[0, i] = plastic + sign * slip
            state[1, i] += slip
            trial -= sign * stiff[i] * slip
            if first < 0:
                first = i
        force[i] = trial
    return first


@kernel
def stored_and_lost(u, v, stiff, par, state, force, start, stop, dt):
    stored = 0.0
    lost = 0.0
    for i in range(start, stop):
        stored += 0.5 * force[i] * force[i] / stiff[i]
        path = par[2, i] * state[0, i] ** 2 + (1.0 - par[2, i]) * state[1, i] ** 2
        lost += par[0, i] * state[1, i] + 0.5 * par[1, i] * path
    return stored, lost

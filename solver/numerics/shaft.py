"""Resistance along the shaft, node by node, solved together with the node's new velocity.

The static part lives on half steps: R of the middle of one step and of the next, and their mean acts in between. With
w the mean of the two half-step velocities, `p` = dt/m and R clamped to its strength, each node is one linear
equation per branch, so that the step is bounded by the rod alone and a linear spring keeps its energy.
"""

from solver.numerics.compiled import apart, kernel
from solver.numerics.power_root import speed_by_pieces


@kernel
def plain(first, v, w, push, r, par, dt):
    """Smith's and the linear viscous law on the nodes from `first` on.

    `r` is the static resistance at the last half step (N, shape (n,), changed in place); rows of `par`, shape (5, n):
    strength (N), stiffness (N/m), its inverse (0 where there is none), J of Smith's law (s/m), J Ru of the viscous
    (N·s/m). Static: E. A. L. Smith 1960; damping J |R| v, so that it takes energy both ways (sources from memory).
    Returns the energies lost by slip and by damping in this step, J.
    """
    n = len(r)
    # slices and one table of parameters: few enough arrays, and no index can wrap, so the loop runs in vector
    # instructions
    old_v, new_v, p = v[first : first + n], w[first : first + n], push[first : first + n]
    strength, stiff, flexible, smith, viscous = par[0], par[1], par[2], par[3], par[4]
    slip_loss = 0.0
    damping_loss = 0.0
    for j in range(n):
        half = 0.5 * p[j]
        old = r[j]
        top = strength[j]
        k = stiff[j] * dt
        free = 0.5 * (old_v[j] + new_v[j])
        now = old + 0.5 * k * old_v[j]
        now = top if now > top else (-top if now < -top else now)
        c = smith[j] * abs(now) + viscous[j]
        new = old + k * (free - half * old) / (1.0 + half * (0.5 * k + c))
        new = top if new > top else (-top if new < -top else new)
        mean = (free - half * 0.5 * (old + new)) / (1.0 + half * c)
        new_v[j] = 2.0 * mean - old_v[j]
        r[j] = new
        slip_loss += top * abs(dt * mean - (new - old) * flexible[j])
        damping_loss += c * mean * mean
    return slip_loss, damping_loss * dt


@kernel
def ready_power(nodes, v, push, table, dt, first):
    """What the power law keeps of each node: scales of its root, with and without its spring, and before the first step
    the damping at the velocities of now. `table`: see `Shaft`."""
    for j in range(len(nodes)):
        i = nodes[j]
        half, b, n = 0.5 * push[i], table[j, 4], table[j, 5]
        linear = 1.0 + 0.5 * half * table[j, 2] * dt
        table[j, 9], table[j, 10] = 1.0 / linear, 1.0 / half
        if b > 0.0 and n < 1.0:
            table[j, 7] = (linear / (half * b)) ** (1.0 / (1.0 - n)) / linear
            table[j, 8] = (1.0 / (half * b)) ** (1.0 / (1.0 - n))
        if first == 0:
            table[j, 6] = b * abs(v[i]) ** n * (1.0 if v[i] > 0.0 else -1.0) if v[i] != 0.0 else 0.0


@apart
def power(nodes, kept_at, pieces, v, w, push, table, dt):
    """Power law Rd = J Ru |v|^N sign(v) (Gibson and Coyle 1968, from memory). `table`, `kept_at`, `pieces`: see
    `Shaft`.

    The damping too acts with the mean of its values at both half steps; its new value is what the balance of the half
    step leaves for it. Returns the energies lost by slip and damping, and what the damping exchanges where the motion
    turns within a step, J.
    """
    slip_loss = 0.0
    damping_loss = 0.0
    exchanged = 0.0
    for j in range(len(nodes)):
        i, node = nodes[j], table[j]
        half, k = 0.5 * push[i], node[2] * dt
        old, top, before, speed = node[0], node[1], node[6], v[i]
        b, linear = half * node[4], 1.0 + 0.5 * half * k
        goal = w[i] - half * (old + before)
        left = goal - half * (old + 0.5 * k * speed)
        new_w = speed_by_pieces(linear, node[9], b, node[5], left, node[7], pieces, kept_at[j])
        new = old + 0.5 * k * (speed + new_w)
        if abs(new) > top:
            new = top if new > 0.0 else -top
            linear, left = 1.0, goal - half * new
            new_w = speed_by_pieces(1.0, 1.0, b, node[5], left, node[8], pieces, kept_at[j])
        after = (left - linear * new_w) * node[10]
        moved = 0.5 * dt * (speed + new_w)
        damped = 0.5 * (before + after) * moved
        damping_loss += max(damped, 0.0)
        exchanged += min(damped, 0.0)
        slip_loss += top * abs(moved - (new - old) * node[3])
        w[i] = new_w
        node[0], node[6] = new, after
    return slip_loss, damping_loss, exchanged


@kernel
def radiation(nodes, v, w, push, s, strength, stiff, dashpot, dt):
    """Spring and dashpot of the half-space side by side, in series with a slider of the shaft's strength.

    Constants: Randolph and Simons 1986 (from memory). `s` is the soil's displacement at the last half step (m).
    """
    slip_loss = 0.0
    damping_loss = 0.0
    for j in range(len(nodes)):
        i = nodes[j]
        half = 0.5 * push[i]
        k, c, top = stiff[j], dashpot[j], strength[j]
        free = 0.5 * (v[i] + w[i])
        mean = (free - half * k * s[j]) / (1.0 + half * (0.5 * k * dt + c))
        moved = dt * mean
        resist = k * (s[j] + 0.5 * moved) + c * mean
        if abs(resist) > top:
            resist = top if resist > 0.0 else -top
            mean = free - half * resist
            moved = (resist - k * s[j]) / (0.5 * k + c / dt)
            slip_loss += resist * (dt * mean - moved)
        w[i] = 2.0 * mean - v[i]
        s[j] += moved
        damping_loss += c * moved * moved / dt
    return slip_loss, damping_loss

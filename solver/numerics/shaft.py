"""Resistance along the shaft, node by node, solved together with the node's new velocity.

The static part lives on half steps: R of the middle of one step and of the next, and their mean acts in between. With
w the mean of the two half-step velocities, `p` = dt/m and R clamped to its strength, each node is one linear equation per
branch, so that the step is bounded by the rod alone and a linear spring keeps its energy.
"""

from solver.numerics.compiled import kernel


@kernel
def plain(first, v, w, push, r, strength, stiff, flexible, smith, viscous, dt):
    """Smith's and the linear viscous law. All shaft arrays have shape (nodes of the shaft,), from node `first` on.

    `r` static resistance at the last half step (N, changed in place), `smith` = J, `viscous` = J Ru (N·s/m).
    Static: E. A. L. Smith 1960; damping J |R| v, so that it takes energy both ways (sources from memory).
    Returns the energies lost by slip and by damping in this step, J.
    """
    slip_loss = 0.0
    damping_loss = 0.0
    for j in range(len(r)):
        i = first + j
        half = 0.5 * push[i]
        old = r[j]
        top = strength[j]
        k = stiff[j] * dt
        free = 0.5 * (v[i] + w[i])
        now = min(max(old + 0.5 * k * v[i], -top), top)
        c = smith[j] * abs(now) + viscous[j]
        trial = old + k * (free - half * old) / (1.0 + half * (0.5 * k + c))
        new = min(max(trial, -top), top)
        mean = (free - half * 0.5 * (old + new)) / (1.0 + half * c)
        w[i] = 2.0 * mean - v[i]
        r[j] = new
        slip_loss += top * abs(dt * mean - (new - old) * flexible[j])
        damping_loss += c * mean * mean
    return slip_loss, damping_loss * dt


@kernel
def power_speed(a, b, exponent, rest):
    """Root w of a w + b |w|^N sign(w) = rest, a > 0, b >= 0, 0 < N <= 1.

    With y = |w|^N the left side is a y^(1/N) + b y, convex and rising, so Newton's steps fall onto the root from above.
    """
    goal = abs(rest)
    if goal == 0.0:
        return 0.0
    inverse = 1.0 / exponent
    # both bounds lie above the root
    y = min(goal / b if b > 0.0 else 1e300, (goal / a) ** exponent)
    for _ in range(50):
        lead = a * y ** (inverse - 1.0)
        change = (lead * y + b * y - goal) / (inverse * lead + b)
        y -= change
        if change <= 1e-13 * y:
            break
    size = (goal - b * y) / a
    return size if rest > 0.0 else -size


@kernel
def power(nodes, v, w, push, r, strength, stiff, flexible, factor, exponent, dt):
    """Power law Rd = J Ru |v|^N sign(v) (Gibson and Coyle 1968, from memory); `factor` = J Ru, arrays per listed node."""
    slip_loss = 0.0
    damping_loss = 0.0
    for j in range(len(nodes)):
        i = nodes[j]
        half = 0.5 * push[i]
        old = r[j]
        top = strength[j]
        k = stiff[j] * dt
        free = 0.5 * (v[i] + w[i])
        mean = power_speed(1.0 + half * 0.5 * k, half * factor[j], exponent[j], free - half * old)
        new = old + k * mean
        if abs(new) > top:
            new = top if new > 0.0 else -top
            mean = power_speed(1.0, half * factor[j], exponent[j], free - half * 0.5 * (old + new))
        w[i] = 2.0 * mean - v[i]
        r[j] = new
        slip_loss += top * abs(dt * mean - (new - old) * flexible[j])
        damping_loss += factor[j] * abs(mean) ** (exponent[j] + 1.0)
    return slip_loss, damping_loss * dt


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

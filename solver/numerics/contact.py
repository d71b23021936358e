"""Faces that touch: joints, splices and a rigid wall, by the force that just closes their gap.

The force of a contact lives on half steps, like every local law: the mean of its values before and after acts now. So
faces that part still feel half of what held them, and no wave of two steps' length is left behind. It needs no
stiffness and no smaller step.
"""

from solver.numerics.compiled import apart, part_of_step
from solver.numerics.records import EVENT_JOINT_CLOSED, EVENT_JOINT_OPENED, EVENT_WALL, remember

#: Share of its strength by which a bond may be short of it and still cracks: pulled by the very strength, it shall not
#: hang on the last digit.
ROUNDING = 1e-9


@part_of_step
def force_between(bounds, j, push, u, w, dt):
    """Force that presses the faces of joint `j` in this step, that of the coming half step, and the gap at which they
    were stopped, m (of a splice that is pulled: beyond its slack).

    Faces that would meet within this step are stopped at its start, less than a step's way apart. Stopped in the middle
    of a step they would send out two fronts a step apart, and part between their returns: one element would be pulled
    by up to half of the front.
    """
    a, before, slack = bounds.joints[j], bounds.joint_force[j], bounds.joint_par[j, 1]
    yielding = push[a] + push[a + 1]
    now = u[a + 1] - u[a] + bounds.joint_par[j, 0]
    way = dt * (w[a + 1] - w[a] + 0.5 * yielding * before)
    stopped = bounds.joint_par[j, 2]
    over = now + way - stopped
    if before == 0.0:
        over, stopped, least = 0.0, 0.0, ROUNDING * abs(way)
        if now + way < -least:
            stopped = max(now, 0.0)
            over = now + way - stopped
        elif now + way - slack > least:
            stopped = min(now - slack, 0.0)
            over = now + way - slack - stopped
    elif over > 0.0:
        over = max(over - slack, 0.0)
    ahead = -2.0 * over / (dt * yielding)
    return 0.5 * (before + ahead), ahead, stopped


@part_of_step
def bond_force(gap, ease, before, last, strength):
    """The same for a joint that may crack, and its strength from now on. `gap`: without any force at the next step, m;
    `ease` turns a gap into the force that closes it, N/m.

    While it holds it is kept closed, which takes the force between its two elements; the coming half step's lies
    between it and what it would be if it went on as since the step before. Where that one pulls by the strength, it
    cracks: now only the half acts that the last half step still held. A crack touches like any faces.
    """
    force = -gap * ease
    ahead, goes_on = 2.0 * force - before, 2.0 * force - last
    low, high = (force, goes_on) if force < goes_on else (goes_on, force)
    held = low if ahead < low else (high if ahead > high else ahead)
    cracks = -held >= strength * (1.0 - ROUNDING)
    sound, touches = strength > 0.0, ahead > 0.0
    pressed = 0.5 * (before + ahead) if touches else 0.5 * before
    # chosen without branches, so that the loop over all bonds runs in vector instructions
    new = force if sound and not cracks else (0.5 * before if sound else pressed)
    coming = (0.0 if cracks else ahead) if sound else (ahead if touches else 0.0)
    return new, coming, strength if sound and not cracks else 0.0


@apart
def try_bonds(ease, before, strength, last, trial, push, u, w, dt):
    """A run of bonds, the first between the first two nodes, acts for a trial."""
    for i in range(len(ease)):
        a, b = 2 * i, 2 * i + 1
        gap = u[b] - u[a] + dt * (w[b] - w[a])
        force, _, _ = bond_force(gap, ease[i], before[i], last[i], strength[i])
        w[a], w[b] = w[a] - push[a] * force, w[b] + push[b] * force
        trial[i] = force


@apart
def hold_bonds(ease, before, strength, opened, last, cracked, trial, push, u, v, w, dt, step):
    """A run of bonds, the first between the first two nodes, acts for good; returns the energy exchanged, J."""
    exchanged = 0.0
    for i in range(len(ease)):
        a, b = 2 * i, 2 * i + 1
        near, far, was, now = push[a], push[b], strength[i], u[b] - u[a]
        w1, w2 = w[a] + near * trial[i], w[b] - far * trial[i]
        force, ahead, left = bond_force(now + dt * (w2 - w1), ease[i], before[i], last[i], was)
        w1, w2 = w1 - near * force, w2 + far * force
        w[a], w[b], trial[i] = w1, w2, 0.0
        before[i], last[i], strength[i] = ahead, force, left
        cracked[i] = step if was > left else cracked[i]
        opened[i] = now if left == 0.0 and now > opened[i] else opened[i]
        exchanged += 0.5 * dt * force * (v[a] - v[b] + w1 - w2)
    return exchanged


@part_of_step
def bonds(bounds, push, u, v, w, dt, step, for_trial):
    """All joints that may crack, run by run; returns the energy exchanged, J."""
    exchanged, bond = 0.0, bounds.joint_bond
    for r in range(len(bounds.bonds)):
        j, end, a = bounds.bonds[r, 0], bounds.bonds[r, 1], bounds.bonds[r, 2]
        at, here = slice(j, end), slice(a, a + 2 * (end - j))
        ease, before, strength, last = bond[4, at], bounds.joint_force[at], bond[0, at], bond[2, at]
        trial = bounds.joint_trial[at]
        if for_trial:
            try_bonds(ease, before, strength, last, trial, push[here], u[here], w[here], dt)
        else:
            exchanged += hold_bonds(
                ease, before, strength, bond[1, at], last, bond[3, at], trial, push[here], u[here], v[here], w[here],
                dt, step,
            )  # fmt: skip
    return exchanged


@part_of_step
def touch_ahead(bounds, push, u, v, w, dt, step):
    """Let the joints act for a trial, so that the ground along the shaft meets velocities that are nearly the new ones;
    `joints` takes it back."""
    for k in range(len(bounds.faces)):
        j = bounds.faces[k]
        a = bounds.joints[j]
        force, _, _ = force_between(bounds, j, push, u, w, dt)
        w[a] -= push[a] * force
        w[a + 1] += push[a + 1] * force
        bounds.joint_trial[j] = force
    bonds(bounds, push, u, v, w, dt, step, True)


@part_of_step
def joints(bounds, push, u, v, w, dt, note, step):
    """Correct the new velocities of joints that touch, hold or pull in this step; returns the energy exchanged, J."""
    exchanged = bonds(bounds, push, u, v, w, dt, step, False)
    for k in range(len(bounds.faces)):
        j = bounds.faces[k]
        a, before, trial = bounds.joints[j], bounds.joint_force[j], bounds.joint_trial[j]
        w[a] += push[a] * trial
        w[a + 1] -= push[a + 1] * trial
        bounds.joint_trial[j] = 0.0
        force, ahead, bounds.joint_par[j, 2] = force_between(bounds, j, push, u, w, dt)
        rel = v[a] - v[a + 1]
        w[a] -= push[a] * force
        w[a + 1] += push[a + 1] * force
        exchanged += 0.5 * dt * force * (rel + w[a] - w[a + 1])
        bounds.joint_force[j] = ahead
        if ahead != 0.0 and before == 0.0:
            remember(note, EVENT_JOINT_CLOSED, a, step)
        elif ahead == 0.0 and before != 0.0:
            remember(note, EVENT_JOINT_OPENED, a, step)
    return exchanged


@part_of_step
def wall(bounds, push, u, v, w, dt, note, step):
    """The same at a rigid wall; `wall` holds its place, the force of the last half step, and where the end was stopped.

    An end that would meet it within this step is stopped at the start of the step, less than a step's way before it:
    see `force_between`.
    """
    last = len(u) - 1
    before = bounds.wall[1]
    ahead_of_it = u[last] + dt * (w[last] - 0.5 * push[last] * before)
    over = ahead_of_it - bounds.wall[2]
    if before == 0.0:
        reaches = ahead_of_it - bounds.wall[0] > ROUNDING * abs(dt * w[last])
        bounds.wall[2] = min(u[last], bounds.wall[0])
        over = ahead_of_it - bounds.wall[2] if reaches else 0.0
    ahead = 2.0 * max(over, 0.0) / (dt * push[last])
    force = 0.5 * (before + ahead)
    w[last] -= push[last] * force
    bounds.wall[1] = ahead
    if ahead > 0.0 and before == 0.0:
        remember(note, EVENT_WALL, last, step)
    return 0.5 * dt * force * (v[last] + w[last])

"""Faces that touch: joints, splices and a rigid wall, by the force that just closes their gap.

The force of a contact lives on half steps, like every local law: the mean of its values before and after acts now. So
faces that part still feel half of what held them, and no wave of two steps' length is left behind. It needs no
stiffness and no smaller step.
"""

from solver.numerics.compiled import part_of_step
from solver.numerics.records import EVENT_CRACK, EVENT_JOINT_CLOSED, EVENT_JOINT_OPENED, EVENT_WALL, remember

#: Share of its strength by which a bond may be short of it and still cracks: pulled by the very strength, it shall not
#: hang on the last digit.
ROUNDING = 1e-9


@part_of_step
def force_between(bounds, j, push, u, w, dt):
    """Force that presses the faces of joint `j` in this step, that of the coming half step, and whether it cracks.

    A bond is kept closed, which takes the force between its two elements; the coming half step's lies between it and
    what it would be if it went on as since the step before. Where that one pulls by the strength, the joint cracks: now
    only the half acts that the last half step still held.
    """
    a, before, bond = bounds.joints[j], bounds.joint_force[j], bounds.joint_bond[j, 0]
    yielding = push[a] + push[a + 1]
    gap = u[a + 1] - u[a] + dt * (w[a + 1] - w[a])
    if bond > 0.0:
        force = -gap / (dt * yielding)
        ahead, goes_on = 2.0 * force - before, 2.0 * force - bounds.joint_bond[j, 2]
        held = min(max(ahead, min(force, goes_on)), max(force, goes_on))
        if -held >= bond * (1.0 - ROUNDING):
            return 0.5 * before, 0.0, True
        return force, ahead, False
    gap += bounds.joint_par[j, 0] + 0.5 * dt * yielding * before
    over = gap if gap < 0.0 else max(gap - bounds.joint_par[j, 1], 0.0)
    ahead = -2.0 * over / (dt * yielding)
    return 0.5 * (before + ahead), ahead, False


@part_of_step
def touch_ahead(bounds, push, u, w, dt):
    """Let the joints act for a trial, so that the ground along the shaft meets velocities that are nearly the new ones;
    `joints` takes it back."""
    for j in range(len(bounds.joints)):
        a = bounds.joints[j]
        force, _, _ = force_between(bounds, j, push, u, w, dt)
        w[a] -= push[a] * force
        w[a + 1] += push[a + 1] * force
        bounds.joint_trial[j] = force


@part_of_step
def joints(bounds, push, u, v, w, dt, note, step):
    """Correct the new velocities of joints that touch, hold or pull in this step; returns the energy exchanged, J."""
    exchanged = 0.0
    for j in range(len(bounds.joints)):
        a, before, trial = bounds.joints[j], bounds.joint_force[j], bounds.joint_trial[j]
        w[a] += push[a] * trial
        w[a + 1] -= push[a + 1] * trial
        bounds.joint_trial[j] = 0.0
        force, ahead, cracks = force_between(bounds, j, push, u, w, dt)
        rel = v[a] - v[a + 1]
        w[a] -= push[a] * force
        w[a + 1] += push[a + 1] * force
        exchanged += 0.5 * dt * force * (rel + w[a] - w[a + 1])
        bounds.joint_force[j] = ahead
        if bounds.joint_bond[j, 1] >= 0.0:
            # a crack is told once, and how far it opened
            bounds.joint_bond[j, 2] = force
            if cracks:
                bounds.joint_bond[j, 0] = 0.0
                remember(note, EVENT_CRACK, a, step)
            elif bounds.joint_bond[j, 0] <= 0.0:
                bounds.joint_bond[j, 1] = max(bounds.joint_bond[j, 1], u[a + 1] - u[a])
        elif ahead != 0.0 and before == 0.0:
            remember(note, EVENT_JOINT_CLOSED, a, step)
        elif ahead == 0.0 and before != 0.0:
            remember(note, EVENT_JOINT_OPENED, a, step)
    return exchanged


@part_of_step
def wall(bounds, push, u, v, w, dt, note, step):
    """The same at a rigid wall; `wall` holds its gap and the force of the last half step."""
    last = len(u) - 1
    before = bounds.wall[1]
    over = max(u[last] + dt * (w[last] - 0.5 * push[last] * before) - bounds.wall[0], 0.0)
    ahead = 2.0 * over / (dt * push[last])
    force = 0.5 * (before + ahead)
    w[last] -= push[last] * force
    bounds.wall[1] = ahead
    if ahead > 0.0 and before == 0.0:
        remember(note, EVENT_WALL, last, step)
    return 0.5 * dt * force * (v[last] + w[last])

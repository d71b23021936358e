"""Faces that touch: joints, splices and a rigid wall, by the force that just closes their gap.

The force of a contact lives on half steps, like every local law: the mean of its values before and after acts now. So
faces that part still feel half of what held them, and no wave of two steps' length is left behind. It needs no
stiffness and no smaller step.
"""

from solver.numerics.compiled import part_of_step
from solver.numerics.records import EVENT_JOINT_CLOSED, EVENT_JOINT_OPENED, EVENT_WALL, remember


@part_of_step
def joints(bounds, push, u, v, w, dt, note, step):
    """Correct the new velocities of joints that touch or pull within this step; returns the energy exchanged, J."""
    exchanged = 0.0
    for j in range(len(bounds.joints)):
        a = bounds.joints[j]
        before = bounds.joint_force[j]
        rel = v[a] - v[a + 1]
        yielding = push[a] + push[a + 1]
        gap = u[a + 1] - u[a] + bounds.joint_par[j, 0] + dt * (w[a + 1] - w[a] + 0.5 * yielding * before)
        over = gap if gap < 0.0 else max(gap - bounds.joint_par[j, 1], 0.0)
        ahead = -2.0 * over / (dt * yielding)
        force = 0.5 * (before + ahead)
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

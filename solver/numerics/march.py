"""The march through time: central differences, velocities on half steps, one loop with no Python inside.

Each step reads like the method: forces of the links from the displacements of now; new velocities of all nodes; then the
nodes where something else acts (springs and dashpots to ground, shaft, toe, joints, wall, ram) corrected one kind after
the other; records; displacements of the next step.
"""

import numpy as np

from solver.numerics import shaft, toe, train
from solver.numerics.balance import DAMPING, DASHPOTS, IMPACT, SLIP, WORK, balance
from solver.numerics.compiled import kernel
from solver.numerics.links import link_forces
from solver.numerics.records import (
    EVENT_IMPACT,
    EVENT_JOINT_CLOSED,
    EVENT_JOINT_OPENED,
    EVENT_SEPARATION,
    EVENT_TOE_LIFT,
    EVENT_WALL,
    envelopes,
    read_gauges,
    remember,
    take_frame,
)


@kernel
def new_velocities(push, weight, gain, v, w, force):
    """w = gain v + (dt/m)(forces): all nodes at once."""
    last = len(v) - 1
    w[0] = gain * v[0] + push[0] * (force[0] + weight[0])
    # slices, as in the laws: no index can wrap around
    out, old, p, g = w[1:last], v[1:last], push[1:last], weight[1:last]
    above, below = force[: last - 1], force[1:last]
    for i in range(len(out)):
        out[i] = gain * old[i] + p[i] * (below[i] - above[i] + g[i])
    w[last] = gain * v[last] + push[last] * (weight[last] - force[last - 1])


@kernel
def inertia_velocities(rod, v, w, force, load, u):
    """Love's rod: the tridiagonal mass matrix solved by one sweep down and one up."""
    last = len(v) - 1
    for i in range(last + 1):
        pull = rod.weight[i]
        if i < last:
            pull += force[i]
        if i > 0:
            pull -= force[i - 1]
        w[i] = pull
    w[0] += load
    for s in range(len(rod.special)):
        i = rod.special[s]
        w[i] -= rod.spring[s] * u[i] + rod.dashpot[s] * v[i]
    for i in range(1, last + 1):
        w[i] -= rod.carry[i - 1] * w[i - 1]
    w[last] /= rod.pivot[last]
    for i in range(last - 1, -1, -1):
        w[i] = w[i] / rod.pivot[i] - rod.carry[i] * w[i + 1]
    for i in range(last + 1):
        w[i] += v[i]


@kernel
def special_nodes(rod, u, v, w, drag, gain, sums, dt):
    """Nodes with a spring or dashpot to fixed ground, both implicit (their `push` knows it)."""
    for s in range(len(rod.special)):
        i = rod.special[s]
        if len(rod.inertia) == 0:
            pull = rod.spring[s] * u[i] + (rod.dashpot[s] + drag * rod.mass[i]) * v[i]
            w[i] += (1.0 - gain) * v[i] - rod.push[i] * pull
        mean = 0.5 * (v[i] + w[i])
        sums[DASHPOTS] += rod.dashpot[s] * mean * mean * dt


@kernel
def joints(bounds, push, u, v, w, sums, dt, note, step):
    """Joints that touch or pull within this step get the impulse that just closes or stops them."""
    for j in range(len(bounds.joints)):
        a = bounds.joints[j]
        opening = u[a + 1] - u[a] + bounds.joint_par[j, 0] + dt * (w[a + 1] - w[a])
        slack = bounds.joint_par[j, 1]
        over = opening if opening < 0.0 else max(opening - slack, 0.0)
        before = bounds.joint_force[j]
        force = -over / (dt * (push[a] + push[a + 1]))
        if over != 0.0:
            rel = v[a] - v[a + 1]
            w[a] -= push[a] * force
            w[a + 1] += push[a + 1] * force
            sums[IMPACT] += 0.5 * dt * force * (rel + w[a] - w[a + 1])
        bounds.joint_force[j] = force
        if force != 0.0 and before == 0.0:
            remember(note, EVENT_JOINT_CLOSED, a, step)
        elif force == 0.0 and before != 0.0:
            remember(note, EVENT_JOINT_OPENED, a, step)


@kernel
def wall(bounds, push, u, v, w, sums, dt, note, step):
    """A rigid wall beyond a gap: `wall` holds the gap and the force of the last step."""
    last = len(u) - 1
    over = u[last] + dt * w[last] - bounds.wall[0]
    force = max(over, 0.0) / (dt * push[last])
    if force > 0.0:
        w[last] -= push[last] * force
        sums[IMPACT] += 0.5 * dt * force * (v[last] + w[last])
        if bounds.wall[1] == 0.0:
            remember(note, EVENT_WALL, last, step)
    bounds.wall[1] = force


@kernel
def shaft_nodes(ground, push, v, w, sums, dt):
    """Resistance along the shaft, by each law present."""
    if len(ground.r):
        slip, damped = shaft.plain(ground.first, v, w, push, ground.r, ground.par, dt)
        sums[SLIP] += slip
        sums[DAMPING] += damped
    if len(ground.power_nodes):
        p = ground.power
        slip, damped = shaft.power(ground.power_nodes, v, w, push, p[0], p[1], p[2], p[3], p[4], p[5], dt)
        sums[SLIP] += slip
        sums[DAMPING] += damped
    if len(ground.radiation_nodes):
        q = ground.radiation
        slip, damped = shaft.radiation(ground.radiation_nodes, v, w, push, q[0], q[1], q[2], q[3], dt)
        sums[SLIP] += slip
        sums[DAMPING] += damped


@kernel
def toe_node(bounds, push, u, v, w, sums, dt, note, step):
    """Resistance under the toe."""
    last = len(u) - 1
    free, half = 0.5 * (v[last] + w[last]), 0.5 * push[last]
    before = bounds.toe_state[3]
    if bounds.toe_par[0] == toe.RADIATION:
        mean, slip, damped = toe.radiating(bounds.toe_par, bounds.toe_state, free, half, u[last], v[last], dt)
    else:
        mean, slip, damped = toe.quasi_static(
            bounds.toe_par, bounds.toe_state, free, half, u[last], v[last], dt
        )
    w[last] = 2.0 * mean - v[last]
    sums[SLIP] += slip
    sums[DAMPING] += damped
    if before > 0.0 and bounds.toe_state[3] == 0.0:
        remember(note, EVENT_TOE_LIFT, last, step)


@kernel
def train_step(bounds, push, u, v, w, sums, dt, note, step):
    """Ram, cap and struck end; notes when the ram leaves and when it strikes (again)."""
    before = bounds.train_force[0]
    sums[IMPACT] += train.advance(
        bounds.train_links,
        bounds.train_kinds,
        bounds.train_par,
        bounds.train_state,
        bounds.train_force,
        u,
        v,
        w,
        push,
        dt,
    )
    after = bounds.train_force[0]
    if after > 0.0 and before <= 0.0:
        remember(note, EVENT_IMPACT, bounds.train_links[0], step)
    elif after <= 0.0 and before > 0.0:
        remember(note, EVENT_SEPARATION, bounds.train_links[0], step)


@kernel
def march(rod, ground, bounds, motion, ext, rec, sums, load, first, count, stride, dt, drag):
    """March `count` steps from step number `first`. `load`: force on the struck end per step (N), or its velocity where it
    is driven. `drag` (1/s) damps every node in proportion to its mass (0 but for settling). Changes its arrays in place.
    """
    u, v, w, force, rest = motion.u, motion.v, motion.w, motion.force, motion.rest
    note = (rec.events, rec.event_count)
    gain = (1.0 - 0.5 * drag * dt) / (1.0 + 0.5 * drag * dt)
    push, weight, driven = rod.push, rod.weight, rod.driven[1] != 0
    head, last = rod.driven[0], len(u) - 1
    # what a case does not have must cost nothing at every step
    inert, special, gauges = len(rod.inertia) > 0, len(rod.special) > 0, len(rec.node) > 0
    shafts = len(ground.r) + len(ground.power_nodes) + len(ground.radiation_nodes) > 0
    toes, jointed, walled = len(bounds.toe_par) > 0, len(bounds.joints) > 0, bounds.wall[0] < np.inf
    rams, train_heard = len(bounds.train_links) > 0, len(rec.ram) > 0
    for n in range(count):
        step = first + n
        link_forces(rod, u, v, force, dt, rec.flags, note, step)
        if inert:
            inertia_velocities(rod, v, w, force, 0.0 if driven else load[n], u)
        else:
            new_velocities(push, weight, gain, v, w, force)
            if not driven:
                w[head] += push[head] * load[n]
        if special:
            special_nodes(rod, u, v, w, drag, gain, sums, dt)
        if shafts:
            shaft_nodes(ground, push, v, w, sums, dt)
        if toes:
            toe_node(bounds, push, u, v, w, sums, dt, note, step)
        if driven:
            w[head] = load[n]
        if rod.fixed_end:
            w[last] = 0.0
        if jointed:
            joints(bounds, push, u, v, w, sums, dt, note, step)
        if walled:
            wall(bounds, push, u, v, w, sums, dt, note, step)
        if rams:
            train_step(bounds, push, u, v, w, sums, dt, note, step)
        pull = load[n]
        if driven:
            pull = rod.mass[head] * (w[head] - v[head]) / dt - force[head] - weight[head]
        sums[WORK] += pull * 0.5 * (v[head] + w[head]) * dt
        if gauges:
            read_gauges(rec, u, v, w, force, rest, dt, n)
        if train_heard:
            rec.ram[0, n] = bounds.train_force[0]
            rec.ram[1, n] = 0.5 * (v[bounds.train_links[0]] + w[bounds.train_links[0]])
            rec.ram[2, n] = 0.5 * (v[head] + w[head])
        if step % stride == 0:
            take_frame(rec, u, v, w, force, rest, n // stride)
            balance(rec.ledger[n // stride], rod, ground, bounds, motion.rest, u, w, force, sums, dt)
        envelopes(ext, force, v, w, u, dt, step)
        v, w = w, v
    motion.v[:] = v

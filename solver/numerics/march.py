"""The march through time: central differences, velocities on half steps, one loop with no Python inside.

Each step reads like the method: forces of the links from the displacements of now; new velocities of all nodes;
then the nodes where something else acts (springs and dashpots to ground, shaft, toe, joints, wall, ram) corrected
one kind after the other; records; displacements of the next step.
"""

import numpy as np

from solver.numerics import contact, shaft, toe, train
from solver.numerics.balance import DAMPING, DASHPOTS, IMPACT, PULL, SLIP, WORK, balance
from solver.numerics.compiled import kernel, part_of_step
from solver.numerics.records import (
    EVENT_IMPACT,
    EVENT_SEPARATION,
    EVENT_TOE_LIFT,
    extremes,
    keep_first_blow,
    read_gauges,
    read_train,
    remember,
    take_frame,
)
from solver.numerics.resting import came_to_rest
from solver.numerics.sweep import move_on, sweep


@kernel
def inertia_velocities(rod, v, w, force, load, driven, u, dt, step):
    """Love's rod: the tridiagonal mass matrix solved by one sweep down and one up.

    A node whose velocity is given (struck end driven, far end fixed) is no unknown: the factors leave it out. For the
    first step see `special_nodes` and `Rod.opening`.
    """
    last = len(v) - 1
    share = 0.5 if step == 0 else 1.0
    for i in range(last + 1):
        pull = rod.weight[i]
        if i < last:
            pull += force[i]
        if i > 0:
            pull -= force[i - 1]
        w[i] = pull
    w[0] += 0.0 if driven else load
    for s in range(len(rod.special)):
        i = rod.special[s]
        w[i] -= rod.spring[s] * u[i] + share * rod.dashpot[s] * v[i]
    if step == 0:
        for i in range(len(rod.opening)):
            w[i] += rod.opening[i]
    if driven:
        w[0] = (load - v[0]) * rod.pivot[0]
        w[1] += rod.inertia[0] * (load - v[0]) / dt
    if rod.fixed_end:
        w[last] = 0.0
    for i in range(1, last + 1):
        w[i] -= rod.carry[i - 1] * w[i - 1]
    w[last] /= rod.pivot[last]
    for i in range(last - 1, -1, -1):
        w[i] = w[i] / rod.pivot[i] - rod.carry[i] * w[i + 1]
    for i in range(last + 1):
        w[i] += v[i]


@kernel
def section_forces(rod, ext, v, w, force, dt, step):
    """Love's rod: what passes through a section is N = E A u_x + rho A (nu r_p)^2 u_xtt, the natural boundary term of
    his equation: a loaded end reads its load, and the work of N closes with the energies."""
    for i in range(len(force)):
        force[i] += rod.inertia[i] * ((w[i + 1] - v[i + 1]) - (w[i] - v[i])) / dt
    extremes(force, ext.low, ext.low_step, ext.high, ext.high_step, float(step))


@kernel
def driving_force(rod, u, v, w, force, dt):
    """Force on a driven struck end of Love's rod, N: its momentum, that of the coupling, and what else holds it."""
    change = (w[0] - v[0]) / dt
    pull = rod.mass[0] * change + rod.inertia[0] * (change - (w[1] - v[1]) / dt) - force[0] - rod.weight[0]
    for s in range(len(rod.special)):
        if rod.special[s] == 0:
            mean = 0.5 * (v[0] + w[0])
            pull += rod.spring[s] * (u[0] + 0.25 * dt * (w[0] - v[0])) + rod.dashpot[s] * mean
    return pull


@kernel
def special_nodes(rod, u, v, w, step):
    """Nodes with a spring or dashpot to fixed ground, both implicit (their `push` knows it).

    The first step is half a step long for what moves already at time 0, and so is the dashpot's part in it.
    """
    share = 0.5 if step == 0 else 1.0
    if len(rod.inertia):
        return
    for s in range(len(rod.special)):
        i = rod.special[s]
        w[i] -= rod.push[i] * (rod.spring[s] * u[i] + share * rod.dashpot[s] * v[i])


@kernel
def dashpot_losses(rod, v, w, step):
    """Power that the dashpots to fixed ground take, W; in the first step see `special_nodes`."""
    taken = 0.0
    for s in range(len(rod.special)):
        mean = 0.5 * (v[rod.special[s]] + w[rod.special[s]])
        taken += rod.dashpot[s] * mean * (mean if step > 0 else 0.5 * w[rod.special[s]])
    return taken


@part_of_step
def shaft_nodes(ground, push, v, w, sums, dt):
    """Resistance along the shaft, by each law present."""
    if len(ground.r):
        slip, damped = shaft.plain(ground.first, v, w, push, ground.r, ground.par, dt)
        sums[SLIP] += slip
        sums[DAMPING] += damped
    if len(ground.power_nodes):
        slip, damped, turned = shaft.power(
            ground.power_nodes, ground.kept_at, ground.pieces, v, w, push, ground.power, dt
        )
        sums[IMPACT] += turned
        sums[SLIP] += slip
        sums[DAMPING] += damped
    if len(ground.radiation_nodes):
        q = ground.radiation
        slip, damped = shaft.radiation(ground.radiation_nodes, v, w, push, q[0], q[1], q[2], q[3], dt)
        sums[SLIP] += slip
        sums[DAMPING] += damped


@part_of_step
def toe_node(bounds, push, u, v, w, sums, dt, note, step):
    """Resistance under the toe."""
    last = len(u) - 1
    pressed = bounds.toe_state[4] > 0.0
    if bounds.toe_par[0] == toe.RADIATION:
        w[last], slip, damped, exchanged = toe.radiating(
            bounds.toe_par, bounds.toe_state, w[last], push[last], u[last], v[last], dt
        )
    else:
        w[last], slip, damped, exchanged = toe.quasi_static(
            bounds.toe_par, bounds.toe_state, w[last], push[last], u[last], v[last], dt
        )
    sums[IMPACT] += exchanged
    sums[SLIP] += slip
    sums[DAMPING] += damped
    if pressed and bounds.toe_state[3] == 0.0:
        remember(note, EVENT_TOE_LIFT, last, step)


@part_of_step
def train_step(bounds, push, u, v, w, sums, dt, note, step):
    """Ram, cap and struck end; notes when the ram leaves and when it strikes (again)."""
    before = bounds.train_state[0, 2] if bounds.train_kinds[0] == 0 else bounds.train_force[0]
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
    after = bounds.train_state[0, 2] if bounds.train_kinds[0] == 0 else bounds.train_force[0]
    if after > 0.0 and before <= 0.0:
        remember(note, EVENT_IMPACT, bounds.train_links[0], step)
    elif after <= 0.0 and before > 0.0:
        remember(note, EVENT_SEPARATION, bounds.train_links[0], step)


@part_of_step
def free_velocities(rod, u, v, w, force, pull, driven, dt, step):
    """What loads, springs and dashpots add to velocities that know the links alone; Love's rod finds its own."""
    head = rod.driven[0]
    inert = len(rod.inertia) > 0
    if inert:
        inertia_velocities(rod, v, w, force, pull, driven, u, dt, step)
    elif not driven:
        w[head] += rod.push[head] * pull
    if step == 0 and not inert:
        for i in range(len(rod.opening)):
            w[i] += rod.push[i] * rod.opening[i]
    if len(rod.special) > 0:
        special_nodes(rod, u, v, w, step)


@part_of_step
def ground_nodes(ground, bounds, push, u, v, w, sums, dt, note, step):
    """Shaft and toe; the shaft meets velocities that already know which faces touch."""
    if len(ground.r) + len(ground.power_nodes) + len(ground.radiation_nodes) > 0:
        if len(bounds.joints) > 0:
            contact.touch_ahead(bounds, push, u, v, w, dt, step)
        shaft_nodes(ground, push, v, w, sums, dt)
    if len(bounds.toe_par) > 0:
        toe_node(bounds, push, u, v, w, sums, dt, note, step)


@part_of_step
def faces(ext, bounds, push, u, v, w, sums, dt, note, step):
    """Whatever touches: joints, a wall, and what strikes."""
    if len(bounds.joints) > 0:
        sums[IMPACT] += contact.joints(bounds, push, u, v, w, dt, note, step)
    if bounds.wall[0] < np.inf:
        sums[IMPACT] += contact.wall(bounds, push, u, v, w, dt, note, step)
    if len(bounds.train_links) > 0:
        train_step(bounds, push, u, v, w, sums, dt, note, step)
    if len(ext.second) > 0:
        keep_first_blow(ext, bounds, note, step)


@part_of_step
def let_go(push, sums, w, head):
    """What held the struck end over the last step still acts with its half in the step in which it lets go, N."""
    half = 0.5 * sums[PULL]
    w[head] += push[head] * half
    return half


@part_of_step
def account(rod, v, w, sums, pull, driven, dt, step):
    """Work of the load, and what dashpots and the opening took. A step acts with the mean of two half steps,
    f = (g_before + g)/2: so the coming half step's force on a driven end follows."""
    head = rod.driven[0]
    sums[PULL] = 2.0 * pull - sums[PULL] if driven else 0.0
    if len(rod.special) > 0:
        sums[DASHPOTS] += dashpot_losses(rod, v, w, step) * dt
    if step == 0:
        for i in range(len(rod.opening)):
            sums[IMPACT] -= rod.opening[i] * 0.5 * (v[i] + w[i]) * dt
    sums[WORK] += pull * 0.5 * (v[head] + w[head]) * dt


@part_of_step
def write_down(rod, ground, bounds, ext, rec, rest, u, v, w, force, sums, stride, dt, step):
    """The ledger, gauges, ram and pictures of a step."""
    if step % stride == 0:
        balance(rec.ledger[step // stride], rod, ground, bounds, rest, u, v, w, force, sums, dt)
    if len(rod.inertia) > 0:
        section_forces(rod, ext, v, w, force, dt, step)
    if len(rec.node) > 0:
        read_gauges(rec, u, v, w, force, rest, dt, step)
    if len(rec.ram) > 0:
        read_train(rec, bounds, v, w, rod.driven[0], step)
    if step % stride == 0:
        take_frame(rec, u, v, w, force, rest, step // stride)


@kernel
def march(rod, ground, bounds, motion, ext, rec, ends, sums, load, first, count, stride, dt):
    """March at most `count` steps from step number `first`; returns how many, fewer where a run that `ends` by itself
    came to rest. `load`: force on the struck end per step (N), or its velocity where it is driven. Changes its
    arrays in place.
    """
    u, v, w, rest = motion.u, motion.v, motion.w, motion.rest
    note = (rec.events, rec.event_count)
    push, head, last = rod.push, rod.driven[0], len(u) - 1
    force = motion.pulls[1 : last + 1]
    shaft.ready_power(ground.power_nodes, v, push, ground.power, dt, first)
    done, waiting = 0, False
    while done < count:
        step, pull = first + done, load[done]
        driven = step < rod.driven[1]
        sweep(rod, ext, motion, u, v, w, dt, rec.flags, note, step, waiting)
        free_velocities(rod, u, v, w, force, pull, driven, dt, step)
        ground_nodes(ground, bounds, push, u, v, w, sums, dt, note, step)
        if step == rod.driven[1] and step > 0:
            pull += let_go(push, sums, w, head)
        if driven:
            # the force that makes the struck end follow, whatever else acts on it
            inert = len(rod.inertia) > 0
            pull = (pull - w[head]) / push[head] if not inert else driving_force(rod, u, v, w, force, dt)
            w[head] = load[done]
        if rod.fixed_end:
            w[last] = 0.0
        faces(ext, bounds, push, u, v, w, sums, dt, note, step)
        account(rod, v, w, sums, pull, driven, dt, step)
        write_down(rod, ground, bounds, ext, rec, rest, u, v, w, force, sums, stride, dt, step)
        done, waiting = done + 1, True
        v, w = w, v
        if ends.every > 0 and (step + 1) % ends.every == 0:
            move_on(ext, u, w, v, dt)
            waiting = False
            if came_to_rest(ends, head, ext.speed, v, sums, (step + 1) * dt):
                break
    if waiting:
        move_on(ext, u, w, v, dt)
    for i in range(len(v)):
        motion.v[i] = v[i]
    return done

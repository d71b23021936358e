"""What a march writes down: events, envelopes, gauges and frames."""

import numpy as np

from solver.numerics.compiled import apart, kernel, part_of_step

#: Kinds of event in `Records.events`, rows of kind, place (link or node), step.
(
    EVENT_IMPACT,
    EVENT_SEPARATION,
    EVENT_LEFT_ELASTIC,
    EVENT_JOINT_OPENED,
    EVENT_JOINT_CLOSED,
    EVENT_WALL,
    EVENT_TOE_LIFT,
) = range(7)

#: Share of the largest velocity of the head at which a cap that was in the air strikes it again (a choice of this
#: program: lesser hops change no peak that matters).
FALLS_BACK = 0.1


@kernel
def remember(note, kind, place, step):
    """Add an event while there is room."""
    events, count = note
    if count[0] < len(events):
        events[count[0], 0] = kind
        events[count[0], 1] = place
        events[count[0], 2] = step
        count[0] += 1


@part_of_step
def cap_falls_back(ext, bounds, note, step):
    """Whether a cap without a cushion falls back on the head in this step: after it was away, and at a good part of the
    velocity that the blow gave the head."""
    if len(bounds.train_links) < 2 or bounds.train_kinds[1] != 0 or bounds.train_state[1, 2] <= 0.0:
        return False
    away, ext.second[4] = step - ext.second[4], step
    head = bounds.train_links[1] + 1
    falls = away > ext.second[1] and bounds.train_state[1, 3] > FALLS_BACK * ext.speed[head]
    if falls:
        remember(note, EVENT_IMPACT, head - 1, step)
    return falls


@part_of_step
def keep_first_blow(ext, bounds, note, step):
    """When what strikes comes back after it was away, keep the envelopes as they stood; see `Extremes.second`."""
    joint = ext.second[3]
    if joint >= 0:
        force = bounds.joint_force[joint]
    else:
        force = bounds.train_state[0, 2] if bounds.train_kinds[0] == 0 else bounds.train_force[0]
    cap = cap_falls_back(ext, bounds, note, step)
    if force <= 0.0 and not cap:
        return
    if ext.second[2] == 0 and (cap or step - ext.second[0] > ext.second[1]):
        ext.second[2] = step
        for i in range(len(ext.low)):
            ext.first_links[0, i], ext.first_links[1, i] = ext.low[i], ext.low_step[i]
            ext.first_links[2, i], ext.first_links[3, i] = ext.high[i], ext.high_step[i]
        for i in range(len(ext.speed)):
            ext.first_nodes[0, i], ext.first_nodes[1, i] = ext.speed[i], ext.travel[i]
    if force > 0.0:
        ext.second[0] = step


@apart
def extremes(force, low, low_step, high, high_step, at):
    """Envelopes of force. Later rounding does not count as a new extreme, so that the first of equal peaks is the one
    that is told. Values are read before any is written: so the loop runs in vector instructions."""
    for i in range(len(force)):
        f, least, when, most, then = force[i], low[i], low_step[i], high[i], high_step[i]
        lower = f < least - 1e-10 * abs(least)
        higher = f > most + 1e-10 * abs(most)
        low_step[i] = at if lower else when
        low[i] = f if lower else least
        high_step[i] = at if higher else then
        high[i] = f if higher else most


@apart
def move(u, v, w, speed, travel, dt):
    """Largest velocity and displacement so far; then displacements of the next step."""
    for i in range(len(u)):
        mean, most, now, far = 0.5 * (v[i] + w[i]), speed[i], u[i], travel[i]
        speed[i] = mean if mean > most else most
        travel[i] = now if now > far else far
        u[i] = now + dt * w[i]


@part_of_step
def read_gauges(rec, u, v, w, force, rest, dt, step):
    """Each gauge: two readings blended by their share."""
    column = step - rec.since[0]
    for g in range(len(rec.node)):
        f, speed, moved, acc, strain = 0.0, 0.0, 0.0, 0.0, 0.0
        for r in range(2):
            i = rec.node[g, r]
            share, left, right = rec.weights[g, r, 0], rec.weights[g, r, 1], rec.weights[g, r, 2]
            if share == 0.0:
                continue
            a = (w[i] - v[i]) / dt
            reading = rec.weights[g, r, 3] * a + rec.weights[g, r, 4]
            stretch = 0.0
            if left != 0.0:
                reading += left * force[i - 1]
                stretch += left * (u[i] - u[i - 1]) * rec.weights[g, r, 5]
            if right != 0.0:
                reading += right * force[i]
                stretch += right * (u[i + 1] - u[i]) * rec.weights[g, r, 6]
            f += share * reading
            strain += share * stretch
            speed += share * 0.5 * (v[i] + w[i])
            moved += share * (u[i] - rest[i])
            acc += share * a
        rec.gauges[5 * g, column] = f
        rec.gauges[5 * g + 1, column] = speed
        rec.gauges[5 * g + 2, column] = moved
        rec.gauges[5 * g + 3, column] = acc
        rec.gauges[5 * g + 4, column] = strain


@part_of_step
def read_train(rec, bounds, v, w, head, step):
    """Force on the ram, its velocity and that of the struck end."""
    column, ram = step - rec.since[1], bounds.train_links[0]
    rec.ram[0, column] = bounds.train_force[0]
    rec.ram[1, column] = 0.5 * (v[ram] + w[ram])
    rec.ram[2, column] = 0.5 * (v[head] + w[head])


@part_of_step
def take_frame(rec, u, v, w, force, rest, row):
    """One line of the pictures: values in the middle of each shown link."""
    first, count = rec.columns[0], len(rec.columns)
    if rec.columns[count - 1] - first == count - 1:
        links, nodes = slice(first, first + count), slice(first, first + count + 1)
        middles(force[links], rec.area, rec.stress[row])
        means(v[nodes], w[nodes], rec.velocity[row])
        shifts(u[nodes], rest[nodes], rec.displacement[row])
        return
    for c in range(count):
        i = rec.columns[c]
        rec.stress[row, c] = np.float32(force[i]) / rec.area[c]
        rec.velocity[row, c] = 0.25 * (v[i] + w[i] + v[i + 1] + w[i + 1])
        rec.displacement[row, c] = 0.5 * (u[i] - rest[i] + u[i + 1] - rest[i + 1])


# links in a row, as most members have them, pass in vector instructions
@apart
def middles(force, area, stress):
    for i in range(len(stress)):
        stress[i] = np.float32(force[i]) / area[i]


@apart
def means(v, w, velocity):
    n = len(velocity)
    old, new, old_below, new_below = v[:n], w[:n], v[1 : n + 1], w[1 : n + 1]
    for i in range(n):
        velocity[i] = 0.25 * (old[i] + new[i] + old_below[i] + new_below[i])


@apart
def shifts(u, rest, displacement):
    n = len(displacement)
    now, at_rest, below, below_at_rest = u[:n], rest[:n], u[1 : n + 1], rest[1 : n + 1]
    for i in range(n):
        displacement[i] = 0.5 * (now[i] - at_rest[i] + below[i] - below_at_rest[i])

"""What a march writes down: events, envelopes, gauges and frames."""

from solver.numerics.compiled import kernel, part_of_step

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
def keep_first_blow(ext, bounds, step):
    """When what strikes comes back after it was away, keep the envelopes as they stood; see `Extremes.second`."""
    joint = ext.second[3]
    if joint >= 0:
        force = bounds.joint_force[joint]
    else:
        force = bounds.train_state[0, 2] if bounds.train_kinds[0] == 0 else bounds.train_force[0]
    if force <= 0.0:
        return
    if ext.second[2] == 0 and step - ext.second[0] > ext.second[1]:
        ext.second[2] = step
        for i in range(len(ext.low)):
            ext.first_links[0, i], ext.first_links[1, i] = ext.low[i], ext.low_step[i]
            ext.first_links[2, i], ext.first_links[3, i] = ext.high[i], ext.high_step[i]
        for i in range(len(ext.speed)):
            ext.first_nodes[0, i], ext.first_nodes[1, i] = ext.speed[i], ext.travel[i]
    ext.second[0] = step


#: Nodes that are gone through at once: what one short loop has read, the next finds in the nearest cache.
BLOCK = 512


@part_of_step
def move(ext, u, v, w, dt):
    """Extremes of velocity and displacement per node; the displacements then move on to the next step.

    One short loop per extreme, values read before any is written: so the loops run in vector instructions.
    """
    for start in range(0, len(u), BLOCK):
        here = slice(start, start + BLOCK)
        fastest(v[here], w[here], ext.speed[here])
        farthest(u[here], w[here], ext.travel[here], dt)


@part_of_step
def lowest(force, low, low_step, at):
    """Later rounding does not count as a new extreme, so that the first of equal peaks is the one that is told."""
    for i in range(len(force)):
        f, least, when = force[i], low[i], low_step[i]
        lower = f < least - 1e-10 * abs(least)
        low_step[i] = at if lower else when
        low[i] = f if lower else least


@part_of_step
def highest(force, high, high_step, at):
    """As `lowest`."""
    for i in range(len(force)):
        f, most, when = force[i], high[i], high_step[i]
        higher = f > most + 1e-10 * abs(most)
        high_step[i] = at if higher else when
        high[i] = f if higher else most


@part_of_step
def fastest(v, w, speed):
    """Largest velocity so far."""
    for i in range(len(speed)):
        mean, most = 0.5 * (v[i] + w[i]), speed[i]
        speed[i] = mean if mean > most else most


@part_of_step
def farthest(u, w, travel, dt):
    """Largest displacement so far; then those of the next step."""
    for i in range(len(travel)):
        now, most = u[i], travel[i]
        travel[i] = now if now > most else most
        u[i] = now + dt * w[i]


@part_of_step
def read_gauges(rec, u, v, w, force, rest, dt, column):
    """Each gauge: two readings blended by their share."""
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
        rec.force[g, column] = f
        rec.velocity[g, column] = speed
        rec.displacement[g, column] = moved
        rec.acceleration[g, column] = acc
        rec.strain[g, column] = strain


@part_of_step
def take_frame(rec, u, v, w, force, rest, row):
    """One line of the pictures: values in the middle of each shown link."""
    for c in range(len(rec.columns)):
        i = rec.columns[c]
        rec.frame_force[row, c] = force[i]
        rec.frame_velocity[row, c] = 0.25 * (v[i] + w[i] + v[i + 1] + w[i + 1])
        rec.frame_displacement[row, c] = 0.5 * (u[i] - rest[i] + u[i + 1] - rest[i + 1])

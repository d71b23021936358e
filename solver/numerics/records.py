"""What a march writes down: events, envelopes, gauges and frames."""

from solver.numerics.compiled import kernel

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


@kernel
def envelopes(ext, force, v, w, u, dt, step):
    """Extremes of force per link; of velocity and displacement per node, the displacements then move on to the
    next step.

    One short loop per extreme: each touches few enough arrays for vector instructions. Later rounding does not
    count as a new extreme, so that the first of equal peaks is the one that is told.
    """
    at = float(step)
    low, low_step = ext.low, ext.low_step
    for i in range(len(force)):
        lower = force[i] < low[i] - 1e-10 * abs(low[i])
        low_step[i] = at if lower else low_step[i]
        low[i] = force[i] if lower else low[i]
    high, high_step = ext.high, ext.high_step
    for i in range(len(force)):
        higher = force[i] > high[i] + 1e-10 * abs(high[i])
        high_step[i] = at if higher else high_step[i]
        high[i] = force[i] if higher else high[i]
    speed = ext.speed
    for i in range(len(u)):
        mean = 0.5 * (v[i] + w[i])
        speed[i] = mean if mean > speed[i] else speed[i]
    travel = ext.travel
    for i in range(len(u)):
        travel[i] = u[i] if u[i] > travel[i] else travel[i]
        u[i] += dt * w[i]


@kernel
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


@kernel
def take_frame(rec, u, v, w, force, rest, row):
    """One line of the pictures: values in the middle of each shown link."""
    for c in range(len(rec.columns)):
        i = rec.columns[c]
        rec.frame_force[row, c] = force[i]
        rec.frame_velocity[row, c] = 0.25 * (v[i] + w[i] + v[i + 1] + w[i + 1])
        rec.frame_displacement[row, c] = 0.5 * (u[i] - rest[i] + u[i + 1] - rest[i + 1])

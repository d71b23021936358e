"""When a run that ends by itself may end: its load is over and the member moves next to no more."""

from solver.numerics.balance import SLIP
from solver.numerics.compiled import part_of_step

#: Share of the largest velocity below which the member counts as nearly at rest (and below which it may ring on in
#: ground that slips no more), and at how many looks in a row it must: what still moves is settled statically.
STILL = 0.03
RINGING = 0.2
LOOKS = 8


@part_of_step
def came_to_rest(ends, head, speed, v, sums, time):
    """Whether the run may end now. `speed`: largest velocities so far, `v`: those of now, m/s; changes `ends`."""
    if time < ends.load_end:
        return False
    fastest, moving = speed[head], 0.0
    for i in range(head, len(v)):
        fastest, moving = max(fastest, speed[i]), max(moving, abs(v[i]))
    slipped = sums[SLIP] - ends.slipped[0]
    ends.slipped[0] = sums[SLIP]
    # a member that rings in ground which slips no more adds nothing to its set: the rest of it is statics
    ringing = ends.grounded and slipped <= 1e-9 * sums[SLIP]
    quiet = moving < STILL * fastest or (ringing and moving < RINGING * fastest)
    ends.still[0] = ends.still[0] + 1 if quiet else 0
    return ends.still[0] >= LOOKS

"""One sweep over all nodes and links a step: displacements, forces by each law, their envelopes, new velocities.

It goes block by block, so that a long rod passes through the nearest cache once a step and not once a loop. That is why
the displacements of a step are moved on at the beginning of the next sweep, right ahead of the forces that follow from
them; what waits is moved by `move_on`.
"""

from solver.numerics.compiled import apart, part_of_step
from solver.numerics.links import law_forces
from solver.numerics.records import EVENT_LEFT_ELASTIC, extremes, move, remember

#: Links in a block: the dozen arrays of so many values lie in the nearest cache together; 400 elements are one block.
BLOCK = 416


@part_of_step
def sweep(rod, ext, motion, u, v, w, dt, flags, note, step, waiting):
    """Displacements (where those of the step before are `waiting`), forces with their envelopes, velocities `w`; the
    first link of a block of one law that leaves the elastic range is noted."""
    pulls, links, at = motion.pulls, len(u) - 1, float(step)
    force, inert = pulls[1 : links + 1], len(rod.inertia) > 0
    for b in range(len(rod.blocks)):
        law, end = rod.blocks[b, 0], rod.blocks[b, 2]
        for start in range(rod.blocks[b, 1], end, BLOCK):
            stop = min(start + BLOCK, end)
            if waiting:
                # the first node of a block was the last of the one before; `w` still holds what `v` was a step ago
                ahead = slice(start + 1 if start > 0 else 0, stop + 1)
                move(u[ahead], w[ahead], v[ahead], ext.speed[ahead], ext.travel[ahead], dt)
            left = law_forces(law, rod, u, v, force, start, stop, dt)
            if left >= 0 and flags[b] == 0:
                flags[b] = 1
                remember(note, EVENT_LEFT_ELASTIC, left, step)
            here = slice(start, stop)
            if not inert:  # Love's rod: what passes through a section is known after the velocities
                extremes(
                    force[here], ext.low[here], ext.low_step[here], ext.high[here], ext.high_step[here], at
                )
            known = slice(start, stop if stop < links else stop + 1)
            around = pulls[start : known.stop + 1]
            velocities(rod.push[known], rod.weight[known], v[known], w[known], around)


@apart
def velocities(push, weight, v, w, pulls):
    """w = v + (dt/m)(forces); node i lies between `pulls` i and i + 1."""
    n = len(w)
    above, below = pulls[:n], pulls[1 : n + 1]
    for i in range(n):
        w[i] = v[i] + push[i] * (below[i] - above[i] + weight[i])


@part_of_step
def move_on(ext, u, v, w, dt):
    """All nodes at once: `v` and `w` are the velocities before and after now."""
    move(u, v, w, ext.speed, ext.travel, dt)

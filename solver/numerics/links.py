"""Forces and energies of all links, block by block, each by its law."""

from solver.numerics.compiled import kernel, part_of_step
from solver.numerics.laws import brittle_tension, elastic, elastic_plastic, large_strain, viscoelastic
from solver.numerics.records import EVENT_LEFT_ELASTIC, remember

#: Laws by the number that a block carries; a new law gets a line here and a branch in `link_forces` and `energies`.
ELASTIC, VISCOELASTIC, ELASTIC_PLASTIC, BRITTLE, LARGE_STRAIN = range(5)


@part_of_step
def link_forces(rod, u, v, force, dt, flags, note, step):
    """Force of every link by its block's law; the first link of a block that leaves the elastic range is noted."""
    for b in range(len(rod.blocks)):
        law, start, stop = rod.blocks[b, 0], rod.blocks[b, 1], rod.blocks[b, 2]
        if law == ELASTIC:
            elastic.force(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
            continue
        left = -1
        if law == VISCOELASTIC:
            viscoelastic.force(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
        elif law == ELASTIC_PLASTIC:
            left = elastic_plastic.force(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
        elif law == BRITTLE:
            left = brittle_tension.force(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
        else:
            large_strain.force(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
        if left >= 0 and flags[b] == 0:
            flags[b] = 1
            remember(note, EVENT_LEFT_ELASTIC, left, step)


@kernel
def stored_in_blocks(rod, u, v, force, dt):
    """Energy stored and lost in all blocks, J, and the part of the viscous laws in what is lost."""
    stored, lost, viscous = 0.0, 0.0, 0.0
    for b in range(len(rod.blocks)):
        law, start, stop = rod.blocks[b, 0], rod.blocks[b, 1], rod.blocks[b, 2]
        if law == ELASTIC:
            s, d = elastic.stored_and_lost(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
        elif law == VISCOELASTIC:
            s, d = viscoelastic.stored_and_lost(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
            viscous += d
            d = 0.0
        elif law == ELASTIC_PLASTIC:
            s, d = elastic_plastic.stored_and_lost(
                u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt
            )
        elif law == BRITTLE:
            s, d = brittle_tension.stored_and_lost(
                u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt
            )
        else:
            s, d = large_strain.stored_and_lost(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
        stored += s
        lost += d
    return stored, lost, viscous

"""Forces and energies of all links, block by block, each by its law."""

from solver.numerics.compiled import kernel, part_of_step
from solver.numerics.laws import elastic, elastic_plastic, large_strain, viscoelastic

#: Laws by the number that a block carries; a new law gets a line here and a branch in `link_forces` and `energies`.
ELASTIC, VISCOELASTIC, ELASTIC_PLASTIC, LARGE_STRAIN = range(4)


@part_of_step
def law_forces(law, rod, u, v, force, start, stop, dt):
    """Force of the links `start` to `stop` by one law; the first that leaves the elastic range, or -1."""
    if law == ELASTIC:
        return elastic.force(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
    if law == VISCOELASTIC:
        return viscoelastic.force(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
    if law == ELASTIC_PLASTIC:
        return elastic_plastic.force(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
    return large_strain.force(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)


@kernel
def link_forces(rod, u, v, force, dt):
    """Force of every link by its block's law; returns a link that leaves the elastic range, or -1."""
    found = -1
    for b in range(len(rod.blocks)):
        left = law_forces(rod.blocks[b, 0], rod, u, v, force, rod.blocks[b, 1], rod.blocks[b, 2], dt)
        found = left if left >= 0 else found
    return found


@part_of_step
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
        else:
            s, d = large_strain.stored_and_lost(u, v, rod.stiff, rod.par, rod.state, force, start, stop, dt)
        stored += s
        lost += d
    return stored, lost, viscous

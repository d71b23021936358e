"""Material laws, one file each. Every law offers two kernels over a block of links:

`force(u, v, stiff, par, state, force, start, stop, dt)` writes the force of each link (N, tension positive) for the
displacements `u` (m, shape (nodes,)) and last half-step velocities `v`, and returns the first link that left the
elastic range, or -1;
`stored_and_lost(u, v, stiff, par, state, force, start, stop, dt)` returns the energy stored and the energy
dissipated in the block (J), from the states alone.

`stiff` is EA/L of each link; `par` has shape (3, links), `state` (4, links); their rows mean what the law says.
"""

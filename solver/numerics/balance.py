"""The energy ledger: one row on a half step, from the states of all laws."""

import numpy as np
from numpy.typing import NDArray

from solver.numerics import toe
from solver.numerics.compiled import part_of_step
from solver.numerics.links import stored_in_blocks

Array = NDArray[np.float64]

#: Columns of the ledger's rows, and of the running sums of losses.
LEDGER = (
    "kinetic",
    "elastic_member",
    "plastic",
    "elastic_ground",
    "elastic_cushion",
    "cushion_loss",
    "elastic_springs",
    "work_of_gravity",
    "work_of_load",
    "absorbed_by_dashpots",
    "ground_static_loss",
    "ground_damping_loss",
    "impact_loss",
    "viscous",
)
#: One column more: kinetic and elastic energy on the whole step, which a wave of two steps' length cannot hide from.
WHOLE = len(LEDGER)
WORK, DASHPOTS, SLIP, DAMPING, IMPACT, PULL = range(6)


@part_of_step
def balance(row, rod, ground, bounds, rest, u, v, w, force, sums, dt):
    """One row of the ledger, on the half step ahead of the displacements `u` (columns: `LEDGER`).

    Stored energies and losses come from states. Elastic energy of the half step: that of now plus force x half of the
    coming elongation, which for a linear link is u(n) K u(n+1) / 2.
    """
    kinetic, before, gravity = 0.0, 0.0, 0.0
    for i in range(len(u)):
        kinetic += rod.mass[i] * w[i] * w[i]
        before += rod.mass[i] * v[i] * v[i]
        gravity += rod.weight[i] * (u[i] + 0.5 * dt * w[i] - rest[i])
    for i in range(len(rod.inertia)):
        turn = w[i + 1] - w[i]
        kinetic += rod.inertia[i] * turn * turn
    stored, lost, viscous = stored_in_blocks(rod, u, w, force, dt)
    row[WHOLE] = 0.25 * (kinetic + before) + stored
    for i in range(len(force)):
        stored += 0.5 * force[i] * dt * (w[i + 1] - w[i])
    soil = 0.0
    for j in range(len(ground.r)):
        soil += 0.5 * ground.r[j] * ground.r[j] * ground.par[2, j]
    for j in range(len(ground.power_nodes)):
        soil += 0.5 * ground.power[j, 0] * ground.power[j, 0] * ground.power[j, 3]
    for j in range(len(ground.radiation_nodes)):
        soil += 0.5 * ground.radiation[2, j] * ground.radiation[0, j] * ground.radiation[0, j]
    if len(bounds.toe_par) and bounds.toe_par[2] > 0.0:
        if bounds.toe_par[0] == toe.RADIATION:
            soil += 0.5 * bounds.toe_par[2] * bounds.toe_state[2] * bounds.toe_state[2]
        else:
            soil += 0.5 * bounds.toe_state[1] * bounds.toe_state[1] / bounds.toe_par[2]
    springs = 0.0
    for s in range(len(rod.special)):
        i = rod.special[s]
        middle = u[i] + 0.5 * dt * w[i]
        springs += 0.5 * rod.spring[s] * middle * middle
    cushion, taken = 0.0, 0.0
    for t in range(len(bounds.train_links)):
        if bounds.train_kinds[t] == 1:
            k, unloading, largest = bounds.train_par[t, 0], bounds.train_par[t, 1], bounds.train_state[t, 1]
            cushion += 0.5 * bounds.train_state[t, 2] ** 2 / unloading
            taken += 0.5 * k * largest * largest * (1.0 - k / unloading)
    row[0], row[1], row[2], row[3] = 0.5 * kinetic, stored, lost, soil
    row[4], row[5], row[6], row[7] = cushion, taken, springs, gravity
    row[8], row[9], row[10], row[11], row[12] = (
        sums[WORK],
        sums[DASHPOTS],
        sums[SLIP],
        sums[DAMPING],
        sums[IMPACT],
    )
    row[13] = viscous


#: Columns of what came in; all others are stored or lost, and together they close.
CAME_IN = ("work_of_gravity", "work_of_load")


def residual_of(start: Array, rows: Array) -> tuple[float, int]:
    """Largest share of the energy that does not close, and the row where it stands.

    `start` (columns,) is the ledger before the first step, `rows` (frames, columns) those since. The share is of the
    largest energy there was: brought in, stored or lost.
    """
    coming = [LEDGER.index(name) for name in CAME_IN]
    staying = [i for i in range(len(LEDGER)) if i not in coming]
    change = rows - start
    off = np.abs(change[:, staying].sum(axis=1) - change[:, coming].sum(axis=1))
    energies = np.abs(np.vstack([start, rows]))
    scale = float(max(energies[:, staying].sum(axis=1).max(), np.abs(change[:, coming]).max(), 1e-300))
    row = int(np.argmax(off))
    return float(off[row]) / scale, row


def moving_share(start: Array, rows: Array) -> tuple[float, int]:
    """How far the energy of motion exceeds all that came in, as a share of it, and the row."""
    there = _came_in(start, rows)
    off = np.maximum(rows[:, LEDGER.index("kinetic")] - there, 0.0)
    row = int(np.argmax(off))
    return float(off[row]) / max(float(there.max()), 1e-300), row


def _came_in(start: Array, rows: Array) -> Array:
    """All energy that was there and that came in until each row, J."""
    coming = [LEDGER.index(name) for name in CAME_IN]
    staying = [i for i in range(len(LEDGER)) if i not in coming]
    came = np.maximum(rows[:, coming] - start[coming], 0.0).sum(axis=1)
    return float(np.abs(start[staying]).sum()) + np.maximum.accumulate(came)


def growing_share(start: Array, rows: Array) -> tuple[float, int]:
    """How far the energy of the whole step has grown beyond all that came in, as a share of it, and the row.

    A wave of two steps' length, which no mesh carries, has no part in the balance of half steps; here it shows, and
    grows with the square of time. Short pulses lie above what came in as well, but stay where they are: those count
    as 0.
    """
    there = _came_in(start, rows)
    off = np.maximum(rows[:, WHOLE] - there, 0.0)
    middle, late = off[len(off) // 3 : 2 * len(off) // 3], off[2 * len(off) // 3 :]
    row = len(off) - len(late) + int(np.argmax(late))
    if not len(middle) or off[row] <= 2 * middle.max():
        return 0.0, row
    return float(off[row]) / max(float(there.max()), 1e-300), row

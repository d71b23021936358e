"""A driven pile integrated anew: ram, cushion, cap, pile cushion, uniform pile, Smith's shaft and toe (E. A. L.
Smith 1960).

Classical Runge-Kutta of fourth order in plain numpy with a step well below that of a wave through an element.
Shaft and toe are in rate form (dR/dt = k v unless R is at its strength and still loaded), the damping is
explicit, rest after the blow is a linear solve with the sliders frozen: none of the solver's half steps, implicit
parts, contact or settling. Compression and downward positive.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from scipy.linalg import solve as solve_dense

Array = NDArray[np.float64]
G = 9.80665


@dataclass(frozen=True)
class Cushion:
    """Loads along k d, unloads along (k/e^2) (d - (1 - e^2) largest); `stiffness` N/m."""

    stiffness: float
    restitution: float

    def force(self, d: float, largest: float) -> float:
        share = self.restitution**2
        return max(min(self.stiffness * d, self.stiffness / share * (d - (1 - share) * largest)), 0.0)


@dataclass(frozen=True)
class Pile:
    """Everything in SI units: EA (N), mass per length (kg/m), shaft as N/m and N per metre, toe strength N."""

    length: float
    axial: float
    line_mass: float
    ram: float
    cap: float
    speed: float
    cushion: Cushion
    pile_cushion: Cushion
    shaft: float
    shaft_from: float
    shaft_quake: float
    shaft_damping: float
    toe: float
    toe_quake: float
    toe_damping: float
    gravity: bool
    elements: int = 120


@dataclass(frozen=True)
class Blow:
    """What came out: time (s), force at the top of the pile and in its middle (N), largest toe movement and
    set (m, from rest).
    """

    time: Array
    head_force: Array
    middle_force: Array
    largest_toe: float
    set: float


class _Model:
    """Unknowns in one vector: displacements (ram, cap, nodes), velocities, shaft resistances, plastic
    movement of the toe.
    """

    def __init__(self, pile: Pile) -> None:
        self.pile, n = pile, pile.elements + 1
        dx = pile.length / pile.elements
        x = np.linspace(0, pile.length, n)
        weight = np.full(n, dx)
        weight[[0, -1]] /= 2
        self.mass = np.concatenate([[pile.ram, pile.cap], pile.line_mass * weight])
        self.k = pile.axial / dx
        inside = np.clip(
            np.minimum(x + dx / 2, pile.length) - np.maximum(x - dx / 2, pile.shaft_from), 0, None
        )
        self.strength = pile.shaft * inside
        self.spring = self.strength / pile.shaft_quake
        self.toe_spring = pile.toe / pile.toe_quake
        self.g = G if pile.gravity else 0.0
        self.n = n
        self.most = np.zeros(2)

    def at_rest(self) -> Array:
        """Static equilibrium under gravity, nothing slipping; the ram just touches, at its speed."""
        weights = self.g * self.mass[2:]
        weights[0] += self.g * self.pile.cap
        u = self._statics(weights, np.zeros(self.n), 0.0)
        pressed = self.g * self.pile.cap / self.pile.pile_cushion.stiffness
        top = u[0] + pressed
        v = np.zeros(self.n + 2)
        v[0] = self.pile.speed
        self.rest = u
        return np.concatenate([[top, top], u, v, self.spring * u, [0.0]])

    def _statics(self, pull: Array, plastic: Array, toe_plastic: float) -> Array:
        """Displacements where the springs hold `pull` (N), sliders frozen at their plastic movements (m)."""
        matrix = np.diag(self.spring.copy())
        i = np.arange(self.n - 1)
        matrix[i, i] += self.k
        matrix[i + 1, i + 1] += self.k
        matrix[i, i + 1] -= self.k
        matrix[i + 1, i] -= self.k
        matrix[-1, -1] += self.toe_spring
        right = pull + self.spring * plastic
        right[-1] += self.toe_spring * toe_plastic
        return np.asarray(solve_dense(matrix, right, assume_a="pos"))

    def forces(self, y: Array) -> tuple[float, float]:
        """Cushion forces above and below the cap, N."""
        p, d = self.pile, (y[0] - y[1], y[1] - y[2])
        return p.cushion.force(d[0], max(d[0], self.most[0])), p.pile_cushion.force(
            d[1], max(d[1], self.most[1])
        )

    def rates(self, y: Array) -> Array:
        n, p = self.n, self.pile
        u, v = y[2 : n + 2], y[n + 4 : 2 * n + 4]
        r, plastic = y[2 * n + 4 : 3 * n + 4], y[-1]
        above, below = self.forces(y)
        toe = min(max(self.toe_spring * (u[-1] - plastic), 0.0), p.toe)
        force = -r - p.shaft_damping * np.abs(r) * v
        force[:-1] -= self.k * (u[:-1] - u[1:])
        force[1:] += self.k * (u[:-1] - u[1:])
        force[0] += below
        force[-1] -= toe * (1 + p.toe_damping * v[-1])
        held = (np.abs(r) >= self.strength) & (r * v > 0)
        slips = toe >= p.toe and v[-1] > 0
        return np.concatenate(
            [
                y[n + 2 : 2 * n + 4],
                np.concatenate([[-above, above - below], force]) / self.mass + self.g,
                np.where(held, 0.0, self.spring * v),
                [v[-1] if slips else 0.0],
            ]
        )

    def after_step(self, y: Array) -> None:
        self.most = np.maximum(self.most, [y[0] - y[1], y[1] - y[2]])
        r = y[2 * self.n + 4 : 3 * self.n + 4]
        np.clip(r, -self.strength, self.strength, out=r)

    def settled(self, y: Array) -> Array:
        """Rest after the blow: cap still on the pile, ram gone, no resistance driven further. Raises if
        it would slip more.
        """
        n = self.n
        u, r = y[2 : n + 2], y[2 * n + 4 : 3 * n + 4]
        plastic = u - np.divide(r, self.spring, out=np.zeros(n), where=self.spring > 0)
        weights = self.g * self.mass[2:]
        weights[0] += self.g * self.pile.cap
        rest = self._statics(weights, plastic, y[-1])
        resistance = self.spring * (rest - plastic)
        if (np.abs(resistance) > self.strength * (1 + 1e-9)).any() or rest[-1] < y[-1]:
            raise ArithmeticError(
                "the ground would slip further while the pile comes to rest: integrate for longer"
            )
        return rest


def strike(pile: Pile, until: float, courant: float = 0.4) -> Blow:
    """Integrate one blow until a time (s)."""
    model = _Model(pile)
    y = model.at_rest()
    dt = courant * pile.length / pile.elements / np.sqrt(pile.axial / pile.line_mass)
    steps, middle = int(until / dt), 2 + pile.elements // 2
    rows = np.zeros((steps, 3))
    for i in range(steps):
        rows[i] = model.forces(y)[1], model.k * (y[middle - 1] - y[middle + 1]) / 2, y[model.n + 1]
        a = model.rates(y)
        b = model.rates(y + dt / 2 * a)
        c = model.rates(y + dt / 2 * b)
        d = model.rates(y + dt * c)
        y = y + dt / 6 * (a + 2 * b + 2 * c + d)
        model.after_step(y)
    rest = model.settled(y)
    return Blow(
        time=np.arange(steps) * dt,
        head_force=rows[:, 0],
        middle_force=rows[:, 1],
        largest_toe=float(rows[:, 2].max() - model.rest[-1]),
        set=float(rest[-1] - model.rest[-1]),
    )

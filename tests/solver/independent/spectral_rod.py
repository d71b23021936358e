"""A layered rod in elements of high order (Gauss-Lobatto points, diagonal mass), handed to
`scipy.integrate.solve_ivp`.

Spectral elements converge exponentially for smooth waves (Patera 1984; Komatitsch and Vilotte 1998, from memory),
and the time integration chooses its own steps at a tight tolerance: space and time both differ from the solver's.
Tension positive, free far end.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.polynomial import legendre
from numpy.typing import NDArray
from scipy.integrate import solve_ivp

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Layer:
    """A uniform piece: length (m), E (Pa), density (kg/m3), area (m2), elements; yield stress and slope
    beyond it (Pa).
    """

    length: float
    young_modulus: float
    density: float
    area: float
    elements: int
    yield_stress: float = np.inf
    hardening_modulus: float = 0.0


@dataclass(frozen=True)
class Motion:
    """At the times asked for: `velocity` (nodes, times) at `position` (nodes,) and `stress` (elements, order
    + 1, times) at `points` (elements, order + 1).
    """

    position: Array
    velocity: Array
    points: Array
    stress: Array

    def at(self, place: float) -> tuple[Array, Array]:
        """Velocity (m/s) and stress (Pa) over time at a border of elements, the stress as the mean of both sides."""
        node = int(np.argmin(np.abs(self.position - place)))
        sides = np.abs(self.points - place) < 1e-9
        if np.count_nonzero(sides) != 2:
            raise ValueError(f"{place:g} m is no border of two elements")
        return self.velocity[node], self.stress[sides].mean(axis=0)


def lobatto(order: int) -> tuple[Array, Array, Array]:
    """Points and weights on [-1, 1], and the matrix that turns values at the points into their derivative there."""
    last = legendre.Legendre.basis(order)
    x = np.concatenate([[-1.0], np.sort(last.deriv().roots().real), [1.0]])
    weights = 2 / (order * (order + 1) * last(x) ** 2)
    slope = np.zeros((order + 1, order + 1))
    for i in range(order + 1):
        cardinal = np.zeros(order + 1)
        cardinal[i] = 1.0
        slope[:, i] = legendre.legval(x, legendre.legder(legendre.legfit(x, cardinal, order)))
    return x, weights, slope


def integrate(
    layers: Sequence[Layer],
    push: Callable[[float], float],
    times: Array,
    order: int = 8,
    tolerance: float = 1e-9,
) -> Motion:
    """Solve the rod under `push(t)` (N, compression) on its first face.

    Stress and yield stress at every point are unknowns of the system beside displacement and velocity, in rate form:
    d(stress)/dt = E d(strain)/dt, or the hardening modulus where the point yields (isotropic hardening).
    """
    x, weights, slope = lobatto(order)
    sizes = np.concatenate([np.full(layer.elements, layer.length / layer.elements) for layer in layers])
    count = len(sizes)

    def per_element(name: str) -> Array:
        return np.concatenate([np.full(layer.elements, getattr(layer, name)) for layer in layers])[:, None]

    area, young, first_yield, hardening = (
        per_element(k) for k in ("area", "young_modulus", "yield_stress", "hardening_modulus")
    )
    starts = np.concatenate([[0.0], np.cumsum(sizes)[:-1]])
    nodes = np.arange(count)[:, None] * order + np.arange(order + 1)[None, :]
    total = count * order + 1
    position = np.zeros(total)
    position[nodes] = starts[:, None] + (x[None, :] + 1) / 2 * sizes[:, None]
    mass = np.zeros(total)
    np.add.at(mass, nodes, per_element("density") * area * weights[None, :] * sizes[:, None] / 2)
    points = nodes.size

    def rates(t: float, y: Array) -> Array:
        v, stress = y[:total], y[total : total + points].reshape(nodes.shape)
        limit = y[total + points :].reshape(nodes.shape)
        strain_rate = v[nodes] @ slope.T * (2 / sizes)[:, None]
        yields = (np.abs(stress) >= limit) & (stress * strain_rate > 0)
        tangent = np.where(yields, hardening, young)
        force = np.zeros(total)
        np.add.at(force, nodes, -(area * stress * weights) @ slope)
        force[0] += push(t)
        growth = np.where(yields, hardening * np.abs(strain_rate), 0.0)
        return np.concatenate([force / mass, (tangent * strain_rate).ravel(), growth.ravel()])

    start = np.zeros(total + 2 * points)
    limits = np.where(np.isfinite(first_yield), first_yield, 1e300) * np.ones(nodes.shape)
    start[total + points :] = limits.ravel()
    # velocities of the order of 1 m/s and stresses of 1 MPa are what the tolerance is a share of
    scale = np.concatenate([np.ones(total), np.full(2 * points, 1e6)])
    found = solve_ivp(rates, (0.0, times[-1]), start, "DOP853", times, rtol=tolerance, atol=tolerance * scale)
    assert found.success
    stress = found.y[total : total + points].reshape(*nodes.shape, -1)
    return Motion(position, found.y[:total], position[nodes], stress)

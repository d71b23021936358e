"""Stiffness, mass and wave speed along a segment, and the elements that a wave crosses in equal times."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from solver.model.material import Material
from solver.model.member import Segment

Array = NDArray[np.float64]


def profile_along(
    segment: Segment, materials: dict[str, Material], fraction: Array
) -> tuple[Array, Array, Array]:
    """EA (N), mass per length (kg/m) and stress area (m2) at fractions 0..1 of a segment's length.

    A taper is linear in its dimensions, so areas are quadratic in the fraction: three sections fix them.
    """
    if segment.end_section is None:
        ones = np.ones_like(fraction)
        axial_of_all, mass_of_all = _uniform(segment, materials)
        young = materials[segment.material].young_modulus
        return axial_of_all * ones, mass_of_all * ones, axial_of_all / young * ones
    first, last = segment.section, segment.end_section
    ends = first.model_dump(), last.model_dump()
    middle = type(first)(
        **{k: (v + ends[1][k]) / 2 if isinstance(v, float) else v for k, v in ends[0].items()}
    )
    material = materials[segment.material]
    at = np.array([0.0, 0.5, 1.0])
    areas = [s.area for s in (first, middle, last)]
    axial, mass = material.young_modulus * np.array(areas), material.density * np.array(areas)
    if first.shape == "filled_pipe":
        fill = materials[first.fill]
        fills = np.array([s.fill_area for s in (first, middle, last)])  # type: ignore[union-attr]
        axial, mass = axial + fill.young_modulus * fills, mass + fill.density * fills
    lagrange = [_parabola(at, i, fraction) for i in range(3)]
    axial_at = sum(a * w for a, w in zip(axial, lagrange, strict=True))
    mass_at = sum(a * w for a, w in zip(mass, lagrange, strict=True))
    return axial_at, mass_at, axial_at / material.young_modulus


def _uniform(segment: Segment, materials: dict[str, Material]) -> tuple[float, float]:
    """EA and mass per length of a segment without a taper."""
    section, material = segment.section, materials[segment.material]
    axial, mass = material.young_modulus * section.area, material.density * section.area
    if section.shape == "filled_pipe":
        fill = materials[section.fill]
        axial, mass = axial + fill.young_modulus * section.fill_area, mass + fill.density * section.fill_area
    return axial, mass


def _parabola(at: Array, i: int, x: Array) -> Array:
    others = [at[j] for j in range(3) if j != i]
    return (x - others[0]) * (x - others[1]) / ((at[i] - others[0]) * (at[i] - others[1]))


def equal_transit(segment: Segment, materials: dict[str, Material], n: int) -> Array:
    """Edges of `n` elements as fractions of a segment's length, so that a wave takes equally long through each.

    They are equally long but in a tapered filled pipe, whose wave speed changes along it.
    """
    even = np.arange(n + 1) / n
    if segment.end_section is None or segment.section.shape != "filled_pipe":
        return even
    fine = np.linspace(0, 1, 16 * n + 1)
    axial, mass, _ = profile_along(segment, materials, (fine[1:] + fine[:-1]) / 2)
    passed = np.concatenate(([0.0], np.cumsum(np.sqrt(mass / axial))))
    edges = np.interp(even * passed[-1], passed, fine)
    edges[-1] = 1.0
    return edges

"""(Ix + Iy)/A of every shape, which lateral inertia takes, against sums over a fine grid of points in the section."""

from __future__ import annotations

from math import sqrt
from typing import Any

import numpy as np
import pytest
from pydantic import TypeAdapter

from solver.model.section import AnySection

#: Points across the section: sums over so many small squares are near to the integral by their share of the rim.
ACROSS = 1200
X, Y = np.meshgrid(*2 * [(np.arange(ACROSS) + 0.5) / ACROSS - 0.5])
R = np.hypot(X, Y)


def octagon(across: float) -> np.ndarray:
    half = across / 2
    return (np.maximum(abs(X), abs(Y)) <= half) & ((abs(X) + abs(Y)) / sqrt(2) <= half)


def h(depth: float, width: float, flange: float, web: float) -> np.ndarray:
    inside = (abs(Y) <= depth / 2) & (abs(X) <= width / 2)
    return inside & ((abs(Y) >= depth / 2 - flange) | (abs(X) <= web / 2))


SHAPES: list[tuple[dict[str, Any], np.ndarray]] = [
    ({"shape": "solid_round", "diameter": 0.8}, R <= 0.4),
    ({"shape": "pipe", "outer_diameter": 0.8, "wall": 0.1}, (R <= 0.4) & (R >= 0.3)),
    ({"shape": "rectangle", "width": 0.5, "depth": 0.8}, (abs(X) <= 0.25) & (abs(Y) <= 0.4)),
    ({"shape": "octagon", "across_flats": 0.8}, octagon(0.8)),
    ({"shape": "h", "depth": 0.8, "flange_width": 0.6, "flange": 0.1, "web": 0.05}, h(0.8, 0.6, 0.1, 0.05)),
    (
        {"shape": "voided_square", "width": 0.8, "void_diameter": 0.5},
        (abs(X) <= 0.4) & (abs(Y) <= 0.4) & (R >= 0.25),
    ),
]


@pytest.mark.parametrize(("given", "inside"), SHAPES, ids=[str(s["shape"]) for s, _ in SHAPES])
def test_area_and_polar_radius_are_those_of_the_shape(given: dict[str, Any], inside: np.ndarray) -> None:
    """To 0.5 %: squares cut by a rim 1/1200 wide against parts 1/20 thick and more."""
    section: Any = TypeAdapter(AnySection).validate_python(given)
    assert section.area == pytest.approx(inside.sum() / ACROSS**2, rel=5e-3)
    assert section.polar_radius_squared == pytest.approx(float((R[inside] ** 2).mean()), rel=5e-3)

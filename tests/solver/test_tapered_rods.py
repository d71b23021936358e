"""A cone, where waves are spherical: the one taper with a closed form of its own."""

from __future__ import annotations

import numpy as np
import pytest

from tests.published.rods import DENSITY, C, E, material, part, pulse, solved

# distance of the struck end from the cone's apex, m; length, m; diameter per distance
TOP, LENGTH, SLOPE = (
    4.0,
    8.0,
    0.05,
)
PEAK, DURATION = 1e6, 0.8e-3


def cone(widening: bool) -> dict:
    """The stretch of the cone from 4 m to 12 m from its apex, struck at either end."""
    near, far = ({"shape": "solid_round", "diameter": SLOPE * r} for r in (TOP, TOP + LENGTH))
    return part(LENGTH, section=near if widening else far, end_section=far if widening else near)


def exact_velocity(first: float, place: float, away: float, t: np.ndarray) -> np.ndarray:
    """Velocity at the distance `place` from the apex under a haversine of force at `first` (m), until an echo
    comes, m/s.

    u = f(c t - away (r - first))/r solves (r^2 u_r)_r = r^2 u_tt/c^2 (spherical waves; d'Alembert for r u).
    `away` is 1 for waves that run away from the apex and -1 towards it. With s = c t: the force E A u_r at
    `first` gives f' + away f/first = P(s), integrated in closed form by parts would be long; here by the
    trapezoid rule on 20,000 points (error 1e-8).
    """
    s = np.linspace(0, C * t[-1], 20_001)
    area = np.pi * (SLOPE * first) ** 2 / 4
    push = PEAK * np.where(s < C * DURATION, np.sin(np.pi * s / (C * DURATION)) ** 2, 0.0)
    source = push * first / (E * area)
    growth = np.exp(away * s / first)
    integral = np.concatenate(
        [[0.0], np.cumsum((source * growth)[1:] + (source * growth)[:-1]) * (s[1] - s[0]) / 2]
    )
    f = integral / growth
    rate = source - away * f / first
    return np.interp(C * t - abs(place - first), s, rate, left=0.0) * C / place


@pytest.mark.parametrize("widening", [True, False])
def test_spherical_waves_in_a_cone(widening: bool) -> None:
    """Velocity at two places until the echo of the far end: within 1e-3 of the peak, the square of the element's
    share of r.

    A rod of elements with their middle's area is a rod of 400 small steps; halving them quarters the difference.
    """
    first = TOP if widening else TOP + LENGTH
    away = 1.0 if widening else -1.0
    errors = []
    for dx in (0.02, 0.01):
        result = solved(
            pulse("haversine", DURATION, PEAK),
            cone(widening),
            gauges={"a": 2.0, "b": 6.0},
            duration=LENGTH / C * 1.1,
            dx=dx,
        )
        worst = 0.0
        for gauge, limit in ((result.gauges["a"], 1.75), (result.gauges["b"], 1.25)):
            seen = gauge.time < limit * LENGTH / C
            place = first + away * gauge.position
            exact = exact_velocity(first, place, away, gauge.time[seen])
            worst = max(worst, float(np.abs(gauge.velocity[seen] - exact).max() / np.abs(exact).max()))
        errors.append(worst)
    assert errors[0] < 1e-3
    assert errors[1] < 0.3 * errors[0]


@pytest.mark.parametrize("shape", ["solid_round", "octagon", "rectangle"])
def test_mass_and_stiffness_of_a_taper(shape: str) -> None:
    """Thrown freely, a taper moves with its whole mass: impulse over volume x density (areas are quadratic along
    it), to 1e-6, the square of an element's share; the mean force of the pulse is half its peak.
    """
    ends = {
        "solid_round": ({"diameter": 0.2}, {"diameter": 0.1}),
        "octagon": ({"across_flats": 0.2}, {"across_flats": 0.1}),
        "rectangle": ({"width": 0.2, "depth": 0.1}, {"width": 0.1, "depth": 0.1}),
    }[shape]
    top, bottom = ({"shape": shape, **end} for end in ends)
    result = solved(
        pulse("haversine", 1e-3),
        part(4.0, section=top, end_section=bottom, of="m"),
        materials=[material("m")],
        duration=0.05,
        dx=0.01,
    )
    factor = {"solid_round": np.pi / 4, "octagon": 2 * (np.sqrt(2) - 1), "rectangle": 1.0}[shape]
    mean = 0.015 if shape == "rectangle" else (0.2**2 + 0.2 * 0.1 + 0.1**2) / 3
    speed = 1e6 * 1e-3 / 2 / (DENSITY * factor * mean * 4.0)
    shown = result.fields.displacement[:, result.fields.displacement.shape[1] // 2]
    late = result.fields.time > 0.01
    fitted = np.polyfit(result.fields.time[late], shown[late], 1)[0]
    assert fitted == pytest.approx(speed, rel=2e-3)  # what rings on about the mean leaves that much in a fit

"""How fast answers approach the truth on finer meshes: what theory says below Courant number 1, and exactness at
1.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from numpy.typing import NDArray

from solver import Result
from solver.model.load import Pulse
from solver.numerics.chain import build_chain
from solver.run import solve_chain
from tests.published.rods import LENGTH, C, case_of, part, pulse

PEAK, DURATION, PLACE = 1e6, 0.0006, 7.5  # the gauge: on a node of every mesh here


def solved_at(name: str, elements: int, courant: float) -> Result:
    """The round-number rod with a matched end under one pulse, at a Courant number of our choosing."""
    case = case_of(
        pulse(name, DURATION, PEAK),
        gauges={"g": PLACE},
        far_end="matched",
        duration=0.0025,
        dx=LENGTH / elements,
    )
    chain = build_chain(case)
    assert chain.courant_worst == 1.0
    return solve_chain(replace(chain, dt=courant * chain.dt))


def curve(name: str, t: NDArray[np.float64]) -> NDArray[np.float64]:
    """The pulse of peak 1; d'Alembert carries it unchanged."""
    inside = (t >= 0) & (t <= DURATION)
    shapes = {
        "haversine": np.sin(np.pi * t / DURATION) ** 2,
        "half_sine": np.sin(np.pi * t / DURATION),
        "rectangle": 1.0 + 0 * t,
    }
    return np.where(inside, shapes[name], 0.0)


def root_mean_square(name: str, elements: int, courant: float) -> float:
    result = solved_at(name, elements, courant)
    gauge = result.gauges["g"]
    off = -gauge.force / PEAK - curve(name, gauge.time - PLACE / C)
    return float(np.sqrt(np.sum(off**2) * result.time_step / DURATION))


@pytest.mark.parametrize(("name", "order"), [("haversine", 5 / 3), ("half_sine", 1.0), ("rectangle", 1 / 3)])
@pytest.mark.parametrize("courant", [0.9, 0.7])
def test_below_courant_1_the_order_is_that_of_a_dispersive_scheme(
    name: str, order: float, courant: float
) -> None:
    """A dispersive scheme of order p = 2 converges in the mean square with s p/(p + 1), where s = 1/2, 3/2, 5/2
    for a pulse that jumps, kinks, or bends abruptly (Brenner, Thomee and Wahlbin 1975, from memory): 1/3, 1 and
    5/3.

    Within 0.1 of that: the figures of two meshes still hold a little of the next term.
    """
    coarse, fine = (root_mean_square(name, n, courant) for n in (400, 1600))
    assert np.log2(coarse / fine) / 2 == pytest.approx(order, abs=0.1)


@pytest.mark.parametrize(("name", "order"), [("haversine", 2.0), ("half_sine", 1.5), ("rectangle", 0.5)])
def test_at_courant_1_only_the_averaging_over_a_cell_is_left(name: str, order: float) -> None:
    """Point values against cell averages: h^2 f'' where f is smooth, h on a stretch of length h at a kink
    (h^(3/2) in the mean square), 1 on a stretch of length h at a jump (h^(1/2)). Within 0.02: there is no other
    error.
    """
    coarse, fine = (root_mean_square(name, n, 1.0) for n in (400, 1600))
    assert np.log2(coarse / fine) / 2 == pytest.approx(order, abs=0.02)


@pytest.mark.parametrize("name", ["haversine", "half_sine", "rectangle"])
@pytest.mark.parametrize("elements", [200, 400, 800])
def test_at_courant_1_cell_averages_are_exact_on_every_mesh(name: str, elements: int) -> None:
    """Mean over +-dt of d'Alembert's solution, by the trapezoid rule on 2,000 points between the pulse's own kinks.

    1e-6 of the peak is what that rule leaves (tests/published meets the closed integrals to 1e-10).
    """
    result = solved_at(name, elements, 1.0)
    gauge, dt = result.gauges["g"], result.time_step
    load = Pulse(kind="pulse", quantity="force", shape=name, peak=1.0, duration=DURATION)
    assert load.start == 0.0
    for n in np.flatnonzero(np.abs(gauge.force) > 0)[::7]:
        first, last = (gauge.time[n] - PLACE / C + k * dt for k in (-1, 1))
        low, high = np.clip([first, last], 0.0, DURATION)
        t = np.linspace(low, high, 2001)
        mean = np.trapezoid(curve(name, np.clip(t, 0.0, DURATION)), t) / (2 * dt)
        assert -gauge.force[n] / PEAK == pytest.approx(mean, abs=1e-6)


def test_on_two_segments_with_a_common_divisor_halving_changes_nothing() -> None:
    """Displacements of nodes are exact, so that gauges on nodes agree on all meshes at the times they share,
    to round-off (1e-12 of the largest movement).
    """
    records = []
    for dx in (0.1, 0.05, 0.025):
        case = case_of(
            pulse("half_sine", DURATION, PEAK),
            part(4.0),
            part(6.0, area=0.004),
            gauges={"a": 2.0, "b": 7.0},
            duration=0.012,
            dx=dx,
        )
        records.append(solve_chain(build_chain(case)))
    for name in ("a", "b"):
        coarse, *finer = (r.gauges[name].displacement for r in records)
        for factor, other in zip((2, 4), finer, strict=True):
            shared = other[::factor][: len(coarse)]
            assert np.abs(shared - coarse[: len(shared)]).max() < 1e-12 * np.abs(coarse).max()

"""Love's rod: what passes through a section, N = E A u_x + rho A (nu r_p)^2 u_xtt, the natural boundary term of his
equation (Love 1927, Mathematical Theory of Elasticity, art. 278; Graff 1975, Wave Motion in Elastic Solids, 2.6)."""

from __future__ import annotations

import numpy as np
import pytest

from solver import Result, solve
from tests.published.rods import DENSITY, C, E, case_of, material, part

LENGTH, DIAMETER, POISSON, PEAK, DURATION = 4.0, 0.1, 0.33, 1e6, 60e-6
AREA = np.pi * DIAMETER**2 / 4
#: (nu r_p)^2 of a round bar, whose polar radius of gyration is d / sqrt(8).
BULGE = POISSON**2 * DIAMETER**2 / 8


@pytest.fixture(scope="module")
def struck() -> Result:
    """A haversine of 60 µs pushes a round bar of 100 mm, watched until just before its far end answers."""
    push = {"kind": "pulse", "quantity": "force", "shape": "haversine", "peak": PEAK, "duration": DURATION}
    bar = part(LENGTH, section={"shape": "solid_round", "diameter": DIAMETER}, of="bar")
    return solve(
        case_of(
            push,
            bar,
            materials=[material("bar", E, DENSITY, poisson_ratio=POISSON)],
            gauges={"end": 0.0, "inside": 1.0},
            duration=0.95 * LENGTH / C,
            dx=0.0025,
            lateral_inertia=True,
        )
    )


def test_the_loaded_end_reads_its_load(struck: Result) -> None:
    """The load over a step is its mean over the steps on either side: at 0.5 µs a step, 1e-4 of a 60 µs haversine."""
    gauge = struck.gauges["end"]
    load = np.where(gauge.time < DURATION, PEAK * np.sin(np.pi * gauge.time / DURATION) ** 2, 0.0)
    assert np.max(np.abs(-gauge.force - load)) < 3e-4 * PEAK


def test_the_work_that_passes_the_end_is_that_of_the_load(struck: Result) -> None:
    """Trapezoids over a smooth pulse of 120 steps; what the ledger says entered."""
    gauge = struck.gauges["end"]
    passed = np.trapezoid(-gauge.force * gauge.velocity, gauge.time)
    assert passed == pytest.approx(struck.ledger.parts["work_of_load"][-1], rel=1e-6)


def test_force_and_velocity_inside_are_those_of_its_spectrum(struck: Result) -> None:
    """Half-infinite rod by Fourier: N(x) = N(0) exp(-ikx) with k = w/c0 / sqrt(1 - (nu r_p w/c0)^2), and v =
    -k N / (rho A w) from rho A v_t = N_x. 0.3 %, of which the mesh of second order takes most."""
    gauge = struck.gauges["inside"]
    n = 1 << 15
    dt = gauge.time[1] - gauge.time[0]
    time = dt * np.arange(n)
    load = np.where(time < DURATION, -PEAK * np.sin(np.pi * time / DURATION) ** 2, 0.0)
    w = 2 * np.pi * np.fft.rfftfreq(n, dt)
    root = 1 - BULGE * (w / C) ** 2
    # above this frequency Love's rod carries no wave: what is there of the load dies out near the end
    k = (w / C) / np.sqrt(np.where(np.abs(root) > 1e-12, root, 1e-12).astype(complex))
    k = np.where(root > 0, k, -1j * np.abs(k))
    passed = np.fft.rfft(load) * np.exp(-1j * k)
    force = np.fft.irfft(passed, n)[: len(gauge.time)]
    ratio = np.divide(k, w, out=np.full(len(w), 1 / C, dtype=complex), where=w > 0)
    velocity = np.fft.irfft(-passed * ratio / (DENSITY * AREA), n)[: len(gauge.time)]
    assert np.max(np.abs(gauge.force - force)) < 3e-3 * PEAK
    assert np.max(np.abs(gauge.velocity - velocity)) < 3e-3 * PEAK / (DENSITY * C * AREA)
    # a strain gauge feels u_x alone: E A u_x = N / (1 - (nu r_p w/c0)^2)
    strain = np.fft.irfft(np.divide(passed, root, out=np.zeros_like(passed), where=root > 0.1), n)[
        : len(gauge.time)
    ] / (E * AREA)
    assert np.max(np.abs(gauge.strain - strain)) < 3e-3 * PEAK / (E * AREA)

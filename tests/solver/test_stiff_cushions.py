"""A ram on a cushion on a long rod, from soft to as good as none: peaks within 0.5 %; and a front on a stiff spring."""

from __future__ import annotations

import numpy as np
import pytest
from scipy.integrate import solve_ivp

from solver import solve
from tests.published.rods import AREA, Z, case_of, material, part, pulse, solved

SPEED = 3.0


def largest_force(ram: float, stiffness: float) -> float:
    """Closed form: M v' = -F, F' = k (v - F/Z), from v = V and F = 0; a damped oscillator F'' + (k/Z) F' + (k/M)
    F = 0 with F'(0) = k V. Largest F, N, where F' = 0.
    """
    damping, stiff = stiffness / Z / 2, stiffness / ram
    root = np.emath.sqrt(damping**2 - stiff)
    fast = damping + root
    slow = stiff / fast  # the product of both roots is k/M: no difference of nearly equal numbers
    t = np.log(fast / slow) / (fast - slow)
    force = stiffness * SPEED / (fast - slow) * (np.exp(-slow * t) - np.exp(-fast * t))
    return float(np.real(force))


@pytest.mark.parametrize("ram", [500.0, 2000.0])
@pytest.mark.parametrize("stiffness", [1e8, 1e9, 1e10, 1e11, 3e11, 1e12, 1e13, 1e30])
def test_peak_force_at_gauge_and_in_the_envelope(ram: float, stiffness: float) -> None:
    """0.5 % at the struck end and in every element (required); restitution plays no part before the peak.

    1e12 N/m is 12 EA/dx of the usual 400 elements: the program then takes more of them, up to 4,000. A stiffer one
    rises within a step: it is none, and is marched as the stiffest that the step resolves.
    """
    peaks_agree(ram, stiffness)


@pytest.mark.parametrize("stiffness", [1e10, 1e11, 1e12])
def test_a_light_ram_whose_blow_is_nearly_over_as_the_cushion_is_pressed(stiffness: float) -> None:
    """50 kg, the mass of 0.6 m of the rod: rise and fall take equally long, so the peak wants a finer mesh."""
    peaks_agree(50.0, stiffness)


def peaks_agree(ram: float, stiffness: float) -> None:
    drop = {
        "kind": "drop",
        "ram_mass": ram,
        "impact_velocity": SPEED,
        "cushion": {"stiffness": stiffness, "restitution": 0.3},
    }
    result = solved(
        drop, far_end="matched", gauges={"head": 0.0}, duration=0.012 if stiffness < 1e9 else 0.0025
    )
    expected = largest_force(ram, stiffness)
    assert -result.gauges["head"].force.min() == pytest.approx(expected, rel=0.005)
    assert result.peak_compression.value * AREA == pytest.approx(expected, rel=0.005)
    assert result.head_train is not None
    assert result.head_train.cushion_force.max() == pytest.approx(expected, rel=0.005)


def test_the_closed_form_against_its_own_equations() -> None:
    """Integrated by scipy to 1e-9: the formula above is not the solver's, and not mistyped."""
    for ram, stiffness in ((500.0, 1e9), (2000.0, 1e8), (2000.0, 1e10)):

        def rates(t: float, y: np.ndarray, m: float = ram, k: float = stiffness) -> list[float]:
            return [-y[1] / m, k * (y[0] - y[1] / Z)]

        found = solve_ivp(rates, (0, 0.02), [SPEED, 0.0], "Radau", rtol=1e-10, atol=1e-6, dense_output=True)
        t = np.linspace(0, 0.02, 400_001)
        assert found.sol(t)[1].max() == pytest.approx(largest_force(ram, stiffness), rel=1e-5)


@pytest.mark.parametrize("stiffness", [1e11, 3e11, 1e12])
@pytest.mark.parametrize("kind", ["rod that flies", "rectangle"])
def test_a_sudden_front_on_a_stiff_spring(stiffness: float, kind: str) -> None:
    """A rod at 3 m/s, and a rectangular pulse, against a spring of 1 to 12 EA/dx of the usual mesh: it is pressed by
    up to E v/c, and by twice the pulse, in every element (to 1e-9). Once single elements rang by 20 %.
    """
    end = {"kind": "spring", "stiffness": stiffness}
    if kind == "rectangle":
        result, expected = solved(pulse("rectangle", 0.001), far_end=end, duration=0.005), 2e6
    else:
        result, expected = (
            solved({"kind": "none"}, far_end=end, initial_velocity=SPEED, duration=0.005),
            Z * SPEED,
        )
    assert result.peak_compression.value * AREA == pytest.approx(expected, rel=1e-9)


def test_a_light_cap_on_the_bare_head_finds_elements_that_are_light_beside_it() -> None:
    """A cap of 13 kg bounces on a timber pile of 620 kg: peaks of 60 ms within 1.5 % of those on a mesh twice as fine.
    (Its bounces differ a little on every mesh, and so do peaks, by 1 %.) On 400 elements they were 6 % low.
    """
    timber = material("timber", 12e9, 800.0)
    drop = {
        "kind": "drop",
        "ram_mass": 134.0,
        "impact_velocity": 2.5,
        "cushion": {"stiffness": 5.5e8, "restitution": 0.37},
        "cap_mass": 13.4,
    }
    ground = {
        "surface": 3.7,
        "shaft_total": {"resistance": 720e3, "distribution": "uniform", "quake": 0.005, "damping": 0.05},
        "toe": {"resistance": 140e3, "quake": 0.005, "damping": 0.2},
    }
    pile = part(7.73, 0.1, "timber")
    case = case_of(
        drop, pile, far_end="ground", ground=ground, gravity=True, duration=0.06, materials=[timber]
    )
    usual = solve(case)
    finer = solve(case, element_length=7.73 / usual.elements / 2)
    for peak in ("peak_compression", "peak_tension"):
        assert getattr(usual, peak).value == pytest.approx(getattr(finer, peak).value, rel=0.015)

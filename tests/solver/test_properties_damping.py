"""More damping never raises the energy that comes back - where that is a law.

It is none everywhere: a dashpot beyond the rod's impedance reflects more the larger it is, and a very viscous rod
moves as one rigid piece and loses nothing. The cases here keep to the side where damping is below the impedance
that it meets.
"""

from __future__ import annotations

import numpy as np
from hypothesis import given
from hypothesis import strategies as st

from solver import Result, solve
from tests.published.rods import LENGTH, C, Z, case_of, material, part, pulse, solved
from tests.solver.strategies import between

SHAPES = st.sampled_from(["half_sine", "haversine", "triangle", "rectangle"])
LESS_AND_MORE = st.tuples(between(0, 1), between(0, 1)).map(sorted)
DURATION = 0.8e-3
BACK = 2 * LENGTH / C + DURATION  # until the whole echo has passed a gauge at the struck end


def energy_of_the_echo(result: Result) -> float:
    """Energy of the up-going wave at the gauge in the middle after the pulse has passed it downwards, sum
    F_up^2/Z dt, J.
    """
    gauge = result.gauges["middle"]
    late = gauge.time > LENGTH / 2 / C + DURATION * 1.05
    return float(np.sum(gauge.up_wave[late] ** 2) / gauge.impedance * result.time_step)


def echo(shape: str, **more: object) -> float:
    result = solved(
        pulse(shape, DURATION),
        *more.pop("parts", ()),
        gauges={"middle": LENGTH / 2},
        duration=BACK - LENGTH / 2 / C,
        dx=0.1,
        **more,
    )
    return energy_of_the_echo(result)


@given(SHAPES, LESS_AND_MORE)
def test_dashpot_at_the_far_end_up_to_the_impedance(shape: str, shares: list[float]) -> None:
    """Reflected share ((Z - C)/(Z + C))^2: falls while C grows to Z."""
    less, more = (echo(shape, far_end={"kind": "dashpot", "coefficient": share * Z}) for share in shares)
    assert more <= less * (1 + 1e-9) + 1e-12
    expected = [((1 - share) / (1 + share)) ** 2 for share in shares]
    whole = echo(shape)
    assert np.allclose([less / whole, more / whole], expected, atol=1e-9)


@given(SHAPES, LESS_AND_MORE)
def test_viscous_material(shape: str, shares: list[float]) -> None:
    """Kelvin-Voigt with eta/E up to a fiftieth of the pulse: each frequency is damped more the larger eta is.

    The mesh follows the viscosity (its stable step), and another mesh changes the echo by some thousandths: 0.5 %
    is allowed.
    """
    echoes = []
    for share in shares:
        law = {"kind": "viscoelastic", "viscosity": 200e9 * DURATION / 50 * max(share, 1e-3)}
        echoes.append(echo(shape, parts=[part(of="soft")], materials=[material("soft", law=law)]))
    assert echoes[1] <= echoes[0] * 1.005


@given(SHAPES, LESS_AND_MORE, st.sampled_from(["viscous", "smith"]))
def test_shaft_damping_up_to_the_impedance(shape: str, shares: list[float], law: str) -> None:
    """Shaft of 20 kN that slips at once under a pulse of 1 MN; damping that adds up to at most the rod's
    impedance.
    """
    echoes = []
    for share in shares:
        ground = {
            "surface": 0.7 * LENGTH,
            "shaft_total": {
                "resistance": 20e3,
                "distribution": "uniform",
                "quake": 1e-4,
                "damping": share * Z / 20e3,
                "damping_law": law,
            },
        }
        echoes.append(echo(shape, ground=ground))
    assert echoes[1] <= echoes[0] * (1 + 1e-6)


@given(between(0.3, 1), between(0.3, 1))
def test_a_cushion_of_less_restitution_sends_less_into_the_rod_and_the_ram(one: float, other: float) -> None:
    """What is left of the ram's energy once it has left the rod, and what went into the rod: together less
    with a smaller e.
    """
    left = []
    for e in sorted((one, other)):
        drop = {
            "kind": "drop",
            "ram_mass": 300.0,
            "impact_velocity": 3.0,
            "cushion": {"stiffness": 4e8, "restitution": e},
        }
        result = solved(drop, far_end="matched", duration=0.012, dx=0.1)
        parts = result.ledger.final
        left.append(parts["kinetic"] + parts["elastic_member"] + parts["absorbed_by_dashpots"])
    assert left[0] <= left[1] * (1 + 1e-9)


@given(between(0, 1))
def test_damping_takes_energy_both_ways(share: float) -> None:
    """Smith's damping with the magnitude of the static part: the row never falls, also while the shaft is
    unloaded and pulled.
    """
    ground = {
        "surface": 2.0,
        "shaft_total": {
            "resistance": 2e5,
            "distribution": "growing",
            "quake": 0.001,
            "damping": 2 * share,
            "damping_law": "smith",
        },
    }
    case = case_of(pulse("half_sine", 0.002), far_end="free", ground=ground, duration=0.02, dx=0.1)
    row = solve(case).ledger.parts["ground_damping_loss"]
    assert np.diff(row).min() >= -1e-12 * max(row.max(), 1e-300)

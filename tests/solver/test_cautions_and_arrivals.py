"""What a description is cautioned about, on either side of each bound; and when its waves come back, by L/c."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from solver import Case
from solver.answer.cautions import Caution, cautions_of
from solver.answer.waves import arrivals, reflectors_of
from tests.published.rods import LENGTH, C, Z, case_of, material, part, pulse, solved

#: A round bar of 0.4 m: 1.5 diameters are 0.6 m, ten are 4 m, which a wave at 5000 m/s passes in 0.8 ms.
ROUND: dict[str, Any] = {"section": {"shape": "solid_round", "diameter": 0.4}}
LONG = pulse("half_sine", 0.002)


def told(case: Case, kind: str) -> list[Caution]:
    return [one for one in cautions_of(case) if one.kind == kind]


@pytest.mark.parametrize(("position", "count"), [(0.59, 1), (0.61, 0)])
def test_a_gauge_within_one_and_a_half_diameters_of_the_blow(position: float, count: int) -> None:
    found = told(case_of(LONG, part(**ROUND), gauges={"near": position}), "gauge_near_end")
    assert [(one.name, one.value, one.bound) for one in found] == [
        ("near", position, pytest.approx(0.6))
    ] * count


@pytest.mark.parametrize(
    ("duration", "inertia", "count"), [(7.9e-4, False, 1), (8.1e-4, False, 0), (7.9e-4, True, 0)]
)
def test_a_pulse_shorter_than_ten_diameters(duration: float, inertia: bool, count: int) -> None:
    """Lateral inertia describes the dispersion that the thin rod leaves out."""
    poisson = material("elastic", poisson_ratio=0.3)
    case = case_of(
        pulse("half_sine", duration),
        part(of="elastic", **ROUND),
        materials=[poisson],
        lateral_inertia=inertia,
    )
    assert len(told(case, "short_pulse")) == count


@pytest.mark.parametrize(("speed", "count"), [(3300.0, 1), (3500.0, 0)])
def test_concrete_slower_than_sound_concrete_was_given_its_static_modulus(speed: float, count: int) -> None:
    concrete = material("concrete", 2400.0 * speed**2, 2400.0)
    found = told(case_of(LONG, part(of="concrete"), materials=[concrete]), "static_modulus")
    assert [one.value for one in found] == [pytest.approx(speed)] * count


@pytest.mark.parametrize(("law", "count"), [("elastic", 1), ("large_strain", 0)])
def test_a_slow_material_is_a_slip_unless_it_is_a_pad(law: str, count: int) -> None:
    """50 m/s is a wave speed of rubber, which a law of large strain is for."""
    soft = material("soft", 1000.0 * 50.0**2, 1000.0, law={"kind": law})
    assert len(told(case_of(LONG, part(of="soft"), materials=[soft]), "wave_speed")) == count


@pytest.mark.parametrize(
    ("law", "damping", "count"),
    [("smith", 0.15, 1), ("smith", 0.5, 0), ("smith", 3.3, 1), ("viscous", 0.15, 0)],
)
def test_a_damping_factor_that_looks_like_seconds_per_foot(law: str, damping: float, count: int) -> None:
    """0.15 s/ft is 0.49 s/m: usual at the toe. Only Smith's factor has usual values."""
    toe = {"resistance": 8e5, "quake": 0.0025, "damping": damping, "damping_law": law}
    found = told(case_of(LONG, far_end="ground", ground={"surface": 0.0, "toe": toe}), "damping_unit")
    assert [(one.pointer, one.value) for one in found] == [("ground/toe", damping)] * count


def test_few_elements_of_a_viscous_segment_are_told() -> None:
    """80 of them here: such a law closes its energy in proportion to the step."""
    viscous = material("viscous", law={"kind": "viscoelastic", "viscosity": 1e5})
    few = solved(LONG, part(of="viscous"), materials=[viscous], dx=0.125, duration=0.001)
    assert [one.kind for one in few.remarks if one.kind == "few_elements"] == ["few_elements"]


@pytest.mark.parametrize(("ratio", "seen"), [(1.005, False), (1.02, True), (0.98, True)])
def test_a_change_of_impedance_sends_waves_back_from_one_percent_on(ratio: float, seen: bool) -> None:
    """Two areas of one material: impedances stand as the areas."""
    case = case_of(LONG, part(4.0), part(6.0, area=0.01 * ratio), far_end="matched")
    assert reflectors_of(case) == ([("step", 4.0)] if seen else [])


def test_a_taper_that_ends_in_the_next_section_is_no_step() -> None:
    narrow = {"shape": "solid_round", "diameter": 0.2}
    case = case_of(LONG, part(4.0, end_section=narrow, **ROUND), part(6.0, section=narrow))
    assert reflectors_of(case) == [("far_end", 10.0)]


def test_the_ground_surface_and_the_toe_send_waves_back() -> None:
    toe = {"resistance": 8e5, "quake": 0.0025, "damping": 0.5}
    case = case_of(LONG, far_end="ground", ground={"surface": 3.0, "toe": toe})
    assert reflectors_of(case) == [("ground", 3.0), ("toe", 10.0)]


@pytest.mark.parametrize(
    ("load", "start"),
    [
        (LONG, 0.0),
        (pulse("half_sine", 0.002, start=0.001), 0.001),
        ({"kind": "history", "quantity": "force", "times": [0.0005, 0.001], "values": [0.0, 1e5]}, 0.0005),
    ],
)
def test_a_wave_is_back_past_a_gauge_when_it_has_gone_there_and_back(
    load: dict[str, Any], start: float
) -> None:
    """Down 10 m and up to 2.5 m at 5000 m/s, from the moment on at which the blow begins; past 2.5 m it has gone once,
    and the second passage adds 2 L/c.
    """
    first, second = arrivals(case_of(load))
    for arrival, passed in ((first, 17.5), (second, 37.5)):
        assert (arrival.kind, arrival.position) == ("far_end", LENGTH)
        last_up = slice(None, -3, -1)
        back = np.interp(2.5, arrival.positions[last_up], arrival.times[last_up])
        assert back == pytest.approx(start + passed / C)


def test_energy_that_comes_back_past_a_gauge_is_taken_off_again() -> None:
    """A half-sine of 1 MN and 1 ms carries F^2 T/(2 Z) = 1250 J down past the middle of a free rod, and its echo as
    much up again. To 0.2 %: each step is a mean over two, of the 50 that the pulse lasts.
    """
    run = solved(pulse("half_sine", 0.001), gauges={"middle": 5.0}, dx=0.1, duration=0.0045)
    passed = run.gauges["middle"].transferred_energy
    energy = 1e6**2 * 0.001 / (2 * Z)
    assert passed.max() == pytest.approx(energy, rel=2e-3)
    assert passed[-1] == pytest.approx(0.0, abs=2e-3 * energy)
    assert np.argmax(passed > 0.995 * energy) * run.time_step == pytest.approx(0.002, abs=2e-4)

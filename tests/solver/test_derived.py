"""Derived values against hand calculations: sections along a taper, impedance, travel time, drop, shaft resistance."""

from __future__ import annotations

from math import pi, sqrt

import pytest

from solver import Case, project_from_tree
from solver.answer.waves import arrivals, returns_at
from solver.model import derived
from solver.numerics.assemble import gauge_readings
from solver.numerics.chain import build_chain

STEEL = {"name": "steel", "young_modulus": 210e9, "density": 7850.0}
GROUT = {"name": "grout", "young_modulus": 30e9, "density": 2400.0}
PIPE = {"shape": "pipe", "outer_diameter": 0.6, "wall": 0.012}


def case_of(**parts: object) -> Case:
    """One valid case with the given parts in place of the plain ones."""
    case = {
        "name": "one",
        "member": {"segments": [{"name": "A", "length": 10.0, "material": "steel", "section": PIPE}]},
        "load": {"kind": "pulse", "quantity": "force", "shape": "half_sine", "peak": 1e6, "duration": 0.002},
        "far_end": {"kind": "free"},
    }
    tree = {"format": "striketrace-project", "version": 1, "title": "", "materials": [STEEL, GROUT]}
    return project_from_tree({**tree, "cases": [case | parts]}).cases[0]


def cone(top: float, bottom: float, length: float) -> dict:
    return {
        "segments": [
            {
                "name": "cone",
                "length": length,
                "material": "steel",
                "section": {"shape": "solid_round", "diameter": top},
                "end_section": {"shape": "solid_round", "diameter": bottom},
            }
        ]
    }


def test_impedance_and_travel_time_of_a_uniform_pipe() -> None:
    """Z = A sqrt(E rho), t = L sqrt(rho/E) (Kolsky 1963); equal up to rounding."""
    case = case_of()
    segment = case.member.segments[0]
    area = pi * 0.012 * (0.6 - 0.012)
    assert derived.impedance(segment, case.materials) == pytest.approx(area * sqrt(210e9 * 7850), rel=1e-14)
    assert derived.travel_time(segment, case.materials) == pytest.approx(10 * sqrt(7850 / 210e9), rel=1e-14)


def test_a_filled_pipe_adds_stiffness_and_mass() -> None:
    filled = {"shape": "filled_pipe", "outer_diameter": 0.6, "wall": 0.012, "fill": "grout"}
    case = case_of(
        member={"segments": [{"name": "A", "length": 10.0, "material": "steel", "section": filled}]}
    )
    wall, fill = pi * 0.012 * 0.588, pi * 0.576**2 / 4
    stiffness, mass = 210e9 * wall + 30e9 * fill, 7850 * wall + 2400 * fill
    segment = case.member.segments[0]
    assert derived.impedance(segment, case.materials) == pytest.approx(sqrt(stiffness * mass), rel=1e-14)
    assert derived.wave_speed(segment, case.materials) == pytest.approx(sqrt(stiffness / mass), rel=1e-14)


def test_travel_time_of_a_tapered_filled_pipe_lies_between_its_ends() -> None:
    """c varies along it; the integral lies between the uniform times of both ends, near their middle."""
    top = {"shape": "filled_pipe", "outer_diameter": 0.6, "wall": 0.012, "fill": "grout"}
    segment = {
        "name": "A",
        "length": 10.0,
        "material": "steel",
        "section": top,
        "end_section": top | {"outer_diameter": 0.3},
    }
    case = case_of(member={"segments": [segment]})
    tapered = case.member.segments[0]
    ends = sorted(10 / derived.wave_speed(tapered, case.materials, share) for share in (0.0, 1.0))
    time = derived.travel_time(tapered, case.materials)
    assert ends[0] < time < ends[1]
    assert time == pytest.approx(sum(ends) / 2, rel=0.01)  # curvature of 1/c over this taper is under 1 %


def test_mass_of_a_cone_is_that_of_a_frustum() -> None:
    """V = pi h (R^2 + R r + r^2)/3; Simpson's rule is exact for it."""
    case = case_of(member=cone(0.4, 0.1, 3.0))
    volume = pi * 3.0 * (0.2**2 + 0.2 * 0.05 + 0.05**2) / 3
    mass = derived.segment_mass(case.member.segments[0], case.materials)
    assert mass == pytest.approx(7850 * volume, rel=1e-13)
    assert derived.section_at(case.member.segments[0], 0.5).diameter == pytest.approx(0.25)


@pytest.mark.parametrize(
    "way",
    [{"drop_height": 1.2, "efficiency": 0.8}, {"energy": 4000 * 9.80665 * 0.96}, {"impact_velocity": 4.3392}],
)
def test_three_ways_to_tell_a_drop_agree(way: dict[str, float]) -> None:
    """m g h efficiency = m v^2/2 with g = 9.80665 m/s2: 37.66 kJ and 4.3392 m/s for 4 t from 1.2 m at 0.8."""
    case = case_of(load={"kind": "drop", "ram_mass": 4000.0} | way)
    assert derived.impact_velocity(case.load, case.materials) == pytest.approx(4.3392, rel=1e-5)
    assert derived.impact_energy(case.load, case.materials) == pytest.approx(37657.5, rel=2e-5)
    assert derived.height_for_velocity(4.3392, 0.8) == pytest.approx(1.2, rel=2e-5)


def test_shaft_resistance_is_cut_at_the_end_of_the_member() -> None:
    """Layer 1: 20 kPa over 3 m; layer 2: 30 to 60 kPa over 6 m, of which the pile reaches only 5 m."""
    layers = [
        {"name": "one", "thickness": 3.0, "unit_resistance": 20e3, "quake": 0.0025, "damping": 0.2},
        {
            "name": "two",
            "thickness": 6.0,
            "unit_resistance": 30e3,
            "unit_resistance_bottom": 60e3,
            "quake": 0.0025,
            "damping": 0.2,
        },
    ]
    case = case_of(ground={"surface": 2.0, "layers": layers, "inner_share": 0.5})
    perimeter = pi * 0.6 + 0.5 * pi * (0.6 - 0.024)
    expected = (perimeter * 3 * 20e3, perimeter * 5 * (30e3 + (30e3 + 5 * 5e3)) / 2)
    assert derived.layer_resistances(case) == pytest.approx(expected, rel=1e-13)
    assert derived.shaft_resistance(case) == pytest.approx(sum(expected), rel=1e-13)


def test_shaft_resistance_along_a_cone_uses_its_shrinking_perimeter() -> None:
    """f constant: f times the lateral area of developed perimeters, f pi (D + d)/2 L; equal up to rounding."""
    layer = {"name": "all", "thickness": 10.0, "unit_resistance": 50e3, "quake": 0.0025, "damping": 0.2}
    case = case_of(member=cone(0.4, 0.2, 8.0), ground={"surface": 0.0, "layers": [layer]})
    assert derived.shaft_resistance(case) == pytest.approx(50e3 * pi * 0.3 * 8.0, rel=1e-13)


def test_a_total_is_split_by_the_toes_share() -> None:
    assert derived.resistance_split(2e6, 0.25) == (1.5e6, 0.5e6)


def two_segments() -> Case:
    segment = {"length": 4.0, "section": PIPE}
    segments = [segment | {"name": "A", "material": "steel"}, segment | {"name": "B", "material": "grout"}]
    return case_of(member={"segments": segments})


def test_times_along_the_member_add_up() -> None:
    """From the middle of A to the middle of B: 2 m at each wave speed sqrt(E/rho)."""
    case = two_segments()
    expected = 2 * sqrt(7850 / 210e9) + 2 * sqrt(2400 / 30e9)
    assert derived.time_between(case, 2.0, 6.0) == pytest.approx(expected, rel=1e-14)
    whole = sum(derived.travel_time(s, case.materials) for s in case.member.segments)
    assert derived.time_between(case, 0.0, 8.0) == pytest.approx(whole, rel=1e-14)


def test_the_segment_at_a_joint_is_on_the_side_asked_for() -> None:
    case = two_segments()
    assert derived.segment_at(case, 4.0, "near")[0].name == "A"
    assert derived.segment_at(case, 4.0, "far")[0].name == "B"
    assert derived.segment_at(case, 5.0) == (case.member.segments[1], 0.25)
    assert derived.segment_at(case, 8.0, "far") == (case.member.segments[1], 1.0)


def test_a_cushion_gives_back_the_square_of_its_restitution() -> None:
    """Loads along k, unloads along k/e^2: the areas stand as 1 to e^2."""
    case = case_of(load={"kind": "drop", "ram_mass": 1e3, "impact_velocity": 3.0, "cushion": CUSHION})
    assert derived.energy_returned(case.load.cushion) == pytest.approx(0.64, rel=1e-14)


CUSHION = {"stiffness": 1e9, "restitution": 0.8}


LAYERED = {
    "segments": [
        {"name": "steel", "length": 12.0, "material": "steel", "section": PIPE},
        {"name": "grout", "length": 12.0, "material": "grout", "section": PIPE},
    ]
}


@pytest.mark.parametrize("place", [1.2, 12.0, 18.0])
def test_a_front_comes_back_past_a_gauge_with_the_speed_of_each_segment(place: float) -> None:
    """From the far end of steel (c = 5172 m/s) over grout (3536 m/s): both ways whole, less the way above the gauge."""
    steel, grout = sqrt(210e9 / 7850), sqrt(30e9 / 2400)
    case = case_of(member=LAYERED)
    front = next(a for a in arrivals(case) if a.kind == "far_end")
    above = min(place, 12.0) / steel + max(place - 12.0, 0.0) / grout
    assert returns_at(case, front, place) == pytest.approx(2 * (12 / steel + 12 / grout) - above)
    step = next(a for a in arrivals(case) if a.kind == "step")
    assert (returns_at(case, step, place) is None) == (place > 12.0)


def test_a_member_that_flies_has_no_front_from_its_struck_end() -> None:
    """Its first wave comes from the wall: a line from the struck end at time 0 would be where nothing is."""
    flies = case_of(load={"kind": "none"}, far_end={"kind": "wall"}, run={"initial_velocity": 3.0})
    assert arrivals(flies) == ()


def test_a_gauge_on_a_rod_that_strikes_is_read_from_its_far_face() -> None:
    """A striker of 0.3 m and 0.1 m touches the member at 0: its gauge at 0.1 m lies at -0.3 m, and is read there."""
    parts = [
        {"name": name, "length": length, "material": "steel", "section": PIPE}
        for name, length in (("S", 0.3), ("T", 0.1))
    ]
    load = {"kind": "striker", "velocity": 5.0, "segments": parts}
    gauges = [{"name": "rear", "position": 0.1, "on": "striker"}, {"name": "head", "position": 1.0}]
    case = case_of(load=load, gauges=gauges)
    places = [derived.place_of(case, gauge) for gauge in case.gauges]
    assert places == pytest.approx([-0.3, 1.0])
    chain = build_chain(case)
    read = [chain.position[gauge_readings(chain)[0][g, 0]] for g in (0, 1)]
    assert read == pytest.approx(places, abs=1e-9)

"""One thing told in two ways that the file allows: loads, sections, grounds and ends that mean the same have the
same answer.
"""

from __future__ import annotations

from math import pi, sqrt
from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from solver import Result
from solver.model.load import GRAVITY
from tests.published.rods import AREA, LENGTH, C, E, Z, material, part, pulse, solved
from tests.solver import commensurate as rods
from tests.solver.comparing import assert_close
from tests.solver.strategies import SHAPES, Tree, between, logarithmic

HALF_SINE = pulse("half_sine", 0.002)
CUSHION = {"stiffness": 1e9, "restitution": 0.6}
GAUGES = {"middle": 5.0}


def assert_same(found: Result, expected: Result, share: float = 1e-9) -> None:
    a, b = found.gauges["middle"], expected.gauges["middle"]
    count = min(len(a.force), len(b.force))
    assert found.time_step == pytest.approx(expected.time_step, rel=1e-12)
    assert_close(a.force[:count], b.force[:count], share, "force")
    assert_close(a.displacement[:count], b.displacement[:count], share, "movement")


@pytest.mark.parametrize(
    "way",
    [
        {"impact_velocity": 3.0},
        {"energy": 0.5 * 1500.0 * 9.0},
        {"drop_height": 9.0 / (2 * GRAVITY * 0.75), "efficiency": 0.75},
    ],
)
def test_speed_of_a_ram(way: dict[str, float]) -> None:
    """3 m/s as such, as kinetic energy, as a height with its efficiency: v = sqrt(2 g h eta) = sqrt(2 E/m)."""
    drop = {"kind": "drop", "ram_mass": 1500.0, "cushion": CUSHION}
    expected = solved(drop | {"impact_velocity": 3.0}, gauges=GAUGES, duration=0.01)
    assert_same(solved(drop | way, gauges=GAUGES, duration=0.01), expected)


@pytest.mark.parametrize(
    ("one", "other"),
    [
        (
            {"cushion": CUSHION},
            {"cushion": {"area": 0.1, "thickness": 0.02, "young_modulus": 2e8, "restitution": 0.6}},
        ),
        ({"cushion": CUSHION}, {"pile_cushion": CUSHION}),
        (
            {"cushion": CUSHION},
            {"cushion": {**CUSHION, "stiffness": 2e9}, "pile_cushion": {**CUSHION, "stiffness": 2e9}},
        ),
    ],
)
def test_cushions(one: Tree, other: Tree) -> None:
    """k = EA/t; without a cap it does not matter on which side a cushion lies, and two in a row are half as stiff."""
    drop = {"kind": "drop", "ram_mass": 1500.0, "impact_velocity": 3.0}
    results = [solved(drop | how, gauges=GAUGES, duration=0.01, dx=0.025) for how in (one, other)]
    assert_same(*results)


def test_a_ram_of_segments_is_a_striker() -> None:
    """Face to face, without cap and cushion, both are a rod at a speed against a rod at rest."""
    segments = [part(1.0, 0.02), part(0.5, 0.01)]
    ram = {"kind": "drop", "ram": {"segments": segments}, "impact_velocity": 3.0}
    striker = {"kind": "striker", "segments": segments, "velocity": 3.0}
    assert_same(*(solved(load, gauges=GAUGES, duration=0.01, dx=0.05) for load in (ram, striker)))


@pytest.mark.parametrize(
    "section",
    [
        {"shape": "solid_round", "diameter": sqrt(4 * AREA / pi)},
        {"shape": "rectangle", "width": 0.2, "depth": AREA / 0.2},
        {"shape": "octagon", "across_flats": sqrt(AREA / (2 * (sqrt(2) - 1)))},
        {"shape": "pipe", "outer_diameter": AREA / (pi * 0.01) + 0.01, "wall": 0.01},
        {"shape": "voided_square", "width": 0.15, "void_diameter": sqrt((0.15**2 - AREA) * 4 / pi)},
        {
            "shape": "h",
            "depth": 0.34,
            "flange_width": 0.2,
            "flange": 0.02,
            "web": (AREA - 2 * 0.2 * 0.02) / 0.3,
        },
        {"shape": "filled_pipe", "outer_diameter": 0.3, "wall": 0.01, "fill": "light"},
    ],
)
def test_sections_of_one_area_are_one_rod(section: Tree) -> None:
    """Every shape of 0.01 m2; the filled pipe with a fill that makes up what its wall lacks, in stiffness and
    in mass alike.
    """
    wall, fill = pi * 0.01 * 0.29, pi * 0.28**2 / 4
    share = (AREA - wall) / fill
    light = material("light", E * share, 8000 * share)
    found = solved(HALF_SINE, part(section=section), materials=[light], gauges=GAUGES, duration=0.01, dx=0.05)
    assert_same(found, solved(HALF_SINE, gauges=GAUGES, duration=0.01, dx=0.05))


@pytest.mark.parametrize(
    "law", [{"damping_law": "smith"}, {"damping_law": "viscous"}, {"damping_law": "power", "exponent": 0.3}]
)
@pytest.mark.parametrize("distribution", ["uniform", "growing"])
def test_a_total_is_a_layer(distribution: str, law: Tree) -> None:
    """300 kN over the 6 m that are embedded, perimeter 1 m: 50 kPa everywhere, or from 0 to 100 kPa."""
    common = {"quake": 0.002, "damping": 0.3, **law}
    total = {"resistance": 3e5, "distribution": distribution, **common}
    top, bottom = (5e4, 5e4) if distribution == "uniform" else (0.0, 1e5)
    layer = {
        "name": "all",
        "thickness": 6.0,
        "unit_resistance": top,
        "unit_resistance_bottom": bottom,
        **common,
    }
    how: dict[str, Any] = {"gauges": GAUGES, "duration": 0.02, "dx": 0.05}
    a = solved(HALF_SINE, ground={"surface": 4.0, "shaft_total": total}, **how)
    b = solved(HALF_SINE, ground={"surface": 4.0, "layers": [layer]}, **how)
    assert_same(a, b, 1e-8)
    assert a.set == pytest.approx(b.set, abs=1e-9)


def test_an_attached_spring_dashpot_or_mass_at_the_end_is_the_far_end() -> None:
    for kind, key in (("spring", "stiffness"), ("dashpot", "coefficient")):
        end = {"kind": kind, key: 0.7 * Z * (1000 if kind == "spring" else 1)}
        attached = {"position": LENGTH, "kind": kind, "value": end[key]}
        a = solved(HALF_SINE, far_end=end, gauges=GAUGES, duration=0.02, dx=0.05)
        b = solved(HALF_SINE, attachments=[attached], gauges=GAUGES, duration=0.02, dx=0.05)
        assert_same(a, b, 1e-12)


@st.composite
def pushed_rods(draw: st.DrawFn) -> dict[str, Any]:
    known = [draw(rods.materials(f"m{i}")) for i in range(2)]
    parts = draw(rods.rods(known))
    load = {"kind": "pulse", "quantity": "force", "peak": 1e4, "shape": draw(st.sampled_from(SHAPES[:4]))}
    return {"known": known, "parts": parts, "load": load | {"duration": draw(logarithmic(1e-4, 5e-4))}}


@given(pushed_rods())
def test_a_matched_end_is_a_rod_that_goes_on(rod: dict[str, Any]) -> None:
    """Until the echo of its far end comes back, 400 elements more of the last section are the same as none
    with a matched end: 1e-10.
    """
    known, parts = rod["known"], rod["parts"]
    count = sum(rods.in_steps(parts, known))
    gauge = {"name": "g", "position": rods.place(parts, known, count // 2)}
    run = {"duration": (count + 400) * rods.STEP}
    more = {
        **parts[-1],
        "name": "goes on",
        "length": parts[-1]["length"] * 400 / rods.in_steps(parts, known)[-1],
    }
    a = rods.solved(known, parts, rod["load"], {"kind": "matched"}, gauges=[gauge], run=run)
    b = rods.solved(known, [*parts, more], rod["load"], {"kind": "free"}, gauges=[gauge], run=run)
    assert_close(a.gauges["g"].force, b.gauges["g"].force[: a.steps], 1e-10, "force", 1e4)
    assert_close(a.gauges["g"].velocity, b.gauges["g"].velocity[: a.steps], 1e-10, "velocity")


@given(between(0.2, 0.9), st.sampled_from(["half_sine", "haversine", "triangle", "rectangle"]))
def test_a_wall_that_is_touched_is_a_fixed_end_until_it_is_left(share: float, shape: str) -> None:
    """A uniform rod pushed against a wall: compression doubles there as at a fixed end, and only the echo from
    the struck end, tension, takes the rod off it, 3L/c after the start: 1e-10 of the peak until then.
    """
    load = pulse(shape, share * LENGTH / C)
    how: dict[str, Any] = {"gauges": GAUGES, "duration": 3 * LENGTH / C - 0.0002, "dx": 0.1}
    a = solved(load, far_end={"kind": "wall", "gap": 0.0}, **how)
    b = solved(load, far_end="fixed", **how)
    assert np.abs(a.gauges["middle"].force - b.gauges["middle"].force).max() < 1e-10 * 1e6
    assert np.abs(a.gauges["middle"].force).max() > 0.9e6

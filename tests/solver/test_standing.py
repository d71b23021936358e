"""A member that is kept from one case to the next changes nothing but the time that the next one takes."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from solver import Case, Result, SolveError, solve, standing
from tests.published.rods import E, case_of, material, part

SMITH = {"quake": 0.0025, "damping": 0.15}
POWER = {**SMITH, "damping_law": "power", "exponent": 0.2}
RADIATION = {
    "model": {"kind": "radiation", "shear_modulus": 2e7, "soil_density": 1900.0, "poisson_ratio": 0.3}
}
TOE = {**SMITH, "resistance": 5e5}
CUSHION = {"stiffness": 5e8, "restitution": 0.6}
RIGID = {"kind": "drop", "ram_mass": 2000.0, "cushion": CUSHION}
ON_A_CAP = {**RIGID, "cap_mass": 300.0, "pile_cushion": CUSHION}


def struck(load: dict[str, Any], speed: float, layer: dict[str, Any] = SMITH, **more: Any) -> Case:
    """A pile of two parts in one layer, struck at a speed (m/s)."""
    ground = {
        "surface": 2.0,
        "layers": [{"name": "clay", "thickness": 8.0, "unit_resistance": 4e4, **layer}],
        "toe": more.pop("toe", TOE),
    }
    joint = {"kind": "contact", "gap": 0.0}
    pile = [material("pile", E * more.pop("stiffer", 1.0))]
    parts = (part(5.0, of="pile"), part(5.0, of="pile", joint_above=joint))
    given: dict[str, Any] = {
        "far_end": "ground",
        "gravity": True,
        "duration": 0.01,
        "gauges": {"g": 3.0},
        **more,
    }
    return case_of({**load, "impact_velocity": speed}, *parts, materials=pile, ground=ground, **given)


def assert_same(a: Result, b: Result) -> None:
    """To the last bit."""
    for quantity in ("force", "velocity", "displacement", "acceleration"):
        assert np.array_equal(getattr(a.gauges["g"], quantity), getattr(b.gauges["g"], quantity))
    for name, values in a.ledger.parts.items():
        assert np.array_equal(values, b.ledger.parts[name]), name
    assert (a.set, a.events, a.case) == (b.set, b.events, b.case)


def alone(case: Case) -> Result:
    """Its answer with nothing kept before it."""
    standing._kept.clear()
    return solve(case)


@pytest.mark.parametrize("layer", [SMITH, POWER, RADIATION])
@pytest.mark.parametrize("load", [RIGID, ON_A_CAP])
def test_a_case_after_others_of_its_member_has_the_answer_that_it_has_alone(
    load: dict[str, Any], layer: dict[str, Any]
) -> None:
    cases = [struck(load, speed, layer) for speed in (4.0, 1.0, 2.5)]
    expected = [alone(case) for case in cases]
    solve(struck(load, 6.0, layer))
    assert len(standing._kept) == 1
    for case, result in zip(cases, expected, strict=True):
        assert_same(solve(case), result)
    assert len(standing._kept) == 1


@pytest.mark.parametrize(
    "change",
    [
        {"load": {**RIGID, "ram_mass": 2500.0}},
        {"load": {**RIGID, "cushion": {**CUSHION, "restitution": 0.8}}},
        {"layer": {**SMITH, "quake": 0.003}},
        {"toe": {**TOE, "resistance": 6e5}},
        {"gravity": False},
        {"gauges": {"g": 3.3}},
        {"stiffer": 1.1},
        {"dx": 0.1},
    ],
    ids=str,
)
def test_whatever_else_differs_is_found_anew(change: dict[str, Any]) -> None:
    other = struck(**{"load": RIGID, "speed": 2.0, **change})
    expected = alone(other)
    plain = alone(struck(RIGID, 2.0))
    found = solve(other)
    assert_same(found, expected)
    assert not np.array_equal(found.gauges["g"].force, plain.gauges["g"].force)


def test_a_speed_beyond_all_measure_is_refused_though_the_member_is_known() -> None:
    solve(struck(RIGID, 2.0))
    with pytest.raises(SolveError, match="beyond all measure"):
        solve(struck(RIGID, 1e40))


def test_no_more_members_are_kept_than_said() -> None:
    standing._kept.clear()
    for mass in range(standing.KEPT + 3):
        solve(struck({**RIGID, "ram_mass": 1000.0 + mass}, 1.0, duration=1e-4))
    assert len(standing._kept) == standing.KEPT

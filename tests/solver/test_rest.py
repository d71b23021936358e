"""Rest under the member's own weight before the blow, and what is told of it after."""

from __future__ import annotations

import numpy as np
import pytest

from solver import SolveError
from tests.published.rods import AREA, GRAVITY, LENGTH, material, part, pulse, solved


@pytest.mark.parametrize("law", ["elastic", "large_strain"])
def test_a_member_that_sags_keeps_its_distance_to_the_wall(law: str) -> None:
    """The gap is the distance before the blow, at rest: a rod that hangs on a soft spring and has sagged by 1.3
    mm is not thrown back by a wall 0.1 mm away. Nothing moves until the load begins, and no energy comes from the
    wall.
    """
    of = material("hung", law={"kind": law})
    spring = {"position": 0.0, "kind": "spring", "value": 5.9e6}
    wall = {"kind": "wall", "gap": 1e-4}
    result = solved(
        pulse("half_sine", 0.001, start=0.002),
        part(of="hung"),
        materials=[of],
        attachments=[spring],
        far_end=wall,
        gravity=True,
        gauges={"end": LENGTH},
        duration=0.01,
    )
    gauge = result.gauges["end"]
    assert np.abs(gauge.velocity[gauge.time < 0.0019]).max() < 1e-9
    # the end is stopped at the begin of the step in which it would reach the wall
    way = gauge.velocity.max() * result.time_step
    assert 1e-4 - way < gauge.displacement.max() <= 1e-4 * (1 + 1e-6)
    assert result.ledger.final["impact_loss"] > -1e-9


def test_every_gauge_begins_at_its_own_force_of_rest() -> None:
    """A pile under its own weight before the pulse: what a gauge reads less its force of rest begins at 0 at both
    ends, on a node and between two (to 1e-12 of the weight). Halfway it is half the weight; at 2.31 m, that above it.
    """
    gauges = {"head": 0.0, "between": 2.31, "middle": LENGTH / 2, "toe": LENGTH}
    toe = {"resistance": 1e6, "quake": 0.0025, "damping": 0.3}
    load = pulse("half_sine", 0.001, start=0.001)
    result = solved(
        load,
        far_end="ground",
        ground={"surface": 9.9, "toe": toe},
        gravity=True,
        gauges=gauges,
        duration=0.002,
    )
    weight = 8000 * AREA * LENGTH * GRAVITY
    for gauge in result.gauges.values():
        assert gauge.force[0] == pytest.approx(gauge.rest_force, abs=1e-12 * weight)
        assert gauge.rest_force == pytest.approx(-weight * gauge.position / LENGTH, abs=1e-3 * weight)


def test_a_pile_that_sinks_onto_its_toe_before_the_blow() -> None:
    """Its shaft holds 2 kN, its toe 5 mm below it 136 kN: it slips down by the gap and then rests on the toe, which
    takes the rest of the 7.8 kN of its weight. The blow starts from there.
    """
    ground = {
        "surface": 0.0,
        "shaft_total": {"resistance": 2e3, "distribution": "uniform", "quake": 0.0025, "damping": 0.1},
        "toe": {"resistance": 136e3, "quake": 0.0025, "damping": 0.3, "gap": 0.005},
    }
    load = pulse("half_sine", 0.001, 1e3, start=0.001)
    result = solved(
        load, far_end="ground", ground=ground, gravity=True, gauges={"toe": LENGTH}, duration=0.003
    )
    weight = 8000 * AREA * LENGTH * GRAVITY
    assert -result.gauges["toe"].rest_force == pytest.approx(weight - 2e3, rel=2e-3)
    assert np.abs(result.gauges["toe"].velocity[result.gauges["toe"].time < 0.002]).max() < 1e-9


def test_a_pile_driven_in_ground_of_which_only_the_toe_holds_comes_to_rest() -> None:
    """Shaft of 2 kN under a weight of 7.8 kN: after the blow it slips as a whole until the toe takes the rest. Its set
    is the largest movement of the toe less its quake, but for the 4 % of the toe's strength that carry the weight.
    """
    shaft = {"resistance": 2e3, "distribution": "uniform", "quake": 0.0025, "damping": 0.1}
    ground = {
        "surface": 0.0,
        "shaft_total": shaft,
        "toe": {"resistance": 136e3, "quake": 0.0025, "damping": 0.3},
    }
    drop = {"kind": "drop", "ram_mass": 200.0, "impact_velocity": 4.5}
    drop["cushion"] = {"stiffness": 1e8, "restitution": 0.5}
    result = solved(drop, far_end="ground", ground=ground, gravity=True)
    assert "no_rest" not in {remark.kind for remark in result.remarks}
    assert result.set == pytest.approx(result.max_toe_displacement - 0.0025, rel=0.05)


def test_where_nothing_holds_the_pile_the_set_is_the_plastic_movement() -> None:
    """Toe only, no gravity: the pile flies off, no rest exists. Set = largest movement less the quake (Smith's
    spring, unloaded), and a warning says so; it was -50 mm, wherever the damping of a fictitious settling left
    it.
    """
    toe = {"resistance": 1e6, "quake": 0.0025, "damping": 0.0}
    ground = {"surface": 0.0, "layers": [], "toe": toe}
    result = solved(pulse("half_sine", 0.005, 2e6), far_end="ground", ground=ground, duration=0.03)
    assert result.set == pytest.approx(result.max_toe_displacement - 0.0025, abs=1e-6)
    assert any("plastic movement" in warning for warning in result.warnings)


def test_a_member_that_yields_under_its_own_weight_is_refused_with_what_helps() -> None:
    """A rod of 10 m and 8000 kg/m3 on a wall carries rho g L = 0.785 MPa at its foot: a yield stress of 0.7 MPa is
    refused, one of 0.8 MPa is not.
    """

    def standing(yield_stress: float) -> None:
        law = {"kind": "elastic_plastic", "yield_stress": yield_stress}
        soft = material("soft", law=law)
        wall = {"kind": "wall", "gap": 0.0}
        solved(
            pulse("half_sine", 0.001, 1.0),
            part(of="soft"),
            materials=[soft],
            far_end=wall,
            gravity=True,
            duration=1e-3,
        )

    standing(0.8e6)
    with pytest.raises(SolveError, match=r"elastic range under its own weight.*turn gravity off"):
        standing(0.7e6)

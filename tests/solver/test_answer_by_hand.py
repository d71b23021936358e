"""What a result says in one number, against the record that it was read from or against a number by hand."""

from __future__ import annotations

import numpy as np
import pytest

from solver import findings_of
from solver.answer.findings import SetFinding, segment_of
from solver.answer.result import Result
from tests.published.rods import LENGTH, C, Z, case_of, part, pulse, solved

ENDS = {"head": 0.0, "toe": LENGTH}


@pytest.fixture(scope="module")
def driven() -> Result:
    """The round-number rod (800 kg) stands on its toe alone and is driven by 2 t at 4 m/s; after 3 s it lies still."""
    load = {
        "kind": "drop",
        "ram_mass": 2000.0,
        "impact_velocity": 4.0,
        "cushion": {"stiffness": 1e9, "restitution": 0.8},
    }
    toe = {"resistance": 8e5, "quake": 0.0025, "damping": 0.5}
    return solved(
        load, far_end="ground", ground={"surface": 0.0, "toe": toe}, gauges=ENDS, dx=0.25, gravity=True,
        duration=3.0,
    )  # fmt: skip


def test_movements_count_from_rest_before_the_blow_as_gauges_do(driven: Result) -> None:
    """Under its own weight the rod has sunk by W/k = 7.85 kN / 320 kN/mm = 25 um before the blow. Round-off."""
    head, toe = driven.gauges["head"], driven.gauges["toe"]
    assert driven.max_toe_displacement == pytest.approx(toe.displacement.max(), rel=1e-9)
    assert driven.head_set is not None
    assert driven.head_rebound == pytest.approx(head.displacement.max() - driven.head_set, rel=1e-9)
    assert driven.envelope.max_displacement[0] == pytest.approx(head.displacement.max(), rel=1e-9)
    assert driven.envelope.max_displacement[-1] >= toe.displacement.max() * (1 - 1e-9)


def test_without_a_shaft_both_ends_stay_down_by_the_same(driven: Result) -> None:
    """At rest the same weight presses the rod as before, so that it is as long as before: to 1 nm, as it is settled."""
    assert driven.set is not None
    assert driven.set > 0.005
    assert driven.head_set == pytest.approx(driven.set, abs=1e-9)


def test_the_force_at_rest_is_the_weight_above() -> None:
    """5 m of the rod weigh 400 kg x g = 3922.66 N; the gauge reads it in compression before the wave comes, less the
    weight of half an element of 0.25 m where the force of the element stands for it.
    """
    toe = {"resistance": 8e5, "quake": 0.0025, "damping": 0.5}
    ground = {"surface": 0.0, "toe": toe}
    run = solved(
        pulse("half_sine", 1e-3), far_end="ground", ground=ground, gauges={"middle": 5.0}, dx=0.25,
        gravity=True, duration=0.002,
    )  # fmt: skip
    gauge = run.gauges["middle"]
    half_element = 80.0 * 0.25 / 2 * 9.80665
    assert gauge.force[0] == pytest.approx(-400 * 9.80665, rel=1e-9)
    assert gauge.rest_force == pytest.approx(-400 * 9.80665, abs=1.001 * half_element)


def test_the_energy_of_a_striker_is_that_of_its_motion() -> None:
    """1 m of the round-number rod, 80 kg at 5 m/s: m v^2/2 = 1000 J."""
    striker = {"kind": "striker", "velocity": 5.0, "segments": [part(1.0)]}
    energy = findings_of(solved(striker, gauges={"g": 5.0}, dx=0.1, duration=0.003)).energy
    assert energy is not None
    assert energy.source == "striker"
    assert energy.source_energy == pytest.approx(1000.0, rel=1e-12)


def test_the_work_of_a_load_is_the_most_that_it_has_done() -> None:
    """100 kN for 0.5 ms do F^2 T/Z = 12.5 J. When the echo of the free end is back after 2 L/c = 4 ms, a pull of the
    same size and length takes all of it out again: the work ends at nothing, but 12.5 J drove the rod. To 1 %:
    half of the step in which the force jumps, of the 50 that it lasts.
    """
    strike, echo, force = 5e-4, 2 * LENGTH / C, 1e5
    times = [0.0, 0.0, strike, strike, echo, echo, echo + strike, echo + strike]
    values = [0.0, force, force, 0.0, 0.0, -force, -force, 0.0]
    load = {"kind": "history", "quantity": "force", "times": times, "values": values}
    run = solved(load, gauges={"g": 5.0}, dx=0.05, duration=0.006)
    energy = findings_of(run).energy
    assert energy is not None
    assert energy.source_energy == pytest.approx(force**2 * strike / Z, rel=0.0101)
    assert run.ledger.final["work_of_load"] == pytest.approx(0.0, abs=0.0101 * 12.5)
    assert np.abs(run.gauges["g"].force[-50:]).max() < 1e-6 * force


def test_a_place_on_a_joint_counts_to_the_lower_segment() -> None:
    case = case_of(pulse("half_sine", 1e-3), part(4.0), part(6.0))
    assert segment_of(case, np.array([0.0, 3.999, 4.0, 10.0])).tolist() == [0, 0, 1, 1]


@pytest.mark.parametrize(("value", "blows"), [(0.002, 500.0), (0.0, None), (-0.0001, None)])
def test_a_toe_that_does_not_stay_down_has_no_number_of_blows(value: float, blows: float | None) -> None:
    assert SetFinding(value, 0.01, None, 0.1, 10.0).blows_per_metre == blows

"""What is told with a run: each remark where its reason stands, no word where it does not; events at their time."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from solver import Result, solve
from tests.published.rods import AREA, LENGTH, C, case_of, material, part, pulse, solved

TOE = {"resistance": 8e5, "quake": 0.0025, "damping": 0.5}
HALF_SINE = pulse("half_sine", 0.002)


def told(run: Result) -> dict[str, Any]:
    return {remark.kind: remark for remark in run.remarks}


def test_a_plain_run_needs_no_word() -> None:
    assert told(solved(HALF_SINE, dx=0.25, duration=0.005)) == {}


def test_travel_times_that_fit_no_step_are_told_with_the_worst_courant_number() -> None:
    """Two steps to 1 m and three to 1.3 m: one of the two is crossed in less than its step."""
    run = solved(HALF_SINE, part(1.0), part(1.3), dx=0.5, duration=0.002)
    assert told(run)["times_unfit"].value == run.courant_worst < 0.995


def test_plastic_strains_beyond_small_ones_are_told_where_they_are() -> None:
    """A soft stub of 1 m at the far end, thrown on a wall at 100 m/s: it yields at 20 MPa and is squeezed."""
    soft = material("soft", law={"kind": "elastic_plastic", "yield_stress": 20e6, "hardening_modulus": 1e9})
    run = solved(
        {"kind": "none"}, part(9.0), part(1.0, of="soft"), materials=[soft], far_end="wall",
        initial_velocity=100.0, dx=0.1, duration=0.004,
    )  # fmt: skip
    remark = told(run)["large_strain"]
    assert remark.value > 0.1
    assert 9.0 <= remark.place <= 10.0


def test_layers_that_end_above_the_toe_are_told_with_their_depth() -> None:
    layer = {"name": "clay", "thickness": 3.0, "unit_resistance": 5e4, "quake": 0.0025, "damping": 0.2}
    short = solved(HALF_SINE, ground={"surface": 2.0, "layers": [layer]}, dx=0.25, duration=0.005)
    assert told(short)["layers_end"].place == 5.0
    whole = solved(
        HALF_SINE, ground={"surface": 2.0, "layers": [layer | {"thickness": 8.0}]}, dx=0.25, duration=0.005
    )
    assert "layers_end" not in told(whole)


def test_a_run_that_ends_by_itself_says_whether_it_has_come_to_rest() -> None:
    """A free rod flies on for ever."""
    run = solved(HALF_SINE, dx=0.25)
    assert "not_at_rest" in told(run)
    assert not run.at_rest
    shaft = {"resistance": 5e5, "distribution": "uniform", "quake": 0.0025, "damping": 0.5}
    driven = solved(
        HALF_SINE, far_end="ground", ground={"surface": 0.0, "shaft_total": shaft, "toe": TOE}, dx=0.25
    )
    assert "not_at_rest" not in told(driven)
    assert driven.at_rest


def test_a_toe_that_lifts_is_an_event_where_the_ground_lets_go() -> None:
    """A rod that bounces: from the moment of the event on, nothing holds its far end."""
    run = solved(HALF_SINE, far_end="ground", ground={"surface": 0.0, "toe": TOE}, gauges={"toe": LENGTH}, dx=0.25,
                 duration=0.02)  # fmt: skip
    lifts = [e for e in run.events if e.kind == "toe_lift"]
    assert [e.position for e in lifts[:1]] == [LENGTH]
    gauge = run.gauges["toe"]
    step = int(np.searchsorted(gauge.time, lifts[0].time))
    assert gauge.force[step - 3] < -1e3
    assert np.abs(gauge.force[step + 1 : step + 10]).max() < 1e-6


def test_a_gap_under_the_toe_is_no_set() -> None:
    """Nothing but the toe holds the rod, so that it bounces off and its set is the plastic part: without the gap of
    3 mm that it had to cross before it met the ground.
    """
    load = {"kind": "none"}
    how: dict[str, Any] = {"far_end": "ground", "dx": 0.25, "initial_velocity": 4.0, "duration": 0.05}
    near = solved(load, ground={"surface": 0.0, "toe": TOE}, **how)
    far = solved(load, ground={"surface": 0.0, "toe": TOE | {"gap": 0.003}}, **how)
    assert near.set is not None
    assert near.set > 1e-4
    # it meets the ground a little later, in the middle of another step
    assert far.set == pytest.approx(near.set, rel=0.02)


def test_frames_and_ledger_keep_the_time_of_what_they_hold_in_long_runs() -> None:
    """More frames than are kept: every second one is dropped, and each still stands at its time."""
    run = solved(HALF_SINE, gauges={"middle": 5.0}, dx=0.5, duration=0.5)
    assert run.steps > 3 * len(run.fields.time)
    assert run.ledger.time[-1] == pytest.approx(run.duration, rel=2 * len(run.fields.time) ** -1)
    gauge = run.gauges["middle"]
    column = int(np.argmin(np.abs(run.fields.position - 4.75)))
    seen = np.interp(run.fields.time, gauge.time, gauge.displacement)
    # the column is half an element beside the gauge
    assert run.fields.displacement[:, column] == pytest.approx(
        seen, abs=0.5 / C * np.abs(gauge.velocity).max()
    )


def test_blows_repeat_when_their_sets_agree_to_the_tolerance() -> None:
    """First blows of a pile whose ground is still locked in differ by far more than a nanometre."""
    load = {
        "kind": "drop",
        "ram_mass": 2000.0,
        "impact_velocity": 3.0,
        "cushion": {"stiffness": 1e9, "restitution": 0.8},
    }
    shaft = {"resistance": 8e5, "distribution": "uniform", "quake": 0.0025, "damping": 0.2}
    ground = {"surface": 0.0, "shaft_total": shaft, "toe": TOE}
    how: dict[str, Any] = {"far_end": "ground", "ground": ground, "dx": 0.5}
    two = solve(case_of(load, **how, blows={"most": 2, "tolerance": 1e-9})).residual
    assert two is not None
    assert abs(two.set_per_blow[1] - two.set_per_blow[0]) > 1e-6
    assert not two.repeats
    until = solve(case_of(load, **how, blows={"most": 10, "tolerance": 1e-4})).residual
    assert until is not None
    assert until.repeats
    assert abs(until.set_per_blow[-1] - until.set_per_blow[-2]) <= 1e-4


@pytest.mark.parametrize(("steps", "said"), [(3.7, True), (9.0, True), (11.0, False)])
def test_a_pulse_of_few_steps_is_told_for_its_peak_is_smeared(steps: float, said: bool) -> None:
    """The mean of a half-sine over the steps on either side is 1 % low at 11 steps."""
    dx = 0.1
    run = solved(pulse("half_sine", steps * dx / C), dx=dx, duration=0.002)
    assert [remark.value for remark in run.remarks] == ([pytest.approx(steps)] if said else [])
    if not said:
        assert run.peak_compression.value == pytest.approx(1e6 / AREA, rel=0.01)


def test_a_member_in_the_air_is_not_at_rest_and_its_set_is_that_of_the_member_on_its_toe() -> None:
    """A rod of 800 kg on its toe alone bounces off it. It stays down by the slip of the toe, its largest movement less
    the quake, but for the weight that it carries then as before. The struck end was 34 mm above its place, and said
    to rebound by 49 mm.
    """
    blow = {"kind": "drop", "ram_mass": 2000.0, "impact_velocity": 4.0}
    blow["cushion"] = {"stiffness": 1e9, "restitution": 0.8}
    run = solved(blow, far_end="ground", ground={"surface": 0.0, "toe": TOE}, dx=0.25, gravity=True,
                 gauges={"toe": LENGTH})  # fmt: skip
    assert run.gauges["toe"].displacement[-1] < -0.01
    assert not run.at_rest
    assert set(told(run)) == {"in_the_air"}
    weight = 800 * 9.80665 / TOE["resistance"] * TOE["quake"]
    # the largest movement is that of a step, not of a moment
    assert run.set == pytest.approx(run.max_toe_displacement + weight - TOE["quake"], rel=1e-4)
    assert run.head_set == pytest.approx(run.set, rel=1e-6)


def test_a_head_without_a_rest_has_no_set() -> None:
    """Without gravity the same rod flies off for ever: its head is nowhere for good."""
    run = solved(HALF_SINE, far_end="ground", ground={"surface": 0.0, "toe": TOE}, dx=0.25, duration=0.05)
    assert "no_rest" in told(run)
    assert run.set is not None
    assert (run.head_set, run.head_rebound) == (None, None)


@pytest.mark.parametrize(
    ("gap", "kinds"), [(0.0, ["joint_opened"]), (1e-5, ["joint_closed", "joint_opened"])]
)
def test_faces_that_touch_already_are_not_closed_by_the_wave(gap: float, kinds: list[str]) -> None:
    """A pulse of 1 ms passes the joint, comes back as tension after 1 ms, and parts it."""
    joint = {"kind": "contact", "gap": gap}
    run = solved(pulse("half_sine", 0.001), part(5.0), part(5.0, joint_above=joint), dx=0.25, duration=0.004)
    assert [event.kind for event in run.events] == kinds


def test_nothing_is_told_as_minus_nothing() -> None:
    """A pulse of no force, and a rod that strikes at place 0."""
    still = solved(pulse("half_sine", 0.001, 0.0), dx=0.25, duration=0.002)
    assert [str(peak.value) for peak in (still.peak_compression, still.peak_tension)] == ["0.0", "0.0"]
    striker = {"kind": "striker", "velocity": 1.0, "segments": [part(1.0)]}
    struck = solved(striker, dx=0.25, duration=0.002)
    assert [str(event.position) for event in struck.events] == ["0.0"] * len(struck.events)

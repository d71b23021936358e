"""One run is read in many ways - gauges, envelope, pictures, peaks, events - and they must tell the same story,
whatever is struck.
"""

from __future__ import annotations

from copy import deepcopy

import numpy as np
from hypothesis import given

from solver import GaugeRecord, Result, SolveError, first_blow, solve
from tests.solver.comparing import assert_close
from tests.solver.strategies import Tree, case_in, project_trees


def with_gauges(tree: Tree) -> Tree:
    """Gauges at both ends, at a segment's end and anywhere between."""
    tree = deepcopy(tree)
    case = tree["cases"][0]
    lengths = [s["length"] for s in case["member"]["segments"]]
    places = {"head": 0.0, "first end": lengths[0], "between": 0.613 * sum(lengths), "toe": sum(lengths)}
    case["gauges"] = [{"name": name, "position": x} for name, x in places.items()]
    return tree


def solved(tree: Tree) -> Result | None:
    try:
        return solve(case_in(tree))
    except SolveError:
        return None


def round_off(values: np.ndarray) -> float:
    return 1e-9 * (float(np.abs(values).max(initial=0.0)) or 1e-300)


@given(project_trees().map(with_gauges))
def test_motion_of_a_gauge_is_consistent(tree: Tree) -> None:
    """Velocity is the mean of two half steps and acceleration their difference, so that for every record
    u(n+1) - u(n) = (v + a dt/2) dt and v(n+1) - v(n) = (a(n) + a(n+1)) dt/2, to round-off (1e-9 of the largest,
    and of a nanometre: digits of the place at rest).
    """
    result = solved(tree)
    if result is None:
        return
    dt = result.time_step
    for name, g in result.gauges.items():
        u, v, a = g.displacement, g.velocity, g.acceleration
        scale = float(np.abs(u).max()) + dt * float(np.abs(v).max()) + dt**2 * float(np.abs(a).max()) + 1e-9
        assert_close(np.diff(u), (v + a * dt / 2)[:-1] * dt, 1e-9, f"movement at {name}", scale)
        assert_close(np.diff(v) * dt, (a[1:] + a[:-1]) * dt**2 / 2, 1e-9, f"velocity at {name}", scale)
        waves = float(np.abs(g.down_wave).max() + np.abs(g.up_wave).max())
        assert_close(g.down_wave + g.up_wave, g.force, 1e-12, f"waves at {name}", waves)
        assert_close(g.stress * g.area, g.force, 1e-12, f"stress at {name}")


@given(project_trees().map(with_gauges))
def test_no_gauge_sees_more_than_the_envelope(tree: Tree) -> None:
    """Between nodes and on them a gauge reads means of elements, so that the envelope of the elements around it
    bounds it; the same holds for movement. (Not at ends, joints and steps, where a gauge reads the boundary's
    force itself.)
    """
    result = solved(tree)
    if result is None:
        return
    e, g = result.envelope, result.gauges["between"]
    near = np.argsort(np.abs(e.position - g.position))[:4]
    borders = np.cumsum([s.length for s in result.case.member.segments])[:-1]
    widest = 2.5 * float(np.abs(e.position[near] - g.position).max())
    attached = [a.position for a in result.case.member.attachments]
    total = result.case.member.length
    if any(abs(b - g.position) < widest for b in (*borders, *attached, 0.0, total)):
        return
    stress = round_off(np.array([e.lowest_stress[near].min(), e.highest_stress[near].max()]))
    # area of the gauge against that of its elements
    tapers = 0.02 * max(float(np.abs(g.stress).max()), 1e-300)
    assert g.stress.min() >= e.lowest_stress[near].min() - stress - tapers
    assert g.stress.max() <= e.highest_stress[near].max() + stress + tapers
    assert g.velocity.max() <= e.max_velocity[near].max() + round_off(g.velocity)
    assert g.displacement.max() <= e.max_displacement[near].max() + round_off(g.displacement)


@given(project_trees().map(with_gauges))
def test_peaks_pictures_and_events_agree_with_the_envelope(tree: Tree) -> None:
    result = solved(tree)
    if result is None:
        return
    e, f = result.envelope, result.fields
    assert_envelope_holds_pictures(result)
    for peak, values, times in (
        (result.peak_compression, -e.lowest_stress, e.lowest_stress_time),
        (result.peak_tension, e.highest_stress, e.highest_stress_time),
    ):
        assert abs(peak.value - max(float(values.max()), 0.0)) <= 1e-8 * peak.value
        if peak.value > 0:
            at = int(np.argmin(np.abs(e.position - peak.position)))
            assert values[at] >= peak.value * (1 - 1e-8)
            assert times[at] == peak.time
    for whole, first in zip((result.peak_compression, result.peak_tension), first_blow(result), strict=True):
        assert first.peak.value <= whole.value
        assert result.struck_again is not None or first.peak.value == whole.value
    assert len(e.position) == result.elements
    assert np.all(np.diff(e.position) > 0)
    assert np.all(np.diff(f.time) > 0)
    assert np.all(np.diff(result.ledger.time) > 0)
    moments = [event.time for event in result.events]
    assert moments == sorted(moments)
    assert all(0 <= t <= result.duration for t in moments)
    assert result.max_toe_displacement >= toe_of(result).displacement.max() - round_off(
        toe_of(result).displacement
    )
    assert abs(result.duration - (result.steps - 1) * result.time_step) <= 1e-12 * result.duration


def assert_envelope_holds_pictures(result: Result) -> None:
    """Every stress in the pictures of the member lies within the envelope of its element (single against
    double precision: 1e-6).
    """
    e, f = result.envelope, result.fields
    member = f.position > 0
    at = np.abs(e.position[None, :] - f.position[member][:, None]).argmin(axis=1)
    margin = 1e-6 * max(float(np.abs(f.stress).max()), 1e-30)
    assert np.all(f.stress[:, member].min(axis=0) >= e.lowest_stress[at] - margin)
    assert np.all(f.stress[:, member].max(axis=0) <= e.highest_stress[at] + margin)


def toe_of(result: Result) -> GaugeRecord:
    return result.gauges["toe"]

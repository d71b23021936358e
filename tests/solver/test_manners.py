"""How `solve` behaves towards its caller: progress, Stop, partial results, memory, and runs that end by themselves."""

from __future__ import annotations

import tracemalloc
from concurrent.futures import ThreadPoolExecutor
from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from solver import Progress, Result, SolveError, solve
from solver.answer.store import Store
from tests.published.rods import AREA, Z, case_of, pulse, solved
from tests.solver.strategies import Tree, case_in, project_trees

#: Long enough for many chunks of 8 million element-steps: 2 s on 500 elements of 20 mm are 500,000 steps.
LONG: dict[str, Any] = {"gauges": {"middle": 5.0}, "duration": 2.0, "dx": 0.02}
HALF_SINE = pulse("half_sine", 0.001)
DROP: Tree = {
    "kind": "drop",
    "ram_mass": 3000.0,
    "impact_velocity": 4.0,
    "cushion": {"stiffness": 1e9, "restitution": 0.8},
    "cap_mass": 300.0,
    "pile_cushion": {"stiffness": 2e9, "restitution": 0.5},
}
GROUND: Tree = {
    "surface": 2.0,
    "shaft_total": {"resistance": 4e5, "distribution": "growing", "quake": 0.0025, "damping": 0.16},
    "toe": {"resistance": 8e5, "quake": 0.0025, "damping": 0.5},
}


def test_progress_rises_and_partial_results_are_the_beginning_of_the_whole() -> None:
    """Fractions rise within 0 and 1; every partial result holds the records so far to the last bit, and says
    that it is not all.
    """
    told: list[tuple[Progress, Result]] = []
    whole = solve(case_of(HALF_SINE, **LONG), progress=lambda p: told.append((p, p.partial())))
    fractions = [p.fraction for p, _ in told]
    assert len(told) >= 3
    assert fractions == sorted(set(fractions))
    assert 0 < fractions[0]
    assert fractions[-1] <= 1
    assert all(p.seconds_left >= 0 for p, _ in told)
    for progress, part_of_it in told:
        assert not part_of_it.finished
        assert part_of_it.steps == pytest.approx(progress.fraction * whole.steps, rel=1e-6)
        gauge = part_of_it.gauges["middle"]
        assert np.array_equal(gauge.force, whole.gauges["middle"].force[: part_of_it.steps])
        assert part_of_it.peak_compression.value <= whole.peak_compression.value
        assert part_of_it.ledger.residual < 1e-10
    assert whole.finished


def test_stop_is_heard_within_a_chunk() -> None:
    """What is solved so far comes back, marked as unfinished, with a word about it."""
    asked: list[int] = []
    result = solve(case_of(HALF_SINE, **LONG), cancel=lambda: bool(asked.append(1)) or len(asked) >= 2)
    whole = solve(case_of(HALF_SINE, **LONG))
    assert len(asked) == 2
    assert not result.finished
    assert any("stopped" in warning for warning in result.warnings)
    assert result.steps <= 2 * 8_000_000 / 501 + 2
    assert np.array_equal(result.gauges["middle"].force, whole.gauges["middle"].force[: result.steps])


def test_stop_is_heard_between_blows() -> None:
    case = case_of(DROP, far_end="ground", ground=GROUND, duration=0.03, dx=0.1, blows=50, gravity=True)
    result = solve(case, cancel=lambda: True)
    assert not result.finished


def test_progress_is_told_between_blows() -> None:
    told: list[float] = []
    case = case_of(DROP, far_end="ground", ground=GROUND, duration=0.03, dx=0.1, blows=8, gravity=True)
    solve(case, progress=lambda p: told.append(p.fraction))
    assert told == sorted(set(told))
    assert len(told) >= 2


@given(project_trees(), st.integers(2, 5))
def test_a_shorter_run_is_the_beginning_of_a_longer_one(tree: Tree, times: int) -> None:
    """Bit for bit: nothing that is recorded depends on how long the run will last (frames are thinned, loads
    are let go, chunks cut).
    """
    longer = {**tree, "cases": [{**tree["cases"][0]}]}
    longer["cases"][0]["run"] = {
        **tree["cases"][0]["run"],
        "duration": times * tree["cases"][0]["run"]["duration"],
    }
    try:
        short, long = solve(case_in(tree)), solve(case_in(longer))
    except SolveError:
        return  # what goes wrong later in the longer run is no matter here
    for name, gauge in short.gauges.items():
        assert np.array_equal(gauge.force, long.gauges[name].force[: short.steps]), name
        assert np.array_equal(gauge.displacement, long.gauges[name].displacement[: short.steps]), name
    if short.head_train:
        assert np.array_equal(short.head_train.cushion_force, long.head_train.cushion_force[: short.steps])
    kinds = [(e.kind, e.time) for e in short.events if e.time < 0.9 * short.duration]
    assert kinds == [(e.kind, e.time) for e in long.events if e.time < 0.9 * short.duration]


# --- refusals
# --------------------------------------------------------------------------------------------------------


def peak_memory(duration: float) -> int:
    """Largest memory (bytes) that Python and numpy held while a case without gauges was solved."""
    case = case_of(HALF_SINE, duration=duration, dx=0.05)
    tracemalloc.start()
    try:
        result = solve(case)
        assert result.fields.stress.shape[0] <= 2049
        return tracemalloc.get_traced_memory()[1]
    finally:
        tracemalloc.stop()


def test_memory_does_not_grow_with_the_run() -> None:
    """Pictures are thinned while the run goes on: eight times as many steps (400,000 instead of 50,000) need no
    more memory.

    A half more is allowed for the loads of a chunk; steps times nodes would be 320 MB more.
    """
    solve(case_of(HALF_SINE, duration=0.001, dx=0.05))
    short, long = peak_memory(0.5), peak_memory(4.0)
    assert long < 1.5 * short + 5e6


# --- ends of runs and loads
# ------------------------------------------------------------------------------------------


def test_a_run_without_a_duration_ends_at_rest() -> None:
    """A pile: the run ends by itself, and a run twice as long finds the same set within 1 % of the largest
    movement.
    """
    result = solved(DROP, far_end="ground", ground=GROUND, gravity=True, duration=None)
    longer = solved(DROP, far_end="ground", ground=GROUND, gravity=True, duration=2 * result.duration)
    assert result.at_rest
    assert result.finished
    assert result.set == pytest.approx(longer.set, abs=0.01 * longer.max_toe_displacement)
    assert not any("not come to rest" in warning for warning in result.warnings)


def test_a_run_without_a_duration_waits_for_its_load() -> None:
    """Two pulses with 0.3 s between, in which everything has come to rest: the second is not forgotten."""
    times, values = [0.0, 5e-4, 1e-3, 0.3, 0.3005, 0.301], [0.0, 1e6, 0.0, 0.0, 2e6, 0.0]
    load = {"kind": "history", "quantity": "force", "times": times, "values": values}
    result = solved(
        load, far_end="matched", attachments=[{"position": 5.0, "kind": "dashpot", "value": Z}], duration=None
    )
    assert result.duration > 0.301
    assert result.peak_compression.time > 0.3


def test_a_member_that_never_rests_is_told() -> None:
    """A free rod without any damping rings for ever: the run ends after many passages and says so."""
    result = solved(HALF_SINE, duration=None)
    assert not result.at_rest
    assert any("not come to rest" in warning for warning in result.warnings)


@pytest.mark.parametrize("duration", [0.02, 1.0])
def test_a_velocity_load_lets_go_at_its_end(duration: float) -> None:
    """Rectangle of 1 m/s for 1.03 ms, then free, whatever the length of the run: half of the first echo (from -Z
    V at a free far end) comes back doubled in velocity, so that the struck end moves at 2 V while it passes, at
    2L/c = 4 ms.
    """
    load = pulse("rectangle", 0.00103, 1.0, "velocity", release=True)
    gauge = solved(load, gauges={"head": 0.0}, duration=duration).gauges["head"]
    assert gauge.velocity[np.searchsorted(gauge.time, 0.0005)] == pytest.approx(1.0, abs=1e-12)
    assert gauge.velocity[np.searchsorted(gauge.time, 0.0025)] == pytest.approx(0.0, abs=1e-9)
    assert gauge.velocity[np.searchsorted(gauge.time, 0.0045)] == pytest.approx(2.0, abs=1e-9)


def test_a_velocity_load_that_holds_throws_the_echo_back() -> None:
    """Without `release` the end stands still after the pulse: the echo (tension Z V) is doubled in force there."""
    gauge = solved(pulse("rectangle", 0.001, 1.0, "velocity"), gauges={"head": 0.0}, duration=0.006).gauges[
        "head"
    ]
    echo = np.searchsorted(gauge.time, 0.0045)
    assert gauge.velocity[echo] == pytest.approx(0.0, abs=1e-12)
    assert gauge.force[echo] == pytest.approx(2 * Z, rel=1e-9)


def test_a_history_of_thousands_of_points_is_the_curve_that_it_samples() -> None:
    """A half-sine told by 20,000 points, many of them within one step: 1e-7 of the peak, the square of their
    spacing.
    """
    t = np.linspace(0, 0.001, 20_001)
    load = {
        "kind": "history",
        "quantity": "force",
        "times": t.tolist(),
        "values": (1e6 * np.sin(np.pi * t / 0.001)).tolist(),
    }
    a = solved(load, gauges={"g": 7.0}, duration=0.006, dx=0.05).gauges["g"]
    b = solved(HALF_SINE, gauges={"g": 7.0}, duration=0.006, dx=0.05).gauges["g"]
    assert np.abs(a.force - b.force).max() < 1e-7 * 1e6


def test_repeated_blows_come_to_repeat() -> None:
    """Sets of later blows agree within the tolerance asked for, fewer blows than allowed are struck, and
    force is locked in.
    """
    blows = {"most": 20, "tolerance": 1e-5}
    result = solved(DROP, far_end="ground", ground=GROUND, gravity=True, duration=None, blows=blows)
    assert result.residual is not None
    sets = result.residual.set_per_blow
    assert result.residual.repeats
    assert 2 <= len(sets) < 20
    assert abs(sets[-1] - sets[-2]) <= 1e-5
    assert result.set == pytest.approx(sets[-1], abs=1e-9)
    assert result.residual.force.min() < -1e4


def test_one_blow_of_several_is_the_blow_alone() -> None:
    """`blows` 1 and the first set of `blows` 3 agree to 1e-9 of the movement."""
    alone = solved(DROP, far_end="ground", ground=GROUND, gravity=True, duration=0.04)
    three = solved(DROP, far_end="ground", ground=GROUND, gravity=True, duration=0.04, blows=3)
    assert three.residual is not None
    assert alone.set == pytest.approx(three.residual.set_per_blow[0], abs=1e-9 * alone.max_toe_displacement)


def test_results_cannot_be_changed() -> None:
    """Arrays of a result are read-only, so that no picture can alter what another one shows."""
    result = solved(HALF_SINE, gauges={"g": 5.0}, duration=0.004)
    for array in (
        result.gauges["g"].force,
        result.envelope.lowest_stress,
        result.fields.stress,
        *result.ledger.parts.values(),
    ):
        with pytest.raises(ValueError, match="read-only"):
            array[0] = 0.0


def test_two_threads_solve_apart() -> None:
    """Kernels run without the interpreter's lock: two cases at once give what each gives alone."""
    cases = [case_of(pulse("half_sine", t), gauges={"g": 5.0}, duration=0.05) for t in (0.001, 0.002)]
    alone = [solve(case) for case in cases]
    with ThreadPoolExecutor(2) as pool:
        together = list(pool.map(solve, cases))
    for a, b in zip(alone, together, strict=True):
        assert np.array_equal(a.gauges["g"].force, b.gauges["g"].force)


def test_a_refused_run_gives_up_its_files(monkeypatch: pytest.MonkeyPatch) -> None:
    """Records in files, as long runs have them: closed, while the error still holds all that led to it; and what was
    read of a file before it was closed stays.
    """
    files: list[Store] = []

    def in_file(rows: int, columns: int) -> Store:
        files.append(Store(rows, columns, most_in_memory=0))
        return files[-1]

    monkeypatch.setattr("solver.marching.Store", in_file)
    pulled = solve(case_of(HALF_SINE, gauges={"g": 5.0}, dx=0.25, duration=0.004)).gauges["g"].force
    with pytest.raises(SolveError, match="pressed together"):
        solve(case_of(pulse("half_sine", 0.001, 1e10), gauges={"g": 5.0}, dx=0.25, duration=0.004))
    whole, _, refused, _ = files
    assert whole.read().shape == (5, pulled.size)
    with pytest.raises(ValueError, match="closed file"):
        refused.read()
    files.clear()
    del whole
    # a half-sine of 20 steps
    assert pulled.min() == pytest.approx(-1e8 * AREA, rel=0.01)

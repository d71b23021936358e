"""What linear members must do: scale with the load, add loads, and start later when the load starts later."""

from __future__ import annotations

from copy import deepcopy

import numpy as np
from hypothesis import given
from hypothesis import strategies as st

from solver import Result, solve
from tests.solver.comparing import assert_close
from tests.solver.strategies import SHARES, Tree, case_in, project_trees

LINEAR = project_trees(("elastic", "viscoelastic"), linear=True)


def with_gauges(tree: Tree) -> Tree:
    """Gauges at both ends and between, whatever the project had."""
    case = tree["cases"][0]
    length = sum(s["length"] for s in case["member"]["segments"])
    case["gauges"] = [{"name": f"at {share:g}", "position": share * length} for share in (0.0, 0.37, 1.0)]
    return tree


def scaled(tree: Tree, factor: float) -> Tree:
    """The same case under `factor` times its load."""
    other = deepcopy(tree)
    load = other["cases"][0]["load"]
    if load["kind"] == "pulse":
        load["peak"] *= factor
    else:
        load["values"] = [factor * v for v in load["values"]]
    return other


def assert_records(found: Result, expected: dict[str, tuple[np.ndarray, np.ndarray]], share: float) -> None:
    """Force and displacement of every gauge, within a share of the largest at any gauge."""
    force = max(float(np.abs(f).max()) for f, _ in expected.values()) or 1e-300
    movement = max(float(np.abs(d).max()) for _, d in expected.values()) or 1e-300
    for name, (f, d) in expected.items():
        assert_close(found.gauges[name].force, f, share, f"force {name}", force)
        assert_close(found.gauges[name].displacement, d, share, f"movement {name}", movement)


def records(result: Result, factor: float = 1.0) -> dict[str, tuple[np.ndarray, np.ndarray]]:
    return {name: (factor * g.force, factor * g.displacement) for name, g in result.gauges.items()}


@given(LINEAR.map(with_gauges), st.sampled_from([-1.0, -0.3, 2.0, 17.0]))
def test_the_answer_is_proportional_to_the_load(tree: Tree, factor: float) -> None:
    """Springs, dashpots, masses, viscous material, any far end but wall and ground: 1e-10 of the largest, for
    round-off alone differs.
    """
    assert_records(solve(case_in(scaled(tree, factor))), records(solve(case_in(tree)), factor), 1e-10)


@st.composite
def two_histories(draw: st.DrawFn) -> tuple[Tree, Tree, Tree]:
    """One member under a history, under another one with the same times, and under both at once."""
    first = draw(LINEAR.map(with_gauges).filter(lambda t: t["cases"][0]["load"]["kind"] == "history"))
    load = first["cases"][0]["load"]
    size = max(abs(v) for v in load["values"]) or 1.0
    more = [size * (2 * draw(SHARES) - 1) for _ in load["values"]]
    second, both = deepcopy(first), deepcopy(first)
    second["cases"][0]["load"]["values"] = more
    both["cases"][0]["load"]["values"] = [a + b for a, b in zip(load["values"], more, strict=True)]
    return first, second, both


@given(two_histories())
def test_loads_add(cases: tuple[Tree, Tree, Tree]) -> None:
    """Superposition, 1e-9 of the larger of both answers and of their sum (impulses of histories are
    differences of long sums).
    """
    a, b, both = (solve(case_in(tree)) for tree in cases)
    one, two = records(a), records(b)
    total = {name: (one[name][0] + two[name][0], one[name][1] + two[name][1]) for name in one}
    force = max(float(np.abs(r[name][0]).max()) for r in (one, two, total) for name in one) or 1e-300
    movement = max(float(np.abs(r[name][1]).max()) for r in (one, two, total) for name in one) or 1e-300
    for name, gauge in both.gauges.items():
        assert_close(gauge.force, total[name][0], 1e-9, f"force {name}", force)
        assert_close(gauge.displacement, total[name][1], 1e-9, f"movement {name}", movement)


@given(LINEAR.map(with_gauges).filter(lambda t: t["cases"][0]["load"]["kind"] == "pulse"), st.integers(1, 40))
def test_a_load_that_starts_later_by_some_steps_has_its_answer_later(tree: Tree, steps: int) -> None:
    """Nothing happens before the load begins. 1e-9 of the largest: where a pulse ends is computed from its start.

    (A velocity load that lets go does so on a step, and which one may turn on round-off: it is held to the end here.)
    """
    tree["cases"][0]["load"] |= {"start": 0.0}
    tree["cases"][0]["load"].pop("release", None)
    first = solve(case_in(tree))
    later = deepcopy(tree)
    delay = steps * first.time_step
    later["cases"][0]["load"]["start"] = delay
    later["cases"][0]["run"]["duration"] += delay
    second = solve(case_in(later))
    assert second.time_step == first.time_step
    count = min(first.steps, second.steps - steps)
    for name, gauge in first.gauges.items():
        late = second.gauges[name]
        assert not late.force[:steps].any()
        scale = (
            float(np.abs(gauge.force).max()) + gauge.impedance * float(np.abs(gauge.velocity).max()) + 1e-300
        )
        assert_close(late.force[steps : steps + count], gauge.force[:count], 1e-9, f"force {name}", scale)
        movement = float(np.abs(first.fields.displacement).max()) or 1e-300
        assert_close(
            late.displacement[steps : steps + count],
            gauge.displacement[:count],
            1e-9,
            f"movement {name}",
            movement,
        )

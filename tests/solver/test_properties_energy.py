"""Energy, for whatever is struck: it closes or the run is refused, and none comes from nothing.

The balance is struck again here from the parts of the ledger, not taken from the solver's own `residual`. Meshes
are those that the program chooses.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray

from solver import Result, SolveError, project_from_tree, solve
from solver.numerics.chain import build_chain
from solver.run import solve_chain
from tests.published.rods import case_of, part, pulse
from tests.solver.strategies import Tree, case_in, project_trees

CAME_IN = ("work_of_load", "work_of_gravity", "initial_energy")
STORED = ("kinetic", "elastic_member", "elastic_ground", "elastic_cushion", "elastic_springs")
LOST = (
    "plastic",
    "viscous",
    "cushion_loss",
    "ground_static_loss",
    "ground_damping_loss",
    "absorbed_by_dashpots",
)
GIVEN_BACK = "impact_loss"  # falls where a contact parts: it gives back what the meeting took over its step

#: 100 cases where a plain run has 40, 2,500 in the nightly profile.
MANY = settings(max_examples=settings.default.max_examples * 5 // 2)


def largest_energy(result: Result) -> float:
    """The most energy that any part held, J: what shares are taken of."""
    return max(float(np.abs(values).max()) for values in result.ledger.parts.values()) or 1e-300


def unbalanced(result: Result) -> float:
    """Largest share of the energy that is neither brought in, nor stored, nor lost."""
    parts = result.ledger.parts
    off = sum(parts[k] for k in (*STORED, *LOST, GIVEN_BACK)) - sum(parts[k] for k in CAME_IN)
    return float(np.abs(off - off[0]).max()) / largest_energy(result)


def most_negative_step(values: NDArray[np.float64]) -> float:
    return float(np.diff(values).min(initial=0.0))


def solved_or_refused(tree: Tree) -> Result | None:
    """The result, or None where the run was refused in the manner that the user is promised: one sentence or two."""
    try:
        return solve(case_in(tree))
    except SolveError as refusal:
        sentence = str(refusal)
        assert sentence[0].isupper() or sentence[0] == "'"
        assert sentence.endswith(".")
        assert "\n" not in sentence
        assert "nan" not in sentence.split()
        return None


@settings(MANY)
@given(project_trees())
def test_energy_closes_or_the_run_is_refused(tree: Tree) -> None:
    """All laws, joints, loads, grounds. Closes to 0.1 % of the largest energy; where a segment yields, cracks or
    is strained a lot, a result that closes no better than to 1 % says so, and none is shown beyond 5 % (the
    method's own limits).

    Why not better: a law with a kink (cushion, slider, yield, crack) acts with the mean of its values half a step
    before and after, so that a step which crosses the kink is off by the square of the step. A yielding front is
    one element wide on any mesh, and an open crack closes within one step.
    """
    result = solved_or_refused(tree)
    if result is None:
        return
    off = unbalanced(result)
    kinds = {m["law"]["kind"] for m in tree["materials"]}
    if kinds <= {"elastic", "viscoelastic"}:
        assert off <= 2e-3 if "viscoelastic" in kinds else off <= 1e-3
    else:
        assert off <= 0.05
        assert off <= 0.0101 or any("does not close" in warning for warning in result.warnings)
    assert result.ledger.residual == pytest.approx(off, rel=3, abs=1e-9)


@settings(MANY)
@given(project_trees())
def test_no_energy_comes_from_nothing(tree: Tree) -> None:
    """No dissipated part ever falls, contacts have lost no less than nothing in the end, and the energy of
    motion, which cannot be negative and owes nothing to any law, never exceeds all that came in.

    Round-off is 1e-9 of the largest energy. 1 % for the motion: a wave of twice the spacing of nodes has no
    energy in the balance (`elastic_member` counts it negative), so this is the bound on how much of it a result
    may hold.
    """
    result = solved_or_refused(tree)
    if result is None:
        return
    parts, scale = result.ledger.parts, largest_energy(result)
    for name in LOST:
        assert most_negative_step(parts[name]) >= -1e-9 * scale, name
        assert parts[name].min() >= -1e-9 * scale, name
    assert parts[GIVEN_BACK][-1] >= -1e-3 * scale
    brought = sum(parts[k] for k in CAME_IN)
    assert (parts["kinetic"] - np.maximum.accumulate(brought)).max() <= 0.01 * scale


@settings(MANY)
@given(project_trees(("elastic",), linear=True))
def test_energy_of_linear_members_closes_to_round_off(tree: Tree) -> None:
    """Elastic bonded members with springs, dashpots and masses under force or velocity: 1e-10 of the largest
    energy (required).
    """
    result = solve(case_in(tree))
    assert unbalanced(result) <= 1e-10
    for name in (
        "plastic",
        "viscous",
        "cushion_loss",
        "ground_static_loss",
        "ground_damping_loss",
        GIVEN_BACK,
    ):
        assert not result.ledger.parts[name].any()


@given(project_trees())
def test_what_is_not_there_loses_nothing(tree: Tree) -> None:
    """A row of the ledger is exactly 0 where the case has nothing of its kind."""
    case = tree["cases"][0]
    for part_of_ground in [case["ground"] or {}, *_resistances(case["ground"])]:
        if "damping" in part_of_ground:
            part_of_ground["damping"] = 0.0
    result = solved_or_refused(tree)
    if result is None:
        return
    text, final = str(tree), result.ledger.final
    scale = largest_energy(result)
    has = {
        "plastic": "elastic_plastic" in text,
        "viscous": "viscoelastic" in text,
        "cushion_loss": "restitution" in text,
        "ground_static_loss": case["ground"] is not None,
        "ground_damping_loss": "radiation" in text,
        "absorbed_by_dashpots": case["far_end"]["kind"] in ("dashpot", "matched") or "dashpot" in text,
    }
    for name, there in has.items():
        if not there:
            assert abs(final[name]) <= 1e-12 * scale, name


def _resistances(ground: Tree | None) -> list[Tree]:
    if ground is None:
        return []
    found = [*ground.get("layers", []), ground.get("shaft_total"), ground.get("toe")]
    return [r for r in found if r is not None]


def under_force(tree: Tree) -> bool:
    return bool(tree["cases"][0]["load"]["quantity"] == "force")


@given(project_trees(("elastic",), linear=True).filter(under_force))
def test_work_of_a_force_is_what_passes_a_gauge_at_the_struck_end(tree: Tree) -> None:
    """The ledger's work of the load against -sum F v dt of a gauge at the very end, where nothing else is attached.

    Two ways to the same sum: equal to 1e-9 of the work's own largest value.
    """
    case = tree["cases"][0]
    case["member"]["attachments"] = [a for a in case["member"]["attachments"] if a["position"] > 0]
    case["gauges"] = [{"name": "end", "position": 0.0}]
    result = solve(project_from_tree(tree).cases[0])
    gauge = result.gauges["end"]
    so_far = gauge.time <= result.ledger.time[-1]  # the ledger ends on its last frame
    passed = -float(np.sum((gauge.force * gauge.velocity)[so_far]) * result.time_step)
    work = result.ledger.parts["work_of_load"]
    assert passed == pytest.approx(float(work[-1]), abs=1e-9 * max(float(np.abs(work).max()), 1e-300))


@given(st.floats(1.01, 1.5))
def test_a_run_made_to_diverge_is_refused(factor: float) -> None:
    """A step longer than a wave needs through an element: the explicit scheme runs away, and no result may
    come of it.
    """
    case = case_of(pulse("half_sine", 0.001), part(4.0), part(6.0, area=0.003), duration=0.02, dx=0.1)
    chain = build_chain(case)
    with pytest.raises(SolveError, match=r"energy|ran away|pressed"):
        solve_chain(replace(chain, dt=factor * chain.dt))

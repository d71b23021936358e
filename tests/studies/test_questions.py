"""Answers put back into the solver give what was asked for, and where there is none it is said."""

from pathlib import Path

import pytest

from solver import load_project, solve
from solver.studies import plan_of, with_value
from solver.studies.largest_blow import largest_blow
from solver.studies.plan import at_value
from solver.studies.questions import point, shown_by
from tests.studies.piles import pile

DEMO = Path(__file__).resolve().parents[2] / "demo_projects" / "02-concrete-pile-in-soft-ground.strike"


def test_largest_drop_put_back_reaches_the_limit_and_does_not_pass_it() -> None:
    plan = plan_of(pile(limit=200e6, elements=40), count=4)
    answer = largest_blow(plan, 1.0e6)
    assert answer.why == "found"
    assert answer.level is not None
    again = point(plan, 1.0e6, answer.level)
    assert again.share is not None
    assert 1 - 2 * answer.tolerance <= again.share <= 1
    slightly_more = type(answer.level)(
        answer.level.pointer, answer.level.value * (1 + 2 * answer.tolerance), "", "length"
    )
    assert point(plan, 1.0e6, slightly_more).over


@pytest.mark.parametrize(
    ("limit", "why"), [(1e6, "none within"), (5e9, "all within"), (None, "no limit"), (200e6, "found")]
)
def test_no_answer_is_said_as_such(limit: float | None, why: str) -> None:
    plan = plan_of(pile(limit=limit, elements=20), count=3)
    answer = largest_blow(plan, 0.8e6)
    assert answer.why == why
    assert (answer.level is None) == (why in ("none within", "no limit"))


def test_smaller_blows_that_pass_a_limit_on_a_ringing_pile_do_not_hide_the_largest_admissible_one() -> None:
    """Under small drops the ram of the concrete demo falls again on a pile that still rings; at 85 % of the limit the
    second blow passes it from about 0.25 to 0.43 m, the first blow from 0.6 m on."""
    project = load_project(DEMO)
    concrete = next(m for m in project.materials if m.limits.value("tension"))
    limit = 0.85 * concrete.limits.value("tension")
    weaker = concrete.model_copy(update={"limits": concrete.limits.model_copy(update={"tension": limit})})
    others = [weaker if m.name == concrete.name else m for m in project.materials]
    case = with_value(project.cases[0].with_materials(others), "load/drop_height", 0.5)
    plan = plan_of(case)
    answer = largest_blow(plan, plan.own_total)
    assert answer.why == "found"
    assert answer.smaller_pass == "later"
    assert answer.level is not None
    assert 0.25 < answer.at_least < 0.5 < answer.level.value < 0.65
    for edge, beyond in ((answer.level.value, 1.003), (answer.at_least, 0.997)):
        inside = point(plan, plan.own_total, at_value(answer.level, edge))
        assert inside.share is not None
        assert 0.99 < inside.share <= 1
        assert point(plan, plan.own_total, at_value(answer.level, edge * beyond)).over
    assert point(plan, plan.own_total, at_value(answer.level, 0.3)).again_only


def test_when_the_case_itself_passes_a_limit_the_nearest_blow_is_told() -> None:
    plan = plan_of(pile(limit=200e6, elements=20, height=3.0), count=3)
    assert point(plan, 1.0e6, plan.own_level).over
    answer = largest_blow(plan, 1.0e6)
    assert answer.level is not None
    assert answer.level.value < 3.0
    assert point(plan, 1.0e6, answer.level).share == pytest.approx(1, abs=2 * answer.tolerance)


def test_value_that_the_model_does_not_take_is_left_out() -> None:
    plan = plan_of(pile(elements=20), count=3, pointer="load/cushion/restitution", values=[0.5, 0.8])
    answer = largest_blow(plan, 0.8e6)
    assert answer.high <= 1
    assert answer.why in ("found", "all within")


def test_set_that_a_resistance_shows_gives_the_resistance_back() -> None:
    plan = plan_of(pile(elements=40), count=4)
    wanted = 0.9e6
    forward = point(plan, wanted, plan.levels[0])
    assert forward.set == solve(plan.variant(wanted, plan.levels[0])).set
    assert forward.set is not None
    back = shown_by(plan, plan.levels[0], forward.set, 0.0)
    assert back.middle == pytest.approx(wanted, rel=back.tolerance)


def test_reading_error_gives_a_band_whose_ends_give_the_sets_back() -> None:
    plan = plan_of(pile(elements=40), count=4)
    answer = shown_by(plan, plan.levels[0], 0.006, 0.001)
    assert answer.at_least is not None
    assert answer.middle is not None
    assert answer.at_most is not None
    assert answer.at_least < answer.middle < answer.at_most
    for resistance, measured in ((answer.at_least, 0.007), (answer.middle, 0.006), (answer.at_most, 0.005)):
        # d ln(set)/d ln(R) is about -2 here, so 0.1 % of resistance is 0.2 % of the set
        assert point(plan, resistance, plan.levels[0]).set == pytest.approx(measured, rel=3e-3)


def test_set_outside_of_the_range_has_no_resistance() -> None:
    plan = plan_of(pile(elements=20), count=3)
    huge = shown_by(plan, plan.levels[0], 2.0, 0.001)
    assert (huge.at_least, huge.middle, huge.at_most) == (None, None, None)
    fine = shown_by(plan, plan.levels[0], 0.004, 0.004)
    assert fine.at_most is None  # a set of nothing is shown by any resistance, however large

"""What a set sheet plans, and what a point of it says: by hand."""

from __future__ import annotations

from dataclasses import replace

import pytest

from solver import Event, solve
from solver.answer.findings import StressAt, StressFinding
from solver.studies import Cell, plan_of
from solver.studies.depth import at_penetration
from solver.studies.sheet import solved_cell
from solver.studies.variation import StudyError
from tests.studies.piles import pile

PLAN = plan_of(pile(elements=20), resistances=(400e3, 800e3), values=(1.0,))


def cell(**more: object) -> Cell:
    return Cell(0, 0, 400e3, PLAN.levels[0], **more)


def test_every_point_is_solved_until_the_member_is_at_rest() -> None:
    """Whatever the case's own run: its set is asked for."""
    case = pile(elements=20)
    short = case.model_copy(update={"run": case.run.model_copy(update={"duration": 0.01})})
    plan = plan_of(short, resistances=(400e3,), values=(1.0,))
    assert plan.variant(400e3, plan.levels[0]).run.duration is None


def test_where_the_toe_alone_is_varied_no_total_lies_below_the_shaft() -> None:
    """800 kN along the shaft and 200 kN under the toe; 0.4 times the total would be half of the shaft."""
    plan = plan_of(pile(shaft=800e3, toe=200e3, elements=20), values=(1.0,), vary="toe")
    assert plan.resistances[0] >= 800e3
    assert plan_of(pile(shaft=800e3, toe=200e3, elements=20), values=(1.0,)).resistances[0] < 800e3


def test_one_value_is_one_line() -> None:
    with pytest.raises(StudyError, match="given twice"):
        plan_of(pile(elements=20), values=(1.0, 1.0))


@pytest.mark.parametrize(("set_m", "blows"), [(0.002, 500.0), (2.5e-4, 4000.0), (2.4e-4, None), (0.0, None)])
def test_less_than_a_quarter_of_a_millimetre_is_practically_no_set(set_m: float, blows: float | None) -> None:
    point = cell(set=set_m)
    assert point.moves == (blows is not None)
    assert point.blows_per_metre == (None if blows is None else pytest.approx(blows))


def test_the_sign_that_is_nearer_to_its_limit_decides() -> None:
    """100 of 200 MPa in compression, 3 of 2 MPa in tension."""
    pushed, pulled = StressAt(100e6, 1.0, 0.001, "Pile", 200e6), StressAt(3e6, 7.0, 0.004, "Pile", 2e6)
    point = cell(
        compression=StressFinding("compression", pushed, pushed),
        tension=StressFinding("tension", pulled, pulled),
    )
    assert point.worst == ("tension", pulled)
    assert point.share == pytest.approx(1.5)
    assert point.over


def test_blows_of_the_ram_and_a_toe_that_lifts_are_counted() -> None:
    """A toe that stands beyond a gap has not lifted at the beginning."""
    case = pile(elements=20)
    run = solve(case.model_copy(update={"run": case.run.model_copy(update={"duration": 0.005})}))
    hits = (Event("impact", 0.0, 0.0), Event("impact", 0.0, 0.02))
    lifted = Event("toe_lift", 12.0, 0.03)
    again = solved_cell(400e3, PLAN.levels[0], replace(run, events=(*hits, lifted)))
    assert (again.strikes, again.lifted) == (2, True)
    once = solved_cell(400e3, PLAN.levels[0], replace(run, events=(hits[0], replace(lifted, time=0.0))))
    assert (once.strikes, once.lifted) == (1, False)


def test_a_factor_on_the_toe_changes_the_toe_alone() -> None:
    """400 kN under the toe and 400 kN along 10 m: half of the one, and of the other what 5 m of it are."""
    case = at_penetration(pile(elements=20), 5.0, {"toe": 0.5})
    assert case.ground is not None
    assert case.ground.toe is not None
    assert case.ground.shaft_total is not None
    assert case.ground.toe.resistance == pytest.approx(200e3)
    assert case.ground.shaft_total.resistance == pytest.approx(200e3)

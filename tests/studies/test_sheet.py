"""The sheet: the same as single solves, whatever the order; monotone; right for a rigid member."""

from itertools import pairwise

import pytest
from hypothesis import Phase, given, settings
from hypothesis import strategies as st

from solver import Case, findings_of, solve
from solver.model.load import Drop
from solver.studies import cells_of, gathered, plan_of, solve_sheet, with_resistance, with_value
from tests.studies.piles import pile


def test_each_cell_is_what_a_single_solve_says() -> None:
    case = pile()
    sheet = solve_sheet(plan_of(case, [400e3, 900e3], values=[0.6, 1.0]))
    assert sheet.complete
    for cell in sheet.cells:
        alone = solve(
            with_resistance(with_value(case, "load/drop_height", cell.level.value), cell.resistance)
        )
        assert cell.set == alone.set
        assert cell.compression == findings_of(alone).compression
    assert [(c.line, c.row) for c in sheet.cells] == [(0, 0), (0, 1), (1, 0), (1, 1)]


def test_number_of_workers_and_order_change_nothing() -> None:
    plan = plan_of(pile(elements=30), count=4)
    one = solve_sheet(plan, workers=1)
    assert solve_sheet(plan, workers=3).cells == one.cells
    assert gathered(plan, iter(reversed(one.cells))).cells == one.cells


def test_stop_leaves_what_is_solved() -> None:
    done: list[int] = []
    plan = plan_of(pile(elements=30))
    found = list(cells_of(plan, progress=done.append, cancel=lambda: len(done) >= 3, workers=1))
    assert 3 <= len(found) < 30


def test_where_the_pile_refuses_there_is_practically_no_set() -> None:
    (cell,) = solve_sheet(plan_of(pile(height=0.05), [9e6], values=[0.05])).cells
    assert cell.set is not None
    assert not cell.moves
    assert cell.blows_per_metre is None


@pytest.mark.parametrize("resistance", [800e3, 1.5e6])
def test_rigid_member_on_a_rigid_plastic_toe_follows_the_energy(resistance: float) -> None:
    """A short pile that hardly deforms, ram and cushion that give all back, no damping: what the pile has received
    goes into toe work, Ru (set + Q/2) = energy at the head (published_checks section 17, bounds). The energy is
    that of the gauge; 3 % for the elastic energy left in the pile and the mass below the gauge."""
    case = pile(
        length=3.0,
        area=0.05,
        shaft=1.0,
        toe=resistance,
        toe_damping=0,
        damping=0,
        toe_quake=0.001,
        restitution=1.0,
    )
    (cell,) = solve_sheet(plan_of(case, [resistance], values=[1.0])).cells
    assert cell.set is not None
    assert cell.energy is not None
    work = resistance * (cell.set + 0.001 / 2)
    assert work <= cell.energy.value * 1.03
    weight = 9.81 * (3000 + 1500) * (cell.set + 0.01)  # ram, cap and pile sink while they do work
    assert cell.energy.value <= cell.energy.source_energy + weight
    assert work == pytest.approx(cell.energy.value, rel=0.03)


piles = st.builds(
    pile,
    length=st.floats(6, 25),
    area=st.floats(0.005, 0.05),
    ram=st.floats(1000, 8000),
    height=st.floats(0.3, 1.5),
    shaft=st.floats(50e3, 1e6),
    toe=st.floats(50e3, 1e6),
    distribution=st.sampled_from(["uniform", "growing"]),
    quake=st.floats(0.001, 0.004),
    toe_quake=st.floats(0.001, 0.008),
    cushion=st.floats(1e8, 2e9),
    elements=st.just(30),
)


@settings(max_examples=15, phases=[Phase.explicit, Phase.generate])
@given(case=piles)
def test_more_resistance_never_gives_more_set_and_a_higher_drop_never_less(case: Case) -> None:
    """Holds to 0.02 mm for every set above half of the toe's quake (in 200 random piles: 2,700 pairs, no exception).

    Below that the exceptions are of the model, not of the sheet: the toe rebounds by about its quake, so a small set is
    the difference of two larger movements, and what friction holds back, a toe that lifts, or a ram that strikes again
    while the member still moves decides over tenths of a millimetre. Of 430 such pairs 20 are not in order.
    """
    assert isinstance(case.load, Drop)
    assert case.load.drop_height is not None
    assert case.ground is not None
    assert case.ground.toe is not None
    assert case.ground.toe.quake is not None
    height, least = case.load.drop_height, case.ground.toe.quake / 2
    sheet = solve_sheet(plan_of(case, count=4, values=[height, 1.25 * height]))
    ordered = [(stronger, weaker) for i in range(2) for weaker, stronger in pairwise(sheet.line(i))]
    ordered += list(zip(sheet.line(0), sheet.line(1), strict=True))
    for less, more in ordered:
        assert less.set is not None
        assert more.set is not None
        if less.set > least:
            assert less.set <= more.set + 2e-5, (less, more)

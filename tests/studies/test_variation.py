"""A case made into another keeps what is not varied, and is checked as a file is."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from solver.studies import StudyError, plan_of, resistance_of, value_at, with_resistance, with_value
from tests.studies.piles import layer, pile

LAYERED = [layer("Clay", 4.0, 20e3), layer("Sand", 10.0, 40e3, 80e3)]


@given(total=st.floats(1e3, 1e8), layered=st.booleans())
def test_total_is_scaled_with_the_toe_share_and_the_distribution_kept(total: float, layered: bool) -> None:
    case = pile(layers=LAYERED if layered else None)
    before, after = resistance_of(case), resistance_of(with_resistance(case, total))
    assert after.total == pytest.approx(total, rel=1e-12)
    assert after.toe / after.total == pytest.approx(before.toe / before.total, rel=1e-12)


def test_toe_alone_leaves_the_shaft_as_it_is() -> None:
    case = pile(shaft=400e3, toe=400e3)
    varied = resistance_of(with_resistance(case, 1e6, "toe"))
    assert varied.shaft == 400e3
    assert varied.toe == pytest.approx(600e3, rel=1e-12)
    with pytest.raises(StudyError, match="The shaft alone has 400000 N"):
        with_resistance(case, 300e3, "toe")


def test_layer_that_grows_keeps_its_shape() -> None:
    case = pile(layers=LAYERED)
    varied = with_resistance(case, 2 * resistance_of(case).total)
    assert varied.ground is not None
    assert varied.ground.layers[1].unit_resistance == pytest.approx(80e3)
    assert varied.ground.layers[1].unit_resistance_bottom == pytest.approx(160e3)


def test_any_number_by_its_place_and_the_rest_unchanged() -> None:
    case = pile()
    varied = with_value(case, "load/cushion/stiffness", 9e8)
    assert value_at(varied, "load/cushion/stiffness") == 9e8
    assert with_value(varied, "load/cushion/stiffness", 4e8) == case
    assert varied.material("steel") == case.material("steel")
    assert value_at(with_value(case, "member/segments/0/length", 14.0), "member/segments/0/length") == 14.0


@pytest.mark.parametrize(
    ("pointer", "value", "told"),
    [
        ("load/efficiency", 1.4, "less than or equal to 1"),
        ("load/drop_height", -1.0, "greater than 0"),
        (
            "member/segments/0/length",
            0.5,
            "gauge",
        ),  # the checks between parts see it: a gauge lies beyond the end
        ("load/strength", 1.0, "is not there"),
        ("load/kind", 1.0, "not a number"),
        ("load/energy", 1.0, "not a number of the case that is given"),
    ],
)
def test_what_a_file_could_not_hold_is_refused_with_its_place(pointer: str, value: float, told: str) -> None:
    with pytest.raises(StudyError, match=told):
        with_value(pile(), pointer, value)


def test_range_is_chosen_around_the_own_total_in_round_steps() -> None:
    plan = plan_of(pile(shaft=400e3, toe=600e3))
    assert len(plan.resistances) == 10
    assert 0.25e6 <= plan.resistances[0] <= 0.55e6
    assert 2.0e6 <= plan.resistances[-1] <= 3.0e6
    assert all(r % 50e3 == 0 for r in plan.resistances)
    assert [level.value for level in plan.levels] == [1.0, 0.7, 1.3]


def test_without_ground_there_is_no_set() -> None:
    case = pile()
    bare = case.model_copy(
        update={"ground": None, "far_end": case.far_end.model_copy(update={"kind": "free"})}
    )
    with pytest.raises(StudyError, match="needs ground"):
        plan_of(bare)
    with pytest.raises(StudyError, match="1 to 4 values"):
        plan_of(case, values=[1, 2, 3, 4, 5])

"""Down to depth: the ground stays where it is and the member goes down."""

import math

import pytest

from solver import solve
from solver.studies import StudyError, resistance_of
from solver.studies.depth import REFUSAL, at_penetration, down_to_depth
from tests.studies.piles import layer, pile

LAYERED = [layer("Clay", 4.0, 20e3), layer("Sand", 20.0, 40e3)]
PERIMETER = 1.6


@pytest.mark.parametrize(("depth", "shaft"), [(2.0, 2 * 20e3), (4.0, 4 * 20e3), (9.0, 4 * 20e3 + 5 * 40e3)])
def test_shaft_grows_layer_by_layer(depth: float, shaft: float) -> None:
    """Unit resistance times perimeter times length in each layer, by hand."""
    case = at_penetration(pile(layers=LAYERED), depth)
    assert resistance_of(case).shaft == pytest.approx(shaft * PERIMETER, rel=1e-12)
    loosened = at_penetration(pile(layers=LAYERED), depth, {"Clay": 0.5})
    clay = min(depth, 4.0) * 20e3 * PERIMETER
    assert resistance_of(loosened).shaft == pytest.approx(shaft * PERIMETER - clay / 2, rel=1e-12)


@pytest.mark.parametrize(("distribution", "power"), [("uniform", 1), ("growing", 2)])
def test_total_keeps_its_law_with_depth(distribution: str, power: int) -> None:
    case = pile(distribution=distribution, shaft=500e3)  # 10 m in the ground
    assert resistance_of(at_penetration(case, 5.0)).shaft == pytest.approx(500e3 / 2**power, rel=1e-12)
    assert at_penetration(case, 10.0) == case


def test_each_depth_is_a_solve_and_blows_add_up() -> None:
    case = pile(layers=LAYERED, elements=30)
    found = down_to_depth(case, [8.0, 4.0, 6.0], blows_per_minute=30, toe_at=[(4.0, 100e3), (8.0, 500e3)])
    assert found is not None
    assert [p.penetration for p in found.points] == [4.0, 6.0, 8.0]
    assert [p.toe for p in found.points] == pytest.approx([100e3, 300e3, 500e3])
    ground = at_penetration(case, 6.0).ground
    assert ground is not None
    assert ground.toe is not None
    toe = ground.toe.model_copy(update={"resistance": 300e3})
    alone = case.model_copy(update={"ground": ground.model_copy(update={"toe": toe})})
    assert found.points[1].cell.set == solve(alone).set
    sets = [p.cell.set for p in found.points]
    assert sets[0] > sets[1] > sets[2]
    by_hand = (1 / sets[0] + 1 / sets[1]) / 2 * 2.0
    assert found.blows[1] == pytest.approx(by_hand, rel=1e-12)
    assert found.seconds[2] == pytest.approx(2 * found.blows[2], rel=1e-12)


def test_first_depth_of_refusal_and_of_a_limit_is_named() -> None:
    hard = [layer("Clay", 4.0, 20e3), layer("Rock", 20.0, 900e3)]
    found = down_to_depth(pile(layers=hard, elements=30, limit=1e6), [3.0, 5.0, 7.0, 9.0])
    assert found is not None
    assert found.first_refusal is not None
    assert found.first_refusal.penetration > 4.0
    assert found.first_refusal.cell.set is not None
    assert found.first_refusal.cell.set < REFUSAL
    assert found.first_over is not None
    assert found.first_over.penetration == 3.0
    assert math.isinf(found.blows[-1]) == (not found.points[-1].cell.moves)


def test_depths_that_cannot_be_are_refused() -> None:
    with pytest.raises(StudyError, match="at most the length"):
        at_penetration(pile(), 40.0)
    with pytest.raises(StudyError, match="no layer named 'Clai'"):
        at_penetration(pile(layers=LAYERED), 4.0, {"Clai": 0.5})

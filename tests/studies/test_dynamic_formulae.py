"""Orders of magnitude only: the pile formulae of the trade against the sheet, for a pile that they were made for.

published_checks section 17: modified Gates (FHWA HI-97-014, quoted), Janbu and Danish. The formulae differ among
themselves by a factor of two and know no waves, so a factor of two is all that is asked. They prove nothing about
the solver; they would show a wrong unit.
"""

import math

import pytest

from solver.studies import plan_of
from solver.studies.questions import shown_by
from tests.studies.piles import pile

WEIGHT, HEIGHT, LENGTH, AREA, MODULUS, EFFICIENCY = 40e3, 1.2, 20.0, 0.01, 210e9, 0.75
PILE_WEIGHT = 20e3  # as in section 17


def gates(measured: float) -> float:
    return 1e3 * (7 * math.sqrt(WEIGHT * HEIGHT) * math.log10(10 * 0.025 / measured) - 550)


def janbu(measured: float) -> float:
    energy = EFFICIENCY * WEIGHT * HEIGHT
    c = 0.75 + 0.15 * PILE_WEIGHT / WEIGHT
    lam = energy * LENGTH / (AREA * MODULUS * measured**2)
    return energy / (c * (1 + math.sqrt(1 + lam / c)) * measured)


def danish(measured: float) -> float:
    energy = EFFICIENCY * WEIGHT * HEIGHT
    return energy / (measured + math.sqrt(energy * LENGTH / (2 * AREA * MODULUS)))


def test_formulae_give_the_published_figures() -> None:
    assert gates(0.005) == pytest.approx(2055.5797e3, rel=1e-6)
    assert danish(0.005) == pytest.approx(1989.7117e3, rel=1e-6)
    assert janbu(0.005) == pytest.approx(1678.9608e3, rel=1e-6)


@pytest.mark.parametrize("measured", [0.003, 0.005, 0.010])
@pytest.mark.parametrize("formula", [gates, janbu, danish])
def test_sheet_and_formula_agree_to_a_factor_of_two(formula, measured: float) -> None:
    case = pile(
        length=LENGTH, area=AREA, modulus=MODULUS, height=HEIGHT, ram=WEIGHT / 9.81, efficiency=EFFICIENCY,
        shaft=800e3, toe=800e3, elements=40,
    )  # fmt: skip
    plan = plan_of(case, count=3)
    shown = shown_by(plan, plan.levels[0], measured, 0.0).middle
    assert shown is not None
    assert 0.5 < shown / formula(measured) < 2

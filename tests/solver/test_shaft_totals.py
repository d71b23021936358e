"""The resistance that a description says its shaft has, by hand and as the solver puts it on its nodes."""

from __future__ import annotations

from math import pi

import pytest
from hypothesis import given, settings

from solver import Case
from solver.model import derived
from solver.numerics.chain import build_chain
from solver.numerics.ground import shaft_of
from tests.published.rods import case_of, part, pulse
from tests.solver.strategies import Tree, case_in, project_trees


def on_nodes(case: Case) -> float:
    """Sum of the static strengths on all nodes, N, whatever the law there."""
    shaft = shaft_of(build_chain(case))
    return float(shaft.par[0].sum() + shaft.power[:, 1].sum() + shaft.radiation[1].sum())


def test_layers_over_two_segments_take_the_perimeter_of_each() -> None:
    """A round bar of 0.4 m diameter over one of 0.2 m, 5 m each; the ground begins at 2 m. Clay of 20 kPa down to 6 m
    lies on 3 m of the upper and 1 m of the lower bar; sand of 50 to 90 kPa down to 10 m on 4 m of the lower:

        20 kPa pi (0.4 x 3 + 0.2 x 1) m2 = 87.96 kN     and     70 kPa pi 0.2 x 4 m2 = 175.93 kN

    Exact, by hand; and on the nodes of the solver, where Simpson's rule on each half element is exact too.
    """
    upper, lower = ({"section": {"shape": "solid_round", "diameter": d}} for d in (0.4, 0.2))
    quake = {"quake": 0.0025, "damping": 0.2}
    layers = [
        {"name": "clay", "thickness": 4.0, "unit_resistance": 20e3, **quake},
        {"name": "sand", "thickness": 4.0, "unit_resistance": 50e3, "unit_resistance_bottom": 90e3, **quake},
    ]
    case = case_of(
        pulse("half_sine", 0.002), part(5.0, **upper), part(5.0, **lower),
        ground={"surface": 2.0, "layers": layers}, dx=0.5,
    )  # fmt: skip
    by_hand = (20e3 * pi * (0.4 * 3 + 0.2 * 1), 70e3 * pi * 0.2 * 4)
    assert derived.layer_resistances(case) == pytest.approx(by_hand, rel=1e-13)
    assert on_nodes(case) == pytest.approx(sum(by_hand), rel=1e-12)


@settings(max_examples=20)
@given(project_trees())
def test_the_nodes_carry_what_the_description_says(tree: Tree) -> None:
    """Any member in any ground: tapers, open pipes, layers across segments and below the end, totals of either
    distribution. Two programs that share no line; both are exact, so they agree to round-off.
    """
    case = case_in(tree)
    assert on_nodes(case) == pytest.approx(derived.shaft_resistance(case), rel=1e-11, abs=1e-6)

"""Driven piles with ram, cushion, cap, pile cushion and Smith's ground against an integration of their own in
`independent`.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from solver import Result
from tests.published.rods import material, part, solved
from tests.solver.independent.driven_pile import Blow, Cushion, Pile, strike

#: A steel pipe pile (E 210 GPa, 7850 kg/m3, 0.02 m2) of 20 m, 14 m of it in ground that slips at 60 kN/m.
STEEL = Pile(
    length=20.0,
    axial=210e9 * 0.02,
    line_mass=7850 * 0.02,
    ram=3000.0,
    cap=500.0,
    speed=4.0,
    cushion=Cushion(1.2e9, 0.8),
    pile_cushion=Cushion(2e9, 0.5),
    shaft=60e3,
    shaft_from=6.0,
    shaft_quake=0.0025,
    shaft_damping=0.16,
    toe=0.8e6,
    toe_quake=0.0025,
    toe_damping=0.5,
    gravity=True,
)
PILES = {
    "steel pile": STEEL,
    "without gravity": replace(STEEL, gravity=False),
    "toe only, soft cushions": replace(
        STEEL, shaft=0.0, toe=2e6, cushion=Cushion(3e8, 0.4), pile_cushion=Cushion(4e8, 0.3)
    ),
    "hard driving": replace(STEEL, shaft=150e3, toe=3e6, shaft_damping=0.6, toe_damping=1.2, toe_quake=0.005),
    "concrete pile": replace(
        STEEL,
        axial=36e9 * 0.16,
        line_mass=2450 * 0.16,
        ram=6000.0,
        cap=1200.0,
        pile_cushion=Cushion(8e8, 0.5),
        toe=1e6,
    ),
}
UNTIL = 0.05


def by_the_solver(pile: Pile) -> Result:
    """The same pile described as a project: area 0.02 m2 and a material that gives its EA and mass; perimeter 1 m."""
    area = 0.02
    of = material("pile", pile.axial / area, pile.line_mass / area)
    ground = {
        "surface": pile.shaft_from,
        "layers": [
            {
                "name": "one",
                "thickness": pile.length,
                "unit_resistance": pile.shaft,
                "quake": pile.shaft_quake,
                "damping": pile.shaft_damping,
            }
        ],
        "toe": {"resistance": pile.toe, "quake": pile.toe_quake, "damping": pile.toe_damping},
    }
    drop = {
        "kind": "drop",
        "ram_mass": pile.ram,
        "impact_velocity": pile.speed,
        "cap_mass": pile.cap,
        "cushion": {"stiffness": pile.cushion.stiffness, "restitution": pile.cushion.restitution},
        "pile_cushion": {
            "stiffness": pile.pile_cushion.stiffness,
            "restitution": pile.pile_cushion.restitution,
        },
    }
    return solved(
        drop,
        part(pile.length, area, "pile"),
        materials=[of],
        far_end="ground",
        ground=ground,
        gauges={"head": 0.0, "middle": pile.length / 2},
        duration=UNTIL,
        gravity=pile.gravity,
    )


@pytest.fixture(scope="module", params=PILES)
def both(request: pytest.FixtureRequest) -> tuple[Result, Blow]:
    pile = PILES[request.param]
    return by_the_solver(pile), strike(pile, UNTIL)


def test_peak_forces(both: tuple[Result, Blow]) -> None:
    """At the top and in the middle, within 0.5 % (required); the difference is that of two meshes, 400 and
    120 elements.
    """
    result, blow = both
    assert -result.gauges["head"].force.min() == pytest.approx(blow.head_force.max(), rel=0.005)
    assert -result.gauges["middle"].force.min() == pytest.approx(blow.middle_force.max(), rel=0.005)


def test_largest_movement_of_the_toe(both: tuple[Result, Blow]) -> None:
    result, blow = both
    assert result.max_toe_displacement == pytest.approx(blow.largest_toe, rel=0.005)


def test_set(both: tuple[Result, Blow]) -> None:
    """Within 0.5 % of the largest movement: the set is a difference of movements and may be small itself."""
    result, blow = both
    assert result.set is not None
    assert result.set == pytest.approx(blow.set, abs=0.005 * blow.largest_toe)


def test_the_whole_record_in_the_middle(both: tuple[Result, Blow]) -> None:
    """Root mean square of the difference over the run under 1 % of the peak: not only peaks agree. The
    integration's own mesh disperses the short waves of the cushions' closing and opening, which is most of it.
    """
    result, blow = both
    gauge = result.gauges["middle"]
    wanted = np.interp(gauge.time, blow.time, blow.middle_force)
    off = -gauge.force - wanted
    assert np.sqrt(np.mean(off**2)) < 0.01 * blow.middle_force.max()

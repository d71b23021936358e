"""Scaling of units: a case told in other units of length, time and mass has the same answer in those units.

Gravity is off, for it is the one number that the program brings along. Factors are powers of two, so that even
round-off is the same and every branch is taken alike: nothing in the solver may hide a length, a force or a time
of its own.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from solver import SolveError, solve
from tests.solver.comparing import assert_close
from tests.solver.strategies import Tree, case_in, project_trees

LENGTH, AREA, TIME, MASS = (1, 0, 0), (2, 0, 0), (0, 1, 0), (0, 0, 1)
STRESS, FORCE, VELOCITY, STIFFNESS, IMPEDANCE = (-1, -2, 1), (1, -2, 1), (1, -1, 0), (0, -2, 1), (0, -1, 1)
ENERGY = (2, -2, 1)

#: Exponents of length, time and mass of every number in a case, by its key.
DIMENSIONS: dict[str, tuple[float, float, float]] = {
    **dict.fromkeys(
        ["length", "thickness", "position", "gap", "slack", "surface", "quake", "perimeter"], LENGTH
    ),
    **dict.fromkeys(["diameter", "outer_diameter", "wall", "width", "depth", "across_flats"], LENGTH),
    **dict.fromkeys(["flange_width", "flange", "web", "void_diameter"], LENGTH),
    **dict.fromkeys(["young_modulus", "hardening_modulus", "yield_stress", "tensile_strength"], STRESS),
    **dict.fromkeys(["unit_resistance", "unit_resistance_bottom", "shear_modulus"], STRESS),
    **dict.fromkeys(["density", "soil_density"], (-3, 0, 1)),
    **dict.fromkeys(["duration", "start", "rise", "fall", "times"], TIME),
    **dict.fromkeys(["impact_velocity", "velocity", "initial_velocity"], VELOCITY),
    **dict.fromkeys(["ram_mass", "cap_mass", "mass"], MASS),
    **{
        "area": AREA,
        "viscosity": (-1, -1, 1),
        "stiffness": STIFFNESS,
        "spring": STIFFNESS,
        "resistance": FORCE,
    },
    **{"coefficient": IMPEDANCE, "dashpot": IMPEDANCE, "energy": ENERGY, "force": FORCE},
}
#: Numbers without a dimension.
PURE = {"poisson_ratio", "restitution", "exponent", "inner_share", "version"}


@dataclass(frozen=True)
class Units:
    """How many of the new units go into one old one."""

    length: float
    time: float
    mass: float

    def factor(self, exponents: tuple[float, float, float]) -> float:
        return float(self.length ** exponents[0] * self.time ** exponents[1] * self.mass ** exponents[2])

    def of(self, node: Any, key: str = "", holder: Tree | None = None) -> Any:
        """A project tree, or a part of it, told in the new units."""
        if isinstance(node, dict):
            return {k: self.of(v, k, node) for k, v in node.items()}
        if isinstance(node, list):
            return [self.of(v, key, holder) for v in node]
        if not isinstance(node, float) or key in PURE:
            return node
        return node * self.factor(self._exponents(key, holder or {}))

    def _exponents(self, key: str, holder: Tree) -> tuple[float, float, float]:
        if key in ("peak", "values"):
            key = holder["quantity"]
        elif key == "value":
            key = holder["kind"]
        elif key == "damping":
            power = holder.get("exponent", 1.0)
            return -power, power, 0
        return DIMENSIONS[key]


def without_gravity(tree: Tree) -> Tree:
    """Gravity off, and a drop told by its velocity (a height needs gravity)."""
    case = tree["cases"][0]
    case["run"]["gravity"] = False
    if case["load"].pop("drop_height", None):
        case["load"]["impact_velocity"] = 4.0 * case["load"].pop("efficiency")
    return tree


FACTORS = st.sampled_from([0.125, 0.5, 1.0, 2.0, 8.0])


@given(project_trees().map(without_gravity), FACTORS, FACTORS, FACTORS)
def test_the_answer_does_not_depend_on_units(tree: Tree, length: float, time: float, mass: float) -> None:
    """Gauges, envelope and ledger, each to 1e-7 of its largest value: powers of speed round apart, and cracks and
    sliders carry that on. The set to 1e-5 of the largest movement and 1e-11 m: rest is iterated to a tolerance.
    """
    units = Units(length, time, mass)
    try:
        here = solve(case_in(tree))
    except SolveError:
        with pytest.raises(SolveError):
            solve(case_in(units.of(tree)))
        return
    there = solve(case_in(units.of(tree)))
    assert (there.elements, there.steps) == (here.elements, here.steps)
    assert [e.kind for e in there.events] == [e.kind for e in here.events]
    pairs = [
        (there.time_step, here.time_step, TIME),
        (there.envelope.lowest_stress, here.envelope.lowest_stress, STRESS),
    ]
    pairs += [(there.max_toe_displacement, here.max_toe_displacement, LENGTH)]
    for name, gauge in here.gauges.items():
        other = there.gauges[name]
        pairs += [(other.force, gauge.force, FORCE), (other.velocity, gauge.velocity, VELOCITY)]
        pairs += [(other.displacement, gauge.displacement, LENGTH), (other.strain, gauge.strain, (0, 0, 0))]
    rows = [np.array([result.ledger.parts[k] for k in here.ledger.parts]) for result in (there, here)]
    pairs += [(*rows, ENERGY)]
    for found, value, exponents in pairs:
        assert_close(found, np.asarray(value) * units.factor(exponents), 1e-7, f"exponents {exponents}")
    if here.set is not None:
        moved = float(np.abs(here.fields.displacement).max()) * length
        assert there.set == pytest.approx(here.set * length, abs=1e-5 * moved + 1e-11)

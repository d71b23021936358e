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
from tests.solver.strategies import Tree, axial_stiffness, case_in, project_trees, without_powers

LENGTH, AREA, TIME, MASS = (1, 0, 0), (2, 0, 0), (0, 1, 0), (0, 0, 1)
STRESS, FORCE, VELOCITY, STIFFNESS, IMPEDANCE = (-1, -2, 1), (1, -2, 1), (1, -1, 0), (0, -2, 1), (0, -1, 1)
ENERGY = (2, -2, 1)

#: Exponents of length, time and mass of every number in a case, by its key.
DIMENSIONS: dict[str, tuple[float, float, float]] = {
    **dict.fromkeys(
        [
            "length",
            "element_length",
            "thickness",
            "position",
            "gap",
            "slack",
            "surface",
            "quake",
            "perimeter",
        ],
        LENGTH,
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


def with_powers(tree: Tree) -> Tree:
    """A shaft with the power law of damping around the whole member, on a coarse mesh (each node's root is
    iterated).
    """
    case = tree["cases"][0]
    case["run"]["element_length"] = sum(s["length"] for s in case["member"]["segments"]) / 60
    ea = axial_stiffness(case["member"]["segments"][0], tree["materials"])
    power = {"quake": 0.002, "damping": 0.3, "damping_law": "power", "exponent": 0.3}
    case["ground"] = {
        "surface": 0.0,
        "shaft_total": {"resistance": 1e-5 * ea, "distribution": "growing", **power},
    }
    if case["far_end"]["kind"] == "ground":
        case["ground"]["toe"] = {"resistance": 1e-5 * ea, **power}
    return tree


FACTORS = st.sampled_from([0.125, 0.5, 1.0, 2.0, 8.0])


@given(project_trees().map(without_gravity).map(without_powers), FACTORS, FACTORS, FACTORS)
def test_the_answer_does_not_depend_on_units(tree: Tree, length: float, time: float, mass: float) -> None:
    """Gauges, envelope and ledger, each to 1e-9 of the largest of its kind anywhere: sums of many terms round apart.
    The set to 1e-5 of the largest movement and 1e-11 m: rest is iterated to a tolerance.
    """
    assert_same_in(Units(length, time, mass), tree, 1e-9)


@given(
    project_trees(("elastic", "viscoelastic")).map(without_gravity).map(with_powers),
    FACTORS,
    FACTORS,
    FACTORS,
)
def test_nor_do_powers_of_speed(tree: Tree, length: float, time: float, mass: float) -> None:
    """Damping J |v|^N with J in (s/m)^N: 1e-3, because round-off at v = 0 grows to its N-th power."""
    assert_same_in(Units(length, time, mass), tree, 1e-3)


def assert_same_in(units: Units, tree: Tree, share: float) -> None:
    """Solve a case in old and in new units and compare, or find both refused."""
    try:
        here = solve(case_in(tree))
    except SolveError:
        with pytest.raises(SolveError):
            solve(case_in(units.of(tree)))
        return
    there = solve(case_in(units.of(tree)))
    assert (there.elements, there.steps) == (here.elements, here.steps)
    assert there.time_step == pytest.approx(here.time_step * units.time, rel=1e-12)
    stress, movement = (
        float(np.abs(f).max()) or 1e-300 for f in (here.fields.stress, here.fields.displacement)
    )
    speed = float(np.abs(here.fields.velocity).max()) or 1e-300
    pairs = [(there.envelope.lowest_stress, here.envelope.lowest_stress, STRESS, stress)]
    for name, gauge in here.gauges.items():
        other = there.gauges[name]
        pairs += [
            (other.force, gauge.force, FORCE, stress * gauge.area),
            (other.velocity, gauge.velocity, VELOCITY, speed),
        ]
        pairs += [(other.displacement, gauge.displacement, LENGTH, movement)]
    rows = [np.array([result.ledger.parts[k] for k in here.ledger.parts]) for result in (there, here)]
    pairs += [(*rows, ENERGY, float(np.abs(rows[1]).max()) or 1e-300)]
    for found, value, exponents, scale in pairs:
        factor = units.factor(exponents)
        assert_close(found, value * factor, share, f"exponents {exponents}", scale * factor)
    if here.set is not None and share < 1e-5:
        assert there.set == pytest.approx(here.set * units.length, abs=1e-5 * movement * units.length + 1e-11)

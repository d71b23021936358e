"""Members that crack in tension: a crack is a joint between two elements, so what is exact for contacts is for it."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from solver import Result, SolveError
from tests.published.rods import AREA, GRAVITY, LENGTH, C, material, part, pulse, solved
from tests.solver.test_properties_energy import unbalanced

PILE: dict[str, Any] = {
    "far_end": "ground",
    "ground": {
        "surface": 2.0,
        "shaft_total": {"resistance": 4e5, "distribution": "growing", "quake": 0.0025, "damping": 0.16},
        "toe": {"resistance": 8e5, "quake": 0.0025, "damping": 0.5},
    },
    "gravity": True,
}
DROP = {
    "kind": "drop",
    "ram_mass": 2000.0,
    "impact_velocity": 3.0,
    "cushion": {"stiffness": 1e9, "restitution": 0.5},
    "cap_mass": 300.0,
    "pile_cushion": {"stiffness": 2e9, "restitution": 0.5},
}


def brittle(strength: float, **more: Any) -> dict[str, Any]:
    return material("brittle", law={"kind": "brittle_tension", "tensile_strength": strength}, **more)


def cracked(shape: str, strength: float, duration: float, **more: Any) -> Result:
    load = pulse(shape, 0.001, **more)
    return solved(load, part(of="brittle"), materials=[brittle(strength)], duration=duration, dx=0.05)


SUDDEN = {"rise": 0.0, "fall": 0.001}


@pytest.mark.parametrize("strength", [10e6, 40e6])
@pytest.mark.parametrize(("shape", "more"), [("half_sine", {}), ("rectangle", {}), ("trapezoid", SUDDEN)])
def test_no_element_is_pulled_beyond_the_strength(shape: str, more: dict[str, Any], strength: float) -> None:
    """A crack forms on the face between two elements, whose mean is held against the strength: one of both may lie
    above it by what the pulse rises over an element (peak of 100 MPa over 100 elements: 100 pi/100 MPa). For ever:
    no ripple is left behind, the energy of motion is no more than came in, and it all closes.
    """
    result = cracked(shape, strength, 0.1, **more)
    assert result.crack_openings
    assert result.peak_tension.value <= strength + np.pi * 1e6
    parts, work = result.ledger.parts, float(result.ledger.parts["work_of_load"].max())
    assert parts["kinetic"].max() <= 1.01 * work
    assert unbalanced(result) < 1e-10


def test_a_rectangle_leaves_by_the_first_crack_and_nothing_stays() -> None:
    """The front comes back as tension as its end goes by, half a pulse before the end: the piece flies off with all of
    the momentum at 2 s0/(rho c) = 5 m/s, and neither it nor the rod carries a stress any more.
    """
    result = cracked("rectangle", 40e6, 0.01)
    (crack,) = (event for event in result.events if event.kind == "crack")
    assert crack.position == pytest.approx(LENGTH - C * 0.001 / 2, abs=1e-9)
    assert np.abs(result.fields.stress[-1]).max() < 1e-6 * 100e6
    opened = 5.0 * (result.duration - crack.time)
    assert result.crack_openings["part 1"] == pytest.approx(opened, abs=5.0 * result.time_step)


def test_a_rod_that_closes_its_cracks_again_and_again() -> None:
    """Once refused: a weak rod between a spring and a mass, whose pieces meet for many passages."""
    rod = part(3.53, of="brittle", section={"shape": "solid_round", "diameter": 0.192})
    held = [
        {"position": 0.0, "kind": "spring", "value": 2.16e8},
        {"position": 3.53, "kind": "mass", "value": 7.78},
    ]
    weak = brittle(396e3, young_modulus=39.2e9, density=791.0)
    load = pulse("half_sine", 0.68e-3, 13.9e3)
    result = solved(load, rod, materials=[weak], attachments=held, duration=0.1)
    assert result.peak_tension.value < 1.25 * 396e3
    assert result.ledger.parts["kinetic"].max() < result.ledger.parts["work_of_load"].max()
    assert result.ledger.residual < 1e-10


@pytest.mark.parametrize("strength", [1e6, 3e6])
def test_a_pile_that_cracks_in_its_ground(strength: float) -> None:
    """The shaft meets both faces of every crack; energy closes to 0.1 % (required)."""
    result = solved(DROP, part(of="brittle"), materials=[brittle(strength)], duration=0.05, **PILE)
    assert result.crack_openings
    assert result.ledger.residual < 1e-3


def test_a_pile_that_does_not_crack_is_an_elastic_one() -> None:
    """Two blows, at rest before, between and after them: peaks and set to 1e-4, as the shaft's resistance lies on nodes
    of both sides of a joint instead of one.
    """
    run = {**PILE, "blows": 2}
    sound, elastic = (
        solved(DROP, part(of="brittle"), materials=[brittle(1e9)], **run),
        solved(DROP, part(), **run),
    )
    assert sound.set == pytest.approx(elastic.set, rel=1e-4)
    assert sound.peak_compression.value == pytest.approx(elastic.peak_compression.value, rel=1e-5)
    assert sound.peak_tension.value == pytest.approx(elastic.peak_tension.value, rel=1e-5)
    assert sound.residual is not None
    assert elastic.residual is not None
    off = np.abs(sound.residual.force - elastic.residual.force).max()
    assert off < 1e-3 * np.abs(elastic.residual.force).max()


@pytest.mark.parametrize("strength", [1e5, 1e6])
def test_a_hanging_rod_bears_its_own_weight_or_is_refused(strength: float) -> None:
    """10 m of 8000 kg/m3 hang with 0.785 MPa from a spring."""
    hung = [{"position": 0.0, "kind": "spring", "value": 1e9}]
    load = pulse("half_sine", 0.001, 1e3)
    case = {"materials": [brittle(strength)], "attachments": hung, "gravity": True, "duration": 0.002}
    if strength < 8000 * GRAVITY * LENGTH:
        with pytest.raises(SolveError, match=r"would crack at .* m under its own weight"):
            solved(load, part(of="brittle"), **case)
    else:
        assert not solved(load, part(of="brittle"), **case).crack_openings


def test_a_bonded_boundary_is_as_strong_as_its_weaker_side() -> None:
    """An elastic rod with a brittle end of half a pulse: its echo pulls first at the boundary itself."""
    load = pulse("rectangle", 0.001)
    parts = part(7.5), part(2.5, of="brittle")
    result = solved(load, *parts, materials=[brittle(40e6)], duration=0.004, dx=0.05)
    (crack,) = (event for event in result.events if event.kind == "crack")
    assert crack.position == pytest.approx(7.5, abs=1e-9)
    assert list(result.crack_openings) == ["part 2"]
    assert result.peak_compression.value == pytest.approx(1e6 / AREA, rel=1e-9)

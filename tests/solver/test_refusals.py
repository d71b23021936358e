"""What `solve` refuses, each by a sentence: what is wrong, where, and what would be right."""

from __future__ import annotations

import re
from dataclasses import replace
from typing import Any

import numpy as np
import pytest

from solver import SolveError, solve
from solver.numerics.chain import build_chain
from solver.run import solve_chain
from tests.published.rods import case_of, material, part, pulse, solved
from tests.solver.test_manners import DROP, GROUND, HALF_SINE


def refusal(case: Any, **how: Any) -> str:
    with pytest.raises(SolveError) as caught:
        solve(case, **how)
    return str(caught.value)


@pytest.mark.parametrize("length", [1e-9, 1e-300])
def test_elements_too_many_for_the_memory_are_refused_before_any_is_made(length: float) -> None:
    """A rod of some metres in elements of 1 nm would be 1e10 of them."""
    assert "elements" in refusal(case_of(HALF_SINE, duration=0.02), element_length=length).casefold()


def test_a_run_that_diverges_says_when_where_and_what_helps() -> None:
    """At 1.02 times the stable step; the sentence has a time, a place and advice, and no result is shown."""
    chain = build_chain(case_of(HALF_SINE, duration=0.02, dx=0.05))
    with pytest.raises(SolveError) as caught:
        solve_chain(replace(chain, dt=1.02 * chain.dt))
    sentence = str(caught.value)
    assert " ms" in sentence
    assert " m" in sentence.replace(" ms", "")
    assert sentence.endswith(".")


def test_elements_pressed_inside_out_are_refused_even_if_they_recover() -> None:
    """3 GN on 0.01 m2 of steel is a strain of -1.5, which passes and leaves through the matched end before
    the run is over.
    """
    sentence = refusal(case_of(pulse("half_sine", 0.001, 3e9), far_end="matched", duration=0.01))
    assert "'part 1'" in sentence
    assert " ms" in sentence


@pytest.mark.parametrize(
    ("more", "word"),
    [
        ({}, "does not come to rest"),
        ({"ground": {"surface": 1.0, "layers": []}}, "does not come to rest"),
        (
            {
                "ground": {
                    **GROUND,
                    "toe": None,
                    "shaft_total": {**GROUND["shaft_total"], "resistance": 7000.0},
                }
            },
            "does not come to rest",
        ),
    ],
)
def test_gravity_without_anything_that_holds_is_refused(more: dict[str, Any], word: str) -> None:
    """The rod weighs 7.85 kN; the last ground holds 7 kN."""
    assert word in refusal(case_of(HALF_SINE, gravity=True, duration=0.01, **more))


def test_gravity_with_enough_ground_starts_at_rest() -> None:
    """9 kN hold 7.85 kN. Before the load begins nothing moves: below 1e-9 m/s, round-off of forces of 10 kN
    on elements of 2 kg.
    """
    ground = {**GROUND, "toe": None, "shaft_total": {**GROUND["shaft_total"], "resistance": 9000.0}}
    result = solved(
        pulse("half_sine", 0.001, start=0.003),
        ground=ground,
        gravity=True,
        gauges={"middle": 5.0},
        duration=0.005,
    )
    gauge = result.gauges["middle"]
    assert np.abs(gauge.velocity[gauge.time < 0.0029]).max() < 1e-9


def test_a_joint_that_would_hang_is_refused() -> None:
    """A contact joint cannot carry the lower rod, which nothing else holds."""
    ground = {
        "surface": 0.0,
        "layers": [{"name": "l", "thickness": 5.0, "unit_resistance": 1e5, "quake": 0.0025, "damping": 0.0}],
    }
    parts = part(5.0), part(5.0, joint_above={"kind": "contact", "gap": 0.0})
    assert "joint" in refusal(case_of(HALF_SINE, *parts, ground=ground, gravity=True, duration=0.01))


def test_blows_without_ground_are_refused() -> None:
    assert "blows" in refusal(case_of(DROP, duration=0.01, blows=3))


def test_a_run_of_hours_is_refused_at_once() -> None:
    """10 m at 1 mm for 1,000 s are 5e9 steps of 10,000 nodes."""
    assert "steps" in refusal(case_of(HALF_SINE, duration=1000.0, dx=0.001))


# --- memory
# ----------------------------------------------------------------------------------------------------------


def test_a_number_beyond_all_measure_is_named_before_anything_overflows() -> None:
    """Warnings of numpy are errors in this suite: an overflow on the way would fail as one."""
    lively = {**DROP, "cushion": {"stiffness": 1e9, "restitution": 1e-200}}
    heavy = [material("heavy", density=1e31)]
    for told, case in {
        "Segment 'part 1': Length 1e+300 m": case_of(HALF_SINE, part(1e300), part(4.0)),
        "Segment 'part 1', section: Area 1e-300 m^2": case_of(HALF_SINE, part(area=1e-300)),
        "Load, cushion: Coefficient of restitution 1e-200": case_of(lively),
        "Material 'heavy': Density 1e+31 kg/m^3": case_of(HALF_SINE, part(of="heavy"), materials=heavy),
    }.items():
        with pytest.raises(SolveError, match=re.escape(told)):
            solve(case)

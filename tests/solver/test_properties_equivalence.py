"""Two ways to describe the same thing have the same answer: parts split in two, joints that do nothing, and any
order of parts.
"""

from __future__ import annotations

from copy import deepcopy
from typing import Any

import numpy as np
from hypothesis import assume, given
from hypothesis import strategies as st

from solver import Result, SolveError, solve
from tests.solver import commensurate as rods
from tests.solver.comparing import assert_close
from tests.solver.strategies import SHAPES, Tree, case_in, layers, logarithmic, project_trees, without_powers

YIELDING = ("elastic", "elastic_plastic")


@st.composite
def rods_to_cut(draw: st.DrawFn, laws: tuple[str, ...] = YIELDING) -> dict[str, Any]:
    """A rod under a pulse, where to cut it (a segment and an element in it), and a gauge that is not on the cut."""
    known = [draw(rods.materials(f"m{i}", laws)) for i in range(2)]
    parts = draw(rods.rods(known))
    which = draw(st.integers(0, len(parts) - 1))
    count = rods.in_steps(parts, known)[which]
    cut = draw(st.integers(4, count - 4))
    node = draw(rods.inner_nodes(parts, known))
    assume(node != sum(rods.in_steps(parts, known)[:which]) + cut)
    young = next(m for m in known if m["name"] == parts[0]["material"])["young_modulus"]
    load = {
        "kind": "pulse",
        "quantity": "force",
        "shape": draw(st.sampled_from(SHAPES[:4])),
        "duration": draw(logarithmic(1e-4, 1e-3)),
    }
    load["peak"] = young * parts[0]["section"]["area"] * draw(logarithmic(1e-5, 1e-3))
    end = {"kind": draw(st.sampled_from(["free", "fixed", "matched"]))}
    return {
        "known": known,
        "parts": parts,
        "which": which,
        "cut": cut,
        "node": node,
        "load": load,
        "end": end,
    }


def cut(rod: dict[str, Any], joint: Tree) -> list[Tree]:
    """The rod's segments with one of them in two, joined by `joint`."""
    part = rod["parts"][rod["which"]]
    share = rod["cut"] / rods.in_steps([part], rod["known"])[0]
    upper = {**part, "length": part["length"] * share}
    lower = {**part, "name": "cut off", "length": part["length"] * (1 - share), "joint_above": joint}
    return [*rod["parts"][: rod["which"]], upper, lower, *rod["parts"][rod["which"] + 1 :]]


def solved(rod: dict[str, Any], parts: list[Tree]) -> Result:
    at = rods.place(rod["parts"], rod["known"], rod["node"])
    return rods.solved(rod["known"], parts, rod["load"], rod["end"], gauges=[{"name": "g", "position": at}])


def assert_same(found: Result, expected: Result, peak: float, share: float = 1e-9) -> None:
    """Gauge, envelope and ledger; `peak` is the force of the load."""
    a, b = found.gauges["g"], expected.gauges["g"]
    assert_close(a.force, b.force, share, "force", peak)
    assert_close(a.velocity, b.velocity, share, "velocity", peak / b.impedance)
    assert_close(found.envelope.lowest_stress, expected.envelope.lowest_stress, share, "compression")
    assert_close(
        found.envelope.highest_stress, expected.envelope.highest_stress, share, "tension", peak / b.area
    )
    energy = max(float(np.abs(values).max()) for values in expected.ledger.parts.values())
    for name, values in expected.ledger.parts.items():
        assert_close(found.ledger.parts[name], values, share, name, energy)


@given(rods_to_cut())
def test_a_segment_in_two_is_the_same_segment(rod: dict[str, Any]) -> None:
    """A bonded joint between equal segments changes nothing: 1e-9, the round-off of another sum of lengths,
    through yielding.
    """
    assert_same(solved(rod, cut(rod, {"kind": "bonded"})), solved(rod, rod["parts"]), rod["load"]["peak"])


@given(rods_to_cut(("elastic",)))
def test_a_splice_without_slack_is_a_bond(rod: dict[str, Any]) -> None:
    """Its two faces are held together by a force that just does so in every step, compression and tension
    alike: 1e-9.
    """
    found = solved(rod, cut(rod, {"kind": "slack_splice", "slack": 0.0}))
    expected = solved(rod, rod["parts"])
    peak = rod["load"]["peak"]
    assert_close(found.gauges["g"].force, expected.gauges["g"].force, 1e-9, "force", peak)
    assert_close(found.gauges["g"].displacement, expected.gauges["g"].displacement, 1e-9, "displacement")
    assert_close(found.envelope.lowest_stress, expected.envelope.lowest_stress, 1e-9, "compression")


@given(rods_to_cut(("elastic",)))
def test_a_material_that_is_never_pulled_to_its_strength_is_elastic(rod: dict[str, Any]) -> None:
    """Its elements are tied by joints that could crack, at boundaries too: 1e-9."""
    law = {"kind": "brittle_tension"}
    strong = [m | {"law": law | {"tensile_strength": m["young_modulus"]}} for m in rod["known"]]
    found = solved(rod | {"known": strong}, rod["parts"])
    assert_same(found, solved(rod, rod["parts"]), rod["load"]["peak"])


@given(rods_to_cut(("elastic",)))
def test_a_joint_without_gap_under_compression_is_none(rod: dict[str, Any]) -> None:
    """Uniform rod, matched end: only compression ever passes, so contact faces never part. 1e-9 of the peak."""
    rod = rod | {"parts": rod["parts"][:1], "which": 0, "end": {"kind": "matched"}}
    count = rods.in_steps(rod["parts"], rod["known"])[0]
    rod |= {"cut": count // 3, "node": count // 2}
    found = solved(rod, cut(rod, {"kind": "contact", "gap": 0.0}))
    expected = solved(rod, rod["parts"])
    assert_close(found.gauges["g"].force, expected.gauges["g"].force, 1e-9, "force", rod["load"]["peak"])
    assert_close(found.envelope.lowest_stress, expected.envelope.lowest_stress, 1e-9, "compression")


def both(first: Tree, second: Tree) -> tuple[Result, Result] | None:
    """Both answers, or None where both are refused."""
    answers = []
    for tree in (first, second):
        try:
            answers.append(solve(case_in(tree)))
        except SolveError:
            answers.append(None)
    assert (answers[0] is None) == (answers[1] is None)
    return None if answers[0] is None else (answers[0], answers[1])


def assert_same_by_name(found: Result, expected: Result, share: float) -> None:
    """Gauges by name, and envelopes; held against the largest stress and movement anywhere (or 1 Pa, 1e-12 m)."""
    stress = 1.0 + float(np.abs(expected.fields.stress).max())
    movement = 1e-12 + float(np.abs(expected.fields.displacement).max())
    for name, gauge in expected.gauges.items():
        assert_close(found.gauges[name].force, gauge.force, share, f"force at {name}", stress * gauge.area)
        assert_close(
            found.gauges[name].displacement, gauge.displacement, share, f"movement at {name}", movement
        )
    a, b = found.envelope, expected.envelope
    assert_close(a.lowest_stress, b.lowest_stress, share, "compression", stress)
    assert_close(a.max_displacement, b.max_displacement, share, "movement", movement)


@given(project_trees(("elastic", "viscoelastic")).map(without_powers), st.randoms(use_true_random=False))
def test_the_order_of_gauges_attachments_and_materials_does_not_matter(tree: Tree, chance: Any) -> None:
    """1e-9: values attached to one node are summed in another order."""
    other = deepcopy(tree)
    for listed in (
        other["materials"],
        other["cases"][0]["gauges"],
        other["cases"][0]["member"]["attachments"],
    ):
        chance.shuffle(listed)
    answers = both(other, tree)
    if answers:
        assert_same_by_name(*answers, 1e-9)


@st.composite
def layered(draw: st.DrawFn) -> Tree:
    """An elastic member with layers around it."""
    tree = draw(project_trees(("elastic",)))
    case = tree["cases"][0]
    length = sum(s["length"] for s in case["member"]["segments"])
    case["ground"] = {"surface": 0.1 * length, "layers": draw(layers(length, fewest=1))}
    if case["far_end"]["kind"] == "ground":
        case["far_end"] = {"kind": "free"}
    return tree


@given(layered().map(without_powers), st.integers(1, 9))
def test_a_layer_in_two_is_the_same_layer(tree: Tree, tenths: int) -> None:
    """Every layer cut at a tenth of its thickness, its unit resistance there in between: same shaft, 1e-6 of the
    largest values. Each node's strength is summed from other pieces, sliders carry that round-off on, and rest under
    gravity is iterated.
    """
    other = deepcopy(tree)
    pieces = []
    for layer in other["cases"][0]["ground"]["layers"]:
        top = layer["unit_resistance"]
        bottom = layer["unit_resistance_bottom"]
        middle = None if bottom is None else top + (bottom - top) * tenths / 10
        upper = {**layer, "thickness": layer["thickness"] * tenths / 10, "unit_resistance_bottom": middle}
        lower = {
            **layer,
            "name": layer["name"] + " below",
            "thickness": layer["thickness"] * (1 - tenths / 10),
        }
        lower["unit_resistance"] = top if middle is None else middle
        pieces += [upper, lower]
    other["cases"][0]["ground"]["layers"] = pieces
    answers = both(other, tree)
    if answers:
        assert_same_by_name(*answers, 1e-6)

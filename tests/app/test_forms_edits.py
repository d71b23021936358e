"""Adding, splitting, removing and moving parts: what the mechanics must not notice, and what follows the parts."""

from __future__ import annotations

from typing import Any

import pytest

from app.bench.forms.spec import Context
from app.bench.outline import edits
from app.starting_points import driven_pile, slender_rod_by_echo
from app.tree import copied
from solver import Case, project_from_tree
from solver.model import derived

Tree = dict[str, Any]


def context_of(tree: Tree) -> Context:
    project = project_from_tree(tree)
    return Context(project.model_dump(mode="json"), project.cases[0], "/cases/0")


def after(context: Context, edit: edits.Edit) -> Tree:
    tree = copied(context.tree)
    edit.change(tree)
    return tree


def case_of(tree: Tree) -> Case:
    return project_from_tree(tree).cases[0]


def tapered() -> Tree:
    tree = slender_rod_by_echo()
    segment = tree["cases"][0]["member"]["segments"][0]
    segment["end_section"] = {"shape": "solid_round", "diameter": 0.3}
    return tree


def test_a_split_taper_has_the_same_mass_and_travel_time() -> None:
    context = context_of(tapered())
    edit = edits.split(context, "member/segments", 0, 0.25)
    case = case_of(after(context, edit))
    assert [s.length for s in case.member.segments[:2]] == [2.0, 6.0]
    assert case.member.segments[0].end_section == case.member.segments[1].section
    before = context.case.member.segments[0]
    halves = case.member.segments[:2]
    assert sum(derived.segment_mass(s, case.materials) for s in halves) == pytest.approx(
        derived.segment_mass(before, case.materials), rel=1e-12
    )
    assert edit.label == "Split Upper"


def test_a_split_layer_resists_as_much_and_keeps_its_marks() -> None:
    tree = driven_pile()
    tree["cases"][0]["ground"]["layers"][0]["unit_resistance_bottom"] = 40e3
    context = context_of(tree)
    changed = after(context, edits.split(context, "ground/layers", 0, 0.3))
    assert derived.shaft_resistance(case_of(changed)) == pytest.approx(
        derived.shaft_resistance(context.case), rel=1e-12
    )
    marks = changed["provenance"]
    quakes = [marks[f"/cases/0/ground/layers/{i}/quake"]["source"] for i in range(3)]
    assert quakes[0] == quakes[1] == tree["provenance"]["/cases/0/ground/layers/0/quake"]["source"]


def test_an_added_layer_has_the_typical_values_of_the_one_above_marked_as_such() -> None:
    tree = driven_pile()
    context = context_of(tree)
    changed = after(context, edits.add(context, "ground/layers"))
    marks = changed["provenance"]
    assert marks["/cases/0/ground/layers/2/quake"] == tree["provenance"]["/cases/0/ground/layers/1/quake"]
    assert "/cases/0/ground/layers/2/unit_resistance" not in marks


def test_halves_of_halves_have_short_names() -> None:
    tree = driven_pile()
    for index in (0, 1):
        context = context_of(tree)
        tree = after(context, edits.split(context, "member/segments", index, 0.5))
    assert [s["name"] for s in tree["cases"][0]["member"]["segments"]] == [
        "Pile",
        "Pile lower",
        "Pile lower 2",
    ]


def test_moving_up_and_down_again_changes_nothing() -> None:
    context = context_of(driven_pile())
    down = after(context, edits.move(context, "ground/layers", 0, 1))
    assert case_of(down).ground.layers[0].name == "Dense sand"
    context_down = context_of(down)
    assert after(context_down, edits.move(context_down, "ground/layers", 1, -1)) == context.tree
    assert edits.move(context, "ground/layers", 0, -1) is None


def test_removing_takes_the_marks_along_and_selects_a_neighbour() -> None:
    context = context_of(driven_pile())
    edit = edits.remove(context, "ground/layers", [0])
    tree = after(context, edit)
    assert [layer.name for layer in case_of(tree).ground.layers] == ["Dense sand"]
    assert tree["provenance"]["/cases/0/ground/layers/0/damping"]["source"].startswith("FHWA")
    assert "/cases/0/ground/layers/1/damping" not in tree["provenance"]
    assert (edit.label, edit.select) == ("Remove layer Soft clay", "ground/layers/0")


def test_a_new_gauge_stands_in_the_longest_stretch_without_one() -> None:
    """Head 1.5 m, middle 10 m, toe 19.5 m on 20 m: the longest stretch is from 10 to 19.5 m."""
    context = context_of(driven_pile())
    edit = edits.add(context, "gauges")
    assert case_of(after(context, edit)).gauges[3].position == 14.75
    assert edit.select == "gauges/3"


@pytest.mark.parametrize(
    "place", ["member/segments", "ground/layers", "gauges", "member/attachments", "/materials"]
)
def test_whatever_is_added_is_valid_under_a_free_name(place: str) -> None:
    context = context_of(driven_pile())
    tree = after(context, edits.add(context, place))
    project_from_tree(tree)
    twice = after(context_of(tree), edits.add(context_of(tree), place))
    project_from_tree(twice)


def test_a_duplicate_has_a_name_of_its_own() -> None:
    context = context_of(slender_rod_by_echo())
    case = case_of(after(context, edits.duplicate(context, "member/segments", 1)))
    assert [s.name for s in case.member.segments] == ["Upper", "Neck", "Neck 2", "Lower"]


def test_the_first_segment_left_has_no_joint_above_it() -> None:
    tree = slender_rod_by_echo()
    tree["cases"][0]["member"]["segments"][1]["joint_above"] = {"kind": "contact", "gap": 0.0}
    tree["cases"][0]["gauges"] = []
    context = context_of(tree)
    case = case_of(after(context, edits.remove(context, "member/segments", [0])))
    assert case.member.segments[0].joint_above.kind == "bonded"

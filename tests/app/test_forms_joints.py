"""Parts added, split and removed in the outline: joints stay where they are, and the selection stays in the list."""

from __future__ import annotations

from typing import Any

import pytest

from app.bench.forms.spec import Context
from app.bench.outline import edits
from app.tree import copied
from solver import Case, project_from_tree
from tests.project.valid import valid_tree

SEGMENTS = "member/segments"


def context_of(number: int, tree: dict[str, Any] | None = None) -> Context:
    """One of the cases of `valid_tree`: 0 a pile with a taper, 2 a striker on a bar with a contact above its tip."""
    project = project_from_tree(tree or valid_tree())
    return Context(project.model_dump(mode="json"), project.cases[number], f"/cases/{number}")


def after(context: Context, edit: edits.Edit | None, number: int) -> Case:
    assert edit is not None
    tree = copied(context.tree)
    edit.change(tree)
    return project_from_tree(tree).cases[number]


def test_a_split_leaves_one_joint_where_it_is() -> None:
    """The tip lies on the bar by a contact: its upper half still does, and the two halves are bonded."""
    context = context_of(2)
    segments = after(context, edits.split(context, SEGMENTS, 1), 2).member.segments
    assert [s.joint_above.kind for s in segments] == ["bonded", "contact", "bonded"]


def test_an_added_segment_is_a_plain_one_of_the_same_section() -> None:
    """Behind the taper that is in contact comes neither a second taper nor a second contact."""
    context = context_of(2)
    segments = after(context, edits.add(context, SEGMENTS), 2).member.segments
    assert [s.joint_above.kind for s in segments] == ["bonded", "contact", "bonded"]
    context = context_of(0)
    added = after(context, edits.add(context, SEGMENTS, 0), 0).member.segments[1]
    assert added.end_section is None
    assert added.section == context.case.member.segments[0].section


@pytest.mark.parametrize(("removed", "selected"), [([1], 0), ([0], 0)])
def test_after_the_last_entry_is_removed_the_one_before_it_is_selected(
    removed: list[int], selected: int
) -> None:
    context = context_of(0)
    edit = edits.remove(context, "gauges", removed)
    assert edit.select == f"gauges/{selected}"
    assert len(after(context, edit, 0).gauges) == 1


def test_a_new_gauge_stands_in_the_longest_stretch_of_the_member_without_one() -> None:
    """A bar of 1.2 m with a gauge at 0.8 m: the middle of what is above it. The gauge on the striker, 0.2 m from its
    rear, is none of the member's.
    """
    tree = valid_tree()
    tree["cases"][2]["gauges"][1]["position"] = 0.2
    tree["cases"][2]["gauges"][0]["position"] = 0.8
    context = context_of(2, tree)
    gauges = after(context, edits.add(context, "gauges"), 2).gauges
    assert gauges[-1].position == pytest.approx(0.4)
    assert gauges[-1].on == "member"

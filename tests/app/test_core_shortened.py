"""A rod that is made shorter: what stands near its end goes with it, as one step of undo, and that is told."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from app.carried_along import carried_along
from app.document import Document
from app.starting_points import driven_pile, rod_or_bar
from app.tree import copied
from solver import ProjectError, project_from_tree

LENGTH = "member/segments/0/length"


@pytest.fixture
def document(qapp):
    return Document(project_from_tree(driven_pile()), qapp)


def places(document: Document) -> list[float]:
    return [gauge.position for gauge in document.case.gauges]


def test_gauges_beyond_the_new_end_keep_their_distance_from_it(document, qtbot):
    before = document.project
    with qtbot.waitSignal(document.told) as told:
        assert document.edit("Set length of Pile to 15.0 m", LENGTH, 15.0)
    assert places(document) == [1.5, 10.0, 14.5]  # 0.5 m above the end, as before
    assert "from 19.5\u00a0m to 14.5\u00a0m" in told.args[0]
    document.undo_stack.undo()
    assert document.project == before


def test_where_that_would_pile_them_up_they_keep_their_share_of_the_length(document):
    assert document.edit("Set length", LENGTH, 6.0)
    assert places(document) == [1.5, 3.0, 5.85]  # the middle stays the middle


def test_while_a_number_is_being_typed_nothing_moves_and_nothing_is_said(document):
    """The 1 of 15 is not meant."""
    assert not document.edit("Set length", LENGTH, 1.0, merge="typing")
    assert document.problem_at(LENGTH) is None
    assert places(document) == [1.5, 10.0, 19.5]


def test_a_gauge_that_is_put_beyond_the_end_itself_is_refused(document):
    assert not document.edit("Move gauge", "gauges/2/position", 20.5)
    assert not document.edit_tree(
        "Both",
        lambda tree: (
            tree["cases"][0]["member"]["segments"][0].update(length=15.0),
            tree["cases"][0]["gauges"][2].update(position=16.0),
        ),
    )
    assert places(document) == [1.5, 10.0, 19.5]


def test_what_else_is_wrong_is_still_told_with_what_helps(document):
    assert not document.edit("Set length", LENGTH, 3.0)
    assert document.problem_at(LENGTH).endswith("Give the ground surface a smaller distance first.")
    assert document.edit("Set surface", "ground/surface", 2.0)  # and the length that waited is taken with it
    assert document.case.member.length == 3.0


def test_an_attachment_and_a_gauge_on_the_striker_go_along_too(qapp):
    tree = rod_or_bar()
    tree["cases"][0]["member"]["attachments"] = [{"position": 2.0, "kind": "mass", "value": 1.0}]
    tree["cases"][0]["gauges"].append({"name": "On it", "position": 0.25, "on": "striker"})
    document = Document(project_from_tree(tree), qapp)
    assert document.edit("Set length", "member/segments/1/length", 0.25)
    assert document.case.member.attachments[0].position == 1.75
    assert document.edit("Set length", "load/segments/0/length", 0.2)
    assert document.case.gauges[2].position == pytest.approx(0.15)


def test_removing_the_last_segment_says_what_it_moved(document, qtbot):
    def split(tree):
        case = tree["cases"][0]
        case["member"]["segments"][0]["length"] = 10.0
        lower = copied(case["member"]["segments"][0]) | {"name": "Lower"}
        case["member"]["segments"].append(lower)

    assert document.edit_tree("Split", split)
    with qtbot.waitSignal(document.told):
        assert document.edit_tree("Remove Lower", lambda t: t["cases"][0]["member"]["segments"].pop())
    assert places(document) == [1.5, 10.0, 9.5]


@settings(max_examples=60, deadline=None)
@given(length=st.floats(4.0, 20.0), stands=st.lists(st.floats(0.0, 20.0), min_size=1, max_size=5))
def test_any_shortening_leaves_a_valid_project_and_the_order_of_what_moved(length, stands):
    before = driven_pile()
    before["cases"][0]["gauges"] = [{"name": f"G{i}", "position": p} for i, p in enumerate(sorted(stands))]
    after = copied(before)
    after["cases"][0]["member"]["segments"][0]["length"] = length
    try:
        project_from_tree(after)
    except ProjectError as error:
        carried = carried_along(before, after, error.problems)
        assert carried is not None
        places = [gauge.position for gauge in project_from_tree(carried[0]).cases[0].gauges]
        moved = [new for old, new in zip(sorted(stands), places, strict=True) if old > length * (1 + 1e-12)]
        assert moved == sorted(moved)
        assert all(0 <= place <= length for place in moved)
        assert [one.new for one in carried[1]] == moved

"""The document where something begins or goes: another project, a case that is undone, a part of another kind."""

from __future__ import annotations

import pytest

from app import document as document_module
from app.document import Document
from app.frame.case_row import add_case
from app.starting_points import driven_pile
from solver import project_from_tree

pytestmark = pytest.mark.usefixtures("qapp")
LENGTH = "member/segments/0/length"


@pytest.fixture
def document():
    return Document(project_from_tree(driven_pile()))


def test_another_project_is_looked_at_from_its_first_case(document):
    """Also where it has as many cases: the second of them is nothing that anybody chose."""
    add_case(document)
    assert document.case_index == 1
    document.new(document.project)
    assert document.case_index == 0
    assert document.case is document.project.cases[0]


def test_work_taken_over_from_a_crash_is_not_taken_for_saved(document):
    """It differs from the file, so that closing asks and the title shows it."""
    document.new(document.project, saved=False)
    assert document.dirty
    document.new(document.project)
    assert not document.dirty


def test_the_case_looked_at_may_be_undone(document):
    """Then the last one that is left is looked at."""
    add_case(document)
    document.undo_stack.undo()
    assert document.case_index == 0
    assert document.case.name == document.project.cases[0].name


def test_a_burst_that_ends_where_it_began_is_no_step(document, monkeypatch):
    """20 m, 21 m and 20 m again within a burst: nothing to undo, nothing to save."""
    monkeypatch.setattr(document_module, "monotonic", lambda: 0.0)
    before = document.value_at(LENGTH)
    document.edit("Length", LENGTH, before + 1, merge="length")
    document.edit("Length", LENGTH, before, merge="length")
    assert document.value_at(LENGTH) == before
    assert document.undo_stack.count() == 0
    assert not document.dirty


def test_a_burst_is_called_by_its_last_edit(document, monkeypatch):
    monkeypatch.setattr(document_module, "monotonic", lambda: 0.0)
    document.edit("Pile 21 m long", LENGTH, 21.0, merge="length")
    document.edit("Pile 22 m long", LENGTH, 22.0, merge="length")
    assert document.undo_stack.undoText() == "Pile 22 m long"


def test_what_cannot_be_appended_is_told_without_a_field(document, qtbot):
    """A gauge beyond the end, added to the list: no field shows it yet, so a sentence goes to the notices."""
    gauges = len(document.case.gauges)
    with qtbot.waitSignal(document.refused) as told:
        assert not document.edit("Add a gauge", "gauges/-", {"name": "Far out", "position": 1000.0})
    assert "beyond the member's end" in told.args[0]
    assert not document.rejected
    assert len(document.case.gauges) == gauges


def test_what_was_typed_into_a_pipe_does_not_wait_in_another_shape(document):
    """Both shapes have a wall, but what was refused was the wall of the one that is gone."""
    wall = "member/segments/0/section/wall"
    document.reject(wall, "abc", "'abc' is no number.")

    def fill(tree):
        segment = tree["cases"][0]["member"]["segments"][0]
        segment["section"] |= {"shape": "filled_pipe", "fill": segment["material"]}

    assert document.edit_tree("Fill the pipe", fill)
    assert document.case.member.segments[0].section.shape == "filled_pipe"
    assert document.problem_at(wall) is None

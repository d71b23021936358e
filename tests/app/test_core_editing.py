"""Whatever somebody edits, undoes, saves and opens, in any order: the document stays valid and knows its way back."""

from __future__ import annotations

import tempfile
from pathlib import Path

import pytest
from hypothesis import settings
from hypothesis import strategies as st
from hypothesis.stateful import RuleBasedStateMachine, initialize, invariant, precondition, rule

from app.document import Document
from app.frame.case_row import add_case, move_case, remove_case, rename_case
from app.frame.top_bar import turn_sign
from app.frame.units_menu import QUANTITIES, choose_one_system, choose_unit, choose_units
from app.starting_points import driven_pile
from app.tree import value_at
from app.unit_text import KNOWN_UNITS
from app.units import units_of
from solver import load_project, project_from_tree

pytestmark = pytest.mark.usefixtures("qapp")
WALL = "member/segments/0/section/wall"
DIAMETER = "member/segments/0/section/outer_diameter"


class Editing(RuleBasedStateMachine):
    """A person who edits, undoes, saves and opens as she likes."""

    @initialize()
    def begin(self):
        self.folder = tempfile.TemporaryDirectory()
        self.path = Path(self.folder.name) / "x.strike"
        self.document = Document(project_from_tree(driven_pile()))
        self.start = self.document.project

    def teardown(self):
        if hasattr(self, "folder"):
            self.folder.cleanup()

    @rule(
        pointer=st.sampled_from(
            [WALL, DIAMETER, "gauges/0/position", "member/segments/0/length", "load/cap_mass"]
        ),
        value=st.floats(-1, 40) | st.sampled_from([0.0, 0.01, 0.02, 0.5, 1.5]),
        merge=st.sampled_from([None, "one", "two"]),
    )
    def edit(self, pointer, value, merge):
        taken = self.document.edit(f"Edit {pointer}", pointer, value, merge)
        if taken or merge is None:  # while a burst goes on, nothing is said
            assert taken == (self.document.problem_at(pointer) is None)
        if taken:
            assert self.document.value_at(pointer) == value

    @rule(text=st.text(max_size=5))
    def type_nonsense(self, text):
        self.document.reject("gauges/0/position", text, "This is no number.")

    @rule(name=st.text(max_size=5))
    def rename(self, name):
        assert self.document.edit("Rename", "/title", name)

    @rule(at=st.integers(0, 3))
    def remove_gauge(self, at):
        count = len(self.document.case.gauges)

        def change(tree):
            del tree["cases"][self.document.case_index]["gauges"][at : at + 1]

        assert self.document.edit_tree("Remove gauge", change)
        assert len(self.document.case.gauges) == count - (at < count)

    @rule(name=st.sampled_from(["A", "B", "Gauge 1"]))
    def add_gauge(self, name):
        taken = name in [gauge.name for gauge in self.document.case.gauges]
        new = {"name": name, "position": 0.5}
        assert self.document.edit(f"Add gauge {name}", "gauges/-", new) != taken

    @rule()
    def add_case(self):
        assert add_case(self.document)

    @rule(index=st.integers(-1, 4))
    def choose_case(self, index):
        self.document.choose_case(index)

    @rule()
    def remove_case(self):
        several = len(self.document.project.cases) > 1
        assert remove_case(self.document) == several  # the only case stays

    @rule(by=st.sampled_from([-1, 1]))
    def reorder_cases(self, by):
        """The same cases in another order, the one looked at still the same one, and marks at the same values."""
        before, looked_at, to = self.document.project, self.document.case, self.document.case_index + by
        if not 0 <= to < len(before.cases):
            return
        assert move_case(self.document, by)
        assert self.document.case == looked_at
        assert self.document.case_index == to
        after = self.document.project
        assert sorted(case.name for case in after.cases) == sorted(case.name for case in before.cases)
        assert len(after.provenance) == len(before.provenance)

    @rule(name=st.sampled_from(["A", "B", "Drop 1.0 m"]))
    def rename_case(self, name):
        names = [case.name for case in self.document.project.cases]
        names.pop(self.document.case_index)
        taken = name.casefold() in [other.casefold() for other in names]
        assert rename_case(self.document, name) != taken

    @rule(
        dimension=st.sampled_from(list(QUANTITIES)),
        at=st.integers(0, 3),
        system=st.sampled_from([None, "metric", "us"]),
    )
    def choose_units(self, dimension, at, system):
        """What is shown changes; what is solved does not."""
        before = self.document.project
        if system is None:
            unit = [None, *KNOWN_UNITS[dimension]][: at + 1][-1]
            choose_unit(self.document, dimension, unit)
            if unit is not None:
                assert units_of(self.document.project).unit(dimension) == unit
        else:
            choose_units(self.document, system)
            assert units_of(self.document.project).system == system
        assert self.document.project.cases == before.cases
        assert self.document.project.materials == before.materials

    @rule()
    def one_system_for_all(self):
        choose_one_system(self.document)
        assert not units_of(self.document.project).own

    @rule()
    def turn_sign(self):
        before = units_of(self.document.project).sign
        turn_sign(self.document)
        assert units_of(self.document.project).sign == -before

    @rule()
    def undo(self):
        could = self.document.undo_stack.canUndo()
        self.document.undo_stack.undo()
        assert not (could and self.document.rejected)

    @rule()
    def redo(self):
        self.document.undo_stack.redo()

    @rule()
    def save(self):
        self.document.save_as(self.path)
        assert not self.document.dirty
        assert load_project(self.path) == self.document.project

    @precondition(lambda self: self.path.exists())
    @rule()
    def open(self):
        self.document.open(self.path)
        self.start = self.document.project
        assert self.document.undo_stack.count() == 0

    @rule()
    def undo_all_and_redo_all(self):
        stack, end, at = self.document.undo_stack, self.document.project, self.document.undo_stack.index()
        stack.setIndex(0)
        assert self.document.project == self.start
        stack.setIndex(at)
        assert self.document.project == end

    @invariant()
    def the_project_is_valid_and_the_tree_is_its_tree(self):
        if hasattr(self, "document"):
            assert project_from_tree(self.document.tree) == self.document.project
            assert 0 <= self.document.case_index < len(self.document.project.cases)
            assert self.document.case in self.document.project.cases

    @invariant()
    def every_mark_stands_at_a_value(self):
        if hasattr(self, "document"):
            for pointer in self.document.project.provenance or {}:
                assert value_at(self.document.tree, pointer) is not None

    @invariant()
    def what_is_not_valid_is_told(self):
        if hasattr(self, "document"):
            assert all(entry.sentence.endswith((".", "?")) for entry in self.document.rejected.values())


TestEditing = Editing.TestCase
TestEditing.settings = settings(max_examples=30, stateful_step_count=25, deadline=None)

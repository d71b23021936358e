"""Several entries of a list selected at once: they change, move and go together, each time as one step of undo."""

from __future__ import annotations

import pytest
from PySide6.QtCore import Qt
from PySide6.QtWidgets import QWidget

from app.bench.outline.outline import Outline
from app.document import Document
from app.sight import Sight
from app.starting_points import driven_pile
from app.tree import copied
from solver import project_from_tree

CONTROL, SHIFT = Qt.KeyboardModifier.ControlModifier, Qt.KeyboardModifier.ShiftModifier
LEFT = Qt.MouseButton.LeftButton


class Desk:
    """An outline beside nothing else, and what a person does with it."""

    def __init__(self, qtbot):
        tree = driven_pile()
        first = tree["cases"][0]["member"]["segments"][0]
        tree["cases"][0]["member"]["segments"] = [
            copied(first) | {"name": name, "length": length}
            for name, length in (("A", 5.0), ("B", 6.0), ("C", 4.0), ("D", 5.0))
        ]
        self.qtbot, self.document, self.sight = qtbot, Document(project_from_tree(tree)), Sight()
        self.window = QWidget()
        self.window.resize(286, 900)
        self.outline = Outline(self.document, self.sight, self.window)
        self.outline.setGeometry(self.window.rect())
        qtbot.addWidget(self.window)
        self.window.show()
        qtbot.waitExposed(self.window)
        self.window.activateWindow()

    def click(self, name, keys=Qt.KeyboardModifier.NoModifier):
        self.qtbot.mouseClick(self.button(name), LEFT, keys)

    def press(self, key, keys=Qt.KeyboardModifier.NoModifier):
        self.outline.focus_row()
        self.qtbot.keyClick(self.window.focusWidget(), key, keys)

    def button(self, name):
        return next(b for b in self.outline.buttons if b.row.name == name)

    def type_into(self, label, text):
        row = next(row for row in self.outline.form.rows if row.spec.label == label)
        row.edit.setFocus()
        row.edit.selectAll()
        self.qtbot.keyClicks(row.edit, text)
        self.qtbot.keyClick(row.edit, Qt.Key.Key_Return)

    @property
    def segments(self):
        return self.document.case.member.segments

    @property
    def names(self):
        return "".join(segment.name for segment in self.segments)

    @property
    def chosen(self):
        return sorted(self.segments[int(p[-1])].name for p in (self.sight.selection, *self.sight.also))


@pytest.fixture
def desk(qtbot):
    return Desk(qtbot)


def test_clicks_with_control_and_shift_choose_several(desk):
    desk.click("B")
    desk.click("D", CONTROL)
    assert desk.chosen == ["B", "D"]
    assert desk.button("B").isChecked()
    assert desk.button("D").isChecked()
    desk.click("D", CONTROL)
    assert desk.chosen == ["B"]
    desk.click("D", SHIFT)
    assert desk.chosen == ["B", "C", "D"]
    desk.click("Run", CONTROL)  # not of the same list
    assert desk.sight.selection == "run"
    assert not desk.sight.also


def test_shift_with_arrows_does_the_same(desk):
    desk.click("B")
    desk.press(Qt.Key.Key_Down, SHIFT)
    desk.press(Qt.Key.Key_Down, SHIFT)
    assert desk.chosen == ["B", "C", "D"]
    desk.press(Qt.Key.Key_Up, SHIFT)
    assert desk.chosen == ["B", "C"]


def test_a_field_is_set_for_all_as_one_step_and_names_stay(desk):
    desk.click("B")
    desk.click("D", SHIFT)
    assert desk.outline.form.lines.text() == (
        "3 segments are selected: what is changed here is changed in all of them.\nThey differ in: length."
    )
    desk.type_into("Length", "6")  # as B has already: the others must change all the same
    assert [s.length for s in desk.segments] == [5.0, 6.0, 6.0, 6.0]
    assert desk.document.undo_stack.undoText() == "Set length of 3 segments to 6.00\u00a0m"
    desk.type_into("Wall", "15")
    assert [round(s.section.wall, 4) for s in desk.segments] == [0.0125, 0.015, 0.015, 0.015]
    desk.document.undo_stack.undo()
    assert len({s.section.wall for s in desk.segments}) == 1
    desk.type_into("Name", "Mast")
    assert [s.name for s in desk.segments] == ["A", "Mast", "C", "D"]


def test_what_is_not_valid_for_one_of_them_is_taken_for_none(desk):
    before = desk.document.project
    desk.click("A")
    desk.click("B", CONTROL)
    desk.type_into("Wall", "400")  # more than half of the diameter
    assert desk.document.project is before
    assert desk.document.rejected


def test_they_move_are_copied_and_go_together(desk):
    desk.click("B")
    desk.click("C", SHIFT)
    desk.press(Qt.Key.Key_Up, Qt.KeyboardModifier.AltModifier)
    assert desk.names == "BCAD"
    assert desk.chosen == ["B", "C"]
    desk.press(Qt.Key.Key_Up, Qt.KeyboardModifier.AltModifier)
    assert desk.names == "BCAD"  # at that end already
    desk.press(Qt.Key.Key_Down, Qt.KeyboardModifier.AltModifier)
    assert desk.document.undo_stack.undoText() == "Move 2 segments down"
    desk.press(Qt.Key.Key_D, CONTROL)
    assert [s.name for s in desk.segments] == ["A", "B", "B 2", "C", "C 2", "D"]
    assert desk.chosen == ["B 2", "C 2"]
    desk.press(Qt.Key.Key_Delete)
    assert desk.names == "ABCD"
    assert desk.document.undo_stack.undoText() == "Remove 2 segments"
    desk.click("A")
    desk.click("D", SHIFT)
    desk.press(Qt.Key.Key_Delete)
    assert desk.names == "ABCD"  # a member keeps one segment


def test_a_choice_is_made_for_all(desk):
    desk.click("A")
    desk.click("D", SHIFT)
    row = next(row for row in desk.outline.form.rows if row.spec.label == "Section")
    row.box.setCurrentIndex(row.box.findData("solid_round"))
    row.box.activated.emit(row.box.currentIndex())
    assert {s.section.shape for s in desk.segments} == {"solid_round"}
    desk.document.undo_stack.undo()
    assert {s.section.shape for s in desk.segments} == {"pipe"}


def test_the_menu_of_a_row_tells_how_many_it_is_for(desk):
    desk.click("A")
    desk.click("C", SHIFT)
    menu = desk.outline.doing.menu(desk.outline.selected, QWidget(desk.outline))
    assert [a.text().split("\t")[0] for a in menu.actions() if a.isEnabled()] == [
        "Add another",
        "Duplicate all 3",
        "Move down all 3",
        "Remove all 3",
    ]

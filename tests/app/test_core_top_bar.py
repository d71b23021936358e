"""The top bar with long titles, many cases and large type: nothing overlaps, and the case looked at is always there."""

from __future__ import annotations

from itertools import pairwise

import pytest
from PySide6.QtCore import QEvent, QPoint, QPointF, Qt
from PySide6.QtGui import QFont, QMouseEvent
from PySide6.QtWidgets import QApplication, QMenuBar, QPushButton, QWidget

from app.document import Document
from app.frame.case_row import CaseRow, add_case, rename_case
from app.frame.top_bar import TitleField, TopBar
from app.frame.workspaces import Workspaces
from app.look import apply_look
from app.sight import Sight
from app.solving import Solution
from app.starting_points import rod_or_bar
from solver import project_from_tree, solve


@pytest.fixture
def type_size(qapp):
    """Sets the size of the system's type, in points, and puts it back."""
    before = QFont(QApplication.font())

    def choose(points):
        large = QFont(before)
        large.setPointSizeF(points)
        QApplication.setFont(large)
        apply_look(qapp, "light")

    sheet = qapp.styleSheet()
    yield choose
    QApplication.setFont(before)
    qapp.setStyleSheet(sheet)


@pytest.mark.parametrize(("width", "points"), [(1280, 10), (1280, 14), (1600, 18), (1000, 10), (2000, 10)])
def test_nothing_overlaps_and_the_case_looked_at_is_in_sight(qtbot, type_size, width, points):
    type_size(points)
    project = project_from_tree(rod_or_bar())
    result = solve(project.cases[0])
    document = Document(project)
    solution = Solution(document, lambda *_case, **_how: result)
    holder = QWidget()
    menus = QMenuBar()
    for word in ("File", "Edit", "Case", "View", "Help"):
        menus.addMenu(word)
    bar = TopBar(document, solution, [], menus, holder, Sight())
    spaces = Workspaces(holder)
    for name in ("Bench", "Set sheet", "Report"):
        spaces.add(name, name, QWidget())
    bar.add_switch(spaces.switch)
    holder.resize(width, 60)
    bar.setGeometry(0, 0, width, bar.height())
    qtbot.addWidget(holder)
    holder.show()
    document.edit("Title", "/title", "Trial piling at the new ferry berth, second campaign, pile group C")
    for number in range(6):
        assert add_case(document)
        assert rename_case(document, f"Drop {number} with a soft cushion")
    document.choose_case(4)
    qtbot.waitUntil(lambda: solution.state == "fresh")
    qtbot.wait(1)  # one turn of the loop: the layout follows

    shown = [item.widget() for item in map(bar.layout().itemAt, range(bar.layout().count()))]
    places = [w.geometry() for w in shown if w is not None and w.isVisible()]
    assert all(left.right() < right.left() for left, right in pairwise(places))
    assert places[-1].right() <= width
    assert spaces.switch.width() >= spaces.switch.sizeHint().width()
    chips = [b for b in bar.cases.findChildren(QPushButton) if b.isVisible()]
    chosen = next(b for b in chips if b.isChecked())
    assert chosen.accessibleName() == "Case Drop 3 with a soft cushion"
    left = chosen.mapTo(bar.cases, chosen.rect().topLeft()).x()
    assert left >= 0
    # its foot is not cut in large type
    assert chosen.visibleRegion().boundingRect().height() == chosen.height()
    assert left + chosen.width() <= bar.cases.width()
    assert solution.close()


@pytest.fixture
def three_cases(qtbot, qapp):
    document, sight = Document(project_from_tree(rod_or_bar()), qapp), Sight(qapp)
    for name in ("A", "B", "C"):
        if name != "A":
            add_case(document)
        rename_case(document, name)
    row = CaseRow(document, sight=sight)
    qtbot.addWidget(row)
    row.resize(700, 40)
    row.show()
    return document, sight, row


def names_of(document):
    return [case.name for case in document.project.cases]


def drag(qtbot, chip, onto, x):
    """Press in the middle of a chip and let go at `x` of another one's width."""
    start, end = (
        chip.rect().center(),
        chip.mapFromGlobal(onto.mapToGlobal(QPoint(round(x * onto.width()), 5))),
    )
    qtbot.mousePress(chip, Qt.MouseButton.LeftButton, pos=start)
    qtbot.mouseMove(chip, start + QPoint(30, 0))
    for place in (start + QPoint(20, 0), end):
        move = QMouseEvent(
            QEvent.Type.MouseMove,
            QPointF(place),
            QPointF(chip.mapToGlobal(place)),
            Qt.MouseButton.NoButton,
            Qt.MouseButton.LeftButton,
            Qt.KeyboardModifier.NoModifier,
        )
        QApplication.sendEvent(chip, move)
    qtbot.mouseRelease(chip, Qt.MouseButton.LeftButton, pos=end)


@pytest.mark.qt_log_ignore("propagateSizeHints")
def test_cases_are_dragged_to_another_place_as_one_step(three_cases, qtbot):
    document, _sight, row = three_cases
    steps = document.undo_stack.count()
    drag(qtbot, row._buttons[0], row._buttons[2], 0.9)
    assert names_of(document) == ["B", "C", "A"]
    assert document.case.name == "A"
    assert document.undo_stack.count() == steps + 1
    drag(qtbot, row._buttons[2], row._buttons[1], 0.2)
    assert names_of(document) == ["B", "A", "C"]
    assert row._mark.isHidden()
    drag(qtbot, row._buttons[1], row._buttons[1], 0.9)  # let go where it was: nothing
    assert document.undo_stack.count() == steps + 2
    qtbot.keyClick(row._buttons[1], Qt.Key.Key_Left, Qt.KeyboardModifier.AltModifier)
    assert names_of(document) == ["A", "B", "C"]


@pytest.mark.qt_log_ignore("propagateSizeHints")
def test_a_case_that_is_renamed_stays_laid_over(three_cases):
    document, sight, _row = three_cases
    sight.set(laid_over=("A", "C"))
    rename_case(document, "Worn")
    assert sight.laid_over == ("A", "Worn")
    document.undo_stack.undo()
    assert sight.laid_over == ("A", "C")


def test_a_title_that_is_too_long_ends_in_dots(qtbot, qapp):
    document = Document(project_from_tree(rod_or_bar()), qapp)
    field = TitleField(document)
    qtbot.addWidget(field)
    field.setFixedWidth(100)
    document.edit("Title", "/title", "W" * 40)
    long = field.grab().toImage()
    document.edit("Title", "/title", "W" * 60)
    assert field.grab().toImage() == long  # what does not fit is not drawn
    assert field.text() == "W" * 60

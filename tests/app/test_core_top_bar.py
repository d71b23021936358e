"""The top bar with long titles, many cases and large type: nothing overlaps, and the case looked at is always there."""

from __future__ import annotations

from itertools import pairwise

import pytest
from PySide6.QtGui import QFont
from PySide6.QtWidgets import QApplication, QMenuBar, QPushButton, QWidget

from app.document import Document
from app.frame.case_row import add_case, rename_case
from app.frame.top_bar import TopBar
from app.frame.workspaces import Workspaces
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

    yield choose
    QApplication.setFont(before)


@pytest.mark.parametrize(("width", "points"), [(1280, 10), (1280, 14), (1000, 10), (2000, 10)])
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
    assert left + chosen.width() <= bar.cases.width()
    assert solution.close()

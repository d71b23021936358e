"""The Bench inside its window: what opens, folds and fills the window from there."""

from __future__ import annotations

import pytest
from PySide6.QtCore import Qt

from app.settings import Settings
from app.window import Window
from solver import solve


@pytest.fixture
def open_window(qtbot, tmp_path, pile):
    """Opens a window whose first case is solved already; closes it at the end."""
    opened = []

    def open_it(project=None, folder="settings"):
        project = project or pile.project

        def at_hand(case, **how):
            return pile.result if case == pile.project.cases[0] else solve(case, **how)

        window = Window(Settings(tmp_path / folder), project, at_hand)
        qtbot.addWidget(window)
        window.resize(1280, 800)
        window.show()
        qtbot.waitUntil(lambda: window.solution.state == "fresh")
        opened.append(window)
        return window

    yield open_it
    for window in opened:
        window.close()


def test_the_link_under_the_outline_opens_the_table_and_escape_closes_it(open_window, qtbot):
    window = open_window()
    assert not window.tables.isVisible()
    qtbot.mouseClick(window.outline.table_link, Qt.MouseButton.LeftButton)
    assert window.tables.isVisible()
    assert window.tables.model.rowCount() == 2
    assert window.tables.geometry().top() >= window.split.geometry().bottom()
    qtbot.keyClick(window.tables.view, Qt.Key.Key_Escape)
    assert not window.tables.isVisible()

"""Windows on a rod that is solved in no time, and an outline alone."""

from __future__ import annotations

from collections.abc import Callable

import pytest
from PySide6.QtWidgets import QWidget

from app.bench.outline.outline import Outline
from app.document import Document
from app.frame.window import Window
from app.look import apply_look
from app.settings import Settings
from app.sight import Sight
from app.starting_points import rod_or_bar
from solver import project_from_tree, solve
from tests.app.desk import Desk, Tree


@pytest.fixture(scope="session")
def compiled():
    """Compiling the kernels cannot be broken off, and takes longer than closing may: it is done before."""
    solve(project_from_tree(rod_or_bar()).cases[0])


@pytest.fixture
def windows(qtbot, tmp_path, qapp, compiled):
    """Makes windows with settings of their own, and closes them at the end."""
    made: list[Window] = []

    def make(solver=None, project=None):
        settings = Settings(tmp_path / "settings")
        window = Window(settings, project or project_from_tree(rod_or_bar()), solver)
        qtbot.addWidget(window)
        window.show()
        made.append(window)
        return window

    yield make
    for window in made:
        window.close()
        assert window.ended_in_time
    apply_look(qapp, "system")
    qapp.setStyleSheet("")


@pytest.fixture
def window(windows, qtbot):
    made = windows()
    # the first run may compile kernels
    qtbot.waitUntil(lambda: made.solution.state == "fresh", timeout=60_000)
    return made


@pytest.fixture
def desk(qtbot) -> Callable[[Tree], Desk]:
    def make(tree: Tree) -> Desk:
        document, sight = Document(project_from_tree(tree)), Sight()
        window = QWidget()
        window.resize(286, 800)
        outline = Outline(document, sight, window)
        outline.setGeometry(window.rect())
        qtbot.addWidget(window)
        window.show()
        qtbot.waitExposed(window)
        window.activateWindow()
        qtbot.waitUntil(window.isActiveWindow)
        return Desk(document, sight, outline, qtbot, window)

    return make

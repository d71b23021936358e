"""The Bench inside its window: what opens, folds and fills the window from there."""

from __future__ import annotations

from itertools import product

import pytest
from PySide6.QtCore import QPoint, Qt
from PySide6.QtWidgets import QApplication, QMenu, QWidget

from app.bench.findings_panel import FindingsPanel
from app.frame.case_row import fill_case_menu
from app.frame.window import Window
from app.settings import Settings
from solver import solve
from tests.app.pictures.test_laid_over import cases_of


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


def test_f11_gives_the_panel_with_the_focus_the_window_and_escape_takes_it_back(open_window, qtbot):
    window = open_window()
    bench = window.bench
    bench.profile.setFocus()
    narrow = bench.profile.width()
    qtbot.keyClick(window, Qt.Key.Key_F11)
    assert bench.grid.alone is bench.profile
    assert bench.profile.width() > 3 * narrow
    qtbot.waitUntil(lambda: bench.profile.width() > 0.95 * window.width())  # once the layout has settled
    assert not bench.xt.isVisible()
    assert not window.outline.isVisible()
    qtbot.keyClick(bench.profile, Qt.Key.Key_Escape)
    assert bench.grid.alone is None
    assert bench.xt.isVisible()
    assert window.outline.isVisible()
    qtbot.waitUntil(lambda: bench.profile.width() == narrow)


@pytest.mark.parametrize("name", ["xt", "profile", "member", "at_cursor", "strips", "findings"])
def test_a_double_click_on_a_title_does_the_same_for_every_panel(open_window, qtbot, name):
    window = open_window()
    panel = getattr(window.bench, name)
    time = window.sight.time
    # beside the chips, which are the title of strips
    spot = QPoint(3, 10) if name == "strips" else QPoint(30, 10)
    for alone in (panel, None):
        below = panel.childAt(spot) or panel
        qtbot.mouseDClick(below, Qt.MouseButton.LeftButton, pos=below.mapFrom(panel, spot))
        assert window.bench.grid.alone is alone
    assert window.sight.time == time  # a title is no place in the plot


def test_columns_and_rows_are_folded_from_the_menu_and_remembered(open_window, qtbot):
    window = open_window()
    wide = window.bench.xt.width()
    left = window.menus.panels[True, 0]
    assert left.isChecked()
    left.trigger()
    assert not window.bench.member.isVisible()
    assert window.bench.xt.width() > wide
    window.close()
    again = open_window()
    assert not again.bench.member.isVisible()
    assert not again.menus.panels[True, 0].isChecked()
    again.menus.panels[True, 0].trigger()
    assert again.bench.member.isVisible()


def test_a_handle_folds_by_a_double_click_and_the_last_row_stays(open_window, qtbot):
    window = open_window()
    grid = window.bench.grid
    rows = next(h for h in grid._handles if not h.upright)
    qtbot.mouseDClick(rows, Qt.MouseButton.LeftButton)
    assert not window.bench.strips.isVisible()
    window.menus.panels[False, 0].trigger()
    assert window.bench.xt.isVisible()
    assert window.menus.panels[False, 0].isChecked()
    qtbot.mouseDClick(rows, Qt.MouseButton.LeftButton)
    assert window.bench.strips.isVisible()


def test_whether_arrivals_are_shown_is_remembered(open_window, qtbot):
    window = open_window()
    assert window.sight.arrivals is None  # nothing chosen: shown where they are few
    qtbot.mouseClick(window.bench.xt.switch, Qt.MouseButton.LeftButton)
    assert window.sight.arrivals
    window.close()
    assert open_window().sight.arrivals


def test_a_new_project_is_looked_at_without_what_was_pinned_or_laid_over(open_window):
    window = open_window()
    window.sight.set(pinned=(0.01, 3.0), peaks=("velocity/Head",), locked_in=True)
    window.begin_looking()
    assert (window.sight.pinned, window.sight.peaks, window.sight.locked_in) == (None, (), False)


def test_the_menu_of_cases_lays_others_over(open_window):
    window = open_window(cases_of(1.2, 0.8))
    menu = QMenu()
    fill_case_menu(menu, window.document, window, window.sight)
    over = next(a.menu() for a in menu.actions() if a.text() == "Lay over this case")
    over.actions()[0].trigger()
    assert window.sight.laid_over == ("Drop 0.8 m",)


def test_what_was_refused_is_told_until_the_next_edit_is_taken(open_window):
    window = open_window()
    document = window.document
    document.edit_tree("Remove Lower", lambda tree: tree["cases"][0]["member"]["segments"].pop())
    assert "Toe" in window.notices.text_of("edit")  # its gauge would lie beyond the end
    assert document.edit("Set drop height", "load/drop_height", 0.9)
    assert window.notices.text_of("edit") is None


def test_details_that_are_told_in_full_are_whole_without_scrolling(open_window, qtbot):
    """At each height of the panel, beside a scroll bar or without: a line may not be cut at its foot."""
    window = open_window()
    holder = QWidget()  # the offscreen platform complains of a window with a least size
    panel = FindingsPanel(window.document, window.sight, window.solution, holder)
    qtbot.addWidget(holder)
    holder.resize(400, 500)
    holder.show()
    for width, height in product((176, 190, 204, 218), range(240, 460, 4)):
        panel.resize(width, height)
        QApplication.processEvents()
        rows, room = panel._verdict, panel._scroll
        if rows[-1].height() == rows[-1].full_height(rows[-1].width()):
            lowest = max(row.mapTo(room, QPoint(0, row.height())).y() for row in rows)
            assert lowest <= room.height() + 6, (width, height)  # 6: the last row's own margin

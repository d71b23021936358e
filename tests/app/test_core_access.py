"""The window for those who use keys, or hear the screen: names, focus that is seen, and what each part is about."""

from __future__ import annotations

import pytest
from PySide6.QtCore import Qt
from PySide6.QtWidgets import QAbstractButton, QApplication, QLabel, QWhatsThis, QWidget

from app.bench.finding_row import FindingRow
from app.bench.pictures.picture import Picture
from app.explaining import explain, explanation_of
from app.frame.window import FIRST_STEPS, Window
from app.settings import Settings
from app.starting_points import driven_pile
from solver import project_from_tree, solve


@pytest.fixture(scope="module")
def project():
    return project_from_tree(driven_pile())


@pytest.fixture(scope="module")
def result(project):
    return solve(project.cases[0])


@pytest.fixture
def open_window(qtbot, tmp_path, project, result):
    made = []

    def at_hand(case, **how):
        return result if case == project.cases[0] else solve(case, **how)

    def make():
        window = Window(Settings(tmp_path / "settings"), project, at_hand)
        qtbot.addWidget(window)
        window.resize(1280, 800)
        window.show()
        qtbot.waitUntil(lambda: window.solution.state == "fresh")
        window.activateWindow()
        made.append(window)
        return window

    yield make
    for window in made:
        window.close()


def name_of(widget: QWidget) -> str:
    words = widget.text() if isinstance(widget, QAbstractButton | QLabel) else ""
    return widget.accessibleName() or words


def test_whatever_takes_the_focus_has_a_name(open_window):
    """In every workspace, and in the form of every row of the outline."""
    window = open_window()
    nameless = set()

    def look():
        for widget in window.findChildren(QWidget):
            takes = widget.focusPolicy() != Qt.FocusPolicy.NoFocus and widget.isVisible()
            if takes and not name_of(widget) and type(widget).__name__ != "QSplitter":
                nameless.add(f"{type(widget).__name__} in {type(widget.parent()).__name__}")

    for row in list(window.outline.buttons):
        window.sight.set(selection=row.row.pointer)
        look()
    for number in range(window.workspaces.count()):
        window.workspaces.show_number(number)
        look()
    assert not nameless


def test_tab_goes_round_the_bench_and_reaches_every_picture(open_window, qtbot):
    window = open_window()
    window.outline.focus_row()
    reached, focus = [], QApplication.focusWidget()
    for _ in range(300):
        qtbot.keyClick(focus, Qt.Key.Key_Tab)
        focus = QApplication.focusWidget()
        if focus in reached:
            break
        reached.append(focus)
    pictures = [p for p in window.bench.findChildren(Picture) if p.isVisible()]
    assert len(pictures) > 4
    assert [p.accessibleName() for p in pictures if p not in reached] == []
    assert window.top_bar.units in reached
    assert window.outline.table_link in reached


def test_the_focus_is_seen_on_a_picture_reached_by_keys_and_gone_when_it_leaves(open_window):
    window = open_window()
    picture = window.bench.xt
    before = picture.grab().toImage()
    picture.setFocus(Qt.FocusReason.TabFocusReason)
    assert picture.grab().toImage() != before
    window.bench.profile.setFocus(Qt.FocusReason.TabFocusReason)
    assert picture.grab().toImage() == before


def test_every_field_says_what_it_is_with_its_source(open_window):
    window = open_window()
    seen = 0
    for row in list(window.outline.buttons):
        window.sight.set(selection=row.row.pointer)
        for field in window.outline.form.rows:
            told = explanation_of(field.label)
            if field.spec.tells:
                assert field.spec.tells.split("\n")[0].split(".")[0].split("'")[0] in told
                seen += 1
            if field.spec.source:
                assert "Source: " in told
    assert seen > 10


def test_every_picture_and_every_finding_says_what_it_is(open_window):
    window = open_window()
    pictures = [p for p in window.bench.findChildren(Picture) if p.isVisible()]
    findings = [f for f in window.bench.findings.findChildren(FindingRow) if f.isVisible() and f.told.figure]
    assert len(findings) >= 3
    silent = [p.accessibleName() for p in (*pictures, *findings) if not explanation_of(p)]
    assert silent == []
    assert "Envelope" in explanation_of(window.bench.profile)
    set_row = next(f for f in findings if f.told.name == "set per blow")
    assert "movement of the toe that stays" in explanation_of(set_row)


@pytest.mark.qt_log_ignore("This plugin does not support", extend=True)
def test_shift_and_f1_tells_beside_what_has_the_focus(open_window, qtbot):
    window = open_window()
    window.sight.set(selection="load")
    field = next(row for row in window.outline.form.rows if row.spec.label == "Efficiency")
    field.setFocus()
    qtbot.keyClick(window, Qt.Key.Key_F1, Qt.KeyboardModifier.ShiftModifier)
    shown = [w for w in QApplication.topLevelWidgets() if type(w).__name__ == "QWidget" and w.isVisible()]
    assert shown
    QWhatsThis.hideText()
    assert not explain(None)


def test_first_steps_are_told_until_they_are_closed_and_never_above_the_notes(open_window):
    window = open_window()
    window.document.edit("Notes", "/notes", "A note.")
    window.menus.notes.setChecked(True)
    window.show_notes()
    assert window.notes.isVisible()
    window.offer_first_steps()
    assert window.notices.text_of(FIRST_STEPS)
    assert not window.notes.isVisible()
    strip = window.notices._strips[FIRST_STEPS]
    next(b for b in strip.findChildren(QAbstractButton) if b.accessibleName() == "Close this message").click()
    assert window.notes.isVisible()
    window.workspaces.show_number(1)
    assert not window.notes.isVisible()
    window.workspaces.show_number(0)
    assert window.notes.isVisible()
    window.offer_first_steps()
    assert window.notices.text_of(FIRST_STEPS) is None
    assert open_window().settings.flag(FIRST_STEPS, usual=True) is False


def test_workspaces_are_reached_by_ctrl_and_their_number(open_window, qtbot):
    window = open_window()
    for number in (1, 2, 0):
        key = (Qt.Key.Key_1, Qt.Key.Key_2, Qt.Key.Key_3)[number]
        qtbot.keyClick(window, key, Qt.KeyboardModifier.ControlModifier)
        assert window.workspaces.currentIndex() == number

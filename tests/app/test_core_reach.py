"""Every widget that takes the focus, in all workspaces and small windows: it has a name, Tab comes to it, the focus is
seen on it, and every field says what it is for."""

from __future__ import annotations

from collections.abc import Iterator

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import (
    QAbstractButton,
    QAbstractItemView,
    QAbstractSpinBox,
    QApplication,
    QCheckBox,
    QComboBox,
    QDialog,
    QLabel,
    QLineEdit,
    QPlainTextEdit,
    QWidget,
)

from app.bench.forms.picker import PartPicker
from app.explaining import explanation_of
from app.frame.window import Window
from app.look import apply_look
from app.settings import Settings
from app.starting_points import driven_pile
from solver import project_from_tree, solve

FIELDS = (QLineEdit, QComboBox, QAbstractSpinBox, QCheckBox, QPlainTextEdit, QAbstractItemView)
pytestmark = pytest.mark.qt_log_ignore("This plugin does not support", extend=True)


@pytest.fixture(scope="module")
def result():
    return solve(project_from_tree(driven_pile()).cases[0])


@pytest.fixture
def window(qtbot, qapp, tmp_path, result):
    apply_look(qapp, "light")
    made = Window(
        Settings(tmp_path / "settings"), project_from_tree(driven_pile()), lambda *_c, **_how: result
    )
    qtbot.addWidget(made)
    made.resize(1280, 800)
    made.show()
    qtbot.waitUntil(lambda: made.solution.state == "fresh")
    made.activateWindow()
    yield made
    made.close()
    apply_look(qapp, "system")
    qapp.setStyleSheet("")


def takers(root: QWidget) -> list[QWidget]:
    """What Tab is to come to."""
    return [
        w
        for w in root.findChildren(QWidget)
        if w.isVisible() and w.isEnabled() and w.focusPolicy() & Qt.FocusPolicy.TabFocus
    ]


def name_of(widget: QWidget) -> str:
    words = widget.text() if isinstance(widget, QAbstractButton | QLabel) else ""
    return widget.accessibleName() or words


def told(widget: QWidget) -> str:
    return f"{type(widget).__name__} '{name_of(widget)}' in {type(widget.parent()).__name__}"


def round_by_tab(first: QWidget) -> Iterator[QWidget]:
    """Where Tab leads from a widget on, until it comes round."""
    first.setFocus(Qt.FocusReason.TabFocusReason)
    seen: list[QWidget] = []
    focus = QApplication.focusWidget()
    while focus is not None and focus not in seen:
        seen.append(focus)
        QTest.keyClick(focus, Qt.Key.Key_Tab)
        focus = QApplication.focusWidget()
    yield from seen


def reached_with(reached: list[QWidget], widget: QWidget) -> bool:
    """Of buttons of which one is down, Tab comes to that one, and the arrows to the others."""
    group = widget.group() if isinstance(widget, QAbstractButton) else None
    return widget in reached or (group is not None and any(b in reached for b in group.buttons()))


def faults(root: QWidget) -> list[str]:
    """What is wrong with the widgets inside, as sentences."""
    found, widgets = [], takers(root)
    assert widgets, f"nothing takes the focus in {told(root)}"
    reached = list(round_by_tab(widgets[0]))
    for widget in widgets:
        if not name_of(widget):
            found.append(f"{told(widget)} has no name")
        if isinstance(widget, FIELDS) and not explanation_of(widget):
            found.append(f"{told(widget)} does not say what it is for")
        if not reached_with(reached, widget):
            found.append(f"Tab does not come to {told(widget)}")
    looked_at = set()
    for widget, other in zip(widgets, [*widgets[1:], widgets[0]], strict=True):
        kind = type(widget), widget.property("role"), widget.property("level")
        if kind in looked_at:  # the look is the same for all of a kind
            continue
        looked_at.add(kind)
        other.setFocus(Qt.FocusReason.TabFocusReason)
        without = widget.grab().toImage()
        widget.setFocus(Qt.FocusReason.TabFocusReason)
        if len(widgets) > 1 and widget.hasFocus() and widget.grab().toImage() == without:
            found.append(f"the focus is not seen on {told(widget)}")
    return found


def test_every_field_of_every_form(window):
    found = []
    for pointer in [button.row.pointer for button in window.outline.buttons]:
        window.sight.set(selection=pointer)
        QApplication.processEvents()
        found += faults(window.outline)
    for pointer in ("ground/layers/0", "gauges/0", "/materials/0"):
        window.sight.set(selection=pointer)
        QApplication.processEvents()
        found += faults(window.outline)
    assert found == []


def test_the_pictures_the_top_bar_and_the_tables(window):
    found = faults(window.bench) + faults(window.top_bar)
    window.tables.open_table("gauges")
    assert found + faults(window.tables) == []


def test_the_other_workspaces(window, qtbot):
    for number in (1, 2):
        window.workspaces.show_number(number)
        workspace = window.workspaces.currentWidget()
        qtbot.waitUntil(lambda shown=workspace: len(takers(shown)) > 4)
        assert faults(workspace) == []


def test_small_windows(window, qtbot):
    for opens in ("ask_new", "choose_records", "show_terms", "show_limits", "show_about"):
        getattr(window, opens)()
        dialog = next(w for w in QApplication.topLevelWidgets() if isinstance(w, QDialog) and w.isVisible())
        dialog.activateWindow()
        qtbot.waitUntil(dialog.isActiveWindow)
        assert [f for f in faults(dialog) if "Preview" not in f] == []  # what can only be read
        dialog.close()


def test_the_parts_library(window):
    window.sight.set(selection="load/cushion")
    QApplication.processEvents()
    button = next(
        b
        for b in window.outline.form.findChildren(QAbstractButton)
        if "parts library" in b.accessibleName() and b.isVisible()
    )
    button.click()
    picker = window.outline.form.findChild(PartPicker)
    assert faults(picker) == []
    picker.close()

"""The main job as a person does it: change a value by typing, see the new peak, save the records, check them."""

from __future__ import annotations

import numpy as np
import pandas as pd
import pytest
from PySide6.QtCore import Qt
from PySide6.QtWidgets import QFileDialog, QLineEdit

from app.bench.finding_row import FindingRow
from app.frame.window import Window
from app.settings import Settings
from app.starting_points import driven_pile
from app.units import units_of
from app.words import verdict
from solver import findings_of, project_from_tree, solve


@pytest.fixture
def window(qtbot, tmp_path):
    project = project_from_tree(driven_pile())
    solve(project.cases[0])  # compiled before: a window cannot be closed while the compiler works
    made = Window(Settings(tmp_path / "settings"), project)
    qtbot.addWidget(made)
    made.show()
    qtbot.waitUntil(lambda: made.solution.state == "fresh", timeout=20_000)
    yield made
    made.close()


def field(window, name):
    return next(e for e in window.outline.findChildren(QLineEdit) if e.accessibleName() == name)


def findings(window):
    return [
        row.accessibleName()
        for row in window.bench.findings.findChildren(FindingRow)
        if row.isVisibleTo(window)
    ]


def type_into(window, qtbot, name, text):
    edit = field(window, name)
    edit.setFocus()
    edit.selectAll()
    qtbot.keyClicks(edit, text)
    qtbot.keyClick(edit, Qt.Key.Key_Return)


def test_typing_another_drop_height_changes_peak_findings_and_records(window, qtbot, tmp_path, monkeypatch):
    before = findings(window)
    type_into(window, qtbot, "Drop height", "5 ft")
    assert window.document.case.load.drop_height == pytest.approx(1.524)
    qtbot.waitUntil(lambda: window.solution.state == "fresh", timeout=20_000)
    answer = solve(window.document.case)
    assert window.solution.result.peak_compression == answer.peak_compression
    units = units_of(window.document.project)
    expected = [f"{line.figure} {line.name}" for line in verdict(findings_of(answer), units)]
    shown = findings(window)
    assert shown[0] != before[0]
    for row, words in zip(shown, expected, strict=False):
        assert row.startswith(words)

    path = tmp_path / "records.csv"
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_args: (str(path), ""))
    window.menus.records.trigger()
    table = pd.read_csv(path, comment="#")
    for name, gauge in answer.gauges.items():
        # compression is positive in a project of piles, and so in what leaves its window
        assert np.array_equal(table[f"{name}.force_N"], -gauge.force)
    assert "# sign: compression positive" in path.read_text(encoding="utf-8")


def test_what_is_not_valid_is_told_under_its_field_and_mended_by_typing(window, qtbot):
    result = window.solution.result
    type_into(window, qtbot, "Drop height", "-1")
    assert window.top_bar.state.words.text() == "✕ Input not valid"
    assert window.document.problem_at("load/drop_height")
    assert window.solution.result is result
    type_into(window, qtbot, "Ram mass", "6")  # others are not blocked
    qtbot.waitUntil(lambda: window.solution.result is not result, timeout=20_000)
    type_into(window, qtbot, "Drop height", "1.5")
    qtbot.waitUntil(lambda: window.top_bar.state.words.text() == "✓ Up to date", timeout=20_000)
    assert window.solution.result.case.load.drop_height == 1.5
    assert window.solution.result.case.load.ram_mass == 6000


def test_undo_by_keys_brings_the_first_findings_back(window, qtbot):
    before = findings(window)
    type_into(window, qtbot, "Drop height", "2")
    qtbot.waitUntil(lambda: window.solution.state == "fresh", timeout=20_000)
    assert findings(window) != before
    window.bench.setFocus()
    qtbot.keyClick(window, Qt.Key.Key_Z, Qt.KeyboardModifier.ControlModifier)
    qtbot.waitUntil(lambda: window.solution.state == "fresh", timeout=20_000)
    assert findings(window) == before

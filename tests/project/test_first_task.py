"""The README's first task, done in the real window as it is written there: three segments, two gauges, their CSV."""

from __future__ import annotations

import re
from pathlib import Path

import pandas as pd
import pytest
from PySide6.QtCore import Qt
from PySide6.QtWidgets import (
    QAbstractButton,
    QApplication,
    QComboBox,
    QFileDialog,
    QLabel,
    QLineEdit,
    QMenu,
    QPushButton,
)

from app.frame.window import Window
from app.settings import Settings
from app.starting_points import rod_or_bar
from solver import load_project, project_from_tree, solve

README = (Path(__file__).resolve().parents[2] / "README.md").read_text(encoding="utf-8")
TASK = README.partition("## Your own pile in ten minutes\n")[2].partition("\n## ")[0]


class Newcomer:
    """Clicks and types what is seen, by its words, and counts it."""

    def __init__(self, window: Window, qtbot) -> None:
        self.window, self.qtbot = window, qtbot
        self.seen: set[str] = set()
        self.acts = 0

    def look(self) -> None:
        """Keep the words that are on screen now, and those of the menus."""
        window = self.window
        for widget in [*window.findChildren(QLabel), *window.findChildren(QAbstractButton)]:
            if widget.isVisible():
                self.seen |= {widget.text(), widget.accessibleName(), widget.toolTip().partition("  (")[0]}
                self.seen |= set(re.sub("<.*?>", "", widget.text()).split(" · "))  # a link in a line
        self.seen |= {button.row.name for button in window.outline.buttons}
        self.seen |= {action.text().replace("&", "") for action in window.actions()}
        for menu in window.findChildren(QMenu):
            self.seen |= {menu.title().replace("&", "")} | {a.text() for a in menu.actions()}

    def part(self, name: str) -> None:
        """Click a row of the outline."""
        self._click(next(b for b in self.window.outline.buttons if b.row.name == name))

    def press(self, words: str) -> None:
        """Click a button under the form, by its words or its tooltip."""
        buttons = self.window.outline.folded_out.findChildren(QAbstractButton)
        self._click(next(b for b in buttons if b.isVisible() and words in (b.text(), b.accessibleName())))

    def type_into(self, label: str, text: str) -> None:
        """Fill a field of the form that is unfolded."""
        fields = self.window.outline.form.findChildren(QLineEdit)
        edit = next(e for e in fields if e.isVisible() and e.accessibleName() == label)
        edit.setFocus()
        edit.selectAll()
        self.qtbot.keyClicks(edit, text)
        self.qtbot.keyClick(edit, Qt.Key.Key_Return)
        self.acts += 1
        self.look()

    def _click(self, button: QAbstractButton) -> None:
        self.qtbot.mouseClick(button, Qt.MouseButton.LeftButton)
        self.acts += 1
        self.look()

    def waits(self) -> None:
        self.qtbot.waitUntil(lambda: self.window.solution.state == "fresh", timeout=30_000)


@pytest.fixture
def newcomer(qtbot, tmp_path):
    project = project_from_tree(rod_or_bar())
    solve(project.cases[0])  # compiled before: a window cannot be closed while the compiler works
    window = Window(Settings(tmp_path / "settings"), project)
    qtbot.addWidget(window)
    window.resize(1440, 900)
    window.show()
    yield Newcomer(window, qtbot)
    window.close()


@pytest.mark.qt_log_ignore("propagateSizeHints")  # of the offscreen screen, when a small window opens
def test_the_task_can_be_done_as_it_is_written(newcomer: Newcomer, tmp_path, monkeypatch):
    window = newcomer.window
    window.ask_new()
    dialog = next(
        w for w in QApplication.topLevelWidgets() if w.isVisible() and w.windowTitle() == "New project"
    )
    choice = next(b for b in dialog.findChildren(QPushButton) if b.accessibleName() == "Driven pile")
    newcomer.seen.add(choice.accessibleName())
    newcomer._click(choice)
    newcomer.part("Ram")
    newcomer.type_into("Ram mass", "6 t")
    newcomer.type_into("Drop height", "4 ft")
    newcomer.part("Cushion")
    newcomer.type_into("Area", "2000")
    newcomer.type_into("Thickness", "120")
    newcomer.part("Pile")
    newcomer.type_into("Length", "24")
    newcomer.type_into("Outer diameter", "610")
    newcomer.type_into("Wall", "16")
    newcomer.press("Split in two")
    newcomer.press("Split in two")
    newcomer.type_into("Wall", "12.5")
    newcomer.part("Ground")
    newcomer.type_into("Surface", "6")
    newcomer.press("+ Add layer")
    newcomer.type_into("Thickness", "4")
    newcomer.type_into("Unit resistance", "80")
    newcomer.part("Toe")
    newcomer.type_into("Toe resistance", "1.2 MN")
    newcomer.part("Gauges")
    newcomer.part("Gauge 2")
    newcomer.press("Remove")
    newcomer.part("Gauge 1")
    newcomer.type_into("Position", "1.2")
    newcomer.part("Materials")
    newcomer.part("steel")
    newcomer.type_into("Limit in compression", "320")
    newcomer.type_into("Limit in tension", "320")
    newcomer.waits()
    newcomer.look()

    case = window.document.case
    assert len(case.member.segments) == 3
    assert {s.section.wall for s in case.member.segments} == {0.016, 0.0125}
    assert case.load.drop_height == pytest.approx(1.2192)
    assert case.far_end.kind == "ground"
    assert case.ground.toe.resistance == pytest.approx(1.2e6)
    assert [g.name for g in case.gauges] == ["Gauge 1", "Gauge 3"]
    told = " ".join(label.text() for label in window.bench.findChildren(QLabel)) + " ".join(
        button.accessibleName() for button in window.bench.findChildren(QAbstractButton)
    )
    assert "no limit given" not in told

    project, records = tmp_path / "own.strike", tmp_path / "own.csv"
    answers = iter([(str(project), ""), (str(records), "")])
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_a: next(answers))
    assert window.ask_save_as()
    window.menus.records.trigger()
    newcomer.acts += 2
    table = pd.read_csv(records, comment="#")
    answer = solve(load_project(project).cases[0])
    assert table["Gauge 1.force_N"].abs().max() == abs(answer.gauges["Gauge 1"].force).max()
    assert {name.partition(".")[0] for name in table.columns[1:]} == {"Gauge 1", "Gauge 3"}
    assert newcomer.acts < 50  # 10 minutes are enough for so many clicks and numbers

    bold = set(re.findall(r"\*\*(.+?)\*\*", TASK))
    assert len(bold) > 25
    assert {words for words in bold if words not in newcomer.seen} == set()


def test_the_copy_of_a_case_and_the_parts_library_are_where_the_task_says(newcomer: Newcomer):
    newcomer.waits()
    newcomer.look()
    assert "Add a case: a copy of this one" in newcomer.seen
    newcomer.part("Bar")
    boxes = [box.accessibleName() for box in newcomer.window.outline.form.findChildren(QComboBox)]
    assert "Material" in boxes

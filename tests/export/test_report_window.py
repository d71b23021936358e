"""The Report workspace and the dialog of records, by typing and clicking."""

from __future__ import annotations

from types import SimpleNamespace

import pandas as pd
import pytest
from PySide6.QtCore import Qt
from PySide6.QtWidgets import QFileDialog

from app.document import Document
from app.frame.notices import Notices
from app.frame.records_dialog import RecordsDialog
from app.report.screen.workspace import ReportSpace
from app.settings import Settings
from solver import project_from_tree, solve
from tests.export.conftest import bar_tree

pytestmark = pytest.mark.qt_log_ignore("propagateSizeHints")  # of the offscreen screen


@pytest.fixture
def document():
    tree = bar_tree(cases=2)
    tree["studies"] = {"report": {"mesh_check": False, "figures": ["envelope", "xt"]}}
    return Document(project_from_tree(tree))


@pytest.fixture
def space(document, qtbot):
    made = ReportSpace(document)
    qtbot.addWidget(made)
    made.resize(1200, 800)
    made.show()
    qtbot.waitUntil(lambda: made.work.state == "fresh", timeout=60_000)
    yield made
    made.close()
    assert made.close_down()


def test_pages_follow_what_is_typed_and_can_be_undone(space, document, qtbot):
    before = space.work.pdf
    field = space.form.particulars["client"]
    qtbot.mouseClick(field, Qt.MouseButton.LeftButton)
    qtbot.keyClicks(field, "Harbour office")
    qtbot.keyClick(field, Qt.Key.Key_Return)
    assert document.project.studies["report"]["particulars"] == {"client": "Harbour office"}
    qtbot.waitUntil(lambda: space.work.state == "fresh" and space.work.pdf != before, timeout=30_000)
    assert ("Client", "Harbour office") in space.work.report.front.particulars
    document.undo_stack.undo()
    assert "particulars" not in document.project.studies["report"]
    assert field.text() == ""


def test_a_section_is_moved_and_left_out(space, document, qtbot):
    sections = space.form.sections
    sections.setCurrentRow(1)
    qtbot.keyClick(sections, Qt.Key.Key_Up, Qt.KeyboardModifier.AltModifier)
    assert space.form.choices.sections[:2] == ("input", "summary")
    sections.item(0).setCheckState(Qt.CheckState.Unchecked)
    assert space.form.choices.sections[0] == "summary"
    assert "input" not in space.form.choices.sections


def test_the_report_is_saved_and_a_folder_that_is_in_the_way_is_told(space, qtbot, tmp_path, monkeypatch):
    path = tmp_path / "report.pdf"
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_: (str(path), ""))
    with qtbot.waitSignal(space.told) as told:
        qtbot.mouseClick(space.pdf, Qt.MouseButton.LeftButton)
    assert str(path) in told.args[0]
    assert path.read_bytes() == space.work.pdf
    with qtbot.waitSignal(space.told) as told:
        assert not space.save(tmp_path)
    assert told.args[1] == "over"
    assert "cannot be written" in told.args[0]


@pytest.fixture
def dialog(document, qtbot, tmp_path):
    result = solve(document.case)
    signal = document.changed  # any signal will do for one that never comes
    solution = SimpleNamespace(result=result, state="fresh", changed=signal)
    parent = Notices()
    qtbot.addWidget(parent)
    made = RecordsDialog(document, solution, Settings(tmp_path / "settings"), parent)
    made.open_for(parent)
    yield made
    made.close()


def test_the_preview_is_what_is_written_and_choices_are_kept(dialog, document, qtbot, tmp_path):
    fields = dialog.fields
    fields.units.setCurrentIndex(fields.units.findData("us"))
    qtbot.keyClicks(fields.end, "1 ms")
    qtbot.keyClicks(fields.rate, "20")
    qtbot.waitUntil(
        lambda: "kip" in dialog.preview.toPlainText() and "20000 Hz" in dialog.preview.toPlainText()
    )
    shown = [line for line in dialog.preview.toPlainText().splitlines() if not line.startswith(("#", "…"))]
    with qtbot.waitSignal(dialog.work.ended, timeout=30_000) as ended:
        dialog.write_to(tmp_path)
    assert ended.args[1]
    written = (tmp_path / "pulse-records.csv").read_text(encoding="utf-8")
    rows = [line for line in written.splitlines() if not line.startswith("#")]
    assert rows[: len(shown)] == shown
    assert len(pd.read_csv(tmp_path / "pulse-records.csv", comment="#")) == 21  # 0 to 1 ms at 20 kHz
    assert dialog._settings.kept("records")["rate"] == 20e3


def test_all_cases_are_written_where_they_are_ticked(dialog, qtbot, tmp_path):
    dialog.fields.cases.item(1).setCheckState(Qt.CheckState.Checked)
    with qtbot.waitSignal(dialog.work.ended, timeout=60_000):
        dialog.write_to(tmp_path)
    assert {p.name for p in tmp_path.glob("*.csv")} == {"pulse-records.csv", "pulse-2-records.csv"}


def test_every_choice_says_what_it_means(dialog):
    fields = dialog.fields
    choices = (
        fields.cases,
        fields.gauges,
        fields.columns,
        fields.units,
        fields.sign,
        fields.rate,
        fields.start,
    )
    for field in (*choices, fields.end, fields.zero, fields.digits, fields.commas, fields.mark):
        assert len(field.toolTip()) > 10
        assert field.accessibleName() or field.text()


def test_a_logo_beside_the_project_is_kept_by_its_name(space, document, tmp_path):
    space.form.take_logo(tmp_path / "logo.png")
    assert space.form.choices.logo == str(tmp_path / "logo.png")
    document.save_as(tmp_path / "bar.strike")
    space.form.take_logo(tmp_path / "pictures" / "logo.png")
    assert space.form.choices.logo == "pictures/logo.png"


def test_what_makes_no_sense_is_said_and_cannot_be_saved(dialog, qtbot):
    qtbot.keyClicks(dialog.fields.rate, "fast")
    qtbot.waitUntil(lambda: "Sampling: 'fast' is no number." in dialog.state.text())
    assert not dialog.save.isEnabled()
    dialog.fields.rate.clear()
    qtbot.keyClicks(dialog.fields.rate, "99999")
    qtbot.waitUntil(lambda: "half of the solver's own" in dialog.state.text())
    assert not dialog.save.isEnabled()

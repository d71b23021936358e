"""Files in the window: saved, opened, dropped on it, changed by others, and kept when nobody has saved them."""

from __future__ import annotations

from pathlib import Path

import pytest
from PySide6.QtCore import QMimeData, QPointF, Qt, QUrl
from PySide6.QtGui import QDropEvent
from PySide6.QtWidgets import QFileDialog, QMessageBox

from app.frame.recovery import kept_work
from app.starting_points import STARTING_POINTS
from solver import load_project


def press(window, key):
    """The button of a notice, by the start of its words."""
    for strip in list(window.notices._strips):
        for button in window.notices.buttons_of(strip):
            if button.text().startswith(key):
                button.click()
                return
    raise AssertionError(f"no notice offers '{key}'")


def test_saving_and_opening(window, tmp_path, monkeypatch):
    path = tmp_path / "pile nr. 1"
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_args: (str(path), ""))
    window.document.edit("Title", "/title", "Saved")
    assert window.save()  # it has no file yet, so it asks
    file = tmp_path / "pile nr. 1.strike"
    assert load_project(file).title == "Saved"
    assert not window.isWindowModified()
    assert window.settings.recent[0] == window.document.path
    window.document.edit("Title", "/title", "Saved again")
    assert window.save()
    assert load_project(file).title == "Saved again"


def test_a_file_that_cannot_be_opened_is_told_before_anything_is_asked(window, tmp_path, monkeypatch):
    monkeypatch.setattr(QMessageBox, "question", lambda *_a: pytest.fail("asked to save for nothing"))
    window.document.edit("Title", "/title", "Own")
    bad = tmp_path / "bad.strike"
    bad.write_text("{")
    before = window.document.project
    assert not window.open_path(bad)
    assert "'bad.strike' cannot be opened.\nIt is not valid JSON at line 1" in window.notices.text_of("file")
    assert window.document.project is before


@pytest.mark.parametrize("answer", ["Cancel", "Discard", "Save"])
def test_opening_another_project_over_unsaved_work_asks(window, tmp_path, monkeypatch, answer):
    button = getattr(QMessageBox.StandardButton, answer)
    monkeypatch.setattr(QMessageBox, "question", lambda *_args: button)
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_args: (str(tmp_path / "kept.strike"), ""))
    window.document.edit("Title", "/title", "Unsaved")
    assert window.files.new_from(STARTING_POINTS[0]) == (answer != "Cancel")
    assert (window.document.project.title == "Unsaved") == (answer == "Cancel")
    assert (tmp_path / "kept.strike").exists() == (answer == "Save")
    assert not list(Path(window.settings.recovery_folder).glob("*.json"))


def test_unsaved_work_is_kept_within_3_s_and_offered_at_the_next_start(windows, qtbot):
    first = windows()
    folder = first.settings.recovery_folder
    first.document.edit("Speed", "load/velocity", 12.5)
    qtbot.waitUntil(lambda: any(folder.glob("*.json")), timeout=3000)
    assert kept_work(folder) == []  # its own program still runs
    first.document.edit("Title", "/title", "Kept at the last moment")
    first.close()
    found = kept_work(folder)
    assert [kept.project.title for kept in found] == ["Kept at the last moment"]

    second = windows()
    second.files.offer_recovery(found)
    text = second.notices.text_of("recovery0")
    assert "Unsaved work on the project 'Kept at the last moment', kept at " in text
    assert "It was never saved." in text
    press(second, "Go on with it")
    assert second.document.case.load.velocity == 12.5
    assert second.document.dirty
    assert len(list(folder.glob("*.json"))) == 1  # now its own


def test_kept_work_is_dropped_when_it_is_saved_or_not_wanted(window, windows, tmp_path):
    folder = window.settings.recovery_folder
    window.document.edit("Title", "/title", "One")
    window.autosave.keep_now()
    window.files.save_to(tmp_path / "one.strike")
    assert not list(folder.glob("*.json"))
    window.document.edit("Title", "/title", "Two")
    window.close()
    other = windows()
    other.files.offer_recovery(kept_work(folder))
    assert "1 value differs: title One \u2192 Two." in other.notices.text_of("recovery0")
    press(other, "Discard it")
    assert not list(folder.glob("*.json"))


def test_a_recovery_folder_that_cannot_be_written_is_told_once(window, tmp_path):
    window.settings.recovery_folder.parent.mkdir(parents=True, exist_ok=True)
    window.settings.recovery_folder.write_text("a file stands where the folder should")
    window.document.edit("Title", "/title", "One")
    window.autosave.keep_now()
    assert "cannot be kept" in window.notices.text_of("autosave")


def test_kept_work_that_the_file_holds_already_is_dropped_and_not_offered(window, tmp_path):
    """As a kill leaves it that comes between writing the file and dropping what was kept."""
    path, left = tmp_path / "x.strike", tmp_path / "left" / "kept.json"
    window.files.save_to(path)
    window.document.edit("Title", "/title", "One")
    window.autosave.keep_now()
    left.parent.mkdir()
    left.write_bytes(next(window.settings.recovery_folder.glob("*.json")).read_bytes())
    window.files.offer_recovery(kept_work(left.parent))
    assert "Unsaved work" in window.notices.text_of("recovery0")
    window.notices.drop("recovery0")
    window.save()
    window.files.offer_recovery(kept_work(left.parent))
    assert window.notices.text_of("recovery0") is None
    assert not left.exists()


def test_a_file_changed_by_another_program_is_told(window, tmp_path, qtbot):
    path = tmp_path / "x.strike"
    window.files.save_to(path)
    path.write_text(path.read_text().replace("New bar", "By another hand"))
    qtbot.waitUntil(lambda: window.notices.text_of("disk") is not None, timeout=5000)
    assert "title New bar \u2192 By another hand" in window.notices.text_of("disk")
    press(window, "Load it again")
    assert window.document.project.title == "By another hand"


def test_saving_over_what_another_program_wrote_asks_first(window, tmp_path):
    path = tmp_path / "x.strike"
    window.files.save_to(path)
    path.write_text(path.read_text().replace("New bar", "By another hand"))
    window.document.edit("Title", "/title", "Mine")
    assert not window.save()
    assert load_project(path).title == "By another hand"
    press(window, "Save over it")
    assert load_project(path).title == "Mine"


def test_a_project_dropped_on_the_window_is_opened(window, tmp_path):
    path = tmp_path / "x.strike"
    window.files.save_to(path)
    window.files.new_from(STARTING_POINTS[0])
    data = QMimeData()
    data.setUrls([QUrl.fromLocalFile(str(path))])
    everything = Qt.DropAction.CopyAction, data, Qt.MouseButton.LeftButton, Qt.KeyboardModifier.NoModifier
    window.dropEvent(QDropEvent(QPointF(200, 200), *everything))
    assert window.document.path == path


def test_only_the_last_file_that_was_written_is_told(window):
    """Strips that tell of files do not pile up; one that tells of a fault stays."""
    notices = window.notices
    notices.show_notice("sheet", "The page cannot be written.", "over")
    notices.show_notice("records", "1 file of records in here.")
    notices.show_notice("report", "The report is here.")
    assert notices.text_of("records") is None
    assert notices.text_of("sheet") == "The page cannot be written."
    assert notices.text_of("report") == "The report is here."

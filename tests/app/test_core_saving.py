"""Saving where something is in the way: a file of the same name, a program that holds the file for a moment."""

from __future__ import annotations

from types import SimpleNamespace

import pytest
from PySide6.QtCore import QSaveFile
from PySide6.QtWidgets import QFileDialog, QWidget

from app import document as document_module
from app.document import Document, DocumentError
from app.frame.files import Files
from app.frame.notices import Notices
from app.frame.recovery import Autosave, kept_work
from app.settings import Settings
from app.starting_points import driven_pile
from solver import load_project, project_from_tree


@pytest.fixture
def document(qapp):
    made = Document(project_from_tree(driven_pile()), qapp)
    made.edit("Title", "/title", "Own")
    return made


@pytest.fixture
def window(document, qtbot, tmp_path):
    """As much of a window as files need."""
    parent = QWidget()
    qtbot.addWidget(parent)
    around = SimpleNamespace(
        document=document,
        notices=Notices(parent),
        settings=Settings(tmp_path / "settings"),
        commit_typing=lambda: None,
        parent=parent,
    )
    around.files = Files(around, parent)
    return around


def test_a_name_with_a_dot_gets_the_ending_and_replaces_nothing_unasked(window, tmp_path, monkeypatch):
    """The system's dialog asks before it replaces what was typed, not what an ending makes of it."""
    typed = tmp_path / "pile v1.2"
    there = tmp_path / "pile v1.2.strike"
    there.write_text("somebody's own")
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_a: (str(typed), ""))
    assert not window.files.ask_save_as()
    assert there.read_text() == "somebody's own"
    assert "already" in window.notices.text_of("saving")
    window.notices.buttons_of("saving")[0].click()
    assert load_project(there).title == "Own"
    assert not typed.exists()


def test_a_file_held_for_a_moment_is_saved_all_the_same(document, tmp_path, monkeypatch):
    path = tmp_path / "own.strike"
    document.save_as(path)
    document.edit("Title", "/title", "Second")
    refusals = iter([False])

    class Held(QSaveFile):
        def commit(self):
            if next(refusals, True):
                return super().commit()
            self.cancelWriting()
            return False

    monkeypatch.setattr(document_module, "QSaveFile", Held)
    document.save()
    assert load_project(path).title == "Second"
    refusals = iter([False] * 9)
    document.edit("Title", "/title", "Third")
    with pytest.raises(DocumentError, match="Your work is kept here"):
        document.save()
    assert document.dirty


def test_work_that_could_not_be_kept_is_kept_as_soon_as_that_goes(document, tmp_path, qtbot):
    folder = tmp_path / "recovery"
    folder.write_text("a file stands where the folder should")
    autosave = Autosave(document, folder, document)
    document.edit("Title", "/title", "Not kept yet")
    with qtbot.waitSignal(autosave.failed):
        autosave.keep_now()
    folder.unlink()
    qtbot.waitUntil(lambda: folder.is_dir() and any(folder.glob("*.json")), timeout=3000)
    autosave.close()
    assert [kept.project.title for kept in kept_work(folder)] == ["Not kept yet"]

"""The window as a person uses it: typing, clicking, files, notices, and leaving it in any state."""

from __future__ import annotations

from pathlib import Path
from types import SimpleNamespace

import pandas as pd
import pytest
from PySide6.QtCore import QMimeData, QPointF, Qt, QUrl
from PySide6.QtGui import QDropEvent
from PySide6.QtWidgets import QAbstractButton, QFileDialog, QMessageBox

from app.frame.recovery import kept_work
from app.frame.window import Window
from app.look import apply_look
from app.look.palette import palette
from app.settings import Settings
from app.starting_points import STARTING_POINTS, rod_or_bar
from solver import SolveError, load_project, project_from_tree, solve


@pytest.fixture(scope="module", autouse=True)
def _compiled():
    """Compiling the kernels cannot be broken off, and takes longer than closing may: it is done before."""
    solve(project_from_tree(rod_or_bar()).cases[0])


@pytest.fixture
def windows(qtbot, tmp_path, qapp):
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
    qtbot.waitUntil(
        lambda: made.solution.state == "fresh", timeout=60_000
    )  # the first run may compile kernels
    return made


def state_of(window):
    return window.top_bar.state.words.text()


def press(window, key):
    """The button of a notice, by the start of its words."""
    for strip in list(window.notices._strips):
        for button in window.notices.buttons_of(strip):
            if button.text().startswith(key):
                button.click()
                return
    raise AssertionError(f"no notice offers '{key}'")


def endless(case, *, progress, cancel):
    """A run that goes on until it is stopped, with one partial result after 200 ms."""
    from time import sleep

    part = solve(case)
    while not cancel():
        sleep(0.01)
        progress(SimpleNamespace(fraction=0.5, seconds_left=7.0, partial=lambda: part))
    from dataclasses import replace

    return replace(part, finished=False)


def test_it_opens_solved(window):
    assert state_of(window) == "✓ Up to date"
    assert window.solution.result.case == window.document.case
    assert not window.isWindowModified()
    assert window.sight.time == window.solution.result.peak_compression.time


def test_the_title_is_typed_and_undone_by_keys(window, qtbot):
    title = window.top_bar.title
    title.selectAll()
    qtbot.keyClicks(title, "Bar 7")
    qtbot.keyClick(title, Qt.Key.Key_Return)
    assert window.document.project.title == "Bar 7"
    assert window.isWindowModified()
    assert window.windowTitle().startswith("Bar 7[*]")
    window.bench.setFocus()
    qtbot.keyClick(window, Qt.Key.Key_Z, Qt.KeyboardModifier.ControlModifier)
    assert window.document.project.title == "New bar"
    assert title.text() == "New bar"
    assert not window.isWindowModified()


def test_escape_leaves_the_title_as_it_was(window, qtbot):
    qtbot.keyClicks(window.top_bar.title, "x")
    qtbot.keyClick(window.top_bar.title, Qt.Key.Key_Escape)
    assert window.top_bar.title.text() == window.document.project.title == "New bar"


def test_sign_and_units_are_switched_live(window, qtbot):
    qtbot.mouseClick(window.top_bar.sign, Qt.MouseButton.LeftButton)
    assert window.document.project.display_sign == "compression"
    assert window.top_bar.sign.text() == "Compression +"
    us = next(a for a in window.top_bar.units.menu().actions() if a.text() == "US")
    us.trigger()
    assert window.document.project.display_units == "us"
    assert window.top_bar.units.text() == "US"
    assert window.solution.state == "fresh"  # nothing of the case has changed: it is not solved again
    window.menus.undo.trigger()
    window.menus.undo.trigger()
    assert (window.top_bar.sign.text(), window.top_bar.units.text()) == ("Tension +", "Metric")


def test_an_edit_is_solved_again_and_the_peak_follows(window, qtbot):
    """Impact of equal bars: stress = rho c v / 2, linear in the speed of the striker (Johnson 1972, from memory)."""
    before = window.solution.result.peak_compression.value
    assert window.document.edit("Faster", "load/velocity", 2 * window.document.case.load.velocity)
    qtbot.waitUntil(lambda: window.solution.state == "fresh", timeout=10_000)
    assert window.solution.result.peak_compression.value == pytest.approx(2 * before, rel=1e-9)


def test_an_input_that_is_not_valid_is_told_and_the_picture_stays(window):
    result = window.solution.result
    window.document.edit("Speed", "load/velocity", -1.0)
    assert state_of(window) == "✕ Input not valid"
    assert "more than 0" in window.top_bar.state.words.toolTip()
    assert window.solution.result is result
    window.document.forget_rejected()
    assert state_of(window) == "✓ Up to date"


def test_a_case_that_cannot_be_solved_says_why(windows, qtbot):
    def refusing(case, **_how):
        raise SolveError("Joints with slack are not solved yet.")

    window = windows(refusing)
    qtbot.waitUntil(lambda: window.solution.state == "refused")
    assert state_of(window) == "✕ Cannot be solved"
    assert window.notices.text_of("solution") == "Joints with slack are not solved yet."


def test_a_fault_of_the_solver_is_no_crash(windows, qtbot, caplog):
    def failing(case, **_how):
        raise ZeroDivisionError("by nothing")

    window = windows(failing)
    qtbot.waitUntil(lambda: window.solution.state == "refused")
    assert "ZeroDivisionError" in window.notices.text_of("solution")
    assert "by nothing" in caplog.text


def test_a_long_run_shows_progress_fills_the_pictures_and_can_be_stopped(windows, qtbot):
    window = windows(endless)
    qtbot.waitUntil(lambda: window.solution.result is not None, timeout=60_000)
    assert window.solution.state == "solving"
    assert state_of(window) == "Solving, 50%, 7 s left"
    assert window.top_bar.state.progress.value() == 500
    qtbot.mouseClick(window.top_bar.state.act, Qt.MouseButton.LeftButton)
    qtbot.waitUntil(lambda: window.solution.state == "stopped")
    assert state_of(window) == "! Stopped"
    assert "until then" in window.notices.text_of("solution")
    assert window.top_bar.state.act.text() == "Solve again"


def test_while_something_is_dragged_the_pictures_follow(windows, qtbot):
    """Runs that newer input has overtaken still end when they are short, and the last input is what is solved last."""
    seen = []

    def counting(case, **how):
        seen.append(case.load.velocity)
        return solve(case, **how)

    window = windows(counting)
    qtbot.waitUntil(lambda: window.solution.state == "fresh", timeout=60_000)
    for step in range(20):
        window.document.edit("Drag", "load/velocity", 5.0 + step, merge="drag")
        qtbot.wait(5)
    qtbot.waitUntil(lambda: window.solution.state == "fresh", timeout=20_000)
    assert seen[-1] == window.solution.result.case.load.velocity == 24.0
    assert window.document.undo_stack.count() == 1


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
    assert "It was never saved." in second.notices.text_of("recovery0")
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


def test_the_gauge_records_are_those_of_the_solver(window, tmp_path, monkeypatch):
    path = tmp_path / "records.csv"
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_args: (str(path), ""))
    window.document.edit("Sign", "/display_sign", "compression")
    window.menus.records.trigger()
    assert str(path) in window.notices.text_of("records")
    table = pd.read_csv(path, comment="#")
    for name, gauge in solve(window.document.case).gauges.items():
        assert (table[f"{name}.force_N"].to_numpy() == -gauge.force).all()  # in the sign of the screen
        assert (table[f"{name}.velocity_m_s"].to_numpy() == gauge.velocity).all()


def test_notes_are_typed_in_place(window, qtbot):
    window.menus.notes.trigger()
    assert window.notes.isVisible()
    qtbot.keyClicks(window.notes.field, "See the step")
    window.commit_typing()
    assert window.document.project.notes == "See the step"
    window.menus.undo.trigger()
    assert window.notes.field.toPlainText() == ""


def test_light_and_dark_are_chosen_and_remembered(window, tmp_path):
    looks = {action.data(): action for action in window.menus.looks.actions()}
    looks["dark"].trigger()
    assert palette().dark
    assert Settings(tmp_path / "settings").look == "dark"
    looks["light"].trigger()
    assert not palette().dark


def test_the_layout_is_remembered(window, windows):
    window.menus.outline.trigger()
    window.bench.set_shares((0.2, 0.5, 0.3), (0.6, 0.4))
    window.close()
    other = windows()
    assert not other.outline.isVisible()
    for mine, its in zip(other.bench.shares(), ((0.2, 0.5, 0.3), (0.6, 0.4)), strict=True):
        assert mine == pytest.approx(its, abs=0.02)  # whole pixels


def test_cases_are_chosen_by_a_click_and_listed_where_they_do_not_fit(window, qtbot):
    row = window.top_bar.cases
    assert not row._all.isVisible()
    for _ in range(12):
        qtbot.mouseClick(row._add, Qt.MouseButton.LeftButton)
    assert len(window.document.project.cases) == 13
    assert window.document.case_index == 12  # the copy is looked at
    assert row._all.isVisible()
    row._all.menu().aboutToShow.emit()
    row._all.menu().actions()[3].trigger()
    assert window.document.case_index == 3
    assert row._buttons[3].isChecked()
    assert sum(button.isChecked() for button in row._buttons) == 1


def test_every_button_can_be_reached_by_name_and_no_key_is_taken_twice(window):
    for button in window.findChildren(QAbstractButton):
        if button.isVisible():
            assert button.accessibleName() or button.text(), button
    keys = [k.toString() for a in window.actions() for k in a.shortcuts()]
    assert len(keys) == len(set(keys))
    assert {"Ctrl+N", "Ctrl+O", "Ctrl+S", "Ctrl+E", "Ctrl+Q", "F9", "F11"} <= set(keys)


def test_it_closes_while_solving_and_with_unsaved_work(windows, qtbot):
    window = windows(endless)
    qtbot.waitUntil(lambda: window.solution.result is not None, timeout=60_000)
    window.document.edit("Title", "/title", "Unsaved")
    window.close()
    assert window.ended_in_time
    assert [kept.project.title for kept in kept_work(window.settings.recovery_folder)] == ["Unsaved"]

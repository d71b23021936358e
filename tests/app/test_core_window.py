"""The window as a person uses it: typing, clicking, files, notices, and leaving it in any state."""

from __future__ import annotations

from types import SimpleNamespace

import pandas as pd
import pytest
from PySide6.QtCore import Qt
from PySide6.QtWidgets import QAbstractButton, QFileDialog

from app.frame.recovery import kept_work
from app.look.palette import palette
from app.settings import Settings
from solver import SolveError, solve


def state_of(window):
    return window.top_bar.state.words.text()


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

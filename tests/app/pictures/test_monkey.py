"""Some hundred random events on the whole window; thousands, and other seeds, by hand (see monkey.py)."""

from __future__ import annotations

import random
from pathlib import Path

import pytest
from PySide6.QtWidgets import QFileDialog

from app.frame.window import Window
from app.settings import Settings
from solver import load_project, solve
from tests.app.pictures.monkey import Messages, Monkey, nothing_chosen

DEMOS = sorted((Path(__file__).resolve().parents[3] / "demo_projects").glob("*.strike"))


@pytest.mark.parametrize("seed", [1, 2])
def test_random_events_do_no_harm(qtbot, tmp_path, monkeypatch, capfd, seed):
    """An exception fails the test by itself (pytest-qt); nothing is said; no event takes a second."""
    monkeypatch.setattr(QFileDialog, "getOpenFileName", nothing_chosen)
    monkeypatch.setattr(QFileDialog, "getSaveFileName", nothing_chosen)
    chance = random.Random(seed)
    project = load_project(chance.choice(DEMOS))
    solve(project.cases[0])  # what has to be compiled is
    with Messages() as messages:
        window = Window(Settings(tmp_path / "settings"), project)
        qtbot.addWidget(window)
        window.resize(1280, 800)
        window.show()
        monkey = Monkey(window, chance)
        monkey.play(250)
        window.close()
    assert monkey.events > 200
    assert messages.told == []
    assert capfd.readouterr().err == ""
    assert monkey.longest < 1, monkey.slow

"""A run that rings on opens on its first passages; all of it is a key and a button away, as the time bar shows."""

from __future__ import annotations

import copy
from math import sqrt
from types import SimpleNamespace

import pytest
from PySide6.QtCore import QPoint, Qt
from PySide6.QtWidgets import QWidget

from app.bench.pictures.turns import Turns
from solver import solve
from tests.app.pictures.conftest import PILE, project_of


@pytest.fixture(scope="module")
def ringing():
    """A concrete pile that nothing damps but soft ground: it goes on until it rests, many passages later."""
    case = copy.deepcopy(PILE)
    for segment in case["member"]["segments"]:
        segment |= {"material": "concrete", "section": {"shape": "rectangle", "width": 0.4, "depth": 0.4}}
    case["run"] = {"duration": None}
    project = project_of(case)
    return SimpleNamespace(project=project, result=solve(project.cases[0]))


#: Travel time along 24 m of concrete, s.
PASSAGE = 24 / sqrt(40e9 / 2450)


def test_a_run_until_rest_opens_on_ten_passages(open_bench, ringing):
    the = open_bench(ringing)
    assert ringing.result.duration > 13 * PASSAGE  # else it would be shown whole
    for picture in (the.bench.xt, *the.bench.strips.shown()):
        axis = picture.time_axis()
        assert (axis.low, axis.high) == pytest.approx((0.0, 10 * PASSAGE), rel=1e-9)
    low, high = the.bench.time_bar._slider.part()
    assert (low, high) == pytest.approx((0.0, 10 * PASSAGE / ringing.result.duration), rel=1e-9)
    assert the.bench.time_bar.whole_run.isVisible()


def test_home_and_the_button_show_all_of_it_and_again_its_opening(open_bench, ringing, qtbot):
    the = open_bench(ringing)
    xt, button = the.bench.xt, the.bench.time_bar.whole_run
    for turn in (lambda: qtbot.keyClick(xt, Qt.Key.Key_Home), button.click):
        turn()
        assert xt.time_axis().high == ringing.result.duration
        assert button.isChecked()
        assert the.bench.time_bar._slider.part() == (0.0, 1.0)
        turn()
        assert xt.time_axis().high == pytest.approx(10 * PASSAGE)
        assert not button.isChecked()


def test_a_moment_beyond_the_opening_brings_the_pictures_along(open_bench, ringing):
    the = open_bench(ringing)
    last = next(row for row in the.bench.findings.rows() if row.told.name == "set per blow")
    last.click()
    axis = the.bench.xt.time_axis()
    assert the.sight.time == ringing.result.duration
    assert axis.high == pytest.approx(ringing.result.duration)
    assert axis.high - axis.low == pytest.approx(10 * PASSAGE)  # as near as before
    the.bench.time_bar.step(-400)
    assert the.bench.xt.time_axis().low <= the.sight.time <= the.bench.xt.time_axis().high


def test_a_duration_that_somebody_typed_is_shown_whole(open_bench, pile):
    the = open_bench(pile)
    assert the.bench.xt.time_axis().high == 0.03
    assert not the.bench.time_bar.whole_run.isVisible()


def test_pictures_are_painted_one_at_a_time_and_none_is_left_behind(qtbot):
    """Results that come faster than they are painted: the first picture does not push the others back for ever."""
    window = QWidget()
    qtbot.addWidget(window)
    window.resize(100, 100)
    window.show()
    painted = []

    class Seen(QWidget):
        def update(self):
            painted.append(self.objectName())

    turns = Turns(window)
    pictures = [Seen(window) for _ in range(3)]
    for number, picture in enumerate(pictures):
        picture.setObjectName(str(number))
        picture.move(QPoint(0, 20 * number))
        picture.show()
    for _ in range(6):
        for number, picture in enumerate(pictures):
            turns.take(picture, number)  # a new result
        turns._next()
    assert painted == ["0", "1", "2", "0", "1", "2"]
    with qtbot.waitSignal(turns.done):
        pass
    assert not turns.busy

"""Pointing anywhere moves the one cursor; clicking selects; zoom is shared; only what changed is painted again."""

from __future__ import annotations

import csv
import io

import numpy as np
import pytest
from PySide6.QtCore import QPoint, QPointF, Qt
from PySide6.QtGui import QWheelEvent
from PySide6.QtWidgets import QApplication

from app.bench.pictures.plot_export import csv_of


def at(picture, time=None, place=None):
    """The pixel of a time and a place in a picture."""
    plot = picture.plot()
    x = picture.time_axis().at(time) if time is not None else plot.center().x()
    y = picture.distance_axis().at(place) if place is not None else plot.center().y()
    return QPoint(round(x), round(y))


def wheel(picture, position, notches, keys=Qt.KeyboardModifier.NoModifier):
    QApplication.sendEvent(
        picture,
        QWheelEvent(
            QPointF(position),
            picture.mapToGlobal(QPointF(position)),
            QPoint(),
            QPoint(0, 120 * notches),
            Qt.MouseButton.NoButton,
            keys,
            Qt.ScrollPhase.NoScrollPhase,
            False,
        ),
    )


def test_a_click_on_the_xt_diagram_moves_time_and_place(open_bench, pile, qtbot):
    the = open_bench(pile)
    qtbot.mouseClick(the.bench.xt, Qt.MouseButton.LeftButton, pos=at(the.bench.xt, 0.012, 7.0))
    pixel = 0.03 / the.bench.xt.plot().width()
    assert the.sight.time == pytest.approx(0.012, abs=pixel)
    assert the.sight.place == pytest.approx(7.0, abs=0.1)


def test_dragging_takes_the_cursor_along(open_bench, pile, qtbot):
    the = open_bench(pile)
    strip = the.bench.strips.shown()[0]
    qtbot.mousePress(strip, Qt.MouseButton.LeftButton, pos=at(strip, 0.005))
    qtbot.mouseMove(strip, at(strip, 0.02))
    qtbot.mouseRelease(strip, Qt.MouseButton.LeftButton, pos=at(strip, 0.02))
    assert the.sight.time == pytest.approx(0.02, abs=1e-4)
    assert the.sight.place is None


def test_the_profile_moves_the_place_and_leaves_the_time(open_bench, pile, qtbot):
    the = open_bench(pile)
    the.sight.set(time=0.004)
    qtbot.mouseClick(the.bench.profile, Qt.MouseButton.LeftButton, pos=at(the.bench.profile, place=20.0))
    assert the.sight.time == 0.004
    assert the.sight.place == pytest.approx(20.0, abs=0.1)


@pytest.mark.parametrize(
    ("place", "side", "pointer"),
    [
        (3.0, 0.0, "member/segments/0"),
        (20.0, 0.0, "member/segments/1"),
        (10.0, 40.0, "ground/layers/0"),
        (1.2, -45.0, "gauges/0"),
        (23.2, -45.0, "gauges/1"),
    ],
)
def test_a_click_on_the_member_selects_the_part(open_bench, pile, qtbot, place, side, pointer):
    the = open_bench(pile)
    member = the.bench.member
    spot = QPoint(round(member.scene().centre + side), at(member, place=place).y())
    qtbot.mouseClick(member, Qt.MouseButton.LeftButton, pos=spot)
    assert the.sight.selection == pointer


def test_every_part_of_the_load_train_can_be_selected(open_bench, pile, qtbot):
    the = open_bench(pile)
    member = the.bench.member
    found = []
    for block in member.scene().blocks:
        qtbot.mouseClick(member, Qt.MouseButton.LeftButton, pos=block.box.center().toPoint())
        found.append(the.sight.selection)
    assert found == ["load/cap_mass", "load/cushion", "load"]


def test_the_wheel_zooms_about_the_pointer_and_a_double_click_shows_all(open_bench, pile, qtbot):
    the = open_bench(pile)
    xt = the.bench.xt
    spot = at(xt, 0.01, 12.0)
    before = xt.time_axis().value(spot.x()), xt.distance_axis().value(spot.y())
    wheel(xt, spot, 3)
    assert the.sight.time_range is not None
    assert the.sight.distance_range is not None
    assert xt.time_axis().value(spot.x()) == pytest.approx(before[0], abs=1e-9)
    assert xt.distance_axis().value(spot.y()) == pytest.approx(before[1], abs=1e-9)
    span = the.sight.time_range[1] - the.sight.time_range[0]
    assert span == pytest.approx(0.03 * 0.8**3)
    qtbot.mouseDClick(xt, Qt.MouseButton.LeftButton, pos=spot)
    assert the.sight.time_range is None
    assert the.sight.distance_range is None


def test_control_zooms_time_alone_and_shift_distance_alone(open_bench, pile):
    the = open_bench(pile)
    wheel(the.bench.xt, at(the.bench.xt, 0.01, 12.0), 1, Qt.KeyboardModifier.ControlModifier)
    assert the.sight.time_range is not None
    assert the.sight.distance_range is None
    the.sight.set(time_range=None)
    wheel(the.bench.xt, at(the.bench.xt, 0.01, 12.0), 1, Qt.KeyboardModifier.ShiftModifier)
    assert the.sight.time_range is None
    assert the.sight.distance_range is not None


def test_a_zoomed_picture_is_moved_with_the_middle_button(open_bench, pile, qtbot):
    the = open_bench(pile)
    xt = the.bench.xt
    the.sight.set(time_range=(0.005, 0.015))
    start = QPoint(round(xt.plot().center().x()), 200)
    qtbot.mousePress(xt, Qt.MouseButton.MiddleButton, pos=start)
    event_to = start - QPoint(50, 0)
    qtbot.mouseMove(xt, event_to)
    qtbot.mouseRelease(xt, Qt.MouseButton.MiddleButton, pos=event_to)
    moved = 50 * 0.01 / xt.plot().width()
    assert the.sight.time_range == pytest.approx((0.005 + moved, 0.015 + moved))


def test_home_shows_all(open_bench, pile, qtbot):
    the = open_bench(pile)
    the.sight.set(time_range=(0.005, 0.015))
    qtbot.keyClick(the.bench.profile, Qt.Key.Key_Home)
    assert the.sight.time_range is None


def test_playing_paints_neither_the_xt_image_nor_the_strips_again(open_bench, pile, monkeypatch):
    the = open_bench(pile)
    painted = []
    pictures = (the.bench.xt, the.bench.member, the.bench.profile, *the.bench.strips.shown())
    the.bench.grab()
    for picture in pictures:
        monkeypatch.setattr(picture, "draw_resting", lambda _painter, p=picture: painted.append(p))
    for step in range(1, 6):
        the.sight.set(time=step * 1e-3)
        the.bench.grab()
    assert painted == []
    the.sight.set(quantity="velocity")
    the.bench.grab()
    assert set(painted) == {the.bench.xt, the.bench.profile}


def test_an_edit_greys_nothing_but_an_entry_that_is_not_valid_does(open_bench, pile):
    the = open_bench(pile)
    assert the.bench.xt.greyed() == ""
    fresh = the.bench.xt.grab().toImage()
    the.document.edit("Length", "member/segments/0/length", -1.0)
    assert the.bench.xt.greyed() == "an entry is not valid"
    greyed = the.bench.xt.grab().toImage()
    spot = at(the.bench.xt, 0.004, 12.0)
    assert greyed.pixelColor(spot).lightness() > fresh.pixelColor(spot).lightness() + 20
    assert not the.bench.findings.rows()[0].isEnabled()


def test_chips_choose_up_to_three_strips(open_bench, pile, qtbot):
    the = open_bench(pile)
    chips = the.bench.strips.chips._chips
    qtbot.mouseClick(chips["stress"], Qt.MouseButton.LeftButton)
    assert the.sight.strips == ("force_pair", "velocity", "stress")
    qtbot.mouseClick(chips["energy"], Qt.MouseButton.LeftButton)
    assert the.sight.strips == ("velocity", "stress", "energy")
    for kind in ("velocity", "stress", "energy"):
        qtbot.mouseClick(chips[kind], Qt.MouseButton.LeftButton)
    assert the.sight.strips == ("energy",)  # the last one stays
    assert chips["energy"].isChecked()


def test_a_strip_of_one_gauge_can_be_about_another(open_bench, pile):
    the = open_bench(pile)
    the.bench.strips.chips._show_gauge("force_pair", "Toe")
    assert the.sight.strips[0] == "force_pair:Toe"
    strip = the.bench.strips.shown()[0]
    np.testing.assert_array_equal(strip.content().curves[0].values, -pile.result.gauges["Toe"].force)


def test_the_sign_of_the_project_governs_every_number(open_bench, pile):
    the = open_bench(pile)
    strip = the.bench.strips.shown()[0]
    assert the.bench.profile.factor() < 0
    largest = abs(pile.result.gauges["Head"].force).max()
    assert strip.content().curves[0].values.max() == largest
    the.document.edit("Sign", "/display_sign", "tension")
    assert the.bench.profile.factor() > 0
    assert strip.content().curves[0].values.min() == -largest


def test_numbers_are_saved_as_they_are_drawn(open_bench, pile, tmp_path):
    the = open_bench(pile)
    strip = the.bench.strips.shown()[1]
    rows = list(csv.reader(io.StringIO(csv_of(strip.table()))))
    assert rows[0] == ["time ms", "Head m/s", "time ms", "Toe m/s"]
    gauge = pile.result.gauges["Toe"]
    assert len(rows) == 1 + len(gauge.time)
    got = np.array([float(row[3]) for row in rows[1:]])
    np.testing.assert_allclose(got, gauge.velocity, rtol=1e-12)
    for picture in (the.bench.xt, the.bench.profile, strip):
        assert csv_of(picture.table()).count("\n") > 20


def test_play_moves_time_on_and_space_stops_it(open_bench, pile, qtbot):
    the = open_bench(pile)
    bar = the.bench.time_bar
    bar.toggle()
    qtbot.waitUntil(lambda: the.sight.time > 1e-4)
    bar.toggle()
    stopped = the.sight.time
    assert not bar.playing
    bar.step(1)
    assert the.sight.time == pytest.approx(stopped + 0.03 / 400)
    bar.step(-1)
    assert the.sight.time == pytest.approx(stopped)


def test_the_slider_drags_time_and_play_ends_at_the_end(open_bench, pile, qtbot):
    the = open_bench(pile)
    bar = the.bench.time_bar
    bar._slider.setValue(5000)
    assert the.sight.time == pytest.approx(0.015)
    bar._slider.setValue(9999)
    bar.toggle()
    qtbot.waitUntil(lambda: not bar.playing)
    assert the.sight.time == pytest.approx(0.03)
    bar.toggle()  # from the end it begins anew
    assert the.sight.time < 0.03
    bar.pause()


def test_the_quantity_is_chosen_once_for_all_pictures(open_bench, pile):
    the = open_bench(pile)
    choice = next(a for a in the.bench.xt._choice.menu().actions() if a.text() == "Velocity through time")
    choice.trigger()
    assert the.sight.quantity == "velocity"
    assert the.bench.profile.dimension == "velocity"
    assert the.bench.profile.factor() > 0  # motion is positive towards the far end, whatever stresses are


def test_times_have_the_unit_of_the_run(open_bench, pile):
    """A run of 30 ms is told in milliseconds, on the clock as on the axis of the strips."""
    the = open_bench(pile)
    the.sight.set(time=0.00725)
    assert the.bench.time_bar._clock.text() == "7.25 ms"


def test_refused_says_why_above_the_greyed_findings(open_bench, pile, qtbot, monkeypatch):
    from solver import SolveError

    the = open_bench(pile)

    def refuse(_case, **_how):
        raise SolveError("This case cannot be solved, for the sake of this test.")

    monkeypatch.setattr(the.solution._worker, "_solve", refuse)
    assert the.document.edit("Length", "member/segments/0/length", 15.5)
    qtbot.waitUntil(lambda: the.solution.state == "refused")
    first, second, *_ = the.bench.findings.rows()
    assert first.text() == "✕ This case cannot be solved, for the sake of this test."
    assert first.isEnabled()
    assert not second.isEnabled()
    assert the.bench.profile.greyed() == "cannot be solved"


def test_arrow_keys_step_through_time_and_space_plays(open_bench, pile, qtbot):
    the = open_bench(pile)
    the.window.activateWindow()
    the.bench.profile.setFocus()
    qtbot.keyClick(the.bench.profile, Qt.Key.Key_Right)
    assert the.sight.time == pytest.approx(0.03 / 400)
    qtbot.keyClick(the.bench.profile, Qt.Key.Key_Right, Qt.KeyboardModifier.ShiftModifier)
    assert the.sight.time == pytest.approx(11 * 0.03 / 400)
    qtbot.keyClick(the.bench.profile, Qt.Key.Key_Left)
    assert the.sight.time == pytest.approx(10 * 0.03 / 400)
    qtbot.keyClick(the.bench.profile, Qt.Key.Key_Space)
    assert the.bench.time_bar.playing
    qtbot.keyClick(the.bench.profile, Qt.Key.Key_Space)
    assert not the.bench.time_bar.playing

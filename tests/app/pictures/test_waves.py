"""Waves read off the pictures: predicted arrivals, two cursors, peaks, and the marks of 2L/c."""

from __future__ import annotations

from types import SimpleNamespace

import numpy as np
import pytest
from PySide6.QtCore import QPoint, QPointF, Qt
from PySide6.QtWidgets import QMenu

from app.bench.pictures.arrival_lines import all_named, lines_of, ordinal
from app.bench.pictures.cursor import between
from app.bench.strips.contents import content_of
from app.bench.strips.peaks import peaks_of
from app.units import units_of
from solver import solve
from tests.app.pictures.conftest import PILE, project_of
from tests.app.pictures.test_pointing import at


@pytest.fixture(scope="module")
def rod():
    """A free steel rod of 20 m, struck by a short half sine: every front can be told by itself. Gauge at 8 m."""
    case = {
        "name": "Rod",
        "member": {
            "segments": [
                {
                    "name": "Rod",
                    "length": 20.0,
                    "material": "steel",
                    "section": {"shape": "rectangle", "width": 0.1, "depth": 0.1},
                }
            ]
        },
        "load": {"kind": "pulse", "quantity": "force", "shape": "half_sine", "peak": 1e5, "duration": 0.0004},
        "far_end": {"kind": "free"},
        "gauges": [{"name": "Middle", "position": 8.0}],
        "run": {"duration": 0.02},
    }
    project = project_of(case)
    return SimpleNamespace(project=project, result=solve(project.cases[0]), speed=np.sqrt(210e9 / 7850))


def plain(text):
    return text.replace("\xa0", " ")


def test_an_arrival_comes_back_past_a_gauge_when_the_up_going_wave_does(rod):
    """From lengths and the wave speed, (2 x 20 - 8)/c; in the run it is where the wave reaches 1 % of its top."""
    (first, second) = lines_of(rod.result)
    assert first.passes(8.0) == pytest.approx((40 - 8) / rod.speed)
    assert second.passes(8.0) == pytest.approx((80 - 8) / rod.speed)
    gauge = rod.result.gauges["Middle"]
    up = np.abs(gauge.up_wave)
    front = gauge.time[np.argmax(up > 0.01 * up.max())]
    # a half sine rises to 1 % within 0.3 % of its duration of 0.4 ms; one step of the run is about 0.02 ms
    assert front == pytest.approx(first.passes(8.0), abs=4e-6 + 2 * rod.result.time_step)


def test_arrivals_are_named_as_an_engineer_would(pile):
    units = units_of(pile.project)
    names = {plain(line.named(units)) for line in lines_of(pile.result)}
    assert "reflection from the step at 16.0 m, 2nd pass" in names
    assert "reflection from the ground surface at 6.00 m, 1st pass" in names
    assert "reflection from the toe, 1st pass" in names
    assert [ordinal(n) for n in (1, 2, 3, 4, 11, 12, 13, 21, 22)] == (
        ["1st", "2nd", "3rd", "4th", "11th", "12th", "13th", "21st", "22nd"]
    )


def test_lines_bend_where_the_wave_speed_changes(two_materials):
    """Concrete sqrt(40e9/2450), steel sqrt(210e9/7850): the times to the joint and to the end are the sums of L/c."""
    slow, fast = np.sqrt(40e9 / 2450), np.sqrt(210e9 / 7850)
    end = next(line for line in lines_of(two_materials.result) if line.arrival.kind == "far_end")
    down = end.legs[0]
    assert down.places.tolist() == [0.0, 12.0, 16.0]
    np.testing.assert_allclose(down.times, [0.0, 12 / slow, 12 / slow + 4 / fast], rtol=1e-12)
    assert end.passes(12.0) == pytest.approx(12 / slow + 8 / fast)


def test_pointing_at_a_line_names_it_and_marks_the_strips(open_bench, pile, qtbot):
    the = open_bench(pile)
    xt, strip = the.bench.xt, the.bench.strips.shown()[0]
    assert not xt.has_lines()  # three places send waves back: too many to cover the picture unasked
    qtbot.mouseClick(xt.switch, Qt.MouseButton.LeftButton)
    assert xt.has_lines()
    lines = xt.lines()
    number = next(
        n for n, line in enumerate(lines) if line.arrival.kind == "toe" and line.arrival.passage == 1
    )
    back = lines[number].legs[-1]
    qtbot.mouseMove(xt, at(xt, float(np.interp(12.0, back.places[::-1], back.times[::-1])), 12.0))
    assert number in the.sight.pointed
    assert "toe, 1st pass" in all_named(lines, the.sight.pointed, units_of(pile.project))
    # on the strip of the same gauge the tick is at the moment at which it comes back there
    moment = lines[number].passes(1.2)
    before = strip.grab().toImage()
    the.sight.set(pointed=())
    after = strip.grab().toImage()
    ratio = before.devicePixelRatio()
    x = strip.time_axis().at(moment) * ratio
    rows = range(int(strip.plot().top() * ratio) + 12, int(strip.plot().bottom() * ratio) - 12)
    changed = [before.pixel(int(x), y) != after.pixel(int(x), y) for y in rows]
    assert 0.3 < np.mean(changed) < 1.0  # a dashed line from top to bottom
    qtbot.mouseMove(strip, QPoint(round(strip.time_axis().at(moment)), round(strip.plot().bottom()) - 4))
    assert number in the.sight.pointed


def test_where_few_places_send_waves_back_the_lines_are_there_unasked(open_bench, rod):
    the = open_bench(rod)
    assert the.bench.xt.has_lines()
    assert the.bench.xt.switch.isChecked()


def test_shift_click_pins_a_second_cursor_and_escape_removes_it(open_bench, pile, qtbot):
    the = open_bench(pile)
    xt = the.bench.xt
    shift = Qt.KeyboardModifier.ShiftModifier
    qtbot.mouseClick(xt, Qt.MouseButton.LeftButton, shift, at(xt, 0.010, 4.0))
    assert the.sight.pinned == pytest.approx((0.010, 4.0), abs=0.1)
    qtbot.mouseClick(xt, Qt.MouseButton.LeftButton, pos=at(xt, 0.012, 14.0))
    assert the.sight.pinned == pytest.approx((0.010, 4.0), abs=0.1)
    qtbot.keyClick(xt, Qt.Key.Key_Escape)
    assert the.sight.pinned is None


def test_shift_drag_still_moves_the_picture_and_pins_nothing(open_bench, pile, qtbot):
    the = open_bench(pile)
    the.sight.set(time_range=(0.005, 0.015))
    xt, shift = the.bench.xt, Qt.KeyboardModifier.ShiftModifier
    start = at(xt, 0.010, 10.0)
    qtbot.mousePress(xt, Qt.MouseButton.LeftButton, shift, start)
    qtbot.mouseMove(xt, start - QPoint(40, 0))
    qtbot.mouseRelease(xt, Qt.MouseButton.LeftButton, shift, start - QPoint(40, 0))
    assert the.sight.time_range[0] > 0.005
    assert the.sight.pinned is None


def test_between_two_cursors_stand_time_place_and_speed(pile):
    """10 m in 2 ms is 5 000 m/s, downwards; without a second place there is the time alone."""
    units = units_of(pile.project)
    words = [plain(w) for w in between(units, 0.012, 14.0, (0.010, 4.0))]
    assert words == ["2.00 ms", "10.0 m", "5000 m/s ↓"]
    assert [plain(w) for w in between(units, 0.010, 14.0, (0.012, 4.0))][2] == "5000 m/s ↑"
    assert [plain(w) for w in between(units, 0.012, None, (0.010, 4.0))] == ["2.00 ms"]
    # at one time no speed takes from place to place
    assert len(between(units, 0.010, 14.0, (0.010, 4.0))) == 2


def test_peaks_are_tops_and_bottoms_in_turn_and_small_ripples_are_none():
    time = np.linspace(0, 3, 3001)
    wave = np.sin(2 * np.pi * time) + 0.01 * np.sin(2 * np.pi * 40 * time)
    peaks = peaks_of(wave)
    assert [p.top for p in peaks] == [True, False] * 3
    # sin has its turns at odd quarters; the ripple of 1 % moves a turn by less than 20 ms
    np.testing.assert_allclose(time[[p.index for p in peaks]], np.arange(6) / 2 + 0.25, atol=0.02)
    assert peaks_of(np.zeros(50)) == []


def test_the_menu_of_a_strip_labels_the_peaks_of_the_curve_pointed_at(open_bench, pile):
    the = open_bench(pile)
    strip = the.bench.strips.shown()[0]
    content = strip.content()
    force = content.curves[0]
    top = int(np.argmax(force.values))
    values = strip.value_axis(content)
    shown = float(units_of(pile.project).number(force.values[top], "force"))
    strip.menu_at = QPointF(strip.time_axis().at(force.time[top]), values.at(shown))
    before = strip.grab().toImage()
    menu = QMenu()
    strip.fill_menu(menu)
    action = menu.actions()[0]
    assert action.text() == "Label the peaks of force"
    action.trigger()
    assert the.sight.peaks == ("force_pair/force",)
    assert strip.grab().toImage() != before
    assert top in {p.index for p in peaks_of(force.values)}


def test_the_marks_of_two_l_over_c_are_right_for_a_gauge_below_the_head(rod):
    """The up-going wave of a free rod tops at the gauge 2(L - x)/c after the blow, and then every 2L/c."""
    gauge = rod.result.gauges["Middle"]
    ticks = content_of("force_pair", rod.result, "Middle", units_of(rod.project)).ticks
    np.testing.assert_allclose(np.diff(ticks)[:2], [2 * (20 - 8) / rod.speed, 2 * 20 / rod.speed], rtol=1e-9)
    for tick in ticks[1:3]:
        window = np.abs(gauge.time - tick) < 0.0006
        top = gauge.time[window][np.argmax(np.abs(gauge.up_wave[window]))]
        assert top == pytest.approx(tick, abs=2 * rod.result.time_step)


def test_a_gauge_at_the_far_end_has_no_way_there_and_back():
    case = dict(PILE, gauges=[{"name": "End", "position": 24.0}])
    project = project_of(case)
    assert content_of("force_pair", solve(project.cases[0]), "End", units_of(project)).ticks == ()

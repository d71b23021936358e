"""Records cut down to what a screen can show, and words that find their place."""

from __future__ import annotations

from itertools import pairwise

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from PySide6.QtCore import QRectF

from app.bench.at_cursor import reading
from app.bench.pictures.axes import Axis, inside, tick_texts, ticks
from app.bench.pictures.curve_labels import Drawn, Heights, Wanted, crosses, place_labels
from app.bench.pictures.curves import polygon, thinned
from app.bench.pictures.lettering import spread
from app.bench.strips.strip import Strip
from app.units import Units


@given(
    count=st.integers(3000, 20_000),
    width=st.integers(20, 400),
    spike=st.floats(0.05, 0.95),
    seed=st.integers(0, 2**20),
)
def test_thinning_keeps_every_extreme_in_its_pixel(count, width, spike, seed):
    time = np.linspace(0, 1, count)
    values = np.random.default_rng(seed).normal(size=count)
    values[int(spike * count)] = 50.0  # a single sample that must not be lost
    axis = Axis(0.0, 1.0, 100.0, float(width))
    x, y = thinned(time, values, axis)
    assert y.max() == 50.0
    assert y.min() == values.min()
    assert len(x) <= 4 * (width + 2)
    pixel = np.floor(axis.pixel(time)).astype(int)
    for one in np.unique(pixel)[:: max(width // 7, 1)]:
        shown = y[np.floor(x).astype(int) == one]
        assert shown.min() == values[pixel == one].min()
        assert shown.max() == values[pixel == one].max()


def test_short_records_come_through_as_they_are():
    time = np.linspace(0, 1, 50)
    x, y = thinned(time, time**2, Axis(0.0, 1.0, 0.0, 100.0))
    np.testing.assert_array_equal(x, 100 * time)
    np.testing.assert_array_equal(y, time**2)
    assert [(p.x(), p.y()) for p in polygon(x, y)] == list(zip(x, y, strict=True))


def test_zoomed_in_only_what_is_shown_is_kept_with_one_neighbour_each_side():
    time = np.linspace(0, 1, 1001)
    x, _ = thinned(time, time, Axis(0.5, 0.6, 0.0, 100.0))
    assert x[0] <= 0
    assert x[-1] >= 100
    assert len(x) <= 105


@given(
    wanted=st.lists(st.floats(-20, 220), min_size=1, max_size=12),
    height=st.floats(5, 16),
)
def test_labels_are_spread_without_overlap_between_the_bounds(wanted, height):
    placed = spread(wanted, height, 0.0, 200.0)
    ranked = sorted(placed)
    for above, below in pairwise(ranked):
        assert below - above >= height - 1e-9
    assert ranked[0] >= height / 2 - 1e-9
    assert ranked[-1] <= 200 - height / 2 + 1e-9
    order = sorted(range(len(wanted)), key=lambda i: (wanted[i], placed[i]))
    assert [placed[i] for i in order] == ranked  # none overtakes another


def test_labels_far_apart_stay_where_they_are_wanted():
    assert spread([150.0, 20.0, 80.0], 10, 0, 200) == [150.0, 20.0, 80.0]


def test_names_stand_on_their_curves_and_not_on_each_other():
    x = np.linspace(0, 600, 1200)
    curves = [Drawn(x, 60 + 40 * np.sin(x / 40 + k)) for k in range(3)]
    plot = QRectF(0, 0, 600, 120)
    boxes = place_labels(Heights(curves, plot), [Wanted(k, 50.0) for k in range(3)], plot, 15.0)
    assert all(box is not None for box in boxes)
    for k, box in enumerate(boxes):
        assert plot.contains(box)
        under = curves[k].y[(x >= box.left()) & (x <= box.right())]
        assert min(abs(under - box.bottom()).min(), abs(under - box.top()).min()) < 10
        for other in boxes[k + 1 :]:
            assert not box.intersects(other)


def test_ticks_are_tidy_and_words_carry_the_decimals_of_the_step():
    assert ticks(-0.3, 25.2, 6) == [0.0, 5.0, 10.0, 15.0, 20.0, 25.0]
    assert tick_texts(ticks(0.0, 0.012, 6)) == ["0.000", "0.002", "0.004", "0.006", "0.008", "0.010", "0.012"]
    assert tick_texts([-20000.0, 0.0, 20000.0]) == ["−20\u202f000", "0", "20\u202f000"]


@given(st.floats(-50, 50), st.floats(0.01, 120))
def test_a_range_that_is_wanted_is_kept_inside_the_whole(low, span):
    got = inside((low, low + span), (0.0, 30.0))
    assert 0 <= got[0] < got[1] <= 30 + 1e-9
    assert abs((got[1] - got[0]) - min(span, 30.0)) < 1e-9


@pytest.mark.parametrize("milliseconds", [1e-9, 1e-3, 1e9])
def test_a_run_far_shorter_or_longer_than_what_is_shown_is_drawn_while_it_is_solved(
    open_bench, pile, milliseconds
):
    """The cursor and the record of the last run lie up to 1e13 pixels away: Qt counts in 32 bits, memory is short."""
    there = open_bench(pile)
    there.sight.set(time=0.005, place=1e9)
    there.solution.stop()
    there.document.edit("Set duration", "run/duration", milliseconds / 1e3)
    assert there.bench.xt.time_axis().high == milliseconds / 1e3
    for picture in (there.bench.xt, *there.bench.strips.findChildren(Strip)):
        assert not picture.grab().isNull()


def test_a_box_is_crossed_by_a_curve_through_it_even_without_a_point_in_it():
    slope = Drawn(np.array([0.0, 100.0]), np.array([0.0, 100.0]))
    assert crosses(slope, QRectF(40, 40, 20, 20))
    assert not crosses(slope, QRectF(40, 0, 20, 20))
    assert not crosses(Drawn(np.zeros(0), np.zeros(0)), QRectF(0, 0, 10, 10))


def test_a_reading_keeps_its_decimals_while_time_runs_on():
    """Units and decimals are those of the largest value of the run: 6012 kN, 14.70 mm, 0.0222 m/s."""
    units = Units()
    for value, dimension, largest, shown in (
        (2.855e6, "force", 6.012e6, "2855 kN"),
        (70.0, "force", 6.012e6, "0 kN"),
        (4.17e-9, "small_length", 14.7e-3, "0 mm"),
        (-9.984e-3, "small_length", 14.7e-3, "−9.98 mm"),
        (-2.77e-3, "velocity", 22.2e-3, "−0.0028 m/s"),
        (0.0, "stress", 0.0, "0 MPa"),
    ):
        assert reading(units, value, dimension, largest).replace("\xa0", " ") == shown

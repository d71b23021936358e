"""Distance is one axis for three pictures side by side, time one axis for the pictures one under the other."""

from __future__ import annotations

import pytest
from PySide6.QtCore import QPoint, QPointF
from PySide6.QtGui import QColor

from app.look.palette import palette


def global_y(picture, place):
    return picture.mapToGlobal(QPointF(0, picture.distance_axis().at(place))).y()


def global_x(picture, time):
    return picture.mapToGlobal(QPointF(picture.time_axis().at(time), 0)).x()


SIZES = [(986, 690), (1000, 724), (1333, 811), (1640, 1004)]


@pytest.mark.parametrize(("width", "height"), SIZES)
@pytest.mark.parametrize("distances", [None, (3.0, 17.5)])
def test_one_distance_lies_on_one_row_of_pixels(open_bench, pile, width, height, distances):
    the = open_bench(pile, width, height)
    the.sight.set(distance_range=distances)
    bench = the.bench
    for place in (3.0, 6.0, 11.7, 17.5):
        rows = [global_y(picture, place) for picture in (bench.member, bench.xt, bench.profile)]
        assert max(rows) - min(rows) < 1, rows


@pytest.mark.parametrize(("width", "height"), SIZES)
@pytest.mark.parametrize("times", [None, (0.002, 0.009)])
def test_one_time_lies_on_one_column_of_pixels(open_bench, pile, width, height, times):
    the = open_bench(pile, width, height)
    the.sight.set(time_range=times, strips=("force_pair", "stress", "energy"))
    for time in (0.002, 0.0047, 0.009):
        columns = [global_x(p, time) for p in (the.bench.xt, *the.bench.strips.shown())]
        assert len(columns) == 4
        assert max(columns) - min(columns) < 1, columns


def test_axes_stay_shared_while_boundaries_are_dragged(open_bench, pile):
    the = open_bench(pile)
    grid = the.bench.grid
    for upright, index, pixels in ((True, 0, 40), (True, 1, -60), (False, 0, 30), (True, 0, -500)):
        grid.move_boundary(upright, index, pixels)
        rows = [global_y(p, 12.0) for p in (the.bench.member, the.bench.xt, the.bench.profile)]
        columns = [global_x(p, 0.01) for p in (the.bench.xt, *the.bench.strips.shown())]
        assert max(rows) - min(rows) < 1
        assert max(columns) - min(columns) < 1
        for panel in (the.bench.member, the.bench.xt, the.bench.profile):
            assert panel.width() >= panel.minimumWidth()


def test_the_painted_cursor_crosses_all_pictures_in_line(open_bench, pile):
    """What is painted, and not only what is meant: the rows and columns of ink in a picture of the whole Bench."""
    the = open_bench(pile)
    shot = the.bench.grab().toImage()
    the.sight.set(time=0.0123, place=9.2)
    after = the.bench.grab().toImage()
    ratio = after.devicePixelRatio()

    def changed(x, y):
        where = QPoint(int(x * ratio), int(y * ratio))
        return after.pixelColor(where) != shot.pixelColor(where)

    def ink(x, y):
        colour, wanted = after.pixelColor(int(x * ratio), int(y * ratio)), QColor(palette().ink)
        return abs(colour.lightness() - wanted.lightness()) < 60

    bench = the.bench
    row = bench.mapFromGlobal(QPointF(0, global_y(bench.xt, 9.2))).y()
    for panel in (bench.member, bench.xt, bench.profile):
        left = panel.mapTo(bench, QPoint(0, 0)).x() + panel.plot().left() + 12
        marks = [x for x in range(int(left), int(left) + 60) if changed(x, row) and ink(x, row)]
        # a dotted line: half of 60 pixels
        assert len(marks) >= 15, f"no dotted line in {panel.accessibleName()}"
    column = bench.mapFromGlobal(QPointF(global_x(bench.xt, 0.0123), 0)).x()
    for panel in (bench.xt, *bench.strips.shown()):
        top = panel.mapTo(bench, QPoint(0, 0)).y() + panel.plot().top()
        rows = range(int(top) + 2, int(top + panel.plot().height()) - 2)
        share = sum(ink(column, y) for y in rows) / len(rows)
        assert share > 0.9, f"no line in {panel.accessibleName()}"

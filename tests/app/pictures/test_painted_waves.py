"""What is painted of demos is what was solved: pixels of the x-t diagram and of the member against the fields."""

from __future__ import annotations

from types import SimpleNamespace

import numpy as np
import pytest
from PySide6.QtCore import QPoint

from app.bench.field_values import value_at
from app.bench.pictures.colouring import entries_of, scale_top, table_of
from app.demo_files import demo_paths
from app.look.palette import palette
from app.units import units_of
from solver import load_project, solve

#: A pixel covers some time and some distance: of 256 steps of a colour, what a smooth wave changes across it.
NEAR = 16


@pytest.fixture(scope="module", params=["01", "05", "10"])
def demo(request):
    project = load_project(next(p for p in demo_paths() if p.name.startswith(request.param)))
    return SimpleNamespace(project=project, result=solve(project.cases[0]))


def colours_of(demo, values):
    """Red, green and blue of stresses (Pa), shape (n, 3)."""
    top = scale_top(demo.result, "stress", units_of(demo.project))
    packed = table_of("stress", palette())[entries_of(np.array(values), top)]
    return np.stack([packed >> 16 & 255, packed >> 8 & 255, packed & 255], axis=1).astype(int)


def painted(image, places):
    ratio = image.devicePixelRatio()
    seen = [image.pixelColor(QPoint(int(x * ratio), int(y * ratio))) for x, y in places]
    return np.array([(c.red(), c.green(), c.blue()) for c in seen])


def share_near(demo, seen, values):
    return np.mean(np.abs(seen - colours_of(demo, values)).max(axis=1) <= NEAR)


def test_the_diagram_shows_the_stress_of_each_time_and_place(open_bench, demo):
    """300 points chosen at random: nine of ten have their colour. The others lie under lines and names, or on a front;
    with the sign turned hardly any of the loaded ones would."""
    the = open_bench(demo)
    the.sight.set(time=0.0, arrivals=False)
    xt = the.bench.xt
    image, time, distance = xt.grab().toImage(), xt.time_axis(), xt.distance_axis()
    draw, length = np.random.default_rng(1), demo.project.cases[0].member.length
    spots = [
        (t, x)
        for t, x in zip(draw.uniform(time.low, time.high, 300), draw.uniform(0, length, 300), strict=True)
        if t <= demo.result.duration
    ]
    seen = painted(image, [(time.at(t), distance.at(x)) for t, x in spots])
    values = np.array([value_at(demo.result, "stress", t, x) for t, x in spots])
    assert share_near(demo, seen, values) > 0.9
    loaded = np.abs(values) > 0.2 * np.abs(values).max()
    assert share_near(demo, seen[loaded], -values[loaded]) < 0.1


def test_the_member_shows_the_stress_of_the_moment(open_bench, demo):
    """Along the middle of the member while the wave is in it; a tenth is left for lines of joints and of the cursor."""
    the = open_bench(demo)
    moment = 0.3 * the.bench.xt.time_axis().high
    the.sight.set(time=moment)
    member = the.bench.member
    image, axis = member.grab().toImage(), member.distance_axis()
    places = np.linspace(0.02, 0.98, 100) * demo.project.cases[0].member.length
    values = [value_at(demo.result, "stress", moment, x) for x in places]
    seen = painted(image, [(member.scene().centre, axis.at(x)) for x in places])
    assert share_near(demo, seen, values) > 0.9

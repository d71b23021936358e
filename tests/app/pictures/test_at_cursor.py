"""The readings at the cursor: the numbers of the records at its time, in the sign of the project."""

from __future__ import annotations

import numpy as np
import pytest
from PySide6.QtCore import QPoint, Qt

from app.bench import at_cursor
from app.units import NO_BREAK, units_of

TIME = 0.0065


@pytest.fixture
def read(open_bench, pile, monkeypatch, qtbot):
    """Opens the Bench in a sign and gives the words that the panel writes at `TIME`, from the top down."""

    def read_in(sign):
        the = open_bench(pile)
        the.document.edit("Sign", "/display_sign", sign)
        the.sight.set(time=TIME, place=10.0, quantity="stress")
        written = []
        monkeypatch.setattr(at_cursor, "put", lambda _painter, _x, _y, text, *_how: written.append(text))
        the.bench.at_cursor.readings.grab()
        return the, written

    return read_in


@pytest.mark.parametrize(("sign", "turned"), [("compression", -1), ("tension", 1)])
def test_every_gauge_reads_its_record_at_the_time_of_the_cursor(read, pile, sign, turned):
    """Stress and force follow the sign of the project; velocity and displacement keep that of the motion."""
    the, written = read(sign)
    units = units_of(the.document.project)
    for gauge in pile.result.gauges.values():
        at = int(np.argmin(np.abs(gauge.time - TIME)))
        for values, dimension, way in (
            (gauge.stress, "stress", turned),
            (gauge.force, "force", turned),
            (gauge.velocity, "velocity", 1),
            (gauge.displacement, "small_length", 1),
        ):
            # the cursor may stand between two steps: one of the two neighbours, or what lies between them
            around = [way * float(v) for v in values[at - 1 : at + 2]]
            one = float(units.number(1.0, dimension, around[1]))
            shown = [float(w.split(NO_BREAK)[0].replace("−", "-").replace("\u202f", "")) for w in written
                     if w.endswith(f"{NO_BREAK}{units.unit(dimension, around[1])}")]  # fmt: skip
            low, high = min(around) * one, max(around) * one
            room = 0.006 * max(abs(low), abs(high))  # three digits are shown
            assert any(low - room <= number <= high + room for number in shown), (
                gauge.name,
                dimension,
                shown,
            )


def test_the_reading_at_the_place_has_the_sign_of_the_project(read):
    """The same stress at 10 m, once with and once without a minus."""

    def at_place(written):
        return written[written.index("stress") + 1]

    pushed, pulled = (at_place(read(sign)[1]) for sign in ("compression", "tension"))
    assert {pushed, pulled} == {pushed.lstrip("−"), f"−{pushed.lstrip('−')}"}


def test_a_click_on_a_gauge_puts_the_cursor_where_it_stands(read, qtbot):
    the, _ = read("compression")
    readings = the.bench.at_cursor.readings
    second = QPoint(20, round(readings.top() + 1.5 * readings.block()))
    qtbot.mouseClick(readings, Qt.MouseButton.LeftButton, pos=second)
    assert the.sight.selection == "gauges/1"
    assert the.sight.place == 23.2

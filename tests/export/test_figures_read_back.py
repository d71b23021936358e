"""Figures of the report read as a person reads them: places on the sheet turned into numbers by the figure's own ticks.

The bar of `conftest`: steel, 4 m long and 50 mm thick, free, under a half-sine of 100 kN that lasts 0.4 ms from 0.1 ms
on. Until the echo of the far end comes back its stress is 100 kN/A, its velocity 100 kN/Z, and when the pulse has
passed, each place has moved by its impulse over Z, with the impulse 2 F T/pi (d'Alembert; closed forms).
"""

from __future__ import annotations

import re
from math import pi, sqrt

import numpy as np
import pytest

from app.look.colours import PRINT
from app.report.figures.envelope import stress_envelope
from app.report.figures.marks import Figure, Path, Text
from app.report.figures.plot import SMALL
from app.report.figures.traces import force_pair, gauge_traces, set_over_time
from app.units import Units

COMPRESSION, TENSION = Units(compression_positive=True), Units()
AREA = pi * 0.05**2 / 4
Z, C = AREA * sqrt(2.1e11 * 7850.0), sqrt(2.1e11 / 7850.0)
PEAK, LASTS, START = 1e5, 4e-4, 1e-4
STRESS, SPEED = PEAK / AREA / 1e6, PEAK / Z  # MPa and m/s
MOVED = 2 * PEAK * LASTS / pi / Z * 1e3  # mm

#: A figure is read to a thousandth of its axis: curves are thinned to what print can show.
READ = 2e-3


class Ruler:
    """Reads a figure: its ticks say which number stands where."""

    def __init__(self, figure: Figure) -> None:
        self.texts = [m for m in figure.marks if isinstance(m, Text)]
        self.paths = [m for m in figure.marks if isinstance(m, Path)]
        across = [(t.x, _number(t)) for t in self.texts if t.anchor == "middle" and _number(t) is not None]
        up = [
            (t.y - 0.36 * SMALL, _number(t))
            for t in self.texts
            if t.anchor == "end" and _number(t) is not None
        ]
        self._x, self._y = (np.polyfit(*zip(*ticks, strict=True), 1) for ticks in (across, up))

    def curves(self) -> list[tuple[np.ndarray, np.ndarray]]:
        """Curves in the order in which they are drawn, as numbers across and up."""
        found = [p for p in self.paths if p.stroke and not p.closed and len(p.points) > 40]
        return [(self.across(p.points[:, 0]), self.up(p.points[:, 1])) for p in found]

    def across(self, x: float) -> float:
        return np.polyval(self._x, x)

    def up(self, y: float) -> float:
        return np.polyval(self._y, y)


def _number(text: Text) -> float | None:
    plain = text.text.replace("\u2212", "-").replace("\u202f", "")
    return float(plain) if re.fullmatch(r"-?\d+(\.\d+)?", plain) else None


@pytest.mark.parametrize(("units", "sign"), [(COMPRESSION, 1), (TENSION, -1)])
def test_force_and_impedance_times_velocity_lie_on_each_other_while_the_blow_goes_down(bar, units, sign):
    """At 1.33 m the pulse has passed after 0.76 ms, and its echo comes after 1.39 ms: 100 kN in compression."""
    result = bar[1]
    force, moved = Ruler(force_pair(result, result.gauges["Near"], units)).curves()
    for time, values in (force, moved):
        seen = sign * values[time < 1.2]
        assert seen.max() == pytest.approx(100.0, rel=5 * READ)
        assert seen.min() == pytest.approx(0.0, abs=200 * READ)
    # the echo of a free end is tension that moves the bar on towards its far end: there the two part
    assert (sign * force[1]).min() == pytest.approx(-100.0, rel=5 * READ)
    assert (sign * moved[1]).min() == pytest.approx(0.0, abs=200 * READ)


@pytest.mark.parametrize(("units", "sign"), [(COMPRESSION, 1), (TENSION, -1)])
def test_stress_has_the_sign_of_the_project_and_velocity_that_of_the_motion(bar, units, sign):
    """Stress of the first passage is compression; the bar moves towards its far end in either sign."""
    result, gauges = bar[1], list(bar[1].gauges.values())
    time, stress = Ruler(gauge_traces(result, gauges, "stress", "stress", units)).curves()[0]
    first = sign * stress[time < 1.2]
    assert first.max() == pytest.approx(STRESS, rel=5 * READ)
    assert first.min() == pytest.approx(0.0, abs=4 * STRESS * READ)
    time, speed = Ruler(gauge_traces(result, gauges, "velocity", "velocity", units)).curves()[0]
    assert speed.max() == pytest.approx(SPEED, rel=5 * READ)
    assert speed.min() > -4 * SPEED * READ


def test_each_end_has_its_own_curve_of_movement(bar):
    """The struck end has moved by I/Z once the pulse is in; the far end lies still until L/c after its beginning,
    and has then moved by 2 I/Z. The curves are those of the outermost elements, half an element (25 mm) inside.
    """
    (time, struck), (_, far) = Ruler(set_over_time(bar[1], TENSION)).curves()
    arrives = (START + 4.0 / C) * 1e3
    assert np.interp(0.55, time, struck) == pytest.approx(MOVED, rel=0.01)
    assert np.abs(far[time < arrives - 0.02]).max() < 0.01 * MOVED
    assert np.interp(arrives + 0.45, time, far) == pytest.approx(2 * MOVED, rel=0.01)


@pytest.mark.parametrize(("units", "sign"), [(COMPRESSION, 1), (TENSION, -1)])
def test_peaks_and_limits_of_the_envelope_stand_at_their_numbers(bar, units, sign):
    """Compression reaches 100 kN/A against a limit of 60 MPa; the echo brings as much tension, against 50 MPa."""
    result = bar[1]
    ruler = Ruler(stress_envelope(result, units))
    limits = {
        round(float(ruler.across(p.points[0, 0])), 1)
        for p in ruler.paths
        if p.stroke == PRINT.over and p.dash
    }
    assert limits == {sign * 60.0, -sign * 50.0}
    for hue, peak, way in (
        (PRINT.compression, result.peak_compression, sign),
        (PRINT.tension, result.peak_tension, -sign),
    ):
        (mark,) = [p for p in ruler.paths if p.stroke == hue and len(p.points) == 2]
        at = mark.points.mean(axis=0)
        assert way * ruler.across(at[0]) == pytest.approx(STRESS, rel=0.01)
        assert ruler.up(at[1]) == pytest.approx(peak.position, abs=4 * READ)
    low, high = (values for values, _ in ruler.curves())
    assert (sign * low).max() == pytest.approx(STRESS, rel=0.01)
    assert (-sign * high).max() == pytest.approx(STRESS, rel=0.01)

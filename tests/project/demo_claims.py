"""What the notes of the demos tell, held against what the solver gives: (demo, case, words in the notes, value).

The words begin with a number and its unit; the value is in SI and counts with its size alone. It must round to the
number that is told.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from solver import Result

Value = Callable[[Result], float]


@dataclass(frozen=True)
class Claim:
    """One number in the notes of a demo (by the number in its file's name) for the case with this index."""

    demo: str
    case: int
    words: str
    value: Value


def compression(r: Result) -> float:
    return r.peak_compression.value


def tension(r: Result) -> float:
    return r.peak_tension.value


def settled(r: Result) -> float:
    assert r.set is not None
    return r.set


def toe(r: Result) -> float:
    return r.max_toe_displacement


def blow(number: int) -> Value:
    """The set of one of several blows, the first with number 1."""
    return lambda r: r.residual.set_per_blow[number - 1]


def blows_per_quarter_metre(r: Result) -> float:
    return 0.25 / settled(r)


def share(sign: str) -> Value:
    """Peak stress over the limit of the one material, in percent."""

    def value(r: Result) -> float:
        material = next(iter(r.case.materials.values()))
        return 100 * (compression(r) if sign == "compression" else tension(r)) / material.limits.value(sign)

    return value


def largest(gauge: str, quantity: str, begin: float = 0.0, end: float = 1.0) -> Value:
    """The largest size of a quantity at a gauge between two times, s."""

    def value(r: Result) -> float:
        g = r.gauges[gauge]
        window = (g.time >= begin) & (g.time < end)
        return float(np.abs(getattr(g, quantity)[window]).max())

    return value


def moment(gauge: str, quantity: str, begin: float = 0.0, end: float = 1.0) -> Value:
    """When that largest size stands."""

    def value(r: Result) -> float:
        g = r.gauges[gauge]
        sizes = np.where((g.time >= begin) & (g.time < end), np.abs(getattr(g, quantity)), -1.0)
        return float(g.time[int(sizes.argmax())])

    return value


def lasting(gauge: str, begin: float, end: float) -> Value:
    """How long the stress between two times, s, stands at half of its largest size or above."""

    def value(r: Result) -> float:
        g = r.gauges[gauge]
        sizes = np.where((g.time >= begin) & (g.time < end), np.abs(g.stress), 0.0)
        high = np.flatnonzero(sizes > 0.499 * sizes.max())  # half stands on the edge of a rectangle
        return float(g.time[high[-1]] - g.time[high[0]])

    return value


def event(kind: str) -> Value:
    """When something first happens."""
    return lambda r: next(e.time for e in r.events if e.kind == kind)


def mean_velocity(begin: float, end: float) -> Value:
    """Mean velocity at the end of the run of what lies between two positions, m."""

    def value(r: Result) -> float:
        f = r.fields
        here = (f.position > begin) & (f.position < end)
        return float(np.average(f.velocity[-1][here], weights=np.diff(f.edges)[here]))

    return value


def shortening(r: Result) -> float:
    """Mean over the last to and fro of a wave in the rod, as it rings on in free flight."""
    rear, front = r.gauges["Rear"].displacement, r.gauges["Front"].displacement
    material = next(iter(r.case.materials.values()))
    period = 2 * r.case.member.length / material.wave_speed
    return float((rear - front)[-round(period / r.time_step) :].mean())


CLAIMS = [
    Claim("01", 0, "206 MPa", compression),
    Claim("01", 0, "16.0 m", lambda r: r.peak_compression.position),
    Claim("01", 0, "4.40 ms", lambda r: r.peak_compression.time),
    Claim("01", 0, "65 %", share("compression")),
    Claim("01", 0, "11.1 mm", toe),
    Claim("01", 0, "9.31 mm", settled),
    Claim("01", 0, "27 blows", blows_per_quarter_metre),
    Claim("01", 1, "5.62 mm", settled),
    Claim("01", 2, "9.19 mm", settled),
    Claim("01", 2, "278 MPa", compression),
    Claim("02", 0, "1.12 ksi", tension),
    Claim("02", 0, "20.5 ft", lambda r: r.peak_tension.position),
    Claim("02", 0, "15.4 ms", lambda r: r.peak_tension.time),
    Claim("02", 0, "109 %", share("tension")),
    Claim("02", 0, "2.15 ksi", compression),
    Claim("02", 0, "50 %", share("compression")),
    Claim("02", 0, "0.804 in", settled),
    Claim("02", 1, "0.395 ksi", tension),
    Claim("02", 1, "0.696 in", settled),
    Claim("02", 2, "0.870 ksi", tension),
    Claim("02", 2, "0.59 in", settled),
    Claim("03", 0, "5.24 mm", blow(1)),
    Claim("03", 0, "6.21 mm", blow(3)),
    Claim("03", 0, "238 MPa", compression),
    Claim("03", 1, "238 MPa", compression),
    Claim("03", 1, "5.24 mm", settled),
    Claim("03", 1, "48 blows", blows_per_quarter_metre),
    Claim("03", 0, "490 kN", lambda r: r.residual.force.min()),
    Claim("03", 0, "31.6 m", lambda r: r.residual.position[int(r.residual.force.argmin())]),
    Claim("03", 0, "211 kN", lambda r: r.residual.force[-1]),
    Claim("04", 0, "3.83 mm", settled),
    Claim("04", 1, "3.83 mm", settled),
    Claim("04", 0, "6.07 mm", toe),
    Claim("04", 1, "6.07 mm", toe),
    Claim("04", 0, "7.43 mm", blow(1)),
    Claim("04", 0, "1.38 MPa", tension),
    Claim("04", 1, "3.49 MPa", tension),
    Claim("05", 0, "191 MPa", largest("Bridge", "stress", 0.0, 4e-4)),
    Claim("05", 0, "224 µs", moment("Bridge", "stress", 0.0, 4e-4)),
    Claim("05", 0, "65.3 MPa", largest("Bridge", "stress", 5e-4, 7e-4)),
    Claim("05", 0, "610 µs", moment("Bridge", "stress", 5e-4, 7e-4)),
    Claim("05", 0, "168 MPa", largest("Bridge", "stress", 7.5e-4, 9.5e-4)),
    Claim("05", 0, "842 µs", moment("Bridge", "stress", 7.5e-4, 9.5e-4)),
    Claim("05", 0, "256 MPa", largest("Thin", "stress")),
    Claim("05", 0, "344 MPa", tension),
    Claim("05", 0, "2.00 m", lambda r: r.peak_tension.position),
    Claim("06", 0, "11.6 mm/s", largest("Head", "velocity", 0.0, 1e-3)),
    Claim("06", 0, "5.11 mm/s", largest("Head", "velocity", 3e-3, 3.9e-3)),
    Claim("06", 0, "3.49 ms", moment("Head", "velocity", 3e-3, 3.9e-3)),
    Claim("06", 0, "4.87 mm/s", largest("Head", "velocity", 3.9e-3, 4.9e-3)),
    Claim("06", 0, "4.26 ms", moment("Head", "velocity", 3.9e-3, 4.9e-3)),
    Claim("06", 0, "22.2 mm/s", largest("Head", "velocity", 6e-3, 7.2e-3)),
    Claim("06", 0, "6.58 ms", moment("Head", "velocity", 6e-3, 7.2e-3)),
    Claim("06", 2, "9.42 mm/s", largest("Head", "velocity", 6e-3, 7.2e-3)),
    Claim("07", 0, "62.5 MPa", largest("Before", "stress", 0.0, 4e-4)),
    Claim("07", 0, "20.8 MPa", largest("Before", "stress", 5e-4, 7.5e-4)),
    Claim("07", 0, "18.5 MPa", largest("Before", "stress", 7.5e-4, 1.0)),
    Claim("07", 0, "55.6 MPa", largest("After", "stress", 0.0, 8e-4)),
    Claim("07", 0, "6.17 MPa", largest("After", "stress", 8e-4, 1.0)),
    Claim("07", 0, "111 MPa", compression),
    Claim("08", 0, "244 MPa", compression),
    Claim("08", 0, "155 µs", lasting("Bar", 0.0, 5e-4)),
    Claim("08", 1, "323 MPa", compression),
    Claim("08", 1, "105 MPa", largest("Bar", "stress", 4.6e-4, 5.9e-4)),
    Claim("08", 1, "33.9 MPa", largest("Bar", "stress", 6.1e-4, 7.4e-4)),
    Claim("08", 2, "126 MPa", largest("Bar", "stress", 3e-4, 4.3e-4)),
    Claim("08", 2, "5.78 m/s", mean_velocity(-1.0, 0.0)),
    Claim("09", 0, "229 MPa", largest("Close", "stress")),
    Claim("09", 0, "1.10 mm", shortening),
    Claim("09", 0, "3.4 m/s", mean_velocity(0.0, 1.0)),
    Claim("09", 0, "28.4 J", lambda r: r.ledger.final["initial_energy"]),
    Claim("09", 0, "26.6 J", lambda r: r.ledger.final["plastic"]),
    Claim("09", 1, "162 MPa", compression),
    Claim("09", 2, "1.22 mm", shortening),
    Claim("10", 0, "122 MPa", compression),
    Claim("10", 0, "1.59 m/s", mean_velocity(2.0, 2.5)),
    Claim("10", 1, "407 µs", event("joint_closed")),
    Claim("10", 1, "84.1 MPa", lambda r: float(r.gauges["First"].stress.max())),
    Claim("11", 0, "62.5 MPa", largest("Far", "stress", 5e-4, 7e-4)),
    Claim("11", 0, "623 µs", moment("Far", "stress", 5e-4, 7e-4)),
    Claim("11", 1, "70.7 MPa", largest("Far", "stress", 5e-4, 7e-4)),
    Claim("11", 1, "614 µs", moment("Far", "stress", 5e-4, 7e-4)),
    Claim("11", 0, "84.6 MPa", tension),
    Claim("12", 0, "9.9 MPa", compression),
    Claim("12", 0, "1.755 m", lambda r: next(e.position for e in r.events if e.kind == "crack")),
    Claim("12", 0, "558 µs", event("crack")),
    Claim("12", 0, "0.753 mm", lambda r: r.crack_openings["Rod"]),
]

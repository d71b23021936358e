"""The extremes of stress along the member, held against the limits of its materials."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any, Literal

import numpy as np
from numpy.typing import NDArray

from app.look.colours import PRINT
from app.report.figures.marks import Anchor, Figure, Mark, Path, Text, line
from app.report.figures.plot import SMALL, WIDTH, Plot, clearing, plot_in
from app.report.figures.scales import bounds_of, thinned
from app.report.figures.traces import sign_words
from app.report.lettering import fitted
from app.units import Units
from solver import Result

HEIGHT = 222.0
SIGNS: tuple[Literal["compression", "tension"], ...] = ("compression", "tension")
#: From stresses of the solver (Pa) to numbers in the unit and the sign shown.
Shown = Callable[[Any], NDArray[np.float64]]


def stress_envelope(result: Result, units: Units) -> Figure:
    """Lowest and highest stress over distance (downwards), limits as broken lines, both peaks marked."""
    envelope, case = result.envelope, result.case
    low, high = envelope.lowest_stress, envelope.highest_stress
    limits = [
        (sign, value)
        for segment in case.member.segments
        for sign in SIGNS
        if (value := case.material(segment.material).limits.value(sign)) is not None
    ]
    near = max([float(np.abs(low).max()), float(np.abs(high).max()), *(value for _, value in limits)])

    def shown(values: Any) -> NDArray[np.float64]:
        return np.asarray(units.number(units.sign * np.asarray(values, dtype=float), "stress", near))

    edges = [value if sign == "tension" else -value for sign, value in limits]
    label = f"Stress, {units.unit('stress', near)} ({sign_words(units)})"
    length = float(units.number(case.member.length, "length"))
    distance = f"Distance from the struck end, {units.unit('length')}"
    plot = plot_in(
        bounds_of(shown(low), shown(high), shown(edges)),
        (0.0, length),
        WIDTH,
        0,
        HEIGHT,
        (label, distance),
        downwards=True,
    )
    # of the solver's sign: low is compression, high is tension
    places = np.asarray(units.number(envelope.position, "length"))
    for values, hue, word in ((low, PRINT.compression, "compression"), (high, PRINT.tension, "tension")):
        along, drawn = thinned(places, shown(values))
        plot.marks.append(_filled(plot, drawn, along, hue))
        plot.curve(drawn, along, hue, 1.1)
        peak = result.peak_compression if word == "compression" else result.peak_tension
        _mark_peak(plot, peak.value, peak.position, word, hue, shown, units)
    marks = [*plot.marks, *_limits(plot, result, shown, units)]
    return Figure(
        "Largest compression and tension along the member, and their limits", WIDTH, HEIGHT, tuple(marks)
    )


def _filled(plot: Plot, drawn: np.ndarray, places: np.ndarray, hue: str) -> Mark:
    zero = plot.x.at(0.0)
    curve = np.column_stack((plot.x.of(drawn), plot.y.of(places)))
    ends = np.array([(zero, curve[-1, 1]), (zero, curve[0, 1])])
    return Path(np.vstack((curve, ends)), fill=hue, opacity=0.14, closed=True)


def _mark_peak(
    plot: Plot, value: float, position: float, word: str, hue: str, shown: Shown, units: Units
) -> None:
    signed = -value if word == "compression" else value
    x = plot.x.at(float(shown(signed)))
    y = plot.y.at(float(units.number(position, "length")))
    plot.marks.append(line([(x - 3, y), (x + 3, y)], hue, 1.6))
    inwards = x > (plot.x.start + plot.x.end) / 2
    text = f"{word} {units.show(value, 'stress')}"
    plot.say(x + (-6 if inwards else 6), y + 2.5, text, hue, "end" if inwards else "start", cleared=True)


def _limits(plot: Plot, result: Result, shown: Shown, units: Units) -> list[Mark]:
    case, start = result.case, 0.0
    marks: list[Mark] = []
    told: set[tuple[str, float]] = set()
    for segment in case.member.segments:
        end = start + segment.length
        span = [plot.y.at(float(units.number(at, "length"))) for at in (start, end)]
        for sign in SIGNS:
            value = case.material(segment.material).limits.value(sign)
            if value is None:
                continue
            x = plot.x.at(float(shown(-value if sign == "compression" else value)))
            marks.append(line([(x, span[0]), (x, span[1])], PRINT.over, 1.0, dash=(5, 2)))
            if (sign, value) not in told:
                told.add((sign, value))
                right = x > (plot.x.start + plot.x.end) / 2
                text = fitted(f"limit {units.show(value, 'stress')}, {segment.material}", SMALL, 170)
                anchor: Anchor = "end" if right else "start"
                place = x + (-4 if right else 4)
                y = plot.y.end - 4 - (SMALL + 2) * ((len(told) - 1) // 2)
                marks.append(clearing(place, y, text, anchor))
                marks.append(Text(place, y, text, PRINT.over, SMALL, anchor))
        if start > 0:
            marks.append(line([(plot.x.start, span[0]), (plot.x.end, span[0])], PRINT.edge, 0.6, dash=(1, 2)))
        start = end
    return marks

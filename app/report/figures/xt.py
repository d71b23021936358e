"""The x-t diagram: stress as colour over time and distance, with axes and the scale of colours."""

from __future__ import annotations

import numpy as np

from app.look.colour_maps import stress_map
from app.look.colours import PRINT
from app.report.figures.marks import Figure, Mark, Raster, Text, line
from app.report.figures.plot import SMALL, WIDTH, plot_in
from app.report.figures.traces import sign_words
from app.report.lettering import fitted
from app.units import Units
from solver import Result

HEIGHT, SCALE_ROOM = 236.0, 22.0
#: Pixels of the picture, at most: 150 to an inch at its size in print.
MOST_COLUMNS, MOST_ROWS = 900, 420


def xt_diagram(result: Result, units: Units) -> Figure:
    """Distance downwards from the rod that strikes (where there is one) to the far end, time to the right."""
    fields = result.fields
    top, bottom = float(fields.edges[0]), float(fields.edges[-1])
    end = float(fields.time[-1]) or 1.0
    unit = units.unit("time", end)
    bounds = [float(units.number(v, "length")) for v in (top, bottom)]
    plot = plot_in(
        (0.0, float(units.number(end, "time", end))),
        (bounds[0], bounds[1]),
        WIDTH,
        SCALE_ROOM,
        HEIGHT,
        (f"Time, {unit}", f"Distance from the struck end, {units.unit('length')}"),
        downwards=True,
    )
    frame = (plot.x.start, plot.y.start, plot.x.end - plot.x.start, plot.y.end - plot.y.start)
    picture, most = _picture(result)
    marks: list[Mark] = [Raster(*frame, picture), *plot.marks[-3:]]
    numbers = [m for m in plot.marks[:-3] if isinstance(m, Text)]
    for gauge in result.case.gauges:
        if gauge.on == "member" and len(result.case.gauges) <= 12:
            at = plot.y.at(float(units.number(gauge.position, "length")))
            marks.append(line([(frame[0], at), (frame[0] + frame[2], at)], PRINT.soft_ink, 0.5, dash=(3, 2)))
            name = fitted(gauge.name, SMALL, 120)
            marks.append(Text(frame[0] + frame[2] - 3, at - 2, name, PRINT.ink, SMALL, "end"))
    return Figure(
        "Stress over time and distance (x-t diagram)",
        WIDTH,
        HEIGHT + SCALE_ROOM,
        (*marks, *numbers, *_colour_scale(most, units)),
    )


def _picture(result: Result) -> tuple[np.ndarray, float]:
    """Colours, shape (rows, columns, 3), rows over distance and columns over time, and the stress (Pa) of the ends of
    the map."""
    fields = result.fields
    frames = np.linspace(0, fields.time[-1], min(MOST_COLUMNS, len(fields.time)))
    at = np.clip(np.searchsorted(fields.time, frames), 0, len(fields.time) - 1)
    rows = min(MOST_ROWS, max(200, len(fields.position)))
    places = np.linspace(fields.edges[0], fields.edges[-1], rows + 1)
    middle = (places[1:] + places[:-1]) / 2
    column = np.clip(np.searchsorted(fields.edges, middle, side="right") - 1, 0, len(fields.position) - 1)
    stress = fields.stress[np.ix_(at, column)].T
    most = float(np.abs(fields.stress).max()) or 1.0
    table = stress_map(PRINT)
    index = np.rint((stress / most + 1) / 2 * (len(table) - 1)).astype(int)
    return table[np.clip(index, 0, len(table) - 1)], most


def _colour_scale(most: float, units: Units) -> list[Mark]:
    """From the lowest number shown at the left to the highest at the right, in the sign of the project."""
    table = stress_map(PRINT)
    if units.sign < 0:
        table = table[::-1]
    wide, left = 170.0, WIDTH - 10 - 170.0
    ends = [units.number(v, "stress", most) for v in (-most, 0.0, most)]
    marks: list[Mark] = [Raster(left, 4, wide, 7, table[None, :, :])]
    for share, value in zip((0.0, 0.5, 1.0), ends, strict=True):
        text = f"{value:.3g}".replace("-", "−")
        marks.append(Text(left + share * wide, 19, text, PRINT.soft_ink, SMALL, "middle"))
    words = f"Stress, {units.unit('stress', most)} ({sign_words(units)})"
    marks.append(Text(left - 22, 11, words, PRINT.ink, SMALL, "end"))
    return marks

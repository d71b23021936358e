"""The wave running along the member, as an animated picture (GIF). No Qt."""

from __future__ import annotations

import io
from datetime import datetime
from pathlib import Path

import numpy as np
from PIL import Image

from app.disk import write_whole
from app.export.case_folder import folder_names
from app.look.colours import PRINT
from app.report.figure_files import figure_png
from app.report.figures.marks import Figure
from app.report.figures.plot import WIDTH, plot_in
from app.report.figures.scales import bounds_of
from app.report.figures.traces import sign_words
from app.report.outcome import Solved
from app.units import Units
from solver import Result

FRAMES, MILLISECONDS, DPI, HEIGHT = 60, 80, 96.0, 210.0
#: Colours of a GIF here: the figure has few.
COLOURS = 32


def frame_at(result: Result, index: int, units: Units) -> Figure:
    """Stress along what is struck and what strikes at one of the recorded times, over the extremes of the run."""
    fields = result.fields
    near = float(np.abs(fields.stress).max()) or 1.0
    shown = np.asarray(units.number(units.sign * fields.stress.astype(float), "stress", near))
    low, high = shown.min(axis=0), shown.max(axis=0)
    place = np.asarray(units.number(fields.position, "length"))
    ends = (float(units.number(fields.edges[0], "length")), float(units.number(fields.edges[-1], "length")))
    labels = (
        f"Distance from the struck end, {units.unit('length')}",
        f"Stress, {units.unit('stress', near)} ({sign_words(units)})",
    )
    plot = plot_in(ends, bounds_of(low, high), WIDTH, 0, HEIGHT, labels)
    plot.area(place, low, high, PRINT.edge, 0.35)
    plot.curve(place, shown[index], PRINT.ink, 1.3)
    time = units.show(float(fields.time[index]), "time")
    plot.say(plot.x.end - 4, plot.y.end + 10, time, PRINT.ink, "end")
    return Figure(f"Stress along the member at {time}", WIDTH, HEIGHT, tuple(plot.marks))


def wave_gif(result: Result, units: Units) -> bytes:
    """Up to `FRAMES` pictures evenly over the run; the same bytes each time."""
    count = len(result.fields.time)
    chosen = np.unique(np.linspace(0, count - 1, min(FRAMES, count)).round().astype(int))
    date = datetime(2000, 1, 1)  # of the single frames, which nobody sees
    frames = []
    for index in chosen:
        with Image.open(io.BytesIO(figure_png(frame_at(result, int(index), units), date, DPI))) as frame:
            frames.append(frame.convert("RGB").quantize(COLOURS, dither=Image.Dither.NONE))
    stream = io.BytesIO()
    first, *others = frames
    first.save(stream, "GIF", save_all=True, append_images=others, duration=MILLISECONDS, loop=0)
    return stream.getvalue()


def write_animations(cases: tuple[Solved, ...], units: Units, folder: Path) -> list[Path]:
    """One file for each case that has an answer; returns the files. Raises `OSError`."""
    folder.mkdir(parents=True, exist_ok=True)
    written = []
    for one, name in zip(cases, folder_names([c.case.name for c in cases]), strict=True):
        if one.result is not None and len(one.result.fields.time) > 1:
            path = folder / f"{name}-waves.gif"
            write_whole(path, wave_gif(one.result, units))
            written.append(path)
    return written

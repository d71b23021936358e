"""A figure as vector marks in a PDF."""

from __future__ import annotations

import io
from datetime import datetime
from weakref import WeakKeyDictionary

import numpy as np
from PIL import Image
from reportlab.lib.colors import HexColor
from reportlab.lib.utils import ImageReader
from reportlab.pdfgen.canvas import Canvas
from reportlab.pdfgen.pathobject import PDFPathObject
from reportlab.platypus import Flowable

from app.report.figures.marks import Figure, Mark, Path, Text
from app.report.lettering import BOLD, REGULAR, plain, printable, register_fonts


class FigureFlowable(Flowable):
    """A figure in the flow of pages, made narrower where the page is."""

    def __init__(self, figure: Figure) -> None:
        super().__init__()
        self.figure = figure
        self.hAlign = "LEFT"

    def wrap(self, available_width: float, available_height: float) -> tuple[float, float]:
        figure = self.figure
        self._share = min(1.0, available_width / figure.width, available_height / figure.height)
        if self._share < 0.6:  # rather on the next page than so small
            self._share = min(1.0, available_width / figure.width)
        self.width, self.height = figure.width * self._share, figure.height * self._share
        return self.width, self.height

    def draw(self) -> None:
        canvas = self.canv
        if getattr(getattr(canvas, "_doctemplate", None), "only_counts", False):
            return
        canvas.saveState()
        canvas.scale(self._share, self._share)
        draw_figure(canvas, self.figure)
        canvas.restoreState()


def figure_pdf(figure: Figure, date: datetime) -> bytes:
    """The figure as a PDF of its own size, the same bytes for the same date."""
    stream = io.BytesIO()
    canvas = Canvas(stream, pagesize=(figure.width, figure.height), invariant=1)
    set_date(canvas, date)
    canvas.setTitle(plain(figure.name))
    register_fonts()
    draw_figure(canvas, figure)
    canvas.showPage()
    canvas.save()
    return stream.getvalue()


def set_date(canvas: Canvas, date: datetime) -> None:
    """Let the file say this date, and nothing of when and where it was made."""
    stamp = canvas._doc._timeStamp
    stamp.t = date.timestamp() if date.tzinfo else (date - datetime(1970, 1, 1)).total_seconds()
    offset = date.utcoffset()
    seconds = int(offset.total_seconds()) if offset else 0
    stamp.lt = tuple(date.timetuple())
    stamp.YMDhms = tuple(date.timetuple())[:6]
    stamp.dhh, stamp.dmm = int(seconds / 3600), abs(seconds) // 60 % 60


def draw_figure(canvas: Canvas, figure: Figure) -> None:
    """Draw with the figure's lower left corner at the origin."""
    for mark in figure.marks:
        _draw(canvas, mark, figure.height)


def _draw(canvas: Canvas, mark: Mark, height: float) -> None:
    if isinstance(mark, Path):
        _draw_path(canvas, mark, height)
    elif isinstance(mark, Text):
        canvas.saveState()
        canvas.setFont(BOLD if mark.bold else REGULAR, mark.size)
        canvas.setFillColor(HexColor(mark.colour))
        canvas.translate(mark.x, height - mark.y)
        if mark.turned:
            canvas.rotate(90)
        place = {
            "start": canvas.drawString,
            "middle": canvas.drawCentredString,
            "end": canvas.drawRightString,
        }
        place[mark.anchor](0, 0, printable(mark.text, mark.bold))
        canvas.restoreState()
    else:
        picture = ImageReader(Image.fromarray(mark.colours))
        canvas.drawImage(picture, mark.x, height - mark.y - mark.height, mark.width, mark.height)


def _draw_path(canvas: Canvas, mark: Path, height: float) -> None:
    if len(mark.points) < 2:
        return
    canvas.saveState()
    if mark.fill:
        canvas.setFillColor(HexColor(mark.fill))
    if mark.stroke:
        canvas.setStrokeColor(HexColor(mark.stroke))
        canvas.setLineWidth(mark.width)
        canvas.setLineJoin(1)
        canvas.setDash(*([list(mark.dash)] if mark.dash else []))
    if mark.opacity < 1:  # after the colours, which bring an opacity of their own
        canvas.setFillAlpha(mark.opacity)
        canvas.setStrokeAlpha(mark.opacity)
    canvas.drawPath(
        PDFPathObject([_steps(mark, height)]), stroke=int(bool(mark.stroke)), fill=int(bool(mark.fill))
    )
    canvas.restoreState()


def _steps(mark: Path, height: float) -> str:
    """The path in the PDF's own words. Kept, for a document is laid out several times until its contents are right."""
    if mark not in _STEPS:
        points = np.round(mark.points * (1, -1) + (0, height), 2).tolist()
        (x, y), *others = points
        lines = "".join(f" {x:g} {y:g} l" for x, y in others)
        _STEPS[mark] = f"n {x:g} {y:g} m{lines}{' h' if mark.closed else ''}"
    return _STEPS[mark]


_STEPS: WeakKeyDictionary[Path, str] = WeakKeyDictionary()

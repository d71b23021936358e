"""Every figure of a report as files of its own: SVG and PDF with real text, PNG at the DPI wanted. No Qt."""

from __future__ import annotations

import io
from collections.abc import Iterator
from datetime import datetime
from pathlib import Path

import pypdfium2

from app.disk import write_whole
from app.export.case_folder import folder_names
from app.report.blocks import Heading, Picture, Report
from app.report.figures.marks import Figure
from app.report.figures.pdf import figure_pdf
from app.report.figures.svg import svg_of

POINTS_PER_INCH = 72


def figures_of(report: Report) -> Iterator[tuple[str, Figure]]:
    """Every figure with a name for its file, all different: number, case, and what is seen."""
    number = 0
    for section in report.sections:
        case = ""
        for block in section.blocks:
            if isinstance(block, Heading):
                case = block.text.removeprefix("Case: ")
            elif isinstance(block, Picture):
                number += 1
                yield f"{number:02}-{folder_names([f'{case} {block.figure.name}'])[0]}", block.figure


def figure_png(figure: Figure, date: datetime, dpi: float) -> bytes:
    """The figure as PNG on white paper."""
    document = pypdfium2.PdfDocument(figure_pdf(figure, date))
    try:
        picture = document[0].render(scale=dpi / POINTS_PER_INCH).to_pil()
    finally:
        document.close()
    stream = io.BytesIO()
    picture.save(stream, "PNG", dpi=(dpi, dpi))
    return stream.getvalue()


def write_figures(report: Report, folder: Path, date: datetime, dpi: float = 300) -> list[Path]:
    """Write each figure three times; returns the files. Raises `OSError`."""
    folder.mkdir(parents=True, exist_ok=True)
    written = []
    for name, figure in figures_of(report):
        made: tuple[tuple[str, str | bytes], ...] = (
            (".svg", svg_of(figure, alone=True)),
            (".pdf", figure_pdf(figure, date)),
            (".png", figure_png(figure, date, dpi)),
        )
        for ending, content in made:
            path = folder / f"{name}{ending}"
            write_whole(path, content)
            written.append(path)
    return written

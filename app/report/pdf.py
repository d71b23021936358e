"""A report as PDF. Pages are broken so that no row of a table is split and no heading stands alone."""

from __future__ import annotations

import io
from collections.abc import Iterator
from datetime import datetime
from typing import Any

from reportlab.lib.pagesizes import A4, LETTER
from reportlab.lib.units import mm
from reportlab.lib.utils import ImageReader
from reportlab.pdfgen.canvas import Canvas
from reportlab.platypus import (
    BaseDocTemplate,
    Flowable,
    Frame,
    Image,
    PageBreak,
    PageTemplate,
    Spacer,
)
from reportlab.platypus.tableofcontents import TableOfContents

from app.report.blocks import Report
from app.report.figures.pdf import set_date
from app.report.lettering import REGULAR, fitted, plain, printable, register_fonts
from app.report.pdf_flow import flow_of, heading, key_value_table, paragraph
from app.report.pdf_styles import SOFT, contents_styles, styles

SIZES = {"A4": A4, "Letter": LETTER}
MARGIN, HIGH, FOOT = 20 * mm, 16 * mm, 9 * mm


def pdf_of(report: Report, date: datetime) -> bytes:
    """The file; the same report and date always give the same bytes."""
    register_fonts()
    stream = io.BytesIO()
    pages = _Pages(stream, report, date)
    pages.multiBuild(list(_story(report, pages.width)))
    return stream.getvalue()


class _Pages(BaseDocTemplate):
    """Page frames, footer, bookmarks and the list of contents."""

    def __init__(self, stream: io.BytesIO, report: Report, date: datetime) -> None:
        size = SIZES[report.paper]
        super().__init__(
            stream,
            pagesize=size,
            leftMargin=MARGIN,
            rightMargin=MARGIN,
            topMargin=HIGH,
            bottomMargin=HIGH,
            title=plain(report.front.title),
            author="",
            subject=plain(report.front.subtitle),
            creator="Striketrace",
            invariant=1,
        )
        self._report, self._date = report, date
        self._pages = self._last = 0
        frame = Frame(MARGIN, HIGH, self.width, self.height, 0, 0, 0, 0)
        self.addPageTemplates([PageTemplate("plain", [frame], onPage=self._furnish)])

    @property
    def only_counts(self) -> bool:
        """In the first pass nobody knows how many pages there are: it is never the last, and needs no figures."""
        return self._pages == 0

    def _furnish(self, canvas: Canvas, _document: Any) -> None:
        if canvas.getPageNumber() == 1:
            set_date(canvas, self._date)
        canvas.saveState()
        canvas.setFont(REGULAR, 7)
        canvas.setFillColor(SOFT)
        number = f"page {canvas.getPageNumber()}" + (f" of {self._pages}" if self._pages else "")
        right = self.pagesize[0] - MARGIN
        canvas.drawRightString(right, FOOT, number)
        canvas.drawString(MARGIN, FOOT, printable(fitted(self._report.footer, 7, self.width - 90)))
        canvas.restoreState()

    def afterPage(self) -> None:
        self._last = self.page

    def _allSatisfied(self) -> bool:
        """Passes go on until the contents and the number of pages that the footers tell are right."""
        told, self._pages = self._pages, self._last
        return bool(super()._allSatisfied()) and told == self._pages

    def afterFlowable(self, flowable: Flowable) -> None:
        level = getattr(flowable, "contents_level", None)
        if level is None:
            return
        key = f"part-{flowable.contents_key}"
        self.canv.bookmarkPage(key)
        self.canv.addOutlineEntry(flowable.contents_text, key, level, closed=level > 0)
        if level == 0 or flowable.contents_key.startswith("results"):
            self.notify("TOCEntry", (level, flowable.contents_markup, self.page, key))


def _story(report: Report, width: float) -> Iterator[Flowable]:
    yield from _front(report, width)
    for number, section in enumerate(report.sections, 1):
        yield PageBreak() if section.key in ("input", "appendix") else Spacer(1, 14)
        yield from flow_of(section, number, width)


def _front(report: Report, width: float) -> Iterator[Flowable]:
    front = report.front
    if front.logo:
        wide, high = ImageReader(io.BytesIO(front.logo)).getSize()
        share = min(150 / wide, 60 / high)
        yield Image(io.BytesIO(front.logo), wide * share, high * share, hAlign="LEFT")
    yield Spacer(1, 10)
    yield paragraph(front.title[:600], styles()["title"], bold=True, room=width)
    yield Spacer(1, 6)
    yield paragraph(front.subtitle, styles()["subtitle"])
    yield Spacer(1, 12)
    yield key_value_table(front.particulars, width)
    yield Spacer(1, 8)
    yield from (paragraph(line, styles()["caution"], bold=True) for line in front.verdict)
    yield paragraph(front.caution, styles()["body"])
    yield heading("Contents", 2, None)
    contents = TableOfContents()
    contents.levelStyles = contents_styles()
    contents.dotsMinLevel = 0
    yield contents

"""One page for the person at the rig, as PDF, and a second one where depths were studied. Imports no Qt."""

from __future__ import annotations

import io
from dataclasses import dataclass

from reportlab.lib.pagesizes import A4, LETTER
from reportlab.pdfgen.canvas import Canvas

from app import __version__
from app.report.lettering import BOLD, REGULAR, printable, register_fonts
from app.set_sheet.answer_words import Told
from app.set_sheet.chart import chart
from app.set_sheet.page_words import assumed, cautions, member_words
from app.set_sheet.paper import Writer
from app.set_sheet.printed_depth import write_depths
from app.set_sheet.rig_table import sets_to_read, shown_at
from app.set_sheet.words import PER, force_text, level_text, per_of, summary, varied_text
from app.units import Units, rounded
from solver.studies import Sheet
from solver.studies.depth import Depths
from solver.studies.uncertainty import Sampled

#: Room that the picture is drawn for, and its least height where there is much to say; the lowest line of the page.
PICTURE, LEAST, BOTTOM = (700.0, 390.0), 250.0, 38.0


@dataclass(frozen=True)
class Page:
    """What is printed: `told` are the sentences; `per`, what blows are counted for."""

    sheet: Sheet
    title: str
    units: Units
    told: Told
    per: str | None = None
    sampled: Sampled | None = None
    depths: Depths | None = None


def page_pdf(page: Page) -> bytes:
    """The page; the same input gives the same bytes."""
    register_fonts()
    size = LETTER if page.units.system == "us" else A4
    out = io.BytesIO()
    canvas = Canvas(out, pagesize=size, invariant=1)
    canvas.setTitle(printable(f"Set sheet: {page.sheet.plan.case.name}"))
    canvas.setCreator(f"Striketrace {__version__}")
    paper, pages = Writer(canvas, size), 1 if page.depths is None else 2
    beyond = _beyond(page, size)
    _write(paper, page, max(LEAST, PICTURE[1] - beyond * PICTURE[0] / paper.room))
    paper.end_page(1, pages)
    if page.depths is not None:
        case, per = page.sheet.plan.case, per_of(page.units, page.per)
        write_depths(paper, page.depths, case, page.title, page.units, per)
        paper.end_page(2, pages)
    canvas.save()
    return out.getvalue()


def _beyond(page: Page, size: tuple[float, float]) -> float:
    """By how much the page would be too long with a picture of the usual height."""
    trial = Writer(Canvas(io.BytesIO(), pagesize=size), size)
    _write(trial, page, PICTURE[1])
    return max(0.0, BOTTOM - trial.y)


def _write(paper: Writer, page: Page, height: float) -> None:
    case, units = page.sheet.plan.case, page.units
    per = per_of(units, page.per)
    paper.text(f"Set sheet: {case.name}", BOLD, 15)
    paper.text(page.title, REGULAR, 9.5)
    paper.y -= 3
    paper.text(member_words(case, units), REGULAR, 8.5)
    paper.box(page.told.criterion, page.told.beside)
    paper.picture(
        lambda wide, high, letters: chart(page.sheet, units, per, wide, high, letters, page.sampled),
        PICTURE[0],
        height,
    )
    own = level_text(page.sheet.plan.levels[0], units)
    shaded = f" Shaded: eight of ten samples with {own}." if page.sampled else ""
    paper.text(f"{summary(page.sheet, units)}.{shaded}", REGULAR, 7.4)
    paper.y -= 4
    _table(paper, page)
    paper.list("What was found besides", list(page.told.further))
    paper.list("What is assumed", assumed(page.sheet, units))
    paper.list("To bear in mind", cautions(page.sheet, units))


def _table(paper: Writer, page: Page) -> None:
    sheet, units = page.sheet, page.units
    per = per_of(units, page.per)
    one = 1 / units.number(1.0, "small_length")
    sets = sets_to_read(sheet, one)
    if not sets:
        return
    varied = varied_text(sheet.plan.levels[0])
    head = ["Mean set of the last 10 blows", "10 blows move it by", f"Blows per {per}"]
    order = sorted(range(len(sheet.plan.levels)), key=lambda i: sheet.plan.levels[i].value)
    head += [f"{varied} {level_text(sheet.plan.levels[i], units)} shows" for i in order]
    rows = []
    for measured in sets:
        row = [units.show(measured, "small_length", 2), units.show(10 * measured, "small_length", 2)]
        row.append(rounded(PER[per] / measured, 2 if PER[per] / measured < 10 else 3))
        for index in order:
            shown = shown_at(sheet, index, measured)
            words = "–" if shown.resistance is None else force_text(shown.resistance, units)
            row.append(f"{words} ✕" if shown.over else words)
        rows.append(row)
    paper.rows(head, rows)
    if any("✕" in cell for row in rows for cell in row):
        paper.text("✕ a limit of the member is passed there: do not drive so.", REGULAR, 7.2)

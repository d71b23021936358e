"""One page for the person at the rig, as PDF. Imports no Qt."""

from __future__ import annotations

import io
from dataclasses import dataclass

from reportlab.lib.pagesizes import A4, LETTER
from reportlab.lib.utils import simpleSplit
from reportlab.pdfbase.pdfmetrics import stringWidth
from reportlab.pdfgen.canvas import Canvas

from app import __version__
from app.look.colours import PRINT, Palette
from app.report.lettering import BOLD, REGULAR, printable, register_fonts
from app.set_sheet.chart import chart
from app.set_sheet.page_words import assumed, cautions, member_words
from app.set_sheet.rig_table import sets_to_read, shown_at
from app.set_sheet.scene import Area, Letters, Level, Line, Mark, Scene, Words, outline_of
from app.set_sheet.words import PER, force_text, level_text, per_of, varied_text
from app.units import Units, rounded
from solver.studies import Sheet
from solver.studies.uncertainty import Sampled

MARGIN = 42.0
SIZES: dict[Level, tuple[str, float]] = {
    "small": (REGULAR, 7.2),
    "body": (REGULAR, 8.5),
    "strong": (BOLD, 8.5),
}
#: The picture is drawn in a room larger than on the page, so that its letters have the size of the small print.
PICTURE = (700.0, 400.0)


@dataclass(frozen=True)
class Page:
    """What is printed: `criterion` and `answers` are sentences; `per`, what blows are counted for."""

    sheet: Sheet
    title: str
    units: Units
    criterion: str
    answers: tuple[str, ...]
    per: str | None = None
    sampled: Sampled | None = None


def page_pdf(page: Page) -> bytes:
    """The page; the same input gives the same bytes."""
    register_fonts()
    size = LETTER if page.units.system == "us" else A4
    out = io.BytesIO()
    canvas = Canvas(out, pagesize=size, invariant=1)
    canvas.setTitle(printable(f"Set sheet: {page.sheet.plan.case.name}"))
    canvas.setCreator(f"Striketrace {__version__}")
    _Writer(canvas, size, page).write()
    canvas.showPage()
    canvas.save()
    return out.getvalue()


class _Writer:
    """Writes from the top down; `y` is where the next line goes."""

    def __init__(self, canvas: Canvas, size: tuple[float, float], page: Page) -> None:
        self.canvas, self.page = canvas, page
        self.width, self.y = size[0], size[1] - MARGIN
        self.room = size[0] - 2 * MARGIN

    def write(self) -> None:
        page, case = self.page, self.page.sheet.plan.case
        self.text(f"Set sheet: {case.name}", BOLD, 15)
        self.text(page.title, REGULAR, 9.5)
        self.y -= 3
        self.text(member_words(case, page.units), REGULAR, 8.5)
        self.box(page.criterion, page.answers)
        self.picture()
        self.table()
        self.list("What is assumed", assumed(page.sheet, page.units))
        self.list("To bear in mind", cautions(page.sheet, page.units))
        self.canvas.setFont(REGULAR, 6.5)
        self.canvas.setFillColor(PRINT.soft_ink)
        self.canvas.drawString(MARGIN, 24, f"Striketrace {__version__}")

    def text(self, words: str, face: str, size: float, indent: float = 0.0) -> None:
        self.canvas.setFillColor(PRINT.ink)
        self.canvas.setFont(face, size)
        for line in simpleSplit(printable(words, face == BOLD), face, size, self.room - indent):
            self.y -= size * 1.25
            self.canvas.drawString(MARGIN + indent, self.y, line)

    def box(self, first: str, others: tuple[str, ...]) -> None:
        """The sentence that the page is for."""
        inner = self.room - 16
        large = simpleSplit(printable(first, True), BOLD, 12, inner)
        small = [line for words in others for line in simpleSplit(printable(words), REGULAR, 9, inner)]
        height = 12 + 15 * len(large) + 12 * len(small)
        self.y -= 8
        self.canvas.setStrokeColor(PRINT.ink)
        self.canvas.setLineWidth(1.2)
        self.canvas.rect(MARGIN, self.y - height, self.room, height)
        y = self.y - 4
        for lines, face, size, step in ((large, BOLD, 12, 15), (small, REGULAR, 9, 12)):
            self.canvas.setFont(face, size)
            for line in lines:
                y -= step
                self.canvas.drawString(MARGIN + 8, y + 2, line)
        self.y -= height + 8

    def picture(self) -> None:
        scale = self.room / PICTURE[0]
        page = self.page
        scene = chart(
            page.sheet, page.units, per_of(page.units, page.per), *PICTURE, _letters(scale), page.sampled
        )
        self.canvas.saveState()
        self.canvas.translate(MARGIN, self.y)
        self.canvas.scale(scale, scale)
        draw(self.canvas, scene, PRINT, 1 / scale)
        self.canvas.restoreState()
        self.y -= PICTURE[1] * scale + 4

    def table(self) -> None:
        sheet, units = self.page.sheet, self.page.units
        per = per_of(units, self.page.per)
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
        self._rows(head, rows)
        if any("✕" in cell for row in rows for cell in row):
            self.text("✕ a limit of the member is passed there: do not drive so.", REGULAR, 7.2)

    def _rows(self, head: list[str], rows: list[list[str]]) -> None:
        step = self.room / len(head)
        heads = [simpleSplit(printable(words, True), BOLD, 7.2, step - 6) for words in head]
        top = self.y
        for i, lines in enumerate(heads):
            self.canvas.setFont(BOLD, 7.2)
            for n, line in enumerate(lines):
                self.canvas.drawString(MARGIN + i * step, top - 9 - 9 * n, line)
        self.y = top - 9 * max(len(lines) for lines in heads) - 4
        self.canvas.setLineWidth(0.5)
        self.canvas.line(MARGIN, self.y, MARGIN + self.room, self.y)
        self.canvas.setFont(REGULAR, 8)
        for row in rows:
            self.y -= 11
            for i, words in enumerate(row):
                self.canvas.drawString(MARGIN + i * step, self.y, printable(words))
        self.y -= 4

    def list(self, title: str, sentences: list[str]) -> None:
        if not sentences:
            return
        self.y -= 3
        self.text(title, BOLD, 8.5)
        for sentence in sentences:
            before = self.y
            self.text(sentence, REGULAR, 7.4, indent=9)
            self.canvas.drawString(MARGIN, before - 7.4 * 1.25, "·")


def _letters(scale: float) -> Letters:
    def width(text: str, level: Level) -> float:
        face, size = SIZES[level]
        return float(stringWidth(printable(text, face == BOLD), face, size)) / scale

    return Letters(width, 1.25 * SIZES["small"][1] / scale)


def draw(canvas: Canvas, scene: Scene, colours: Palette, letters: float) -> None:
    """Draw a scene below the present origin; `letters` enlarges the text."""
    for item in scene:
        ink = getattr(colours, item.ink)
        if isinstance(item, Area):
            canvas.setFillColor(ink)
            canvas.setFillAlpha(item.strength)
            _polygon(canvas, item.points, fill=True, stroke=False)
            canvas.setFillAlpha(1)
        elif isinstance(item, Line):
            canvas.setStrokeColor(ink)
            canvas.setLineWidth(item.width)
            canvas.setDash(*([list(item.dash)] if item.dash else []))
            path = canvas.beginPath()
            path.moveTo(item.points[0][0], -item.points[0][1])
            for x, y in item.points[1:]:
                path.lineTo(x, -y)
            canvas.drawPath(path)
            canvas.setDash()
        elif isinstance(item, Mark):
            canvas.setStrokeColor(ink)
            canvas.setLineWidth(1.2)
            canvas.setFillColor(ink if item.filled else colours.paper)
            corners = outline_of(item)
            if corners is None:
                canvas.circle(item.at[0], -item.at[1], item.size, fill=1)
            else:
                _polygon(canvas, corners, fill=True, stroke=True)
        else:
            _words(canvas, item, ink, letters)


def _polygon(canvas: Canvas, points: tuple[tuple[float, float], ...], fill: bool, stroke: bool) -> None:
    path = canvas.beginPath()
    path.moveTo(points[0][0], -points[0][1])
    for x, y in points[1:]:
        path.lineTo(x, -y)
    path.close()
    canvas.drawPath(path, fill=int(fill), stroke=int(stroke))


def _words(canvas: Canvas, words: Words, ink: str, letters: float) -> None:
    face, size = SIZES[words.level]
    canvas.setFillColor(ink)
    canvas.setFont(face, size * letters)
    text = printable(words.text, face == BOLD)
    x, y = words.at[0], -words.at[1]
    write = {"left": canvas.drawString, "middle": canvas.drawCentredString, "right": canvas.drawRightString}
    if words.turned:
        canvas.saveState()
        canvas.translate(x, y)
        canvas.rotate(90)
        write[words.anchor](0, -3, text)
        canvas.restoreState()
    else:
        write[words.anchor](x, y, text)

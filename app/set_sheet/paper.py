"""A sheet of paper that is written from the top down, and how a scene is drawn on it. Imports no Qt."""

from __future__ import annotations

from bisect import bisect
from collections.abc import Callable, Sequence

from reportlab.lib.utils import simpleSplit
from reportlab.pdfbase.pdfmetrics import stringWidth
from reportlab.pdfgen.canvas import Canvas

from app import __version__
from app.look.colours import PRINT, Palette
from app.report.lettering import BOLD, REGULAR, printable
from app.set_sheet.scene import Area, Letters, Level, Line, Mark, Scene, Words, outline_of

#: Of the page on all sides, in points.
MARGIN = 42.0
#: Lines that one text may take.
MOST = 8
SIZES: dict[Level, tuple[str, float]] = {
    "small": (REGULAR, 7.2),
    "body": (REGULAR, 8.5),
    "strong": (BOLD, 8.5),
}


class Writer:
    """`y` is where the next line goes."""

    def __init__(self, canvas: Canvas, size: tuple[float, float]) -> None:
        self.canvas = canvas
        self.top, self.room = size[1] - MARGIN, size[0] - 2 * MARGIN
        self.y = self.top

    def end_page(self, number: int, of: int) -> None:
        """Foot of the page, and a new one."""
        self.canvas.setFont(REGULAR, 6.5)
        self.canvas.setFillColor(PRINT.soft_ink)
        self.canvas.drawString(MARGIN, 24, f"Striketrace {__version__}")
        if of > 1:
            self.canvas.drawRightString(MARGIN + self.room, 24, f"{number} of {of}")
        self.canvas.showPage()
        self.y = self.top

    def text(self, words: str, face: str, size: float, indent: float = 0.0) -> None:
        self.canvas.setFillColor(PRINT.ink)
        self.canvas.setFont(face, size)
        for line in lines_of(words, face, size, self.room - indent):
            self.y -= size * 1.25
            self.canvas.drawString(MARGIN + indent, self.y, line)

    def box(self, first: str, others: tuple[str, ...]) -> None:
        """The sentence that the page is for."""
        inner = self.room - 16
        large = lines_of(first, BOLD, 12, inner)
        small = [line for words in others for line in lines_of(words, REGULAR, 9, inner)]
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

    def picture(self, made: Callable[[float, float, Letters], Scene], width: float, height: float) -> None:
        """A scene for a room of this size, which is larger than on the page, so that its letters have the size of the
        small print."""
        scale = self.room / width
        scene = made(width, height, _letters(scale))
        self.canvas.saveState()
        self.canvas.translate(MARGIN, self.y)
        self.canvas.scale(scale, scale)
        draw(self.canvas, scene, PRINT, 1 / scale)
        self.canvas.restoreState()
        self.y -= height * scale + 4

    def rows(self, head: list[str], rows: list[list[str]], widths: Sequence[float] = ()) -> None:
        """A table; `widths` are shares, all alike where there are none."""
        shares = widths or [1.0] * len(head)
        starts = [MARGIN + self.room * sum(shares[:i]) / sum(shares) for i in range(len(shares) + 1)]
        heads = [lines_of(words, BOLD, 7.2, starts[i + 1] - starts[i] - 6) for i, words in enumerate(head)]
        top = self.y
        for i, lines in enumerate(heads):
            self.canvas.setFont(BOLD, 7.2)
            for n, line in enumerate(lines):
                self.canvas.drawString(starts[i], top - 9 - 9 * n, line)
        self.y = top - 9 * max(len(lines) for lines in heads) - 4
        self.canvas.setLineWidth(0.5)
        self.canvas.line(MARGIN, self.y, MARGIN + self.room, self.y)
        self.canvas.setFont(REGULAR, 8)
        for row in rows:
            self.y -= 11
            for i, words in enumerate(row):
                self.canvas.drawString(starts[i], self.y, printable(words))
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


def lines_of(words: str, face: str, size: float, room: float) -> list[str]:
    """The words in lines of `room` points; a word that is wider is broken, and what is more than MOST lines is left
    off with an ellipsis: names may have any length, and the page is one."""
    lines = []
    for line in simpleSplit(printable(words, face == BOLD), face, size, room):
        while stringWidth(line, face, size) > room and len(line) > 1:
            fits = bisect(range(1, len(line)), room, key=lambda n: stringWidth(line[:n], face, size))
            lines.append(line[: max(fits, 1)])
            line = line[max(fits, 1) :]
        lines.append(line)
    return lines if len(lines) <= MOST else [*lines[: MOST - 1], f"{lines[MOST - 1][:-1]}…"]


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

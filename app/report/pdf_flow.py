"""Blocks of a report as what the PDF library lays out, with the room that each needs before a page may break."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from xml.sax.saxutils import escape

from reportlab.lib.enums import TA_RIGHT
from reportlab.lib.styles import ParagraphStyle
from reportlab.platypus import (
    CondPageBreak,
    Flowable,
    KeepTogether,
    LongTable,
    Preformatted,
    Spacer,
    TableStyle,
)
from reportlab.platypus import Paragraph as Words

from app.report.blocks import Block, Bullets, Heading, Listing, Paragraph, Picture, Section, Table
from app.report.figures.pdf import FigureFlowable
from app.report.lettering import broken, escaped, plain, printable, wrapped
from app.report.pdf_styles import GRID, HEAD, INK, SOFT, styles
from app.report.reading_order import begins_at_the_right, turns

#: A cell with more letters is cut: a row must fit on a page.
LONGEST_CELL = 1500
#: Lines of a listing that are printed, and that are laid out at once.
LISTING_LINES, PIECE = 6000, 20
GOES_ON = "↩"
#: Bookmarks with more letters than this are cut.
LONGEST_ENTRY = 90
#: A heading is kept with all that follows down to a figure, where that is less than this, points.
MOST_KEPT = 520.0
#: A heading with no more than this below it does not stand without the next heading.
SHORT = 90.0


def markup(text: str, bold: bool = False) -> str:
    """Plain text as the library's markup: nothing in it is taken for a tag."""
    return escape(printable(text, bold)).replace("\n", "<br/>")


def paragraph(text: str, style: ParagraphStyle, bold: bool = False, room: float = 0.0) -> Words:
    """A paragraph of plain text. `room` (points) is the width of its lines: with it, text that reads from right to left
    is broken in its own order and begins at the right."""
    if room and turns(text):
        text = wrapped(text, style.fontSize, room, bold)
        if begins_at_the_right(text):
            style = ParagraphStyle(f"{style.name}-right", parent=style, alignment=TA_RIGHT)
    return Words(markup(text, bold), style)


def heading(text: str, level: int, key: str | None, room: float = 0.0) -> Words:
    """A heading; with a key it stands in the contents (levels 1 and 2)."""
    made = paragraph(text, styles()[f"heading{level}"], bold=True, room=room)
    if key is not None and level < 3:
        short = text if len(text) <= LONGEST_ENTRY else text[: LONGEST_ENTRY - 1] + "…"
        made.contents_level, made.contents_key = level - 1, key
        made.contents_text, made.contents_markup = plain(short), markup(short, level == 1)
    return made


def flow_of(section: Section, number: int, width: float) -> Iterator[Flowable]:
    """A section with its heading. Headings stand on the page of what they lead to: text up to a figure or table, with
    it where that is not most of a page."""
    first = heading(f"{number}. {section.title}", 1, section.key)
    parts: list[tuple[Block | None, list[Flowable]]] = [(None, [first])]
    for index, block in enumerate(section.blocks):
        if isinstance(block, Heading):
            parts.append((block, [heading(block.text, block.level, f"{section.key}-{index}", width)]))
        else:
            parts.append((block, list(_made(block, width))))
    for index, (kind, made) in enumerate(parts):
        if _leads(kind):
            if index and _leads(parts[index - 1][0]):
                yield from made  # it is kept with the heading before it
                continue
            yield CondPageBreak(_room_below(parts[index:], width))
        elif isinstance(kind, Table):
            yield CondPageBreak(_room_for(kind, made, width))
        yield from made


def _leads(block: Block | None) -> bool:
    return block is None or isinstance(block, Heading)


def _room_below(parts: Sequence[tuple[Block | None, list[Flowable]]], width: float) -> float:
    """What a heading needs below it: the least, or all down to the first figure or table."""
    whole = least = 0.0
    text = False
    for block, made in parts:
        if _leads(block) and text and whole > SHORT:
            break
        if block is not None and not _leads(block):
            least = least or whole + _room_for(block, made, width)
        text = text or not _leads(block)
        whole += _room_for(block, made, width) if isinstance(block, Table) else _heights(made, width)
        if isinstance(block, Picture | Table):
            break
    return whole if whole < MOST_KEPT else max(least, 60.0)


def _room_for(block: Block | None, made: list[Flowable], width: float) -> float:
    """The least of a block that may stand at the end of a page."""
    lead = made[:-1] if isinstance(block, Table) else []
    return _heights(lead, width) + _least(made[len(lead)], width)


def _heights(made: Sequence[Flowable], width: float) -> float:
    return sum(_height(flowable, width) for flowable in made)


def _height(flowable: Flowable, width: float) -> float:
    if isinstance(flowable, KeepTogether):
        return sum(_height(part, width) for part in flowable._content)
    return float(flowable.wrap(width, 1e6)[1] + flowable.getSpaceBefore() + flowable.getSpaceAfter())


def _least(flowable: Flowable, width: float) -> float:
    """How much of it must stand below a heading: two rows after the head of a table, a few lines of text."""
    height = _height(flowable, width)
    if isinstance(flowable, LongTable):
        return min(height, float(sum(flowable._rowHeights[:3])) + 4)
    return height if isinstance(flowable, KeepTogether) else min(height, 40.0)


def _made(block: Block, width: float) -> Iterator[Flowable]:
    look = styles()
    match block:
        case Paragraph():
            yield paragraph(block.text, look[block.style], block.style == "caution", width)
        case Bullets():
            yield from (Words(markup(item), look["bullet"], bulletText="•") for item in block.items)
        case Table():
            if block.caption:
                yield paragraph(block.caption, look["caption"], bold=True, room=width)
            yield _table(block, width)
        case Picture():
            yield KeepTogether(
                [
                    Spacer(1, 6),
                    FigureFlowable(block.figure),
                    paragraph(block.caption, look["below"], room=width),
                ]
            )
        case Listing():
            yield from _listing(block.text, width)


def _table(table: Table, width: float) -> LongTable:
    look = styles()
    cells = [[paragraph(text, look["head"], bold=True) for text in table.head]]
    for row in table.rows:
        rooms = [share * width - 9 for share in table.shares]
        cells.append(
            [paragraph(_short(t), look["cell"], room=room) for t, room in zip(row, rooms, strict=True)]
        )
    if not table.rows:
        cells.append([paragraph("none", look["cell"]), *([""] * (len(table.head) - 1))])
    made = LongTable(cells, [share * width for share in table.shares], repeatRows=1, splitByRow=1)
    made.setStyle(TableStyle([*_PLAIN, ("BACKGROUND", (0, 0), (-1, 0), HEAD)]))
    made.spaceAfter = 8
    return made


_PLAIN = [
    ("VALIGN", (0, 0), (-1, -1), "TOP"),
    ("LINEBELOW", (0, 0), (-1, -1), 0.4, GRID),
    ("LEFTPADDING", (0, 0), (-1, -1), 3),
    ("RIGHTPADDING", (0, 0), (-1, -1), 5),
    ("TOPPADDING", (0, 0), (-1, -1), 2.2),
    ("BOTTOMPADDING", (0, 0), (-1, -1), 2.8),
]


def key_value_table(pairs: Sequence[tuple[str, str]], width: float) -> LongTable:
    """Pairs of word and text without a head."""
    look = styles()
    pale = ParagraphStyle("pale", parent=look["cell"], textColor=SOFT)
    dark = ParagraphStyle("dark", parent=look["cell"], textColor=INK)
    cells = [[paragraph(word, pale), paragraph(_short(text), dark)] for word, text in pairs]
    made = LongTable(cells, [0.22 * width, 0.78 * width])
    made.setStyle(TableStyle(_PLAIN))
    return made


def _short(text: str) -> str:
    return text if len(text) <= LONGEST_CELL else text[:LONGEST_CELL] + "…"


def _listing(text: str, width: float) -> Iterator[Flowable]:
    """Lines as they are, long ones broken and marked; in pieces, since a long piece is laid out anew at every page."""
    lines: list[str] = []
    for whole in map(escaped, text.rstrip("\n").split("\n")):
        pieces = broken(whole, styles()["listing"].fontSize, width - 10)
        lines += [*(piece + GOES_ON for piece in pieces[:-1]), pieces[-1]]
    if any(line.endswith(GOES_ON) for line in lines):
        yield paragraph(f"A line that ends in {GOES_ON} goes on in the next one.", styles()["small"])
    left_out = len(lines) - LISTING_LINES
    if left_out > 0:
        lines = [*lines[:LISTING_LINES], f"… {left_out} more lines stand in the project's file alone."]
    for first in range(0, len(lines), PIECE):
        piece = "\n".join(lines[first : first + PIECE])
        yield Preformatted(piece, styles()["listing"], dedent=0)
    yield Spacer(1, 8)

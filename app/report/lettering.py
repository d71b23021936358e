"""The letters of a report: which there are, how wide they are, and what stands for those that are missing. No Qt."""

from __future__ import annotations

import json
import re
import unicodedata
from functools import lru_cache
from pathlib import Path

from reportlab import rl_config
from reportlab.pdfbase import pdfmetrics
from reportlab.pdfbase.ttfonts import TTFont

from app.report.reading_order import on_paper, turns

#: Streams of a PDF as bytes, not as letters that stand for bytes: a fifth smaller, and a quarter of the time saved.
rl_config.useA85 = 0

REGULAR, BOLD = "ReportText", "ReportStrong"
FILES = {REGULAR: "DejaVuSans.ttf", BOLD: "DejaVuSans-Bold.ttf"}
#: Stands for a letter that the font lacks, such as an emoji.
MISSING = "□"
#: Marks that only steer how text runs: joiners, directions, variants. They have no shape of their own.
UNSEEN = re.compile("[\u200b-\u200f\u202a-\u202e\u2060-\u206f\ufe00-\ufe0f\ufeff]")


@lru_cache(maxsize=1)
def register_fonts() -> dict[str, frozenset[int]]:
    """Make the fonts known to the PDF library, once; returns the code points of each."""
    known = {}
    for name, file in FILES.items():
        font = TTFont(name, str(Path(__file__).parent / "fonts" / file))
        pdfmetrics.registerFont(font)
        known[name] = frozenset(font.face.charToGlyph)
    pdfmetrics.registerFontFamily(REGULAR, normal=REGULAR, bold=BOLD, italic=REGULAR, boldItalic=BOLD)
    return known


def text_width(text: str, size: float, bold: bool = False) -> float:
    """Width of text in points at a size in points."""
    register_fonts()
    return float(pdfmetrics.stringWidth(printable(text, bold), BOLD if bold else REGULAR, size))


def fitted(text: str, size: float, room: float, bold: bool = False) -> str:
    """One line of text, cut with an ellipsis where it is wider than `room` points."""
    text = " ".join(text.split())
    if text_width(text, size, bold) <= room:
        return text
    low, high = 0, len(text)
    while low < high:
        middle = (low + high + 1) // 2
        if text_width(text[:middle] + "…", size, bold) <= room:
            low = middle
        else:
            high = middle - 1
    return text[:low].rstrip() + "…"


@lru_cache(maxsize=8192)
def printable(text: str, bold: bool = False) -> str:
    """Text as the font can show it from left to right, with line breaks kept.

    A letter without a shape becomes a box; Hebrew and Arabic stand in their order, Arabic joined.
    """
    known = register_fonts()[BOLD if bold else REGULAR]
    text = UNSEEN.sub("", unicodedata.normalize("NFC", text))
    if turns(text):
        text = "\n".join(map(on_paper, text.split("\n")))
    return "".join(c if ord(c) in known or c == "\n" else " " if c.isspace() else MISSING for c in text)


def broken(text: str, size: float, room: float) -> list[str]:
    """A line in pieces that are no wider than `room` points; at least one piece."""
    pieces, start, wide = [], 0, 0.0
    for at, letter in enumerate(text):
        step = _letter_width(letter, size)
        if wide + step > room and at > start and letter != " ":  # a blank at the head of a line would be lost
            pieces.append(text[start:at])
            start, wide = at, 0.0
        wide += step
    return [*pieces, text[start:]]


@lru_cache(maxsize=4096)
def _letter_width(letter: str, size: float) -> float:
    return text_width(letter, size)


def escaped(text: str) -> str:
    """Text of which every letter can be printed and read back: others as JSON writes them."""
    return "".join(c if printable(c) == c and not turns(c) else json.dumps(c)[1:-1] for c in text)


def wrapped(text: str, size: float, room: float, bold: bool = False) -> str:
    """Text that reads from right to left with line breaks where a line is full: they must be known before its letters
    are put in order. Other text as it is."""
    if not turns(text):
        return text
    lines = []
    for whole in text.split("\n"):
        line = ""
        for word in whole.split(" "):
            longer = f"{line} {word}" if line else word
            if line and text_width(longer, size, bold) > room:
                lines.append(line)
                line = word
            else:
                line = longer
        lines.append(line)
    return "\n".join(lines)


def plain(text: str) -> str:
    """For a reader that orders letters itself, such as the title of a PDF: without what cannot be told."""
    return "".join(c for c in UNSEEN.sub("", text) if c >= " " and not "\ud800" <= c <= "\udfff")

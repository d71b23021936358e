"""The letters of a report: which there are, how wide they are, and what stands for those that are missing. No Qt."""

from __future__ import annotations

import json
import re
import unicodedata
from functools import lru_cache
from pathlib import Path

from reportlab.pdfbase import pdfmetrics
from reportlab.pdfbase.ttfonts import TTFont

REGULAR, BOLD = "ReportText", "ReportStrong"
FILES = {REGULAR: "DejaVuSans.ttf", BOLD: "DejaVuSans-Bold.ttf"}
#: Stands for a letter that the font lacks, such as an emoji.
MISSING = "□"
RIGHT_TO_LEFT = ("R", "AL")
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

    A letter without a shape becomes a box. Runs of letters that read from right to left are turned round, which shows
    Hebrew as it is written, and Arabic in letters that are not joined.
    """
    known = register_fonts()[BOLD if bold else REGULAR]
    text = UNSEEN.sub("", unicodedata.normalize("NFC", text))
    if _turns(text):
        text = "\n".join(_turned(line) for line in text.split("\n"))
    return "".join(c if ord(c) in known or c == "\n" else " " if c.isspace() else MISSING for c in text)


def broken(text: str, size: float, room: float) -> list[str]:
    """A line in pieces that are no wider than `room` points; at least one piece."""
    pieces, start, wide = [], 0, 0.0
    for at, letter in enumerate(text):
        step = _letter_width(letter, size)
        if wide + step > room and at > start:
            pieces.append(text[start:at])
            start, wide = at, 0.0
        wide += step
    return [*pieces, text[start:]]


@lru_cache(maxsize=4096)
def _letter_width(letter: str, size: float) -> float:
    return text_width(letter, size)


def escaped(text: str) -> str:
    """Text of which every letter can be printed and read back: others as JSON writes them."""
    return "".join(c if printable(c) == c and not _turns(c) else json.dumps(c)[1:-1] for c in text)


def _turns(text: str) -> bool:
    return any(unicodedata.bidirectional(c) in RIGHT_TO_LEFT for c in text)


def _turned(line: str) -> str:
    """A line with each run of right-to-left letters, and the blanks inside it, turned round."""
    found, run, blanks = [], "", ""
    for letter in line:
        way = unicodedata.bidirectional(letter)
        if way in RIGHT_TO_LEFT or (run and way == "NSM"):
            run, blanks = run + blanks + letter, ""
        elif run and letter == " ":
            blanks += letter
        else:
            found.append(run[::-1] + blanks + letter)
            run = blanks = ""
    return "".join(found) + run[::-1] + blanks

"""Sizes, spaces and colours of the printed page."""

from __future__ import annotations

from functools import lru_cache

from reportlab.lib.colors import HexColor
from reportlab.lib.styles import ParagraphStyle

from app.look.colours import PRINT
from app.report.lettering import BOLD, REGULAR

INK, SOFT, GRID, HEAD = (HexColor(c) for c in (PRINT.ink, PRINT.soft_ink, PRINT.grid, PRINT.pressed))
#: Size (points), leading, space before and after.
SIZES: dict[str, tuple[float, float, float, float]] = {
    "title": (22, 27, 0, 0),
    "subtitle": (12, 16, 0, 0),
    "heading1": (16, 20, 4, 8),
    "heading2": (11.5, 15, 12, 5),
    "heading3": (9.5, 13, 9, 3),
    "body": (9, 13, 0, 6),
    "small": (7.5, 10, 0, 4),
    "caution": (9, 13, 2, 6),
    "cell": (7.3, 9.4, 0, 0),
    "head": (7.3, 9.4, 0, 0),
    "caption": (8, 11, 8, 3),
    "below": (7.5, 10, 2, 10),
    "bullet": (9, 12.5, 0, 3),
    "listing": (6.3, 8.2, 0, 0),
}
STRONG = ("title", "heading1", "heading2", "heading3", "caution", "head", "caption")
PALE = ("subtitle", "below", "small")


@lru_cache(maxsize=1)
def styles() -> dict[str, ParagraphStyle]:
    """Styles by name."""
    made = {}
    for name, (size, leading, before, after) in SIZES.items():
        made[name] = ParagraphStyle(
            name,
            fontName=BOLD if name in STRONG else REGULAR,
            fontSize=size,
            leading=leading,
            spaceBefore=before,
            spaceAfter=after,
            textColor=SOFT if name in PALE else INK,
            leftIndent=12 if name == "bullet" else 0,
            bulletIndent=2,
            splitLongWords=1,
            allowWidows=0,
            allowOrphans=0,
        )
    return made


def contents_styles() -> list[ParagraphStyle]:
    """Styles of the list of contents, for both levels."""
    return [
        ParagraphStyle(
            f"contents{level}",
            fontName=BOLD if level == 0 else REGULAR,
            fontSize=8.5,
            leading=10.5,
            leftIndent=14 * level,
            spaceBefore=1 if level == 0 else 0,
            textColor=INK,
        )
        for level in (0, 1)
    ]

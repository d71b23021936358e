"""One type scale, built on the size that the system gives its own text."""

from __future__ import annotations

from functools import lru_cache
from typing import Literal

from PySide6.QtGui import QFont, QFontMetrics, QGuiApplication

Level = Literal["small", "body", "strong", "title", "figure"]
#: Height of a line of body text for which widths in `spacing` were chosen, px.
USUAL_LINE = 18
#: Size as a share of the system's, and weight.
LEVELS: dict[Level, tuple[float, QFont.Weight]] = {
    "small": (0.9, QFont.Weight.Normal),
    "body": (1.0, QFont.Weight.Normal),
    "strong": (1.0, QFont.Weight.DemiBold),
    "title": (1.12, QFont.Weight.DemiBold),
    "figure": (1.45, QFont.Weight.DemiBold),
}


def font(level: Level = "body") -> QFont:
    """A font of the scale, with figures of equal width so that columns of numbers stand in line."""
    return QFont(_made(level, QGuiApplication.font()))


def widened(width: int, most: float = 1.4) -> int:
    """A width chosen for type of the usual size, wider for larger type, up to `most` times."""
    return round(width * min(max(QFontMetrics(font()).height() / USUAL_LINE, 1.0), most))


def base_size() -> float:
    """Point size of body text."""
    size = QGuiApplication.font().pointSizeF()
    return size if size > 0 else 9.0


@lru_cache(maxsize=32)
def _made(level: Level, of: QFont) -> QFont:
    """The font of a level, made from the application's; kept, since pictures ask for it at every word."""
    scale, weight = LEVELS[level]
    made = QFont(of)
    made.setPointSizeF(base_size() * scale)
    made.setWeight(weight)
    made.setFeature(QFont.Tag("tnum"), 1)
    return made

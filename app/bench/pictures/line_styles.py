"""How the lines of cases laid over each other are told apart: by dashes and width, and not by colour alone."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtGui import QPen

from app.bench.member.glyphs import pen

#: Dashes of the first, second and third case laid over, in widths of the line, and that width.
STYLES = (((7.0, 3.0), 1.3), ((2.0, 2.0), 1.6), ((9.0, 2.5, 2.0, 2.5), 1.3))


def over_pen(hue: str, number: int, opacity: float = 1.0, thin: bool = False) -> QPen:
    """The pen of the case laid over with a number from 0 on. `thin`: one pixel wide, for curves of thousands of points:
    Qt draws wider ones fifteen times as slowly."""
    dashes, width = STYLES[number % len(STYLES)]
    made = pen(hue, 1.0 if thin else width, Qt.PenStyle.SolidLine, opacity)
    made.setDashPattern([dash * (width if thin else 1.0) for dash in dashes])
    return made

"""Words in pictures: placed, spread so that they do not overlap, and readable over what they lie on."""

from __future__ import annotations

from collections.abc import Sequence
from functools import lru_cache

import numpy as np
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QPaintEngine, QPainter, QPainterPath, QPen

LEFT = Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter
RIGHT = Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
CENTRE = Qt.AlignmentFlag.AlignCenter
#: Where the copies of a word stand that make its rim, pixels.
RIM = ((-2, 0), (2, 0), (0, -2), (0, 2), (-1.4, -1.4), (1.4, -1.4), (-1.4, 1.4), (1.4, 1.4))
#: Files in which text is text: nine copies of a word would be read nine times.
WRITTEN = (QPaintEngine.Type.Pdf, QPaintEngine.Type.SVG)


def put(
    painter: QPainter, x: float, y: float, text: str, colour: str, align: Qt.AlignmentFlag = LEFT
) -> QRectF:
    """Write one line with its middle at `y`, and its left end, right end or middle at `x`. Gives the box it fills."""
    metrics = QFontMetricsF(painter.font())
    width, height = width_of(text, painter.font()), metrics.height()
    left = x - width if align & Qt.AlignmentFlag.AlignRight else x
    if align & Qt.AlignmentFlag.AlignHCenter:
        left = x - width / 2
    box = QRectF(left, y - height / 2, width, height)
    painter.setPen(QColor(colour))
    painter.drawText(QPointF(left, y - height / 2 + metrics.ascent()), text)
    return box


def put_on(
    painter: QPainter,
    x: float,
    y: float,
    text: str,
    colour: str,
    ground: str,
    align: Qt.AlignmentFlag = LEFT,
) -> None:
    """As `put`, with a rim in the ground's colour so that the words can be read over curves and fields."""
    metrics = QFontMetricsF(painter.font())
    width = width_of(text, painter.font())
    left = x - width if align & Qt.AlignmentFlag.AlignRight else x
    if align & Qt.AlignmentFlag.AlignHCenter:
        left = x - width / 2
    base = y - metrics.height() / 2 + metrics.ascent()
    if painter.paintEngine().type() in WRITTEN:
        path = QPainterPath()
        path.addText(QPointF(left, base), painter.font(), text)
        rim = QPen(QColor(ground), 4.0)
        rim.setJoinStyle(Qt.PenJoinStyle.RoundJoin)
        painter.strokePath(path, rim)
    else:  # eight copies around it: a stroked outline of the letters looks the same and took ten times as long
        painter.setPen(QColor(ground))
        for across, up in RIM:
            painter.drawText(QPointF(left + across, base + up), text)
    put(painter, x, y, text, colour, align)


@lru_cache(maxsize=2048)
def width_of(text: str, font: QFont) -> float:
    """Pixels that a line takes. Kept: the same numbers stand on the axes of every picture, and shaping them is slow."""
    return QFontMetricsF(font).horizontalAdvance(text)


def fitted(text: str, font: QFont, width: float) -> str:
    """The text, cut with an ellipsis where it is wider than that."""
    return QFontMetricsF(font).elidedText(text, Qt.TextElideMode.ElideRight, width)


def in_lines(text: str, font: QFont, width: float, most: int) -> list[str]:
    """The text in at most so many lines no wider than that, broken between words; what is left is cut."""
    metrics = QFontMetricsF(font)
    lines: list[str] = []
    for word in text.split():
        joined = f"{lines[-1]} {word}" if lines else word
        if lines and metrics.horizontalAdvance(joined) <= width:
            lines[-1] = joined
        else:
            lines.append(word)
    if len(lines) > most:
        lines = [*lines[: most - 1], " ".join(lines[most - 1 :])]
    return [fitted(line, font, width) for line in lines]


def spread(wanted: Sequence[float], height: float, low: float, high: float) -> list[float]:
    """Middles of labels of one height, as near as may be to where they are wanted, not overlapping, between bounds.

    Where there are more than fit, they are spaced evenly and overlap no more than they must.
    """
    count = len(wanted)
    if not count:
        return []
    if count * height > high - low:
        step = max((high - low - height) / max(count - 1, 1), 0.0)
        by_rank = np.argsort(np.argsort(wanted, kind="stable"), kind="stable")
        return [low + height / 2 + float(rank) * step for rank in by_rank]
    order = np.argsort(wanted, kind="stable")
    # Groups of labels that touch sit about the mean of what their labels want; groups that meet are joined.
    groups: list[tuple[list[int], float]] = []
    for index in order:
        members, centre = [int(index)], float(wanted[int(index)])
        centre = _inside(centre, 1, height, low, high)
        while groups and groups[-1][1] + len(groups[-1][0]) * height / 2 > centre - len(members) * height / 2:
            before, _ = groups.pop()
            members = before + members
            mean = float(np.mean([wanted[i] for i in members]))
            centre = _inside(mean, len(members), height, low, high)
        groups.append((members, centre))
    placed = [0.0] * count
    for members, centre in groups:
        for rank, index in enumerate(members):
            placed[index] = centre + (rank - (len(members) - 1) / 2) * height
    return placed


def _inside(centre: float, count: int, height: float, low: float, high: float) -> float:
    half = count * height / 2
    return min(max(centre, low + half), high - half)

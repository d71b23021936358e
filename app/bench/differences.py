"""The headline figures of the cases laid over the one looked at, and by how much they differ."""

from __future__ import annotations

from PySide6.QtCore import QLineF, QSize
from PySide6.QtGui import QFontMetricsF, QPainter, QPaintEvent
from PySide6.QtWidgets import QSizePolicy, QWidget

from app.bench.pictures.lettering import RIGHT, fitted, put
from app.bench.pictures.line_styles import over_pen
from app.look.fonts import font
from app.look.palette import palette
from app.look.spacing import GAP, SPACE
from app.run_words import Difference

#: Pixels of the sample of a line.
SAMPLE = 26.0
#: One case: its name, number (which is its line style), its differences, or why there are none.
Block = tuple[str, int, tuple[Difference, ...], str]


class Differences(QWidget):
    """Under each case its figures, in rows: name, value, difference."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.blocks: tuple[Block, ...] = ()
        self.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)
        self.hide()

    def tell(self, blocks: tuple[Block, ...]) -> None:
        if blocks == self.blocks:
            return
        self.blocks = blocks
        self.setVisible(bool(blocks))
        lines = [
            f"{name}: {tells or ', '.join(f'{d.name} {d.figure} {d.share}' for d in rows)}"
            for name, _number, rows, tells in blocks
        ]
        self.setAccessibleName("Differences. " + "; ".join(lines))
        self.setToolTip("Differences are shares of the value of the case looked at.")
        self.updateGeometry()
        self.update()

    def _line(self) -> float:
        return QFontMetricsF(font("body")).height()

    def sizeHint(self) -> QSize:
        rows = sum(1 + max(len(d), 1) for _, _, d, _ in self.blocks)
        return QSize(160, round(rows * self._line() + len(self.blocks) * (GAP + 2) + GAP))

    minimumSizeHint = sizeHint

    def paintEvent(self, event: QPaintEvent) -> None:
        painter, colours, line = QPainter(self), palette(), self._line()
        y = GAP + line / 2
        right = min(self.width() - SPACE, 20 * line)
        for name, number, rows, tells in self.blocks:
            painter.setPen(over_pen(colours.ink, number))
            painter.drawLine(QLineF(SPACE, y, SPACE + SAMPLE, y))
            painter.setFont(font("strong"))
            start = SPACE + SAMPLE + 6
            put(painter, start, y, fitted(name, painter.font(), self.width() - start - SPACE), colours.ink)
            painter.setFont(font("body"))
            y += line
            if tells:
                put(
                    painter,
                    SPACE,
                    y,
                    fitted(tells, painter.font(), self.width() - 2 * SPACE),
                    colours.soft_ink,
                )
                y += line
            metrics = QFontMetricsF(painter.font())
            share = metrics.horizontalAdvance("+000 %") + 8
            for row in rows:
                value = put(painter, right - share, y, row.figure, colours.ink, RIGHT)
                put(painter, right, y, row.share, colours.ink, RIGHT)
                room = value.left() - SPACE - 6
                put(painter, SPACE, y, fitted(row.name, painter.font(), room), colours.soft_ink)
                y += line
            y += GAP + 2

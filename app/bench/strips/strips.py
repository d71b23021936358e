"""The strips under the x-t diagram, one under the other, with the chips that choose them above."""

from __future__ import annotations

from PySide6.QtCore import QSize
from PySide6.QtGui import QResizeEvent
from PySide6.QtWidgets import QWidget

from app.bench.strips.chips import StripChips
from app.bench.strips.strip import Strip
from app.document import Document
from app.laid_over import LaidOver
from app.sight import Sight
from app.solving import Solution

#: Pixels in width and height below which strips cannot be read.
LEAST = QSize(280, 150)


class Strips(QWidget):
    def __init__(
        self,
        document: Document,
        sight: Sight,
        solution: Solution,
        parent: QWidget | None = None,
        laid_over: LaidOver | None = None,
    ) -> None:
        super().__init__(parent)
        self._ring, self._laid_over = (document, sight, solution), laid_over
        self._sight = sight
        self._shown: list[Strip] = []
        self.chips = StripChips(document, sight, self)
        sight.changed.connect(self._look_again)
        self._look_again()

    def shown(self) -> tuple[Strip, ...]:
        """The strips, from top to bottom."""
        return tuple(self._shown)

    def minimumSizeHint(self) -> QSize:
        return LEAST + QSize(0, self.chips.minimumSizeHint().height())

    def resizeEvent(self, event: QResizeEvent) -> None:
        self._lay_out()

    def _look_again(self) -> None:
        wanted = self._sight.strips
        if tuple(strip.name for strip in self._shown) == wanted:
            return
        for strip in self._shown:
            strip.hide()
            strip.deleteLater()
        self._shown = [Strip(name, name == wanted[-1], *self._ring, self, self._laid_over) for name in wanted]
        self._lay_out()
        for strip in self._shown:
            strip.show()

    def _lay_out(self) -> None:
        """Plots of equal height, whatever the margins of their strips."""
        chips = self.chips.minimumSizeHint().height()
        self.chips.setGeometry(0, 0, self.width(), chips)
        margins = [strip.margins() for strip in self._shown]
        free = self.height() - chips - sum(m.header + m.bottom for m in margins)
        top = float(chips)
        for strip, margin in zip(self._shown, margins, strict=True):
            bottom = top + margin.header + margin.bottom + free / len(self._shown)
            strip.setGeometry(0, round(top), self.width(), round(bottom) - round(top))
            top = bottom

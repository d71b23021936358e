"""The pages of a PDF one under the other, each drawn when it comes into view."""

from __future__ import annotations

from collections import OrderedDict
from typing import TYPE_CHECKING

from PySide6.QtCore import QRectF, Qt
from PySide6.QtGui import QColor, QImage, QPainter, QPaintEvent, QResizeEvent
from PySide6.QtWidgets import QAbstractScrollArea, QWidget

from app.look.colours import PRINT
from app.look.palette import palette
from app.look.spacing import WIDE

if TYPE_CHECKING:
    from pypdfium2 import PdfDocument

#: Pages kept as pictures.
KEPT = 12
WIDEST = 860


class Pages(QAbstractScrollArea):
    """Shows `pdf`; keeps its place while a new one of the same report comes in."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setAccessibleName("Pages of the report")
        self.setFrameShape(QAbstractScrollArea.Shape.StyledPanel)  # the look draws it, where it has the focus
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self._document: PdfDocument | None = None
        self._sizes: list[tuple[float, float]] = []
        self._kept: OrderedDict[tuple[int, int], QImage] = OrderedDict()

    @property
    def count(self) -> int:
        return len(self._sizes)

    def show_pdf(self, pdf: bytes) -> None:
        """Show other pages."""
        if self._document is not None:
            self._document.close()
        self._document = _opened(pdf) if pdf else None
        self._sizes = []
        if self._document is not None:
            self._sizes = [self._document.get_page_size(n) for n in range(len(self._document))]
        self._kept.clear()
        self._measure()
        self.viewport().update()

    def resizeEvent(self, event: QResizeEvent) -> None:
        self._measure()
        super().resizeEvent(event)

    def paintEvent(self, event: QPaintEvent) -> None:
        painter = QPainter(self.viewport())
        painter.fillRect(event.rect(), QColor(palette().window))
        top = float(WIDE - self.verticalScrollBar().value())
        wide = self._width()
        left = (self.viewport().width() - wide) / 2
        for number, (width, height) in enumerate(self._sizes):
            high = wide * height / width
            if top + high > 0 and top < self.viewport().height():
                place = QRectF(left, top, wide, high)
                painter.fillRect(place, QColor(PRINT.paper))
                painter.drawImage(place, self._picture(number))
                painter.setPen(QColor(palette().edge))
                painter.drawRect(place)
            top += high + WIDE

    def _width(self) -> float:
        return float(max(min(self.viewport().width() - 2 * WIDE, WIDEST), 100))

    def _measure(self) -> None:
        wide = self._width()
        whole = sum(wide * h / w + WIDE for w, h in self._sizes) + WIDE
        bar = self.verticalScrollBar()
        bar.setRange(0, max(0, round(whole) - self.viewport().height()))
        bar.setPageStep(self.viewport().height())
        bar.setSingleStep(60)

    def _picture(self, number: int) -> QImage:
        assert self._document is not None
        pixels = round(self._width() * self.devicePixelRatioF())
        key = (number, pixels)
        if key not in self._kept:
            scale = pixels / self._sizes[number][0]
            drawn = self._document[number].render(scale=scale, rev_byteorder=True).to_numpy()
            high, wide, channels = drawn.shape
            kind = QImage.Format.Format_RGB888 if channels == 3 else QImage.Format.Format_RGBX8888
            self._kept[key] = QImage(drawn.tobytes(), wide, high, channels * wide, kind).copy()
        self._kept.move_to_end(key)
        while len(self._kept) > KEPT:
            self._kept.popitem(last=False)
        return self._kept[key]


def _opened(pdf: bytes) -> PdfDocument:
    from pypdfium2 import PdfDocument  # not before somebody looks at a report

    return PdfDocument(pdf)

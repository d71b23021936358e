"""One finding: a large figure with its name, details under it in as many lines as they need."""

from __future__ import annotations

from PySide6.QtCore import QEvent, QRectF, QSize, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QPainter, QPaintEvent, QResizeEvent
from PySide6.QtWidgets import QAbstractButton, QSizePolicy, QWidget

from app.look.fonts import font
from app.look.palette import palette
from app.look.spacing import RADIUS, SPACE


class FindingRow(QAbstractButton):
    """A button, so that it is reached and pressed by keyboard and read aloud; it looks like text."""

    def __init__(
        self, figure: str, name: str, detail: str, state: str | None = None, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._figure, self._name, self._detail, self._state = figure, name, detail, state
        self.setText(" ".join(part for part in (figure, name, detail.replace("\n", "; ")) if part))
        self.setAccessibleName(self.text())
        self.setFocusPolicy(Qt.FocusPolicy.NoFocus)
        policy = QSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)
        policy.setHeightForWidth(True)
        self.setSizePolicy(policy)

    def leads_somewhere(self) -> None:
        """It can be clicked: shown by the pointer, and reached with Tab."""
        self.setCursor(Qt.CursorShape.PointingHandCursor)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setToolTip("Show where and when")

    def sizeHint(self) -> QSize:
        width = self.width() if self.width() > 40 else 220
        return QSize(width, self.heightForWidth(width))

    def hasHeightForWidth(self) -> bool:
        return True

    def heightForWidth(self, width: int) -> int:
        head = self._head_height(width)
        return round(head + self._detail_box(width, head).height() + 6)

    def resizeEvent(self, event: QResizeEvent) -> None:
        super().resizeEvent(event)
        self.updateGeometry()

    def changeEvent(self, event: QEvent) -> None:
        super().changeEvent(event)
        self.updateGeometry()

    def paintEvent(self, event: QPaintEvent) -> None:
        colours, painter = palette(), QPainter(self)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        box = QRectF(self.rect()).adjusted(2.5, 0.5, -2.5, -0.5)
        if (
            self.underMouse() and self.cursor().shape() == Qt.CursorShape.PointingHandCursor
        ) or self.isDown():
            painter.setPen(Qt.PenStyle.NoPen)
            painter.setBrush(QColor(colours.accent_soft))
            painter.drawRoundedRect(box, RADIUS, RADIUS)
        if self.hasFocus():
            painter.setPen(QColor(colours.accent))
            painter.setBrush(Qt.BrushStyle.NoBrush)
            painter.drawRoundedRect(box, RADIUS, RADIUS)
        if not self.isEnabled():
            painter.setOpacity(0.35)
        head = self._head_height(self.width())
        if self._figure:
            self._paint_head(painter, head)
        painter.setFont(font("body"))
        urgent = self._state in ("near", "over") or self._detail.startswith("✕")
        painter.setPen(QColor(colours.ink if urgent else colours.soft_ink))
        painter.drawText(self._detail_box(self.width(), head), _WRAPPED, self._detail)

    def _paint_head(self, painter: QPainter, head: float) -> None:
        """The figure, and its name beside it or, where that is too narrow, under it."""
        colours, large = palette(), QFontMetricsF(font("figure"))
        baseline = 2 + large.ascent()
        painter.setFont(font("figure"))
        painter.setPen(QColor(colours.ink))
        painter.drawText(SPACE, round(baseline), self._figure)
        painter.setFont(font("body"))
        if head > large.height() + 3:
            painter.drawText(SPACE, round(head - QFontMetricsF(painter.font()).descent()), self._name)
        else:
            x = SPACE + large.horizontalAdvance(self._figure) + 6
            painter.drawText(round(x), round(baseline), self._name)

    def _head_height(self, width: int) -> float:
        if not self._figure:
            return 2.0
        large, body = QFontMetricsF(font("figure")), QFontMetricsF(font("body"))
        needed = large.horizontalAdvance(self._figure) + 6 + body.horizontalAdvance(self._name) + 2 * SPACE
        return 2 + large.height() + (body.height() if needed > width else 0)

    def _detail_box(self, width: int, top: float) -> QRectF:
        metrics = QFontMetricsF(font("body"))
        room = QRectF(SPACE, top, max(width - 2 * SPACE, 20), 10_000)
        return metrics.boundingRect(room, _WRAPPED, self._detail)


_WRAPPED = int(Qt.TextFlag.TextWordWrap | Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignTop)

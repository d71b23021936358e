"""One finding: a large figure with its name, details under it in as many lines as they need."""

from __future__ import annotations

from dataclasses import dataclass

from PySide6.QtCore import QEvent, QRectF, QSize, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QPainter, QPaintEvent, QResizeEvent
from PySide6.QtWidgets import QAbstractButton, QSizePolicy, QWidget

from app.look.fonts import font
from app.look.palette import palette
from app.look.spacing import RADIUS, SPACE


@dataclass(frozen=True)
class Told:
    """What a row says. `leads`: what a click changes in the sight; `stands`: it holds whatever is entered now; `brief`:
    the detail in one short line, for where there is little room."""

    figure: str = ""
    name: str = ""
    detail: str = ""
    state: str | None = None
    leads: tuple[tuple[str, object], ...] = ()
    stands: bool = False
    brief: str = ""


class FindingRow(QAbstractButton):
    """A button, so that it is reached and pressed by keyboard and read aloud; it looks like text."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.told = Told()
        self._tight = False
        policy = QSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)
        policy.setHeightForWidth(True)
        self.setSizePolicy(policy)

    def tell(self, told: Told) -> None:
        """Show a finding. One that leads somewhere has the pointing hand, and is reached with Tab."""
        if told == self.told:
            return
        self.told = told
        parts = (told.figure, told.name, told.detail.replace("\n", "; "))
        self.setText(" ".join(part for part in parts if part))
        self.setAccessibleName(self.text())
        leads = bool(told.leads)
        self.setCursor(Qt.CursorShape.PointingHandCursor if leads else Qt.CursorShape.ArrowCursor)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus if leads else Qt.FocusPolicy.NoFocus)
        self._tell_more()
        self.updateGeometry()

    def set_tight(self, tight: bool) -> None:
        """Say the detail in brief, where there is a brief form; all of it is in the tool tip then."""
        if tight != self._tight:
            self._tight = tight
            self._tell_more()
            self.updateGeometry()
            self.update()

    def _tell_more(self) -> None:
        leads = "Show where and when" if self.told.leads else ""
        cut = self.told.detail if self._tight and self.told.brief else ""
        self.setToolTip("\n".join(part for part in (cut, leads) if part))

    def _detail(self) -> str:
        return self.told.brief if self._tight and self.told.brief else self.told.detail

    def sizeHint(self) -> QSize:
        width = self.width() if self.width() > 40 else 220
        return QSize(width, self.heightForWidth(width))

    def hasHeightForWidth(self) -> bool:
        return True

    def heightForWidth(self, width: int) -> int:
        head = self._head_height(width)
        return round(head + self._detail_box(width, head).height() + (2 if self._tight else 6))

    def full_height(self, width: int) -> int:
        """Height with the whole detail."""
        head = self._head_height(width)
        return round(head + self._detail_box(width, head, self.told.detail).height() + 6)

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
        if self.told.figure:
            self._paint_head(painter, head)
        painter.setFont(font("body"))
        urgent = self.told.state in ("near", "over") or self.told.detail.startswith("✕")
        painter.setPen(QColor(colours.ink if urgent else colours.soft_ink))
        box = self._detail_box(self.width(), head)
        words = in_parts(self._detail(), QFontMetricsF(painter.font()), self.width() - 2 * SPACE)
        painter.drawText(box, _WRAPPED, words)

    def _paint_head(self, painter: QPainter, head: float) -> None:
        """The figure, and its name beside it or, where that is too narrow, under it."""
        colours, large = palette(), QFontMetricsF(font("figure"))
        baseline = 2 + large.ascent()
        painter.setFont(font("figure"))
        painter.setPen(QColor(colours.ink))
        painter.drawText(SPACE, round(baseline), self.told.figure)
        painter.setFont(font("body"))
        if head > large.height() + 3:
            painter.drawText(SPACE, round(head - QFontMetricsF(painter.font()).descent()), self.told.name)
        else:
            x = SPACE + large.horizontalAdvance(self.told.figure) + 6
            painter.drawText(round(x), round(baseline), self.told.name)

    def _head_height(self, width: int) -> float:
        if not self.told.figure:
            return 2.0
        large, body = QFontMetricsF(font("figure")), QFontMetricsF(font("body"))
        needed = (
            large.horizontalAdvance(self.told.figure) + 6 + body.horizontalAdvance(self.told.name) + 2 * SPACE
        )
        return 2 + large.height() + (body.height() if needed > width else 0)

    def _detail_box(self, width: int, top: float, detail: str | None = None) -> QRectF:
        metrics = QFontMetricsF(font("body"))
        room = QRectF(SPACE, top, max(width - 2 * SPACE, 20), 10_000)
        words = self._detail() if detail is None else detail
        return metrics.boundingRect(room, _WRAPPED, in_parts(words, metrics, room.width()))


def in_parts(detail: str, metrics: QFontMetricsF, width: float) -> str:
    """A detail that does not fit into a line is broken between its parts ("within the limit · where and when")."""
    lines = []
    for line in detail.split("\n"):
        fits = metrics.horizontalAdvance(line) <= width
        lines.append(line if fits else line.replace(" · ", "\n"))
    return "\n".join(lines)


_WRAPPED = int(Qt.TextFlag.TextWordWrap | Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignTop)

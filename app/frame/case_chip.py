"""The button of one case, which can be dragged to another place among the others."""

from __future__ import annotations

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QKeyEvent, QMouseEvent
from PySide6.QtWidgets import QApplication, QPushButton, QWidget


class CaseChip(QPushButton):
    """`dragged` carries the pointer's x in the parent while it is dragged, `None` when that is over or broken off."""

    dragged = Signal(object)
    #: Let go at this x in the parent.
    dropped = Signal(int)
    #: Alt with an arrow key: -1 to the left, 1 to the right.
    shifted = Signal(int)

    def __init__(self, name: str, parent: QWidget | None) -> None:
        super().__init__(parent)
        self._from: int | None = None
        self._dragging = False
        self.setProperty("role", "chip")
        self.setCheckable(True)
        self.setAccessibleName(f"Case {name}")
        self.setToolTip(
            f"{name}\nDrag it to another place, or press Alt with an arrow key.\n"
            "Right-click to rename, copy, move or remove it."
        )

    def mousePressEvent(self, event: QMouseEvent) -> None:
        if event.button() == Qt.MouseButton.LeftButton:
            self._from = event.position().toPoint().x()
        super().mousePressEvent(event)

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        x = event.position().toPoint().x()
        if self._from is not None and abs(x - self._from) >= QApplication.startDragDistance():
            self._dragging = True
            self.setDown(False)
        if self._dragging:
            self.setCursor(Qt.CursorShape.ClosedHandCursor)
            self.dragged.emit(self.mapToParent(event.position().toPoint()).x())
        else:
            super().mouseMoveEvent(event)

    def mouseReleaseEvent(self, event: QMouseEvent) -> None:
        dragging = self._dragging
        self._end()
        if dragging:
            self.dropped.emit(self.mapToParent(event.position().toPoint()).x())
        else:
            super().mouseReleaseEvent(event)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        key, alt = event.key(), event.modifiers() & Qt.KeyboardModifier.AltModifier
        if key == Qt.Key.Key_Escape and self._dragging:
            self._end()
            self.setDown(False)
        elif alt and key in (Qt.Key.Key_Left, Qt.Key.Key_Right):
            self.shifted.emit(-1 if key == Qt.Key.Key_Left else 1)
        else:
            super().keyPressEvent(event)

    def _end(self) -> None:
        self._from = None
        if self._dragging:
            self._dragging = False
            self.unsetCursor()
            self.dragged.emit(None)

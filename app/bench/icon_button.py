"""A quiet button with a picture in place of words, which its tooltip and its accessible name tell."""

from __future__ import annotations

from PySide6.QtCore import QEvent
from PySide6.QtWidgets import QToolButton, QWidget

from app.look import icon
from app.look.spacing import FIELD


class IconButton(QToolButton):
    """As high as a field. Draws its picture anew where the palette changes."""

    def __init__(self, picture: str, words: str, parent: QWidget) -> None:
        super().__init__(parent)
        self._picture = picture
        self.setProperty("role", "quiet")
        self.setFixedHeight(FIELD)
        self.setAccessibleName(words)
        self.setToolTip(words)
        self.setIcon(icon(picture))

    def changeEvent(self, event: QEvent) -> None:
        if event.type() == QEvent.Type.PaletteChange:
            self.setIcon(icon(self._picture))
        super().changeEvent(event)

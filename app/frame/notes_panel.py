"""The project's notes, under the top bar: what a demo shows, what a project is about. Typed in place."""

from __future__ import annotations

from PySide6.QtCore import QEvent, Qt, QTimer, Signal
from PySide6.QtGui import QFocusEvent, QResizeEvent
from PySide6.QtWidgets import QFrame, QHBoxLayout, QPlainTextEdit, QToolButton, QWidget

from app.document import Document
from app.look import icon
from app.look.spacing import GAP, SPACE

#: Typed text becomes an edit after a pause of this length, ms.
PAUSE = 600
FEWEST, MOST = 2, 4
#: Margins and frame of the field above and below its text, px.
FRAME = 14


class NotesField(QPlainTextEdit):
    """Shows and edits `/notes`; as high as its text, from two to four lines."""

    def __init__(self, document: Document, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self.setProperty("role", "notes")
        self.setPlaceholderText("Notes on this project")
        self.setAccessibleName("Notes on this project")
        self.setTabChangesFocus(True)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)  # lines are wrapped
        self._pause = QTimer(self, singleShot=True, interval=PAUSE)
        self._pause.timeout.connect(self.commit)
        self.textChanged.connect(self._typed)
        document.changed.connect(self._follow)
        self._follow()
        self._fit()

    def commit(self) -> None:
        """Hand over what is typed."""
        self._pause.stop()
        text = self.toPlainText()
        if text != self._document.project.notes:
            self._document.edit("Write notes", "/notes", text, merge="/notes")

    def focusOutEvent(self, event: QFocusEvent) -> None:
        self.commit()
        super().focusOutEvent(event)

    def resizeEvent(self, event: QResizeEvent) -> None:
        super().resizeEvent(event)
        self._fit()

    def _typed(self) -> None:
        self._fit()
        if self.toPlainText() != self._document.project.notes:
            self._pause.start()

    def _follow(self) -> None:
        notes = self._document.project.notes
        if not self._pause.isActive() and self.toPlainText() != notes:
            self.setPlainText(notes)

    def _fit(self) -> None:
        all_lines = round(self.document().size().height())
        lines = min(max(all_lines, FEWEST), MOST)
        below = 0 if all_lines > lines else FRAME // 2  # no sliver of the next line
        self.setFixedHeight(lines * self.fontMetrics().lineSpacing() + FRAME // 2 + below)


class NotesPanel(QFrame):
    """The notes with a button that folds them away."""

    closed = Signal()

    def __init__(self, document: Document, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setProperty("role", "paper")
        row = QHBoxLayout(self)
        row.setContentsMargins(SPACE, GAP, GAP, GAP)
        self.field = NotesField(document, self)
        row.addWidget(self.field, 1)
        self._away = QToolButton(self)
        self._away.setProperty("role", "quiet")
        self._away.setToolTip("Fold the notes away (they are in the View menu)")
        self._away.setAccessibleName("Fold the notes away")
        self._away.clicked.connect(self.closed)
        row.addWidget(self._away)
        self._away.setIcon(icon("close"))

    def changeEvent(self, event: QEvent) -> None:
        if event.type() == QEvent.Type.PaletteChange:
            self._away.setIcon(icon("close"))
        super().changeEvent(event)

    def commit(self) -> None:
        """Hand over what is typed."""
        self.field.commit()

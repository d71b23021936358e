"""The check of the mesh, on request: the same case on elements half as long, solved beside the window."""

from __future__ import annotations

from collections.abc import Callable, Iterator

from PySide6.QtCore import Qt, Signal
from PySide6.QtWidgets import QLabel, QPushButton, QVBoxLayout, QWidget

from app.aside import Aside, Cancel
from app.look.spacing import SPACE
from app.run_words import on_a_finer_mesh
from solver import MeshCheck, Result, check_mesh

Check = Callable[..., MeshCheck]


class MeshView(QWidget):
    """A link that asks for the check, and under it what came of it. The answer goes with the result it belongs to.
    `said`: there are other words under it."""

    said = Signal()

    def __init__(self, parent: QWidget | None = None, check: Check = check_mesh) -> None:
        super().__init__(parent)
        self._check = check
        self._result: Result | None = None
        self.link = QPushButton("Check the mesh")
        self.link.setProperty("role", "link")
        self.link.setCursor(Qt.CursorShape.PointingHandCursor)
        self.link.setToolTip(
            "Solves the case once more on elements half as long, and says by how much the figures change."
        )
        self.link.clicked.connect(self.ask)
        self.answer = QLabel()
        self.answer.setProperty("role", "soft")
        self.answer.setWordWrap(True)
        self.answer.setTextFormat(Qt.TextFormat.PlainText)
        self.answer.hide()
        self._aside = Aside(self)
        self._aside.found.connect(self._take)
        self._aside.ended.connect(self._end)
        column = QVBoxLayout(self)
        column.setContentsMargins(SPACE, 2, SPACE, 2)
        column.setSpacing(0)
        column.addWidget(self.link, 0, Qt.AlignmentFlag.AlignLeft)
        column.addWidget(self.answer)

    def follow(self, result: Result | None) -> None:
        """Belong to a result; what was found for another one is dropped."""
        if result is not self._result:
            self._aside.drop()
            self._result = result
            self._say("")
        self.link.setEnabled(result is not None and result.finished)

    def ask(self) -> None:
        result, check = self._result, self._check
        if result is None or not result.finished:
            return

        def work(cancel: Cancel) -> Iterator[MeshCheck]:
            yield check(result, cancel=cancel)

        self._say("Solving on elements half as long …")
        self._aside.start(work)

    def drop(self) -> None:
        """Break off a check under way."""
        self._aside.drop()

    def close_work(self) -> bool:
        return self._aside.close()

    def _take(self, found: MeshCheck) -> None:
        self._say(on_a_finer_mesh(found))

    def _end(self, sentence: str) -> None:
        if sentence:
            self._say(f"✕ {sentence}")

    def _say(self, words: str) -> None:
        if self.answer.text() != words:
            self.answer.setText(words)
            self.answer.setVisible(bool(words))
            if words:
                self.said.emit()

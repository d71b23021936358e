"""The state in the top bar, with progress and Stop while solving, and mesh and steps behind a click."""

from __future__ import annotations

from PySide6.QtCore import QPoint, Qt, QTimer
from PySide6.QtWidgets import (
    QFrame,
    QHBoxLayout,
    QLabel,
    QProgressBar,
    QPushButton,
    QToolButton,
    QVBoxLayout,
    QWidget,
)

from app.document import Document
from app.look import icon
from app.look.spacing import GAP, SPACE
from app.solving import Solution
from app.standing import Standing, standing_of
from app.units import units_of
from app.words import quality
from solver.answer.findings import findings_of

#: A run shorter than this shows no progress, ms: text that flickers at every key tells nothing.
UNSEEN = 200


class StateView(QWidget):
    """Says how the pictures stand to the input."""

    def __init__(self, document: Document, solution: Solution, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document, self._solution = document, solution
        row = QHBoxLayout(self)
        row.setContentsMargins(0, 0, 0, 0)
        row.setSpacing(GAP)
        self.progress = QProgressBar(self, maximum=1000, textVisible=False)
        self.progress.setFixedWidth(72)
        self.progress.setAccessibleName("Progress of the run")
        self.words = QToolButton(self)
        self.words.setProperty("role", "quiet")
        self.words.setAccessibleName("State of the solution")
        self.words.clicked.connect(self._show_details)
        self.act = QPushButton(self)
        self.act.clicked.connect(self._act)
        for widget in (self.progress, self.words, self.act):
            row.addWidget(widget)
        self._late = QTimer(self, singleShot=True, interval=UNSEEN)
        self._late.timeout.connect(self._show_now)
        document.changed.connect(self._follow)
        solution.changed.connect(self._follow)
        self._show_now()

    def _follow(self) -> None:
        if standing_of(self._document, self._solution).kind != "solving":
            self._late.stop()
            self._show_now()
        elif self.progress.isVisible():
            self._show_now()
        elif not self._late.isActive():
            self._late.start()

    def _show_now(self) -> None:
        standing = standing_of(self._document, self._solution)
        solving = standing.kind == "solving"
        self.progress.setVisible(solving)
        self.progress.setValue(round(1000 * (standing.fraction or 0)))
        self.act.setVisible(solving or standing.kind in ("stopped", "stale"))
        self.act.setText("Stop" if solving else "Solve again")
        self.act.setIcon(icon("stop") if solving else icon("redo"))
        self.words.setText(standing.word if solving else f"{standing.sign} {standing.word}")
        self.words.setToolTip(standing.tells or "Mesh, steps and energy of the run")

    def _act(self) -> None:
        if self._solution.state == "solving":
            self._solution.stop()
        else:
            self._solution.solve_again()

    def _show_details(self) -> None:
        popup = _details(standing_of(self._document, self._solution), self._document, self._solution, self)
        popup.adjustSize()
        corner = self.words.mapToGlobal(QPoint(self.words.width(), self.words.height() + GAP))
        popup.move(corner - QPoint(popup.width(), 0))
        popup.show()


def _details(standing: Standing, document: Document, solution: Solution, parent: QWidget) -> QFrame:
    popup = QFrame(parent, Qt.WindowType.Popup)
    popup.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
    popup.setProperty("role", "popup")
    column = QVBoxLayout(popup)
    column.setContentsMargins(SPACE * 2, SPACE, SPACE * 2, SPACE)
    lines = [standing.tells] if standing.tells else []
    if solution.result is not None:
        lines += quality(findings_of(solution.result).quality, units_of(document.project))
        lines.append(f"Solved in {1000 * solution.result.solve_seconds:.0f} ms.")
    for line in lines:
        label = QLabel(line, popup)
        label.setWordWrap(len(line) > 70)
        label.setMaximumWidth(460)
        column.addWidget(label)
    return popup

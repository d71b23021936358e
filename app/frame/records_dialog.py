"""The dialog of gauge records: which, in what units and sign, how often and how written, with a live preview."""

from __future__ import annotations

from pathlib import Path

from PySide6.QtCore import Qt, QTimer
from PySide6.QtGui import QCloseEvent, QFontDatabase
from PySide6.QtWidgets import (
    QDialog,
    QFileDialog,
    QHBoxLayout,
    QLabel,
    QPlainTextEdit,
    QPushButton,
    QVBoxLayout,
    QWidget,
)

from app.document import Document
from app.export.record_choices import choices_from_tree
from app.export.record_csv import comment_lines, rows
from app.export.record_files import origin_of, record_names
from app.export.record_table import record_table
from app.frame.notices import Notices
from app.frame.records_fields import RecordsFields
from app.frame.records_work import RecordsWork
from app.look.fonts import base_size, widened
from app.look.spacing import GAP, SPACE
from app.settings import Settings
from app.solving import Solution

#: Rows of numbers in the preview.
SHOWN_ROWS = 14
KEPT = "records"


class RecordsDialog(QDialog):
    """Not modal: the preview follows the project while it is open."""

    def __init__(self, document: Document, solution: Solution, settings: Settings, parent: QWidget) -> None:
        super().__init__(parent)
        self.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
        self.setWindowTitle("Gauge records")
        self.resize(min(widened(1080), 1240), 700)
        self._document, self._solution, self._settings = document, solution, settings
        self._notices: Notices | None = None
        self.work = RecordsWork(self)
        self.fields = RecordsFields(document, choices_from_tree(settings.kept(KEPT)), self)
        self.preview = QPlainTextEdit(self)
        self.preview.setReadOnly(True)
        self.preview.setLineWrapMode(QPlainTextEdit.LineWrapMode.NoWrap)
        letters = QFontDatabase.systemFont(QFontDatabase.SystemFont.FixedFont)
        letters.setPointSizeF(base_size())
        self.preview.setFont(letters)
        self.preview.setToolTip("The head of the file, as it would be written now.")
        self.preview.setAccessibleName("Preview of the file")
        self.state = QLabel(self)
        self.state.setWordWrap(True)
        self.save = QPushButton("Save to a folder…", self)
        self.save.setProperty("role", "main")
        self._compose()
        self._timer = QTimer(self, singleShot=True, interval=120)
        self._timer.timeout.connect(self.show_preview)
        self.fields.changed.connect(self._timer.start)
        self.save.clicked.connect(self._ask)
        self.work.told.connect(self.state.setText)
        self.work.ended.connect(self._end)
        document.changed.connect(self._timer.start)
        solution.changed.connect(self._timer.start)
        self.show_preview()

    def open_for(self, notices: Notices) -> None:
        """Show it; where the records are is said in the window."""
        self._notices = notices
        self.show()
        self.fields.cases.setFocus()

    def _compose(self) -> None:
        right = QVBoxLayout()
        right.setSpacing(GAP)
        label = QLabel("Preview of the case at hand as CSV", self)
        label.setProperty("role", "strong")
        below = QHBoxLayout()
        below.addWidget(self.state, 1)
        below.addWidget(self.save)
        right.addWidget(label)
        right.addWidget(self.preview, 1)
        right.addLayout(below)
        whole = QHBoxLayout(self)
        whole.setContentsMargins(SPACE, SPACE, SPACE, SPACE)
        whole.setSpacing(SPACE)
        whole.addWidget(self.fields)
        whole.addLayout(right, 1)

    def show_preview(self) -> None:
        """The head of the file as it would be written, or the sentence why it cannot be."""
        result, problem = self._solution.result, self.fields.problem
        choices = self.fields.choices
        text = ""
        if result is None or not result.gauges:
            problem = problem or "There is no gauge record of the case at hand yet."
        elif not problem:
            try:
                table = record_table(result, origin_of(self._document.project), choices)
                text = "".join((*comment_lines(table), *rows(table, choices, SHOWN_ROWS))).replace(
                    "\r\n", "\n"
                )
                left = len(table.columns[0].values) - SHOWN_ROWS
                text += f"… {left} more rows\n" if left > 0 else ""
            except ValueError as error:
                problem = str(error)
        if self.preview.toPlainText() != text:
            self.preview.setPlainText(text)
        if not self.work.busy:
            self.state.setText(f"✕ {problem}" if problem else self._files_in_words())
        self.save.setEnabled(not problem and not self.work.busy)

    def _files_in_words(self) -> str:
        cases = self.fields.chosen_cases()
        names = [
            n for case in cases for n in record_names(self._document.project, case.name, self.fields.choices)
        ]
        return f"Writes {', '.join(names[:3])}{' …' if len(names) > 3 else ''}"

    def _ask(self) -> None:
        start = self._document.path.parent if self._document.path else Path.home()
        folder = QFileDialog.getExistingDirectory(self, "Folder for the records", str(start))
        if folder:
            self.write_to(Path(folder))

    def write_to(self, folder: Path) -> None:
        """Write the records of the cases chosen, and keep the choices for the next time."""
        choices = self.fields.choices
        self._settings.keep(KEPT, choices.to_tree() | {"cases": None, "gauges": None})
        result = self._solution.result if self._solution.state == "fresh" else None
        self.work.start(self._document.project, self.fields.chosen_cases(), result, choices, folder)
        self.save.setEnabled(False)

    def _end(self, sentence: str, well: bool) -> None:
        self.state.setText(f"{'✓' if well else '✕'} {sentence}")
        self.save.setEnabled(True)
        if self._notices is not None:
            self._notices.show_notice("records", sentence, "tell" if well else "over")

    def closeEvent(self, event: QCloseEvent) -> None:
        self.work.stop()
        super().closeEvent(event)

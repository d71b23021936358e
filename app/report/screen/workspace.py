"""The workspace: choices on the left, the pages as they will be printed on the right, and where they go."""

from __future__ import annotations

from pathlib import Path

from PySide6.QtCore import Signal
from PySide6.QtGui import QHideEvent, QShowEvent
from PySide6.QtWidgets import QFileDialog, QFrame, QHBoxLayout, QLabel, QPushButton, QVBoxLayout, QWidget

from app.disk import why_not
from app.document import Document
from app.export import folder_names
from app.look.spacing import GAP, SPACE
from app.report.screen.choices_form import ChoicesForm
from app.report.screen.pages import Pages
from app.report.screen.work import ReportWork
from app.units import units_of


class ReportSpace(QWidget):
    """Solves and lays out only while it is shown; `close_down` ends its thread. `told` says a sentence and a state."""

    told = Signal(str, str)

    def __init__(self, document: Document, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self.work = ReportWork(document, self)
        self.form = ChoicesForm(document, self)
        self.pages = Pages(self)
        self.state = QLabel()
        self.pdf = QPushButton("Save as PDF…")
        self.pdf.setProperty("role", "main")
        self.html = QPushButton("Save as HTML…")
        self.figures = QPushButton("Save the figures…")
        self.figures.setToolTip(
            "Each figure as SVG, PDF and PNG (300 DPI), in a folder; the waves of each case as GIF"
        )
        self._shown = b""
        self._compose()
        self.pdf.clicked.connect(lambda: self._ask("pdf"))
        self.html.clicked.connect(lambda: self._ask("html"))
        self.figures.clicked.connect(self._ask_folder)
        self.work.changed.connect(self.follow)
        self.follow()

    def _compose(self) -> None:
        top = QHBoxLayout()
        top.setSpacing(SPACE)
        top.addWidget(self.state, 1)
        for button in (self.figures, self.html, self.pdf):
            top.addWidget(button)
        paper = QFrame()
        paper.setProperty("role", "paper")
        column = QVBoxLayout(paper)
        column.setContentsMargins(SPACE, SPACE, SPACE, SPACE)
        column.setSpacing(GAP)
        column.addLayout(top)
        column.addWidget(self.pages, 1)
        row = QHBoxLayout(self)
        row.setContentsMargins(0, 0, 0, 0)
        row.setSpacing(SPACE)
        row.addWidget(self.form)
        row.addWidget(paper, 1)

    def showEvent(self, event: QShowEvent) -> None:
        self.work.look(True)
        super().showEvent(event)

    def hideEvent(self, event: QHideEvent) -> None:
        self.form.take_words()
        self.work.look(False)
        super().hideEvent(event)

    def close_down(self) -> bool:
        """End the thread; False where it did not end in time."""
        self.pages.show_pdf(b"")
        return self.work.close()

    def follow(self) -> None:
        """Show the newest pages, and how they stand to the project."""
        work = self.work
        ready = work.state == "fresh"
        words = {
            "waiting": "",
            "working": f"{work.message} …",
            "failed": f"✕ {work.message}",
            "fresh": "",
        }[work.state]
        if work.pdf is not self._shown:
            self._shown = work.pdf
            self.pages.show_pdf(work.pdf)
        if ready:
            words = f"✓ {self.pages.count} pages, up to date"
        self.state.setText(words)
        for button in (self.pdf, self.html, self.figures):
            button.setEnabled(ready)

    def _ask(self, ending: str) -> None:
        name = f"{folder_names([self._document.project.title or 'report'])[0]}.{ending}"
        folder = self._document.path.parent if self._document.path else Path.home()
        asked, _ = QFileDialog.getSaveFileName(
            self, "Save the report", str(folder / name), f"{ending.upper()} (*.{ending})"
        )
        if asked:
            path = Path(asked)
            self.save(path if path.suffix else path.with_suffix(f".{ending}"))

    def save(self, path: Path) -> bool:
        """Write the report that is shown, and say where it is."""
        from app.report.files import write_report

        if self.work.report is None:
            return False
        try:
            write_report(self.work.report, path, self.work.date)
        except OSError as error:
            self.told.emit(f"The report cannot be written to {path}: {why_not(error, path)}.", "over")
            return False
        self.told.emit(f"The report is in {path}.", "tell")
        return True

    def _ask_folder(self) -> None:
        folder = self._document.path.parent if self._document.path else Path.home()
        asked = QFileDialog.getExistingDirectory(self, "Folder for the figures", str(folder))
        if asked:
            self.save_figures(Path(asked))

    def save_figures(self, folder: Path) -> bool:
        """Write every figure of the report, and say where they are."""
        from app.report.animation import write_animations
        from app.report.figure_files import write_figures

        if self.work.report is None:
            return False
        try:
            written = write_figures(self.work.report, folder, self.work.date)
            written += write_animations(self.work.cases, units_of(self._document.project), folder)
        except OSError as error:
            self.told.emit(f"The figures cannot be written to {folder}: {why_not(error, folder)}.", "over")
            return False
        self.told.emit(f"{len(written)} files of figures are in {folder}.", "tell")
        return True

"""Asks where to save the page and the table, and says where they are."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

from PySide6.QtCore import QObject, Signal
from PySide6.QtWidgets import QFileDialog, QWidget

from app.document import Document
from app.export import folder_names
from app.set_sheet.answer_words import told_of
from app.set_sheet.depth_files import depth_csv
from app.set_sheet.depth_solution import DepthSolution
from app.set_sheet.files import Answers, sheet_csv
from app.set_sheet.sheet_solution import SheetSolution
from app.units import units_of


class Saving(QObject):
    """`told` carries a sentence and its state, "over" where something failed."""

    told = Signal(str, str)

    def __init__(
        self, document: Document, solution: SheetSolution, depth: DepthSolution, parent: QWidget
    ) -> None:
        super().__init__(parent)
        self._document, self._solution, self._depth, self._window = document, solution, depth, parent

    def ask_page(self) -> bool:
        return self._ask("Save the page for the rig", "sheet.pdf", "PDF (*.pdf)", self.page)

    def ask_table(self) -> bool:
        return self._ask("Save the table", "sheet.csv", "CSV (*.csv)", self.table)

    def page(self) -> bytes:
        """The page of what is on the screen."""
        from app.set_sheet.printed import Page, page_pdf  # with what prints, which takes its time to be read

        sheet, units = self._solution.sheet, units_of(self._document.project)
        assert sheet is not None
        found, sampled, depths = self._solution.answers, self._solution.sampled, self._depth.fresh
        answers = Answers(found.stop_at, found.largest, sampled, depths, self._depth.problem, found.shown)
        title, per = self._document.project.title, self._solution.settings.per
        return page_pdf(Page(sheet, title, units, told_of(answers, sheet, units), per, sampled, depths))

    def table(self) -> bytes:
        """The table of what is on the screen, in SI units."""
        sheet = self._solution.sheet
        assert sheet is not None
        return sheet_csv(sheet, self._document.project.title).encode("utf-8")

    def ask_depths(self) -> bool:
        return self._ask("Save the table over depth", "depth.csv", "CSV (*.csv)", self.depths)

    def depths(self) -> bytes:
        """The table over depth of what is on the screen, in SI units."""
        assert self._depth.depths is not None
        return depth_csv(self._depth.depths, self._depth.case, self._document.project.title).encode("utf-8")

    def _ask(self, title: str, name: str, kinds: str, made: Callable[[], bytes]) -> bool:
        folder = self._document.folder or Path.home()
        proposed = folder / f"{folder_names([self._document.case.name])[0]}-{name}"
        asked, _ = QFileDialog.getSaveFileName(self._window, title, str(proposed), kinds)
        return bool(asked) and self.save(Path(asked), made())

    def save(self, path: Path, content: bytes) -> bool:
        try:
            path.write_bytes(content)
        except OSError as error:
            self.told.emit(f"{path} cannot be written: {error.strerror or error}.", "over")
            return False
        self.told.emit(f"Saved in {path}.", "tell")
        return True

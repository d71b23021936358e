"""The workspace: choices and answers on the left, the picture, and what is read at the pointer."""

from __future__ import annotations

from threading import Thread

from PySide6.QtCore import Qt
from PySide6.QtGui import QHideEvent, QShowEvent
from PySide6.QtWidgets import (
    QButtonGroup,
    QFrame,
    QHBoxLayout,
    QLabel,
    QProgressBar,
    QPushButton,
    QStackedWidget,
    QVBoxLayout,
    QWidget,
)

from app.document import Document
from app.look.spacing import GAP, SPACE
from app.set_sheet.answer_words import bands_at
from app.set_sheet.chart_view import ChartView
from app.set_sheet.choices import Choices
from app.set_sheet.depth_solution import DepthSolution
from app.set_sheet.depth_view import DepthView
from app.set_sheet.depth_words import depth_reading, depth_summary
from app.set_sheet.saving import Saving
from app.set_sheet.sheet_solution import SheetSolution
from app.set_sheet.words import level_text, per_of, reading, summary
from app.units import Units, units_of
from app.words import LIMIT_CAUTION, MODEL_CAUTION
from solver.studies import Cell
from solver.studies.depth import DepthPoint

NAME = "Set sheet"


def read_ahead() -> None:
    """Read what finds roots. Parts of it hold Python's lock for a tenth of a second, which nobody feels while the
    window opens, and everybody would when the sheet is first looked at."""
    import scipy.optimize  # noqa: F401


class SetSheet(QWidget):
    """Solves only while it is shown; `close_down` ends its threads."""

    def __init__(self, document: Document, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._document = document
        Thread(target=read_ahead, name="read ahead", daemon=True).start()
        self.solution = SheetSolution(document, self)
        self._cell: Cell | None = None
        self._depth_point: DepthPoint | None = None
        self.choices = Choices(document, self.solution, self)
        self.chart = ChartView(self)
        self.told = QLabel()
        self.told.setProperty("role", "soft")
        self.told.setWordWrap(True)
        self.told.setAlignment(Qt.AlignmentFlag.AlignTop)
        self.told.setMinimumHeight(2 * self.told.fontMetrics().lineSpacing() + GAP)
        self.state = QLabel()
        self.state.setWordWrap(True)
        self.over_resistance, self.over_depth = _chip("Over resistance"), _chip("Down to depth")
        self.over_resistance.setChecked(True)
        self.by_depth = DepthSolution(document, self)
        self.to_depth = DepthView(self.by_depth, self)
        self.progress = QProgressBar()
        self.progress.setTextVisible(False)
        self.progress.setRange(0, 1000)
        self.progress.setFixedHeight(3)
        kept = self.progress.sizePolicy()
        kept.setRetainSizeWhenHidden(True)  # the picture must not jump when it goes
        self.progress.setSizePolicy(kept)
        self.stop = QPushButton("Stop")
        self.print_page = QPushButton("Page for the rig…")
        self.export = QPushButton("Table…")
        self.saving = Saving(document, self.solution, self.by_depth, self)
        self._compose()
        self.chart.pointed.connect(self._point)
        self.stop.clicked.connect(self._stop_or_go_on)
        self.print_page.clicked.connect(self.saving.ask_page)
        self.export.clicked.connect(self._ask_table)
        self.to_depth.pointed.connect(self._point_depth)
        self.by_depth.changed.connect(self.follow)
        document.changed.connect(self.follow)
        self.solution.changed.connect(self.follow)
        self.follow()

    def _compose(self) -> None:
        top = QHBoxLayout()
        top.setSpacing(SPACE)
        views = QButtonGroup(self)
        for chip in (self.over_resistance, self.over_depth):
            views.addButton(chip)
            top.addWidget(chip)
        top.addWidget(self.state, 1)
        for widget in (self.stop, self.export, self.print_page):
            top.addWidget(widget)
        paper = QFrame()
        paper.setProperty("role", "paper")
        column = QVBoxLayout(paper)
        column.setContentsMargins(SPACE, SPACE, SPACE, SPACE)
        column.setSpacing(GAP)
        column.addLayout(top)
        column.addWidget(self.progress)
        self.pictures = QStackedWidget()
        self.pictures.addWidget(self.chart)
        self.pictures.addWidget(self.to_depth)
        views.buttonToggled.connect(self._choose_picture)
        column.addWidget(self.pictures, 1)
        column.addWidget(self.told)
        caution = QLabel(f"{MODEL_CAUTION} {LIMIT_CAUTION}")
        caution.setProperty("role", "small")
        caution.setWordWrap(True)
        column.addWidget(caution)
        row = QHBoxLayout(self)
        row.setContentsMargins(0, 0, 0, 0)
        row.setSpacing(SPACE)
        row.addWidget(self.choices)
        row.addWidget(paper, 1)

    def close_down(self) -> bool:
        """End the threads; False where one did not end in time."""
        depth_ended = self.by_depth.close()
        return self.solution.close() and depth_ended

    def showEvent(self, event: QShowEvent) -> None:
        self.solution.look(True)
        super().showEvent(event)

    def hideEvent(self, event: QHideEvent) -> None:
        self.solution.look(False)
        super().hideEvent(event)

    def follow(self) -> None:
        """Show what the solution says; nothing while nobody sees it."""
        if not self.isVisible():
            return
        solution = self.solution
        units = units_of(self._document.project)
        per = per_of(units, solution.settings.per)
        sheet = solution.sheet
        refused = solution.state == "refused"
        self.chart.show_sheet(sheet, units, per, solution.sampled, refused)
        solving = solution.state == "solving"
        words = {
            "waiting": "",
            "solving": "Solving …",
            "answering": "✓ up to date, answering the questions …",
            "fresh": "✓ up to date",
            "stopped": f"! {solution.message}",
            "refused": f"✕ {solution.message}",
        }[solution.state]
        if solution.state == "fresh" and solution.message:
            words = f"! {solution.message}"
        _say(self.state, words)
        self.progress.setVisible(solving)
        self.progress.setValue(round(1000 * solution.fraction))
        self.stop.setVisible(solving or solution.state in ("answering", "stopped"))
        _say(self.stop, "Solve" if solution.state == "stopped" else "Stop")
        if self.over_depth.isChecked() or solution.state == "fresh":
            self.by_depth.solve()
        ready = sheet is not None and sheet.complete and not refused
        self.print_page.setEnabled(ready and (self.by_depth.fresh is not None or bool(self.by_depth.problem)))
        self.export.setEnabled(self.by_depth.fresh is not None if self.over_depth.isChecked() else ready)
        self.to_depth.follow(units)
        _say(
            self.told,
            self._depth_words(per, units) if self.over_depth.isChecked() else self._words(per, units),
        )

    def _words(self, per: str, units: Units) -> str:
        sheet, sampled = self.solution.sheet, self.solution.sampled
        if self._cell is not None:
            bands = bands_at(sampled, self._cell, units) if sampled else ""
            return "\n".join([reading(self._cell, per, units), *([bands] if bands else [])])
        if sheet is None or not sheet.cells:
            return ""
        shaded = (
            f"\nShaded: eight of ten samples with {level_text(sheet.plan.levels[0], units)}."
            if sampled
            else ""
        )
        return summary(sheet, units) + shaded

    def _depth_words(self, per: str, units: Units) -> str:
        if self.by_depth.problem:
            return f"✕ {self.by_depth.problem}"
        if self.by_depth.depths is None:
            return "Solving …"
        if self._depth_point is not None:
            return depth_reading(self._depth_point, per, units)
        return depth_summary(self.by_depth.depths, units)

    def _choose_picture(self) -> None:
        self.pictures.setCurrentWidget(self.to_depth if self.over_depth.isChecked() else self.chart)
        self.follow()

    def _point_depth(self, point: DepthPoint | None) -> None:
        self._depth_point = point
        self.follow()

    def _ask_table(self) -> None:
        if self.over_depth.isChecked():
            self.saving.ask_depths()
        else:
            self.saving.ask_table()

    def _point(self, cell: Cell | None) -> None:
        self._cell = cell
        self.follow()

    def _stop_or_go_on(self) -> None:
        if self.solution.state == "stopped":
            self.solution.solve_again()
        else:
            self.solution.stop()


def _chip(name: str) -> QPushButton:
    chip = QPushButton(name)
    chip.setProperty("role", "chip")
    chip.setCheckable(True)
    return chip


def _say(widget: QLabel | QPushButton, text: str) -> None:
    if widget.text() != text:
        widget.setText(text)

"""Findings: the verdict in large figures, then notes. Each leads to its place and time when it is clicked.

The facts are the solver's (`findings_of`), the sentences those of `app.words`; nothing is worked out here.
"""

from __future__ import annotations

from collections.abc import Iterator
from functools import lru_cache

from PySide6.QtCore import Qt
from PySide6.QtGui import QContextMenuEvent, QGuiApplication
from PySide6.QtWidgets import QFrame, QLabel, QMenu, QScrollArea, QVBoxLayout, QWidget

from app import words
from app.bench.finding_row import FindingRow, Told
from app.document import Document
from app.look.spacing import GAP, SPACE
from app.sight import Sight
from app.solving import Solution
from app.units import Units, units_of
from solver import Findings, Result, findings_of


class FindingsPanel(QFrame):
    def __init__(
        self, document: Document, sight: Sight, solution: Solution, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._document, self._sight, self._solution = document, sight, solution
        self._shown: object = None
        self._list: list[FindingRow] = []
        self.setMinimumWidth(170)
        self.setAccessibleName("Findings")
        outer = QVBoxLayout(self)
        outer.setContentsMargins(0, GAP, 0, GAP)
        outer.setSpacing(0)
        heading = QLabel("Findings")
        heading.setProperty("role", "strong")
        heading.setContentsMargins(SPACE, 0, SPACE, GAP)
        outer.addWidget(heading)
        scroll = QScrollArea()
        scroll.setWidgetResizable(True)
        scroll.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self._inside = QWidget()
        self._rows = QVBoxLayout(self._inside)
        self._rows.setContentsMargins(0, 0, 0, 0)
        self._rows.setSpacing(2)
        self._rows.addStretch(1)
        scroll.setWidget(self._inside)
        self._inside.setAutoFillBackground(False)
        scroll.viewport().setAutoFillBackground(False)
        outer.addWidget(scroll, 1)
        caution = QLabel(words.MODEL_CAUTION)
        caution.setProperty("role", "small")
        caution.setWordWrap(True)
        caution.setToolTip(f"{words.AXIAL_CAUTION} {words.LIMIT_CAUTION}")
        caution.setContentsMargins(SPACE, GAP, SPACE, 0)
        outer.addWidget(caution)
        for source in (document, solution):
            source.changed.connect(self._look_again)
        self._look_again()

    def rows(self) -> list[FindingRow]:
        """The findings as they stand, from top to bottom."""
        return [row for row in self._list if not row.isHidden()]

    def contextMenuEvent(self, event: QContextMenuEvent) -> None:
        menu = QMenu(self)
        copy = menu.addAction("Copy as text", self._copy)
        copy.setEnabled(self._solution.result is not None)
        menu.exec(event.globalPos())

    def _copy(self) -> None:
        result = self._solution.result
        if result is not None:
            units = units_of(self._document.project)
            text = words.as_text(facts_of(result), result.case, units)
            QGuiApplication.clipboard().setText(text)

    def _look_again(self) -> None:
        result, units = self._solution.result, units_of(self._document.project)
        stands = not self._document.rejected and self._solution.state not in ("stale", "refused")
        shown = (result, units, stands, self._solution.message)
        if shown == self._shown:
            return
        self._shown = shown
        told = list(self._told(result, units)) if result is not None else []
        if self._solution.state == "refused" and self._solution.message:
            told.insert(0, Told(detail=f"✕ {self._solution.message}", stands=True))
        while len(self._list) < len(told):
            self._list.append(self._new_row())
        for row, content in zip(self._list, told, strict=False):
            row.tell(content)
            row.setEnabled(stands or content.stands)
        for number, row in enumerate(self._list):
            row.setVisible(number < len(told))

    def _told(self, result: Result, units: Units) -> Iterator[Told]:
        facts = facts_of(result)
        for line in words.verdict(facts, units):
            leads = _leads(line.time, line.position)
            yield Told(line.figure, line.name, line.detail, line.state, leads)
        for note in words.notes(facts, result.case, units):
            yield Told(detail=note.text, leads=_leads(note.time, note.position, note.pointer))

    def _new_row(self) -> FindingRow:
        row = FindingRow()
        row.clicked.connect(lambda: self._sight.set(**dict(row.told.leads)))
        self._rows.insertWidget(len(self._list), row)
        return row


def _leads(time: float | None, position: float | None, pointer: str = "") -> tuple[tuple[str, object], ...]:
    """What a click changes in the sight: cursor and selection go to where the finding is."""
    found = (("time", time), ("place", position), ("selection", pointer or None))
    return tuple((name, value) for name, value in found if value is not None)


@lru_cache(maxsize=2)
def facts_of(result: Result) -> Findings:
    """Findings of a result, worked out once."""
    return findings_of(result)

"""Findings: the verdict in large figures, then notes. Each leads to its place and time when it is clicked.

The facts are the solver's (`findings_of`), the sentences those of `app.words`; nothing is worked out here.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace
from functools import lru_cache
from typing import Any

from PySide6.QtCore import Qt
from PySide6.QtGui import QContextMenuEvent, QGuiApplication, QResizeEvent
from PySide6.QtWidgets import QFrame, QLabel, QMenu, QScrollArea, QVBoxLayout, QWidget

from app import run_words, words
from app.bench.differences import Block, Differences
from app.bench.finding_row import FindingRow, Told
from app.bench.mesh_view import MeshView
from app.bench.pictures.time_shown import with_moment_shown
from app.document import Document
from app.explaining import explain
from app.laid_over import LaidOver
from app.look.spacing import GAP, SPACE
from app.sight import Sight
from app.solving import Solution
from app.units import Units, units_of
from solver import Findings, Result, findings_of


class FindingsPanel(QFrame):
    def __init__(
        self,
        document: Document,
        sight: Sight,
        solution: Solution,
        parent: QWidget | None = None,
        laid_over: LaidOver | None = None,
    ) -> None:
        super().__init__(parent)
        self._document, self._sight, self._solution = document, sight, solution
        self._laid_over = laid_over
        self._shown: object = None
        self._verdict: list[FindingRow] = []
        self._notes: list[FindingRow] = []
        self.differences, self.mesh = Differences(), MeshView()
        self._answered = False
        self.setMinimumWidth(170)
        self.setAccessibleName("Findings")
        self._verdict_rows, self._note_rows = QVBoxLayout(), QVBoxLayout()
        self._scroll = self._make_scroll()
        outer = QVBoxLayout(self)
        outer.setContentsMargins(0, GAP, 0, GAP)
        outer.setSpacing(0)
        outer.addWidget(_heading())
        outer.addWidget(self._scroll, 1)
        outer.addWidget(_caution())
        self.mesh.said.connect(lambda: self._show_answer(True))
        self._scroll.verticalScrollBar().rangeChanged.connect(lambda: self._show_answer(self._answered))
        for source in (document, solution, *(() if laid_over is None else (laid_over,))):
            source.changed.connect(self._look_again)
        self._look_again()

    def _make_scroll(self) -> QScrollArea:
        """The verdict, the differences to cases laid over, the notes and the check of the mesh, one under the other."""
        inside = QWidget()
        column = QVBoxLayout(inside)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(2)
        for rows in (self._verdict_rows, self._note_rows):
            rows.setSpacing(2)
        column.addLayout(self._verdict_rows)
        column.addWidget(self.differences)
        column.addLayout(self._note_rows)
        column.addWidget(self.mesh)
        column.addStretch(1)
        scroll = QScrollArea()
        scroll.setAccessibleName("Findings")
        scroll.setWidgetResizable(True)
        scroll.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        scroll.setWidget(inside)
        inside.setAutoFillBackground(False)
        scroll.viewport().setAutoFillBackground(False)
        return scroll

    def rows(self) -> list[FindingRow]:
        """The findings as they stand, from top to bottom."""
        return [row for row in (*self._verdict, *self._notes) if not row.isHidden()]

    def resizeEvent(self, event: QResizeEvent) -> None:
        super().resizeEvent(event)
        self._fit()

    def _show_answer(self, wanted: bool) -> None:
        """Bring the answer of the check into view, again when it has got its height."""
        self._answered = wanted
        if wanted:
            self._scroll.ensureWidgetVisible(self.mesh.answer, 0, 0)

    def _fit(self) -> None:
        """The verdict is seen without scrolling: where its details do not fit, they are told in brief."""
        rows = [row for row in self._verdict if not row.isHidden()]
        # notes under the verdict mostly bring the scroll bar, which takes its width from every row
        width = self._scroll.width() - self._scroll.verticalScrollBar().sizeHint().width()
        needed = sum(row.full_height(width) + 2 for row in rows)
        if self.differences.blocks:
            needed += self.differences.sizeHint().height()
        for row in rows:
            row.set_tight(needed > self._scroll.height())

    def contextMenuEvent(self, event: QContextMenuEvent) -> None:
        menu = QMenu(self)
        copy = menu.addAction("Copy as text", self.copy)
        copy.setEnabled(self._solution.result is not None)
        check = menu.addAction("Check the mesh", self.mesh.ask)
        check.setEnabled(self.mesh.link.isEnabled())
        under = self.childAt(event.pos())
        menu.addAction("What is this?", lambda: explain(under or self))
        menu.exec(event.globalPos())

    def copy(self) -> None:
        """All findings as a paragraph, onto the clipboard."""
        result = self._solution.result
        if result is not None:
            units = units_of(self._document.project)
            also = run_words.of_the_run(result, units)
            text = words.as_text(facts_of(result), result.case, units, also)
            QGuiApplication.clipboard().setText(text)

    def _look_again(self) -> None:
        result, units = self._solution.result, units_of(self._document.project)
        stands = not self._document.rejected and self._solution.state not in ("stale", "refused")
        over = () if self._laid_over is None else self._laid_over.shown
        under_way = result is not None and not result.finished and self._solution.state == "solving"
        shown = (result, units, stands, self._solution.message, over, under_way)
        if shown == self._shown:
            return
        self._shown, self._answered = shown, False
        verdict = list(_verdict(result, units)) if result is not None else []
        notes = list(_notes(result, units, under_way)) if result is not None else []
        if self._solution.state == "refused" and self._solution.message:
            verdict.insert(0, Told(detail=f"✕ {self._solution.message}", stands=True))
        self._show(self._verdict, self._verdict_rows, verdict, stands)
        self._show(self._notes, self._note_rows, notes, stands)
        self.differences.tell(tuple(self._blocks(result, units)))
        self.mesh.follow(result if stands else None)
        self._fit()

    def _blocks(self, result: Result | None, units: Units) -> Iterator[Block]:
        """A block of differences for each case laid over this one."""
        for one in () if self._laid_over is None or result is None else self._laid_over.shown:
            rows: tuple[run_words.Difference, ...] = ()
            if one.result is not None:
                rows = run_words.differences(facts_of(result), facts_of(one.result), units)
            yield one.name, one.number, rows, one.tells

    def _lead(self, where: dict[str, Any]) -> None:
        """Bring the cursor to the place and time of a finding, and the pictures with it."""
        if "time" in where:
            case, result = self._document.case, self._solution.result
            where |= with_moment_shown(self._sight, case, result, where["time"])
        self._sight.set(**where)

    def _show(self, rows: list[FindingRow], layout: QVBoxLayout, told: list[Told], stands: bool) -> None:
        while len(rows) < len(told):
            row = FindingRow()
            row.clicked.connect(lambda _on=False, r=row: self._lead(dict(r.told.leads)))
            rows.append(row)
            layout.addWidget(row)
        for row, content in zip(rows, told, strict=False):
            row.tell(content)
            row.setEnabled(stands or content.stands)
        for number, row in enumerate(rows):
            row.setVisible(number < len(told))


def _heading() -> QLabel:
    heading = QLabel("Findings")
    heading.setProperty("role", "strong")
    heading.setContentsMargins(SPACE, 0, SPACE, GAP)
    return heading


def _caution() -> QLabel:
    caution = QLabel(words.MODEL_CAUTION)
    caution.setProperty("role", "small")
    caution.setWordWrap(True)
    caution.setToolTip(f"{words.AXIAL_CAUTION} {words.LIMIT_CAUTION}")
    caution.setContentsMargins(SPACE, GAP, SPACE, 0)
    return caution


def _verdict(result: Result, units: Units) -> Iterator[Told]:
    facts = facts_of(result)
    brief = run_words.in_brief(facts, units)
    for line, short in zip(words.verdict(facts, units), brief, strict=True):
        leads = _leads(line.time, line.position)
        yield Told(line.figure, line.name, line.detail, line.state, leads, brief=short)


def _notes(result: Result, units: Units, under_way: bool) -> Iterator[Told]:
    facts = facts_of(result)
    if under_way:  # it has not been stopped, it has not ended yet
        facts = replace(facts, quality=replace(facts.quality, finished=True))
        yield Told(
            detail=f"Being solved: told here is what happened until {units.show(result.duration, 'time')}."
        )
    for note in (*words.notes(facts, result.case, units), *run_words.of_the_run(result, units)):
        yield Told(detail=note.text, leads=_leads(note.time, note.position, note.pointer))
    locked = run_words.locked_in(result.residual, units) if result.residual is not None else None
    if locked is not None:
        yield Told(detail=locked.text, leads=(*_leads(None, locked.position), ("locked_in", True)))


def _leads(time: float | None, position: float | None, pointer: str = "") -> tuple[tuple[str, object], ...]:
    """What a click changes in the sight: cursor and selection go to where the finding is."""
    found = (("time", time), ("place", position), ("selection", pointer or None))
    return tuple((name, value) for name, value in found if value is not None)


@lru_cache(maxsize=6)
def facts_of(result: Result) -> Findings:
    """Findings of a result, worked out once."""
    return findings_of(result)

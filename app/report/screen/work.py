"""The report of the document at hand, solved and laid out in a thread of its own while it is looked at."""

from __future__ import annotations

import logging
from dataclasses import dataclass
from datetime import datetime
from pathlib import Path
from threading import Thread
from typing import Literal

from PySide6.QtCore import QObject, QTimer, Signal

from app.document import Document
from app.report.blocks import Report
from app.report.outcome import Solved
from solver import Project

State = Literal["waiting", "working", "fresh", "failed"]
#: Changes that follow each other faster than this make one report, ms.
SETTLE = 350


@dataclass(frozen=True)
class _Job:
    number: int
    project: Project
    path: Path | None
    date: datetime
    known: tuple[Solved, ...]


class ReportWork(QObject):
    """`report` and `pdf` are the newest; `state` says how they stand to the document, `message` what is being done or
    why there is none. Works only between `look(True)` and `look(False)`."""

    changed = Signal()
    _told = Signal(int, str)
    _made = Signal(int, object, object, object)
    _failed = Signal(int, str)

    def __init__(self, document: Document, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._looked = self._closed = False
        self._number = 0
        self._thread: Thread | None = None
        self._known: tuple[Solved, ...] = ()
        self._of: Project | None = None
        self.report: Report | None = None
        self.pdf = b""
        self.date = datetime.now().astimezone().replace(microsecond=0)
        self.state: State = "waiting"
        self.message = ""
        self._timer = QTimer(self, singleShot=True, interval=SETTLE)
        self._timer.timeout.connect(self._begin)
        document.changed.connect(self._follow)
        self._told.connect(self._tell)
        self._made.connect(self._take)
        self._failed.connect(self._fail)

    @property
    def cases(self) -> tuple[Solved, ...]:
        """What the report is made of."""
        return self._known

    def look(self, on: bool) -> None:
        """Begin or end working; what is under way is dropped."""
        self._looked = on
        if on:
            self._follow()
        else:
            self._timer.stop()

    def close(self) -> bool:
        """End the thread; False where it did not end in time."""
        self._closed = True
        self._number += 1
        self._timer.stop()
        if self._thread is not None:
            self._thread.join(0.7)
            return not self._thread.is_alive()
        return True

    def _follow(self) -> None:
        if self._looked and self._document.project is not self._of:
            self._number += 1  # what is under way stops at its next look
            self._timer.start()

    def _begin(self) -> None:
        if self._thread is not None and self._thread.is_alive():
            self._timer.start()
            return
        self._number += 1
        self._of = self._document.project
        self.date = datetime.now().astimezone().replace(microsecond=0)
        job = _Job(self._number, self._of, self._document.path, self.date, self._known)
        self.state, self.message = "working", "Beginning"
        self._thread = Thread(target=self._work, args=(job,), name="report", daemon=True)
        self._thread.start()
        self.changed.emit()

    def _work(self, job: _Job) -> None:
        from app.report.build import build_report
        from app.report.choices import report_choices
        from app.report.pdf import pdf_of
        from app.report.solve_cases import solve_cases

        def overtaken() -> bool:
            return job.number != self._number

        def tell(text: str) -> None:
            if not overtaken():
                self._told.emit(job.number, text)

        try:
            mesh_check = report_choices(job.project.studies).mesh_check
            cases = solve_cases(job.project, mesh_check, tell, overtaken, job.known)
            if overtaken():
                return
            tell("Laying out the pages")
            report = build_report(job.project, cases, job.date, job.path)
            pdf = pdf_of(report, job.date)
            if not overtaken():
                self._made.emit(job.number, report, pdf, cases)
        except Exception as error:
            logging.getLogger(__name__).exception("The report could not be made")
            if not overtaken():
                self._failed.emit(
                    job.number, f"The report could not be made ({type(error).__name__}: {error})."
                )

    def _tell(self, number: int, text: str) -> None:
        if number == self._number:
            self.message = text
            self.changed.emit()

    def _take(self, number: int, report: Report, pdf: bytes, cases: tuple[Solved, ...]) -> None:
        if number == self._number:
            self.report, self.pdf, self._known = report, pdf, cases
            self.state, self.message = "fresh", ""
            self.changed.emit()

    def _fail(self, number: int, text: str) -> None:
        if number == self._number:
            self.state, self.message = "failed", text
            self.changed.emit()

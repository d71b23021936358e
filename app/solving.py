"""The latest result and the input it belongs to. Solves in a thread of its own, always the latest input."""

from __future__ import annotations

import logging
from collections.abc import Callable
from dataclasses import dataclass
from threading import Lock
from time import monotonic
from typing import Any, Literal

from PySide6.QtCore import QObject, QThread, Signal, Slot

from app.document import Document
from solver import Case, Result

State = Literal["fresh", "solving", "stale", "refused", "stopped"]
Solve = Callable[..., Result]

#: A run that newer input has overtaken may still end by itself for so long, s: while something is dragged the
#: pictures then follow, instead of every run being broken off by the next.
OVERTAKEN_FOR = 0.15
#: Partial results are shown at most so often, s, and not before a run has lasted so long.
PARTIAL_EVERY = 0.2


@dataclass(frozen=True)
class _Job:
    number: int
    case: Case


@dataclass(frozen=True)
class _Report:
    """From the worker, about one job: a partial or complete result, or the sentence why there is none."""

    job: _Job
    result: Result | None = None
    sentence: str = ""
    fraction: float = 1.0
    seconds_left: float | None = None
    ended: bool = True


class _Order:
    """The number of the latest job and of the last stopped one, shared by both threads."""

    def __init__(self) -> None:
        self._lock = Lock()
        self._latest = self._stopped = 0

    def next(self) -> int:
        with self._lock:
            self._latest += 1
            return self._latest

    def stop(self) -> None:
        with self._lock:
            self._stopped = self._latest

    @property
    def latest(self) -> int:
        with self._lock:
            return self._latest

    def is_stopped(self, number: int) -> bool:
        with self._lock:
            return number <= self._stopped


class _Worker(QObject):
    """Lives in the solving thread. Gets a frozen case, gives back a frozen result, knows nothing of the document."""

    reported = Signal(object)

    def __init__(self, order: _Order, solve: Solve | None) -> None:
        super().__init__()
        self._order, self._solve = order, solve

    @Slot(object)
    def work(self, job: _Job) -> None:
        if job.number != self._order.latest:
            return  # newer input stands in the queue behind it
        started = shown = monotonic()

        def cancel() -> bool:
            overtaken = job.number != self._order.latest and monotonic() - started > OVERTAKEN_FOR
            return overtaken or self._order.is_stopped(job.number)

        def progress(step: Any) -> None:
            nonlocal shown
            if monotonic() - shown > PARTIAL_EVERY and not cancel():
                shown = monotonic()
                report = _Report(job, step.partial(), "", step.fraction, step.seconds_left, ended=False)
                self.reported.emit(report)

        self.reported.emit(self._solved(job, progress, cancel))

    def _solved(self, job: _Job, progress: Callable[[Any], None], cancel: Callable[[], bool]) -> _Report:
        from solver import SolveError  # with `solve` it brings the compiled kernels, which take their time

        solve = self._solve or _solver()
        try:
            return _Report(job, solve(job.case, progress=progress, cancel=cancel))
        except SolveError as error:
            return _Report(job, sentence=str(error))
        except Exception as error:
            logging.getLogger(__name__).exception("The solver failed")
            return _Report(job, sentence=f"The solver failed unexpectedly ({type(error).__name__}: {error}).")


def _solver() -> Solve:
    from solver import solve

    return solve


class Solution(QObject):
    """`result` is the newest there is, `None` before the first; `state` says how it stands to the document's case.

    fresh: it belongs to it. solving: it is being renewed, and `fraction` and `seconds_left` say how far that is.
    stale: the document has changed and nothing is under way. refused: the case cannot be solved, `message` says why.
    stopped: the user stopped the run, and `result` holds what was solved until then.
    """

    changed = Signal()
    _wanted = Signal(object)

    def __init__(self, document: Document, solve: Solve | None = None, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._document = document
        self._order = _Order()
        self._job: _Job | None = None
        self._result_of = 0
        self._result: Result | None = None
        self._state: State = "stale"
        self._message = ""
        self._fraction = 0.0
        self._seconds_left: float | None = None
        self._thread = QThread(self)
        self._thread.setObjectName("solving")
        self._worker = _Worker(self._order, solve)
        self._worker.moveToThread(self._thread)
        self._wanted.connect(self._worker.work)
        self._worker.reported.connect(self._take)
        self._thread.start()
        document.changed.connect(self._follow)
        self._follow()

    @property
    def result(self) -> Result | None:
        return self._result

    @property
    def state(self) -> State:
        return self._state

    @property
    def message(self) -> str:
        return self._message

    @property
    def fraction(self) -> float:
        return self._fraction

    @property
    def seconds_left(self) -> float | None:
        return self._seconds_left

    def stop(self) -> None:
        """Break off the run under way; what is solved so far is kept."""
        if self._state == "solving":
            self._order.stop()

    def solve_again(self) -> None:
        """Solve the case at hand anew, after a stop."""
        self._job = None
        self._follow()

    def close(self) -> bool:
        """End the thread, within 0.7 s. False where it would not end in time: it then ends by itself later."""
        self._order.stop()
        self._order.next()
        self._thread.quit()
        if self._thread.wait(700):
            return True
        thread = self._thread
        thread.setParent(None)  # destroying a thread that runs aborts the process
        thread.finished.connect(lambda: thread.deleteLater())  # and this holds it until it has ended
        return False

    def _follow(self) -> None:
        case = self._document.case
        if self._job is not None and self._job.case == case:
            return
        self._job = _Job(self._order.next(), case)
        self._state, self._message, self._fraction, self._seconds_left = "solving", "", 0.0, None
        self._wanted.emit(self._job)
        self.changed.emit()

    @Slot(object)
    def _take(self, report: _Report) -> None:
        if self._job is None or report.job.number < self._result_of:
            return
        current = report.job.number == self._job.number
        if report.result is not None and (current or report.result.finished):
            self._result, self._result_of = report.result, report.job.number
        elif not current:
            return
        if current:
            self._state, self._message = _state_after(report)
            self._fraction, self._seconds_left = report.fraction, report.seconds_left
        self.changed.emit()


def _state_after(report: _Report) -> tuple[State, str]:
    if not report.ended:
        return "solving", ""
    if report.result is None:
        return "refused", report.sentence
    if report.result.finished:
        return "fresh", ""
    return "stopped", "Stopped before the end: the pictures show what was solved until then."

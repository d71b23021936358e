"""Work beside the window: one piece at a time in a thread of its own, and what newer work has overtaken is dropped."""

from __future__ import annotations

import logging
from collections.abc import Callable, Iterator
from threading import Thread
from typing import Any

from PySide6.QtCore import QObject, Signal, Slot

Cancel = Callable[[], bool]
#: Gets the question whether to stop, yields what it finds.
Work = Callable[[Cancel], Iterator[Any]]


class Aside(QObject):
    """`found` carries each thing that the latest work yields, `ended` the sentence why it failed, "" where it did not.
    Both arrive in the thread of the window."""

    found = Signal(object)
    ended = Signal(str)
    _reported = Signal(int, bool, object)

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._number = 0
        self._thread: Thread | None = None
        self._reported.connect(self._take)

    def tell(self, what: object) -> None:
        """Hand something over from within the latest work, beside what it yields."""
        self._report(self._number, False, what)

    def start(self, work: Work) -> None:
        """Begin; work under way is broken off first, and nothing more is heard of it."""
        self._number += 1
        before = self._thread
        self._thread = Thread(
            target=self._run, args=(self._number, work, before), name="beside the window", daemon=True
        )
        self._thread.start()

    def drop(self) -> None:
        """Break off what is under way."""
        self._number += 1

    def close(self, seconds: float = 0.4) -> bool:
        """Break off and wait; False where it would not end in time: it then ends by itself."""
        self.drop()
        if self._thread is not None:
            self._thread.join(seconds)
        return self._thread is None or not self._thread.is_alive()

    def _run(self, number: int, work: Work, before: Thread | None) -> None:
        from solver import SolveError  # with the kernels, which take their time
        from solver.studies import StudyError

        sentence = ""
        try:
            if before is not None:
                before.join()
            if number == self._number:
                for piece in work(lambda: number != self._number):
                    self._report(number, False, piece)
        except (SolveError, StudyError) as error:
            sentence = str(error)
        except Exception as error:
            logging.getLogger(__name__).exception("Work beside the window failed")
            sentence = f"The solver failed unexpectedly ({type(error).__name__}: {error})."
        self._report(number, True, sentence)

    def _report(self, number: int, over: bool, what: object) -> None:
        if number == self._number:
            try:
                self._reported.emit(number, over, what)
            except RuntimeError:  # the window has gone meanwhile
                self._number += 1

    @Slot(int, bool, object)
    def _take(self, number: int, over: bool, what: object) -> None:
        if number != self._number:
            return
        if over:
            self.ended.emit(what)
        else:
            self.found.emit(what)

"""Work in a thread that hands over what it finds piece by piece, and drops what newer work has overtaken."""

from __future__ import annotations

import logging
from collections.abc import Callable, Iterator
from threading import Thread
from typing import Any

from PySide6.QtCore import QObject, Signal, Slot

from solver import SolveError
from solver.studies import StudyError

Cancel = Callable[[], bool]
#: Gets the question whether to stop, yields what it finds.
Work = Callable[[Cancel], Iterator[Any]]


class Stream(QObject):
    """One piece of work at a time. `arrived` carries what the latest work yields, `ended` its sentence of failure, ""
    where all went well. Both reach the thread of the window."""

    arrived = Signal(object)
    ended = Signal(str)
    _told = Signal(int, object)
    _over = Signal(int, str)

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._number = 0
        self._threads: list[Thread] = []
        self._told.connect(self._take)
        self._over.connect(self._finish)

    def start(self, work: Work) -> None:
        """Begin; work that is under way is broken off, and what it still says is not heard."""
        self._number += 1
        self._threads = [t for t in self._threads if t.is_alive()]
        thread = Thread(target=self._run, args=(self._number, work), name="set sheet", daemon=True)
        self._threads.append(thread)
        thread.start()

    def stop(self) -> None:
        """Break off what is under way; nothing more is heard of it."""
        self._number += 1

    def close(self, seconds: float = 0.7) -> bool:
        """Break off and wait; False where it did not end in time."""
        self.stop()
        for thread in self._threads:
            thread.join(seconds)
        return not any(thread.is_alive() for thread in self._threads)

    def tell(self, what: object) -> None:
        """Hand something over from within the latest work, beside what it yields."""
        self._tell(self._told, self._number, what)

    def _run(self, number: int, work: Work) -> None:
        sentence = ""
        before = list(self._threads[:-1])
        try:
            for thread in before:
                if thread.is_alive() and number == self._number:
                    thread.join()  # two at once would only slow each other down
            for found in work(lambda: number != self._number):
                self._tell(self._told, number, found)
        except (StudyError, SolveError) as error:
            sentence = str(error)
        except Exception as error:
            logging.getLogger(__name__).exception("The study failed")
            sentence = f"The study failed unexpectedly ({type(error).__name__}: {error}): please report this."
        self._tell(self._over, number, sentence)

    def _tell(self, signal: Any, number: int, what: object) -> None:
        if number == self._number:
            try:
                signal.emit(number, what)
            except RuntimeError:  # the window has gone meanwhile
                self._number += 1

    @Slot(int, object)
    def _take(self, number: int, found: object) -> None:
        if number == self._number:
            self.arrived.emit(found)

    @Slot(int, str)
    def _finish(self, number: int, sentence: str) -> None:
        if number == self._number:
            self.ended.emit(sentence)

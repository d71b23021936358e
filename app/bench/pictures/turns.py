"""Pictures of a new result are painted one at a time, so that the window answers between them.

All of them in one go take as long as a picture of the screen and longer than somebody may have to wait for an answer to
a key. Those that are read first come first.
"""

from __future__ import annotations

from functools import lru_cache
from weakref import WeakKeyDictionary

from PySide6.QtCore import QObject, QTimer, Signal
from PySide6.QtWidgets import QApplication, QWidget
from shiboken6 import isValid


class Turns(QObject):
    """`done`: all pictures that waited have been painted."""

    done = Signal()

    def __init__(self, parent: QObject | None) -> None:
        super().__init__(parent)
        self._waiting: dict[QWidget, int] = {}
        self._rounds: WeakKeyDictionary[QWidget, int] = WeakKeyDictionary()
        self._timer = QTimer(self)
        self._timer.setInterval(0)
        self._timer.timeout.connect(self._next)

    @property
    def busy(self) -> bool:
        return self._timer.isActive()

    def take(self, picture: QWidget, turn: int) -> None:
        """Have a picture painted, after those that wait with a lower number; but where results come faster than they
        are painted, after those that have been painted less often, so that each has its share."""
        if not self.busy:
            self._rounds.clear()
            self._timer.start()
        self._waiting[picture] = turn

    def _next(self) -> None:
        while self._waiting:
            picture = min(self._waiting, key=lambda p: (self._rounds.get(p, 0), self._waiting[p]))
            del self._waiting[picture]
            if isValid(picture) and picture.isVisible():
                self._rounds[picture] = self._rounds.get(picture, 0) + 1
                picture.update()  # painted before the timer comes again
                return
        self._timer.stop()
        self.done.emit()


@lru_cache(maxsize=1)
def _turns_of(app: QObject | None) -> Turns:
    return Turns(app)


def turns() -> Turns:
    """Those of the window's thread."""
    return _turns_of(QApplication.instance())

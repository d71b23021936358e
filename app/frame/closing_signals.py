"""SIGINT and SIGTERM close the window like its close button. Imports no Qt until it must."""

from __future__ import annotations

import os
import signal
from collections.abc import Callable
from types import FrameType
from typing import Any

#: Qt's loop runs no Python by itself: a timer lets Python look for signals so often, ms.
LOOK = 200


class ClosingSignals:
    """Takes the two signals over from the start of the program on; before there is a window, they end it at once."""

    def __init__(self) -> None:
        self._close: Callable[[], Any] | None = None
        self._before: dict[int, Any] = {}
        for number in (signal.SIGINT, signal.SIGTERM):
            self._before[number] = signal.signal(number, self._take)

    def _take(self, _number: int, _frame: FrameType | None) -> None:
        if self._close is None:
            # nothing is open yet, and whoever starts a program by mistake does not want to wait for it
            os._exit(0)
        from PySide6.QtCore import QTimer

        QTimer.singleShot(0, self._close)  # from Qt's loop, not from wherever Python happens to be

    def close_with(self, close: Callable[[], Any]) -> None:
        """Call this when a signal comes."""
        from PySide6.QtCore import QCoreApplication, QTimer

        self._close = close
        timer = QTimer(QCoreApplication.instance())
        timer.setInterval(LOOK)
        timer.timeout.connect(_nothing)
        timer.start()

    def restore(self) -> None:
        """Give the signals back to whoever had them."""
        self._close = None
        for number, handler in self._before.items():
            signal.signal(number, handler)


def _nothing() -> None:
    """Runs between two steps of Qt's loop, which is when Python calls its signal handlers."""

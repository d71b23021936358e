"""From the first Qt object to the last: nothing of Qt lives longer than `run_window`."""

from __future__ import annotations

import logging
import os
import sys
from functools import partial
from pathlib import Path
from types import TracebackType

from PySide6.QtCore import QEvent
from PySide6.QtWidgets import QApplication

from app.closing_signals import ClosingSignals
from app.demo_files import demo_paths
from app.look import apply_look, follow_system
from app.qt_references import keep_singletons
from app.recovery import kept_work
from app.settings import Settings, user_settings
from app.starting_points import STARTING_POINTS
from app.window import Window
from solver import project_from_tree


def run_window(file: str | None = None, signals: ClosingSignals | None = None) -> int:
    """Open the window and stay until it is closed. Returns the exit status, 0."""
    signals = signals or ClosingSignals()
    keep_singletons()
    app = QApplication(sys.argv[:1])
    app.setApplicationName("Striketrace")
    settings = user_settings()
    apply_look(app, settings.look)
    follow_system(app)
    found = kept_work(settings.recovery_folder)
    window = Window(settings, project_from_tree(STARTING_POINTS[0].make()))
    before, sys.excepthook = sys.excepthook, partial(_tell_fault, window)
    _open_first(window, settings, file)
    window.files.offer_recovery(found)
    window.show()
    signals.close_with(window.close)
    app.exec()
    sys.excepthook = before
    ended = window.ended_in_time
    window.deleteLater()
    app.sendPostedEvents(None, QEvent.Type.DeferredDelete)
    if (
        not ended
    ):  # the solving thread sits in the compiler: waiting for it would take longer than a person waits
        sys.stdout.flush()
        sys.stderr.flush()
        os._exit(0)
    signals.restore()
    return 0


def _open_first(window: Window, settings: Settings, file: str | None) -> None:
    """The file asked for; else the one worked on last; else a demo."""
    if file is not None:
        window.open_path(Path(file))
        return
    last = settings.recent[:1]
    if last and last[0].is_file() and window.open_path(last[0]):
        return
    for demo in demo_paths():
        if window.open_demo(demo):
            return


def _tell_fault(
    window: Window, kind: type[BaseException], error: BaseException, trace: TracebackType | None
) -> None:
    """A fault of the program: on standard error for whoever mends it, in the window for whoever works."""
    logging.getLogger("app").error("Unexpected", exc_info=(kind, error, trace))
    window.notices.show_notice(
        "fault",
        f"Something in the program went wrong ({kind.__name__}: {error}). Your work is kept; saving it is wise.",
        "over",
    )

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

from app.demo_files import demo_paths
from app.document import why_not_opened
from app.frame.closing_signals import ClosingSignals
from app.frame.recovery import kept_work
from app.frame.window import Window
from app.look import apply_look, follow_system
from app.settings import Settings, user_settings
from app.starting_points import STARTING_POINTS
from solver import ProjectError, load_project, project_from_tree


def run_window(file: str | None = None, signals: ClosingSignals | None = None) -> int:
    """Open the window and stay until it is closed. Returns the exit status, 0."""
    signals = signals or ClosingSignals()
    app = QApplication(sys.argv[:1])
    app.setApplicationName("Striketrace")
    settings = user_settings()
    apply_look(app, settings.look)
    follow_system(app)
    window = _first_window(settings, file)
    before, sys.excepthook = sys.excepthook, partial(_tell_fault, window)
    window.show()
    signals.close_with(partial(_close, app, window))
    app.exec()
    sys.excepthook = before
    if not window.ended_in_time:
        # The solving thread sits in the compiler. It cannot be told to stop, waiting for it would take longer than a
        # person waits, and destroying it while it runs would abort the process. All is saved: leave it behind.
        sys.stdout.flush()
        sys.stderr.flush()
        os._exit(0)
    window.deleteLater()
    app.sendPostedEvents(None, QEvent.Type.DeferredDelete)
    signals.restore()
    return 0


def _first_window(settings: Settings, file: str | None) -> Window:
    """On the file asked for; else on the one worked on last; else on a demo; else on a starting point."""
    found = kept_work(settings.recovery_folder)
    last = [path for path in settings.recent[:1] if path.is_file()]
    sentence = ""
    window: Window | None = None
    for path in [Path(file)] if file is not None else [*last, *demo_paths()]:
        path = path.absolute()
        own = file is not None or path in last
        try:
            project = load_project(path)
        except ProjectError as error:
            sentence = sentence or why_not_opened(path, error)
            continue
        window = Window(settings, project)
        window.document.new(project, path if own else None, folder=path.parent)
        window.begin_looking()
        if own:
            settings.add_recent(path)
        break
    if window is None:
        window = Window(settings, project_from_tree(STARTING_POINTS[0].make()))
    if sentence:
        window.notices.show_notice("file", sentence, "over")
    window.files.offer_recovery(found)
    if not found:
        window.offer_first_steps()
    return window


def _close(app: QApplication, window: Window) -> None:
    """Close like the close button does, also where a dialog asks something and has a loop of its own."""
    window.close()
    app.closeAllWindows()
    app.exit(0)


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
